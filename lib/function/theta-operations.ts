// Theta functions as operations that a value records.
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import type { Operation } from "../number/origin.ts";
import type { Rational } from "../number/rational.ts";
import { PoleError } from "../proof/errors.ts";
import { operationOf } from "./operations.ts";
import { type ThetaIndex, thetaJet } from "./theta-values.ts";

/** [v, τ, j, order]: the derivative of θ_j(v|τ) in v of that order. */
export const THETA: Operation = operationOf("theta", 2, ([v, tau], [j, order], prec) => {
  const jet = thetaJet(j as ThetaIndex, v!, tau!, order as number, prec);
  return jet[order as number]!;
});

/** [v, τ, j]: θ_j′/θ_j in v. */
export const THETA_LOGARITHMIC: Operation = operationOf("theta logarithmic", 2, ([v, tau], [j], prec) => {
  const [value, slope] = thetaJet(j as ThetaIndex, v!, tau!, 1, prec + 8) as [Disc, Disc];
  if (disc.containsZero(value)) {
    throw new PoleError({
      subject: "theta",
      given: `an argument that is a zero of θ${j}, or cannot be told from one`,
      expected: "an argument away from the zeros, where the logarithmic derivative has poles",
      argument: "v",
    });
  }
  return disc.div(slope, value, prec);
});

/**
 * [v, τ, a, b]: θ[a, b](v|τ) = Σ_n exp(πi(n+a)²τ + 2πi(n+a)(v+b)) = exp(πia²τ + 2πia(v+b)) θ3(v + aτ + b|τ).
 * Source DLMF 21.2.5 in one variable.
 */
export const THETA_CHARACTERISTIC: Operation = operationOf("theta characteristic", 2, ([v, tau], [p, q], prec) => {
  const wp = prec + 24 + Math.max(0, 2 * disc.magnitude(v!));
  const a = ball.fromRational(p as Rational, wp);
  const moved = disc.add(v!, disc.fromBall(ball.fromRational(q as Rational, wp)), wp);
  const shift = disc.mulBall(tau!, a, wp);
  const inner = disc.add(disc.ldexp(moved, 1), shift, wp);
  const exponent = disc.mulI(disc.mulBall(disc.mulBall(inner, a, wp), ball.pi(wp), wp));
  const [theta] = thetaJet(3, disc.add(moved, shift, wp), tau!, 0, wp) as [Disc];
  return disc.mul(disc.exp(exponent, wp), theta, prec);
});
