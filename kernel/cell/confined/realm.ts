// The cells inside the realm: the library, the notebook's variables, and what a cell may call. There is no file, no
// process, no network and no module loader in this world; texts go out by `say`, and commands come in.
import * as library from "../../../lib/index.ts";
import { fixDigits } from "../../../lib/number/context.ts";
import { bundle } from "../../../lib/page/bundle.ts";
import { type CellRun, setPageHost } from "../../../lib/page/host.ts";
import { Boxes } from "../child/box.ts";
import { Execution } from "../child/execution.ts";
import type { ChildReport } from "../messages.ts";
import type { ErrorReport, MimeBundle } from "../port.ts";
import { failureIn, type PlacedScript } from "./failure.ts";
import { addTimers, consoleFor, keepLanguageOnly } from "./globals.ts";
import type { RealmCommand, RunCommand } from "./reports.ts";

const MODULES = {
  meta: Object.freeze({ url: "", dirname: "", filename: "" }),
  import: async (name: unknown): Promise<unknown> => {
    if (name === "halfperiod") return library;
    throw new TypeError(`a confined cell can import the library alone, not "${String(name)}"`);
  },
  require: undefined as unknown as NodeJS.Require,
};

/** Evaluates without sight of this file's names. */
// biome-ignore lint/security/noGlobalEval: running a text is what this realm is for, and its only way
const evaluate: (text: string) => unknown = globalThis.eval;
const compile = (text: string, cell: number) =>
  evaluate(`${text}\n//# sourceURL=cell:${cell}`) as (...boxes: unknown[]) => unknown;

/** Starts the world; the result takes commands, one JSON text each. */
export function start(
  say: (text: string) => void,
  later: (id: number, delay: number) => void,
): (command: string) => void {
  const { parse, stringify } = JSON;
  const send = (report: ChildReport) => say(stringify(report));
  const cells = new Cells(send);
  keepLanguageOnly();
  const timers = addTimers(later);
  Object.defineProperty(globalThis, "console", {
    value: consoleFor((name, text) => send({ kind: "stream", cell: cells.current, name, text })),
    writable: true,
    configurable: true,
  });
  setPageHost({
    display(data, { displayId, update }) {
      const options = { ...(displayId !== undefined && { displayId }), ...(update !== undefined && { update }) };
      send({ kind: "display", cell: cells.current, data, metadata: {}, ...options });
    },
    runs: () => cells.runs,
  });
  return (text) => {
    const command = parse(text) as RealmCommand;
    if (command.kind === "timer") timers(command.id);
    else if (command.kind === "run") cells.run(command);
    else fixDigits(command.count);
  };
}

class Cells {
  current = 0;
  readonly runs: CellRun[] = [];
  readonly #send: (report: ChildReport) => void;
  readonly #boxes = new Boxes(library);
  readonly #scripts = new Map<number, PlacedScript>();
  readonly #counts = new Map<number, number>();

  constructor(send: (report: ChildReport) => void) {
    this.#send = send;
  }

  run(command: RunCommand): void {
    const { cell, emitted, executionCount, code } = command;
    this.current = cell;
    this.#scripts.set(cell, { count: executionCount, code, map: emitted.map, prefix: emitted.prefix });
    const execution = new Execution(MODULES);
    const fail = (thrown: unknown) => this.#finish(command, execution, failureIn(thrown, this.#scripts));
    const settle = () => {
      try {
        this.#finish(command, execution, undefined, bundle(execution.value));
      } catch (thrown) {
        fail(thrown);
      }
    };
    try {
      const args = emitted.boxes.map((box) => this.#boxes.get(box.name, box.origin));
      const value = compile(emitted.script, cell)(execution, ...args);
      if (value instanceof Promise) value.then(settle, fail);
      else settle();
    } catch (thrown) {
      fail(thrown);
    }
  }

  #finish(command: RunCommand, execution: Execution, error?: ErrorReport, data?: MimeBundle): void {
    if (execution.closed) return;
    execution.closed = true;
    const { cell, executionCount, emitted } = command;
    const defined = [...execution.defined];
    this.#counts.set(cell, executionCount);
    const uses = emitted.uses.map((use) => ({ name: use.name, cell: this.#counts.get(use.cell) ?? 0 }));
    this.runs.push({ cell: executionCount, defines: defined, uses, failed: error !== undefined });
    const result = data && { data, metadata: {} };
    this.#send({ kind: "done", cell, defined, ...(error && { error }), ...(result && { result }) });
  }
}
