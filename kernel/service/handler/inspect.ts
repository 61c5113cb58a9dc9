import type { MimeBundle } from "../../cell/port.ts";
import { requiredText } from "../fields.ts";
import { toUnits } from "../positions.ts";
import type { Handler } from "../service.ts";
import { within } from "../within.ts";

/** For the first one, which may have to wait for the compiler on a slow machine; later ones take some ms. */
const LIMIT = 10_000;

/** inspect_request: what the name at the cursor is. */
export const inspectRequest: Handler = async (request, service) => {
  const code = requiredText(request.content, "code");
  const offset = toUnits(code, request.content.cursor_pos);
  const detail = request.content.detail_level === 1 ? 1 : 0;
  const asked = service.cells().then((cells) => cells.inspect(code, offset, detail));
  const data = await within<MimeBundle | undefined>(LIMIT, asked, undefined);
  return { content: { status: "ok", found: data !== undefined, data: data ?? {}, metadata: {} } };
};
