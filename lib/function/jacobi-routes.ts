// Second routes to Jacobi's amplitude, zeta and epsilon functions: Fourier series in the nome, and the logarithm of cn + i sn.
//
// With v = u/2K and q = exp(−πK′/K), in the strip |Im v| < Im τ/2 (DLMF 22.11.3 integrated, 20.5.13)
//     am u = πv + 2 Σ q^j/(j (1 + q^(2j))) sin 2πjv,      Z(u) = (2π/K) Σ q^j/(1 − q^(2j)) sin 2πjv,
// and Z(u + 2iK′) = Z(u) − iπ/K leads into it. dn has no pole there, nor has the segment from 0 to u, so that the first series is am.

import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { DomainError } from "../proof/errors.ts";
import { nearestInteger } from "./enclosure.ts";
import { roughAmplitude } from "./jacobi-path.ts";
import { jacobiByTheta } from "./jacobi-theta.ts";
import { quarterPeriod } from "./jacobi-values.ts";
import { completeE, type Modulus } from "./legendre-complete.ts";

const MOST_TERMS = 20_000;

/** The place in the strip: v − nτ, with the quarter period and the nome. */
interface Strip {
  readonly v: Disc;
  readonly turns: bigint;
  readonly quarter: Disc;
  readonly q: Disc;
}

function stripAt(u: Disc, { m, m1 }: Modulus, wp: number): Strip {
  const quarter = quarterPeriod(m1, wp);
  const tau = disc.mulI(disc.div(quarterPeriod(m, wp), quarter, wp));
  const v = disc.ldexp(disc.div(u, quarter, wp), -1);
  const turns = nearestInteger(ball.div(disc.imag(v), disc.imag(tau), 64 + Math.max(0, disc.magnitude(v))));
  const q = disc.exp(disc.mulI(disc.mulBall(tau, ball.pi(wp + 8), wp)), wp);
  return { v: disc.sub(v, disc.mulInt(tau, turns, wp), wp), turns, quarter, q };
}

/**
 * Σ_j (a^j − b^j) w_j(q^(2j)), a = q e^(2πiv), b = q e^(−2πiv), with |w_j| <= 1/(1 − |q|²).
 * Error    with r >= |a|, |b| the terms after the N-th are together at most 2 r^(N+1)/((1 − r)(1 − |q|²)).
 * Throws   DomainError where r is so near 1 (or not below it) that 20000 terms do not do.
 */
function fourierSum({ v, q }: Strip, weight: (square: Disc, j: number, wp: number) => Disc, wp: number): Disc {
  const e = disc.exp(disc.mulI(disc.mulBall(v, ball.ldexp(ball.pi(wp + 8), 1), wp)), wp);
  const [a, b, square] = [disc.mul(q, e, wp), disc.div(q, e, wp), disc.sqr(q, wp)];
  const [sizeA, sizeB] = [a, b].map((x) => ball.upper(disc.abs(x, 53))) as [ball.Ball, ball.Ball];
  const r = ball.compare(sizeA, sizeB) === -1 ? sizeB : sizeA;
  // The number of terms is only a plan; the bound is taken from r.
  const count = Math.ceil((wp + 16) / -Math.log2(ball.toDouble(r))) + 1;
  if (ball.compare(r, ball.one) !== -1 || !(count < MOST_TERMS)) throw nearPole();
  let sum: Disc = disc.zero;
  let [powerA, powerB, power] = [a, b, square];
  for (let j = 1; j <= count; j++) {
    const difference = disc.sub(powerA, powerB, wp);
    sum = disc.add(sum, disc.mul(difference, weight(power, j, wp), wp), wp);
    [powerA, powerB, power] = [disc.mul(powerA, a, wp), disc.mul(powerB, b, wp), disc.mul(power, square, wp)];
  }
  const less = (x: ball.Ball) => ball.lower(ball.sub(ball.one, x, 53));
  const bottom = ball.mul(less(r), less(ball.upper(disc.abs(square, 53))), 53);
  const rest = ball.div(ball.ldexp(ball.pow(r, count + 1, 53), 1), bottom, 53);
  return disc.widenBy(sum, ball.upper(rest), wp, false);
}

function nearPole(): DomainError {
  return new DomainError({
    subject: "Fourier series of a Jacobi function",
    given: "an argument on the edge of the strip |Im (u/2K)| < Im τ/2, or all but on it",
    expected: "an argument inside, where the series converges",
    argument: "u",
  });
}

/** Z(u | m) by its Fourier series; as jacobiZeta, m other than 0 and 1. */
export function zetaByFourier(u: Disc, modulus: Modulus, prec: number): Disc {
  const wp = prec + 32 + 2 * Math.max(0, disc.magnitude(u));
  const strip = stripAt(u, modulus, wp);
  const sum = fourierSum(strip, (square) => disc.inv(disc.sub(disc.one, square, wp), wp), wp);
  const whole = disc.add(sum, disc.fromBall(ball.fromInt(strip.turns)), wp);
  return disc.neg(disc.mulI(disc.div(disc.mulBall(whole, ball.pi(wp), wp), strip.quarter, prec)));
}

/** ε(u | m) = Z(u) + u E/K. */
export function epsilonByFourier(u: Disc, modulus: Modulus, prec: number): Disc {
  const wp = prec + 16 + Math.max(0, disc.magnitude(u));
  // On the cut m > 1 K and E are those from one side; ε does not depend on it.
  const onCut = modulus.m1.axis === "real" && modulus.m1.re < 0n;
  const mean = disc.div(completeE(onCut ? { ...modulus, side: -1 } : modulus, wp), quarterPeriod(modulus.m1, wp), wp);
  return disc.add(zetaByFourier(u, modulus, wp), disc.mul(mean, u, wp), prec);
}

/** am(u | m) by its Fourier series, in the strip. */
export function amplitudeByFourier(u: Disc, modulus: Modulus, prec: number): Disc {
  const wp = prec + 32 + 2 * Math.max(0, disc.magnitude(u));
  const strip = stripAt(u, modulus, wp);
  if (strip.turns !== 0n) throw nearPole();
  const weight = (square: Disc, j: number) => disc.inv(disc.mulInt(disc.add(disc.one, square, wp), j, wp), wp);
  const sum = disc.neg(disc.mulI(fourierSum(strip, weight, wp)));
  return disc.add(disc.mulBall(strip.v, ball.pi(wp), wp), sum, prec);
}

/** am(u | m) = −i ln(cn + i sn) by theta series, with the turns counted along the segment from 0 to u. */
export function amplitudeByLogarithm(u: Disc, modulus: Modulus, prec: number): Disc {
  const wp = prec + 24;
  const rough = roughAmplitude(u, modulus);
  const [sn, cn] = (["sn", "cn"] as const).map((name) => jacobiByTheta(name, u, modulus, wp)) as [Disc, Disc];
  const angle = disc.neg(disc.mulI(disc.ln(disc.add(cn, disc.mulI(sn), wp), wp, { cut: "continuous" })));
  const pi = ball.pi(wp);
  const off = ball.div(disc.real(disc.sub(rough, angle, 64)), ball.ldexp(pi, 1), 64);
  return disc.add(angle, disc.fromBall(ball.mulInt(pi, 2n * nearestInteger(off), wp)), prec);
}
