// Periods of a real cubic with sharp coefficients, in fixed point with one count of errors at the end.
//
// In the notation of fixed-cubic.ts steps of the mean up and down give (Cohen, A Course in Computational Algebraic Number Theory, 7.4.7)
//     Δ > 0:  ω = 2π/agm(√(3e+2b), 2√b),   height = π/agm(√(3e+2b), √(3e−2b))      Δ < 0:  ω, height = 2π, π over agm(2√b, √(2b±3e))

import type { Ball } from "../number/ball.ts";
import * as ball from "../number/ball.ts";
import * as disc from "../number/disc.ts";
import { agmFixed } from "../number/fixed/agm.ts";
import { bitLength, pow2, UP } from "../number/fixed/bits.ts";
import { sqrtNear } from "../number/fixed/isqrt.ts";
import { LONG } from "../number/fixed/means-series.ts";
import type { PeriodPair } from "./agm-periods.ts";
import { type Counted, fixedCubic, toDouble } from "./fixed-cubic.ts";
import { reciprocalMean } from "./reciprocal-mean.ts";

/** Guard bits: the mean of the kernel is off by up to 2^12 units, and the rest is less. */
const GUARD = 16;
/** Below this many bits there is nothing to gain. */
const SHORTEST = 64;

/**
 * The real basis of the lattice of 4x³ − g2 x − g3, as `realPeriods`.
 *
 * Domain   `components` is 2 for Δ > 0 and 1 for Δ < 0, decided by the caller exactly.
 * Error    enclosures; every step states what it adds.
 * Cost     that of `fixedCubic`, two means, two quotients.
 * @returns nothing for coefficients that are wide, or near a double root.
 */
export function fixedPeriods(g2: Ball, g3: Ball, components: 1 | 2, prec: number): PeriodPair | undefined {
  const cubic = fixedCubic(g2, g3, components, Math.max(SHORTEST, prec) + GUARD);
  if (!cubic) return undefined;
  const { W, half, right, wide, narrow, middle } = cubic;
  const over = (x: Counted, y: Counted) => ball.ldexp(overMean(x, y, W, prec + 8), -half);
  const far = over(middle, wide);
  const near = over(components === 2 ? wide : middle, narrow);
  if (components === 2) {
    const twice = ball.ldexp(far, 1);
    return right ? pair(twice, near) : pair(near, twice);
  }
  const [part, height] = right ? [far, near] : [near, far];
  return { w1: disc.fromBall(ball.ldexp(part, 1)), w2: disc.fromBalls(part, height) };
}

function pair(real: Ball, height: Ball): PeriodPair {
  return { w1: disc.fromBall(real), w2: disc.imaginary(height) };
}

/**
 * π over the arithmetic-geometric mean of numbers of at least 2^−5.
 * Error    that of `mean`, or of `reciprocalMean` and its steps.
 */
function overMean(x: Counted, y: Counted, W: number, prec: number): Ball {
  if (W < LONG) return ball.div(ball.pi(W), mean(x, y, W), prec);
  const { a, b, units, least } = near(x, y, W);
  const { value, steps } = reciprocalMean(a, b, W);
  const size = (toDouble(value, W) + 1) * UP;
  return ball.finish(value, -W, ((units + 3 * steps) / least) * size * UP + 2 ** 14, prec, W);
}

interface Pair {
  readonly a: bigint;
  readonly b: bigint;
  /** Both numbers are off by at most units·2^−W/least relatively. */
  readonly units: number;
  readonly least: number;
}

/** Steps up to a <= 4b. */
function near(x: Counted, y: Counted, W: number): Pair {
  let [a, b] = x.man > y.man ? [x.man, y.man] : [y.man, x.man];
  const least = toDouble(b, W) * (1 - 2 ** -40);
  let units = Math.max(x.err, y.err);
  while (a > 4n * b) {
    [a, b] = [(a + b) >> 1n, sqrtNear(a * b)];
    units += 3;
  }
  return { a, b, units, least };
}

/**
 * The arithmetic-geometric mean of numbers of at least 2^−5.
 *
 * Error    both means are monotone and homogeneous, so that the larger relative error of the two is kept; a step before the kernel adds three units of
 *          a number that is not below the smaller one; the kernel's relative error is 2^(12−length).
 */
export function mean(x: Counted, y: Counted, W: number): Ball {
  const { a, b, units, least } = near(x, y, W);
  const length = bitLength(a, W);
  const man = agmFixed(a, b, length);
  // In units of 2^−W: the mean, below 2^(length−W), times the relative error, which is at most units·2^−W/least.
  return { man, exp: -W, rad: ((units / least) * pow2(length - W) + 2 ** 12 + 1) * UP };
}
