// ℘, ℘′, ζ and σ of a reduced lattice at one point, from ln sin and one series.
//
// With v = z/r1 in the cell, x = πv, y = 4 sin² x, the sums E_j of cell-series.ts and ε_j = E_j/E_0, C = cot x, S = 1/sin² x,
// κ2 = ε2 − ε1², κ3 = ε3 − 3ε1ε2 + 2ε1³, and since y d/dy is d/dx over 2C:
//     f1 = (ln θ1)′ = C (1 + 2ε1)
//     f2 = (ln θ1)″ = −S (1 + 2ε1 − 4κ2) − 4κ2
//     f3 = (ln θ1)‴ = 2C [S (1 + 2ε1 − 6κ2 + 4κ3) − 4κ3]
//     ζ(z) = η1 v + (π/r1) f1                                       (DLMF 23.6.13)
//     ℘(z) = −η1/r1 − (π/r1)² f2,   ℘′(z) = −(π/r1)³ f3              (−ζ′, −ζ″)
//     σ(z) = (r1/π) exp(η1 z²/(2 r1)) sin x E_0/B_0                  (DLMF 23.6.9)
// Deep in a tall cell S and the κ are small, and the sums keep their relative accuracy.
// Arguments outside the cell: ζ(z + w) = ζ(z) + η(w), σ(z + w) = ±exp(η(w)(z + w/2)) σ(z), minus unless w ∈ 2Λ (DLMF 23.2.17).

import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { PoleError } from "../proof/errors.ts";
import { type CellSeries, cellSeries, cellSums } from "./cell-series.ts";
import { nearestInteger, radiusMagnitude } from "./enclosure.ts";
import { fixedWeierstrass } from "./fixed-weierstrass.ts";
import type { ReducedLattice } from "./reduced.ts";

/** An argument z = rest + m1 r1 + m2 r2 with rest in or beside the cell around 0. */
export interface CellArgument {
  readonly rest: Disc;
  /** rest/r1. */
  readonly v: Disc;
  readonly m1: bigint;
  readonly m2: bigint;
}

/**
 * z brought into the cell by a lattice vector that is chosen from midpoints; an identity whatever the choice.
 *
 * Error    the radius of `rest` is at least that of z; subtracting a long vector costs as many bits as it has.
 */
export function toCell(l: ReducedLattice, z: Disc, prec: number): CellArgument {
  const v = disc.mul(z, l.over, prec + 8);
  const height = disc.imag(l.tau);
  const m2 = nearestInteger(ball.div(disc.imag(v), height, 53 + bitsAbove(v)));
  const sheared = m2 === 0n ? v : disc.sub(v, disc.mulInt(l.tau, m2, prec + 8), prec + 8);
  const m1 = nearestInteger(disc.real(sheared));
  if (m1 === 0n && m2 === 0n) return { rest: z, v, m1, m2 };
  const shift = combination(l.r1, l.r2, m1, m2, prec + 8);
  const rest = disc.sub(z, shift, prec + 8);
  return { rest, v: disc.mul(rest, l.over, prec + 8), m1, m2 };
}

function bitsAbove(v: Disc): number {
  return Math.max(0, disc.magnitude(v));
}

/** m1 x + m2 y. */
export function combination(x: Disc, y: Disc, m1: bigint, m2: bigint, prec: number): Disc {
  return disc.add(disc.mulInt(x, m1, prec), disc.mulInt(y, m2, prec), prec);
}

export type Wanted = "wp" | "prime" | "zeta" | "sigma";

/** The values that were asked for. */
export type WeierstrassValues = { readonly [K in Wanted]?: Disc };

/**
 * The functions of `wanted` at z, together.
 *
 * Domain   every z; ℘, ℘′, ζ need z ∉ Λ.
 * Error    enclosures. For a z of full accuracy the relative error is about 2^−prec except near a zero of the function; a z far
 *          from the cell should come with as many bits more as |z/r1| has before the point.
 * Cost     one exponential, one sine with cosine, a series of √prec terms; σ takes one complex exponential more.
 * Throws   PoleError (with the coordinates of the lattice point in the reduced basis) if the disc of z holds one and a function with
 *          poles is wanted.
 */
export function weierstrass(l: ReducedLattice, z: Disc, prec: number, wanted: readonly Wanted[]): WeierstrassValues {
  if (withoutSigma(wanted)) {
    const fixed = fixedWeierstrass(l, seriesOf(l), z, prec, wanted);
    if (fixed) return fixed;
  }
  return atCell(l, toCell(l, z, prec), prec, wanted);
}

function withoutSigma(wanted: readonly Wanted[]): wanted is readonly Exclude<Wanted, "sigma">[] {
  return !wanted.includes("sigma");
}

/** The same for an argument that is in the cell already. */
export function atCell(
  l: ReducedLattice,
  at: CellArgument,
  prec: number,
  wanted: readonly Wanted[],
): WeierstrassValues {
  const upward = disc.imag(at.v).man >= 0n;
  const v = upward ? at.v : disc.neg(at.v);
  const poles = wanted.some((name) => name !== "sigma");
  if (poles && disc.containsZero(v)) throw atCellPole(at);
  const wp = sharpness(l, v, prec + 16);
  const { sin, cos } = disc.sinCos(disc.mulBall(v, ball.pi(wp + 8), wp), wp);
  const order = wanted.includes("prime") ? 3 : wanted.includes("wp") ? 2 : wanted.includes("zeta") ? 1 : 0;
  const sums = cellSums(seriesOf(l), disc.ldexp(disc.sqr(sin, wp), 2), order);
  const out: { [K in Wanted]?: Disc } = {};
  const odd = (x: Disc) => (upward ? x : disc.neg(x));
  if (poles) {
    if (disc.containsZero(sin)) throw atCellPole(at);
    Object.assign(out, fromLogarithm(l, v, derivatives(sin, cos, sums, wanted, wp), prec));
    if (out.prime) out.prime = odd(out.prime);
    if (out.zeta) out.zeta = shiftedZeta(l, at, odd(out.zeta), prec);
  }
  if (wanted.includes("sigma")) out.sigma = shiftedSigma(l, at, odd(cellSigma(l, v, sin, sums[0]!, wp)), prec);
  return out;
}

const allSeries = new WeakMap<ReducedLattice, CellSeries>();

/** The coefficients of the lattice, made at the first evaluation. */
function seriesOf(l: ReducedLattice): CellSeries {
  let series = allSeries.get(l);
  if (!series) {
    series = cellSeries(l.q, l.q2, l.prec + 16);
    allSeries.set(l, series);
  }
  return series;
}

/** wp, or what the enclosures of v and q allow and a few bits more. */
function sharpness(l: ReducedLattice, v: Disc, wp: number): number {
  const lost = Math.max(radiusMagnitude(v) - Math.min(0, disc.magnitude(v)), radiusMagnitude(l.q2));
  return Math.max(64, Math.min(wp, 48 - lost));
}

/** f1, −f2 and −f3 of the header, those that are wanted. */
interface Derivatives {
  readonly first?: Disc;
  readonly second?: Disc;
  readonly third?: Disc;
}

function derivatives(sin: Disc, cos: Disc, sums: readonly Disc[], wanted: readonly Wanted[], wp: number): Derivatives {
  const mul = (x: Disc, y: Disc) => disc.mul(x, y, wp);
  const over = disc.inv(sin, wp);
  const base = disc.inv(sums[0]!, wp);
  const [e1, e2, e3] = sums.slice(1).map((e) => mul(e, base));
  const linear = disc.add(disc.one, disc.ldexp(e1!, 1), wp);
  const cot = mul(cos, over);
  const first = wanted.includes("zeta") ? { first: mul(cot, linear) } : {};
  if (!e2) return first;
  const square = disc.sqr(over, wp);
  const e1Square = disc.sqr(e1!, wp);
  const kappa = disc.ldexp(disc.sub(e2, e1Square, wp), 2);
  const reduced = disc.sub(linear, kappa, wp);
  const second = wanted.includes("wp") ? { second: disc.add(mul(square, reduced), kappa, wp) } : {};
  if (!e3) return { ...first, ...second };
  // κ3 = ε3 − ε1 (3ε2 − 2ε1²)
  const inner = disc.sub(disc.mulInt(e2, 3n, wp), disc.ldexp(e1Square, 1), wp);
  const kappa3 = disc.ldexp(disc.sub(e3, mul(e1!, inner), wp), 2);
  const factor = disc.add(disc.sub(reduced, disc.ldexp(kappa, -1), wp), kappa3, wp);
  const sum = disc.sub(mul(square, factor), kappa3, wp);
  return { ...first, ...second, third: disc.neg(disc.ldexp(mul(cot, sum), 1)) };
}

/** The wanted values from the derivatives of ln θ1. */
function fromLogarithm(
  l: ReducedLattice,
  v: Disc,
  { first, second, third }: Derivatives,
  prec: number,
): { [K in Wanted]?: Disc } {
  const wp = prec + 8;
  const out: { [K in Wanted]?: Disc } = {};
  if (first) out.zeta = disc.add(disc.mul(l.eta1, v, wp), disc.mul(l.unit, first, wp), prec);
  if (second) out.wp = disc.sub(disc.mul(l.scale, second, wp), l.mean, prec);
  if (third) out.prime = disc.mul(l.cube, third, prec);
  return out;
}

function shiftedZeta(l: ReducedLattice, { m1, m2 }: CellArgument, zeta: Disc, prec: number): Disc {
  return m1 === 0n && m2 === 0n ? zeta : disc.add(zeta, combination(l.eta1, l.eta2, m1, m2, prec + 8), prec);
}

/** σ(v r1). */
function cellSigma(l: ReducedLattice, v: Disc, sin: Disc, e0: Disc, wp: number): Disc {
  const exponent = disc.ldexp(disc.mul(disc.mul(l.eta1, l.r1, wp), disc.sqr(v, wp), wp), -1);
  const factor = disc.div(e0, disc.mul(l.first, l.unit, wp), wp);
  return disc.mul(disc.mul(factor, sin, wp), disc.exp(exponent, wp), wp);
}

function shiftedSigma(l: ReducedLattice, at: CellArgument, sigma: Disc, prec: number): Disc {
  const { m1, m2, rest } = at;
  if (m1 === 0n && m2 === 0n) return disc.round(sigma, prec);
  const wp = prec + 16;
  const eta = combination(l.eta1, l.eta2, m1, m2, wp);
  const middle = disc.add(rest, disc.ldexp(combination(l.r1, l.r2, m1, m2, wp), -1), wp);
  const value = disc.mul(sigma, disc.exp(disc.mul(eta, middle, wp), wp), prec);
  // (−1)^(m1 + m2 + m1 m2)
  return (m1 | m2) & 1n ? disc.neg(value) : value;
}

/** A pole at a lattice point, with its coordinates in the basis of whoever throws. */
export class LatticePointError extends PoleError {
  readonly m1: bigint;
  readonly m2: bigint;

  constructor(m1: bigint, m2: bigint, where: string, subject = "Weierstrass function") {
    super({
      subject,
      given: `an argument that is, or cannot be told from, the lattice point ${where}`,
      expected: "an argument away from the lattice",
      hint: "℘, ℘′ and ζ have poles there, which their Laurent series describe; an argument near one needs more digits.",
      argument: "z",
    });
    this.name = "PoleError";
    this.m1 = m1;
    this.m2 = m2;
  }
}

/** The error for an argument that meets a lattice point. */
export function atCellPole({ m1, m2 }: CellArgument): PoleError {
  return new LatticePointError(m1, m2, `${m1}·r1 + ${m2}·r2 of the reduced basis`);
}
