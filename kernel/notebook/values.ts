// The values that travel as data beside the readable outputs of a notebook, counted.
import { digitsOf, isNumberData, type NumberData } from "./check/number-data.ts";
import { isCode, type Notebook } from "./format.ts";

/** MIME type of a value as data: JSON in which every number is a string. */
export const VALUE_TYPE = "application/vnd.halfperiod.value+json";

export interface Tally {
  /** Claims by standing, each name once, the last word on it. */
  readonly claims: ReadonlyMap<string, number>;
  /** Least number of digits to which a claim is certified; undefined if none is. */
  readonly certified?: number;
  readonly exactNumbers: number;
  /** With exact input behind them, so that more digits can be asked for. */
  readonly definedNumbers: number;
  /** With a measurement or a double behind them. */
  readonly measuredNumbers: number;
  /** Least number of digits proved of a defined number; undefined if there is none. */
  readonly digits?: number;
}

/** Counts what a notebook's outputs claim and prove. */
export function tally(notebook: Notebook): Tally {
  const claims = new Map<string, Readonly<Record<string, unknown>>>();
  const numbers: NumberData[] = [];
  for (const value of storedValues(notebook)) {
    visit(value, (part) => {
      if (part.kind === "claim") claims.set(String(part.name), asFields(part.standing));
      else if (isNumberData(part)) numbers.push(part);
    });
  }
  const exact = numbers.filter((number) => digitsOf(number) === Number.POSITIVE_INFINITY);
  const defined = numbers.filter((number) => !exact.includes(number) && number.standing === "defined");
  // A value that is 0 within its radius has no digits of its own to count.
  const digits = defined.map(digitsOf).filter((count) => count > 0);
  const certified = [...claims.values()].filter(({ kind }) => kind === "certified").map(({ digits }) => Number(digits));
  const standings = new Map<string, number>();
  for (const { kind } of claims.values()) standings.set(String(kind), (standings.get(String(kind)) ?? 0) + 1);
  return {
    claims: standings,
    exactNumbers: exact.length,
    definedNumbers: defined.length,
    measuredNumbers: numbers.length - exact.length - defined.length,
    ...(certified.length > 0 ? { certified: Math.min(...certified) } : {}),
    ...(digits.length > 0 ? { digits: Math.min(...digits) } : {}),
  };
}

function storedValues(notebook: Notebook): unknown[] {
  const outputs = notebook.cells.filter(isCode).flatMap((cell) => cell.outputs);
  return outputs.flatMap((output) => ("data" in output ? [output.data[VALUE_TYPE]] : []));
}

/** Calls `see` for every object inside a value; what is inside a claim counts for the claim alone. */
function visit(value: unknown, see: (part: Readonly<Record<string, unknown>>) => void): void {
  if (typeof value !== "object" || value === null) return;
  if (Array.isArray(value)) {
    for (const part of value) visit(part, see);
    return;
  }
  const fields = asFields(value);
  see(fields);
  if (fields.kind === "claim") return;
  for (const part of Object.values(fields)) visit(part, see);
}

function asFields(value: unknown): Readonly<Record<string, unknown>> {
  return typeof value === "object" && value !== null ? (value as Readonly<Record<string, unknown>>) : {};
}
