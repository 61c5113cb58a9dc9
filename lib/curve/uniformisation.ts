// A curve and its torus: x = ℘(z) − b2/12 and 2y + a1x + a3 = ℘′(z), with g2 = c4/12 and g3 = c6/216.

import { periods } from "../lattice/context.ts";
import type { PeriodLattice } from "../lattice/period-lattice.ts";
import { logarithm, realLogarithm } from "../lattice/real-logarithm.ts";
import type { Ball } from "../number/ball.ts";
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { asBall, asDisc, type Operation } from "../number/origin.ts";

/** A place on the real curve: z = t, or z = t + ω2/2 on the bounded component, with −ω1/2 < t < ω1/2. */
export interface RealPlace {
  readonly bounded: boolean;
  readonly t: Ball;
}

/**
 * z of a real point with ℘ = x and ℘′ = y, y ≠ 0, or undefined if the enclosure of t meets an end of its interval.
 * Throws   PrecisionError if the enclosures do not tell the component.
 */
export function realPlace(lattice: PeriodLattice, x: Ball, y: Ball, prec: number): RealPlace | undefined {
  const { component, t } = realLogarithm(lattice, x, y, prec);
  const half = ball.ldexp(disc.real(periods(lattice, prec).w1), -1);
  if (ball.compare(ball.abs(t), half) !== -1) return undefined;
  return { bounded: component === "bounded", t };
}

// t lies strictly inside its interval unless the point has order two, so some precision tells the representative.
const EXTRA_BITS = [0, 64, 256, 1024, 4096];

/** [lattice, ℘, ℘′]: the real number t of a real point that is not of order two. */
export const REAL_LOGARITHM: Operation = {
  name: "elliptic logarithm on its component",
  evaluate: ([lattice, x, y], at, prec) => {
    const [wp, prime] = [asBall(at(x)), asBall(at(y))];
    for (const extra of EXTRA_BITS) {
      const place = realPlace(lattice as PeriodLattice, wp, prime, prec + extra);
      if (place) return ball.round(place.t, prec);
    }
    // Coarse input near the end: one of the two representatives, by its midpoint.
    return realLogarithm(lattice as PeriodLattice, wp, prime, prec).t;
  },
};

/** [lattice, ℘, ℘′, anchor]: z of a complex point, the representative nearest to the anchor (a Complex value of few digits). */
export const COMPLEX_LOGARITHM: Operation = {
  name: "elliptic logarithm",
  evaluate: ([lattice, x, y, anchor], at, prec) => {
    const L = lattice as PeriodLattice;
    const z = logarithm(L, { x: asDisc(at(x)), y: asDisc(at(y)) }, prec + 8);
    const [s, t] = torusCoordinates(L, disc.sub(z, asDisc(at(anchor)), 64), 64);
    return shifted(L, z, -nearest(s), -nearest(t), prec);
  },
};

/** z of a complex point, the representative with coordinates in (−1/2, 1/2] by their midpoints. */
export function canonicalPlace(lattice: PeriodLattice, x: Disc, y: Disc, prec: number): Disc {
  const z = logarithm(lattice, { x, y }, prec);
  const [s, t] = torusCoordinates(lattice, z, prec);
  return shifted(lattice, z, -nearest(s), -nearest(t), prec);
}

/** Coordinates of z in the basis (ω1, ω2): z = s ω1 + t ω2. */
export function torusCoordinates(lattice: PeriodLattice, z: Disc, prec: number): readonly [Ball, Ball] {
  const { w1, w2 } = periods(lattice, prec + 8);
  const v = disc.div(z, w1, prec + 8);
  const tau = disc.div(w2, w1, prec + 8);
  const t = ball.div(disc.imag(v), disc.imag(tau), prec);
  return [ball.sub(disc.real(v), ball.mul(t, disc.real(tau), prec), prec), t];
}

/** z + m ω1 + n ω2. */
function shifted(lattice: PeriodLattice, z: Disc, m: bigint, n: bigint, prec: number): Disc {
  const { w1, w2 } = periods(lattice, prec + 8);
  return disc.add(z, disc.add(disc.mulInt(w1, m, prec + 8), disc.mulInt(w2, n, prec + 8), prec + 8), prec);
}

/** The integer nearest to the midpoint, halves downwards: −1/2 is moved to 1/2. */
function nearest(x: Ball): bigint {
  return BigInt(Math.ceil(ball.toDouble(x) - 0.5));
}

/** The multiple k of ω1/n that t is, for a t known to be one. */
export function torsionIndex(lattice: PeriodLattice, t: Ball, n: number, prec: number): bigint {
  const ratio = ball.div(ball.mulInt(t, BigInt(n), prec), disc.real(periods(lattice, prec).w1), prec);
  return BigInt(Math.round(ball.toDouble(ratio)));
}
