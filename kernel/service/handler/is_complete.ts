import type { Completeness } from "../../cell/port.ts";
import { requiredText } from "../fields.ts";
import type { Handler } from "../service.ts";
import { within } from "../within.ts";

/** Consoles give the feature up for good after one answer that took a second. */
const LIMIT = 800;

/** is_complete_request: whether Enter should run the code or open another line. */
export const isCompleteRequest: Handler = async (request, service) => {
  const code = requiredText(request.content, "code");
  const asked = service.cells().then((cells) => cells.isComplete(code));
  const answer = await within<Completeness>(LIMIT, asked, { status: "unknown" });
  return { content: { ...answer } };
};
