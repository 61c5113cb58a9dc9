// Which results speak of values that are no longer there, because the cell they came from has been edited or run again.
import type { CellRun } from "../../../lib/page/host.ts";
import { escapeHtml } from "../../../lib/page/html.ts";

/** A run with what tells whether a later one is of the same cell. */
export interface TracedRun extends CellRun {
  readonly code: string;
  /** The front end's own name of the cell, where it gives one. */
  readonly id?: string;
  /** Somebody looks on: without `id` an edited cell is known by the names that it defines. */
  readonly watched: boolean;
}

/** The lines to show under a run that has just ended, the last of `runs`. */
export function staleLines(runs: readonly TracedRun[]): string[] {
  const run = runs.at(-1);
  if (!run || run.failed) return [];
  const before = staleRuns(runs.slice(0, -1));
  const now = staleRuns(runs);
  const lines: string[] = [];
  for (const { name, cell } of run.uses) {
    const source = runs.findLast((other) => other !== run && other.cell === cell);
    const why = source && now.get(source);
    if (why) lines.push(`${name} is out of date: cell ${cell} used ${why} before ${why} changed.`);
  }
  const newly = [...now].filter(([other]) => other !== run && !before.has(other) && !isAgain(run, other));
  if (newly.length > 0) {
    const cells = newly.map(([other]) => other.cell);
    const names = [...new Set(newly.map(([, why]) => why))].join(", ");
    const results = cells.length === 1 ? `the result of cell ${cells[0]}` : `the results of cells ${listed(cells)}`;
    lines.push(`Out of date since this run: ${results} (from an earlier ${names}).`);
  }
  return lines;
}

/** The runs whose result is out of date, each with the name that is the reason. */
function staleRuns(runs: readonly TracedRun[]): Map<TracedRun, string> {
  const stale = new Map<TracedRun, string>();
  runs.forEach((run, at) => {
    if (run.failed || runs.slice(at + 1).some((later) => isAgain(later, run))) return;
    for (const { name, cell } of run.uses) {
      const from = runs.findLastIndex((other, index) => index < at && other.cell === cell);
      const source = runs[from];
      if (!source) continue;
      const again = runs.slice(at + 1).some((later) => !later.failed && isAgain(later, source));
      const inherited = stale.get(source);
      if (again) stale.set(run, name);
      else if (inherited !== undefined) stale.set(run, inherited);
    }
  });
  return stale;
}

/** Whether `later` is a run of the same cell as `run`, edited or not. */
function isAgain(later: TracedRun, run: TracedRun): boolean {
  if (later.id !== undefined && run.id !== undefined) return later.id === run.id;
  if (later.code === run.code) return true;
  return later.watched && run.defines.length > 0 && [...later.defines].sort().join() === [...run.defines].sort().join();
}

function listed(cells: readonly number[]): string {
  return `${cells.slice(0, -1).join(", ")} and ${cells.at(-1)}`;
}

/** The lines as something to be displayed: small and grey where the front end shows HTML. */
export function staleNote(lines: readonly string[]): { readonly "text/plain": string; readonly "text/html": string } {
  const text = lines.join("\n");
  const escaped = lines.map(escapeHtml);
  return { "text/plain": text, "text/html": `<small style="opacity: 0.7">${escaped.join("<br>")}</small>` };
}
