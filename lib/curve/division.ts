// Division polynomials of a long Weierstrass model, and the points that a multiple divides into.

import { type Field, scale } from "../algebra/field.ts";
import { divideUni, mulUni, powUni, scaleUni, subUni, type Univariate } from "../algebra/univariate.ts";
import { type Coefficients, invariantsOf } from "./weierstrass.ts";

/**
 * The division polynomials as polynomials in x: f(n) = ψ_n for odd n and ψ_n/ψ_2 for even n, where
 * ψ_2² = (2y + a1x + a3)² = 4x³ + b2x² + 2b4x + b6.
 */
export interface DivisionPolynomials<T> {
  readonly psi2Squared: Univariate<T>;
  f(n: number): Univariate<T>;
}

/** Division polynomials by the recursion of Silverman AEC, exercise 3.7, each computed once. */
export function divisionPolynomials<T>(F: Field<T>, a: Coefficients<T>): DivisionPolynomials<T> {
  const { b2, b4, b6, b8 } = invariantsOf(F, a);
  const int = (n: number, c: T) => scale(F, n, c);
  const psi2Squared = [b6, int(2, b4), b2, F.fromInt(4n)];
  const squared = mulUni(F, psi2Squared, psi2Squared);
  const psi3 = [b8, int(3, b6), int(3, b4), b2, F.fromInt(3n)];
  const psi4 = [
    F.sub(F.mul(b4, b8), F.mul(b6, b6)),
    F.sub(F.mul(b2, b8), F.mul(b4, b6)),
    int(10, b8),
    int(10, b6),
    int(5, b4),
    b2,
    F.fromInt(2n),
  ];
  const known: Univariate<T>[] = [[], [F.one], [F.one], psi3, psi4];
  const f = (n: number): Univariate<T> => {
    const found = known[n];
    if (found) return found;
    const m = Math.floor(n / 2);
    const value = n % 2 === 1 ? odd(m) : even(m);
    known[n] = value;
    return value;
  };
  const mul = (...factors: Univariate<T>[]) => factors.reduce((product, g) => mulUni(F, product, g));
  // ψ_(2m+1) = ψ_(m+2) ψ_m³ − ψ_(m−1) ψ_(m+1)³; the factor ψ2⁴ falls to the term whose indices are even.
  const odd = (m: number): Univariate<T> => {
    const left = mul(f(m + 2), powUni(F, f(m), 3));
    const right = mul(f(m - 1), powUni(F, f(m + 1), 3));
    return m % 2 === 0 ? subUni(F, mul(squared, left), right) : subUni(F, left, mul(squared, right));
  };
  // ψ_(2m) ψ_2 = ψ_m (ψ_(m+2) ψ_(m−1)² − ψ_(m−2) ψ_(m+1)²).
  const even = (m: number): Univariate<T> =>
    mul(f(m), subUni(F, mul(f(m + 2), powUni(F, f(m - 1), 2)), mul(f(m - 2), powUni(F, f(m + 1), 2))));
  return { psi2Squared, f };
}

/** ψ_n² as a polynomial in x, for n >= 1. */
export function psiSquared<T>(F: Field<T>, polynomials: DivisionPolynomials<T>, n: number): Univariate<T> {
  const square = powUni(F, polynomials.f(n), 2);
  return n % 2 === 0 ? mulUni(F, square, polynomials.psi2Squared) : square;
}

/** φ_n with x(nP) = φ_n(x)/ψ_n(x)²: x ψ_n² − ψ_(n−1) ψ_(n+1). */
export function phi<T>(F: Field<T>, polynomials: DivisionPolynomials<T>, n: number): Univariate<T> {
  const product = mulUni(F, polynomials.f(n - 1), polynomials.f(n + 1));
  const neighbours = n % 2 === 1 ? mulUni(F, product, polynomials.psi2Squared) : product;
  return subUni(F, [F.zero, ...psiSquared(F, polynomials, n)], neighbours);
}

/** The polynomial whose roots are the x of the points Q with nQ = ±P, for x = x(P). */
export function divisionEquation<T>(F: Field<T>, polynomials: DivisionPolynomials<T>, n: number, x: T): Univariate<T> {
  return subUni(F, phi(F, polynomials, n), scaleUni(F, x, psiSquared(F, polynomials, n)));
}

/**
 * The primitive n-division polynomial: its roots are the x of the points of exact order n (n >= 2).
 * Each pair ±P once; points of order 2 from 4x³ + b2x² + 2b4x + b6.
 */
export function primitiveDivisionPolynomial<T>(
  F: Field<T>,
  polynomials: DivisionPolynomials<T>,
  n: number,
): Univariate<T> {
  if (n === 2) return polynomials.psi2Squared;
  let result = polynomials.f(n);
  for (let d = 3; d < n; d++) {
    if (n % d === 0) result = divideUni(F, result, primitiveDivisionPolynomial(F, polynomials, d)).quotient;
  }
  return result;
}
