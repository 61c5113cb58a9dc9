// The literature that stored values cite: every field "source" or "sources" inside their data.
import { isCode, type Notebook } from "./format.ts";
import { VALUE_TYPE } from "./values.ts";

/** Sources inside one value's data, in order, each once. */
export function sourcesOf(value: unknown): string[] {
  const found = new Set<string>();
  const visit = (part: unknown): void => {
    if (typeof part !== "object" || part === null) return;
    for (const [name, inner] of Object.entries(part)) {
      const cited = name === "source" || name === "sources" ? [inner].flat() : [];
      for (const source of cited) if (typeof source === "string" && source.trim() !== "") found.add(source.trim());
      visit(inner);
    }
  };
  visit(value);
  return [...found];
}

/** Sources of all stored values of a notebook, in order, each once. */
export function notebookSources(notebook: Notebook): string[] {
  const outputs = notebook.cells.filter(isCode).flatMap((cell) => cell.outputs);
  return sourcesOf(outputs.map((output) => ("data" in output ? output.data[VALUE_TYPE] : undefined)));
}
