// The session of one notebook: check, run, remember, and go on after every fault.
import { balance } from "./balance.ts";
import { CellsClient, type Death, type Done, type LiveCells } from "./cells-client.ts";
import { ConfinedCells } from "./confined/client.ts";
import type { CheckResult, EmittedCell } from "./messages.ts";
import { deathReport, failedCheck, interruptedBeforeRun } from "./outcomes.ts";
import type {
  CellEvent,
  CellSession,
  CellSessionOptions,
  Completeness,
  CompletionList,
  ExecuteOutcome,
  ExecuteRequest,
  MimeBundle,
  UserExpression,
} from "./port.ts";
import { codeBlock } from "./types/documentation.ts";
import { TypesClient } from "./types-client.ts";

/** After this time brackets alone decide whether a cell is complete. */
const PARSE_TIME = 400;
/** How long an interrupted check may go on before its process is replaced. */
const CHECK_TIME = 5000;
/** The watchdog ends the cells itself after 5 s; this is for the case that it is gone. */
const INTERRUPT_TIME = 8000;

export function createCellSession(options: CellSessionOptions): CellSession {
  return new NotebookSession(options);
}

/** The current value behind what the types say. */
function withValue(data: MimeBundle, value: string): MimeBundle {
  const plain = `${data["text/plain"]}\n\n= ${value}`;
  const markdown = `${data["text/markdown"]}\n\n\`\`\`text\n= ${value}\n\`\`\``;
  const html = `${data["text/html"]}\n${codeBlock(`= ${value}`)}`;
  return { ...data, "text/plain": plain, "text/html": html, "text/markdown": markdown };
}

/** One cell on its way. */
interface Current {
  readonly cell: number;
  interrupted: boolean;
  running: boolean;
  /** Ends the wait for the checker. */
  giveUp: (() => void) | undefined;
}

class NotebookSession implements CellSession {
  readonly #options: CellSessionOptions;
  readonly #types: TypesClient;
  #cells: LiveCells | undefined;
  #current: Current | undefined;
  /** Rising numbers of the files and scripts; a user expression takes one too. */
  #files = 0;
  #closed = false;
  /** Events of a user expression are dropped. */
  #quiet = false;
  #owners = new Map<number, number>();

  constructor(options: CellSessionOptions) {
    this.#options = options;
    this.#types = new TypesClient(options.cwd, options.confined !== undefined);
  }

  start(): void {
    this.#types.start();
    this.#liveCells();
  }

  async execute(request: ExecuteRequest): Promise<ExecuteOutcome> {
    const current: Current = { cell: request.cell, interrupted: false, running: false, giveUp: undefined };
    this.#current = current;
    try {
      const outcome = await this.#step(request, request.code, current);
      if (outcome.status === "error") return outcome;
      const userExpressions = await this.#userExpressions(request, current);
      return { ...outcome, userExpressions };
    } finally {
      if (this.#current === current) this.#current = undefined;
    }
  }

  answerInput(value: string | null): void {
    this.#cells?.answer(value);
  }

  interrupt(): void {
    const current = this.#current;
    if (!current) return;
    current.interrupted = true;
    current.giveUp?.();
    const cells = this.#cells;
    if (!current.running || !cells) return;
    const file = this.#files;
    cells.interrupt(file);
    const late = setTimeout(() => {
      if (this.#current === current && current.running && this.#files === file) cells.kill();
    }, INTERRUPT_TIME);
    late.unref();
  }

  async complete(code: string, offset: number): Promise<CompletionList> {
    const empty = { start: offset, end: offset, matches: [] };
    return this.#types.ask({ kind: "complete", code, offset }).catch(() => empty);
  }

  async inspect(code: string, offset: number, detail: 0 | 1): Promise<MimeBundle | undefined> {
    const found = await this.#types.ask({ kind: "inspect", code, offset, detail }).catch(() => null);
    if (!found) return undefined;
    const value = found.name === undefined ? undefined : await this.#cells?.peek(found.name);
    return value === undefined ? found.data : withValue(found.data, value);
  }

  isComplete(code: string): Promise<Completeness> {
    return new Promise((resolve) => {
      const late = setTimeout(() => resolve(balance(code)), PARSE_TIME);
      const answered = (answer: Completeness) => {
        clearTimeout(late);
        resolve(answer);
      };
      this.#types.ask({ kind: "isComplete", code }).then(answered, () => answered(balance(code)));
    });
  }

  async shutdown(): Promise<void> {
    this.#closed = true;
    this.#types.close();
    const cells = this.#cells;
    if (!cells) return;
    cells.kill();
    await cells.died;
  }

  #liveCells(): LiveCells {
    if (this.#cells?.alive) return this.#cells;
    const onEvent = (event: CellEvent) => this.#relay(event);
    const { confined } = this.#options;
    const cells = confined
      ? new ConfinedCells({ onEvent, limits: confined })
      : new CellsClient({ ...this.#options, onEvent });
    this.#cells = cells;
    return cells;
  }

  /** Events carry the number of the file; the reader knows the number of the request. */
  #relay(event: CellEvent): void | Promise<void> {
    if (this.#quiet) return;
    const cell = this.#owners.get(event.cell) ?? event.cell;
    return this.#options.onEvent({ ...event, cell });
  }

  /** Checks and runs one text. */
  async #step(request: ExecuteRequest, code: string, current: Current): Promise<ExecuteOutcome> {
    const file = ++this.#files;
    this.#owners.set(file, request.cell);
    const checked = await this.#check(file, request.executionCount, code, current);
    if (checked.status === "error") return checked;
    if (current.interrupted) return { status: "error", ...interruptedBeforeRun() };
    for (const notice of checked.emitted.notices) {
      await this.#relay({ type: "stream", cell: file, name: "stderr", text: `${notice}\n` });
    }
    const ended = await this.#run(file, request, code, checked.emitted, current);
    if ("kind" in ended) return this.#settle(file, ended);
    return this.#bury(ended, current);
  }

  async #check(file: number, executionCount: number, code: string, current: Current): Promise<CheckResult> {
    const gaveUp = new Promise<undefined>((resolve) => {
      current.giveUp = () => resolve(undefined);
    });
    try {
      const asked = this.#types.ask({ kind: "check", cell: file, executionCount, code });
      const checked = await Promise.race([asked, gaveUp]);
      if (checked) return checked;
      this.#replaceIfEndless(asked);
      return { status: "error", ...interruptedBeforeRun() };
    } catch (error) {
      return { status: "error", ...failedCheck(error) };
    } finally {
      current.giveUp = undefined;
    }
  }

  /** A check that nobody waits for may still be going on: not for ever. */
  #replaceIfEndless(asked: Promise<unknown>): void {
    const late = setTimeout(() => this.#types.restart(), CHECK_TIME);
    late.unref();
    const settled = () => clearTimeout(late);
    asked.then(settled, settled);
  }

  async #run(
    file: number,
    request: ExecuteRequest,
    code: string,
    emitted: EmittedCell,
    current: Current,
  ): Promise<Done | Death> {
    current.running = true;
    try {
      const { executionCount, allowStdin, cellId } = request;
      const cells = this.#liveCells();
      return await cells.run({
        kind: "run",
        cell: file,
        executionCount,
        code,
        emitted,
        ...(cellId !== undefined && { cellId }),
        allowStdin,
        quiet: this.#quiet,
      });
    } finally {
      current.running = false;
    }
  }

  async #settle(file: number, done: Done): Promise<ExecuteOutcome> {
    await this.#types.commit(file, done.defined, done.error === undefined).catch(() => {});
    if (done.error) return { status: "error", ...done.error };
    return { status: "ok", userExpressions: {}, ...(done.result && { result: done.result }) };
  }

  /** The process is gone with all variables: a fresh one takes its place. */
  async #bury(death: Death, current: Current): Promise<ExecuteOutcome> {
    const { names } = this.#types;
    const { interrupted } = current;
    const { memoryLimit } = this.#options;
    if (!this.#closed) {
      await this.#types.reset().catch(() => {});
      this.#liveCells();
    }
    return { status: "error", ...deathReport({ death, interrupted, names, memoryLimit }) };
  }

  async #userExpressions(request: ExecuteRequest, current: Current): Promise<Record<string, UserExpression>> {
    const results: Record<string, UserExpression> = {};
    this.#quiet = true;
    try {
      for (const [key, code] of Object.entries(request.userExpressions)) {
        const outcome = await this.#step({ ...request, allowStdin: false }, code, current);
        results[key] =
          outcome.status === "error" ? outcome : { status: "ok", ...(outcome.result ?? { data: {}, metadata: {} }) };
      }
    } finally {
      this.#quiet = false;
    }
    return results;
  }
}
