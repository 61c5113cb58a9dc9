// The process that runs the user's code, as the session uses it: one life of it, from launch to its end.
import type { ChildProcess } from "node:child_process";
import type { Readable, Writable } from "node:stream";
import { launchCells } from "./launch.ts";
import { encodeLine, LineReader } from "./lines.ts";
import type { ChildCommand, ChildReport } from "./messages.ts";
import type { CellEvent, CellSessionOptions } from "./port.ts";

export type Done = Extract<ChildReport, { kind: "done" }>;

/** A process of cells in its life, as the session uses it. */
export interface LiveCells {
  readonly died: Promise<Death>;
  readonly alive: boolean;
  run(command: Extract<ChildCommand, { kind: "run" }>): Promise<Done | Death>;
  answer(value: string | null): void;
  peek(name: string): Promise<string | undefined>;
  interrupt(cell: number): void;
  kill(): void;
}

/** How a life ended. */
export interface Death {
  readonly code: number | null;
  readonly signal: NodeJS.Signals | null;
  /** It ran out of memory, by its own last words. */
  readonly outOfMemory: boolean;
  /** What the cells said of it, if they left on purpose. */
  readonly words: string;
}

const FATAL_HEAP = /FATAL ERROR: .*(?:heap|memory|allocation)|<--- Last few GCs --->/;

const PEEK_TIME = 150;

/** Node says this at exit because the stop protocol holds an inspector session; no debugger is there. */
const INSPECTOR_NOTE = "Waiting for the debugger to disconnect...\n";

/** One process of cells. */
export class CellsClient implements LiveCells {
  readonly #process: ChildProcess;
  readonly #onEvent: CellSessionOptions["onEvent"];
  readonly #reports = new LineReader();
  readonly #died: Promise<Death>;
  #done: ((done: Done | Death) => void) | undefined;
  #cell = 0;
  #peeks = 0;
  readonly #peeking = new Map<number, (text: string | undefined) => void>();
  #outOfMemory = false;
  #words = "";
  #busy: Promise<unknown> = Promise.resolve();

  constructor(options: CellSessionOptions) {
    this.#onEvent = options.onEvent;
    this.#process = launchCells(options.cwd, options.memoryLimit);
    for (const descriptor of [3, 5]) this.#pipe(descriptor)?.on("error", () => {});
    this.#readReports();
    this.#readNative(1, "stdout");
    this.#readNative(2, "stderr");
    this.#died = new Promise((resolve) => {
      const died = (code: number | null, signal: NodeJS.Signals | null) => {
        const death = { code, signal, outOfMemory: this.#outOfMemory, words: this.#words };
        void this.#busy.then(() => {
          resolve(death);
          this.#done?.(death);
        });
      };
      // All that the process wrote has been read when it is closed.
      this.#process.on("close", died);
      this.#process.on("error", () => died(null, null));
    });
  }

  /** Settles when the process has ended. */
  get died(): Promise<Death> {
    return this.#died;
  }

  get alive(): boolean {
    return this.#process.exitCode === null && this.#process.signalCode === null;
  }

  /** Runs a cell; the end of the process is an answer too. */
  run(command: Extract<ChildCommand, { kind: "run" }>): Promise<Done | Death> {
    this.#cell = command.cell;
    return new Promise((resolve) => {
      this.#done = resolve;
      void this.#died.then(resolve);
      this.#send(command);
    });
  }

  answer(value: string | null): void {
    this.#send({ kind: "answer", value });
  }

  /** The value of a variable as text; undefined while a cell runs, or if there is no answer in time. */
  peek(name: string): Promise<string | undefined> {
    if (this.#done || !this.alive) return Promise.resolve(undefined);
    const id = ++this.#peeks;
    return new Promise((resolve) => {
      const late = setTimeout(() => this.#peeked(id, undefined), PEEK_TIME);
      this.#peeking.set(id, (text) => {
        clearTimeout(late);
        resolve(text);
      });
      this.#send({ kind: "peek", id, name });
    });
  }

  #peeked(id: number, text: string | undefined): void {
    const waiting = this.#peeking.get(id);
    this.#peeking.delete(id);
    waiting?.(text);
  }

  /** Asks the watchdog to stop a cell. */
  interrupt(cell: number): void {
    (this.#pipe(5) as Writable | undefined)?.write(encodeLine({ kind: "interrupt", cell }));
  }

  /** Ends the process and all that it started. */
  kill(): void {
    const pid = this.#process.pid;
    if (pid === undefined) return;
    try {
      process.kill(process.platform === "win32" ? pid : -pid, "SIGKILL");
    } catch {
      // Gone already.
    }
  }

  #send(command: ChildCommand): void {
    (this.#pipe(3) as Writable | undefined)?.write(encodeLine(command));
  }

  #pipe(descriptor: number): Readable | Writable | undefined {
    return (this.#process.stdio[descriptor] ?? undefined) as Readable | Writable | undefined;
  }

  #readReports(): void {
    const pipe = this.#pipe(4) as Readable | undefined;
    pipe?.on("error", () => {});
    pipe?.on("data", (chunk: Buffer) => {
      const reports = this.#reports.push(chunk).flatMap(parseReport);
      for (const report of mergeStreams(reports)) this.#receive(report, pipe);
    });
  }

  /** Output of native code and of programs that a cell started. */
  #readNative(descriptor: number, name: "stdout" | "stderr"): void {
    const pipe = this.#pipe(descriptor) as Readable | undefined;
    pipe?.setEncoding("utf8");
    pipe?.on("error", () => {});
    pipe?.on("data", (raw: string) => {
      const text = raw.replaceAll(INSPECTOR_NOTE, "");
      if (text === "") return;
      if (name === "stderr" && FATAL_HEAP.test(text)) this.#outOfMemory = true;
      // The engine's last words are of no use to the user; the session says what happened.
      if (!this.#outOfMemory) this.#emit({ type: "stream", cell: this.#cell, name, text }, pipe);
    });
  }

  #receive(report: ChildReport, pipe: Readable): void {
    if (report.kind === "done") {
      const done = this.#done;
      this.#done = undefined;
      // Behind the output that is still on its way to the reader.
      void this.#busy.then(() => done?.(report));
    } else if (report.kind === "leaving") this.#words = report.words;
    else if (report.kind === "peeked") this.#peeked(report.id, report.text);
    else if (report.kind !== "ready") {
      const { kind, ...rest } = report;
      this.#emit({ type: kind, ...rest } as CellEvent, pipe);
    }
  }

  /** A slow reader holds the pipe back, and so the cell that prints. */
  #emit(event: CellEvent, pipe: Readable): void {
    const taken = this.#onEvent(event);
    if (!(taken instanceof Promise)) return;
    pipe.pause();
    const busy = Promise.allSettled([this.#busy, taken]);
    this.#busy = busy;
    void busy.then(() => {
      if (this.#busy === busy) pipe.resume();
    });
  }
}

/** A torn line (a process killed while it wrote) is dropped. */
function parseReport(line: string): ChildReport[] {
  try {
    return [JSON.parse(line) as ChildReport];
  } catch {
    return [];
  }
}

/** Joins neighbouring pieces of one stream. */
function mergeStreams(reports: readonly ChildReport[]): ChildReport[] {
  const merged: ChildReport[] = [];
  let texts: string[] = [];
  for (const [index, report] of reports.entries()) {
    if (report.kind === "stream") {
      texts.push(report.text);
      const next = reports[index + 1];
      if (next?.kind === "stream" && next.name === report.name && next.cell === report.cell) continue;
      merged.push({ ...report, text: texts.join("") });
      texts = [];
    } else merged.push(report);
  }
  return merged;
}
