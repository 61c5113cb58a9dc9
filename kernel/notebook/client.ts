// A client of the kernel, as a front end is one: it starts the real kernel, executes cells over ZeroMQ, and notices when
// a cell takes too long or the kernel dies.
import { setTimeout as sleep } from "node:timers/promises";
import type { Json, Message } from "../wire/message.ts";
import { type Channels, type IncomingChannel, openChannels, type RequestChannel } from "./channels.ts";
import { type KernelEnd, type KernelProcess, type LaunchOptions, launchKernel } from "./launch.ts";

const START_LIMIT = 60_000;
const START_TRIES = 5;
/** A kernel that has not answered a heartbeat for so long is taken for dead, in ms. */
const SILENCE_LIMIT = 45_000;
/** What a cell gets to end after an interrupt, and iopub to say "idle" after a reply, in ms. */
const GRACE = 10_000;

/** The kernel ended, or does not answer any more; what it was doing is lost. */
export class KernelLost extends Error {
  readonly end: KernelEnd | undefined;

  constructor(end: KernelEnd | undefined) {
    super(end ? describeEnd(end) : "the kernel does not answer any more");
    this.name = "KernelLost";
    this.end = end;
  }
}

function describeEnd({ code, signal, stderr }: KernelEnd): string {
  const how = signal ? `was ended by ${signal}` : `ended with status ${code}`;
  return `the kernel ${how}${stderr ? `:\n${stderr}` : ""}`;
}

export interface ExecuteOptions {
  /** Hears every iopub message that belongs to the request, also late ones that come after `execute` has resolved. */
  readonly onMessage?: (type: string, content: Json) => void;
  /** Milliseconds until the cell is interrupted; no limit if absent. */
  readonly limit?: number | undefined;
  readonly stopOnError?: boolean;
  /** Answers the cell's question for input; without it the cell is told that nobody can be asked. */
  readonly onInput?: (prompt: string, password: boolean) => Promise<string>;
}

export interface Execution {
  readonly status: "ok" | "error" | "too long";
  readonly executionCount: number | null;
  /** Content of the reply. */
  readonly reply: Json;
}

interface Pending {
  readonly onIopub: (type: string, content: Json) => void;
  readonly onReply: (content: Json) => void;
  readonly onInput?: (content: Json) => void;
}

/** A running kernel and the connection to it. */
export class KernelClient {
  readonly #process: KernelProcess;
  readonly #channels: Channels;
  readonly #pending = new Map<string, Pending>();
  #info: Json = {};
  #iopubSeen = false;

  private constructor(process: KernelProcess) {
    this.#process = process;
    this.#channels = openChannels(process.connection, (channel, message) => this.#take(channel, message));
  }

  /**
   * Starts a kernel and waits until it answers on shell and iopub. If another program takes one of the chosen ports
   * first, the kernel ends at once and is started again on others.
   *
   * Throws   KernelLost if it ends or stays silent.
   */
  static async start(options: LaunchOptions): Promise<KernelClient> {
    for (let attempt = 1; ; attempt++) {
      const client = new KernelClient(await launchKernel(options));
      try {
        await client.#untilReady();
        return client;
      } catch (error) {
        await client.shutdown();
        const portTaken = error instanceof KernelLost && /in use|EADDRINUSE/.test(error.message);
        if (!portTaken || attempt === START_TRIES) throw error;
      }
    }
  }

  /** Content of kernel_info_reply. */
  get info(): Json {
    return this.#info;
  }

  get pid(): number {
    return this.#process.pid;
  }

  /** Sends a request and waits for its reply. Throws KernelLost. */
  async request(channel: RequestChannel, type: string, content: Json): Promise<Json> {
    return this.#orLost(new Promise((onReply) => this.#send(channel, type, content, { onIopub: ignore, onReply })));
  }

  /**
   * Executes one cell and waits for its reply and its idle status, so that all its outputs have been heard.
   *
   * Throws   KernelLost.
   */
  async execute(code: string, options: ExecuteOptions = {}): Promise<Execution> {
    const { onMessage = ignore, limit, stopOnError = true, onInput } = options;
    const idle = signalled();
    const replied = signalled<Json>();
    const onIopub = (type: string, content: Json) => {
      onMessage(type, content);
      if (type === "status" && content.execution_state === "idle") idle.resolve();
    };
    const content = {
      code,
      silent: false,
      store_history: true,
      user_expressions: {},
      allow_stdin: onInput !== undefined,
      stop_on_error: stopOnError,
    };
    this.#send("shell", "execute_request", content, {
      onIopub,
      onReply: replied.resolve,
      ...(onInput ? { onInput: (question: Json) => void this.#answer(question, onInput) } : {}),
    });
    const { value: reply, late } = await this.#orLost(this.#withLimit(replied.promise, limit));
    await this.#orLost(Promise.race([idle.promise, sleep(GRACE, undefined, { ref: false })]));
    const count = typeof reply.execution_count === "number" ? reply.execution_count : null;
    const status = late ? "too long" : reply.status === "ok" ? "ok" : "error";
    return { status, executionCount: count, reply };
  }

  /** Interrupts the running cell. */
  async interrupt(): Promise<void> {
    await this.request("control", "interrupt_request", {});
  }

  /**
   * Ends the kernel in order, by force if it does not go. Safe to call twice, and on a kernel that is dead.
   *
   * @returns true if the kernel went by itself
   */
  async shutdown(): Promise<boolean> {
    const { ended, signal, dispose } = this.#process;
    this.#channels.send("control", "shutdown_request", { restart: false });
    let itself = true;
    for (const [patience, next] of [
      [3000, "SIGTERM"],
      [2500, "SIGKILL"],
      [5000, "SIGKILL"],
    ] as const) {
      if (await endsWithin(ended, patience)) break;
      itself = false;
      signal(next);
    }
    this.#channels.close();
    await dispose();
    return itself;
  }

  async #withLimit<T>(reply: Promise<T>, limit: number | undefined): Promise<{ value: T; late: boolean }> {
    if (limit === undefined) return { value: await reply, late: false };
    const inTime = reply.then((value) => ({ value, late: false }));
    const first = await Promise.race([inTime, sleep(limit, undefined, { ref: false })]);
    if (first) return first;
    await this.interrupt();
    const second = await Promise.race([inTime, sleep(GRACE, undefined, { ref: false })]);
    if (!second) throw new KernelLost(undefined);
    return { ...second, late: true };
  }

  async #untilReady(): Promise<void> {
    const deadline = performance.now() + START_LIMIT;
    await this.#orLost(Promise.race([this.#channels.connected, sleep(START_LIMIT, undefined, { ref: false })]));
    while (!(this.#iopubSeen && this.#info.status === "ok")) {
      if (performance.now() > deadline) throw new KernelLost(undefined);
      const onReply = (content: Json) => {
        this.#info = content;
      };
      this.#send("shell", "kernel_info_request", {}, { onIopub: ignore, onReply });
      await this.#orLost(this.#settled(500));
    }
  }

  /** Resolves when the kernel has answered on both channels, or after `patience` ms. */
  async #settled(patience: number): Promise<void> {
    const until = performance.now() + patience;
    while (performance.now() < until && !(this.#iopubSeen && this.#info.status === "ok")) await sleep(5);
  }

  #send(channel: RequestChannel, type: string, content: Json, pending: Pending): void {
    this.#pending.set(this.#channels.send(channel, type, content), pending);
  }

  #take(channel: IncomingChannel, message: Message): void {
    if (channel === "iopub") this.#iopubSeen = true;
    const pending = this.#pending.get(String(message.parentHeader.msg_id));
    if (channel === "iopub") pending?.onIopub(message.header.msg_type, message.content);
    else if (channel === "stdin") pending?.onInput?.(message.content);
    else pending?.onReply(message.content);
  }

  async #answer(question: Json, ask: (prompt: string, password: boolean) => Promise<string>): Promise<void> {
    const value = await ask(String(question.prompt ?? ""), question.password === true);
    this.#channels.send("stdin", "input_reply", { value });
  }

  /** The promise's value, or KernelLost as soon as the kernel is gone or silent. */
  async #orLost<T>(promise: Promise<T>): Promise<T> {
    let watch: NodeJS.Timeout | undefined;
    const silent = new Promise<undefined>((resolve) => {
      const since = performance.now();
      watch = setInterval(() => {
        if (performance.now() - Math.max(since, this.#channels.lastBeat) > SILENCE_LIMIT) resolve(undefined);
      }, 1000);
      watch.unref();
    });
    const lost = Promise.race([this.#process.ended, silent]).then((end): never => {
      throw new KernelLost(end);
    });
    try {
      return await Promise.race([promise, lost]);
    } finally {
      clearInterval(watch);
      lost.catch(ignore);
    }
  }
}

function ignore(): void {}

function signalled<T = void>(): { readonly promise: Promise<T>; readonly resolve: (value: T) => void } {
  let resolve: (value: T) => void = ignore;
  const promise = new Promise<T>((settle) => {
    resolve = settle;
  });
  return { promise, resolve };
}

async function endsWithin(ended: Promise<unknown>, patience: number): Promise<boolean> {
  const abort = new AbortController();
  const timeout = sleep(patience, false, { signal: abort.signal }).catch(() => false);
  const gone = await Promise.race([ended.then(() => true), timeout]);
  abort.abort();
  return gone;
}
