// A notebook for tests: cells in, outcomes and output out, on real processes.
import { mkdtempSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import type { ConfinedLimits } from "../../../kernel/cell/confined/limits.ts";
import type { CellEvent, CellSession, ExecuteOutcome, ExecuteRequest } from "../../../kernel/cell/port.ts";
import { createCellSession } from "../../../kernel/cell/session.ts";

export class TestNotebook {
  readonly events: CellEvent[] = [];
  readonly cwd: string;
  readonly session: CellSession;
  #cell = 0;
  #hear: () => void = () => {};

  /** `onText` takes the text of the streams, which is then not kept; a promise holds the cells back. */
  constructor(
    options: {
      cwd?: string;
      memoryLimit?: number;
      confined?: Partial<ConfinedLimits>;
      onText?: (text: string) => void | Promise<void>;
    } = {},
  ) {
    this.cwd = options.cwd ?? mkdtempSync(join(tmpdir(), "cells-"));
    this.session = createCellSession({
      cwd: this.cwd,
      onEvent: (event) => {
        if (event.type === "stream" && options.onText) return options.onText(event.text);
        this.events.push(event);
        this.#hear();
        return undefined;
      },
      ...(options.memoryLimit !== undefined && { memoryLimit: options.memoryLimit }),
      ...(options.confined && { confined: options.confined }),
    });
    this.session.start();
  }

  /** Waits until the last cell has reported something. */
  async begun(): Promise<void> {
    await this.until(() => this.events.some((event) => event.cell === this.#cell));
  }

  /** Resolves when something that events bring about is so. */
  async until(condition: () => boolean): Promise<void> {
    while (!condition()) {
      await new Promise<void>((resolve) => {
        this.#hear = resolve;
      });
    }
  }

  /** Number of the last cell that was run. */
  get last(): number {
    return this.#cell;
  }

  run(code: string, more: Partial<ExecuteRequest> = {}): Promise<ExecuteOutcome> {
    const cell = ++this.#cell;
    const defaults = { executionCount: cell, silent: false, allowStdin: false, userExpressions: {} };
    return this.session.execute({ ...defaults, ...more, code, cell });
  }

  /** Text of the value of a cell; "" for none. Fails with the traceback if the cell does. */
  async value(code: string): Promise<string> {
    const outcome = await this.run(code);
    if (outcome.status === "error") throw new Error(plain(outcome.traceback.join("\n")));
    return String(outcome.result?.data["text/plain"] ?? "");
  }

  /** The error of a cell, "ename: evalue". Fails if the cell does not. */
  async error(code: string): Promise<string> {
    const outcome = await this.run(code);
    if (outcome.status !== "error") throw new Error(`no error, but ${outcome.result?.data["text/plain"]}`);
    return `${outcome.ename}: ${outcome.evalue}`;
  }

  async traceback(code: string): Promise<string> {
    const outcome = await this.run(code);
    if (outcome.status !== "error") throw new Error("no error");
    return plain(outcome.traceback.join("\n"));
  }

  /** What a stream has said, of one cell or of all. */
  output(name: "stdout" | "stderr", cell?: number): string {
    return this.events
      .filter((event) => event.type === "stream" && event.name === name && (cell === undefined || event.cell === cell))
      .map((event) => (event as { text: string }).text)
      .join("");
  }
}

/** Without colours. */
export function plain(text: string): string {
  // biome-ignore lint/suspicious/noControlCharactersInRegex: the colours are control characters
  return text.replace(/\u001b\[\d+m/g, "");
}
