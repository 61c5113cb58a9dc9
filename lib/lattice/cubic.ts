// Roots of 4x³ − g2 x − g3 from one root, the best separated one, and the discriminant.
//
// Let e be the root opposite the shortest side of the triangle of roots, D = (e − e′)(e − e″) = 3e² − g2/4 and Δ = g2³ − 27g3².
// Then (e′ − e″)² = Δ/(16 D²), and e is well conditioned however near e′ and e″ come. With Δ known to full relative accuracy all
// differences of the roots are, so that nothing is lost near a double root.

import { midpoint, radiusMagnitude } from "../function/enclosure.ts";
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { PrecisionError } from "../proof/errors.ts";

export interface CubicRoots {
  /** The best separated root e; for real coefficients a real one: the outer root if there are three. */
  readonly root: Disc;
  /** D = (e − e′)(e − e″). */
  readonly product: Disc;
  /** δ = e′ − e″, one of the two square roots of Δ/(16 D²): positive, or i times positive, for real coefficients. */
  readonly gap: Disc;
  /** e − e′ = (3e − δ)/2 and e − e″ = (3e + δ)/2. */
  readonly minus: Disc;
  readonly plus: Disc;
}

interface ScaledCubic {
  readonly g2: Disc;
  readonly g3: Disc;
  /** Real coefficients: Newton's method starts beyond the outer root on the side of g3 and converges to it. */
  readonly real: boolean;
}

/**
 * The roots of 4x³ − g2 x − g3.
 *
 * Domain   g2³ ≠ 27 g3²; `delta` is an enclosure of g2³ − 27 g3² away from 0.
 * Branch   see CubicRoots.gap; for complex coefficients the sign of δ is that of a square root taken off its cut.
 * Error    enclosures. e is certified by Newton–Kantorovich on every polynomial within the coefficients: with h = |f/f′| at the
 *          start y and K >= |f″| within 2h of it, 2hK <= |f′| gives one root there, and one step more leaves |e − N(y)| <= 2Kh²/|f′|.
 * Cost     a doubling Newton iteration: about one evaluation at full precision.
 * Throws   PrecisionError if the coefficients are too coarse to isolate e.
 */
export function cubicRoots(g2: Disc, g3: Disc, delta: Disc, prec: number): CubicRoots {
  const wp = prec + 24;
  // With x = 2^k y the coefficients are at most 1 and one is at least 1/8, so |y| < 1.
  const k = Math.max(Math.ceil(disc.magnitude(g2) / 2), Math.ceil(disc.magnitude(g3) / 3));
  const cubic: ScaledCubic = {
    g2: disc.ldexp(g2, -2 * k),
    g3: disc.ldexp(g3, -3 * k),
    real: g2.axis === "real" && g3.axis === "real",
  };
  const root = disc.ldexp(refinedRoot(cubic, wp), k);
  const product = disc.sub(disc.mulInt(disc.sqr(root, wp), 3n, wp), disc.ldexp(g2, -2), wp);
  const square = disc.ldexp(disc.div(delta, disc.sqr(product, wp), wp), -4);
  const gap = rootOffCut(square, wp);
  const triple = disc.mulInt(root, 3n, wp);
  const minus = disc.ldexp(disc.sub(triple, gap, wp), -1);
  const plus = disc.ldexp(disc.add(triple, gap, wp), -1);
  return { root, product, gap, minus, plus };
}

/** A square root of x whose choice does not depend on the precision unless x is imaginary: that of −x times i for Re x < 0. */
export function rootOffCut(x: Disc, prec: number): Disc {
  return x.re < 0n ? disc.mulI(disc.sqrt(disc.neg(x), prec)) : disc.sqrt(x, prec);
}

function refinedRoot(cubic: ScaledCubic, prec: number): Disc {
  let y = start(cubic);
  const steps: number[] = [];
  for (let p = prec; p > 44; p = (p >> 1) + 8) steps.unshift(p);
  for (const bits of steps.slice(0, -1)) y = midpoint(disc.round(newton(cubic, y, bits + 8).next, bits));
  // The schedule trusts the double start; a start worse than it should be is mended here.
  for (let more = 0; more < 12; more++) {
    const found = certified(cubic, y, prec);
    if (found) return found;
    y = midpoint(newton(cubic, y, prec).next);
  }
  throw new PrecisionError({
    subject: "roots of the cubic",
    given: "invariants too coarse to tell the roots apart",
    expected: "enclosures of g2 and g3 small beside the distance of the roots",
    hint: "Give g2 and g3 with more digits, or exactly.",
  });
}

function newton({ g2, g3 }: ScaledCubic, y: Disc, wp: number): { value: Disc; slope: Disc; next: Disc; step: Disc } {
  const square = disc.ldexp(disc.sqr(y, wp), 2);
  const value = disc.sub(disc.mul(disc.sub(square, g2, wp), y, wp), g3, wp);
  const slope = disc.sub(disc.mulInt(square, 3n, wp), g2, wp);
  const step = disc.div(value, midpoint(disc.round(slope, 64 + (wp >> 1))), wp);
  return { value, slope, step, next: disc.sub(y, step, wp) };
}

/** The root near y as an enclosure, if the certificate holds with an error below the rounding of prec. */
function certified(cubic: ScaledCubic, y: Disc, prec: number): Disc | undefined {
  const { value, slope } = newton(cubic, y, prec + 8);
  if (disc.containsZero(slope)) return undefined;
  const exact = disc.div(value, slope, prec + 8);
  const h = ball.upper(disc.abs(exact, 53));
  const low = ball.lower(disc.abs(slope, 53));
  const reach = ball.add(ball.upper(disc.abs(y, 53)), ball.ldexp(h, 1), 53);
  const bend = ball.mulInt(reach, 24n, 53);
  const certificate = ball.compare(ball.ldexp(ball.mul(h, bend, 53), 1), low);
  if (certificate !== -1) return undefined;
  const rest = ball.div(ball.ldexp(ball.mul(bend, ball.mul(h, h, 53), 53), 1), low, 53);
  const next = disc.sub(y, exact, prec + 8);
  if (ball.magnitude(rest) > Math.max(-prec, radiusMagnitude(next))) return undefined;
  return disc.widenBy(next, rest, prec + 8);
}

/** The root to about 50 bits. */
function start(cubic: ScaledCubic): Disc {
  return cubic.real ? disc.fromBall(ball.fromDouble(realStart(cubic))) : complexStart(cubic);
}

/**
 * For g3 > 0 the outer root is positive, and from y = 1 on the cubic is positive, rising and convex: Newton's method falls to the
 * root. g3 < 0 is the mirror image; g3 = 0 takes the side of g3 > 0.
 */
function realStart({ g2, g3 }: ScaledCubic): number {
  const a = ball.toDouble(disc.real(g2));
  const b = ball.toDouble(disc.real(g3));
  const [side, c] = b < 0 ? [-1, -b] : [1, b];
  let y = 1;
  for (let n = 0; n < 200; n++) {
    const next = y - ((4 * y * y - a) * y - c) / (12 * y * y - a);
    if (!(next < y)) break;
    y = next;
  }
  return side * y;
}

type Pair = readonly [number, number];
const times = ([a, b]: Pair, [c, d]: Pair): Pair => [a * c - b * d, a * d + b * c];
const over = ([a, b]: Pair, [c, d]: Pair): Pair => {
  const n = c * c + d * d;
  return [(a * c + b * d) / n, (b * c - a * d) / n];
};
const minus = ([a, b]: Pair, [c, d]: Pair): Pair => [a - c, b - d];

/** All roots at once (Weierstrass–Durand–Kerner, fixed start and count), then the one with the largest slope. */
function complexStart({ g2, g3 }: ScaledCubic): Disc {
  const a = disc.toDouble(g2) as Pair;
  const b = disc.toDouble(g3) as Pair;
  const value = (y: Pair): Pair => minus(times(minus(times([4 * y[0], 4 * y[1]], y), a), y), b);
  const roots: Pair[] = [
    [0.9, 0.2],
    [-0.3, 0.8],
    [-0.6, -1],
  ];
  for (let n = 0; n < 100; n++) {
    for (let k = 0; k < 3; k++) {
      const [y, p, q] = [roots[k]!, roots[(k + 1) % 3]!, roots[(k + 2) % 3]!];
      const bottom = times(minus(y, p), minus(y, q));
      const step = over(value(y), [4 * bottom[0], 4 * bottom[1]]);
      if (Number.isFinite(step[0]) && Number.isFinite(step[1])) roots[k] = minus(y, step);
    }
  }
  const slope = (y: Pair) => Math.hypot(...minus(times([12 * y[0], 12 * y[1]], y), a));
  const best = roots.reduce((x, y) => (slope(y) > slope(x) * (1 + 1e-9) ? y : x));
  return disc.fromBalls(ball.fromDouble(best[0]), ball.fromDouble(best[1]));
}
