// The sources that the derivations of this session cite, in the order of their first use.

import { type Table, table } from "./table.ts";

const cited: string[] = [];

/** Keeps a source; one that was cited before keeps its place. */
export function citeSource(source: string): void {
  if (!cited.includes(source)) cited.push(source);
}

/** Said once, below the list of sources: what a place in it is worth. */
const NOTE = "The library cites places from memory; what a step takes from them is checked there by a second route.";

/**
 * A table of the sources that the derivations so far cite, each once. The library's own places (section, theorem, equation) are cited from
 * memory, as the caption says: the formulas were confirmed by computation, their numbers not looked up again.
 *
 * @example sources()   // near the end of a notebook
 */
export function sources(): Table {
  return table(
    cited.map((source, k) => [k + 1, source]),
    { columns: ["", "source"], caption: cited.length === 0 ? "No source has been cited." : `Sources. ${NOTE}` },
  );
}
