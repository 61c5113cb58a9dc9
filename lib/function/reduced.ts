// A reduced basis with all that the Weierstrass functions of the lattice need at one precision.
//
// For full periods r1, r2 with τ = r2/r1, P = (π/r1)², and the sums of theta-sums.ts:
//     ℘(r1/2) = P/3 (θ2⁴ + 2θ4⁴),  ℘((r1+r2)/2) = P/3 (θ2⁴ − θ4⁴),  ℘(r2/2) = −P/3 (2θ2⁴ + θ4⁴)      (DLMF 23.6.5–7)
//     g2 = (2/3) P² (θ2⁸ + θ3⁸ + θ4⁸),  Δ = 16 P⁶ (θ2 θ3 θ4)⁸                                        (DLMF 23.6(i), 23.10)
//     η1 = −θ1‴/(3 r1 θ1′) = π² T3/(3 r1 T1),  η2 = (η1 r2 − 2πi)/r1                             (DLMF 23.6.8, 23.2.14)

import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { radiusMagnitude } from "./enclosure.ts";
import { thetaConstants } from "./theta-sums.ts";

export interface ReducedLattice {
  /** Bits that the periods were asked for with. */
  readonly prec: number;
  readonly r1: Disc;
  readonly r2: Disc;
  readonly tau: Disc;
  /** exp(πiτ), its square and the sum Σ (−1)^n (2n+1) q^(n(n+1)). */
  readonly q: Disc;
  readonly q2: Disc;
  readonly first: Disc;
  /** 1/r1. */
  readonly over: Disc;
  /** π/r1, (π/r1)² and (π/r1)³. */
  readonly unit: Disc;
  readonly scale: Disc;
  readonly cube: Disc;
  /** η1/r1. */
  readonly mean: Disc;
  /** θ2⁴, θ3⁴, θ4⁴ at v = 0. */
  readonly fourth: readonly [Disc, Disc, Disc];
  /** Quasi-periods of r1, r2. */
  readonly eta1: Disc;
  readonly eta2: Disc;
}

/**
 * Data of the lattice with the basis r1, r2.
 *
 * Domain   Im(r2/r1) >= 0.84, as a reduced basis has.
 * Error    enclosures; relative error of each field about that of the periods.
 * Cost     one exponential, a dozen products, a theta series of √(prec) terms.
 * Throws   PrecisionError if the enclosure of τ leaves the domain.
 */
export function reducedLattice(r1: Disc, r2: Disc, prec: number): ReducedLattice {
  const wp = prec + 16;
  const pi = ball.pi(wp + 8);
  const tau = disc.div(r2, r1, wp);
  const q = disc.exp(disc.mulI(disc.mulBall(tau, pi, wp + 8)), wp);
  const q2 = disc.sqr(q, wp);
  const sums = thetaConstants(q, Math.max(64, Math.min(wp, 48 - radiusMagnitude(q))));
  const fourthPower = (x: Disc) => disc.sqr(disc.sqr(x, wp), wp);
  const theta2 = disc.mul(disc.ldexp(q, 4), fourthPower(sums.half2), wp);
  const over = disc.inv(r1, wp);
  const unit = disc.mulBall(over, pi, wp);
  const scale = disc.sqr(unit, wp);
  const ratio = disc.div(sums.third, disc.mulInt(sums.first, 3n, wp), wp);
  const mean = disc.mul(scale, ratio, wp);
  const eta1 = disc.mul(mean, r1, wp);
  const eta2 = disc.sub(disc.mul(eta1, tau, wp), disc.ldexp(disc.mulI(unit), 1), wp);
  return {
    prec,
    r1,
    r2,
    tau,
    q,
    q2,
    first: sums.first,
    over,
    unit,
    scale,
    cube: disc.mul(scale, unit, wp),
    mean,
    fourth: [theta2, fourthPower(sums.theta3), fourthPower(sums.theta4)],
    eta1,
    eta2,
  };
}

/** ℘ at r1/2, (r1+r2)/2 and r2/2, in this order. */
export function reducedRoots(l: ReducedLattice): [Disc, Disc, Disc] {
  const wp = l.prec + 16;
  const [t2, , t4] = l.fourth;
  const third = disc.divBall(l.scale, ball.fromInt(3), wp);
  const at = (x: Disc) => disc.mul(third, x, wp);
  return [
    at(disc.add(t2, disc.ldexp(t4, 1), wp)),
    at(disc.sub(t2, t4, wp)),
    disc.neg(at(disc.add(disc.ldexp(t2, 1), t4, wp))),
  ];
}

export interface Invariants {
  readonly g2: Disc;
  readonly g3: Disc;
}

/** g2 and g3; near j = 0 and j = 1728 one of them is small and has an absolute error of the size of its terms. */
export function reducedInvariants(l: ReducedLattice): Invariants {
  const wp = l.prec + 16;
  const [t2, t3, t4] = l.fourth;
  const squares = disc.add(disc.add(disc.sqr(t2, wp), disc.sqr(t3, wp), wp), disc.sqr(t4, wp), wp);
  const g2 = disc.divBall(disc.mul(disc.ldexp(disc.sqr(l.scale, wp), 1), squares, wp), ball.fromInt(3), wp);
  const [e1, e2, e3] = reducedRoots(l);
  const g3 = disc.ldexp(disc.mul(disc.mul(e1, e2, wp), e3, wp), 2);
  return { g2, g3 };
}

/** Δ = g2³ − 27 g3² as a product, so with full relative accuracy. */
export function reducedDiscriminant(l: ReducedLattice): Disc {
  const wp = l.prec + 16;
  const [t2, t3, t4] = l.fourth;
  const all = disc.sqr(disc.mul(disc.mul(t2, t3, wp), t4, wp), wp);
  const cube = disc.mul(disc.sqr(l.scale, wp), l.scale, wp);
  return disc.ldexp(disc.mul(disc.sqr(cube, wp), all, wp), 4);
}

/** j = 1728 g2³/Δ = 32 (θ2⁸ + θ3⁸ + θ4⁸)³ / (θ2 θ3 θ4)⁸ (DLMF 23.15.7 with J = j/1728). */
export function reducedJ(l: ReducedLattice): Disc {
  const wp = l.prec + 16;
  const [t2, t3, t4] = l.fourth;
  const squares = disc.add(disc.add(disc.sqr(t2, wp), disc.sqr(t3, wp), wp), disc.sqr(t4, wp), wp);
  const cube = disc.mul(disc.sqr(squares, wp), squares, wp);
  const all = disc.sqr(disc.mul(disc.mul(t2, t3, wp), t4, wp), wp);
  return disc.ldexp(disc.div(cube, all, wp), 5);
}
