import { type CellRun, pageHost } from "./host.ts";
import { type Table, table } from "./table.ts";

/** What the notebook knows of itself. */
export const notebook = {
  /**
   * The cells in the order in which they ran: what each defined and used, and whether a name that it used has been
   * defined again since, so that its result speaks of an earlier value.
   */
  order(): Table {
    const runs = pageHost().runs?.() ?? [];
    return table(runs.map((run, at) => row(run, runs.slice(at + 1))));
  },
};

function row(run: CellRun, later: readonly CellRun[]) {
  const stale = run.uses.filter(({ name }) => later.some((other) => other.defines.includes(name)));
  return {
    cell: run.failed ? `${run.cell} (failed)` : `${run.cell}`,
    defines: run.defines.join(", "),
    uses: run.uses.map(({ name, cell }) => `${name} of ${cell}`).join(", "),
    stale: stale.map(({ name }) => `${name} was defined again`).join(", "),
  };
}
