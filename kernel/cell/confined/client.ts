// Confined cells as the session uses them: one life of their process behind its guard.
import { type ChildProcess, spawn } from "node:child_process";
import { join } from "node:path";
import type { Readable, Writable } from "node:stream";
import type { Death, Done, LiveCells } from "../cells-client.ts";
import { encodeLine } from "../lines.ts";
import type { ChildCommand } from "../messages.ts";
import type { CellEvent, CellSessionOptions } from "../port.ts";
import { BUILT } from "../snapshot/file.ts";
import { confinedBundle } from "./bundle.ts";
import type { GuardCommand } from "./guard.ts";
import { CONFINED_LIMITS, type ConfinedLimits } from "./limits.ts";
import { BoundedLines, type ConfinedReport, readReport } from "./reports.ts";

export interface ConfinedOptions {
  readonly onEvent: CellSessionOptions["onEvent"];
  readonly limits?: Partial<ConfinedLimits>;
}

/** One process of confined cells, with its guard. */
export class ConfinedCells implements LiveCells {
  readonly #limits: ConfinedLimits;
  readonly #guard: ChildProcess;
  readonly #onEvent: CellSessionOptions["onEvent"];
  readonly #reports: BoundedLines;
  readonly #died: Promise<Death>;
  #done: ((done: Done | Death) => void) | undefined;
  #cell = 0;
  /** Why it ended, in words for the user; the first reason counts. */
  #words = "";
  #outOfMemory = false;
  #busy: Promise<unknown> = Promise.resolve();

  constructor({ onEvent, limits = {} }: ConfinedOptions) {
    this.#limits = { ...CONFINED_LIMITS, ...limits };
    this.#onEvent = onEvent;
    this.#reports = new BoundedLines(this.#limits.message, this.#limits.output);
    const { time, memory } = this.#limits;
    const guard = join(BUILT, "kernel", "cell", "confined", "guard.js");
    this.#guard = spawn(process.execPath, [guard, confinedBundle(), String(time), String(memory)], {
      detached: process.platform !== "win32",
      stdio: ["pipe", "pipe", "inherit", "pipe", "pipe"],
    });
    for (const pipe of [this.#guard.stdin, this.#commands]) pipe?.on("error", () => {});
    this.#hearGuard();
    this.#hearCells();
    this.#died = new Promise((resolve) => {
      const died = () => {
        this.kill();
        const death = { code: 1, signal: null, outOfMemory: this.#outOfMemory, words: this.#words };
        void this.#busy.then(() => {
          resolve(death);
          this.#done?.(death);
        });
      };
      this.#guard.on("close", died);
      this.#guard.on("error", died);
    });
    const digits = process.env.HALFPERIOD_DIGITS ?? "";
    if (/^[1-9]\d{0,5}$/.test(digits)) this.#send({ kind: "digits", count: Number(digits) });
  }

  get died(): Promise<Death> {
    return this.#died;
  }

  get alive(): boolean {
    return this.#guard.exitCode === null && this.#guard.signalCode === null;
  }

  run(command: Extract<ChildCommand, { kind: "run" }>): Promise<Done | Death> {
    this.#cell = command.cell;
    this.#reports.restart();
    this.#tell("cell");
    return new Promise((resolve) => {
      this.#done = resolve;
      void this.#died.then(resolve);
      this.#send(command);
    });
  }

  /** Confined cells ask nobody. */
  answer(): void {}

  async peek(): Promise<undefined> {}

  /** There is no gentler way: whatever could stop a confined cell from inside, it could defeat. */
  interrupt(): void {
    this.#because("the cell was stopped; a confined cell is stopped by ending its process");
    this.#tell("kill");
  }

  kill(): void {
    const { pid } = this.#guard;
    if (pid === undefined) return;
    try {
      process.kill(process.platform === "win32" ? pid : -pid, "SIGKILL");
    } catch {
      // Gone already.
    }
  }

  get #commands(): Writable | undefined {
    return (this.#guard.stdio[3] ?? undefined) as Writable | undefined;
  }

  #send(command: object): void {
    this.#commands?.write(encodeLine(command));
  }

  #tell(kind: GuardCommand["kind"]): void {
    this.#guard.stdin?.write(encodeLine({ kind }));
  }

  #because(words: string): void {
    this.#words ||= words;
  }

  #hearGuard(): void {
    this.#guard.stdout?.setEncoding("utf8").on("data", (text: string) => {
      if (/^memory$/m.test(text)) {
        this.#outOfMemory = true;
        this.#because(`the cell used more memory than the ${this.#limits.memory} MB that a confined cell may`);
      }
      if (/^time$/m.test(text)) this.#because(`the cell took longer than ${this.#limits.time / 1000} s`);
      const ended = /^(?:signal|status) .*$/m.exec(text);
      if (ended) this.#because(`the process of the confined cells ended (${ended[0]})`);
    });
  }

  #hearCells(): void {
    const pipe = this.#guard.stdio[4] as Readable;
    pipe.on("error", () => {});
    pipe.on("data", (chunk: Buffer) => {
      const lines = this.#reports.push(chunk);
      if (!lines) {
        this.#because("the cell gave more output than a confined cell may");
        this.kill();
        return;
      }
      for (const line of lines) this.#receive(readReport(line), pipe);
    });
  }

  #receive(report: ConfinedReport | undefined, pipe: Readable): void {
    if (!report || report.kind === "fault") {
      this.#because("the cell sent what no cell sends");
      this.kill();
    } else if (report.kind === "refused") this.#because(`cells cannot be confined here: ${report.words}`);
    else if (report.kind === "leaving") this.#because(report.words);
    else if (report.kind === "done") this.#settle(report);
    else if (report.kind !== "ready") {
      const { kind, ...rest } = report;
      this.#emit({ type: kind, ...rest, cell: this.#cell } as CellEvent, pipe);
    }
  }

  /** A second outcome, or one of another cell, is none. */
  #settle(done: Done): void {
    if (done.cell !== this.#cell) return;
    const settle = this.#done;
    this.#done = undefined;
    this.#tell("idle");
    void this.#busy.then(() => settle?.(done));
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
