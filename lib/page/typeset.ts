import { bundle } from "./bundle.ts";
import { type DisplayOptions, pageHost } from "./host.ts";
import { show } from "./show.ts";

/**
 * The value as TeX, without delimiters, to be pasted into a paper: digits grouped by thin spaces, arrays for what has
 * several rows. Conventions are not part of it.
 *
 * @example tex(E)    // E : y^2 + y = x^3 - x \text{ over } \mathbb{Q}
 */
export function tex(value: unknown): string {
  return show.tex(value);
}

/**
 * Shows a value at this point of the cell, the way the value of the last line is shown; returns nothing.
 *
 * `displayId` names the display; with `update` a later call takes its place. `aside` shows it beside the notebook instead,
 * once the cell is done: for what is to be read and not to be kept.
 */
export function typeset(value: unknown, options: DisplayOptions = {}): void {
  const shown = bundle(value) ?? { "text/plain": "undefined" };
  pageHost().display(shown, options);
}
