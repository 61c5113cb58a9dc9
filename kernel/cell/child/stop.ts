// The stop protocol on the main thread: ends JavaScript that neither a signal nor a rejected await reaches.
//
// The watchdog evaluates `__cells.stop(n)` through the inspector, at whatever point the main thread happens to be. In
// ONE call the place is recorded, the stack of async ids is cleared and the termination is posted: as two messages, or
// without clearing, Node aborts or hangs when it is inside timers or after awaits.
import { Session } from "node:inspector";
import { createRequire } from "node:module";
import { type Frame, type Frames, isMachinery } from "./frames.ts";
import { CELL, NOTED } from "./shared.ts";

const DEEP_STACK = 100;

/** How the stack of async ids is cleared on this Node: a binding, internals, or not at all. */
export type Rung = "binding" | "internals" | "none";

interface AsyncWrap {
  clearAsyncIdStack?: () => void;
}

function clearer(): { rung: Rung; clear: () => void } {
  const load = createRequire(import.meta.url);
  const attempts: [Rung, () => AsyncWrap][] = [
    ["binding", () => (process as unknown as { binding(name: string): AsyncWrap }).binding("async_wrap")],
    [
      "internals",
      () =>
        (load("internal/test/binding") as { internalBinding(name: string): AsyncWrap }).internalBinding("async_wrap"),
    ],
  ];
  for (const [rung, attempt] of attempts) {
    try {
      const wrap = quietly(attempt);
      const clear = wrap.clearAsyncIdStack;
      if (clear) return { rung, clear };
    } catch {
      // Not on this version: the next rung.
    }
  }
  return { rung: "none", clear: () => {} };
}

/** Without the warning that Node gives at the door of its internals. */
function quietly<T>(load: () => T): T {
  const { emitWarning } = process;
  process.emitWarning = () => {};
  try {
    return load();
  } finally {
    process.emitWarning = emitWarning;
  }
}

/** What the stop protocol needs of the running session. */
export interface Stoppable {
  readonly frames: Frames;
  readonly shared: Int32Array;
  /** True while the machinery must not be torn. */
  critical(): boolean;
}

/** Stops code on the main thread. */
export class Stopper {
  readonly rung: Rung;
  /** The cell whose code was stopped last, 0 for none. */
  stopped = 0;
  /** The cell whose place was noted last, 0 for none. */
  noted = 0;
  /** Where it hung. */
  place: readonly Frame[] = [];
  readonly #session = new Session();
  readonly #clear: () => void;
  readonly #target: Stoppable;

  constructor(target: Stoppable) {
    this.#target = target;
    const { rung, clear } = clearer();
    this.rung = rung;
    this.#clear = clear;
    this.#session.connect();
  }

  /**
   * Stops what runs now for cell `number`. Level 0 spares code whose top frame is Node's own, level 1 takes it too,
   * level 2 is unconditional. Answers whether the stop was posted.
   */
  stop(number: number, level: 0 | 1 | 2): string {
    const running = Atomics.load(this.#target.shared, CELL);
    // A cell that has not begun is kept from beginning by what an earlier one left running.
    if (running > number) return "no";
    if (level < 2 && this.#target.critical()) return "no";
    const sites = callSites();
    const real = sites.filter(isReal);
    if (level < 2 && real.length === 0) return "no";
    if (level < 1 && isNode(sites[0])) return "no";
    this.#note(number, sites);
    this.stopped = number;
    this.#clear();
    this.#session.post("Runtime.terminateExecution");
    return "yes";
  }

  /** Notes the place where cell `number` is, before a signal breaks it: the signal itself tells none. */
  where(number: number): void {
    if (Atomics.load(this.#target.shared, CELL) === number) this.#note(number, callSites());
    Atomics.add(this.#target.shared, NOTED, 1);
  }

  #note(number: number, sites: readonly NodeJS.CallSite[]): void {
    this.place = this.#target.frames.read(sites).filter((frame) => frame.count !== undefined);
    this.noted = number;
  }
}

/** The call sites below the evaluation that called `stop`. */
function callSites(): NodeJS.CallSite[] {
  const { stackTraceLimit, prepareStackTrace } = Error;
  Error.stackTraceLimit = Math.max(DEEP_STACK, stackTraceLimit);
  Error.prepareStackTrace = (_error, found) => found;
  const sites = new Error().stack as unknown as NodeJS.CallSite[];
  Error.prepareStackTrace = prepareStackTrace;
  Error.stackTraceLimit = stackTraceLimit;
  const entry = sites.findIndex(
    (site) => site.isToplevel() && site.getFileName() === null && !isMachinery(scriptOf(site)),
  );
  // callSites, stop, the function of `__cells`, the evaluated expression.
  return sites.slice(Math.max(entry + 1, 3));
}

function scriptOf(site: NodeJS.CallSite): string {
  return site.getFileName() ?? site.getScriptNameOrSourceURL() ?? "";
}

function isAsync(site: NodeJS.CallSite): boolean {
  return site.isAsync();
}

function isNode(site: NodeJS.CallSite | undefined): boolean {
  return site !== undefined && scriptOf(site).startsWith("node:");
}

/** A frame of the user's, of a package or of the library, that is really on the stack. */
function isReal(site: NodeJS.CallSite): boolean {
  const script = scriptOf(site);
  return !isAsync(site) && script !== "" && !script.startsWith("node:") && !isMachinery(script);
}
