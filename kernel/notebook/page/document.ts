// A notebook as one page: opens from disk, needs no network and no script, prints like a short paper.
import { type Cell, type CodeCell, isCode, type Notebook } from "../format.ts";
import { titleOf } from "../title.ts";
import { codeHtml } from "./code.ts";
import { escapeHtml } from "./escape.ts";
import { markdownHtml } from "./markdown.ts";
import { outputHtml } from "./output.ts";
import { pageStyle } from "./style.ts";
import { plainText } from "./terminal.ts";

export interface PageOptions {
  /** Title if the notebook names none and has no heading. */
  readonly name: string;
  /** A line at the end: what computed the page, by which conventions. */
  readonly colophon?: string;
}

/** Nothing is fetched and nothing runs: styles and pictures stand in the page itself. */
const POLICY =
  "default-src 'none'; style-src 'unsafe-inline'; img-src data:; font-src data:; base-uri 'none'; form-action 'none'";

/** The whole HTML page of a notebook. */
export function notebookPage(notebook: Notebook, { name, colophon = "" }: PageOptions): string {
  const title = titleOf(notebook) ?? name;
  const headed = notebook.cells.some((cell) => cell.cell_type === "markdown" && /^#\s/m.test(cell.source));
  const body = notebook.cells.map((cell, index) => cellHtml(cell, index + 1)).filter((html) => html !== "");
  return `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta http-equiv="Content-Security-Policy" content="${POLICY}">
<meta name="viewport" content="width=device-width, initial-scale=1">
<title>${escapeHtml(title)}</title>
<style>
${pageStyle()}</style>
</head>
<body>
<main>
${headed ? "" : `<h1>${escapeHtml(title)}</h1>\n`}${body.join("\n")}
</main>
${colophon ? `<footer><p>${escapeHtml(colophon)}</p></footer>\n` : ""}</body>
</html>
`;
}

function cellHtml(cell: Cell, position: number): string {
  if (isCode(cell)) return codeCellHtml(cell, position);
  if (cell.cell_type === "raw" || cell.source.trim() === "") return "";
  return `<section class="prose">\n${markdownHtml(cell.source, cell.attachments)}</section>`;
}

function codeCellHtml(cell: CodeCell, position: number): string {
  const count = cell.execution_count;
  const label = count === null ? "a cell that was not run" : `cell ${count}`;
  const shown = cell.outputs.map((output, index) => outputHtml(output, { name: `o${position}-${index + 1}`, label }));
  const code = isHidden(cell, "source_hidden") || cell.source.trim() === "" ? "" : sourceHtml(cell.source, count);
  const outputs = isHidden(cell, "outputs_hidden") ? "" : shown.filter((html) => html !== "").join("\n");
  if (code === "" && outputs === "") return "";
  return `<section class="step" id="cell-${position}" aria-label="${label}">\n${code}${outputs}\n</section>`;
}

function sourceHtml(source: string, count: number | null): string {
  const number = count === null ? "" : `<span class="count" aria-hidden="true">(${count})</span>`;
  return `<div class="code"><pre><code>${codeHtml(plainText(source))}</code></pre>${number}</div>\n`;
}

/** The fields by which the format says that a part of a cell is folded away. */
function isHidden(cell: CodeCell, field: "source_hidden" | "outputs_hidden"): boolean {
  const { jupyter } = cell.metadata;
  return typeof jupyter === "object" && jupyter !== null && (jupyter as Record<string, unknown>)[field] === true;
}
