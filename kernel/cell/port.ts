// The seam between the kernel process (wire, service) and the cells: what a cell session offers and what it reports.
// Offsets are UTF-16 units here; the service converts to and from the code points of the wire in one place.
import type { ConfinedLimits } from "./confined/limits.ts";

/** A MIME bundle as the protocol has it: strings, or unpacked JSON under application/json and *+json. */
export interface MimeBundle {
  readonly [mime: string]: unknown;
}

export interface ErrorReport {
  readonly ename: string;
  readonly evalue: string;
  /** Lines, ANSI colours allowed, positions in the user's TypeScript. */
  readonly traceback: readonly string[];
}

/** What a running cell reports, in order. `cell` is the number given to `execute`, also for output that comes late. */
export type CellEvent =
  | { readonly type: "stream"; readonly cell: number; readonly name: "stdout" | "stderr"; readonly text: string }
  | {
      readonly type: "display";
      readonly cell: number;
      readonly data: MimeBundle;
      readonly metadata: MimeBundle;
      readonly displayId?: string;
      /** True: replaces every display with that id and creates none. */
      readonly update?: boolean;
    }
  | { readonly type: "clear"; readonly cell: number; readonly wait: boolean }
  /** For the reader to look at beside the notebook. */
  | { readonly type: "page"; readonly cell: number; readonly data: MimeBundle }
  /** Code for the next cell, which the reader may run or change. */
  | { readonly type: "propose"; readonly cell: number; readonly code: string; readonly replace: boolean }
  | { readonly type: "input"; readonly cell: number; readonly prompt: string; readonly password: boolean };

export interface ExecuteRequest {
  readonly code: string;
  /** Unique and rising in the session; names the cell in events. Not the execution count. */
  readonly cell: number;
  /** The count shown to the user, "in cell N". */
  readonly executionCount: number;
  /** The front end's own name of the cell: the same when the cell runs again. */
  readonly cellId?: string;
  readonly silent: boolean;
  readonly allowStdin: boolean;
  readonly userExpressions: Readonly<Record<string, string>>;
}

export type UserExpression =
  | { readonly status: "ok"; readonly data: MimeBundle; readonly metadata: MimeBundle }
  | ({ readonly status: "error" } & ErrorReport);

export type ExecuteOutcome =
  | {
      readonly status: "ok";
      /** Bundle of the last expression, absent if there is none or it is undefined. */
      readonly result?: { readonly data: MimeBundle; readonly metadata: MimeBundle };
      readonly userExpressions: Readonly<Record<string, UserExpression>>;
    }
  | ({ readonly status: "error" } & ErrorReport);

export interface Completion {
  readonly text: string;
  /** function, class, module, variable, property, keyword, interface, type, ... */
  readonly type: string;
  readonly signature?: string;
}

export interface CompletionList {
  /** Half-open UTF-16 range of the code that every match replaces. */
  readonly start: number;
  readonly end: number;
  readonly matches: readonly Completion[];
}

export type Completeness =
  | { readonly status: "complete" | "invalid" | "unknown" }
  | { readonly status: "incomplete"; readonly indent: string };

/** The session in which the cells of one notebook run. One `execute` at a time; everything else at any time. */
export interface CellSession {
  /** Starts the child and the type service. Returns at once; `execute` waits for them by itself. */
  start(): void;
  /**
   * Checks and runs one cell. Never rejects for a fault of the cell: errors, interrupts and the death of the child
   * (after which the session goes on with a fresh child) are outcomes. All events of the cell's own flow have been
   * reported when it resolves.
   */
  execute(request: ExecuteRequest): Promise<ExecuteOutcome>;
  /** Answers an open `input` event; null is end of file. */
  answerInput(value: string | null): void;
  /** Stops the running cell; without one it does nothing. */
  interrupt(): void;
  complete(code: string, offset: number): Promise<CompletionList>;
  /** undefined: nothing found. */
  inspect(code: string, offset: number, detail: 0 | 1): Promise<MimeBundle | undefined>;
  /** Parses only, no check; answers at once, also while the types process is busy. */
  isComplete(code: string): Promise<Completeness>;
  /** Ends child and type service with all that they started, within a second; safe to call twice. */
  shutdown(): Promise<void>;
}

export interface CellSessionOptions {
  /** Folder of the notebook: imports resolve from it. */
  readonly cwd: string;
  /**
   * Hears every event, in order. While a promise it gave is open the session takes no more output from the child, so
   * that a cell that prints faster than it can be sent waits in its print call.
   */
  readonly onEvent: (event: CellEvent) => void | Promise<void>;
  /** Present: the cells have the language and the library alone, behind two fences (see confined/outer.ts), within limits. */
  readonly confined?: Partial<ConfinedLimits>;
  /** Limit of the memory of the cells in MB: of their heap, and of heap and buffers together. Absent: Node's own. */
  readonly memoryLimit?: number;
}
