// The title of a notebook: what its metadata say, or its first heading.
import type { Notebook } from "./format.ts";

export function titleOf(notebook: Notebook): string | undefined {
  const { title } = notebook.metadata;
  if (typeof title === "string" && title.trim() !== "") return title;
  for (const cell of notebook.cells) {
    const heading = cell.cell_type === "markdown" ? /^#\s+(.+)$/m.exec(cell.source)?.[1] : undefined;
    if (heading) return heading.replace(/[*_`$\\]/g, "").trim();
  }
  return undefined;
}
