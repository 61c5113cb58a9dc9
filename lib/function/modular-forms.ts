// Modular forms and functions of τ through the reduced τ′ = Mτ, where all series converge at least as 0.0044^n.
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { Rational } from "../number/rational.ts";
import { DomainError } from "../proof/errors.ts";
import { ontoReal } from "./enclosure.ts";
import { nomeOf, type Reduction, reduction } from "./modular-action.ts";
import { eighthRoot, etaTwentyFourths, type ThetaIndex, thetaMultiplier } from "./theta-multiplier.ts";
import { type ThetaConstants, thetaConstants } from "./theta-sums.ts";

/** τ, its reduction and the theta series at the reduced τ. */
export interface ModularPoint {
  readonly given: Disc;
  readonly reduced: Reduction;
  /** q_θ = exp(πiτ′) and q_mod = q_θ². */
  readonly q: Disc;
  readonly q2: Disc;
  readonly sums: ThetaConstants;
  readonly wp: number;
}

/**
 * What the functions of this file share at one τ.
 *
 * Domain   Im τ > 0.
 * Throws   DomainError for Im τ <= 0, UndecidedError for a disc that meets the real axis.
 */
export function modularPoint(tau: Disc, prec: number): ModularPoint {
  const wp = prec + 32;
  const reduced = reduction(tau, wp);
  const q = nomeOf(reduced.tau, wp);
  return { given: tau, reduced, q, q2: disc.sqr(q, wp), sums: thetaConstants(q, wp), wp };
}

/** For a form with real coefficients in q_mod: the value is real on the imaginary axis. */
function finish(at: ModularPoint, value: Disc): Disc {
  const rounded = disc.round(value, at.wp - 20);
  return at.given.axis === "imaginary" ? ontoReal(rounded) : rounded;
}

/** θ2⁴, θ3⁴, θ4⁴ at the reduced τ. */
function fourthPowers({ q, sums, wp }: ModularPoint): readonly [Disc, Disc, Disc] {
  const fourth = (x: Disc) => disc.sqr(disc.sqr(x, wp), wp);
  return [disc.mul(disc.ldexp(q, 4), fourth(sums.half2), wp), fourth(sums.theta3), fourth(sums.theta4)];
}

/** 2E4 = θ2⁸ + θ3⁸ + θ4⁸ and 2E6 = (θ2⁴ + θ3⁴)(θ3⁴ + θ4⁴)(θ4⁴ − θ2⁴) at the reduced τ. */
function reducedE4E6(at: ModularPoint): { readonly e4: Disc; readonly e6: Disc } {
  const { wp } = at;
  const [a, b, c] = fourthPowers(at);
  const sum = disc.add(disc.add(disc.sqr(a, wp), disc.sqr(b, wp), wp), disc.sqr(c, wp), wp);
  const product = disc.mul(disc.mul(disc.add(a, b, wp), disc.add(b, c, wp), wp), disc.sub(c, a, wp), wp);
  return { e4: disc.ldexp(sum, -1), e6: disc.ldexp(product, -1) };
}

/**
 * Eisenstein's E_k(τ) with constant term 1, for even k >= 2; E_2 is the holomorphic, quasi-modular one.
 *
 * Domain   Im τ > 0.
 * Error    enclosure, relative to the terms at the reduced τ; E_k has zeros at the images of i and ρ.
 * Cost     one exponential, theta series of √prec terms; k²/16 products above k = 6.
 * Throws   DomainError for odd k or k < 2.
 * Source   DLMF 23.6(i) for E4 and E6; E2 = −θ1‴(0)/(π² θ1′(0)) in v by DLMF 23.6.8; the recurrence DLMF 23.9.5 above.
 */
export function eisensteinE(k: number, tau: Disc, prec: number): Disc {
  refuseWeight(k, 2);
  const at = modularPoint(tau, prec);
  return finish(at, k === 2 ? quasiE2(at) : transported(at, reducedE(k, at), k));
}

function refuseWeight(k: number, least: number): void {
  if (Number.isSafeInteger(k) && k >= least && k % 2 === 0) return;
  throw new DomainError({
    subject: "modular",
    given: `the weight ${k}`,
    expected: `an even integer from ${least} on`,
    hint: "Of odd weight there is only 0.",
    argument: "k",
  });
}

/** f(τ) = (cτ + d)^−k f(Mτ). */
function transported({ reduced, wp }: ModularPoint, value: Disc, k: number): Disc {
  if (reduced.matrix.c === 0n) return value;
  return disc.div(value, disc.pow(reduced.factor, k, wp), wp);
}

/** E2(τ) = (cτ+d)^−2 E2(Mτ) − 6c/(πi (cτ+d)). */
function quasiE2({ reduced, sums, wp }: ModularPoint): Disc {
  const value = disc.div(sums.third, sums.first, wp);
  const { c } = reduced.matrix;
  if (c === 0n) return value;
  const over = disc.inv(reduced.factor, wp);
  // −6c/(πi) = 6ci/π
  const shift = disc.mulI(disc.divBall(disc.mulInt(over, 6n * c, wp), ball.pi(wp), wp));
  return disc.add(disc.mul(value, disc.sqr(over, wp), wp), shift, wp);
}

function reducedE(k: number, at: ModularPoint): Disc {
  const { e4, e6 } = reducedE4E6(at);
  if (k === 4) return e4;
  if (k === 6) return e6;
  return higherE(k, e4, e6, at.wp);
}

/**
 * E_k from E4 and E6. With c_n = (2n−1) G_2n, c_n = 3/((2n+1)(n−3)) Σ_{m=2}^{n−2} c_m c_{n−m} (DLMF 23.9.5 with 23.9.1); dividing by
 * π^2n, G_2n = π^2n a_n E_2n with a_n = 2ζ(2n)/π^2n rational.
 */
function higherE(k: number, e4: Disc, e6: Disc, wp: number): Disc {
  const half = k / 2;
  const c: Disc[] = [];
  c[2] = disc.mulBall(e4, ratio(3n, 45n, wp), wp);
  c[3] = disc.mulBall(e6, ratio(10n, 945n, wp), wp);
  for (let n = 4; n <= half; n++) {
    let sum: Disc = disc.zero;
    for (let m = 2; m <= n - 2; m++) sum = disc.add(sum, disc.mul(c[m]!, c[n - m]!, wp), wp);
    c[n] = disc.mulBall(sum, ratio(3n, BigInt((2 * n + 1) * (n - 3)), wp), wp);
  }
  const scale = zetaRatio(half)
    .times(k - 1)
    .inv();
  return disc.mulBall(c[half]!, ball.fromRational(scale, wp), wp);
}

function ratio(num: bigint, den: bigint, wp: number): ball.Ball {
  return ball.fromRational(Rational.of(num, den), wp);
}

/** 2ζ(2n)/π^2n = |B_2n| 2^2n/(2n)!, exactly (DLMF 25.6.2). */
function zetaRatio(n: number): Rational {
  let factorial = 1n;
  for (let k = 2n; k <= 2 * n; k++) factorial *= k;
  return bernoulli(2 * n)
    .abs()
    .times(Rational.of(1n << BigInt(2 * n), factorial));
}

/** The Bernoulli number B_n, n even, by Akiyama and Tanigawa's table. */
export function bernoulli(n: number): Rational {
  const row: Rational[] = [];
  for (let m = 0; m <= n; m++) {
    row[m] = Rational.of(1, m + 1);
    for (let j = m; j > 0; j--) row[j - 1] = row[j - 1]!.minus(row[j]!).times(j);
  }
  return row[0]!;
}

/** G_k = Σ ω^−k over nonzero ω of Z + Zτ, even k >= 4: 2ζ(k) E_k. */
export function eisensteinG(k: number, tau: Disc, prec: number): Disc {
  refuseWeight(k, 4);
  return disc.mulBall(eisensteinE(k, tau, prec + 8), twiceZeta(k, prec + 8), prec + 2);
}

/** 2ζ(k), even k. */
export function twiceZeta(k: number, wp: number): ball.Ball {
  return ball.mul(ball.fromRational(zetaRatio(k / 2), wp), ball.pow(ball.pi(wp + 8), k, wp + 8), wp);
}

/** Order of summation of Σ ω^−2 over ω = m + nτ ≠ 0. */
export type Order = "rows" | "symmetric" | "columns";

/**
 * G_2 by a named order of summation: "rows" sums over m within each n and then over n (Eisenstein's, 2ζ(2) E_2, holomorphic); "columns" sums over
 * n within each m and then over m (rows − 2πi/τ); "symmetric" is the limit of Σ ω^−2 |ω|^−s for s → 0+ (rows − π/Im τ, of weight 2).
 *
 * Source   DLMF 23.8; J.-P. Serre, A Course in Arithmetic, VII.4.4 (proposition 6 and the two orders).
 */
export function eisensteinG2(order: Order, tau: Disc, prec: number, e = eisensteinE): Disc {
  const wp = prec + 12;
  const rows = disc.mulBall(e(2, tau, wp), twiceZeta(2, wp), wp);
  if (order === "rows") return disc.round(rows, prec + 2);
  const pi = ball.pi(wp);
  if (order === "symmetric") {
    return disc.sub(rows, disc.fromBall(ball.div(pi, disc.imag(tau), wp)), prec + 2);
  }
  return disc.sub(rows, disc.div(disc.mulI(disc.fromBall(ball.ldexp(pi, 1))), tau, wp), prec + 2);
}

/**
 * Dedekind's η(τ) = q^(1/24) Π (1 − q^n), q = exp(2πiτ), q^(1/24) = exp(πiτ/12).
 *
 * Domain   Im τ > 0.
 * Error    enclosure, relative: η has no zero.
 * Cost     the reduction, two exponentials, and about √(prec/12) terms of Euler's series.
 * Source   DLMF 23.15.9, 23.18.5; Euler: Π (1 − q^n) = Σ (−1)^n q^(n(3n−1)/2), n from −∞ to ∞.
 */
export function dedekindEta(tau: Disc, prec: number): Disc {
  const wp = prec + 32;
  const reduced = reduction(tau, wp);
  const e = etaTwentyFourths(reduced.word);
  const pi = ball.pi(wp + 8);
  const q = disc.sqr(nomeOf(reduced.tau, wp), wp);
  // e^(2πi·e/24) e^(πiτ′/12) in one exponential.
  const turned = disc.add(reduced.tau, disc.fromBall(ball.fromInt(e)), wp);
  const front = disc.exp(disc.mulI(disc.divBall(disc.mulBall(turned, pi, wp + 8), ball.fromInt(12), wp + 8)), wp);
  const value = disc.div(disc.mul(front, eulerProduct(q, wp), wp), reduced.root, prec + 8);
  return tau.axis === "imaginary" ? ontoReal(value) : value;
}

/** Euler's series for |q| < 0.01: the terms fall at least by 2^−6 each, so the rest is at most twice the first one left out. */
function eulerProduct(q: Disc, wp: number): Disc {
  const fall = -disc.magnitude(q);
  if (!(fall >= 6)) {
    throw new DomainError({
      subject: "eta",
      given: "an enclosure of τ too wide to be reduced",
      expected: "Im τ known to a few digits",
      argument: "tau",
    });
  }
  let sum: Disc = disc.one;
  // q^n, q^(n(3n−1)/2)
  let power = q;
  let term = q;
  for (let n = 1; ; n++) {
    const low = (n * (3 * n - 1)) / 2;
    if (fall * low > wp + 2) return disc.widenBy(sum, { man: 2n, exp: -fall * low, rad: 0 }, wp, q.axis === "real");
    const other = disc.mul(term, power, wp);
    const pair = disc.add(term, other, wp);
    sum = n & 1 ? disc.sub(sum, pair, wp) : disc.add(sum, pair, wp);
    // n(3n−1)/2 + n + (2n+1) = (n+1)(3n+2)/2
    term = disc.mul(disc.mul(other, disc.sqr(power, wp), wp), q, wp);
    power = disc.mul(power, q, wp);
  }
}

/** η(τ)^24, normalised to q − 24q² + ...; relative error. */
export function deltaNormalised(tau: Disc, prec: number): Disc {
  return disc.pow(dedekindEta(tau, prec + 12), 24, prec + 2);
}

/** Δ(Z + Zτ) = g2³ − 27 g3² = (2π)^12 η(τ)^24. */
export function latticeDiscriminant(tau: Disc, prec: number): Disc {
  const front = ball.pow(ball.ldexp(ball.pi(prec + 16), 1), 12, prec + 12);
  return disc.mulBall(deltaNormalised(tau, prec + 8), front, prec + 2);
}

/**
 * j(τ) = 1728 g2³/(g2³ − 27 g3²) = q^−1 + 744 + ..., so j(i) = 1728.
 *
 * Domain   Im τ > 0.
 * Error    enclosure; near the zeros (images of ρ) absolute.
 * Source   DLMF 23.15.7: j = 32 (θ2⁸ + θ3⁸ + θ4⁸)³/(θ2 θ3 θ4)⁸.
 */
export function jInvariant(tau: Disc, prec: number): Disc {
  const at = modularPoint(tau, prec);
  const { wp } = at;
  const { e4 } = reducedE4E6(at);
  const [a, b, c] = fourthPowers(at);
  const bottom = disc.sqr(disc.mul(disc.mul(a, b, wp), c, wp), wp);
  const top = disc.mul(disc.sqr(e4, wp), e4, wp);
  return finish(at, disc.ldexp(disc.div(top, bottom, wp), 8));
}

/** j(τ) − 1728 = 64 ((θ2⁴+θ3⁴)(θ3⁴+θ4⁴)(θ4⁴−θ2⁴))²/(θ2 θ3 θ4)⁸, which keeps its digits beside i. */
export function jMinus1728(tau: Disc, prec: number): Disc {
  const at = modularPoint(tau, prec);
  const { wp } = at;
  const { e6 } = reducedE4E6(at);
  const [a, b, c] = fourthPowers(at);
  const bottom = disc.sqr(disc.mul(disc.mul(a, b, wp), c, wp), wp);
  return finish(at, disc.ldexp(disc.div(disc.sqr(e6, wp), bottom, wp), 8));
}

/**
 * λ(τ) = θ2⁴/θ3⁴ and 1 − λ(τ) = θ4⁴/θ3⁴, the parameters m and m1 of the lattice Z + Zτ.
 *
 * Domain   Im τ > 0.
 * Error    enclosures, both relative: near a cusp neither end loses digits.
 * Source   DLMF 23.15.6, 20.7.5.
 */
export function modularLambda(tau: Disc, prec: number): { readonly lambda: Disc; readonly complement: Disc } {
  const at = modularPoint(tau, prec);
  const { wp, reduced } = at;
  const fourths = fourthPowers(at);
  const value = (j: ThetaIndex) => {
    const { index, eighths } = thetaMultiplier(reduced.word, j);
    return { fourth: fourths[index - 2]!, eighths };
  };
  const bottom = value(3);
  const over = (j: ThetaIndex) => {
    const top = value(j);
    const turns = (((4 * (top.eighths - bottom.eighths)) % 8) + 8) % 8;
    return finish(at, disc.mul(eighthRoot(turns, wp), disc.div(top.fourth, bottom.fourth, wp), wp));
  };
  return { lambda: over(2), complement: over(4) };
}

/** Weber's f = e^(−πi/24) η((τ+1)/2)/η(τ), f1 = η(τ/2)/η(τ), f2 = √2 η(2τ)/η(τ). */
export type WeberName = "f" | "f1" | "f2";

/**
 * Weber's functions; f f1 f2 = √2 and f⁸ = f1⁸ + f2⁸.
 *
 * Domain   Im τ > 0.
 * Error    enclosure, relative.
 * Source   H. Weber, Lehrbuch der Algebra III, section 34; D. A. Cox, Primes of the Form x² + ny², section 12.
 */
export function weber(name: WeberName, tau: Disc, prec: number): Disc {
  const wp = prec + 16;
  const bottom = dedekindEta(tau, wp);
  const value = disc.div(weberTop(name, tau, wp), bottom, prec + 4);
  return tau.axis === "imaginary" ? ontoReal(value) : value;
}

function weberTop(name: WeberName, tau: Disc, wp: number): Disc {
  if (name === "f1") return dedekindEta(disc.ldexp(tau, -1), wp);
  if (name === "f2") {
    const root = ball.sqrt(ball.fromInt(2), wp);
    return disc.mulBall(dedekindEta(disc.ldexp(tau, 1), wp), root, wp);
  }
  const half = disc.ldexp(disc.add(tau, disc.one, wp + Math.max(0, disc.magnitude(tau))), -1);
  const turn = ball.div(ball.neg(ball.pi(wp)), ball.fromInt(24), wp);
  return disc.mul(dedekindEta(half, wp), disc.exp(disc.mulI(disc.fromBall(turn)), wp), wp);
}
