// ℘, ℘′, ζ and σ of a reduced lattice at one point, from one theta jet.
//
// With v = z/r1 in the cell, ρ_k = S_k/S_0 (theta-sums.ts), D = d/dv:
//     θ1′/θ1 = πi ρ1,  θ1″/θ1 = −π² ρ2,  θ1‴/θ1 = −iπ³ ρ3
//     ζ(z) = η1 v + (πi/r1) ρ1                                     (DLMF 23.6.13)
//     ℘(z) = −η1/r1 + (π/r1)² (ρ2 − ρ1²)                            (−ζ′)
//     ℘′(z) = i (π/r1)³ (ρ3 − 3 ρ1 ρ2 + 2 ρ1³)
//     σ(z) = (i r1/2π) exp(η1 z²/(2 r1) − πiv) S_0/T1                   (DLMF 23.6.9)
// Arguments outside the cell: ζ(z + w) = ζ(z) + η(w), σ(z + w) = ±exp(η(w)(z + w/2)) σ(z), minus unless w ∈ 2Λ (DLMF 23.2.17).

import type { Ball } from "../number/ball.ts";
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { PoleError } from "../proof/errors.ts";
import { nearestInteger, radiusMagnitude } from "./enclosure.ts";
import type { ReducedLattice } from "./reduced.ts";
import { thetaSums } from "./theta-sums.ts";

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
  const v = disc.div(z, l.r1, prec + 8);
  const height = disc.imag(l.tau);
  const m2 = nearestInteger(ball.div(disc.imag(v), height, 53 + bitsAbove(v)));
  const sheared = m2 === 0n ? v : disc.sub(v, disc.mulInt(l.tau, m2, prec + 8), prec + 8);
  const m1 = nearestInteger(disc.real(sheared));
  if (m1 === 0n && m2 === 0n) return { rest: z, v, m1, m2 };
  const shift = combination(l.r1, l.r2, m1, m2, prec + 8);
  const rest = disc.sub(z, shift, prec + 8);
  return { rest, v: disc.div(rest, l.r1, prec + 8), m1, m2 };
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
 * Cost     one exponential, one sine with cosine, a theta series of √prec terms; σ takes one complex exponential more.
 * Throws   PoleError (with the coordinates of the lattice point in the reduced basis) if the disc of z holds one and a function with
 *          poles is wanted.
 */
export function weierstrass(l: ReducedLattice, z: Disc, prec: number, wanted: readonly Wanted[]): WeierstrassValues {
  return atCell(l, toCell(l, z, prec), prec, wanted);
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
  if (poles && disc.containsZero(v)) throw pole(at);
  const near = Math.max(0, -disc.magnitude(v));
  const wp = sharpness(l, v, prec + 24 + Math.min(near, 64 * prec));
  const order = wanted.includes("prime") ? 3 : wanted.includes("wp") ? 2 : wanted.includes("zeta") ? 1 : 0;
  const pi = ball.pi(wp + 8);
  const { u, inverse } = phases(v, pi, wp);
  const t = disc.mul(l.q2, inverse, wp);
  const sums = thetaSums(u, t, l.q2, order, wp);
  const out: { [K in Wanted]?: Disc } = {};
  const odd = (x: Disc) => (upward ? x : disc.neg(x));
  if (poles) {
    const s0 = sums[0]!;
    if (disc.containsZero(s0)) throw pole(at);
    const over = disc.inv(s0, wp);
    const rho = sums.map((s, k) => (k === 0 ? disc.one : disc.mul(s, over, wp)));
    Object.assign(out, quotients(l, v, rho, pi, wanted, prec));
    if (out.prime) out.prime = odd(out.prime);
    if (out.zeta) out.zeta = disc.add(odd(out.zeta), combination(l.eta1, l.eta2, at.m1, at.m2, prec + 8), prec);
  }
  if (wanted.includes("sigma")) out.sigma = shiftedSigma(l, at, odd(cellSigma(l, v, sums[0]!, pi, wp)), prec);
  return out;
}

/** wp, or what the enclosures of v and q allow and a few bits more. */
function sharpness(l: ReducedLattice, v: Disc, wp: number): number {
  const coarse = Math.max(radiusMagnitude(v), radiusMagnitude(l.q2));
  return Math.max(64, Math.min(wp, 48 - coarse));
}

/** u = exp(2πiv) and 1/u from one real exponential and one sine with cosine. */
function phases(v: Disc, pi: Ball, wp: number): { u: Disc; inverse: Disc } {
  const twoPi = ball.ldexp(pi, 1);
  const y = ball.mul(disc.imag(v), twoPi, wp + 8);
  const { sin, cos } = ball.sinCos(ball.mul(disc.real(v), twoPi, wp + 8), wp + 4);
  const size = ball.exp(ball.neg(y), wp + 4);
  const phase = disc.fromBalls(cos, sin);
  return { u: disc.mulBall(phase, size, wp), inverse: disc.mulBall(disc.conj(phase), ball.inv(size, wp), wp) };
}

function quotients(
  l: ReducedLattice,
  v: Disc,
  rho: readonly Disc[],
  pi: Ball,
  wanted: readonly Wanted[],
  prec: number,
): { [K in Wanted]?: Disc } {
  const wp = prec + 20;
  const out: { [K in Wanted]?: Disc } = {};
  const k = disc.div(disc.fromBall(pi), l.r1, wp);
  const r1 = rho[1]!;
  if (wanted.includes("zeta")) {
    out.zeta = disc.add(disc.mul(l.eta1, v, wp), disc.mulI(disc.mul(k, r1, wp)), prec);
  }
  if (wanted.includes("wp")) {
    const difference = disc.sub(rho[2]!, disc.sqr(r1, wp), wp);
    out.wp = disc.sub(disc.mul(l.scale, difference, wp), disc.div(l.eta1, l.r1, wp), prec);
  }
  if (wanted.includes("prime")) {
    // ρ3 − ρ1 (3ρ2 − 2ρ1²)
    const inner = disc.sub(disc.mulInt(rho[2]!, 3n, wp), disc.ldexp(disc.sqr(r1, wp), 1), wp);
    const sum = disc.sub(rho[3]!, disc.mul(r1, inner, wp), wp);
    out.prime = disc.round(disc.mulI(disc.mul(disc.mul(l.scale, k, wp), sum, wp)), prec);
  }
  return out;
}

/** σ(v r1) for v in the upper half of the cell. */
function cellSigma(l: ReducedLattice, v: Disc, s0: Disc, pi: Ball, wp: number): Disc {
  const half = disc.ldexp(disc.mul(disc.mul(l.eta1, l.r1, wp), disc.sqr(v, wp), wp), -1);
  const exponent = disc.sub(half, disc.mulI(disc.mulBall(v, pi, wp)), wp);
  const factor = disc.mulI(disc.div(l.r1, disc.mulBall(l.first, ball.ldexp(pi, 1), wp), wp));
  return disc.mul(disc.mul(factor, s0, wp), disc.exp(exponent, wp), wp);
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

function pole({ m1, m2 }: CellArgument): PoleError {
  return new LatticePointError(m1, m2, `${m1}·r1 + ${m2}·r2 of the reduced basis`);
}
