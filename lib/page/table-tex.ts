import { type Decimal, texDecimalLine } from "./digits.ts";
import type { Cell, Show } from "./kind.ts";
import type { Table } from "./table.ts";
import { type Column, layout, type NumberWidths } from "./table-layout.ts";
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
  const re = cell.re ? aligned(cell.re, column.re) : "";
  if (!cell.im) return re;
  const { negative } = cell.im;
  const joint = cell.re ? (negative ? " - " : " + ") : negative ? "-" : "";
  const im = aligned({ ...cell.im, negative: false }, column.im && { ...column.im, signed: false });
  return `${re}${joint}${im}\\,i`;
}

function aligned(decimal: Decimal, widths: NumberWidths | undefined): string {
  const line = texDecimalLine(decimal);
  if (!widths) return line;
  const blanks = `${widths.signed && !decimal.negative ? "-" : ""}${"0".repeat(widths.integer - decimal.integer.length)}`;
  return `${blanks === "" ? "" : `\\phantom{${blanks}}`}${line}`;
}
