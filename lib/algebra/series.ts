// Power series in one letter, truncated: the local picture of a curve at a point.

import type { Field } from "./field.ts";
import type { Target } from "./multivariate.ts";

/** Coefficients of 1, ε, ε², ...; as many as the working length. */
export type Series<T> = readonly T[];

/** Power series over a field, kept to `length` coefficients. */
export function seriesRing<T>(F: Field<T>, length: number): Target<Series<T>> {
  return {
    zero: constantSeries(F, F.zero, length),
    one: constantSeries(F, F.one, length),
    add: (a, b) => a.map((c, k) => F.add(c, b[k]!)),
    mul: (a, b) => multiplySeries(F, a, b, length),
  };
}

export function constantSeries<T>(F: Field<T>, c: T, length: number): Series<T> {
  return Array.from({ length }, (_, k) => (k === 0 ? c : F.zero));
}

function multiplySeries<T>(F: Field<T>, a: Series<T>, b: Series<T>, length: number): Series<T> {
  const product: T[] = new Array(length).fill(F.zero);
  a.forEach((c, i) => {
    if (F.isZero(c)) return;
    for (let j = 0; i + j < length; j++) {
      const d = b[j]!;
      if (!F.isZero(d)) product[i + j] = F.add(product[i + j]!, F.mul(c, d));
    }
  });
  return product;
}

/** The derivative by ε, with as many coefficients (the last one is not known and left out of account by callers). */
export function deriveSeries<T>(F: Field<T>, a: Series<T>): Series<T> {
  return a.map((_, k) => (k + 1 < a.length ? F.mul(F.fromInt(BigInt(k + 1)), a[k + 1]!) : F.zero));
}

/** The index of the first nonzero coefficient, or Infinity. */
export function orderOf<T>(F: Field<T>, a: Series<T>): number {
  const k = a.findIndex((c) => !F.isZero(c));
  return k < 0 ? Infinity : k;
}
