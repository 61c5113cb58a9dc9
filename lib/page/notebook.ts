import { DomainError } from "../proof/errors.ts";
import { type CellRun, pageHost } from "./host.ts";
import { type Table, table } from "./table.ts";

/** What the notebook knows of itself. */
export const notebook = {
  /**
   * Puts code into the next cell, for the reader to look at and run; `replace` puts it in place of the cell that runs.
   *
   * Throws   DomainError where there is no reader, as in a program.
   * @example notebook.propose(`curve\`${E.minimal()}\``)
   */
  propose(code: string, options: { readonly replace?: boolean } = {}): void {
    const host = pageHost();
    if (!host.propose) {
      throw new DomainError({
        subject: "notebook.propose",
        given: "a place without cells",
        expected: "a notebook",
        hint: "Print the code instead.",
      });
    }
    host.propose(String(code), options.replace ?? false);
  },

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
