// The dual of an isogeny, and multiplication by n as a map: both from the division polynomials.

import { type Field, scale } from "../algebra/field.ts";
import {
  deriveUni,
  divideUni,
  gcdUni,
  monicUni,
  mulUni,
  powUni,
  scaleUni,
  subUni,
  trim,
  type Univariate,
} from "../algebra/univariate.ts";
import type { AbscissaMap } from "./abscissamap.ts";
import { divisionPolynomials, phi, psiSquared } from "./division.ts";
import { denominatorOf, type Isogeny, type Kernel } from "./isogeny.ts";
import type { Coefficients } from "./weierstrass.ts";

/**
 * The kernel of the dual, the image of the n-torsion: with X = N/D the abscissa of the isogeny, n points lie over each point R ≠ O of
 * it, so ψ_n²/(n²D) = ∏ (N − x(R) D) = Σ k_i N^i D^(n−1−i), where ∏ (X − x(R)) = Σ k_i X^i. The degrees of N^i D^(n−1−i) differ, so the
 * k_i are read off from the top. For odd n the square root of all that.
 *
 * Domain   n prime to the characteristic.
 */
export function dualKernel<T>(F: Field<T>, a: Coefficients<T>, isogeny: Isogeny<T>): Kernel<T> {
  const n = isogeny.degree;
  const polynomials = divisionPolynomials(F, a);
  const D = denominatorOf(F, isogeny);
  if (n % 2 === 1) {
    const others = divideUni(F, monicUni(F, polynomials.f(n)), isogeny.kernel.rest).quotient;
    return { two: [F.one], rest: expansion(F, others, isogeny.numerator, D, (n - 1) / 2) };
  }
  const others = divideUni(F, monicUni(F, psiSquared(F, polynomials, n)), D).quotient;
  const all = expansion(F, others, isogeny.numerator, D, n - 1);
  // Abscissas of points of order above two are double.
  const rest = gcdUni(F, all, deriveUni(F, all));
  return { two: divideUni(F, all, mulUni(F, rest, rest)).quotient, rest };
}

/** k_0, ..., k_m with G = Σ k_i N^i D^(m−i), where N has a degree one above that of D and both are monic. */
function expansion<T>(F: Field<T>, G: Univariate<T>, N: Univariate<T>, D: Univariate<T>, m: number): Univariate<T> {
  const coefficients: T[] = new Array<T>(m + 1).fill(F.zero);
  const lower = (D.length - 1) * m;
  let rest = G;
  for (let i = m; i >= 0; i--) {
    const c = rest[lower + i];
    if (c === undefined || F.isZero(c)) continue;
    coefficients[i] = c;
    rest = subUni(F, rest, scaleUni(F, c, mulUni(F, powUni(F, N, i), powUni(F, D, m - i))));
  }
  if (rest.length > 0) throw new Error("the points outside the kernel of an isogeny lie over its dual's kernel");
  return trim(F, coefficients);
}

/**
 * Multiplication by n as data of a map from the curve to itself: x ↦ φ_n/ψ_n², written like an isogeny with the kernel E[n]. It multiplies
 * dz by n.
 * Domain   n >= 2, prime to the characteristic.
 */
export function multiplicationBy<T>(F: Field<T>, a: Coefficients<T>, n: number): AbscissaMap<T> {
  const polynomials = divisionPolynomials(F, a);
  const rest = monicUni(F, polynomials.f(n));
  const two = n % 2 === 0 ? monicUni(F, polynomials.psi2Squared) : [F.one];
  const unit = F.inv(scale(F, n * n, F.one));
  return {
    source: a,
    kernel: { two, rest },
    degree: n * n,
    target: a,
    numerator: scaleUni(F, unit, phi(F, polynomials, n)),
    factor: F.fromInt(BigInt(n)),
  };
}
