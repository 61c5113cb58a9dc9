// The order of a rational point, by integrality and Mazur's theorem.

import { lcm } from "../algebra/integer.ts";
import { rationals as Q } from "../algebra/rationals.ts";
import { type Affine, addPoints } from "../curve/group.ts";
import type { Coefficients } from "../curve/weierstrass.ts";
import type { Rational } from "../number/rational.ts";

/** No rational torsion point has a larger order. Source: Mazur 1977 (Silverman AEC VIII.7.5). */
const LARGEST_ORDER = 12;

/**
 * The order of P, or Infinity, proved.
 *
 * On the integral model with u = 1/d a torsion point has integers 4x and 8y (Silverman AEC VII.3.4), so the first multiple that
 * breaks this ends the search, long before its digits grow.
 */
export function rationalOrder(a: Coefficients<Rational>, P: Affine<Rational>): number {
  const d = a.reduce((total, c) => lcm(total, c.den), 1n);
  let multiple = P;
  for (let n = 1; n <= LARGEST_ORDER; n++) {
    if (!multiple) return n;
    const [x, y] = multiple;
    if ((4n * d * d) % x.den !== 0n || (8n * d ** 3n) % y.den !== 0n) return Infinity;
    multiple = addPoints(Q, a, multiple, P);
  }
  return Infinity;
}
