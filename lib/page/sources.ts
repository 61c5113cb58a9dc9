// The sources that the derivations of this session cite, in the order of their first use.

import { type Table, table } from "./table.ts";

const cited: string[] = [];

/** Keeps a source; one that was cited before keeps its place. */
export function citeSource(source: string): void {
  if (!cited.includes(source)) cited.push(source);
}

/**
 * A table of the sources that the derivations so far cite, each once. "common practice" stands before a formula that many books have, and
 * "from memory" behind a place whose number was not looked up.
 *
 * @example sources()   // near the end of a notebook
 */
export function sources(): Table {
  return table(
    cited.map((source, k) => [k + 1, source]),
    { columns: ["", "source"], caption: cited.length === 0 ? "No source has been cited." : "Sources." },
  );
}
