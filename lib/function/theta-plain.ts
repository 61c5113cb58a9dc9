// θ by its defining series at τ as it stands: the second route, for τ that is not too near the real axis.
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { Rational } from "../number/rational.ts";
import { DomainError } from "../proof/errors.ts";

const HALF = Rational.of(1, 2);
const CHARACTERISTICS = {
  1: [HALF, HALF],
  2: [HALF, Rational.zero],
  3: [Rational.zero, Rational.zero],
  4: [Rational.zero, HALF],
} as const;

const MOST_TERMS = 20_000;

/**
 * The derivative of Σ exp(πi(n+a)²τ + 2πi(n+a)(v+b)) in v, term by term; θ1 is its negative for a = b = 1/2.
 *
 * Error    with h = Im τ, y = Im v and x = n + a + y/h the term has the size e^(πy²/h)·|2π(x − y/h)|^k e^(−πhx²). From x >= X with hX >= k + 1 on,
 *          (1 + 1/x)^k <= e^(πhx), and terms fall at least by e^(−πhX) < 1/2: the rest of each side is at most twice its first term.
 * Cost     √(prec/h) exponentials.
 * Throws   DomainError where that is more than 20000 terms.
 * Source   DLMF 20.2.1–20.2.4, 21.2.5.
 */
export function plainTheta(
  label: 1 | 2 | 3 | 4 | readonly [Rational, Rational],
  v: Disc,
  tau: Disc,
  order: number,
  prec: number,
): Disc {
  const [a, b] = typeof label === "number" ? CHARACTERISTICS[label] : label;
  const [height, middle] = [disc.toDouble(tau)[1], -disc.toDouble(v)[1] / disc.toDouble(tau)[1] - a.toDouble()];
  const wp = prec + 32 + 8 * order;
  const reach = Math.ceil(Math.max(Math.sqrt((wp * Math.LN2) / (Math.PI * height)), (order + 1) / height)) + 4;
  if (!(reach < MOST_TERMS)) {
    throw new DomainError({
      subject: "theta by the series at τ itself",
      given: `Im τ = ${height}, for which it would take ${reach} terms on each side`,
      expected: `at most ${MOST_TERMS} terms`,
      argument: "tau",
    });
  }
  const start = Math.round(middle);
  let sum: Disc = disc.zero;
  for (let n = start - reach; n <= start + reach; n++) sum = disc.add(sum, term(n, a, b, v, tau, order, wp), wp);
  for (const n of [start - reach - 1, start + reach + 1]) {
    const next = disc.abs(term(n, a, b, v, tau, order, 64), 32);
    sum = disc.widenBy(sum, ball.ldexp(ball.upper(next), 1), wp, false);
  }
  return disc.round(label === 1 ? disc.neg(sum) : sum, prec);
}

function term(n: number, a: Rational, b: Rational, v: Disc, tau: Disc, order: number, wp: number): Disc {
  const m = ball.fromRational(a.plus(n), wp);
  const shifted = disc.add(v, disc.fromBall(ball.fromRational(b, wp)), wp);
  const inner = disc.add(disc.mulBall(tau, m, wp), disc.ldexp(shifted, 1), wp);
  const pi = ball.pi(wp + 8);
  const exponent = disc.mulI(disc.mulBall(disc.mulBall(inner, m, wp), pi, wp));
  const rate = disc.mulI(disc.fromBall(ball.ldexp(ball.mul(m, pi, wp), 1)));
  return disc.mul(disc.exp(exponent, wp), disc.pow(rate, order, wp), wp);
}
