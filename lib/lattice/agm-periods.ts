// Periods from the roots of the cubic by arithmetic-geometric means.
//
// Real cubics (Cohen, A Course in Computational Algebraic Number Theory, 7.4.7, for 4x³ − g2 x − g3):
//   Δ > 0, e1 > e2 > e3:  ω1 = π/agm(√(e1−e3), √(e1−e2)),  ω2 = iπ/agm(√(e1−e3), √(e2−e3))
//   Δ < 0, e real, D = |e − e′|²:  ω1 = 2π/agm(2√b, √(2b+3e)),  ω2 = ω1/2 + iπ/agm(2√b, √(2b−3e)),  b = √D
// where (2b)² − (3e)² = |δ|² gives the smaller of 2b ± 3e without cancellation.
//
// Complex cubics (Cremona and Thongjunthug, The complex AGM, periods of elliptic curves over C and complex elliptic
// logarithms, J. Number Theory 133 (2013), section 3): with the right choice at every step, |a−b| <= |a+b|, the numbers
//   w1 = π/M(√(e−e″), √(e−e′)),  w3 = iπ/M(√(e−e″), √(e′−e″))
// are shortest vectors of two different nontrivial classes of Λ/2Λ, hence a basis: the classes' shortest vectors are the
// Voronoi-relevant ones (Voronoi), and with a tie (rectangular lattices only) every choice still leaves a basis. A sign that rounding
// leaves open is within 2^−20 of such a tie, and then the lattice is within that distance of a rectangular one, where both choices
// were good; so no sign needs more precision than the enclosure has.

import { lowMagnitude } from "../function/enclosure.ts";
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { PrecisionError } from "../proof/errors.ts";
import { type CubicRoots, rootOffCut } from "./cubic.ts";

/** Full periods with Im(ω2/ω1) > 0. */
export interface PeriodPair {
  readonly w1: Disc;
  readonly w2: Disc;
}

/**
 * The real basis of the lattice of a real cubic: ω1 > 0 least real, Re ω2 = 0 (two components) or ω1/2 (one).
 *
 * Domain   real roots data; `components` is 2 for Δ > 0 and 1 for Δ < 0, decided by the caller exactly.
 * Error    enclosures, about 2^−prec relative.
 * Cost     two real means, four square roots.
 */
export function realPeriods(roots: CubicRoots, components: 1 | 2, prec: number): PeriodPair {
  const wp = prec + 16;
  return components === 2 ? twoComponents(roots, wp) : oneComponent(roots, wp);
}

function twoComponents({ root, gap, minus, plus }: CubicRoots, wp: number): PeriodPair {
  const pi = ball.pi(wp);
  const [e, d] = [disc.real(root), disc.real(gap)];
  const [m, p] = [disc.real(minus), disc.real(plus)];
  // Outer root on the right: e1−e2 = (3e−δ)/2, e1−e3 = (3e+δ)/2, e2−e3 = δ; on the left the mirror image.
  const right = e.man > 0n;
  const wide = ball.sqrt(right ? p : ball.neg(m), wp);
  const upper = ball.sqrt(right ? m : d, wp);
  const lower = ball.sqrt(right ? d : ball.neg(p), wp);
  const w1 = ball.div(pi, ball.agm(wide, upper, wp), wp);
  const height = ball.div(pi, ball.agm(wide, lower, wp), wp);
  return { w1: disc.fromBall(w1), w2: disc.imaginary(height) };
}

function oneComponent({ root, product, gap }: CubicRoots, wp: number): PeriodPair {
  const pi = ball.pi(wp);
  const b = ball.sqrt(disc.real(product), wp);
  const triple = ball.mulInt(disc.real(root), 3n, wp);
  const twice = ball.ldexp(b, 1);
  const large = ball.add(twice, ball.abs(triple), wp);
  const gapSize = disc.imag(gap);
  const small = ball.div(ball.mul(gapSize, gapSize, wp), large, wp);
  const right = triple.man >= 0n;
  const mean = (x: ball.Ball) => ball.agm(ball.ldexp(ball.sqrt(b, wp), 1), ball.sqrt(x, wp), wp);
  const half = ball.div(pi, mean(right ? large : small), wp);
  const height = ball.div(pi, mean(right ? small : large), wp);
  return { w1: disc.fromBall(ball.ldexp(half, 1)), w2: disc.fromBalls(half, height) };
}

/**
 * A basis of the lattice of any cubic, of shortest vectors of two classes of Λ/2Λ.
 *
 * Error    enclosures, about 2^−prec relative.
 * Cost     two complex means.
 */
export function complexPeriods(roots: CubicRoots, prec: number): PeriodPair {
  const wp = prec + 16;
  const pi = disc.fromBall(ball.pi(wp));
  const a = rootOffCut(roots.plus, wp);
  const w1 = disc.div(pi, rightMean(a, rootOffCut(roots.minus, wp), wp), wp);
  const w3 = disc.mulI(disc.div(pi, rightMean(a, rootOffCut(roots.gap, wp), wp), wp));
  const area = disc.imag(disc.mul(w3, disc.conj(w1), wp));
  const orientation = ball.sign(area);
  if (orientation === undefined || orientation === 0) throw tooCoarse();
  return { w1, w2: orientation === 1 ? w3 : disc.neg(w3) };
}

/**
 * The arithmetic-geometric mean with the right choice at every step, of either sign of b at the start.
 *
 * Error    each step is a mean and a square root of discs. It ends at x = (a−b)/(a+b), |x| < 2^(−wp/10), with
 *          M(a, b) = (a+b)/2 / F, F = Σ c_k² x^(2k), c_k = C(2k, k)/4^k (DLMF 19.8.5 with 19.5.1); the terms from k = 5 on are at most
 *          |x|^10/(1 − |x|²) together.
 * Source   Cox, The arithmetic-geometric mean of Gauss, Enseign. Math. 30 (1984), for the right choice.
 */
export function rightMean(a: Disc, b: Disc, wp: number): Disc {
  for (let step = 0; step < 200; step++) {
    // The argument of the header for signs that stay open asks for this much.
    if (Math.min(disc.bits(a), disc.bits(b)) < 20) throw tooCoarse();
    if (awayFrom(a, b)) b = disc.neg(b);
    const sum = disc.add(a, b, wp);
    const difference = disc.sub(a, b, wp);
    const near = lowMagnitude(sum) - disc.magnitude(difference);
    if (!(near > -4)) throw tooCoarse();
    if (10 * near > wp || difference.rad * 16 > sizeInUlps(difference)) return closedMean(sum, difference, wp);
    b = rootOffCut(disc.mul(a, b, wp), wp);
    a = disc.ldexp(sum, -1);
  }
  throw tooCoarse();
}

/** Re(b conj a) < 0 for the midpoints, the imaginary part of b/a deciding an exact tie. */
function awayFrom(a: Disc, b: Disc): boolean {
  const dot = a.re * b.re + a.im * b.im;
  return dot < 0n || (dot === 0n && a.re * b.im - a.im * b.re < 0n);
}

function sizeInUlps(x: Disc): number {
  return Math.abs(Number(x.re)) + Math.abs(Number(x.im));
}

/** Numerators over 2^14 of c_1² .. c_4²: 1/4, 9/64, 25/256, 1225/16384. */
const SQUARES = [4096n, 2304n, 1600n, 1225n];

function closedMean(sum: Disc, difference: Disc, wp: number): Disc {
  const half = disc.ldexp(sum, -1);
  const x = disc.div(difference, sum, wp);
  const size = ball.upper(disc.abs(x, 53));
  if (!(ball.magnitude(size) <= -1)) throw tooCoarse();
  const square = disc.sqr(x, wp);
  let series = disc.zero;
  for (let k = SQUARES.length - 1; k >= 0; k--) {
    series = disc.mul(square, disc.add(disc.fromBall({ man: SQUARES[k]!, exp: -14, rad: 0 }), series, wp), wp);
  }
  // |x| <= 1/2: the rest is at most 2 |x|^10.
  const rest = ball.ldexp(ball.pow(size, 10, 53), 1);
  const bottom = disc.add(disc.one, series, wp);
  return disc.div(half, ball.isZero(size) ? bottom : disc.widenBy(bottom, rest, wp), wp);
}

function tooCoarse(): PrecisionError {
  return new PrecisionError({
    subject: "periods",
    given: "invariants or roots too coarse for the mean to converge on one period",
    expected: "enclosures small beside the distance of the roots",
    hint: "Give them with more digits, or exactly.",
  });
}
