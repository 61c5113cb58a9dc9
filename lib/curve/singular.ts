// Where a long Weierstrass cubic with Δ = 0 is singular, of what kind, and what group its smooth part is.

import { divide, type Field, fraction, scale, sum } from "../algebra/field.ts";
import { type Coefficients, invariantsOf, residual } from "./weierstrass.ts";

export type SingularKind =
  /** Two tangents over the field. */
  | "split node"
  /** Two conjugate tangents. */
  | "nonsplit node"
  | "cusp";

export interface Singularity<T> {
  readonly kind: SingularKind;
  readonly point: readonly [T, T];
  /** −c6/c4, the discriminant of the two slopes at a node; zero at a cusp. */
  readonly tangents: T;
}

/** The only singular point of a model with Δ = 0. Source: Silverman AEC III.1.4, III.2.5. */
export function singularityOf<T>(F: Field<T>, a: Coefficients<T>): Singularity<T> {
  const { b2, c4, c6 } = invariantsOf(F, a);
  const point = F.characteristic === 2n || F.characteristic === 3n ? searched(F, a) : doubleRoot(F, a, b2, c4, c6);
  const tangents = sum(F, b2, scale(F, 12, point[0]));
  return { kind: kindOf(F, a, point, c4), point, tangents };
}

/** The double root of the 2-division cubic: X = −c6/(12 c4) after x = X − b2/12, or 0 if it is triple. */
function doubleRoot<T>(F: Field<T>, [a1, , a3]: Coefficients<T>, b2: T, c4: T, c6: T): readonly [T, T] {
  const shift = F.isZero(c4) ? F.zero : divide(F, c6, c4);
  const x = F.mul(fraction(F, -1n, 12n), F.add(shift, b2));
  return [x, F.mul(fraction(F, -1n, 2n), F.add(F.mul(a1, x), a3))];
}

/** In characteristic 2 and 3 the formulas divide by zero and the field is small enough to look. */
function searched<T>(F: Field<T>, a: Coefficients<T>): readonly [T, T] {
  const [a1, a2, a3, a4] = a;
  const elements = Array.from({ length: Number(F.characteristic) }, (_, k) => F.fromInt(BigInt(k)));
  for (const x of elements) {
    for (const y of elements) {
      const byX = sum(F, F.mul(a1, y), scale(F, -3, F.mul(x, x)), scale(F, -2, F.mul(a2, x)), F.neg(a4));
      const byY = sum(F, scale(F, 2, y), F.mul(a1, x), a3);
      if (F.isZero(residual(F, a, x, y)) && F.isZero(byX) && F.isZero(byY)) return [x, y];
    }
  }
  throw new Error("a singular cubic over a prime field has a rational singular point"); // the field is perfect
}

function kindOf<T>(F: Field<T>, a: Coefficients<T>, [x]: readonly [T, T], c4: T): SingularKind {
  if (F.isZero(c4)) return "cusp";
  const [a1, a2] = a;
  if (F.characteristic === 2n) {
    // s² + a1 s + (a2 + x) over F_2: reducible exactly if the constant term is 0 (a1 is 1 at a node).
    return F.isZero(F.add(a2, x)) ? "split node" : "nonsplit node";
  }
  const discriminant = sum(F, F.mul(a1, a1), scale(F, 4, a2), scale(F, 12, x));
  return F.sqrt(discriminant) === undefined ? "nonsplit node" : "split node";
}
