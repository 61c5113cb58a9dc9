// The stored outputs of a cell beside those of a fresh run.
import { type CodeCell, hasTag, isCode, type Notebook, type Output } from "../format.ts";
import { plainText } from "../page/terminal.ts";
import { VALUE_TYPE } from "../values.ts";
import { compareData } from "./data.ts";
import { SAME, type Verdict, verdict, worst } from "./verdict.ts";

/** Tag by which a cell asks that its printed words stay as they are. */
export const EXACT_WORDS = "same-words";

export interface CellVerdict extends Verdict {
  /** Place among the code cells that hold code, from 1. */
  readonly position: number;
  readonly source: string;
}

export interface CompareOptions {
  /** Digits that the fresh run was asked for, if it overrides the notebook's own. */
  readonly digits?: number;
}

/** Verdicts on all code cells of a notebook against a fresh run of the same cells. */
export function compareNotebooks(stored: Notebook, fresh: Notebook, options: CompareOptions = {}): CellVerdict[] {
  const before = stored.cells.filter(isCode).filter((cell) => cell.source.trim() !== "");
  const now = fresh.cells.filter(isCode).filter((cell) => cell.source.trim() !== "");
  return before.map((cell, index) => {
    const again = now[index];
    const found = again ? compareCells(cell, again, options) : verdict("fails", "the cell was not run");
    return { position: index + 1, source: cell.source, ...found };
  });
}

function compareCells(stored: CodeCell, fresh: CodeCell, { digits = Infinity }: CompareOptions): Verdict {
  const failed = fresh.outputs.find((output) => output.output_type === "error");
  const meant = hasTag(stored, "raises-exception");
  if (failed && !meant) return verdict("fails", `${failed.ename}: ${failed.evalue}`);
  if (fresh.execution_count === null) return verdict("fails", "not run, since a cell above failed");
  if (stored.execution_count === null && stored.outputs.length === 0) {
    return verdict("differs", "no result is stored; run the notebook first");
  }
  const [before, now] = [valuesOf(stored), valuesOf(fresh)];
  if (before.length !== now.length) return verdict("differs", `had ${before.length} values, has ${now.length}`);
  const values = before.map((value, index) => compareData(value, now[index], "value", digits));
  return worst([...values, compareWords(stored, fresh)]);
}

function valuesOf(cell: CodeCell): unknown[] {
  return cell.outputs.flatMap((output) =>
    "data" in output && VALUE_TYPE in output.data ? [output.data[VALUE_TYPE]] : [],
  );
}

/** Words of outputs that carry no data: printed text, and results of plain JavaScript. */
function compareWords(stored: CodeCell, fresh: CodeCell): Verdict {
  const [before, now] = [stored.outputs.map(wordsOf).join(""), fresh.outputs.map(wordsOf).join("")];
  if (before === now) return SAME;
  const note = `printed text: ${firstDifference(before, now)}`;
  return verdict(hasTag(stored, EXACT_WORDS) ? "differs" : "other words", note);
}

function wordsOf(output: Output): string {
  if (output.output_type === "stream") return plainText(output.text);
  if (output.output_type === "error") return `${output.ename}: ${output.evalue}\n`;
  return VALUE_TYPE in output.data ? "" : `${String(output.data["text/plain"] ?? "")}\n`;
}

function firstDifference(before: string, now: string): string {
  const [old, fresh] = [before.split("\n"), now.split("\n")];
  const line = old.findIndex((text, index) => text !== fresh[index]);
  const at = line < 0 ? old.length : line;
  return `line ${at + 1} was ${JSON.stringify(cut(old[at]))}, is ${JSON.stringify(cut(fresh[at]))}`;
}

function cut(text = ""): string {
  return text.length > 60 ? `${text.slice(0, 57)}...` : text;
}
