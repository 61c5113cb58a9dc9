// Writing a notebook the way front ends write it: sorted keys, one blank of indent, texts as lists of lines, so that
// a file that passes through this program and through a front end shows no differences but the real ones.
import type { Bundle, Cell, Notebook, Output } from "./format.ts";
import { isJsonMime } from "./parse.ts";

/** The text of the notebook's file, ending in a line feed. */
export function serialiseNotebook(notebook: Notebook): string {
  const stored = { ...notebook, cells: notebook.cells.map(storedCell) };
  return `${JSON.stringify(sorted(stored), null, 1)}\n`;
}

/** A text as the list of its lines, each with its line feed. */
export function splitLines(text: string): string[] {
  return text === "" ? [] : text.split(/(?<=\n)/);
}

function storedCell(cell: Cell): unknown {
  const source = splitLines(cell.source);
  return cell.cell_type === "code" ? { ...cell, source, outputs: cell.outputs.map(storedOutput) } : { ...cell, source };
}

function storedOutput(output: Output): unknown {
  if (output.output_type === "stream") return { ...output, text: splitLines(output.text) };
  if (output.output_type === "error") return output;
  return { ...output, data: storedBundle(output.data) };
}

function storedBundle(data: Bundle): Bundle {
  const lines = (mime: string, value: unknown) =>
    typeof value === "string" && !isJsonMime(mime) && !isBase64(mime) ? splitLines(value) : value;
  return Object.fromEntries(Object.entries(data).map(([mime, value]) => [mime, lines(mime, value)]));
}

/** Binary types travel as base64, one string; an SVG picture is text. */
function isBase64(mime: string): boolean {
  return !mime.startsWith("text/") && mime !== "image/svg+xml" && mime !== "application/javascript";
}

function sorted(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(sorted);
  if (typeof value !== "object" || value === null) return value;
  const entries = Object.entries(value).filter(([, part]) => part !== undefined);
  return Object.fromEntries(entries.sort(([a], [b]) => (a < b ? -1 : 1)).map(([key, part]) => [key, sorted(part)]));
}
