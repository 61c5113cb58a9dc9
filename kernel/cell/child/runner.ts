// Runs cells one after another: the part before the first await inside the boundary that a signal breaks, the rest
// as promises. Reports one outcome a cell, whatever becomes of it.
import { join } from "node:path";
import { setImmediate } from "node:timers";
import { constants, Script } from "node:vm";
import type { CellRun } from "../../../lib/page/host.ts";
import type { ChildCommand } from "../messages.ts";
import type { ErrorReport } from "../port.ts";
import type { Boxes } from "./box.ts";
import { Execution, Interrupted } from "./execution.ts";
import { failure, frameLines } from "./failure.ts";
import type { Frame, Frames } from "./frames.ts";
import type { Modules } from "./modules.ts";
import { type Owner, own } from "./ownership.ts";
import type { Reporter } from "./report.ts";
import { CELL, FIRING, IDLE, LEFT, PHASE, SYNC } from "./shared.ts";
import { staleLines, staleNote, type TracedRun } from "./staleness.ts";
import type { Shown } from "./value.ts";

type RunCommand = Extract<ChildCommand, { kind: "run" }>;

/** How long an interrupted cell may take for its `finally` parts. */
const GRACE = 300;
const SIGNAL_TIME = 1000;
const INTERRUPTED = "Interrupted";
const LONGEST_PEEK = 2000;

/** What the stop protocol has done last. */
export interface Stops {
  readonly stopped: number;
  readonly noted: number;
  readonly place: readonly Frame[];
}

export interface RunnerParts {
  readonly cwd: string;
  readonly boxes: Boxes;
  readonly modules: Modules;
  readonly frames: Frames;
  readonly reporter: Reporter;
  readonly shared: Int32Array;
  /** Turns the value of a cell into a bundle. */
  readonly bundle: (value: unknown) => Shown;
  readonly stops: Stops;
}

interface Running {
  readonly command: RunCommand;
  readonly execution: Execution;
  readonly owner: Owner;
  interruptedAt: number;
  /** Reports how it ended; there as soon as that is known. */
  report?: () => void;
  reported: boolean;
}

/** The part of a cell before its first await: it threw, it is all, or a promise of the rest. */
type Attempt =
  | { readonly thrown: unknown }
  | { readonly shown: Shown | undefined }
  | { readonly rest: Promise<unknown> };

/** The cells of one session. */
export class Runner {
  readonly #parts: RunnerParts;
  #running: Running | undefined;
  #interruptEarly = 0;
  readonly #runs: TracedRun[] = [];
  /** Execution counts by the number of the file. */
  readonly #counts = new Map<number, number>();
  #next: (() => Attempt) | undefined;
  readonly #enter = new Script("__cells.enter()", { filename: "node:halfperiod" });

  constructor(parts: RunnerParts) {
    this.#parts = parts;
  }

  get cell(): number {
    return this.#running?.command.cell ?? 0;
  }

  /** The cells that have run, user expressions left out. */
  get runs(): readonly CellRun[] {
    return this.#runs;
  }

  /** A promise that the interrupt of the running cell rejects. */
  interruptible<T>(promise: Promise<T>): Promise<T> {
    return this.#running ? this.#running.execution.aw(promise) : promise;
  }

  run(command: RunCommand): void {
    const { cell, emitted } = command;
    const { modules, boxes, shared } = this.#parts;
    const execution = new Execution(modules);
    const owner = { cell, allowStdin: command.allowStdin, stopped: false };
    const running: Running = { command, execution, owner, interruptedAt: 0, reported: false };
    this.#running = running;
    Atomics.store(shared, CELL, cell);
    if (this.#interruptEarly === cell || this.#parts.stops.stopped === cell) {
      this.#finish(running, interruptReport([]));
      return;
    }
    try {
      const body = this.#compile(command);
      const args = emitted.boxes.map((box) => boxes.get(box.name, box.origin));
      own(owner, () => {
        const attempt = this.#guarded(() => body.call(undefined, execution, ...args), running);
        if (attempt) this.#follow(running, attempt);
      });
    } catch (thrown) {
      // A fault of the machinery is an outcome too: a cell without one would hang the notebook.
      this.#finish(running, this.#failure(thrown, running));
    }
  }

  #compile({ cell, executionCount, code, emitted }: RunCommand): (...boxes: unknown[]) => unknown {
    const file = join(this.#parts.cwd, `cell:${cell}`);
    this.#parts.frames.register(file, executionCount, code, emitted.map, emitted.prefix);
    const script = new Script(emitted.script, {
      filename: file,
      importModuleDynamically: constants.USE_MAIN_CONTEXT_DEFAULT_LOADER,
    });
    return script.runInThisContext() as (...boxes: unknown[]) => unknown;
  }

  /** Runs `body` so that a signal can break it; undefined: it was broken, and the outcome is reported. */
  #guarded(body: () => unknown, running: Running): Attempt | undefined {
    const { shared } = this.#parts;
    this.#next = () => this.#enterBody(body, running);
    try {
      return this.#enter.runInThisContext({ breakOnSigint: true }) as Attempt;
    } catch (error) {
      Atomics.store(shared, PHASE, LEFT);
      if ((error as NodeJS.ErrnoException)?.code !== "ERR_SCRIPT_EXECUTION_INTERRUPTED") throw error;
      this.#finish(running, this.#interrupted(running));
      return undefined;
    }
  }

  /** Called by the script inside the boundary. */
  enter(): Attempt {
    return (this.#next as () => Attempt)();
  }

  #enterBody(body: () => unknown, running: Running): Attempt {
    const { shared } = this.#parts;
    Atomics.store(shared, PHASE, SYNC);
    let attempt: Attempt;
    try {
      const value = body();
      // A value is formatted here, where a signal still reaches a formatter of the user's.
      attempt = value instanceof Promise ? { rest: value } : { shown: this.#result(running) };
    } catch (thrown) {
      attempt = { thrown };
    }
    if (Atomics.compareExchange(shared, PHASE, SYNC, LEFT) === FIRING) this.#awaitSignal();
    return attempt;
  }

  /** The signal has been sent and must land inside the boundary. */
  #awaitSignal(): void {
    const until = Date.now() + SIGNAL_TIME;
    while (Date.now() < until) Atomics.wait(this.#parts.shared, PHASE, FIRING, 1);
  }

  #result(running: Running): Shown | undefined {
    const { value } = running.execution;
    return value === undefined ? undefined : this.#parts.bundle(value);
  }

  #follow(running: Running, attempt: Attempt): void {
    if ("thrown" in attempt) this.#finish(running, this.#failure(attempt.thrown, running));
    else if (!("rest" in attempt)) this.#finish(running, undefined, attempt.shown);
    else {
      attempt.rest.then(
        () => this.#settle(running),
        (thrown) => this.#finish(running, this.#failure(thrown, running)),
      );
    }
  }

  #settle(running: Running): void {
    try {
      this.#finish(running, undefined, this.#result(running));
    } catch (thrown) {
      this.#finish(running, this.#failure(thrown, running));
    }
  }

  #failure(thrown: unknown, running: Running): ErrorReport {
    if (!Interrupted.is(thrown)) return failure(thrown, this.#parts.frames);
    return this.#interrupted(running);
  }

  #interrupted(running: Running): ErrorReport {
    const { noted, place } = this.#parts.stops;
    return interruptReport(noted === running.command.cell ? place : []);
  }

  /** Ends a cell, once. */
  #finish(running: Running, error?: ErrorReport, result?: Shown): void {
    if (running.execution.closed) return;
    running.execution.closed = true;
    running.owner.stopped = error?.ename === INTERRUPTED;
    running.report = () => this.#report(running, error, result);
    // What an interrupted cell left in the queue of ticks would keep the next one from beginning. So it counts as ended when
    // the event loop has gone round; until then the watchdog goes on.
    if (running.owner.stopped) setImmediate(running.report);
    else running.report();
  }

  /** Reports the outcome of a cell, once. */
  #report(running: Running, error?: ErrorReport, result?: Shown): void {
    if (running.reported) return;
    running.reported = true;
    const { shared, reporter } = this.#parts;
    // A stop that unwound the boundary has left Node without its handler: the next signal would end the process.
    if (process.listenerCount("SIGINT") === 0) process.on("SIGINT", () => {});
    if (this.#running === running) {
      this.#running = undefined;
      Atomics.store(shared, PHASE, IDLE);
      Atomics.store(shared, CELL, 0);
    }
    const { cell } = running.command;
    const defined = [...running.execution.defined];
    this.#remember(running.command, defined, error !== undefined);
    reporter.send({ kind: "done", cell, defined, ...(error && { error }), ...(result && { result }) });
  }

  #remember(command: RunCommand, defines: readonly string[], failed: boolean): void {
    const { cell, executionCount, emitted, code, cellId, allowStdin } = command;
    if (command.quiet) return;
    this.#counts.set(cell, executionCount);
    const uses = emitted.uses.map((use) => ({ name: use.name, cell: this.#counts.get(use.cell) ?? 0 }));
    const id = cellId === undefined ? {} : { id: cellId };
    this.#runs.push({ cell: executionCount, defines, uses, failed, code, ...id, watched: allowStdin });
    const lines = staleLines(this.#runs);
    if (lines.length > 0) this.#parts.reporter.send({ kind: "display", cell, data: staleNote(lines), metadata: {} });
  }

  /** Reports the text of a variable; formatting runs no code of the user. */
  peek(id: number, name: string): void {
    const { boxes, bundle, reporter } = this.#parts;
    const { v } = boxes.get(name, "notebook");
    const data = v === undefined ? { "text/plain": "undefined" } : bundle(v).data;
    const text = String(data["text/plain"]);
    reporter.send({ kind: "peeked", id, text: `${text.slice(0, LONGEST_PEEK)}${standingOf(data)}` });
  }

  /** First step of an interrupt, from the watchdog: rejects what the cell awaits. */
  interrupt(cell: number): void {
    const running = this.#running;
    if (!running || running.command.cell !== cell) {
      if (!running && cell > this.#interruptEarly) this.#interruptEarly = cell;
      return;
    }
    running.interruptedAt ||= Date.now();
    running.execution.interrupt();
  }

  /** The event loop is alive: ends an interrupted cell whose code was stopped, or that takes too long to end itself. */
  afterStop(cell: number): void {
    const running = this.#running;
    const { stopped } = this.#parts.stops;
    if (!running || running.command.cell !== cell) return;
    // A stop may have torn the turn of the event loop that was to report.
    if (running.report) setImmediate(running.report);
    else if (stopped === cell) this.#finish(running, this.#interrupted(running));
    else if (running.interruptedAt && Date.now() - running.interruptedAt > GRACE) {
      this.#finish(running, this.#interrupted(running));
    }
  }
}

/** The outcome of an interrupted cell, with the place where it hung if that is known. */
export function interruptReport(place: readonly Frame[]): ErrorReport {
  const evalue = "the cell was stopped; variables keep the values that they had at that moment";
  return {
    ename: INTERRUPTED,
    evalue,
    traceback: [`\u001b[31mInterrupted\u001b[0m: ${evalue}`, ...frameLines(place)],
  };
}

/** How a number is known, in words behind it. */
const STANDINGS: Readonly<Record<string, string>> = {
  exact: "exact",
  defined: "defined by exact input: more digits can be asked for",
  measured: "measured: no more digits than these",
  double: "from a double",
};

function standingOf(data: Readonly<Record<string, unknown>>): string {
  const value = data["application/vnd.halfperiod.value+json"] as { kind?: unknown; standing?: unknown } | undefined;
  const exact = value?.kind === "rational" || value?.kind === "quadratic";
  const words = exact ? STANDINGS.exact : STANDINGS[String(value?.standing)];
  return words === undefined ? "" : `\n  ${words}`;
}
