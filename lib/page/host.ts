// The port through which a value is shown in the middle of a cell. A notebook kernel sets it; elsewhere the console is
// the page.

import type { MimeBundle } from "./bundle.ts";

export interface DisplayOptions {
  /** Names the display, so that a later one with the same id takes its place. */
  readonly displayId?: string;
  /** True: replaces the displays with that id and makes none. */
  readonly update?: boolean;
  /** True: shown beside the page when the cell is done, where the front end has such a place, and not kept in the page. */
  readonly aside?: boolean;
}

/** One run of a cell, as the notebook keeps it. */
export interface CellRun {
  /** The number beside the cell. */
  readonly cell: number;
  readonly defines: readonly string[];
  /** Names of earlier cells that it used, with the cell that had defined them. */
  readonly uses: readonly { readonly name: string; readonly cell: number }[];
  readonly failed: boolean;
}

export interface PageHost {
  display(bundle: MimeBundle, options: DisplayOptions): void;
  /** Asks the reader for a line; null is the end of input. Absent where nobody can answer. */
  readonly ask?: ((prompt: string, hidden: boolean) => Promise<string | null>) | undefined;
  /** Puts code into the next cell, or in place of the running one, for the reader to run. Absent where nobody can. */
  propose?(code: string, replace: boolean): void;
  /** The cells that have run, in order. Absent outside notebooks. */
  runs?(): readonly CellRun[];
}

const CONSOLE: PageHost = {
  display(bundle) {
    console.log(bundle["text/plain"]);
  },
};

let current: PageHost = CONSOLE;

/** Sets where pages go; without an argument back to the console. */
export function setPageHost(host: PageHost = CONSOLE): void {
  current = host;
}

export function pageHost(): PageHost {
  return current;
}
