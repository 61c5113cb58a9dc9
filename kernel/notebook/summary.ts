// What a run has shown, in a few words: from the values that travel as data beside the readable outputs.
import { packageVersion } from "../service/info.ts";
import type { Notebook } from "./format.ts";

/** Rows of label and text: claims, digits. */
export function summaryLines(_notebook: Notebook): [label: string, text: string][] {
  return [];
}

/** The same on one line, to follow a count of cells. */
export function summarise(notebook: Notebook): string {
  return summaryLines(notebook)
    .map(([label, text]) => `; ${label} ${text}`)
    .join("");
}

/** The line at the end of a page. */
export function colophon(_notebook: Notebook): string {
  return `Computed by halfperiod ${packageVersion()}, conventions of edition 1.`;
}
