import { answerHistory } from "../history.ts";
import type { Handler } from "../service.ts";

/** history_request: stored cells by tail, range or search. */
export const historyRequest: Handler = (request, service) => ({
  content: { status: "ok", history: answerHistory(request.content, service.history) },
});
