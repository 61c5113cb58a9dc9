// console prints objects the way results are shown: P as (0, 0), not as the fields of its class.
import { inspect } from "node:util";
import { show } from "../../../lib/page/show.ts";

const METHODS = ["log", "info", "debug", "warn", "error"] as const;

/** Replaces the printing methods of the console. */
export function formatConsole(): void {
  for (const method of METHODS) {
    const print = console[method].bind(console);
    console[method] = (...args: unknown[]) => print(...args.map(asResult));
  }
}

/** Text, numbers and errors as they are; an object with its text in a wrapper that Node's formatter asks. */
function asResult(value: unknown): unknown {
  if ((typeof value !== "object" && typeof value !== "function") || value === null || value instanceof Error)
    return value;
  return { [inspect.custom]: () => show.text(value), toString: () => show.text(value) };
}
