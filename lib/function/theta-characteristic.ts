// θ with characteristics, through θ3.
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { Rational } from "../number/rational.ts";
import { ontoReal } from "./enclosure.ts";
import { checkOrder, leibniz, thetaJet } from "./theta-values.ts";

/**
 * θ[a, b](v|τ) = Σ_n exp(πi(n+a)²τ + 2πi(n+a)(v+b)) = exp(πia²τ + 2πia(v+b)) θ3(v + aτ + b|τ), and its derivatives in v up to the order.
 *
 * Domain   Im τ > 0, any v, rational a and b.
 * Branch   none. θ[0, 0] = θ3, θ[1/2, 0] = θ2, θ[0, 1/2] = θ4, θ[1/2, 1/2] = −θ1; θ[a+1, b] = θ[a, b] and θ[a, b+1] = exp(2πia) θ[a, b].
 * Error    enclosures; real where v is real, τ imaginary and 2a an integer.
 * Cost     as θ3, and an exponential.
 * Throws   as θ3.
 * Source   DLMF 21.2.5 in one variable, 21.2.9.
 */
export function thetaCharacteristicJet(
  [a, b]: readonly [Rational, Rational],
  v: Disc,
  tau: Disc,
  order: number,
  prec: number,
): Disc[] {
  checkOrder(order);
  const near = a.minus(Rational.of(a.plus(Rational.of(1, 2)).floor()));
  const spare = 2 * Math.max(0, disc.magnitude(v), disc.magnitude(tau));
  const wp = prec + 24 + 4 * order + spare;
  const shift = ball.fromRational(near, wp);
  const moved = disc.add(v, disc.fromBall(ball.fromRational(b, wp)), wp);
  const across = disc.mulBall(tau, shift, wp);
  const inner = disc.add(disc.ldexp(moved, 1), across, wp);
  const exponent = disc.mulI(disc.mulBall(disc.mulBall(inner, shift, wp), ball.pi(wp), wp));
  const rate = disc.mulI(disc.fromBall(ball.ldexp(ball.mul(ball.pi(wp), shift, wp), 1)));
  const theta = thetaJet(3, disc.add(moved, across, wp), tau, order, wp);
  const product = leibniz(theta, exponentials(disc.exp(exponent, wp), rate, order, wp), wp);
  const real = tau.axis === "imaginary" && v.axis === "real" && near.times(2).isInteger();
  return product.map((x) => disc.round(real ? ontoReal(x) : x, prec + 2));
}

/** value·rate^k for k = 0 .. order. */
function exponentials(value: Disc, rate: Disc, order: number, wp: number): Disc[] {
  const list = [value];
  for (let k = 0; k < order; k++) list.push(disc.mul(list[k]!, rate, wp));
  return list;
}
