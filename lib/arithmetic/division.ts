// Division of rational points by an integer, over Q.

import { rationalRoots } from "../algebra/rationalroots.ts";
import { rationals as Q } from "../algebra/rationals.ts";
import {
  type DivisionPolynomials,
  divisionEquation,
  divisionPolynomials,
  primitiveDivisionPolynomial,
} from "../curve/division.ts";
import { multiplyPoint, samePoint } from "../curve/group.ts";
import { pointsOverX } from "../curve/lift.ts";
import type { Coefficients } from "../curve/weierstrass.ts";
import type { Rational } from "../number/rational.ts";

export type RationalPoint = readonly [Rational, Rational];

/** All rational points Q with nQ = P (n >= 2, P not O), by the rational roots of the division equation: complete. */
export function dividePoint(
  a: Coefficients<Rational>,
  P: RationalPoint,
  n: number,
  polynomials = divisionPolynomials(Q, a),
): RationalPoint[] {
  const roots = rationalRoots(divisionEquation(Q, polynomials, n, P[0]));
  const candidates = roots.flatMap((x) => pointsOverX(Q, a, x));
  return candidates.filter((R) => samePoint(Q, multiplyPoint(Q, a, BigInt(n), R), P));
}

/** All rational points of exact order n (n >= 2): complete. */
export function pointsOfOrder(
  a: Coefficients<Rational>,
  n: number,
  polynomials: DivisionPolynomials<Rational> = divisionPolynomials(Q, a),
): RationalPoint[] {
  const roots = rationalRoots(primitiveDivisionPolynomial(Q, polynomials, n));
  return roots.flatMap((x) => pointsOverX(Q, a, x));
}
