// Two q-expansions of ℘ with their tails enclosed: a second route beside the theta functions, which they do not use.

import type { Ball } from "../number/ball.ts";
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { asDisc, type Operation } from "../number/origin.ts";
import { DomainError } from "../proof/errors.ts";

/** u = exp(2πiv), q = exp(2πiτ), with exponents that bound them: |q| < 2^small < 1, |u| and 1/|u| < 2^large. */
interface Nome {
  readonly u: Disc;
  readonly q: Disc;
  readonly small: number;
  readonly large: number;
}

function nome(v: Disc, tau: Disc, prec: number): Nome {
  const turn = (z: Disc) => disc.exp(disc.mulI(disc.mulBall(z, ball.ldexp(ball.pi(prec), 1), prec)), prec);
  const [u, q] = [turn(v), turn(tau)];
  const small = disc.magnitude(q);
  const large = Math.max(0, disc.magnitude(u), disc.magnitude(disc.inv(u, prec)));
  if (!(small < 0 && large + small < 0)) {
    throw new DomainError({
      subject: "q-expansion of ℘",
      given: `|q| < 2^${small} and |u| < 2^${large}`,
      expected: "τ in the fundamental domain and z next to 0, so that |qu| and |q/u| are below 1",
    });
  }
  return { u, q, small, large };
}

/** w/(1 − w)² */
function pole(w: Disc, prec: number): Disc {
  return disc.div(w, disc.sqr(disc.sub(disc.one, w, prec), prec), prec);
}

const twelfth = (prec: number): Disc => disc.divBall(disc.one, ball.fromInt(12), prec);

/** A radius 2^e. */
function power(e: number): Ball {
  return ball.ldexp(ball.fromInt(1), e);
}

/** The terms number 0 .. count of ℘ over (2πi/ω1)²: 1/12 + u/(1 − u)², then q^n u/(1 − q^n u)² + q^n/u/(1 − q^n/u)² − 2q^n/(1 − q^n)². */
export function wpTerms(v: Disc, tau: Disc, count: number, prec: number): Disc[] {
  return terms(nome(v, tau, prec), count, prec);
}

function terms({ u, q }: Nome, count: number, prec: number): Disc[] {
  const list = [disc.add(pole(u, prec), twelfth(prec), prec)];
  const inverse = disc.inv(u, prec);
  let at = q;
  for (let n = 1; n <= count; n++) {
    const pair = disc.add(pole(disc.mul(at, u, prec), prec), pole(disc.mul(at, inverse, prec), prec), prec);
    list.push(disc.sub(pair, disc.mulInt(pole(at, prec), 2, prec), prec));
    at = disc.mul(at, q, prec);
  }
  return list;
}

/**
 * ℘(z)·(ω1/2πi)² with v = z/ω1 by its q-expansion.
 *
 * Domain   |q u|, |q/u| < 1/2 with u = exp(2πiv), q = exp(2πiτ).
 * Error    enclosed: for |w| <= 1/2 a term w/(1 − w)² is below 4|w|, so the terms after N are below (4 + 4 + 8)·|u|^±1·|q|^(N+1)/(1 − |q|)
 *          <= 2^5·2^large·2^(small·(N + 1)).
 * Source   common practice (Silverman, Advanced Topics, chapter I, section 6); the bound as above.
 */
export function wpSeries(v: Disc, tau: Disc, prec: number): Disc {
  const work = prec + 20;
  const at = nome(v, tau, work);
  // Then the first term left out has |q^(N+1) u^±1| <= 2^(−prec − 6), so that the bound of a term holds for all of them.
  const count = Math.ceil((prec + at.large + 6) / -at.small);
  const sum = terms(at, count, work).reduce((s, term) => disc.add(s, term, work));
  return disc.widenBy(sum, power(5 + at.large + at.small * (count + 1)), prec, false);
}

/**
 * The same by the expansion in powers of u: 1/12 + u/(1 − u)² + Σ n q^n/(1 − q^n)·(u^n + u^−n − 2).
 *
 * Domain   |q u|, |q/u| < 1.
 * Error    enclosed: with r = 2^(small + large) < 1 the term n is below 8 n r^n, and Σ_{n > N} n r^n <= (N + 1) r^(N+1)/(1 − r)².
 * Source   common practice; it follows from the other one by w/(1 − w)² = Σ n w^n.
 */
export function wpLambert(v: Disc, tau: Disc, prec: number): Disc {
  const work = prec + 30;
  const at = nome(v, tau, work);
  const rate = at.small + at.large;
  const count = Math.ceil((prec + 40) / -rate) + 2;
  const inverse = disc.inv(at.u, work);
  let sum = disc.add(pole(at.u, work), twelfth(work), work);
  let [q, up, down] = [at.q, at.u, inverse];
  for (let n = 1; n <= count; n++) {
    const weight = disc.mulInt(disc.div(q, disc.sub(disc.one, q, work), work), n, work);
    const wave = disc.sub(disc.add(up, down, work), disc.fromBall(ball.fromInt(2)), work);
    sum = disc.add(sum, disc.mul(weight, wave, work), work);
    [q, up, down] = [disc.mul(q, at.q, work), disc.mul(up, at.u, work), disc.mul(down, inverse, work)];
  }
  // r <= 1/2, so 8 (N + 1) r^(N+1)/(1 − r)² <= 2^(5 + bits of N + 1)·r^(N+1).
  return disc.widenBy(sum, power(5 + Math.ceil(Math.log2(count + 2)) + rate * (count + 1)), prec, false);
}

/** [z/ω1, τ]: the two expansions as operations of a record. */
export const WP_SERIES: Operation = {
  name: "q-expansion of ℘",
  evaluate: ([v, tau], at, prec) => wpSeries(asDisc(at(v)), asDisc(at(tau)), prec),
};
export const WP_LAMBERT: Operation = {
  name: "expansion of ℘ in powers of u",
  evaluate: ([v, tau], at, prec) => wpLambert(asDisc(at(v)), asDisc(at(tau)), prec),
};
