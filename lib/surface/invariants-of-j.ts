import { Rational } from "../number/rational.ts";
import { type Complex, Real } from "../number/values.ts";

/** g2 and g3 of a lattice with this j: g2 = g3 = 27j/(j − 1728), and (0, 1) and (1, 0) for 0 and 1728. */
export function invariantsOfJ(j: Real | Complex): readonly [Real | Complex, Real | Complex] {
  const exact = j.exact instanceof Rational ? j.exact : undefined;
  if (exact?.sign() === 0) return [Real.from(0), Real.from(1)];
  if (exact?.equals(1728)) return [Real.from(1), Real.from(0)];
  const g = j.times(27).div(j.minus(1728));
  return [g, g];
}
