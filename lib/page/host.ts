// The port through which a value is shown in the middle of a cell. A notebook kernel sets it; elsewhere the console is
// the page.

import type { MimeBundle } from "./bundle.ts";

export interface DisplayOptions {
  /** Names the display, so that a later one with the same id takes its place. */
  readonly displayId?: string;
  /** True: replaces the displays with that id and makes none. */
  readonly update?: boolean;
}

export interface PageHost {
  display(bundle: MimeBundle, options: DisplayOptions): void;
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
