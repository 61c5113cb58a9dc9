// Confined runs of a stranger's notebook: what is promised, and the cleaning of what its cells show.
import { isCode, type Notebook, type Output } from "./format.ts";
import { sanitise } from "./page/sanitise.ts";

/** What `--confined` is and is not. */
export const CONFINED_WORDS = `Confined runs remove files, network, processes and native code from the cells by two mechanisms that our tests
attack. They are not a sandbox against a determined attacker; for strangers' notebooks use a container or a
virtual machine. A check shows that the code reproduces the stored values, not that the code is honest: a
notebook can redefine \`claim\`.`;

/** The notebook with its HTML and pictures reduced to what shows and does nothing. */
export function cleanOutputs(notebook: Notebook): Notebook {
  const cells = notebook.cells.map((cell) => (isCode(cell) ? { ...cell, outputs: cell.outputs.map(clean) } : cell));
  return { ...notebook, cells };
}

function clean(output: Output): Output {
  if (!("data" in output)) return output;
  const entries = Object.entries(output.data).map(([mime, value]) => {
    const active = (mime === "text/html" || mime === "image/svg+xml") && typeof value === "string";
    return [mime, active ? sanitise(value) : value];
  });
  return { ...output, data: Object.fromEntries(entries) };
}
