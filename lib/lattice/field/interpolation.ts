// The numerator of a function with given zeros: A + B℘′ with a pole at 0 only, by linear algebra.
//
// Among 1, ℘, ℘′, ℘², ℘℘′, ... (pole orders 0, 2, 3, 4, 5, ...) the first n span the functions whose only pole is one of order <= n at 0.
// Exactly one of them, up to a factor, vanishes at n − 1 given points (Riemann–Roch); it then has order n at 0, and an n-th zero at minus
// their sum. Multiple zeros ask for vanishing Taylor coefficients.

import type { Field } from "../../algebra/field.ts";
import type { Disc } from "../../number/disc.ts";
import * as disc from "../../number/disc.ts";
import { PrecisionError } from "../../proof/errors.ts";
import { mulSeries, wpAtPoint } from "./laurent.ts";

/** A point with ℘ = x, ℘′ = y, and how often the function is to vanish there. */
export interface Condition<T> {
  readonly x: T;
  readonly y: T;
  readonly multiplicity: number;
}

/** A and B by rising powers of ℘. */
export interface Numerator<T> {
  readonly A: readonly T[];
  readonly B: readonly T[];
}

/**
 * The function of order n at 0, leading term t^−n, that vanishes as asked; conditions beyond n − 1 are left out, as Abel's theorem
 * implies them.
 * Throws   PrecisionError where enclosures leave no pivot.
 */
export function numerator<T>(
  F: Field<T>,
  g2: T,
  n: number,
  conditions: readonly Condition<T>[],
  size: (value: T) => number,
): Numerator<T> {
  const rows = conditions.flatMap((c) => rowsAt(F, g2, n, c)).slice(0, n - 1);
  const solution = nullVector(F, rows, n, size);
  // The element of pole order n is the last; ℘^k ~ t^−2k, ℘^k ℘′ ~ −2 t^(−2k−3).
  const top = n % 2 === 0 ? F.one : F.mul(F.fromInt(-1n), F.inv(F.fromInt(2n)));
  const scaled = solution.map((c) => F.mul(c, top));
  const at = (order: number) => (order === 0 ? scaled[0]! : (scaled[order - 1] ?? F.zero));
  const A = Array.from({ length: Math.floor(n / 2) + 1 }, (_, k) => at(2 * k));
  const B = n < 3 ? [] : Array.from({ length: Math.floor((n - 3) / 2) + 1 }, (_, k) => at(2 * k + 3));
  return { A, B };
}

/** The conditions at one point: Taylor coefficients 0 .. multiplicity − 1 of each basis function. */
function rowsAt<T>(F: Field<T>, g2: T, n: number, { x, y, multiplicity }: Condition<T>): T[][] {
  const m = multiplicity;
  const X = wpAtPoint(F, g2, x, y, m + 1);
  const Y = X.slice(1).map((c, i) => F.mul(F.fromInt(BigInt(i + 1)), c));
  const powers: T[][] = [[F.one]];
  for (let k = 1; 2 * k <= n; k++) powers.push(mulSeries(F, powers[k - 1]!, X, m));
  const functions: (readonly T[])[] = [[F.one]];
  for (let order = 2; order <= n; order++) {
    const even = order % 2 === 0;
    functions.push(even ? powers[order / 2]! : mulSeries(F, powers[(order - 3) / 2]!, Y, m));
  }
  return Array.from({ length: m }, (_, i) => functions.map((f) => f[i] ?? F.zero));
}

/** The solution of n − 1 homogeneous equations in n unknowns with last coordinate 1, by elimination with the largest pivots. */
function nullVector<T>(F: Field<T>, rows: readonly (readonly T[])[], n: number, size: (value: T) => number): T[] {
  const work = rows.map((row) => [...row]);
  const pivots: number[] = [];
  for (let k = 0; k < n - 1; k++) {
    let best = k;
    for (let r = k; r < n - 1; r++) if (size(work[r]![k]!) > size(work[best]![k]!)) best = r;
    if (size(work[best]![k]!) === Number.NEGATIVE_INFINITY) throw noPivot();
    [work[k], work[best]] = [work[best]!, work[k]!];
    pivots.push(k);
    const row = work[k]!;
    const inverse = F.inv(row[k]!);
    for (let c = k; c < n; c++) row[c] = c === k ? F.one : F.mul(row[c]!, inverse);
    for (let r = 0; r < n - 1; r++) {
      if (r === k) continue;
      const factor = work[r]![k]!;
      for (let c = k; c < n; c++) work[r]![c] = c === k ? F.zero : F.sub(work[r]![c]!, F.mul(factor, row[c]!));
    }
  }
  return [...work.map((row) => F.neg(row[n - 1]!)), F.one];
}

function noPivot(): PrecisionError {
  return new PrecisionError({
    subject: "elliptic",
    given: "zeros and poles that enclosures do not tell apart",
    expected: "different points, or the same ones with multiplicity",
  });
}

/** Lower bound of the size of an enclosure, in bits: minus infinity if it holds 0. */
export function discSize(d: Disc): number {
  return disc.containsZero(d) ? Number.NEGATIVE_INFINITY : disc.magnitude(d);
}

/** Π (X − x_k) by rising powers. */
export function productOfLinear<T>(F: Field<T>, roots: readonly T[]): T[] {
  let p: T[] = [F.one];
  for (const root of roots) {
    p = Array.from({ length: p.length + 1 }, (_, k) => F.sub(p[k - 1] ?? F.zero, F.mul(root, p[k] ?? F.zero)));
  }
  return p;
}
