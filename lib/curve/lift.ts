// The points of a model over a given x or y.

import { type Field, fraction, square } from "../algebra/field.ts";
import { type Coefficients, residual } from "./weierstrass.ts";

/**
 * The points with the given x: none, one (of order two) or two, the one with the larger square root first.
 * In characteristic 2 (the field F_2) both values of y are tried.
 */
export function pointsOverX<T>(F: Field<T>, a: Coefficients<T>, x: T): (readonly [T, T])[] {
  if (F.characteristic === 2n) {
    return [F.zero, F.one].filter((y) => F.isZero(residual(F, a, x, y))).map((y) => [x, y] as const);
  }
  const [a1, , a3] = a;
  const linear = F.add(F.mul(a1, x), a3);
  // (2y + a1x + a3)² = (a1x + a3)² + 4(x³ + a2x² + a4x + a6)
  const four = F.fromInt(4n);
  const discriminant = F.sub(square(F, linear), F.mul(four, residual(F, a, x, F.zero)));
  const root = F.sqrt(discriminant);
  if (root === undefined) return [];
  const half = fraction(F, 1n, 2n);
  const at = (r: T): readonly [T, T] => [x, F.mul(half, F.sub(r, linear))];
  return F.isZero(root) ? [at(root)] : [at(root), at(F.neg(root))];
}
