// Formulas in the abscissa alone: what can be said of P ± Q and nP without y.

import { divide, type Field, scale, square, sum } from "../algebra/field.ts";
import { type Coefficients, type Invariants, invariantsOf } from "./weierstrass.ts";

/** (X : Z) for the abscissa X/Z; Z = 0 for O. */
type Abscissa<T> = readonly [T, T];

/**
 * x(nP) from x(P), or undefined if nP = O. The point itself may lie over a larger field.
 * Cost     a doubling and an addition a binary digit of n, no division before the last.
 * Source   Silverman AEC III.2.3(d) for x(2P); Montgomery 1987 for the ladder.
 */
export function abscissaOfMultiple<T>(F: Field<T>, a: Coefficients<T>, n: bigint, x: T): T | undefined {
  const b = invariantsOf(F, a);
  const size = n < 0n ? -n : n;
  // kP and (k + 1)P, whose difference is P.
  let low: Abscissa<T> = [F.one, F.zero];
  let high: Abscissa<T> = [x, F.one];
  for (const digit of size.toString(2)) {
    const middle = added(F, b, low, high, x);
    [low, high] = digit === "1" ? [middle, doubled(F, b, high)] : [doubled(F, b, low), middle];
  }
  return F.isZero(low[1]) ? undefined : divide(F, low[0], low[1]);
}

/** x(P + Q) + x(P − Q) and x(P + Q)·x(P − Q) from two different abscissas. Source: Silverman AEC VIII.6.2. */
export function abscissasOfSums<T>(
  F: Field<T>,
  a: Coefficients<T>,
  x1: T,
  x2: T,
): { readonly sum: T; readonly product: T } {
  const { b2, b4, b6, b8 } = invariantsOf(F, a);
  const [s, p] = [F.add(x1, x2), F.mul(x1, x2)];
  const unit = F.inv(square(F, F.sub(x1, x2)));
  const above = sum(F, scale(F, 2, F.mul(p, s)), F.mul(b2, p), F.mul(b4, s), b6);
  const product = sum(F, square(F, p), F.neg(F.mul(b4, p)), F.neg(F.mul(b6, s)), F.neg(b8));
  return { sum: F.mul(unit, above), product: F.mul(unit, product) };
}

/** (x⁴ − b4x² − 2b6x − b8)/(4x³ + b2x² + 2b4x + b6). */
function doubled<T>(F: Field<T>, { b2, b4, b6, b8 }: Invariants<T>, [X, Z]: Abscissa<T>): Abscissa<T> {
  const [x2, z2, xz] = [square(F, X), square(F, Z), F.mul(X, Z)];
  const above = sum(
    F,
    square(F, x2),
    F.neg(F.mul(b4, F.mul(x2, z2))),
    scale(F, -2, F.mul(b6, F.mul(xz, z2))),
    F.neg(F.mul(b8, square(F, z2))),
  );
  const inner = sum(F, scale(F, 4, F.mul(X, x2)), F.mul(b2, F.mul(x2, Z)), scale(F, 2, F.mul(b4, F.mul(X, z2))));
  return [above, F.mul(Z, F.add(inner, F.mul(b6, F.mul(Z, z2))))];
}

/** The abscissa of P + Q for points with the difference x, from the sum of those of P + Q and P − Q. */
function added<T>(
  F: Field<T>,
  { b2, b4, b6 }: Invariants<T>,
  [X1, Z1]: Abscissa<T>,
  [X2, Z2]: Abscissa<T>,
  x: T,
): Abscissa<T> {
  const [p, q] = [F.mul(X1, X2), F.mul(Z1, Z2)];
  const s = F.add(F.mul(X1, Z2), F.mul(X2, Z1));
  const difference = square(F, F.sub(F.mul(X1, Z2), F.mul(X2, Z1)));
  const above = sum(
    F,
    scale(F, 2, F.mul(p, s)),
    F.mul(b2, F.mul(p, q)),
    F.mul(b4, F.mul(s, q)),
    F.mul(b6, square(F, q)),
  );
  return [F.sub(above, F.mul(x, difference)), difference];
}
