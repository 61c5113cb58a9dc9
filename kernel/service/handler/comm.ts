import { optionalText } from "../fields.ts";
import type { Handler } from "../service.ts";

/** comm_info_request: no target is registered in this kernel, so no comm is ever open. */
export const commInfoRequest: Handler = () => ({ content: { status: "ok", comms: {} } });

/** comm_open for a target that is not known is closed at once, as the protocol wants. */
export const commOpen: Handler = (request, service) => {
  const id = optionalText(request.content, "comm_id");
  if (id !== undefined) service.output.publish("comm_close", { comm_id: id, data: {} }, request);
  return undefined;
};

/** comm_msg and comm_close for a comm that is not open: nothing to do. */
export const commIgnored: Handler = () => undefined;
