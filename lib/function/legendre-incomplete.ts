// Legendre's incomplete integrals through Carlson's.
//
// With s = sin φ, c = cos φ and Δ = √(1 − m s²) for |Re φ| <= π/2 (DLMF 19.25(i), each term divided by the powers of s):
//     F = s RF(c², Δ², 1),   D = s³/3 RD(c², Δ², 1),   B = m1 s³/3 RD(c², 1, Δ²) + s c/Δ,
//     E = F − m D = B + m1 D,   Π = F + n s³/3 RJ(c², Δ², 1, 1 − n s²).
// Elsewhere f(φ + kπ) = f(φ) + 2k f(π/2) for each of them. The integrals are functions of the root c, not of c²: where an enclosure
// of c crosses 0 the formulas go on analytically, so that the whole number k may be read off the midpoint.

import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { DomainError } from "../proof/errors.ts";
import type { Triple } from "./carlson-duplication.ts";
import { rfOfRoots } from "./carlson-first.ts";
import { carlsonRJ, rdOfRoots, rjOfRoots } from "./carlson-third.ts";
import { lowMagnitude, nearestInteger } from "./enclosure.ts";
import {
  type Characteristic,
  completeB,
  completeD,
  completeE,
  completeK,
  completePi,
  type Modulus,
  reciprocal,
} from "./legendre-complete.ts";
import { sidedRoot } from "./legendre-mean.ts";

const THREE = { man: 3n, exp: 0, rad: 0 };

/** φ = half-turns·π + rest with the sine, the cosine and Δ of the rest. */
export interface Amplitude {
  readonly halfTurns: bigint;
  readonly s: Disc;
  readonly c: Disc;
  readonly delta: Disc;
  /** c², Δ² and s². */
  readonly c2: Disc;
  readonly delta2: Disc;
  readonly s2: Disc;
}

/** The parts of φ. Throws DomainError for m sin²φ > 1 without a side. */
export function amplitude(phi: Disc, k: Modulus, wp: number): Amplitude {
  const { rest, halfTurns } = reduced(phi, wp);
  const { sin: s, cos: c } = disc.sinCos(rest, wp);
  const [s2, c2] = [disc.sqr(s, wp), disc.sqr(c, wp)];
  const delta2 = deltaSquare(k, s2, c2, wp);
  if (k.side === undefined && isNegative(delta2)) {
    throw new DomainError({
      subject: "incomplete integral",
      given: "m sin²φ > 1, beyond the branch point of the integrand",
      expected: "m sin²φ <= 1, or the side of the cut",
      hint: 'Say { phi, m, side: "above" } for the limit from Im m > 0 or side: "below" for its conjugate.',
      argument: "phi",
    });
  }
  // m + i0 puts Δ² = 1 − m s² below the negative axis.
  const delta = sidedRoot(delta2, k.side === 1 ? -1 : 1, wp);
  return { halfTurns, s, c, delta, c2, delta2, s2 };
}

function isNegative(x: Disc): boolean {
  return x.axis === "real" && x.re < 0n && !disc.containsZero(x);
}

/** sin φ, cos φ, their squares and Δ at φ itself, for the derivatives. */
export type AmplitudeParts = Pick<Amplitude, "s" | "c" | "delta" | "c2" | "s2">;

export function amplitudeParts(phi: Disc, k: Modulus, prec: number): AmplitudeParts {
  return amplitude(phi, k, prec + 8);
}

function reduced(phi: Disc, wp: number): { rest: Disc; halfTurns: bigint } {
  const pi = ball.pi(wp + Math.max(0, disc.magnitude(phi)) + 8);
  const turns = ball.div(disc.real(phi), pi, 64 + Math.max(0, disc.magnitude(phi)));
  const halfTurns = nearestInteger(turns);
  if (halfTurns === 0n) return { rest: phi, halfTurns };
  const shift = disc.fromBall(ball.mulInt(pi, halfTurns, wp + Math.max(0, disc.magnitude(phi)) + 8));
  return { rest: disc.sub(phi, shift, wp), halfTurns };
}

/** 1 − m s² = c² + m1 s², by the form that cancels less. */
function deltaSquare({ m, m1 }: Modulus, s2: Disc, c2: Disc, wp: number): Disc {
  const negative = m.axis === "real" && m.re <= 0n;
  const direct = negative || (m.axis !== "real" && disc.magnitude(m) < disc.magnitude(m1));
  if (direct) return disc.sub(disc.one, disc.mul(m, s2, wp), wp);
  return disc.add(c2, disc.mul(m1, s2, wp), wp);
}

/** The value at φ from that of the rest and the complete one. */
function continued(a: Amplitude, rest: Disc, complete: () => Disc, prec: number): Disc {
  if (a.halfTurns === 0n) return disc.round(rest, prec + 2);
  return disc.add(rest, disc.mulInt(complete(), 2n * a.halfTurns, prec + 8), prec + 2);
}

/**
 * F(φ | m) = ∫_0^φ dθ / √(1 − m sin²θ).
 *
 * Domain   1 − m sin²φ off the negative real axis; beyond |Re φ| = π/2 also m off [1, ∞).
 * Branch   odd in φ, F(φ + kπ) = F(φ) + 2k K; root with positive real part for |Re φ| <= π/2; for real m > 1 the limit from the side named.
 * Error    enclosure, relative; about 2^−prec for exact φ.
 * Cost     sine, cosine and an RF; with |Re φ| > π/2 also K.
 * Throws   DomainError and BranchError on the cut, PoleError if m = 1 and |Re φ| > π/2.
 * Source   DLMF 19.2.4, 19.25.5, 19.2.10.
 */
export function incompleteF(phi: Disc, k: Modulus, prec: number): Disc {
  if (disc.isZero(phi)) return disc.zero;
  const wp = prec + 16;
  const a = amplitude(phi, k, wp);
  return continued(a, partF(a, wp), () => completeK(k, wp), prec);
}

function partF({ s, c, delta, c2, delta2 }: Amplitude, wp: number): Disc {
  return disc.mul(s, rfOfRoots([c, delta, disc.one], wp, [c2, delta2, disc.one]), wp);
}

/** D(φ | m) = ∫_0^φ sin²θ dθ / √(1 − m sin²θ) = (F − E)/m without the cancellation; as F otherwise. */
export function incompleteD(phi: Disc, k: Modulus, prec: number): Disc {
  if (disc.isZero(phi)) return disc.zero;
  const wp = prec + 16;
  const a = amplitude(phi, k, wp);
  return continued(a, partD(a, wp), () => completeD(k, wp), prec);
}

function partD({ s, c, delta, c2, delta2, s2 }: Amplitude, wp: number): Disc {
  const rd = rdOfRoots([c, delta, disc.one], wp, [c2, delta2, disc.one]);
  return disc.divBall(disc.mul(disc.mul(s, s2, wp), rd, wp), THREE, wp);
}

/** B(φ | m) = ∫_0^φ cos²θ dθ / √(1 − m sin²θ) = (E − m1 F)/m without the cancellation; as F otherwise, m = 1 allowed. */
export function incompleteB(phi: Disc, k: Modulus, prec: number): Disc {
  if (disc.isZero(phi)) return disc.zero;
  const wp = prec + 16;
  const a = amplitude(phi, k, wp);
  return continued(a, partB(a, k, wp), () => completeB(k, wp), prec);
}

function partB({ s, c, delta, c2, delta2, s2 }: Amplitude, { m1 }: Modulus, wp: number): Disc {
  // m = 1: Δ = c and the integrand is cos θ.
  if (disc.isZero(m1)) return s;
  const rd = rdOfRoots([c, disc.one, delta], wp, [c2, disc.one, delta2]);
  const first = disc.divBall(disc.mul(disc.mul(disc.mul(m1, s, wp), s2, wp), rd, wp), THREE, wp);
  return disc.add(first, disc.div(disc.mul(s, c, wp), delta, wp), wp);
}

/**
 * E(φ | m) = ∫_0^φ √(1 − m sin²θ) dθ.
 *
 * Domain, Branch, Cost, Throws   as F with an RD; m = 1 allowed everywhere.
 * Error    enclosure; E = F − m D cancels nothing for real m <= 0, and 4 bits for 0 < m < 1 and Δ > 1/4, where Δ φ <= E and F <= φ/Δ make E/F >= Δ²
 *          (Δ falls on the way). For other m, B + m1 D where Δ is not small.
 * Source   DLMF 19.2.5, 19.25.9–19.25.11.
 */
export function incompleteE(phi: Disc, k: Modulus, prec: number): Disc {
  if (disc.isZero(phi)) return disc.zero;
  const wp = prec + 20;
  const a = amplitude(phi, k, wp);
  return continued(a, partE(a, k, wp), () => completeE(k, wp), prec);
}

function partE(a: Amplitude, k: Modulus, wp: number): Disc {
  if (disc.isZero(k.m1)) return a.s;
  // Real m < 1: F has a mean, so that F and D cost less than B and D.
  const below = k.m.axis === "real" && k.m1.axis === "real" && k.m1.re > 0n && !disc.containsZero(k.m1);
  const byB = lowMagnitude(a.delta) > -2 && !below;
  if (!byB) return disc.sub(partF(a, wp), disc.mul(k.m, partD(a, wp), wp), wp);
  return disc.add(partB(a, k, wp), disc.mul(k.m1, partD(a, wp), wp), wp);
}

/**
 * Π(n; φ | m) = ∫_0^φ dθ / ((1 − n sin²θ) √(1 − m sin²θ)).
 *
 * Domain   as F; 1 − n sin²θ ≠ 0 on the way. For real n sin²φ > 1 the value is Cauchy's principal value (|φ| <= π/2).
 * Branch   as F; the value along the path on which 1 − n sin²θ stays off the negative real axis.
 * Error    enclosure; relative to F where n < 0 is large.
 * Cost     an RF and an RJ.
 * Throws   as F and RJ.
 * Source   DLMF 19.2.7, 19.25.14.
 */
export function incompletePi(n: Characteristic, phi: Disc, k: Modulus, prec: number): Disc {
  if (disc.isZero(phi)) return disc.zero;
  const wp = prec + 16;
  const a = amplitude(phi, k, wp);
  return continued(a, partPi(a, n, k, wp), () => completePi(n, k, wp), prec);
}

function partPi(a: Amplitude, { n, n1 }: Characteristic, k: Modulus, wp: number): Disc {
  if (isNegative(a.delta2)) return partPiOnCut(a, { n, n1 }, k, wp);
  const first = partF(a, wp);
  if (disc.isZero(n)) return first;
  // One number, not two equal enclosures: then 1 − n s² is Δ², and RJ is an RD.
  if (n === k.m || disc.isZero(disc.sub(n, k.m, wp))) {
    const rd = rdOfRoots([a.c, disc.one, a.delta], wp, [a.c2, disc.one, a.delta2]);
    const second = disc.mul(disc.mul(n, disc.mul(a.s, a.s2, wp), wp), rd, wp);
    return disc.add(first, disc.divBall(second, THREE, wp), wp);
  }
  const p = deltaSquare({ m: n, m1: n1 }, a.s2, a.c2, wp);
  const third = disc.mul(disc.mul(n, disc.mul(a.s, a.s2, wp), wp), thirdKind(a, p, wp), wp);
  return disc.add(first, disc.divBall(third, THREE, wp), wp);
}

/**
 * Beyond sin θ = 1/√m the rest of the integral is ± i (Π(N | ρ) − Π(N; ψ | ρ))/(√m (1 − n)) with ρ = 1 − 1/m, sin ψ = cos φ/√ρ, as for the complete one.
 */
function partPiOnCut(a: Amplitude, characteristic: Characteristic, k: Modulus, wp: number): Disc {
  const { inner, outer, innerN, outerN } = reciprocal(k, characteristic, wp);
  const ratio = disc.div(a.c2, outer.m, wp);
  // Δ² of ψ: 1 − ρ sin²ψ = s².
  const psi: Amplitude = {
    halfTurns: 0n,
    s: disc.sqrt(ratio, wp),
    c: disc.sqrt(disc.sub(disc.one, ratio, wp), wp),
    delta: disc.sqrt(a.s2, wp),
    c2: disc.sub(disc.one, ratio, wp),
    delta2: a.s2,
    s2: ratio,
  };
  const outside = disc.sub(completePi(outerN, outer, wp), partPi(psi, outerN, outer, wp), wp);
  const tail = disc.mulI(disc.div(outside, characteristic.n1, wp));
  const sum = disc.add(completePi(innerN, inner, wp), k.side === 1 ? tail : disc.neg(tail), wp);
  const value = disc.div(sum, disc.sqrt(k.m, wp), wp);
  return a.s.re < 0n ? disc.neg(value) : value;
}

function thirdKind({ c, delta, c2, delta2 }: Amplitude, p: Disc, wp: number): Disc {
  const principal = p.axis === "real" && p.re < 0n;
  const squares: Triple = [c2, delta2, disc.one];
  if (principal) return carlsonRJ(...squares, p, wp);
  const real = c2.axis === "real" && delta2.axis === "real";
  return rjOfRoots([c, delta, disc.one, disc.sqrt(p, wp)], [...squares, p], wp, real);
}
