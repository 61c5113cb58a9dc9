// What the processes of a session say to each other.
import type { Completeness, CompletionList, ErrorReport, MimeBundle } from "./port.ts";
import type { Inspection } from "./types/inspect.ts";
import type { SourceMapData } from "./types/sourcemap.ts";

/** A cell ready to run. */
export interface EmittedCell {
  /** An expression: a function of `$rt` and the boxes. */
  readonly script: string;
  readonly map: SourceMapData;
  /** The prefix of the parameters, `$` or more of them. */
  readonly prefix: string;
  readonly boxes: readonly { readonly name: string; readonly origin: "notebook" | "library" }[];
  /** Names of earlier cells that it uses, with the number of the cell's file. */
  readonly uses: readonly { readonly name: string; readonly cell: number }[];
  /** Notices for the user, printed before the cell runs. */
  readonly notices: readonly string[];
}

export type CheckResult =
  | { readonly status: "ok"; readonly emitted: EmittedCell }
  | ({ readonly status: "error" } & ErrorReport);

/** Asked of the types process; answers carry the same id. */
export type TypesCommand =
  | { readonly kind: "check"; readonly cell: number; readonly executionCount: number; readonly code: string }
  /** Cell ran: these values are defined now. `complete` is false for a failed cell. */
  | { readonly kind: "commit"; readonly cell: number; readonly defined: readonly string[]; readonly complete: boolean }
  /** The values are lost: forget every name. */
  | { readonly kind: "reset" }
  | { readonly kind: "restore"; readonly cell: number; readonly declarations: CommittedCell }
  | { readonly kind: "complete"; readonly code: string; readonly offset: number }
  | { readonly kind: "inspect"; readonly code: string; readonly offset: number; readonly detail: 0 | 1 }
  | { readonly kind: "isComplete"; readonly code: string };

/** What the checker must know of a cell that ran; enough to start another types process. */
export interface CommittedCell {
  readonly text: string;
  readonly names: readonly { readonly name: string; readonly kind: string; readonly ambient: boolean }[];
}

export interface TypesAnswers {
  check: CheckResult;
  commit: CommittedCell | null;
  reset: null;
  restore: null;
  complete: CompletionList;
  inspect: Inspection | null;
  isComplete: Completeness;
}

export type TypesRequest = { readonly id: number } & TypesCommand;
export type TypesReply =
  | { readonly id: number; readonly answer: unknown }
  | { readonly id: number; readonly failure: string }
  | { readonly ready: true };

/** To the child, on descriptor 3. */
export type ChildCommand =
  | {
      readonly kind: "run";
      readonly cell: number;
      readonly executionCount: number;
      readonly code: string;
      readonly emitted: EmittedCell;
      readonly cellId?: string;
      readonly allowStdin: boolean;
      /** Of a user expression: events and names are not wanted. */
      readonly quiet: boolean;
    }
  | { readonly kind: "answer"; readonly value: string | null }
  /** Asks for the value of a variable, as text. */
  | { readonly kind: "peek"; readonly id: number; readonly name: string };

/** From the child, on descriptor 4. */
export type ChildReport =
  | { readonly kind: "ready" }
  | { readonly kind: "stream"; readonly cell: number; readonly name: "stdout" | "stderr"; readonly text: string }
  | {
      readonly kind: "display";
      readonly cell: number;
      readonly data: MimeBundle;
      readonly metadata: MimeBundle;
      readonly displayId?: string;
      readonly update?: boolean;
    }
  | { readonly kind: "clear"; readonly cell: number; readonly wait: boolean }
  | { readonly kind: "page"; readonly cell: number; readonly data: MimeBundle }
  | { readonly kind: "propose"; readonly cell: number; readonly code: string; readonly replace: boolean }
  | { readonly kind: "input"; readonly cell: number; readonly prompt: string; readonly password: boolean }
  | { readonly kind: "leaving"; readonly words: string }
  | { readonly kind: "peeked"; readonly id: number; readonly text: string }
  | {
      readonly kind: "done";
      readonly cell: number;
      readonly defined: readonly string[];
      readonly error?: ErrorReport;
      readonly result?: { readonly data: MimeBundle; readonly metadata: MimeBundle };
    };

/** To the watchdog, on descriptor 5. */
export interface InterruptCommand {
  readonly kind: "interrupt";
  readonly cell: number;
}
