// Isogenies from a kernel by Vélu's formulas, written with kernel polynomials so that no kernel point need be rational.

import { type Field, fraction, scale, sum } from "../algebra/field.ts";
import {
  addUni,
  deriveUni,
  divideUni,
  gcdUni,
  mulUni,
  powUni,
  scaleUni,
  subUni,
  type Univariate,
} from "../algebra/univariate.ts";
import { divisionPolynomials } from "./division.ts";
import { type Coefficients, invariantsOf, type ModelChange } from "./weierstrass.ts";

/** A finite subgroup of odd or even order, by the abscissas of its points. */
export interface Kernel<T> {
  /** Monic; roots are the x of the points of order two in the kernel (degree 0, 1 or 3). */
  readonly two: Univariate<T>;
  /** Monic; roots are the x of the other points but O, each pair ±P once. */
  readonly rest: Univariate<T>;
}

/** The normalised isogeny with a kernel: X = numerator/(two·rest²) as a function of x, and the long form it leads to. */
export interface Isogeny<T> {
  readonly kernel: Kernel<T>;
  readonly degree: number;
  readonly target: Coefficients<T>;
  readonly numerator: Univariate<T>;
}

export function kernelOrder<T>({ two, rest }: Kernel<T>): number {
  return 1 + (two.length - 1) + 2 * (rest.length - 1);
}

/**
 * Vélu's isogeny: it pulls dX/(2Y + a1X + a3) back to dx/(2y + a1x + a3) and keeps a1, a2, a3.
 *
 * With T = 6x² + b2x + b4, U = 4x³ + b2x² + 2b4x + b6 and sums over kernel abscissas q (those of order two with weight 1/2, where U = 0):
 *   X = x + Σ T(q)/(x − q) + U(q)/(x − q)², a4′ = a4 − 5 Σ T(q), a6′ = a6 − b2 Σ T(q) − 7 Σ (U(q) + q T(q)).
 * The sums are written through h′/h of the kernel polynomials h.
 *
 * Domain   characteristic not 2; the polynomials must belong to a subgroup (`isIsogeny` tells).
 * Source   Vélu 1971; Washington, Elliptic Curves, 12.3; Kohel's form with kernel polynomials.
 */
export function veluIsogeny<T>(F: Field<T>, a: Coefficients<T>, kernel: Kernel<T>): Isogeny<T> {
  const { b2, b4, b6 } = invariantsOf(F, a);
  const half = fraction(F, 1n, 2n);
  const parts = [
    { h: kernel.two, weight: half, withU: false },
    { h: kernel.rest, weight: F.one, withU: true },
  ];
  const T = [b4, b2, F.fromInt(6n)];
  const U = [b6, scale(F, 2, b4), b2, F.fromInt(4n)];
  let [t, w] = [F.zero, F.zero];
  const { two, rest } = kernel;
  const denominator = mulUni(F, two, mulUni(F, rest, rest));
  let numerator = mulUni(F, [F.zero, F.one], denominator);
  for (const { h, weight, withU } of parts) {
    const n = h.length - 1;
    if (n === 0) continue;
    const [p1, p2, p3] = powerSums(F, h);
    const sumT = sum(F, scale(F, 6, p2), F.mul(b2, p1), scale(F, n, b4));
    const sumQT = sum(F, scale(F, 6, p3), F.mul(b2, p2), F.mul(b4, p1));
    const sumU = sum(F, scale(F, 4, p3), F.mul(b2, p2), scale(F, 2, F.mul(b4, p1)), scale(F, n, b6));
    t = F.add(t, F.mul(weight, sumT));
    w = F.add(w, F.add(F.mul(weight, sumQT), withU ? sumU : F.zero));
    // Σ T(q)/(x − q) = (T h′ − (6nx + 6p1 + n b2) h)/h.
    const line = [F.add(scale(F, 6, p1), scale(F, n, b2)), F.fromInt(6n * BigInt(n))];
    const first = subUni(F, mulUni(F, T, deriveUni(F, h)), mulUni(F, line, h));
    const cofactor = divideUni(F, denominator, h).quotient;
    numerator = addUni(F, numerator, mulUni(F, cofactor, scaleUni(F, weight, first)));
    if (withU) numerator = addUni(F, numerator, mulUni(F, two, doublePoles(F, h, U, { p1, p2, n, b2, b4 })));
  }
  const target: Coefficients<T> = [
    a[0],
    a[1],
    a[2],
    F.sub(a[3], scale(F, 5, t)),
    sum(F, a[4], F.neg(F.mul(b2, t)), scale(F, -7, w)),
  ];
  return { kernel, degree: kernelOrder(kernel), target, numerator };
}

interface Sums<T> {
  readonly p1: T;
  readonly p2: T;
  readonly n: number;
  readonly b2: T;
  readonly b4: T;
}

/** h² Σ U(q)/(x − q)², the negative derivative of Σ U(q)/(x − q) = (U h′ − Q h)/h with Q = 4(nx² + p1x + p2) + b2(nx + p1) + 2n b4. */
function doublePoles<T>(
  F: Field<T>,
  h: Univariate<T>,
  U: Univariate<T>,
  { p1, p2, n, b2, b4 }: Sums<T>,
): Univariate<T> {
  const Q = [
    sum(F, scale(F, 4, p2), F.mul(b2, p1), scale(F, 2 * n, b4)),
    F.add(scale(F, 4, p1), scale(F, n, b2)),
    F.fromInt(4n * BigInt(n)),
  ];
  const g = subUni(F, mulUni(F, U, deriveUni(F, h)), mulUni(F, Q, h));
  return subUni(F, mulUni(F, g, deriveUni(F, h)), mulUni(F, deriveUni(F, g), h));
}

/** Sums of the first three powers of the roots of a monic polynomial, by Newton's identities. */
function powerSums<T>(F: Field<T>, h: Univariate<T>): [T, T, T] {
  const list = newtonSums(F, h, 3);
  return [list[1]!, list[2]!, list[3]!];
}

/** Σ q^k for k = 0..count over the roots of a monic polynomial. */
export function newtonSums<T>(F: Field<T>, h: Univariate<T>, count: number): T[] {
  const n = h.length - 1;
  const e = (k: number) => (k > n ? F.zero : k % 2 === 0 ? h[n - k]! : F.neg(h[n - k]!));
  const sums: T[] = [F.fromInt(BigInt(n))];
  for (let k = 1; k <= count; k++) {
    let total = F.zero;
    for (let i = 1; i < k; i++) {
      const term = F.mul(e(i), sums[k - i]!);
      total = i % 2 === 1 ? F.add(total, term) : F.sub(total, term);
    }
    const last = scale(F, k, e(k));
    sums.push(k % 2 === 1 ? F.add(total, last) : F.sub(total, last));
  }
  return sums;
}

export function denominatorOf<T>(F: Field<T>, { kernel: { two, rest } }: Isogeny<T>): Univariate<T> {
  return mulUni(F, two, mulUni(F, rest, rest));
}

/**
 * Whether X satisfies X′² (4x³ + b2x² + 2b4x + b6) = c²(4X³ + b2′X² + 2b4′X + b6′) with the target's b's, as it does exactly if the kernel
 * polynomials belong to a subgroup: then Y = (X′(2y + a1x + a3)/c − a1′X − a3′)/2 completes a map of curves that fixes O.
 */
export function isIsogeny<T>(F: Field<T>, a: Coefficients<T>, isogeny: Isogeny<T>, c = F.one): boolean {
  const { numerator: N } = isogeny;
  const D = denominatorOf(F, isogeny);
  const mul = (...factors: Univariate<T>[]) => factors.reduce((f, g) => mulUni(F, f, g));
  const slope = subUni(F, mul(deriveUni(F, N), D), mul(N, deriveUni(F, D)));
  const quartic = (b: { readonly b2: T; readonly b4: T; readonly b6: T }) => [
    b.b6,
    scale(F, 2, b.b4),
    b.b2,
    F.fromInt(4n),
  ];
  // Both sides times D⁴.
  const left = mul(slope, slope, quartic(invariantsOf(F, a)));
  const [c0, c1, c2, c3] = quartic(invariantsOf(F, isogeny.target)) as [T, T, T, T];
  const right = mul(
    D,
    [c3, c2, c1, c0].reduce<Univariate<T>>(
      (total, b, k) => addUni(F, mul(total, N), scaleUni(F, b, powUni(F, D, k))),
      [],
    ),
  );
  return subUni(F, left, scaleUni(F, F.mul(c, c), right)).length === 0;
}

/**
 * Numerator of Y over two²·rest³: (X′(2y + a1x + a3)/c − a1′X − a3′)/2 as [part without y, factor of y], for a map that multiplies
 * dz by c (a1′ and a3′ are those of the target; the normalised isogeny has c = 1).
 */
export function ordinateOf<T>(
  F: Field<T>,
  [a1, , a3]: Coefficients<T>,
  isogeny: Isogeny<T>,
  c = F.one,
): readonly [Univariate<T>, Univariate<T>] {
  const { numerator: N, kernel, target } = isogeny;
  const { two, rest } = kernel;
  const D = denominatorOf(F, isogeny);
  const mul = (...factors: Univariate<T>[]) => factors.reduce((f, g) => mulUni(F, f, g));
  // X′ = (N′D − ND′)/D², whose numerator is divisible by rest (D has rest squared).
  const derived = divideUni(F, subUni(F, mul(deriveUni(F, N), D), mul(N, deriveUni(F, D))), rest).quotient;
  const slope = scaleUni(F, F.inv(c), derived);
  const common = mul(two, two, rest, rest, rest);
  const half = fraction(F, 1n, 2n);
  const shift = addUni(F, scaleUni(F, target[0], mul(N, two, rest)), scaleUni(F, target[2], common));
  const free = subUni(F, mul(slope, [a3, a1]), shift);
  return [scaleUni(F, half, free), slope];
}

/** The change from the target of the dual's normalised form back to the curve itself: u = n. */
export function dualChange<T>(F: Field<T>, from: Coefficients<T>, to: Coefficients<T>, n: number): ModelChange<T> {
  const u = F.fromInt(BigInt(n));
  const half = fraction(F, 1n, 2n);
  const third = fraction(F, 1n, 3n);
  const u2 = F.mul(u, u);
  const s = F.mul(half, F.sub(F.mul(u, to[0]), from[0]));
  const r = F.mul(third, sum(F, F.mul(u2, to[1]), F.neg(from[1]), F.mul(s, from[0]), F.mul(s, s)));
  const t = F.mul(half, sum(F, F.mul(F.mul(u2, u), to[2]), F.neg(from[2]), F.neg(F.mul(r, from[0]))));
  return { u, r, s, t };
}

/** The abscissas of a kernel as one squarefree polynomial. */
export function abscissas<T>(F: Field<T>, { two, rest }: Kernel<T>): Univariate<T> {
  return mulUni(F, two, rest);
}

/** Splits the abscissas of a kernel into those of order two and the rest. */
export function kernelOf<T>(F: Field<T>, a: Coefficients<T>, polynomial: Univariate<T>): Kernel<T> {
  const { psi2Squared } = divisionPolynomials(F, a);
  const two = gcdUni(F, polynomial, psi2Squared);
  return { two, rest: divideUni(F, polynomial, two).quotient };
}
