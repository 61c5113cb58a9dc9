// Notebooks for tests, from sources and outputs.
import type { Cell, CodeCell, Notebook, Output } from "../../../kernel/notebook/format.ts";

export const code = (source: string, outputs: readonly Output[] = [], tags: readonly string[] = []): CodeCell => ({
  cell_type: "code",
  metadata: tags.length > 0 ? { tags } : {},
  source,
  execution_count: outputs.length > 0 ? 1 : null,
  outputs,
});

export const text = (source: string): Cell => ({ cell_type: "markdown", metadata: {}, source });

export const shown = (data: Readonly<Record<string, unknown>>): Output => ({
  output_type: "execute_result",
  execution_count: 1,
  data,
  metadata: {},
});

export const notebookOf = (...cells: Cell[]): Notebook => ({ nbformat: 4, nbformat_minor: 5, metadata: {}, cells });
