// What a handler may use, and what it gives back.
import type { CellSession, ErrorReport } from "../cell/port.ts";
import type { Json, Message } from "../wire/message.ts";
import type { History } from "./history/store.ts";
import type { Output } from "./output.ts";
import type { Runs } from "./runs.ts";

export interface Service {
  readonly output: Output;
  readonly runs: Runs;
  /** What was entered, also in earlier sessions. */
  history(): Promise<History>;
  /** The cells, loaded after the sockets are served. Rejects if they cannot be loaded. */
  cells(): Promise<CellSession>;
  /** Resolves when somebody listens to iopub, or after a moment: a client may send its first cell before that. */
  audience(): Promise<void>;
  /** The count of the last stored cell; 0 before the first. */
  executionCount: number;
  /** Answers every execute request that has arrived by now with an error instead of running it. */
  abortQueued(): Promise<void>;
  interrupt(): void;
  /** Interrupts so far: one may come for a cell that is on its way, but does not run yet. */
  interruptions: number;
  /** Ends the kernel once everything said so far is on its way. */
  end(): void;
}

/** A reply: its content, and what belongs around it. */
export interface Answer {
  readonly content: Json;
  readonly metadata?: Json;
  /** Publish the reply on iopub too. */
  readonly copied?: boolean;
  /** Send the reply when all output before it is with the socket: who reads slowly must not take it for the end. */
  readonly afterOutput?: boolean;
  /** Runs after idle. */
  readonly afterIdle?: () => void;
}

/** Serves one message type; undefined: no reply belongs to it. A rejection becomes an error reply. */
export type Handler = (request: Message, service: Service) => Answer | undefined | Promise<Answer | undefined>;

/** Content of an error reply for something thrown. */
export function failure(error: unknown): { readonly status: "error" } & ErrorReport {
  const isError = error instanceof Error;
  return {
    status: "error",
    ename: isError ? error.name : "Error",
    evalue: isError ? error.message : String(error),
    traceback: [],
  };
}
