// The measures of a table that text, TeX and HTML share: which columns hold numbers, and how wide their parts are.

import { Complex, Real } from "../number/values.ts";
import { PrecisionError } from "../proof/errors.ts";
import type { Decimal } from "./digits.ts";
import type { Cell, Show } from "./kind.ts";
import type { Table } from "./table.ts";
import type { Column, NumberWidths } from "./table-column.ts";
import { fitted } from "./table-fit.ts";
import { texName } from "./tex.ts";

export interface Layout {
  readonly columns: readonly Column[];
  readonly rows: readonly (readonly Cell[])[];
  /** Whether a row fits a page. */
  readonly fits: boolean;
  /** Rows that are left out at the end. */
  readonly omitted: number;
}

const MOST_ROWS = 1000;

export function layout(table: Table, show: Show): Layout {
  const rows = table.rows
    .slice(0, MOST_ROWS)
    .map((row) => row.map((value) => cellOf(withDigits(value, table.digits), show)));
  const width = Math.max(table.columns.length, ...rows.map((row) => row.length));
  const columns = Array.from({ length: width }, (_, k) =>
    column(
      table.columns[k] ?? "",
      rows.map((row) => row[k]),
    ),
  );
  return { ...fitted(columns, rows), rows, omitted: table.rows.length - rows.length };
}

function cellOf(value: unknown, show: Show): Cell {
  if (value === undefined || value === null) return { kind: "words", text: "" };
  if (typeof value !== "string") return show.cell(value);
  return isSymbol(value) ? { kind: "formula", text: value, tex: texName(value) } : { kind: "words", text: value };
}

/** The value asked for so many digits, if it is a number that is not exact. */
function withDigits(value: unknown, digits: number | undefined): unknown {
  if (digits === undefined || !(value instanceof Real || value instanceof Complex) || value.exact) return value;
  // A hidden 0 has no digits of its own to ask for.
  try {
    return value.digits(digits);
  } catch (error) {
    if (error instanceof PrecisionError) return value;
    throw error;
  }
}

/** The name of a quantity, such as x, ω1 or g_2. */
function isSymbol(text: string): boolean {
  return /^\p{L}_?\d*′*$/u.test(text);
}

function column(head: string, cells: readonly (Cell | undefined)[]): Column {
  const numbers = cells.flatMap((cell) => (cell?.kind === "number" ? [cell] : []));
  const re = numberWidths(numbers.flatMap((cell) => cell.re ?? []));
  const im = numberWidths(numbers.flatMap((cell) => cell.im ?? []));
  return { head, stacked: false, groups: Number.POSITIVE_INFINITY, ...(re ? { re } : {}), ...(im ? { im } : {}) };
}

function numberWidths(decimals: readonly Decimal[]): NumberWidths | undefined {
  if (decimals.length === 0) return undefined;
  return {
    integer: Math.max(...decimals.map(({ integer }) => integer.length)),
    signed: decimals.some(({ negative }) => negative),
    fraction: Math.max(...decimals.map(({ fraction }) => fraction.length)),
    tail: Math.max(...decimals.map(tail)),
  };
}

function tail({ continues, exponent, radius }: Decimal): number {
  return (continues ? 1.5 : 0) + (exponent === 0 ? 0 : 5) + (radius === undefined ? 0 : 9);
}
