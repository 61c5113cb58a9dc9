import { type Decimal, plainDecimal } from "./digits.ts";
import type { Cell, Show } from "./kind.ts";
import { plainFormulas } from "./plain-formula.ts";
import type { Table } from "./table.ts";
import type { Column, NumberWidths } from "./table-column.ts";
import { layout } from "./table-layout.ts";

/** The table as lines of text, columns two spaces apart. */
export function tableText(table: Table, show: Show): string {
  const { columns, rows, omitted } = layout(table, show);
  const body = rows.map((row) => columns.map((column, k) => cellText(row[k], column)));
  const heads = columns.map(({ head }) => plainFormulas(head));
  const lines = heads.some((head) => head !== "") ? [heads, ...body] : body;
  const wide = columns.map((_, k) => Math.max(...lines.map((line) => width(line[k] ?? ""))));
  const text = lines.map((line) =>
    line
      .map((cell, k) => padEnd(cell, wide[k] ?? 0))
      .join("  ")
      .trimEnd(),
  );
  if (lines !== body) text.splice(1, 0, wide.map((n) => "-".repeat(n)).join("  "));
  const caption = table.caption === "" ? [] : [plainFormulas(table.caption)];
  return [...caption, ...text, ...(omitted > 0 ? [`... ${omitted} more rows`] : [])].join("\n");
}

function cellText(cell: Cell | undefined, column: Column): string {
  if (!cell) return "";
  if (cell.kind !== "number") return plainFormulas(cell.text).replace(/\s*\n\s*/g, "; ");
  const re = cell.re ? aligned(cell.re, column.re) : "";
  if (!cell.im) return re;
  const { negative } = cell.im;
  const joint = cell.re ? ` ${negative ? "-" : "+"} ` : negative ? "-" : "";
  return `${re}${joint}${aligned({ ...cell.im, negative: false }, column.im && { ...column.im, signed: false })} i`;
}

function aligned(decimal: Decimal, widths: NumberWidths | undefined): string {
  const text = plainDecimal({ ...decimal, negative: false });
  if (!widths) return plainDecimal(decimal);
  const sign = decimal.negative ? "-" : "";
  const before = " ".repeat(widths.integer - decimal.integer.length + (widths.signed && !decimal.negative ? 1 : 0));
  const missing = widths.fraction - decimal.fraction.length + (decimal.fraction === "" && widths.fraction > 0 ? 1 : 0);
  const [digits = "", tail] = text.split(/(?= ± )/);
  return `${before}${sign}${digits}${tail ? `${" ".repeat(missing)}${tail}` : ""}`;
}

function width(text: string): number {
  return [...text].length;
}

function padEnd(text: string, to: number): string {
  return text + " ".repeat(Math.max(0, to - width(text)));
}
