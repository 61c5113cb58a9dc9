import type { CompletionList } from "../../cell/port.ts";
import { requiredText } from "../fields.ts";
import { toCodePoints, toUnits } from "../positions.ts";
import type { Handler } from "../service.ts";
import { within } from "../within.ts";

/** For the first one, which may have to wait for the compiler on a slow machine; later ones take some ms. */
const LIMIT = 10_000;
/** Longer lists help nobody and slow every front end. */
const MOST = 500;

/** complete_request: names that fit at the cursor, also with their kinds and signatures for hosts that show them. */
export const completeRequest: Handler = async (request, service) => {
  const code = requiredText(request.content, "code");
  const offset = toUnits(code, request.content.cursor_pos);
  const asked = service.cells().then((cells) => cells.complete(code, offset));
  const list = await within<CompletionList>(LIMIT, asked, { start: offset, end: offset, matches: [] });
  const matches = list.matches.slice(0, MOST);
  const start = toCodePoints(code, list.start);
  const end = toCodePoints(code, list.end);
  return {
    content: {
      status: "ok",
      matches: matches.map(({ text }) => text),
      cursor_start: start,
      cursor_end: end,
      metadata: { _jupyter_types_experimental: matches.map((match) => ({ ...match, start, end })) },
    },
  };
};
