// θ1 .. θ4 and their derivatives at any v and τ, on the sums of theta-sums.ts.
//
// On a reduced τ, with u = exp(2πiv) and S_k(u, t) the sums of that file, D = d/(πi dv):
//     D^k θ1 = i q^(1/4) e^(−πiv) S_k(u, q²/u),      D^k θ2 = q^(1/4) e^(−πiv) S_k(−u, −q²/u)       (v + 1/2 in θ1)
//     D^k θ4 = (−1)^k Σ_j C(k, j) S_j(q/u, qu),      θ3 the same at (−q/u, −qu)                    (τ/2 − v in θ1)
// with 0 <= Im v <= Im τ/2, where all arguments stay in the domain of the sums.
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { DomainError } from "../proof/errors.ts";
import { nearestInteger, ontoImaginary, ontoReal } from "./enclosure.ts";
import { type Reduction, reduction } from "./modular-action.ts";
import { type ThetaIndex, thetaMultiplier } from "./theta-multiplier.ts";
import { thetaSums } from "./theta-sums.ts";

export type { ThetaIndex } from "./theta-multiplier.ts";

/** Highest derivative that the sums give. */
export const MAX_ORDER = 3;

/** A point of the cell of a reduced τ in its upper half, and how it got there: v = ±(point + m + nτ). */
export interface CellPoint {
  readonly u: Disc;
  readonly inverse: Disc;
  readonly point: Disc;
  readonly flipped: boolean;
  readonly m: bigint;
  readonly n: bigint;
}

export function cellPoint(v: Disc, tau: Disc, wp: number): CellPoint {
  const height = disc.imag(tau);
  const turned = ball.sign(disc.imag(v)) === -1 || (disc.imag(v).man < 0n && !ball.isZero(disc.imag(v)));
  const up = turned ? disc.neg(v) : v;
  const n = nearestInteger(ball.div(disc.imag(up), height, 64 + Math.max(0, disc.magnitude(v))));
  const sheared = n === 0n ? up : disc.sub(up, disc.mulInt(tau, n, wp), wp);
  const m = nearestInteger(disc.real(sheared));
  const centred = m === 0n ? sheared : disc.sub(sheared, disc.fromBall(ball.fromInt(m)), wp);
  // After the shift the point may be in the lower half again; then −point is in the upper one.
  const low = disc.imag(centred).man < 0n;
  const point = low ? disc.neg(centred) : centred;
  const flipped = turned !== low;
  const sign = low ? -1n : 1n;
  const u = disc.exp(disc.mulI(disc.mulBall(point, ball.ldexp(ball.pi(wp + 8), 1), wp + 8)), wp);
  return { u, inverse: disc.inv(u, wp), point, flipped, m: sign * m, n: sign * n };
}

/** D^k θ_j of the header at a point of the cell for k = 0 .. order, divided by e^(πiτ/4 − πiv) for j = 1, 2. */
export function cellSums(j: ThetaIndex, at: CellPoint, q: Disc, q2: Disc, order: number, wp: number): Disc[] {
  const side = j === 2 || j === 3 ? disc.neg : (x: Disc) => x;
  if (j <= 2) {
    const sums = thetaSums(side(at.u), side(disc.mul(q2, at.inverse, wp)), q2, order, wp);
    return j === 1 ? sums.map(disc.mulI) : sums;
  }
  const sums = thetaSums(side(disc.mul(q, at.inverse, wp)), side(disc.mul(q, at.u, wp)), q2, order, wp);
  return sums.map((_, k) => {
    let value: Disc = disc.zero;
    for (let i = 0; i <= k; i++) value = disc.add(value, disc.mulInt(sums[i]!, BINOMIAL[k]![i]!, wp), wp);
    return k & 1 ? disc.neg(value) : value;
  });
}

const BINOMIAL: readonly (readonly number[])[] = [[1], [1, 1], [1, 2, 1], [1, 3, 3, 1]];

/**
 * θ_j(v | τ) and its derivatives in v up to the given order, with sin πv in θ1.
 *
 * Domain   Im τ > 0, any v; 0 <= order <= 3.
 * Branch   none: q^(1/4) is exp(πiτ/4).
 * Error    enclosures; relative to the largest term where the function has a zero.
 * Cost     the reduction of τ, two exponentials and a series of √prec terms.
 * Throws   DomainError for Im τ <= 0 or another order.
 * Source   DLMF 20.2.1–20.2.4 with z = πv and q = exp(πiτ); 20.2.6–20.2.8 and 20.7(viii).
 */
export function thetaJet(j: ThetaIndex, v: Disc, tau: Disc, order: number, prec: number): Disc[] {
  if (!(Number.isInteger(order) && order >= 0 && order <= MAX_ORDER)) {
    throw new DomainError({
      subject: "theta",
      given: `the derivative of order ${order}`,
      expected: `an order from 0 to ${MAX_ORDER}`,
      argument: "order",
    });
  }
  const wp = prec + 32 + spareBits(v, prec);
  const jet = transformedJet(j, v, reduction(tau, wp), order, wp);
  return jet.map((x, k) => onAxis(j, k, v, tau, disc.round(x, prec + 2)));
}

/** A far v has large exponents; beside 0 the first function is small. */
function spareBits(v: Disc, prec: number): number {
  if (disc.isZero(v)) return 0;
  const size = disc.magnitude(v);
  return size > 0 ? 2 * size : Math.min(-size, 64 * prec);
}

function transformedJet(
  j: ThetaIndex,
  v: Disc,
  { matrix, tau, factor, root, word }: Reduction,
  order: number,
  wp: number,
): Disc[] {
  const { index, eighths } = thetaMultiplier(word, j);
  const pi = ball.pi(wp + 8);
  const over = disc.inv(factor, wp);
  const moved = disc.mul(v, over, wp);
  const at = cellPoint(moved, tau, wp);
  const q = disc.exp(disc.mulI(disc.mulBall(tau, pi, wp + 8)), wp);
  const sums = cellSums(index, at, q, disc.sqr(q, wp), order, wp);
  // The exponent over πi: −c v²/(cτ+d) from the turns, −n²τ − 2n·point from the cell, τ/4 − point for θ1 and θ2.
  const turn = disc.mul(disc.mulInt(moved, -matrix.c, wp), v, wp);
  const cell = disc.neg(disc.add(disc.mulInt(tau, at.n * at.n, wp), disc.mulInt(at.point, 2n * at.n, wp), wp));
  const quarter = index <= 2 ? disc.sub(disc.ldexp(tau, -2), at.point, wp) : disc.zero;
  const exponent = disc.add(disc.add(turn, cell, wp), quarter, wp);
  const scale = disc.exp(disc.mulI(disc.mulBall(exponent, pi, wp)), wp);
  const constant = disc.div(disc.mul(eighthRoot(eighths, wp), scale, wp), root, wp);
  const signed = negative(index, at) ? disc.neg(constant) : constant;
  return leibniz(sums, signed, matrix.c, at, over, v, pi, wp);
}

/** The sign from the cell, θ1(v + m + nτ) ∝ (−1)^(m+n) θ1(v), θ2 ∝ (−1)^m, θ3 ∝ 1, θ4 ∝ (−1)^n, and from θ1(−v) = −θ1(v). */
function negative(j: ThetaIndex, { m, n, flipped }: CellPoint): boolean {
  const parity = j === 1 ? (m + n + (flipped ? 1n : 0n)) & 1n : j === 2 ? m & 1n : j === 4 ? n & 1n : 0n;
  return parity === 1n;
}

/**
 * Derivatives in v of e^Φ Θ(w) with w = ±v/(cτ+d) − m − nτ: Φ′ = −2πi (c v ± n)/(cτ+d), Φ″ = −2πi c/(cτ+d), and Θ^(k) from the sums.
 */
function leibniz(
  sums: readonly Disc[],
  constant: Disc,
  c: bigint,
  at: CellPoint,
  over: Disc,
  v: Disc,
  pi: ball.Ball,
  wp: number,
): Disc[] {
  const mul = (x: Disc, y: Disc) => disc.mul(x, y, wp);
  const add = (x: Disc, y: Disc) => disc.add(x, y, wp);
  const rate = disc.mulI(disc.mulBall(at.flipped ? disc.neg(over) : over, pi, wp));
  let power: Disc = disc.one;
  const inner = sums.map((s) => {
    const value = mul(s, power);
    power = mul(power, rate);
    return value;
  });
  if (sums.length === 1) return [mul(constant, inner[0]!)];
  const minusTwoPiI = disc.neg(disc.mulI(disc.fromBall(ball.ldexp(pi, 1))));
  const shiftBy = at.flipped ? -at.n : at.n;
  const whole = disc.fromBall(ball.fromInt(shiftBy));
  const first = mul(mul(add(disc.mulInt(v, c, wp), whole), over), minusTwoPiI);
  const second = mul(disc.mulInt(over, c, wp), minusTwoPiI);
  // Derivatives of e^Φ over e^Φ.
  const square = mul(first, first);
  const outer = [disc.one, first, add(square, second), mul(first, add(square, disc.mulInt(second, 3, wp)))];
  return inner.map((_, k) => {
    let value: Disc = disc.zero;
    for (let i = 0; i <= k; i++) value = add(value, disc.mulInt(mul(outer[k - i]!, inner[i]!), BINOMIAL[k]![i]!, wp));
    return mul(constant, value);
  });
}

/** exp(2πi·k/8). */
export function eighthRoot(k: number, wp: number): Disc {
  const quarter = k >> 1;
  let value: Disc = disc.one;
  if (k & 1) {
    const half = ball.sqrt({ man: 1n, exp: -1, rad: 0 }, wp);
    value = disc.fromBalls(half, half);
  }
  for (let n = 0; n < quarter; n++) value = disc.mulI(value);
  return value;
}

/**
 * What symmetry knows of the value: zeros at v = 0; real values for real v and imaginary τ, and the parity for imaginary v.
 */
function onAxis(j: ThetaIndex, k: number, v: Disc, tau: Disc, value: Disc): Disc {
  const odd = (j === 1 ? 1 : 0) !== (k & 1);
  if (disc.isZero(v) && odd) return disc.zero;
  if (tau.axis !== "imaginary" || v.axis === "plane") return value;
  if (v.axis === "real") return ontoReal(value);
  // d/dv = −i d/dy: an odd function of iy is imaginary, and each derivative turns once.
  return odd ? ontoImaginary(value) : ontoReal(value);
}
