// One handler a message type. Maps, as "constructor" and "__proto__" are legal types on the wire.
import type { Handler } from "../service.ts";
import { commIgnored, commInfoRequest, commOpen } from "./comm.ts";
import { completeRequest } from "./complete.ts";
import { executeRequest } from "./execute.ts";
import { historyRequest } from "./history.ts";
import { inspectRequest } from "./inspect.ts";
import { interruptRequest } from "./interrupt.ts";
import { isCompleteRequest } from "./is_complete.ts";
import { kernelInfoRequest } from "./kernel_info.ts";
import { shutdownRequest } from "./shutdown.ts";

/** Served at once, also while a cell runs. */
export const controlHandlers: ReadonlyMap<string, Handler> = new Map([
  ["kernel_info_request", kernelInfoRequest],
  ["interrupt_request", interruptRequest],
  ["shutdown_request", shutdownRequest],
]);

/** Served one after the other, in the order of arrival. */
export const shellHandlers: ReadonlyMap<string, Handler> = new Map([
  ...controlHandlers,
  ["execute_request", executeRequest],
  ["is_complete_request", isCompleteRequest],
  ["complete_request", completeRequest],
  ["inspect_request", inspectRequest],
  ["history_request", historyRequest],
  ["comm_info_request", commInfoRequest],
  ["comm_open", commOpen],
  ["comm_msg", commIgnored],
  ["comm_close", commIgnored],
]);
