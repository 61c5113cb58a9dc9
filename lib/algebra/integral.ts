// Clearing denominators: the simplest multiple of a vector or of several forms over Q.

import { Quadratic } from "../number/quadratic.ts";
import { gcd, Rational } from "../number/rational.ts";
import { lcm } from "./integer.ts";
import type { Polynomial } from "./multivariate.ts";

/** The factor that makes rational (or quadratic) numbers coprime integers; 1 for other kinds and for zeros. Positive. */
export function clearingFactor(values: readonly unknown[]): Rational {
  const parts = values.flatMap((v) => (v instanceof Rational ? [v] : v instanceof Quadratic ? [v.a, v.b] : []));
  if (parts.length < values.length) return Rational.one;
  const denominator = parts.reduce((d, q) => lcm(d, q.den), 1n);
  const content = parts.reduce((g, q) => gcd(g, (q.num * denominator) / q.den), 0n);
  return content === 0n ? Rational.one : Rational.of(denominator, content);
}

/** Coefficients of several polynomials in one list. */
export function allCoefficients(forms: readonly Polynomial<unknown>[]): unknown[] {
  return forms.flatMap((f) => [...f.terms.values()]);
}
