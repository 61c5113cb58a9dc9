// What a run has shown, in a few words.
import { packageVersion } from "../service/info.ts";
import type { Notebook } from "./format.ts";
import { isEdited, readStamp } from "./stamp.ts";
import { type Tally, tally } from "./values.ts";

const MET = ["proved", "certified"] as const;
const OPEN = ["conjectured", "undecided", "refuted"] as const;

/** Rows of label and text: claims, numbers. */
export function summaryLines(notebook: Notebook): [label: string, text: string][] {
  const found = tally(notebook);
  const rows: [string, string][] = [];
  if (found.claims.size > 0) rows.push(["claims", claimsText(found)]);
  if (found.exactNumbers + found.definedNumbers + found.measuredNumbers > 0) rows.push(["numbers", numbersText(found)]);
  return rows;
}

/** The same on one line, to follow a count of cells. */
export function summarise(notebook: Notebook): string {
  return summaryLines(notebook)
    .map(([label, text]) => `; ${label}: ${text}`)
    .join("");
}

function claimsText({ claims, certified }: Tally): string {
  const count = (kinds: readonly string[]) => kinds.reduce((sum, kind) => sum + (claims.get(kind) ?? 0), 0);
  const named = (kinds: readonly string[]) =>
    kinds.filter((kind) => claims.has(kind)).map((kind) => `${claims.get(kind)} ${kind}${extent(kind, certified)}`);
  const met = `${count(MET)} of ${count([...MET, ...OPEN])} met`;
  return [met, ...named(MET), ...named(OPEN)].join(", ");
}

function extent(kind: string, certified: number | undefined): string {
  return kind === "certified" && certified !== undefined ? ` to ${certified} digits` : "";
}

function numbersText({ exactNumbers, definedNumbers, measuredNumbers, digits }: Tally): string {
  const parts = [`${exactNumbers} exact`];
  if (definedNumbers > 0)
    parts.push(
      digits === undefined ? `${definedNumbers} defined` : `${definedNumbers} with ${digits} or more proved digits`,
    );
  if (measuredNumbers > 0) parts.push(`${measuredNumbers} measured`);
  return parts.join(", ");
}

/** The line at the end of a page: what computed it, by which conventions, when, and whether it was edited since. */
export function colophon(notebook: Notebook): string {
  const stamp = readStamp(notebook);
  if (!stamp) return `Set by halfperiod ${packageVersion()}.`;
  const made = `Computed by halfperiod ${stamp.version} with the conventions of edition ${stamp.edition}`;
  const since = isEdited(stamp, notebook) ? " The code was edited after that." : "";
  return `${made}, on ${stamp.date.slice(0, 10)}.${since}`;
}
