// The outer root of a real cubic with sharp coefficients and what its periods and logarithms are made of, in fixed point with counted errors.
//
// The cubic is scaled to |g2|, |g3| <= 1 and mirrored to g3 >= 0; e is its outer root, which is the only positive one (the product of the others is
// not negative and their sum is −e), b = √D with D = 3e² − g2/4 = (e − e′)(e − e″). With P, Q = e − e′, e − e″ we have P + Q = 3e, PQ = b², so
// (√P ± √Q)² = 3e ± 2b, and (3e − 2b)(3e + 2b) = g2 − 3e² = (e′ − e″)². Neither the other roots nor the discriminant are needed. Near a double
// root, where 3e ∓ 2b would lose bits, and for wide coefficients there is nothing: the enclosures of cubic.ts take over.

import type { Ball } from "../number/ball.ts";
import * as ball from "../number/ball.ts";
import { pow2, shift, UP } from "../number/fixed/bits.ts";
import { sqrtNear } from "../number/fixed/isqrt.ts";

/** A number in units of 2^−places, off by at most err units. */
export interface Counted {
  readonly man: bigint;
  readonly err: number;
}

/** Errors of the coefficients above this, in units, are left to the enclosures. */
const SHARP = 64;
/** The least 3e ∓ 2b and slope; what is smaller is left to the enclosures. */
const LEAST = 2 ** -9;
export interface FixedCubic {
  /** Places of all numbers here, for the cubic in y with x = 4^half y. */
  readonly W: number;
  readonly half: number;
  readonly components: 1 | 2;
  /** Whether g3 >= 0; else all that follows is that of the mirror image. */
  readonly right: boolean;
  readonly g2: Counted;
  readonly g3: Counted;
  readonly e: Counted;
  /** b, √(2b + 3e), √|2b − 3e| and 2√b. */
  readonly b: Counted;
  readonly wide: Counted;
  readonly narrow: Counted;
  readonly middle: Counted;
}

/**
 * The data of 4x³ − g2 x − g3 with W >= 80 places.
 *
 * Domain   `components` is 2 for Δ > 0 and 1 for Δ < 0, decided by the caller exactly.
 * Error    counted; every step states what it adds.
 * Cost     Newton's iteration for one root (about three products) and four square roots.
 * @returns nothing for coefficients that are wide, or near a double root.
 */
export function fixedCubic(g2: Ball, g3: Ball, components: 1 | 2, W: number): FixedCubic | undefined {
  const half = Math.max(Math.ceil(ball.magnitude(g2) / 4), Math.ceil(ball.magnitude(g3) / 6));
  if (!Number.isFinite(half)) return undefined;
  const a = counted(g2, W - 4 * half);
  const c = counted(g3, W - 6 * half);
  if (!(a.err <= SHARP && c.err <= SHARP)) return undefined;
  const right = c.man >= 0n;
  const mirrored = right ? c : { man: -c.man, err: c.err };
  const e = outerRoot(a, mirrored, components, W);
  if (!e) return undefined;
  // 3e² is off by 6e·err + 1 and a little more for the square of the error, g2/4 by a quarter and a cut.
  const D = { man: ((3n * e.man * e.man) >> shift(W)) - (a.man >> 2n), err: 6 * e.err + a.err + 3 };
  const b = root(D, W);
  if (!b) return undefined;
  const triple = 3n * e.man;
  const err = 3 * e.err + 2 * b.err;
  const wide = root({ man: 2n * b.man + triple, err }, W);
  const narrow = root({ man: components === 2 ? triple - 2n * b.man : 2n * b.man - triple, err }, W);
  const middle = root({ man: 4n * b.man, err: 4 * b.err }, W);
  if (!wide || !narrow || !middle) return undefined;
  return { W, half, components, right, g2: a, g3: mirrored, e, b, wide, narrow, middle };
}

/** x in units of 2^−places, cut down by less than one. */
export function counted(x: Ball, places: number): Counted {
  const by = x.exp + places;
  if (by >= 0) return { man: x.man << shift(by), err: x.rad === 0 ? 0 : x.rad * pow2(by) };
  return { man: x.man >> shift(-by), err: (x.rad * pow2(by) + 1) * UP };
}

/**
 * The greatest root of f = 4y³ − g2 y − g3, |g2|, |g3| <= 1: the only real one, or of three real ones where g3 >= 0 up to its error.
 *
 * Method   Newton's iteration from a double, each step with about twice the digits; the last one is certified.
 * Error    Let y, with q places, be the last start, F the true polynomial, E = 3 + err(g2) + err(g3). As |y| < 1, the computed f(y) is off by at most
 *          E units: two cuts and the coefficients. With s <= F′(y) from below, s >= 2^−9 and |f| <= 2^(6−q): h = (|f| + E)/s < 2^(16−q), and
 *          K = 25 >= |F″| within 2h; 2hK <= s as q > 50, so by Newton–Kantorovich one root of F lies within 2h of y, at most
 *          2Kh²/s <= 2^(47−2q) from y − F/F′, which is under 2^−13 units as 2q >= W + 60. The slope is off by under 2^(7−q), which changes the step by
 *          at most |f|·2^(7−q)/s² <= 2^(32−2q). So the error is E/s and the cut of the quotient.
 * @returns nothing if the certificate fails.
 */
function outerRoot(g2: Counted, g3: Counted, components: 1 | 2, W: number): Counted | undefined {
  const steps: number[] = [];
  let places = W;
  for (; places > START; places = (places >> 1) + (steps.length === 1 ? 31 : 6)) steps.unshift(places);
  const first = outerDouble(toDouble(g2.man, W), toDouble(g3.man, W));
  let y = BigInt(Math.round(first * 2 ** places));
  for (const next of steps) {
    const q = shift(places);
    const up = shift(next - places);
    const square = y * y;
    const slope = ((12n * square) >> q) - (g2.man >> shift(W - places));
    if (slope <= 0n) return undefined;
    const inner = ((square << 2n) >> shift(2 * places - next)) - (g2.man >> shift(W - next));
    const value = ((inner * y) >> q) - (g3.man >> shift(W - next));
    const step = (value << q) / slope;
    const refined = (y << up) - step;
    if (next === W) {
      const low = toDouble(slope, places) * (1 - 2 ** -40) - 2 ** -40;
      const near = value >> shift(next - places + 6);
      // The other positive root of an f with g3 < 0 within its error is below 2^−20.
      const greatest = components === 1 || first > 2 ** -9;
      if (!(low >= LEAST && (near === 0n || near === -1n) && greatest)) return undefined;
      return { man: refined, err: ((3 + g2.err + g3.err) / low + 2) * UP };
    }
    y = refined;
    places = next;
  }
  return undefined;
}

/** Places that the double gives. */
const START = 44;

/**
 * The greatest root as a double: from y = 1 on, where f > 0, f is rising and convex down to the root for g3 >= 0, so Newton's method falls to it.
 */
function outerDouble(a: number, c: number): number {
  let y = 1;
  for (let n = 0; n < 200; n++) {
    const next = y - ((4 * y * y - a) * y - c) / (12 * y * y - a);
    if (!(next < y)) break;
    y = next;
  }
  return y;
}

/** man·2^−places for places >= 60, off by at most 2^−60 and a rounding. */
export function toDouble(man: bigint, places: number): number {
  return Number(man >> shift(places - 60)) * 2 ** -60;
}

/** √x, off by under two units and by err/(2√(x − err)); nothing for x < 2^−9. */
export function root(x: Counted, W: number): Counted | undefined {
  const low = toDouble(x.man, W) * (1 - 2 ** -40) - 2 ** -40;
  if (!(low >= LEAST && x.err * pow2(-W) < 2 ** -42)) return undefined;
  return { man: sqrtNear(x.man << shift(W)), err: (2 + x.err / (2 * Math.sqrt(low))) * UP };
}
