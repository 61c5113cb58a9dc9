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
import { LARGEST_LOGARITHM, nomeOf, type Reduction, reduction } from "./modular-action.ts";
import { eighthRoot, type ThetaIndex, thetaMultiplier } from "./theta-multiplier.ts";
import { thetaSums } from "./theta-sums.ts";

export type { ThetaIndex } from "./theta-multiplier.ts";

/** Beyond this a derivative is taken for a slip. */
export const MAX_ORDER = 1000;

/** A point of the cell of a reduced τ in its upper half, and how it got there: v = ±(point + m + nτ). */
export interface CellPlace {
  readonly point: Disc;
  readonly flipped: boolean;
  readonly m: bigint;
  readonly n: bigint;
}

/** The same with u = exp(2πi·point) and 1/u. */
export interface CellPoint extends CellPlace {
  readonly u: Disc;
  readonly inverse: Disc;
}

export function cellPoint(v: Disc, tau: Disc, wp: number): CellPoint {
  const place = cellPlace(v, tau, wp);
  const u = disc.exp(disc.mulI(disc.mulBall(place.point, ball.ldexp(ball.pi(wp + 8), 1), wp + 8)), wp);
  return { ...place, u, inverse: disc.inv(u, wp) };
}

export function cellPlace(v: Disc, tau: Disc, wp: number): CellPlace {
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
  return { point, flipped, m: sign * m, n: sign * n };
}

/** D^k θ_j of the header at a point of the cell for k = 0 .. order, divided by e^(πiτ/4 − πiv) for j = 1, 2. */
export function cellSums(j: ThetaIndex, at: CellPoint, q: Disc, q2: Disc, order: number, wp: number): Disc[] {
  const side = j === 2 || j === 3 ? disc.neg : (x: Disc) => x;
  if (j <= 2) {
    const sums = thetaSums(side(at.u), side(disc.mul(q2, at.inverse, wp)), q2, order, wp);
    return j === 1 ? sums.map(disc.mulI) : sums;
  }
  const sums = thetaSums(side(disc.mul(q, at.inverse, wp)), side(disc.mul(q, at.u, wp)), q2, order, wp);
  const ones = sums.map(() => disc.one);
  return leibniz(sums, ones, wp).map((value, k) => (k & 1 ? disc.neg(value) : value));
}

/** The derivatives of a product from those of its factors, from order 0 on. */
export function leibniz(f: readonly Disc[], g: readonly Disc[], wp: number): Disc[] {
  let row = [1n];
  return f.map((_, n) => {
    if (n > 0) row = [1n, ...row.slice(1).map((c, i) => c + row[i]!), 1n];
    let value: Disc = disc.zero;
    row.forEach((c, k) => {
      value = disc.add(value, disc.mulInt(disc.mul(f[k]!, g[n - k]!, wp), c, wp), wp);
    });
    return value;
  });
}

/**
 * θ_j(v | τ) and its derivatives in v up to the given order, with sin πv in θ1.
 *
 * Domain   Im τ > 0, any v.
 * Branch   none: q^(1/4) is exp(πiτ/4).
 * Error    enclosures; relative to the largest term where the function has a zero.
 * Cost     the reduction of τ, two exponentials and a series of √prec terms; order² products beside.
 * Throws   DomainError for Im τ <= 0, or an order that is not an integer from 0 to 1000.
 * Source   DLMF 20.2.1–20.2.4 with z = πv and q = exp(πiτ); 20.2.6–20.2.8 and 20.7(viii).
 */
export function thetaJet(j: ThetaIndex, v: Disc, tau: Disc, order: number, prec: number): Disc[] {
  checkOrder(order);
  const wp = prec + 32 + spareBits(v, prec) + orderBits(order, prec);
  const jet = transformedJet(j, v, reduction(tau, wp), order, wp);
  return jet.map((x, k) => onAxis(j, k, v, tau, disc.round(x, prec + 2)));
}

/** Refuses an order that is no whole number within reach. */
export function checkOrder(order: number): void {
  if (Number.isInteger(order) && order >= 0 && order <= MAX_ORDER) return;
  throw new DomainError({
    subject: "theta",
    given: `the derivative of order ${order}`,
    expected: `an integer from 0 to ${MAX_ORDER}`,
    argument: "derivative",
  });
}

/** The last of the √(prec/4) terms have the weight (2n+1)^order. */
function orderBits(order: number, prec: number): number {
  return order * Math.ceil(Math.log2(Math.sqrt(prec + 64) + 3));
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
  const q = nomeOf(tau, wp);
  const sums = cellSums(index, at, q, disc.sqr(q, wp), order, wp);
  // The exponent over πi: −c v²/(cτ+d) from the turns, −n²τ − 2n·point from the cell, τ/4 − point for θ1 and θ2.
  const turn = disc.mul(disc.mulInt(moved, -matrix.c, wp), v, wp);
  const cell = disc.neg(disc.add(disc.mulInt(tau, at.n * at.n, wp), disc.mulInt(at.point, 2n * at.n, wp), wp));
  const quarter = index <= 2 ? disc.sub(disc.ldexp(tau, -2), at.point, wp) : disc.zero;
  const exponent = disc.add(disc.add(turn, cell, wp), quarter, wp);
  refuseFar(exponent, v, matrix.c === 0n ? tau : undefined);
  const scale = disc.exp(disc.mulI(disc.mulBall(exponent, pi, wp)), wp);
  const constant = disc.div(disc.mul(eighthRoot(eighths, wp), scale, wp), root, wp);
  const signed = negative(index, at) ? disc.neg(constant) : constant;
  return chained(sums, signed, { c: matrix.c, at, over, v, pi, wp });
}

function refuseFar(exponent: Disc, v: Disc, tall: Disc | undefined): void {
  if (disc.magnitude(exponent) <= LARGEST_LOGARITHM) return;
  const ten = (bits: number) => `10^${Math.round(bits * Math.log10(2))}`;
  const height = ball.magnitude(disc.imag(v));
  const far = height > -Infinity && (tall !== undefined || height > 0);
  throw new DomainError({
    subject: "theta",
    given: `${far ? `an argument off the axis by about ${ten(height)}` : "a τ beside the real axis"}, where |ln θ| is about ${ten(disc.magnitude(exponent) + 2)}`,
    expected: `|ln θ| under ${ten(LARGEST_LOGARITHM)}`,
    hint: far
      ? "θ(v + nτ) is ± exp(−πi n²τ − 2πi n v) θ(v): take v within Im τ/2 of the axis and keep that factor apart."
      : "θ(v|τ) is a root times exp(−πi v²/τ) θ(v/τ | −1/τ): take the reduced τ and keep that factor apart.",
    argument: far ? "v" : "tau",
  });
}

/** The sign from the cell, θ1(v + m + nτ) ∝ (−1)^(m+n) θ1(v), θ2 ∝ (−1)^m, θ3 ∝ 1, θ4 ∝ (−1)^n, and from θ1(−v) = −θ1(v). */
export function negative(j: ThetaIndex, { m, n, flipped }: CellPlace): boolean {
  const parity = j === 1 ? (m + n + (flipped ? 1n : 0n)) & 1n : j === 2 ? m & 1n : j === 4 ? n & 1n : 0n;
  return parity === 1n;
}

/** v, τ and the way to the cell: w = ±v/(cτ+d) − m − nτ is the point where the sums are taken. */
interface Chain {
  readonly c: bigint;
  readonly at: CellPoint;
  /** 1/(cτ + d). */
  readonly over: Disc;
  readonly v: Disc;
  readonly pi: ball.Ball;
  readonly wp: number;
}

/** Derivatives in v of constant·e^Φ Θ(w): those of Θ from the sums, and Φ is quadratic in v. */
function chained(sums: readonly Disc[], constant: Disc, chain: Chain): Disc[] {
  const { at, over, pi, wp } = chain;
  const rate = disc.mulI(disc.mulBall(at.flipped ? disc.neg(over) : over, pi, wp));
  let power = constant;
  const inner = sums.map((s, k) => {
    if (k > 0) power = disc.mul(power, rate, wp);
    return disc.mul(s, power, wp);
  });
  return sums.length === 1 ? inner : leibniz(inner, quadraticExponential(chain, sums.length), wp);
}

/** Derivatives of e^Φ over e^Φ: Φ′ = −2πi (c v ± n)/(cτ+d), Φ″ = −2πi c/(cτ+d), and G_(k+1) = Φ′ G_k + k Φ″ G_(k−1). */
function quadraticExponential({ c, at, over, v, pi, wp }: Chain, count: number): Disc[] {
  const factor = disc.mul(over, disc.neg(disc.mulI(disc.fromBall(ball.ldexp(pi, 1)))), wp);
  const whole = disc.fromBall(ball.fromInt(at.flipped ? -at.n : at.n));
  const first = disc.mul(disc.add(disc.mulInt(v, c, wp), whole, wp), factor, wp);
  const second = disc.mulInt(factor, c, wp);
  const list: Disc[] = [disc.one, first];
  for (let k = 1; list.length < count; k++) {
    const last = disc.mulInt(disc.mul(second, list[k - 1]!, wp), k, wp);
    list.push(disc.add(disc.mul(first, list[k]!, wp), last, wp));
  }
  return list;
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
