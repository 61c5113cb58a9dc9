// Second routes to modular forms: series and products in q at τ itself, and theta functions at 3τ. The first routes go through the reduced τ.
//
// At τ itself there are some prec·ln 2/(2π Im τ) terms, so that it is for checks away from the real axis.

import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { Rational } from "../number/rational.ts";
import { DomainError } from "../proof/errors.ts";
import { bernoulli, twiceZeta, type WeberName } from "./modular-forms.ts";
import { divisorSums } from "./q-expansion.ts";
import { thetaCharacteristicJet } from "./theta-characteristic.ts";
import { thetaJet } from "./theta-values.ts";

const MOST_TERMS = 30_000;

/** q = exp(2πiτ), and about as many terms as N^k |q|^N takes to fall below 2^−wp. */
interface Terms {
  readonly q: Disc;
  readonly count: number;
  /** Holds 1/(1 − |q|). */
  readonly over: ball.Ball;
}

function termsAt(subject: string, tau: Disc, k: number, wp: number): Terms {
  const height = disc.imag(tau);
  const q = disc.exp(disc.mulI(disc.mulBall(tau, ball.ldexp(ball.pi(wp + 8), 1), wp + 8)), wp);
  // In doubles only how many terms to take: the rest is bounded by the terms themselves.
  const fall = (2 * Math.PI * ball.toDouble(ball.lower(height))) / Math.LN2;
  const few = (wp + 8 + 2 * Math.max(0, -Math.log2(fall))) / fall + 2;
  const count = Math.ceil(few + ((k + 1) * Math.log2(few + 2)) / fall + 2 * k);
  if (!(count < MOST_TERMS)) {
    throw new DomainError({
      subject: `${subject} at τ itself`,
      given: `Im τ = ${ball.toDouble(height)}, for which it would take ${count} terms`,
      expected: `at most ${MOST_TERMS} terms`,
      hint: "Fewer digits take fewer terms.",
      argument: "tau",
    });
  }
  return { q, count, over: ball.upper(ball.inv(ball.sub(ball.one, ball.upper(disc.abs(q, 64)), 64), 53)) };
}

/**
 * E_k(τ) = 1 − (2k/B_k) Σ σ_(k−1)(n) q^n at τ itself, even k >= 2.
 *
 * Error    enclosure. σ_(k−1)(n) <= n^k, and for n > N the terms n^k |q|^n fall at least by r = ((N+2)/(N+1))^k |q|: the rest is at most (N+1)^k |q|^(N+1)/(1 − r),
 *          r < 1 or the count is raised.
 * Source   DLMF 27.14, 23.10; A. Hurwitz, the q-expansion of the Eisenstein series.
 */
export function eisensteinByDivisors(k: number, tau: Disc, prec: number): Disc {
  // |E_k| is about Im τ^(−k/2) near the real axis, and the terms add up to Im τ^(−k) at most: so many bits may cancel.
  const wp = prec + 24 + k * lowness(tau);
  const { q, count } = termsAt(`E_${k} by divisor sums`, tau, k, wp);
  const sums = divisorSums(k - 1, count + 1);
  let sum: Disc = disc.zero;
  for (let n = count; n >= 1; n--) {
    sum = disc.mul(disc.add(sum, disc.fromBall(ball.fromInt(sums[n]!)), wp), q, wp);
  }
  const factor = ball.fromRational(Rational.of(-2 * k).div(bernoulli(k)), wp);
  const rest = restOf(k, count, disc.abs(q, 64));
  const all = disc.widenBy(sum, rest, wp, sum.axis === "real");
  return disc.add(disc.one, disc.mulBall(all, factor, wp), prec);
}

/** About log2 of 1/Im τ, or 0. */
function lowness(tau: Disc): number {
  return Math.max(0, 1 - ball.magnitude(disc.imag(tau)));
}

/** (N+1)^k |q|^(N+1)/(1 − r), r = ((N+2)/(N+1))^k |q|. */
function restOf(k: number, count: number, size: ball.Ball): ball.Ball {
  const ratio = ball.mul(ball.pow(ball.fromRational(Rational.of(count + 2, count + 1), 64), k, 64), size, 64);
  const less = ball.sub(ball.one, ball.upper(ratio), 64);
  if (ball.sign(less) !== 1) {
    throw new DomainError({
      subject: "E by divisor sums",
      given: "τ too near the real axis",
      expected: "a larger Im τ",
    });
  }
  const first = ball.mul(ball.pow(ball.fromInt(count + 1), k, 64), ball.pow(ball.upper(size), count + 1, 64), 64);
  return ball.upper(ball.div(first, less, 53));
}

/**
 * G_k(τ) by rows: Σ_m (m + z)^−k = (−2πi)^k/(k−1)! Σ_r r^(k−1) e^(2πirz) (Lipschitz), so that the row of n and −n together is a multiple of
 * P_(k−1)(p)/(1 − p)^k with p = q^n and p A(p) Euler's polynomial.
 *
 * Error    enclosure; row n is at most (k−1)! |p|/(1 − |p|)^k, as A has positive coefficients of the sum (k−1)!.
 * Source   DLMF 23.8(ii); R. Lipschitz's formula.
 */
export function eisensteinByRows(k: number, tau: Disc, prec: number): Disc {
  const wp = prec + 32 + k * lowness(tau);
  const { q, count, over } = termsAt(`G_${k} by rows`, tau, k, wp + 8 * k);
  const coefficients = eulerian(k - 1);
  const factorial = coefficients.reduce((a, b) => a + b, 0n);
  let [sum, p]: [Disc, Disc] = [disc.zero, q];
  for (let n = 1; n <= count; n++) {
    const top = coefficients.reduceRight<Disc>(
      (s, c) => disc.add(disc.mul(s, p, wp), disc.fromBall(ball.fromInt(c)), wp),
      disc.zero,
    );
    const bottom = disc.pow(disc.sub(disc.one, p, wp), k, wp);
    sum = disc.add(sum, disc.div(disc.mul(top, p, wp), bottom, wp), wp);
    p = disc.mul(p, q, wp);
  }
  // Σ_(n>N) (k−1)! |q|^n/(1 − |q|)^k
  const tail = ball.mul(ball.mulInt(ball.upper(disc.abs(p, 53)), factorial, 53), ball.pow(over, k + 1, 53), 53);
  const rows = disc.widenBy(sum, ball.upper(tail), wp, sum.axis === "real");
  // 2 (2πi)^k/(k−1)!
  const front = ball.div(ball.mulInt(ball.pow(ball.ldexp(ball.pi(wp), 1), k, wp), 2, wp), ball.fromInt(factorial), wp);
  const scaled = disc.mulBall(rows, (k / 2) % 2 === 0 ? front : ball.neg(front), wp);
  return disc.add(disc.fromBall(twiceZeta(k, wp)), scaled, prec);
}

/** Coefficients of A_n with Σ r^n x^r = x A_n(x)/(1 − x)^(n+1), n >= 1. */
function eulerian(n: number): bigint[] {
  let row = [1n];
  for (let m = 2; m <= n; m++) {
    row = Array.from({ length: m }, (_, j) => BigInt(j + 1) * (row[j] ?? 0n) + BigInt(m - j) * (row[j - 1] ?? 0n));
  }
  return row;
}

/** η(τ) = e^(−πi/6) θ[1/6, 1/2](0 | 3τ): (n + 1/6)²·3/2 = (6n+1)²/24, Euler's exponents. Any τ, through the reduction of 3τ. */
export function etaByTheta(tau: Disc, prec: number): Disc {
  const wp = prec + 12;
  const three = disc.mulInt(tau, 3, wp + Math.max(0, disc.magnitude(tau)));
  const characteristic = [Rational.of(1, 6), Rational.of(1, 2)] as const;
  const value = thetaCharacteristicJet(characteristic, disc.zero, three, 0, wp)[0]!;
  return disc.mul(value, turn(-1, 6, wp), prec);
}

/** exp(πi·num/den). */
function turn(num: number, den: number, wp: number): Disc {
  return disc.exp(disc.mulI(disc.fromBall(ball.div(ball.mulInt(ball.pi(wp), num, wp), ball.fromInt(den), wp))), wp);
}

/** η(τ) = e^(πiτ/12) Π (1 − q^n) at τ itself. */
export function etaByProduct(tau: Disc, prec: number): Disc {
  const wp = prec + 24;
  const terms = termsAt("Euler's product", tau, 0, wp);
  const front = powerOfQ(tau, 24, wp);
  return disc.mul(front, product(terms, terms.q, disc.neg(disc.one), wp), prec);
}

/** q^(1/den) = exp(2πiτ/den). */
function powerOfQ(tau: Disc, den: number, wp: number): Disc {
  const spare = wp + 8 + Math.max(0, disc.magnitude(tau));
  const angle = disc.divBall(disc.mulBall(tau, ball.ldexp(ball.pi(spare), 1), spare), ball.fromInt(den), spare);
  return disc.exp(disc.mulI(angle), wp);
}

/**
 * Π_(n>=0) (1 + sign·first·q^n), |first| <= 1.
 * Error    |ln| of the factors left out is at most t = |first q^N|/(1 − |q|)·2 where |first q^N| <= 1/2; for t <= 1/2 they move the product by at most 2t of itself.
 */
function product({ q, count, over }: Terms, first: Disc, sign: Disc, wp: number): Disc {
  let [value, power]: [Disc, Disc] = [disc.one, first];
  for (let n = 0; n < count; n++) {
    value = disc.mul(value, disc.add(disc.one, disc.mul(sign, power, wp), wp), wp);
    power = disc.mul(power, q, wp);
  }
  const t = ball.ldexp(ball.mul(ball.upper(disc.abs(power, 53)), over, 53), 1);
  if (!(ball.magnitude(t) < -1)) {
    throw new DomainError({
      subject: "product at τ itself",
      given: "τ too near the real axis",
      expected: "a larger Im τ",
    });
  }
  return disc.mul(value, disc.widenBy(disc.one, ball.upper(ball.ldexp(t, 1)), wp, value.axis === "real"), wp);
}

/**
 * Weber's products at τ itself: f = q^(−1/48) Π (1 + q^(n−1/2)), f1 = q^(−1/48) Π (1 − q^(n−1/2)), f2 = √2 q^(1/24) Π (1 + q^n).
 * Source   H. Weber, Lehrbuch der Algebra III, section 34.
 */
export function weberByProduct(name: WeberName, tau: Disc, prec: number): Disc {
  const wp = prec + 24;
  const terms = termsAt("Weber's product", tau, 0, wp);
  if (name === "f2") {
    const value = disc.mul(powerOfQ(tau, 24, wp), product(terms, terms.q, disc.one, wp), wp);
    return disc.mulBall(value, ball.sqrt(ball.fromInt(2), wp), prec);
  }
  const half = powerOfQ(tau, 2, wp);
  const signed = product(terms, half, name === "f" ? disc.one : disc.neg(disc.one), wp);
  return disc.mul(powerOfQ(tau, -48, wp), signed, prec);
}

/** Weber's functions as quotients of η, η by theta functions: f = e^(−πi/24) η((τ+1)/2)/η(τ), f1 = η(τ/2)/η(τ), f2 = √2 η(2τ)/η(τ). */
export function weberByTheta(name: WeberName, tau: Disc, prec: number): Disc {
  const wp = prec + 16;
  const bottom = etaByTheta(tau, wp);
  if (name === "f1") return disc.div(etaByTheta(disc.ldexp(tau, -1), wp), bottom, prec);
  if (name === "f2") {
    const top = disc.mulBall(etaByTheta(disc.ldexp(tau, 1), wp), ball.sqrt(ball.fromInt(2), wp), wp);
    return disc.div(top, bottom, prec);
  }
  const half = disc.ldexp(disc.add(tau, disc.one, wp + 16 + Math.max(0, disc.magnitude(tau))), -1);
  return disc.div(disc.mul(etaByTheta(half, wp), turn(-1, 24, wp), wp), bottom, prec);
}

/** η²⁴ = (θ2 θ3 θ4)⁸/2⁸ by theta functions. Source DLMF 23.15.9 with 20.4.6: θ2 θ3 θ4 = 2η³. */
export function deltaByTheta(tau: Disc, prec: number): Disc {
  const wp = prec + 16;
  const constants = ([2, 3, 4] as const).map((j) => thetaJet(j, disc.zero, tau, 0, wp)[0]!);
  const product3 = constants.reduce((a, b) => disc.mul(a, b, wp));
  return disc.ldexp(disc.pow(product3, 8, prec), -8);
}

/** (2π)^12 x. */
export function timesTwoPi12(x: Disc, prec: number): Disc {
  return disc.mulBall(x, ball.pow(ball.ldexp(ball.pi(prec + 16), 1), 12, prec + 8), prec);
}

/** g2³ − 27 g3² with g2 = 60 G4, g3 = 140 G6 by rows; for Im τ > 1 the difference is about |q| of its terms. */
export function discriminantByRows(tau: Disc, prec: number): Disc {
  const wp = prec + 32 + Math.ceil(10 * Math.max(0, ball.toDouble(disc.imag(tau)))) + 12 * lowness(tau);
  const g2 = disc.mulInt(eisensteinByRows(4, tau, wp), 60, wp);
  const g3 = disc.mulInt(eisensteinByRows(6, tau, wp), 140, wp);
  return disc.sub(disc.pow(g2, 3, wp), disc.mulInt(disc.sqr(g3, wp), 27, wp), prec);
}

/** j = E4³/η²⁴ with both at τ itself. */
export function jBySeries(tau: Disc, prec: number): Disc {
  const wp = prec + 16;
  const top = disc.pow(eisensteinByDivisors(4, tau, wp), 3, wp);
  return disc.div(top, disc.pow(etaByProduct(tau, wp + 8), 24, wp), prec);
}
