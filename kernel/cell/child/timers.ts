// Timers of an interrupted cell do nothing more: a loop in one would hold up the cells that follow.
import { isMachinery } from "./frames.ts";
import { currentOwner, knownOwner } from "./ownership.ts";

type Callback = (...args: unknown[]) => unknown;
type Start = (callback: Callback, ...rest: unknown[]) => unknown;

/** Replaces the global timer functions by ones that ask whether the cell that called them was interrupted. */
export function guardTimers(): void {
  guard("setTimeout");
  guard("setInterval");
  guard("setImmediate");
  guardTicks();
}

/**
 * Code of an interrupted cell adds nothing more to the queue of ticks: one that adds itself again would keep every later
 * cell from beginning, wherever a stop tears it. Node's own streams go on.
 */
function guardTicks(): void {
  const { nextTick } = process;
  process.nextTick = (callback: (...args: unknown[]) => void, ...args: unknown[]) => {
    if (knownOwner()?.stopped && !calledByNode()) return;
    nextTick.call(process, callback, ...args);
  };
}

/** Whether the caller of `process.nextTick` is a function of Node's. */
function calledByNode(): boolean {
  const { stackTraceLimit, prepareStackTrace } = Error;
  Error.stackTraceLimit = 8;
  Error.prepareStackTrace = (_error, found) => found;
  const sites = new Error().stack as unknown as NodeJS.CallSite[];
  Error.prepareStackTrace = prepareStackTrace;
  Error.stackTraceLimit = stackTraceLimit;
  const files = sites.map((site) => site.getFileName() ?? site.getScriptNameOrSourceURL() ?? "");
  return files.find((file) => !isMachinery(file))?.startsWith("node:") ?? true;
}

function guard(name: "setTimeout" | "setInterval" | "setImmediate"): void {
  const start = globalThis[name] as unknown as Start;
  const guarded: Start = (callback, ...rest) => {
    if (typeof callback !== "function") return start(callback, ...rest);
    const owner = currentOwner();
    return start(
      function (this: NodeJS.Timeout, ...args: unknown[]) {
        if (!owner.stopped) return callback.apply(this, args);
        if (name === "setInterval") clearInterval(this);
        return undefined;
      },
      ...rest,
    );
  };
  // The promise form of the function hangs on it as a property.
  Object.defineProperties(guarded, Object.getOwnPropertyDescriptors(start));
  Object.defineProperty(globalThis, name, { value: guarded, writable: true, configurable: true, enumerable: true });
}
