import { answerHistory } from "../history/query.ts";
import type { Handler } from "../service.ts";

/** history_request: stored cells by tail, range or search. */
export const historyRequest: Handler = async (request, service) => ({
  content: { status: "ok", history: answerHistory(request.content, await service.history()) },
});
