// ℘ by its definition: a sum over the lattice points of a disc, and a bounded rest.
//
// With |z| < R/3, R in units in which the shortest period is at least 1, and the Laurent coefficients c_j z^j of ℘(z) − 1/z² (DLMF 23.9.1),
//     ℘(z) = 1/z² + Σ_{0<|ω|<R} [1/(z−ω)² − Σ_{j<J} (j+1) z^j/ω^(j+2)] + Σ_{j<J} c_j z^j + rest
// since Σ over all ω of (j+1) ω^(−j−2) is c_j (for j = 0 in the sense of 23.2.4: the bracket starts with −1/ω²). At most 4r² + 4r nonzero
// periods lie in |ω| < r (discs of radius 1/2 are disjoint), so Σ_{|ω|>=R} |ω|^−s <= 4s R^(2−s)/(s−2) + 4s R^(1−s)/(s−1) <= 16 R^(2−s) for
// s >= 5, R >= 4, and the rest is at most Σ_{j>=J} (j+1) |z|^j 16 R^−j <= 16 (J+1) (|z|/R)^J · 9/4 for |z|/R <= 1/3.

import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { PrecisionError } from "../proof/errors.ts";
import type { Invariants, ReducedLattice } from "./reduced.ts";
import { toCell } from "./weierstrass.ts";

/** More points than this are refused. */
const MOST_POINTS = 40_000;

/**
 * ℘(z) by the sum.
 *
 * Domain   z ∉ Λ; lattices whose points in the disc are few enough: τ up to about i·50.
 * Error    an enclosure, the rest of the sum included.
 * Cost     of the order of 400 lattice points with prec/log2(R/|z|) products each.
 * Throws   PrecisionError where the disc would hold more than 40000 points.
 */
export function byLatticeSum(l: ReducedLattice, { g2, g3 }: Invariants, z: Disc, prec: number): Disc {
  const { rest } = toCell(l, z, prec + 16);
  // τ has Im τ >= 0.84 and |Re τ| near or under 1/2: every period is at least 3/4 |r1|.
  const unit = ball.ldexp(ball.mulInt(disc.abs(l.r1, 53), 3, 53), -2);
  const size = ball.toDouble(ball.upper(ball.div(disc.abs(rest, 53), unit, 53)));
  const R = Math.max(8, Math.ceil(6 * size));
  const J = 2 * Math.ceil((prec + 24) / (2 * Math.log2(R / Math.max(size, R / 64))));
  const points = pointsWithin(l, unit, R);
  if (points.length > MOST_POINTS) throw tooMany();
  const wp = prec + 24 + Math.ceil(Math.log2(points.length + 1)) + 2 * Math.ceil(Math.log2(R));
  const square = disc.sqr(rest, wp);
  let sum = disc.add(disc.inv(square, wp), laurent(g2, g3, square, J, wp), wp);
  for (const w of points) sum = disc.add(sum, pair(w, square, J, wp), wp);
  const ratio = ball.upper(ball.div(disc.abs(rest, 53), ball.mulInt(unit, R, 53), 53));
  const bound = ball.mul(
    ball.pow(ratio, J, 53),
    ball.div(ball.fromInt(40 * (J + 1)), ball.mul(unit, unit, 53), 53),
    53,
  );
  return disc.round(disc.widenBy(sum, ball.upper(bound), wp, false), prec);
}

/** One of ±ω for all with 0 < |ω| < R units; a point at the rim is left out or taken, either is allowed. */
function pointsWithin(l: ReducedLattice, unit: ball.Ball, R: number): Disc[] {
  const [x, y] = disc.toDouble(l.tau);
  const limit = (R * ball.toDouble(ball.div(unit, disc.abs(l.r1, 53), 53))) ** 2;
  const list: Disc[] = [];
  for (let n = 0; (n * y) ** 2 < limit; n++) {
    const reach = Math.sqrt(limit - (n * y) ** 2);
    const start = n === 0 ? 1 : Math.ceil(-n * x - reach);
    for (let m = start; m < -n * x + reach; m++) {
      list.push(disc.add(disc.mulInt(l.r1, m, l.prec), disc.mulInt(l.r2, n, l.prec), l.prec));
      if (list.length > MOST_POINTS) return list;
    }
  }
  return list;
}

/** The brackets of ω and −ω together: 2(ω² + z²)/(ω² − z²)² − Σ_{j even < J} 2(j+1) z^j/ω^(j+2) = the sum from j = J on, closed. */
function pair(w: Disc, square: Disc, J: number, wp: number): Disc {
  const inverse = disc.inv(disc.sqr(w, wp), wp);
  const x = disc.mul(square, inverse, wp);
  const less = disc.sub(disc.one, x, wp);
  // Σ_{k>=K} (2k+1) x^k = x^K ((2K+1) − (2K−1)x)/(1−x)², K = J/2.
  const K = J / 2;
  const top = disc.sub(disc.fromBall(ball.fromInt(2 * K + 1)), disc.mulInt(x, 2 * K - 1, wp), wp);
  const tail = disc.div(disc.mul(disc.pow(x, K, wp), top, wp), disc.sqr(less, wp), wp);
  return disc.ldexp(disc.mul(inverse, tail, wp), 1);
}

/** Σ_{j<J} c_j z^j: c_2 = g2/20, c_4 = g3/28 and the recurrence of DLMF 23.9.7. */
function laurent(g2: Disc, g3: Disc, square: Disc, J: number, wp: number): Disc {
  const c: Disc[] = [
    disc.zero,
    disc.zero,
    disc.divBall(g2, ball.fromInt(20), wp),
    disc.divBall(g3, ball.fromInt(28), wp),
  ];
  let power = square;
  let sum = disc.zero;
  for (let k = 2; 2 * k - 2 < J; k++) {
    if (k > 3) c[k] = convolution(c, k, wp);
    sum = disc.add(sum, disc.mul(c[k]!, power, wp), wp);
    power = disc.mul(power, square, wp);
  }
  return sum;
}

function convolution(c: readonly Disc[], k: number, wp: number): Disc {
  let sum = disc.zero;
  for (let m = 2; m <= k - 2; m++) sum = disc.add(sum, disc.mul(c[m]!, c[k - m]!, wp), wp);
  return disc.divBall(disc.mulInt(sum, 3, wp), ball.fromInt((2 * k + 1) * (k - 3)), wp);
}

function tooMany(): PrecisionError {
  return new PrecisionError({
    subject: "lattice sum",
    given: "a cell so tall that its disc holds more than 40000 lattice points",
    expected: "a lattice with Im τ under 50 for its reduced τ",
    hint: 'The route "sum over rows" has no such limit.',
  });
}
