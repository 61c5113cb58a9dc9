// Polynomials in one letter over a field: coefficients from the constant term up, no leading zero, [] for zero.

import type { Field } from "./field.ts";

export type Univariate<T> = readonly T[];

export function trim<T>(F: Field<T>, f: Univariate<T>): Univariate<T> {
  let n = f.length;
  while (n > 0 && F.isZero(f[n - 1]!)) n--;
  return n === f.length ? f : f.slice(0, n);
}

export function addUni<T>(F: Field<T>, f: Univariate<T>, g: Univariate<T>): Univariate<T> {
  const length = Math.max(f.length, g.length);
  return trim(
    F,
    Array.from({ length }, (_, k) => F.add(f[k] ?? F.zero, g[k] ?? F.zero)),
  );
}

export function subUni<T>(F: Field<T>, f: Univariate<T>, g: Univariate<T>): Univariate<T> {
  const length = Math.max(f.length, g.length);
  return trim(
    F,
    Array.from({ length }, (_, k) => F.sub(f[k] ?? F.zero, g[k] ?? F.zero)),
  );
}

export function mulUni<T>(F: Field<T>, f: Univariate<T>, g: Univariate<T>): Univariate<T> {
  if (f.length === 0 || g.length === 0) return [];
  const product: T[] = new Array(f.length + g.length - 1).fill(F.zero);
  f.forEach((a, i) => {
    if (F.isZero(a)) return;
    g.forEach((b, j) => {
      product[i + j] = F.add(product[i + j]!, F.mul(a, b));
    });
  });
  return trim(F, product);
}

export function scaleUni<T>(F: Field<T>, c: T, f: Univariate<T>): Univariate<T> {
  return trim(
    F,
    f.map((a) => F.mul(c, a)),
  );
}

export function powUni<T>(F: Field<T>, f: Univariate<T>, n: number): Univariate<T> {
  let result: Univariate<T> = [F.one];
  for (let k = 0; k < n; k++) result = mulUni(F, result, f);
  return result;
}

/** f = quotient·g + remainder with deg remainder < deg g. */
export function divideUni<T>(
  F: Field<T>,
  f: Univariate<T>,
  g: Univariate<T>,
): { readonly quotient: Univariate<T>; readonly remainder: Univariate<T> } {
  const lead = F.inv(g[g.length - 1]!);
  const rest = [...f];
  const quotient: T[] = new Array(Math.max(0, f.length - g.length + 1)).fill(F.zero);
  for (let k = f.length - g.length; k >= 0; k--) {
    const factor = F.mul(rest[k + g.length - 1]!, lead);
    quotient[k] = factor;
    if (F.isZero(factor)) continue;
    g.forEach((c, l) => {
      rest[k + l] = F.sub(rest[k + l]!, F.mul(factor, c));
    });
  }
  return { quotient: trim(F, quotient), remainder: trim(F, rest.slice(0, g.length - 1)) };
}

/** The monic greatest common divisor; [] only if both are zero. */
export function gcdUni<T>(F: Field<T>, f: Univariate<T>, g: Univariate<T>): Univariate<T> {
  let [a, b] = [trim(F, f), trim(F, g)];
  while (b.length > 0) [a, b] = [b, divideUni(F, a, b).remainder];
  return a.length === 0 ? a : monicUni(F, a);
}

export function monicUni<T>(F: Field<T>, f: Univariate<T>): Univariate<T> {
  return scaleUni(F, F.inv(f[f.length - 1]!), f);
}

export function deriveUni<T>(F: Field<T>, f: Univariate<T>): Univariate<T> {
  return trim(
    F,
    f.slice(1).map((c, k) => F.mul(F.fromInt(BigInt(k + 1)), c)),
  );
}

export function evaluateUni<T>(F: Field<T>, f: Univariate<T>, x: T): T {
  return f.reduceRight((total, c) => F.add(F.mul(total, x), c), F.zero);
}

/** f(g(x)). */
export function composeUni<T>(F: Field<T>, f: Univariate<T>, g: Univariate<T>): Univariate<T> {
  return f.reduceRight<Univariate<T>>((total, c) => addUni(F, mulUni(F, total, g), [c]), []);
}
