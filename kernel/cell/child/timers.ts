// Timers of an interrupted cell do nothing more: a loop in one would hold up the cells that follow.
import { currentOwner } from "./ownership.ts";

type Callback = (...args: unknown[]) => unknown;
type Start = (callback: Callback, ...rest: unknown[]) => unknown;

/** Replaces the global timer functions by ones that ask whether the cell that called them was interrupted. */
export function guardTimers(): void {
  guard("setTimeout");
  guard("setInterval");
  guard("setImmediate");
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
