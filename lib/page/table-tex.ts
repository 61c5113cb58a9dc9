import { type Decimal, texDecimal } from "./digits.ts";
import type { Cell, NumberCell, Show } from "./kind.ts";
import type { Table } from "./table.ts";
import { bothParts, type Column, type NumberWidths } from "./table-column.ts";
import { layout } from "./table-layout.ts";
import { array, texName, texProse, texWords } from "./tex.ts";

/** The table as an array; digits that are missing are set as blanks of the same width. */
export function tableTex(table: Table, show: Show): string {
  const { columns, rows, omitted } = layout(table, show);
  const body = rows.map((row) => columns.map((column, k) => cellTex(row[k], column)));
  const heads = columns.map(({ head }) => headTex(head));
  const lines = heads.some((head) => head !== "") ? [heads, ...body] : body;
  const grid = array("l".repeat(Math.max(1, columns.length)), lines);
  const ruled = lines === body ? grid : grid.replace(" \\\\ ", " \\\\ \\hline ");
  const rest = omitted > 0 ? [[texWords(`... ${omitted} more rows`)]] : [];
  const caption = table.caption === "" ? [] : [[texProse(table.caption)]];
  return caption.length + rest.length === 0 ? ruled : array("l", [...caption, [ruled], ...rest]);
}

export function headTex(head: string): string {
  if (head === "") return "";
  return head.includes("$") ? texProse(head) : texName(head);
}

function cellTex(cell: Cell | undefined, column: Column): string {
  if (!cell) return "";
  if (cell.kind === "words") return cell.text === "" ? "" : texProse(cell.text);
  if (cell.kind === "formula") return cell.tex;
  return numberTex(cell, column);
}

function numberTex({ re, im }: NumberCell, column: Column): string {
  const first = re ? aligned(re, column.re, column.groups) : "";
  if (!im) return first;
  if (!column.stacked) {
    const joint = re ? (im.negative ? " - " : " + ") : im.negative ? "-" : "";
    const second = aligned({ ...im, negative: false }, column.im && { ...column.im, signed: false }, column.groups);
    return `${first}${joint}${second}\\,i`;
  }
  const common = bothParts(column);
  const above = re ? [[aligned(re, common, column.groups)]] : [];
  const sign = im.negative ? "-" : re ? "+" : "";
  return array("l", [...above, [`${aligned(im, common, column.groups, sign)}\\,i`]]);
}

/** The number with blanks in place of a sign and of digits that it does not have. */
function aligned(decimal: Decimal, widths: NumberWidths | undefined, groups: number, sign?: string): string {
  const shown = sign ?? (decimal.negative ? "-" : "");
  // In braces a sign keeps to its number, whatever blanks stand before it.
  const line = texDecimal(decimal, groups, shown === "" ? "" : `{${shown}}`);
  if (!widths) return line;
  const missing = "0".repeat(Math.max(0, widths.integer - decimal.integer.length));
  const blanks = `${widths.signed && shown === "" ? "-" : ""}${missing}`;
  return `${blanks === "" ? "" : `\\phantom{${blanks}}`}${line}`;
}
