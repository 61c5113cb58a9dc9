// The types process as the session uses it: questions and answers, and a fresh process when one is lost.
import type { ChildProcess } from "node:child_process";
import { launchTypes } from "./launch.ts";
import { encodeLine, LineReader } from "./lines.ts";
import type { CommittedCell, TypesAnswers, TypesCommand, TypesReply } from "./messages.ts";

interface Waiting {
  readonly line: string;
  readonly resolve: (answer: unknown) => void;
  readonly reject: (reason: Error) => void;
}

/** The types process was ended, or fell: the question has no answer. */
export class TypesLost extends Error {}

/** Client of one notebook's types process. */
export class TypesClient {
  readonly #cwd: string;
  readonly #confined: boolean;
  readonly #committed = new Map<number, CommittedCell>();
  readonly #waiting = new Map<number, Waiting>();
  #process: ChildProcess | undefined;
  #ids = 0;
  #ready = false;
  /** False once a snapshot has not started. */
  #trustSnapshot = true;
  #closed = false;

  /** Of a confined notebook the checker reads nothing but the library and the types that come with it. */
  constructor(cwd: string, confined = false) {
    this.#cwd = cwd;
    this.#confined = confined;
  }

  start(): void {
    if (this.#process || this.#closed) return;
    this.#launch();
    for (const [cell, declarations] of this.#committed) {
      this.ask({ kind: "restore", cell, declarations }).catch(() => {});
    }
  }

  #launch(): void {
    const { process, fromSnapshot } = launchTypes(this.#cwd, this.#trustSnapshot, this.#confined);
    this.#process = process;
    this.#ready = false;
    const reader = new LineReader();
    process.stdout?.on("data", (chunk: Buffer) => {
      for (const line of reader.push(chunk)) this.#receive(JSON.parse(line) as TypesReply);
    });
    process.stdin?.on("error", () => {});
    const ended = () => {
      if (fromSnapshot && !this.#ready && this.#process === process) this.#startPlain();
      else this.#lost(process);
    };
    process.on("error", ended);
    process.on("exit", ended);
    // One that was started early may be gone already.
    if (process.exitCode !== null || process.signalCode !== null) setImmediate(ended);
  }

  /** The snapshot does not fit this Node: the same questions go to a process without it. */
  #startPlain(): void {
    this.#trustSnapshot = false;
    if (this.#closed) return;
    this.#launch();
    for (const { line } of this.#waiting.values()) this.#process?.stdin?.write(line);
  }

  ask<C extends TypesCommand>(command: C): Promise<TypesAnswers[C["kind"]]> {
    this.start();
    const id = ++this.#ids;
    return new Promise((resolve, reject) => {
      if (!this.#process) return reject(new TypesLost("the session has ended"));
      const line = encodeLine({ id, ...command });
      this.#waiting.set(id, { line, resolve: resolve as (answer: unknown) => void, reject });
      this.#process.stdin?.write(line);
    });
  }

  /** Records what a cell defined, here too: a fresh process is told again. */
  async commit(cell: number, defined: readonly string[], complete: boolean): Promise<void> {
    const committed = await this.ask({ kind: "commit", cell, defined, complete });
    if (committed) this.#committed.set(cell, committed);
  }

  /** Names with a value that the cells have defined so far. */
  get names(): readonly string[] {
    const all = [...this.#committed.values()].flatMap((cell) => cell.names);
    return [...new Set(all.filter(({ kind, ambient }) => kind !== "type" && !ambient).map(({ name }) => name))];
  }

  /** Forgets every name. */
  reset(): Promise<null> {
    this.#committed.clear();
    return this.ask({ kind: "reset" });
  }

  /** Ends the process, whatever it does; the next question starts another. */
  restart(): void {
    const process = this.#process;
    if (!process) return;
    process.kill("SIGKILL");
    this.#lost(process);
    this.start();
  }

  close(): void {
    this.#closed = true;
    this.#process?.kill("SIGKILL");
  }

  #receive(reply: TypesReply): void {
    if (!("id" in reply)) {
      this.#ready = true;
      return;
    }
    const waiting = this.#waiting.get(reply.id);
    this.#waiting.delete(reply.id);
    if ("failure" in reply) waiting?.reject(new Error(reply.failure));
    else waiting?.resolve(reply.answer);
  }

  #lost(process: ChildProcess): void {
    if (this.#process !== process) return;
    this.#process = undefined;
    const waiting = [...this.#waiting.values()];
    this.#waiting.clear();
    for (const { reject } of waiting) reject(new TypesLost("the type checker has ended"));
  }
}
