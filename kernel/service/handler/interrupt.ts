import type { Handler } from "../service.ts";

/** interrupt_request, on control: stops the running cell; without one it does nothing. */
export const interruptRequest: Handler = (_request, service) => {
  service.interrupt();
  return { content: { status: "ok" } };
};
