import { flag } from "../fields.ts";
import type { Handler } from "../service.ts";

/**
 * shutdown_request, on control and, as it once was, on shell. The reply is also published, so that other clients know.
 * A restart is the same from inside: the host starts the next process.
 */
export const shutdownRequest: Handler = (request, service) => ({
  content: { status: "ok", restart: flag(request.content, "restart", false) },
  copied: true,
  afterIdle: () => service.end(),
});
