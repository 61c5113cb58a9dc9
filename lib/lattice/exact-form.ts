// The quadratic form |Xω1 + Yω2|² of a lattice with exact periods, up to a rational factor.
import type { Gram } from "../function/matrix.ts";
import { exactForm } from "./build.ts";
import type { Given, RationalRows } from "./period-lattice.ts";

/** The form with integer coefficients, if the periods are exact numbers of one imaginary quadratic field. */
export function exactFormOf(given: Given): Gram | undefined {
  if (given.kind === "invariants") return undefined;
  if (given.kind === "periods") return exactForm(given.w1, given.w2);
  const base = exactFormOf(given.base.given);
  return base && formOn(base, given.rows);
}

/** The form of a sublattice or overlattice given by rows of rational coordinates. */
export function formOn({ A, B, C }: Gram, rows: RationalRows): Gram {
  const den = rows.flat().reduce((d, q) => d * q.den, 1n);
  const [[p, q], [r, s]] = rows.map((row) => row.map((x) => (x.num * den) / x.den)) as [
    [bigint, bigint],
    [bigint, bigint],
  ];
  const value = (x: bigint, y: bigint, u: bigint, v: bigint) => A * x * u + B * (x * v + y * u) + C * y * v;
  return { A: value(p, q, p, q), B: value(p, q, r, s), C: value(r, s, r, s) };
}
