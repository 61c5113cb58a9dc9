// The elliptic logarithm of a real point in fixed point, by the descending Landen transformation of its integral.
//
// For a >= b > 0 and c >= a let I(a, b, c) = ∫_c^∞ ds/√((s² − a²)(s² − a² + b²)). With a′ = (a+b)/2, b′ = √(ab), c′ = (c + √(c² − a² + b²))/2 it keeps
// its value (Cohen, A Course in Computational Algebraic Number Theory, 7.4.8; Bost and Mestre 1988), and in the limit a = b = M
//     I = asin(M/c)/M = atan(M/√(c² − M²))/M.
// Three roots, t − e3 = s²:  z = I(√(e1−e3), √(e1−e2), √(x−e3)) for x >= e1; the bounded component is moved by ω2/2 to
// x′ − e3 = (e1−e3)(e2−e3)/(x−e3). One root e, X = x − e, β = |e − e′|:  z = I(2√β, √(2β+3e), (X+β)/√X) for X >= β, and ω1/2 less that below.
// The numbers a, b and κ = a² − b² of all steps are kept for the lattice, so a point costs a square and a root a step.

import type { Ball } from "../number/ball.ts";
import { atanFixed } from "../number/fixed/atan.ts";
import { pow2, shift, UP } from "../number/fixed/bits.ts";
import { piFixed } from "../number/fixed/constants.ts";
import { sqrtNear } from "../number/fixed/isqrt.ts";
import { type Counted, counted, type FixedCubic, root, toDouble } from "./fixed-cubic.ts";
import { mean } from "./fixed-periods.ts";

/** What all points of a cubic share. */
export interface LogarithmChain {
  readonly cubic: FixedCubic;
  /** κ of each step; the last is below 2^−(W/2 + 8). */
  readonly kappa: readonly Counted[];
  readonly M: Counted;
  /** e1 − e3, e2 − e3 and e3, or for one root nothing. */
  readonly roots?: { readonly wide: Counted; readonly gap: Counted; readonly left: Counted };
}

export interface FixedLogarithm {
  readonly component: "identity" | "bounded";
  readonly t: Ball;
}

/** Places that a chain needs beyond the bits that are asked for: the mean's 2^12 units, and 2^14 for the extremes that are taken on here. */
export const CHAIN_GUARD = 40;

/** Sizes above the first, differences and s/c below the second, and errors above the third are left to the enclosures. */
const HIGHEST = 2 ** 7;
const NEAREST = 2 ** -6;
const SHARP = 2 ** -44;

/**
 * The chain of a cubic.
 *
 * Error    all means are monotone and homogeneous, so that a and b keep the larger relative error ρ of the two at the start, and a step adds at most three
 *          units of a number that is not below the smallest, b at the start. κ = (a − b)(a + b) is off by at most 4a²ρ and a cut.
 */
export function logarithmChain(cubic: FixedCubic): LogarithmChain | undefined {
  const { W, components, right, wide, narrow, middle, e } = cubic;
  const w = shift(W);
  let [a, b] = [middle, right ? wide : narrow];
  let roots: LogarithmChain["roots"];
  if (components === 2) {
    const gap = product(wide, narrow, W);
    const top = { man: (wide.man + narrow.man) >> 1n, err: (wide.err + narrow.err) / 2 + 1 };
    const other = right ? { man: (wide.man - narrow.man) >> 1n, err: top.err } : root(gap, W);
    if (!other) return undefined;
    [a, b] = [top, other];
    const outer = { man: (3n * e.man + gap.man) >> 1n, err: (3 * e.err + gap.err) / 2 + 1 };
    const half = { man: -((e.man + gap.man) >> 1n), err: (e.err + gap.err) / 2 + 1 };
    const left = right ? half : { man: -e.man, err: e.err };
    // e2 − e3 is the gap or, where the outer root is on the left, (3e − gap)/2.
    const inner = right ? gap : { man: (3n * e.man - gap.man) >> 1n, err: outer.err };
    roots = { wide: outer, gap: inner, left };
  }
  const least = toDouble(b.man, W) * (1 - 2 ** -30);
  if (!(least >= 2 ** -5 && a.man > b.man)) return undefined;
  const M = mean(a, b, W);
  const top = (toDouble(a.man, W) + 2 ** -30) * UP;
  let [x, y] = [a.man, b.man];
  let units = Math.max(a.err, b.err);
  const kappa: Counted[] = [];
  for (let n = 0; n < 64; n++) {
    const man = ((x - y) * (x + y)) >> w;
    kappa.push({ man, err: ((4 * top * top * units) / least + 3) * UP });
    if ((man < 0n ? -man : man) >> shift((W >> 1) - 9) === 0n) {
      return { cubic, kappa, M: { man: M.man, err: M.rad }, ...(roots && { roots }) };
    }
    [x, y] = [(x + y) >> 1n, sqrtNear(x * y)];
    units += 3;
  }
  return undefined;
}

/** Sizes here are below 4. */
function product(x: Counted, y: Counted, W: number): Counted {
  return { man: (x.man * y.man) >> shift(W), err: (4 * (x.err + y.err) + 2) * UP };
}

/**
 * z of the real point (x, y), as `realLogarithm`.
 *
 * Error    c′ = (c + r)/2, r = √(c² − κ): with an error E of c² − κ the true root and the one found, s, differ by at most E/s + 2. The last κ is below
 *          2^−(W/2+8): there c′ = c − κ/4c up to κ²/8c³ < 1 unit (c > 2^−5), and all later steps together change c by less than a unit,
 *          since κ′ = ((a−b)/2)² < 2^(−W−10).
 * Cost     a square and a root a step, one arc tangent.
 * @returns nothing for points near one of order two (or four, with one root), wide ones, and pairs that are on no curve near.
 */
export function fixedLogarithm(chain: LogarithmChain, x: Ball, y: Ball): FixedLogarithm | undefined {
  const { cubic, M } = chain;
  const { W, half } = cubic;
  const X = counted(x, W - 2 * half);
  const Y = counted(y, W - 3 * half);
  const wide = Math.max(X.err, Y.err) * pow2(-W);
  if (!(wide < SHARP && Math.abs(toDouble(X.man, W)) < HIGHEST)) return undefined;
  if (!(Math.abs(toDouble(Y.man, W)) > NEAREST && onCurve(cubic, X, Y))) return undefined;
  const start = chain.roots ? twoComponents(chain.roots, X, W) : oneComponent(cubic, X);
  if (!start) return undefined;
  const c = descended(chain, start.c);
  const theta = c && angle(c, M, W);
  if (!theta) return undefined;
  const turned = start.turned ? { man: piFixed(W) - theta.man, err: theta.err + 2 } : theta;
  const z = quotient(turned, M, W);
  // On the bounded component the move by ω2/2 turns the sign of ℘′ (it is −(…)²); ℘′ < 0 for small z > 0.
  const negative = Y.man > 0n !== (start.component === "bounded");
  return { component: start.component, t: { man: negative ? -z.man : z.man, exp: -W - half, rad: z.err } };
}

interface Start {
  readonly component: "identity" | "bounded";
  readonly c: Counted;
  /** Whether z is the half period less the integral. */
  readonly turned: boolean;
}

function twoComponents(
  { wide, gap, left }: NonNullable<LogarithmChain["roots"]>,
  X: Counted,
  W: number,
): Start | undefined {
  const from = { man: X.man - left.man, err: X.err + left.err };
  const size = toDouble(from.man, W);
  if (!(size > NEAREST)) return undefined;
  const [low, high] = [toDouble(gap.man, W), toDouble(wide.man, W)];
  // On the curve x − e3 is at most the gap or at least e1 − e3; near either of them s below is too small.
  const bounded = size < (low + high) / 2;
  const square = bounded ? quotient(product(wide, gap, W), from, W) : from;
  const c = root(square, W);
  return c && { component: bounded ? "bounded" : "identity", c, turned: false };
}

function oneComponent({ e, b, right, W }: FixedCubic, X: Counted): Start | undefined {
  const from = { man: X.man + (right ? -e.man : e.man), err: X.err + e.err };
  if (!(toDouble(from.man, W) > NEAREST)) return undefined;
  const below = root(from, W);
  if (!below) return undefined;
  const c = quotient({ man: from.man + b.man, err: from.err + b.err }, below, W);
  return { component: "identity", c, turned: from.man < b.man };
}

/** x/y for positive x and y >= 2^−6, x below 2^8. */
function quotient(x: Counted, y: Counted, W: number): Counted {
  const man = (x.man << shift(W)) / y.man;
  const low = toDouble(y.man, W) * (1 - 2 ** -30) - y.err * pow2(-W);
  const value = toDouble(man, W) + 2 ** -30;
  return { man, err: ((x.err + value * y.err) / low + 2) * UP };
}

/** Whether y² and 4x³ − g2 x − g3 (of the mirror image: −g3) may be equal. */
function onCurve({ g2, g3, right, W }: FixedCubic, X: Counted, Y: Counted): boolean {
  const w = shift(W);
  const square = (Y.man * Y.man) >> w;
  const inner = ((4n * X.man * X.man) >> w) - g2.man;
  const cubic = ((inner * X.man) >> w) - (right ? g3.man : -g3.man);
  const [x, y] = [Math.abs(toDouble(X.man, W)) + 2 ** -30, Math.abs(toDouble(Y.man, W)) + 2 ** -30];
  const err = (2 * y + 1) * Y.err + (12 * x * x + 2) * X.err + X.err + (x + 1) * (g2.err + 2) + g3.err + 4;
  const rest = square - cubic;
  return (rest < 0n ? -rest : rest) <= BigInt(Math.ceil(err * UP));
}

function descended({ cubic: { W }, kappa }: LogarithmChain, start: Counted): Counted | undefined {
  const w = shift(W);
  let { man, err } = start;
  if (!(toDouble(man, W) < HIGHEST && toDouble(man, W) > 2 ** -5)) return undefined;
  for (let n = 0; n < kappa.length; n++) {
    const step = kappa[n]!;
    const c = toDouble(man, W) + 2 ** -30;
    if (n === kappa.length - 1) {
      // The quotient is small, and an error of c changes it by less than a quarter of that.
      man -= (step.man << shift(W - 2)) / man;
      err = (1.25 * err + 8 * step.err + 4) * UP;
      break;
    }
    const square = man * man - (step.man << w);
    if (square <= 0n) return undefined;
    const r = sqrtNear(square);
    const low = toDouble(r, W) - 2 ** -30;
    if (!(low > 2 ** -6)) return undefined;
    const root = ((2 * c * err + 1 + step.err) / low + 2) * UP;
    man = (man + r) >> 1n;
    err = ((err + root) / 2 + 1) * UP;
  }
  return { man, err };
}

/** asin(M/c) as an arc tangent of the smaller of M/s and s/M, s = √(c² − M²). */
function angle(c: Counted, M: Counted, W: number): Counted | undefined {
  const square = c.man * c.man - M.man * M.man;
  if (square <= 0n) return undefined;
  const s = sqrtNear(square);
  const low = toDouble(s, W) - 2 ** -30;
  const size = toDouble(c.man, W) + 2 ** -30;
  if (!(low > NEAREST * size)) return undefined;
  const err = ((2 * size * (c.err + M.err) + 2) / low + 2) * UP;
  const small = s > M.man;
  const root = { man: s, err };
  const tangent = small ? quotient(M, root, W) : quotient(root, M, W);
  const arc = { man: atanFixed(tangent.man, W), err: tangent.err + 2 };
  return small ? arc : { man: piFixed(W - 1) - arc.man, err: arc.err + 2 };
}
