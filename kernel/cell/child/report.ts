// Reports to the kernel: whole lines on descriptor 4, written so that no interrupt tears one.
import { writeSync } from "node:fs";
import { encodeLine } from "../lines.ts";
import type { ChildReport } from "../messages.ts";
import { FIRING, PHASE, SYNC, WRITING } from "./shared.ts";

const DESCRIPTOR = 4;
const LONGEST_TEXT = 1 << 18;

/** Writes reports; a blocking write holds a printing cell back when the kernel is slow. */
export class Reporter {
  /** True while a line is being written: the stop protocol waits. */
  critical = false;
  readonly #shared: Int32Array;

  constructor(shared: Int32Array) {
    this.#shared = shared;
  }

  send(report: ChildReport): void {
    const line = Buffer.from(encodeLine(report));
    const masked = Atomics.compareExchange(this.#shared, PHASE, SYNC, WRITING);
    // The signal is on its way and must land before the line begins.
    if (masked === FIRING) Atomics.wait(this.#shared, PHASE, FIRING, 1000);
    this.critical = true;
    try {
      writeWhole(line);
    } finally {
      this.critical = false;
      if (masked === SYNC) Atomics.store(this.#shared, PHASE, SYNC);
    }
  }

  /** A text of any length, in pieces that do not split a character. */
  stream(cell: number, name: "stdout" | "stderr", text: string): void {
    for (let from = 0; from < text.length; ) {
      let to = Math.min(text.length, from + LONGEST_TEXT);
      if (to < text.length && isHighSurrogate(text.charCodeAt(to - 1))) to--;
      this.send({ kind: "stream", cell, name, text: text.slice(from, to) });
      from = to;
    }
  }
}

function isHighSurrogate(unit: number): boolean {
  return unit >= 0xd800 && unit < 0xdc00;
}

function writeWhole(line: Buffer): void {
  for (let from = 0; from < line.length; ) {
    try {
      from += writeSync(DESCRIPTOR, line, from);
    } catch (error) {
      const code = (error as NodeJS.ErrnoException).code;
      if (code !== "EAGAIN" && code !== "EINTR") throw error;
    }
  }
}
