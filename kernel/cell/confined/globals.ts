// The global names of the realm: those of the language, a console and timers; the rest of what Node puts there is taken out.
import { show } from "../../../lib/page/show.ts";

/** Names that a confined cell keeps besides the functions and objects of the language itself. */
const LANGUAGE = new Set(
  `Object Function Array Number parseFloat parseInt Infinity NaN undefined Boolean String Symbol Date Promise RegExp Error
  AggregateError EvalError RangeError ReferenceError SyntaxError TypeError URIError SuppressedError globalThis JSON Math
  Intl ArrayBuffer Uint8Array Int8Array Uint16Array Int16Array Uint32Array Int32Array Float16Array Float32Array
  Float64Array Uint8ClampedArray BigUint64Array BigInt64Array DataView Map BigInt Set WeakMap WeakSet Proxy Reflect
  WeakRef Iterator decodeURI decodeURIComponent encodeURI encodeURIComponent escape unescape isFinite isNaN
  DisposableStack AsyncDisposableStack Temporal eval`.split(/\s+/),
);

/** Takes out what is not the language: streams, compression, events, WebAssembly, shared memory, further realms. */
export function keepLanguageOnly(): void {
  for (const name of Object.getOwnPropertyNames(globalThis)) {
    if (!LANGUAGE.has(name)) Reflect.deleteProperty(globalThis, name);
  }
}

/** A console whose words become output of the cell, objects shown as results are. */
export function consoleFor(print: (name: "stdout" | "stderr", text: string) => void): object {
  const line = (values: readonly unknown[]) => `${values.map(printed).join(" ")}\n`;
  const out = (...values: unknown[]) => print("stdout", line(values));
  const err = (...values: unknown[]) => print("stderr", line(values));
  return { log: out, info: out, debug: out, warn: err, error: err };
}

function printed(value: unknown): string {
  if (typeof value === "bigint") return `${value}n`;
  if ((typeof value === "object" && value !== null && !(value instanceof Error)) || typeof value === "function")
    return show.text(value);
  return String(value);
}

type Callback = (...args: unknown[]) => void;

/** Adds timers on top of a function that calls back by number; the result is what it calls. */
export function addTimers(later: (id: number, delay: number) => void): (id: number) => void {
  const waiting = new Map<number, { readonly call: () => void; readonly every: number | undefined }>();
  let last = 0;
  const set =
    (every: boolean) =>
    (callback: Callback, delay: unknown, ...args: unknown[]) => {
      const ms = Math.max(1, Number(delay) || 0);
      last += 1;
      waiting.set(last, { call: () => callback(...args), every: every ? ms : undefined });
      later(last, ms);
      return last;
    };
  const clear = (id: number) => void waiting.delete(id);
  const names = {
    setTimeout: set(false),
    setInterval: set(true),
    clearTimeout: clear,
    clearInterval: clear,
    queueMicrotask: (callback: Callback) => void Promise.resolve().then(() => callback()),
  };
  for (const [name, value] of Object.entries(names)) {
    Object.defineProperty(globalThis, name, { value, writable: true, configurable: true });
  }
  return (id) => {
    const timer = waiting.get(id);
    if (!timer) return;
    if (timer.every === undefined) waiting.delete(id);
    else later(id, timer.every);
    timer.call();
  };
}
