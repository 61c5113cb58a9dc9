// Cells that need no child process: each line of the code is a command. They stand in for the real session where a test
// is about the wire and the service.
import type {
  CellSession,
  CellSessionOptions,
  CompletionList,
  ExecuteOutcome,
  ExecuteRequest,
  MimeBundle,
} from "../../../kernel/cell/port.ts";

/**
 * print TEXT | warn TEXT | show TEXT | update ID TEXT | clear | page TEXT | propose TEXT | replace TEXT | oddly (a bundle that is no JSON) | odd (such a value) | value TEXT | fail TEXT | hang | hold (until `release`) | later TEXT (at `timers`) |
 * ask PROMPT; TEXT is read as a JSON string if it is one.
 */
export class FakeCells implements CellSession {
  readonly requests: ExecuteRequest[] = [];
  interrupts = 0;
  shutdowns = 0;
  private readonly options: CellSessionOptions;
  /** Lets the cell that holds go on. */
  release: () => void = () => {};
  private readonly late: (() => Promise<void>)[] = [];
  private stop: (() => void) | undefined;
  private answer: ((value: string | null) => void) | undefined;

  constructor(options: CellSessionOptions) {
    this.options = options;
  }

  start(): void {}

  async execute(request: ExecuteRequest): Promise<ExecuteOutcome> {
    this.requests.push(request);
    const stopped = new Promise<ExecuteOutcome>((resolve) => {
      this.stop = () => resolve({ status: "error", ename: "Interrupted", evalue: "stopped", traceback: ["stopped"] });
    });
    const outcome = await Promise.race([this.run(request), stopped]);
    this.stop = undefined;
    return outcome;
  }

  /** What cells have put off happens now. */
  async timers(): Promise<void> {
    for (const act of this.late.splice(0)) await act();
  }

  answerInput(value: string | null): void {
    this.answer?.(value);
  }

  interrupt(): void {
    this.interrupts += 1;
    this.stop?.();
  }

  async complete(code: string, offset: number): Promise<CompletionList> {
    const start = code.slice(0, offset).search(/\w*$/);
    const matches = [
      { text: "periods", type: "property", signature: "readonly [ω1, ω2]" },
      { text: "𝜏", type: "variable" },
    ];
    return { start, end: offset, matches };
  }

  async inspect(code: string, offset: number, detail: 0 | 1): Promise<MimeBundle | undefined> {
    const name = /\w+$/.exec(code.slice(0, offset))?.[0];
    return name ? { "text/plain": `${name} at ${offset}, detail ${detail}` } : undefined;
  }

  async isComplete(code: string) {
    return code.endsWith("{") ? { status: "incomplete" as const, indent: "  " } : { status: "complete" as const };
  }

  async shutdown(): Promise<void> {
    this.shutdowns += 1;
  }

  private async run(request: ExecuteRequest): Promise<ExecuteOutcome> {
    let value: string | undefined;
    for (const line of request.code.split("\n")) {
      const [, verb = "", text = ""] = /^(\S*) ?(.*)$/s.exec(line) ?? [];
      if (verb === "odd") return { status: "ok", result: { data: { x: 1n }, metadata: {} }, userExpressions: {} };
      if (verb === "fail") return { status: "error", ename: "Error", evalue: text, traceback: [`Error: ${text}`] };
      if (verb === "value") value = unquote(text);
      else if (verb === "hang") await new Promise(() => {});
      else if (verb === "hold") await this.held();
      else if (verb === "ask") value = String(await this.ask(request, text));
      else await this.act(request.cell, verb, text);
    }
    const result = value === undefined ? {} : { result: { data: { "text/plain": value }, metadata: {} } };
    return { status: "ok", ...result, userExpressions: this.evaluate(request) };
  }

  private async act(cell: number, verb: string, text: string): Promise<void> {
    const { onEvent } = this.options;
    const data = { "text/plain": text };
    if (verb === "print") await onEvent({ type: "stream", cell, name: "stdout", text: unquote(text) });
    if (verb === "warn") await onEvent({ type: "stream", cell, name: "stderr", text: unquote(text) });
    if (verb === "show") await onEvent({ type: "display", cell, data, metadata: {}, displayId: "d1" });
    if (verb === "update") await onEvent({ type: "display", cell, data, metadata: {}, displayId: "d1", update: true });
    if (verb === "oddly") await onEvent({ type: "display", cell, data: { x: 1n }, metadata: {} });
    if (verb === "clear") await onEvent({ type: "clear", cell, wait: true });
    if (verb === "page") await onEvent({ type: "page", cell, data });
    if (verb === "propose") await onEvent({ type: "propose", cell, code: text, replace: false });
    if (verb === "replace") await onEvent({ type: "propose", cell, code: text, replace: true });
    if (verb === "later") this.late.push(() => this.act(cell, "print", text));
  }

  private held(): Promise<void> {
    return new Promise((resolve) => {
      this.release = resolve;
    });
  }

  private ask({ cell }: ExecuteRequest, prompt: string): Promise<string | null> {
    return new Promise((resolve) => {
      this.answer = resolve;
      void this.options.onEvent({ type: "input", cell, prompt, password: false });
    });
  }

  private evaluate({ userExpressions }: ExecuteRequest) {
    const entries = Object.entries(userExpressions).map(([name, text]) => [
      name,
      text === "bad"
        ? { status: "error" as const, ename: "ReferenceError", evalue: "bad", traceback: [] }
        : { status: "ok" as const, data: { "text/plain": text }, metadata: {} },
    ]);
    return Object.fromEntries(entries);
  }
}

function unquote(text: string): string {
  return text.startsWith('"') ? JSON.parse(text) : text;
}
