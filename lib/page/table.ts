// Tables as values: the rows a user gives, kept as they are; how they look is decided when they are shown.

import type { ComplexNumeric } from "../number/values.ts";

/** What a cell may hold: numbers (literals count exactly as typed), values of the library, words, anything else. */
export type TableValue = ComplexNumeric | object | boolean | null | undefined;

/** A row: a list of cells, or cells by the name of their column. */
export type Row = readonly TableValue[] | Readonly<Record<string, TableValue>>;

/** How a table is headed and how many digits its numbers show. */
export interface TableOptions {
  readonly caption?: string;
  /** Heads of the columns; for rows by name, also which of them and in which order. */
  readonly columns?: readonly string[];
  /** Digits that numbers show which are not exact; else as many as each would show alone. */
  readonly digits?: number;
}

/** A table of values. */
export class Table {
  readonly caption: string;
  /** Empty if the columns have no names. */
  readonly columns: readonly string[];
  readonly rows: readonly (readonly unknown[])[];
  readonly digits: number | undefined;

  constructor(rows: readonly (readonly unknown[])[], options: TableOptions) {
    this.rows = rows;
    this.columns = options.columns ?? [];
    this.caption = options.caption ?? "";
    this.digits = options.digits;
  }
}

/**
 * A table of values with their digits under each other, one row a list or a record of cells. Names of columns and the
 * caption may hold $formulas$.
 *
 * A single record gives a table of two columns, its names and its values.
 *
 * Error    none of its own: each number is printed as it would be alone.
 * Throws   TypeError if the rows are not lists or records, or not as long as the list of columns.
 * @example table([{ n: 1, x: P.x }, { n: 2, x: (2 * P).x }], { caption: "Multiples of $P$" })
 */
export function table(rows: readonly Row[] | Readonly<Record<string, TableValue>>, options: TableOptions = {}): Table {
  if (!Array.isArray(rows)) {
    if (!isRecord(rows)) throw new TypeError(`table: expected a list of rows, got ${describe(rows)}`);
    return new Table(Object.entries(rows), options);
  }
  const lists = rows as readonly unknown[];
  if (lists.length > 0 && lists.every(isRecord)) return fromRecords(lists, options);
  if (!lists.every((row) => Array.isArray(row))) {
    const wrong = lists.find((row) => !Array.isArray(row));
    throw new TypeError(
      `table: expected every row to be a list of cells (or every row a record), got ${describe(wrong)}`,
    );
  }
  const cells = lists as readonly (readonly unknown[])[];
  const width = options.columns?.length;
  const odd = cells.find((row) => width !== undefined && row.length !== width);
  if (odd) throw new TypeError(`table: expected ${width} cells in each row, one a column, got a row of ${odd.length}`);
  return new Table(
    cells.map((row) => [...row]),
    options,
  );
}

function fromRecords(rows: readonly Readonly<Record<string, unknown>>[], options: TableOptions): Table {
  const columns = options.columns ?? [...new Set(rows.flatMap((row) => Object.keys(row)))];
  const cells = rows.map((row) => columns.map((column) => (Object.hasOwn(row, column) ? row[column] : undefined)));
  return new Table(cells, { ...options, columns });
}

/** A plain record: neither a list nor a value of a class. */
export function isRecord(value: unknown): value is Readonly<Record<string, unknown>> {
  if (typeof value !== "object" || value === null || Array.isArray(value)) return false;
  const prototype: unknown = Object.getPrototypeOf(value);
  return prototype === null || Object.getPrototypeOf(prototype) === null;
}

function describe(value: unknown): string {
  if (typeof value === "string") return JSON.stringify(value.slice(0, 40));
  return typeof value === "object" && value !== null ? "an object" : String(value);
}
