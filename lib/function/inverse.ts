// The elliptic logarithm: z mod Λ with ℘(z) = x and ℘′(z) = y.
//
// Refinement by the group law. Let Q = (X, Y) = (℘, ℘′)(z*) for a z* near z. With the reciprocal slope κ of the chord through (x, y)
// and −Q, κ = (x − X)/(y + Y) = (y − Y)/(4(x² + xX + X²) − g2), the difference (x, y) − Q has abscissa 1/(4κ²) − s, s = x + X, and
//     T = −2 x_D/y_D = 2κ (1 − 4sκ²)/(1 − 4κ²(2x + X) + 4yκ³).
// T = (z − z*)(1 + O((z − z*)⁴)), so one evaluation multiplies the number of digits by five, and no quotient of small numbers is
// taken: κ may be an enclosure of 0.
//
// Certificate, in units of which every nonzero period has length at least 1. Discs of radius 1/2 around the periods are disjoint, so
// at most 4R² + 4R nonzero periods have |ω| < R, and Σ'|ω|^−4 <= ∫ 4R^−5 (4R² + 4R) dR = 40/3. Pairing ω with −ω, for |z| <= 1/8
//     |z² ℘(z) − 1| <= |z|⁴ Σ' (3 + 1/64)/(1 − 1/64)² |ω|^−4,   |−z³ ℘′(z)/2 − 1| <= |z|⁴ Σ' (3 + 1/64)/(1 − 1/64)³ |ω|^−4,
// both at most 43|z|⁴. So |℘| < 65 on |z| = 1/8, and as ℘ takes each value twice, |℘(z_D)| >= 65 puts z_D (mod Λ) into |z| < 1/8.
// There |T − z_D| <= 87 |z_D|⁵ <= 128 |T|⁵.

import type { Ball } from "../number/ball.ts";
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { PoleError, PrecisionError } from "../proof/errors.ts";
import { midpoint } from "./enclosure.ts";
import { type ReducedLattice, reducedRoots } from "./reduced.ts";
import { weierstrass } from "./weierstrass.ts";

/** A point (x, y) with y² = 4x³ − g2 x − g3. */
export interface CubicPoint {
  readonly x: Disc;
  readonly y: Disc;
}

/**
 * z with ℘(z) = x and ℘′(z) = y, in or beside the cell around 0 of the reduced basis.
 *
 * Domain   points of the curve; the enclosures must hold one.
 * Branch   the sign of y settles that of z; z is determined modulo Λ and the midpoint is near the cell around 0.
 * Error    an enclosure, certified by the group law (header); its radius follows from those of x and y.
 * Cost     a little more than one evaluation of ℘ and ℘′ at full precision.
 * Throws   PrecisionError if x and y are too coarse, or satisfy the equation for no point.
 * @param   lattice the reduced basis and g2 with so many bits
 */
export function ellipticLogarithm(
  lattice: (prec: number) => { readonly l: ReducedLattice; readonly g2: Disc },
  point: CubicPoint,
  prec: number,
): Disc {
  // At a point of order two y has no accurate bit.
  const known = Math.max(disc.bits(point.x), disc.bits(point.y));
  let best: Disc | undefined;
  // Deep in a tall cell ℘ is nearly constant: there every step needs the bits that this costs.
  for (const spare of [0, 128, 512, 2048, 8192, 32768]) {
    const { l, g2 } = lattice(prec + 32 + spare);
    // τ has Im τ >= 0.84 and |Re τ| near or under 1/2: every period is at least 3/4 |r1|.
    const context = { l, g2, unit: ball.ldexp(ball.mulInt(disc.abs(l.r1, 53), 3n, 53), -2) };
    const found = attempt(context, point, prec, spare);
    if (found && (!best || disc.bits(found) > disc.bits(best))) best = found;
    if ((best && disc.bits(best) >= prec - 8) || prec + spare > known) break;
  }
  if (best) return disc.round(best, prec);
  throw notFound();
}

function attempt(context: Context, point: CubicPoint, prec: number, spare: number): Disc | undefined {
  try {
    let z = start(context.l, point, spare);
    for (const bits of schedule(prec)) z = midpoint(disc.round(step(context, point, z, bits + 16 + spare), bits + 16));
    return certifiedStep(context, point, z, prec + 16 + spare);
  } catch (error) {
    if (error instanceof PoleError) return undefined;
    throw error;
  }
}

interface Context {
  readonly l: ReducedLattice;
  readonly g2: Disc;
  readonly unit: Ball;
}

/** Bits of the start by doubles. */
const START = 48;

/** Precisions of the steps before the last: a fifth at a time, with slack for the constant of the error term. */
function schedule(prec: number): number[] {
  const steps: number[] = [];
  for (let p = Math.ceil((prec + 16) / 5) + 6; p > START; p = Math.ceil(p / 5) + 6) steps.unshift(p);
  return steps;
}

interface Difference {
  /** The start, turned to the side of ℘′ that y is on. */
  readonly z: Disc;
  readonly kappa: Disc;
  readonly s: Disc;
  readonly T: Disc;
}

function difference({ l, g2 }: Context, { x, y }: CubicPoint, start: Disc, wp: number): Difference {
  const at = weierstrass(l, start, wp, ["wp", "prime"]);
  const X = at.wp!;
  const turned = disc.mul(midpoint(at.prime!), disc.conj(midpoint(y)), 60).re < 0n;
  const [z, Y] = turned ? [disc.neg(start), disc.neg(at.prime!)] : [start, at.prime!];
  const s = disc.add(x, X, wp);
  const kappa = reciprocalSlope(g2, { x, y }, { x: X, y: Y }, s, wp);
  const four = disc.ldexp(disc.sqr(kappa, wp), 2);
  const top = disc.sub(disc.one, disc.mul(s, four, wp), wp);
  const inner = disc.sub(disc.mul(y, kappa, wp), disc.add(s, x, wp), wp);
  const bottom = disc.add(disc.one, disc.mul(four, inner, wp), wp);
  return { z, kappa, s, T: disc.mul(disc.ldexp(kappa, 1), disc.div(top, bottom, wp), wp) };
}

/** κ by the quotient whose denominator is the larger one beside its scale. */
function reciprocalSlope(g2: Disc, p: CubicPoint, q: CubicPoint, s: Disc, wp: number): Disc {
  const sum = disc.add(p.y, q.y, wp);
  const square = disc.sub(disc.sqr(s, wp), disc.mul(p.x, q.x, wp), wp);
  const slope = disc.sub(disc.ldexp(square, 2), g2, wp);
  // y + Y ≈ 2y and the other is about 2℘″: y is the smaller one near points of order two only, where |y|³ << |℘″|².
  if (3 * (disc.magnitude(sum) - 1) >= 2 * (disc.magnitude(slope) - 1) - 6) {
    return disc.div(disc.sub(p.x, q.x, wp), sum, wp);
  }
  return disc.div(disc.sub(p.y, q.y, wp), slope, wp);
}

function step(context: Context, point: CubicPoint, z: Disc, wp: number): Disc {
  const { z: turned, T } = difference(context, point, z, wp);
  return disc.add(turned, T, wp);
}

function certifiedStep(context: Context, point: CubicPoint, start: Disc, wp: number): Disc | undefined {
  const { z, kappa, s, T } = difference(context, point, start, wp);
  // |x_D| >= 1/(4|κ|²) − |s| >= 65/unit²
  const bound = ball.add(disc.abs(s, 53), ball.div(ball.fromInt(65), ball.mul(context.unit, context.unit, 53), 53), 53);
  const k = disc.abs(kappa, 53);
  const limit = ball.ldexp(ball.mul(ball.mul(k, k, 53), bound, 53), 2);
  if (!(ball.compare(limit, ball.one) === -1)) return undefined;
  const size = ball.upper(disc.abs(T, 53));
  if (ball.isZero(size)) return z;
  const ratio = ball.div(size, context.unit, 53);
  const fourth = ball.pow(ratio, 4, 53);
  const rest = ball.ldexp(ball.mul(size, fourth, 53), 7);
  return disc.widenBy(disc.add(z, T, wp), rest, wp);
}

function notFound(): PrecisionError {
  return new PrecisionError({
    subject: "elliptic logarithm",
    given: "values of ℘ and ℘′ that fit no point of the curve, or are too coarse",
    expected: "x and y with y² = 4x³ − g2 x − g3",
    hint: "Check the equation at (x, y), or give more digits.",
  });
}

type Pair = readonly [number, number];

/**
 * A start for z. Where |x r1²| is large, −2x/y. Else Carlson's duplication for RF(x−e1, x−e2, x−e3) (DLMF 19.25.35), in doubles or, if bits to
 * spare are asked for, with exponents of any size; the sign is settled by ℘′ in the next step. A root on its cut counts as just above it:
 * one path of integration is as good as any other.
 */
function start(l: ReducedLattice, { x, y }: CubicPoint, spare: number): Disc {
  const wp = 120 + spare;
  const square = disc.sqr(l.r1, wp);
  const scaled = disc.mul(x, square, wp);
  if (disc.magnitude(scaled) > 20) return midpoint(disc.neg(disc.ldexp(disc.div(x, y, 60), 1)));
  const differences = reducedRoots(l).map((e) => midpoint(disc.mul(disc.sub(x, e, wp), square, wp)));
  const v = spare === 0 ? carlson(differences.map((d) => disc.toDouble(d) as Pair)) : wideCarlson(differences);
  return midpoint(disc.mul(v, midpoint(l.r1), 60));
}

/** The same with midpoints of enclosures, until the arguments agree to 20 bits: then 1/√mean is right to 40. */
function wideCarlson(differences: readonly Disc[]): Disc {
  const bits = 80;
  let args = differences;
  for (let n = 0; n < 40_000; n++) {
    const [p, q, r] = args.map((s) => (disc.isZero(s) ? s : midpoint(disc.sqrt(s, bits, { cut: "continuous" })))) as [
      Disc,
      Disc,
      Disc,
    ];
    const pair = (s: Disc, t: Disc) => disc.mul(s, t, bits);
    const lambda = disc.add(disc.add(pair(p, q), pair(q, r), bits), pair(r, p), bits);
    args = args.map((s) => midpoint(disc.ldexp(disc.add(s, lambda, bits), -2)));
    const spread = Math.max(...args.map((s) => sizeOf(disc.sub(s, args[0]!, bits))));
    if (spread < sizeOf(args[0]!) - 20) break;
  }
  const sum = disc.add(disc.add(args[0]!, args[1]!, bits), args[2]!, bits);
  const mean = disc.divBall(sum, ball.fromInt(3), bits);
  return midpoint(disc.inv(disc.sqrt(midpoint(mean), bits, { cut: "continuous" }), bits));
}

function sizeOf(d: Disc): number {
  return disc.isZero(d) ? Number.NEGATIVE_INFINITY : disc.magnitude(d);
}

function root([a, b]: Pair): Pair {
  const r = Math.hypot(a, b);
  if (r === 0) return [0, 0];
  if (a >= 0) {
    const u = Math.sqrt((r + a) / 2);
    return [u, b / (2 * u)];
  }
  const v = Math.sqrt((r - a) / 2);
  return b >= 0 ? [b / (2 * v), v] : [-b / (2 * v), -v];
}

const times = ([a, b]: Pair, [c, d]: Pair): Pair => [a * c - b * d, a * d + b * c];

const size = ([a, b]: Pair): number => Math.abs(a) + Math.abs(b);
const gap = ([a, b]: Pair, [c, d]: Pair): number => Math.abs(a - c) + Math.abs(b - d);

/** RF by duplication, closed by the terms of DLMF 19.36.1 up to the fifth power of the deviations, which are under 2^−9. */
function carlson(differences: readonly Pair[]): Disc {
  let args = differences;
  let mean: Pair = [0, 0];
  for (let n = 0; n < 60; n++) {
    mean = scaledPair(plus(plus(args[0]!, args[1]!), args[2]!), 1 / 3);
    if (n > 0 && Math.max(gap(args[0]!, mean), gap(args[1]!, mean)) < 2e-3 * size(mean)) break;
    const [p, q, r] = args.map(root) as [Pair, Pair, Pair];
    const lambda = plus(plus(times(p, q), times(q, r)), times(r, p));
    args = args.map((s) => scaledPair(plus(s, lambda), 1 / 4));
  }
  const over = reciprocal(mean);
  const [X, Y] = [0, 1].map((k) => times(plus(mean, scaledPair(args[k]!, -1)), over)) as [Pair, Pair];
  const Z = scaledPair(plus(X, Y), -1);
  const E2 = plus(times(X, Y), scaledPair(times(Z, Z), -1));
  const E3 = times(times(X, Y), Z);
  const series = [
    scaledPair(E2, -1 / 10),
    scaledPair(E3, 1 / 14),
    scaledPair(times(E2, E2), 1 / 24),
    scaledPair(times(E2, E3), -3 / 44),
  ].reduce(plus, [1, 0]);
  const [re, im] = times(series, reciprocal(root(mean)));
  if (!Number.isFinite(re) || !Number.isFinite(im)) throw farFromDoubles();
  return disc.fromBalls(ball.fromDouble(re), ball.fromDouble(im));
}

const plus = ([a, b]: Pair, [c, d]: Pair): Pair => [a + c, b + d];
const scaledPair = ([a, b]: Pair, s: number): Pair => [a * s, b * s];

function reciprocal([a, b]: Pair): Pair {
  const n = a * a + b * b;
  return [a / n, -b / n];
}

/** Differences that doubles cannot hold; the next attempt uses enclosures. */
function farFromDoubles(): PoleError {
  return new PoleError({ subject: "elliptic logarithm", given: "roots too near x for doubles", expected: "more bits" });
}
