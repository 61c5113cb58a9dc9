// The kernel put together: wire, lanes, output, cells; and its end.
import type { CellSession, CellSessionOptions } from "../cell/port.ts";
import type { Connection } from "../wire/connection.ts";
import { log } from "../wire/log.ts";
import type { Message } from "../wire/message.ts";
import { openWire, type RequestChannel, type Wire } from "../wire/wire.ts";
import { type Brake, createBrake } from "./brake.ts";
import { dispatch } from "./dispatch.ts";
import { abortedAnswer } from "./handler/execute.ts";
import { controlHandlers, shellHandlers } from "./handler/table.ts";
import { type HistoryFile, openHistory } from "./history/store.ts";
import { createLane } from "./lane.ts";
import { createOutput, type Output } from "./output.ts";
import { createPrompts, type Prompts } from "./prompts.ts";
import { createRuns, type Runs } from "./runs.ts";
import type { Service } from "./service.ts";
import { within } from "./within.ts";

export interface KernelOptions {
  /** Loads and makes the session of the cells; called once, after the sockets are served. */
  readonly createCells: (options: CellSessionOptions) => Promise<CellSession>;
  /** Where the history is kept; absent: nowhere. */
  readonly historyFile?: HistoryFile;
  /** How long the first cell waits for a listener, in ms. */
  readonly audience?: number;
}

export interface Kernel {
  /** Stops the running cell, as a signal does. */
  interrupt(): void;
  /** How many messages have come in on each channel. */
  readonly received: Readonly<Record<RequestChannel, number>>;
  /** Ends the kernel; the second call does nothing. */
  end(): void;
  /** Resolves when the sockets are closed and the cells have ended, or have had their time. */
  readonly ended: Promise<void>;
}

/** A moment that no user notices, in which a client that is there gets its subscription through. In ms. */
const AUDIENCE = 250;
/** How long the end may take, in ms. Hosts kill after 2.5 s. */
const ENDING = 1500;

/**
 * Starts the kernel on a connection and returns as soon as it answers; the cells are loaded behind.
 *
 * Throws   ProtocolError if a socket cannot be bound.
 */
export async function startKernel(connection: Connection, options: KernelOptions): Promise<Kernel> {
  const wire = await openWire(connection);
  const output = createOutput((outgoing, topic) => wire.publish(outgoing, topic));
  const prompts = createPrompts({
    arrived: () => arrived(wire, "stdin"),
    send(identities, outgoing) {
      output.flush();
      return wire.send("stdin", identities, outgoing);
    },
    answer: (value) => void cells().then((session) => session.answerInput(value)),
  });
  const runs = createRuns(output, prompts);
  const brake = createBrake(wire);
  const cells = once(() => startCells(options, runs, brake));
  const history = once(() => openHistory(options.historyFile));
  const { end, ended } = ending([
    async () => (await cells()).shutdown(),
    async () => (await history()).close(),
    () => wire.close(),
  ]);
  let hurry = ignore;
  const service: Service = {
    output,
    runs,
    history,
    executionCount: 0,
    interruptions: 0,
    cells,
    audience: once(() => {
      const interrupted = new Promise<void>((resolve) => {
        hurry = resolve;
      });
      return within(options.audience ?? AUDIENCE, Promise.race([wire.subscribed, interrupted]), undefined);
    }),
    async abortQueued() {
      await arrived(wire, "shell");
      abortCells();
    },
    interrupt() {
      service.interruptions += 1;
      hurry();
      brake.release();
      void cells().then((session) => session.interrupt(), ignore);
    },
    end,
  };
  const abortCells = serveRequests(wire, output, prompts, service);
  output.publish("status", { execution_state: "starting" }, undefined);
  setImmediate(() => {
    cells().catch((error) => log(`the cells cannot be loaded: ${error?.stack ?? error}`));
    void history();
  });
  return { interrupt: service.interrupt, received: wire.received, end, ended };
}

async function startCells(options: KernelOptions, runs: Runs, brake: Brake): Promise<CellSession> {
  const session = await options.createCells({
    cwd: process.cwd(),
    onEvent(event) {
      try {
        runs.report(event);
      } catch (error) {
        log(`output of a cell cannot be published: ${error}`);
      }
      return brake.wait();
    },
  });
  session.start();
  return session;
}

/** Lets requests in; gives a function that marks the waiting cells as not to be run. */
function serveRequests(wire: Wire, output: Output, prompts: Prompts, service: Service): () => void {
  const control = createLane((request) =>
    dispatch("control", request, () => controlHandlers.get(typeOf(request))?.(request, service), { wire, output }),
  );
  const shell = createLane((request, aborted) => {
    const answering = () => (aborted ? abortedAnswer(service) : shellHandlers.get(typeOf(request))?.(request, service));
    return dispatch("shell", request, answering, { wire, output });
  });
  wire.serve({ control: control.add, shell: shell.add, stdin: prompts.answer });
  return () => shell.abort("execute_request");
}

/** Does all of `steps` at once when `end` is called first, and waits no longer than a host would. */
function ending(steps: readonly (() => Promise<void>)[]): Pick<Kernel, "end" | "ended"> {
  let finish = ignore;
  const ended = new Promise<void>((resolve) => {
    finish = resolve;
  });
  const end = once(async () => {
    await within(ENDING, Promise.allSettled(steps.map((step) => step())), undefined);
    finish();
  });
  return { end, ended };
}

/** Looks for messages until none has come for one look, so that what was sent back to back is here. In ms, and looks. */
const LOOK = 4;
const LOOKS = 25;

async function arrived(wire: Wire, channel: RequestChannel): Promise<void> {
  for (let look = 0, count = -1; look < LOOKS && count !== wire.received[channel]; look += 1) {
    count = wire.received[channel];
    await new Promise((resolve) => setTimeout(resolve, LOOK));
  }
}

function typeOf(request: Message): string {
  return request.header.msg_type;
}

/** The same promise for every caller. */
function once<T>(start: () => Promise<T>): () => Promise<T> {
  let promise: Promise<T> | undefined;
  return () => {
    promise ??= start();
    return promise;
  };
}

function ignore(): void {}
