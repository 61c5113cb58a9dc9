// The group law on a long Weierstrass model over any field.

import { type Field, sum } from "../algebra/field.ts";
import { UndecidedError } from "../proof/errors.ts";
import type { Coefficients } from "./weierstrass.ts";

/** An affine point (x, y), or undefined for the point O at infinity. */
export type Affine<T> = readonly [T, T] | undefined;

export function negatePoint<T>(F: Field<T>, [a1, , a3]: Coefficients<T>, P: Affine<T>): Affine<T> {
  if (!P) return P;
  const [x, y] = P;
  return [x, F.neg(sum(F, y, F.mul(a1, x), a3))];
}

/** P + Q by chord and tangent. Source: Silverman AEC III.2.3. */
export function addPoints<T>(F: Field<T>, a: Coefficients<T>, P: Affine<T>, Q: Affine<T>): Affine<T> {
  if (!P) return Q;
  if (!Q) return P;
  const slope = slopeOf(F, a, P, Q);
  if (slope === undefined) return undefined;
  const [a1, a2, a3] = a;
  const x = sum(F, F.mul(slope, F.add(slope, a1)), F.neg(a2), F.neg(P[0]), F.neg(Q[0]));
  const y = F.add(P[1], F.mul(slope, F.sub(x, P[0]))); // third point of the line
  return [x, F.neg(sum(F, y, F.mul(a1, x), a3))];
}

/**
 * Slope of the chord through P and Q, or of the tangent; undefined if the line is vertical.
 *
 * Where x1 ≠ x2 is known the chord's formula serves; else (x1² + x1x2 + x2² + a2(x1 + x2) + a4 − a1y1)/(y1 + y2 + a1x2 + a3), which is
 * the same slope for all P ≠ −Q, the tangent's for P = Q. So enclosures of two near points still add.
 */
export function slopeOf<T>(F: Field<T>, a: Coefficients<T>, P: readonly [T, T], Q: readonly [T, T]): T | undefined {
  const [a1, a2, a3, a4] = a;
  const [x1, y1] = P;
  const [x2, y2] = Q;
  const dx = F.sub(x2, x1);
  const sameX = x1 === x2 || zeroIfKnown(F, dx); // one object is one number
  if (sameX === false) return F.mul(F.sub(y2, y1), F.inv(dx));
  const denominator = sum(F, y1, y2, F.mul(a1, x2), a3); // zero for Q = −P; with x1 = x2 only then
  if (F.isZero(denominator)) return undefined;
  const squares = sum(F, F.mul(x1, F.add(x1, x2)), F.mul(x2, x2));
  const numerator = sum(F, squares, F.mul(a2, F.add(x1, x2)), a4, F.neg(F.mul(a1, y1)));
  return F.mul(numerator, F.inv(denominator));
}

/** Whether a is zero, or undefined where enclosures leave it open. */
function zeroIfKnown<T>(F: Field<T>, a: T): boolean | undefined {
  try {
    return F.isZero(a);
  } catch (error) {
    if (error instanceof UndecidedError) return undefined;
    throw error;
  }
}

/** n·P for any integer n, by the non-adjacent form of n (about a third of the steps are additions). */
export function multiplyPoint<T>(F: Field<T>, a: Coefficients<T>, n: bigint, P: Affine<T>): Affine<T> {
  const base = n < 0n ? negatePoint(F, a, P) : P;
  const opposite = negatePoint(F, a, base);
  let result: Affine<T>;
  for (const digit of nonAdjacentForm(n < 0n ? -n : n)) {
    result = addPoints(F, a, result, result);
    if (digit !== 0) result = addPoints(F, a, result, digit > 0 ? base : opposite);
  }
  return result;
}

/** Signed binary digits of n >= 0, highest first, no two neighbours nonzero. */
export function nonAdjacentForm(n: bigint): (-1 | 0 | 1)[] {
  const digits: (-1 | 0 | 1)[] = [];
  for (let rest = n; rest > 0n; rest >>= 1n) {
    if ((rest & 1n) === 0n) {
      digits.push(0);
    } else if ((rest & 3n) === 1n) {
      digits.push(1);
    } else {
      digits.push(-1);
      rest += 1n;
    }
  }
  return digits.reverse();
}

export function samePoint<T>(F: Field<T>, P: Affine<T>, Q: Affine<T>): boolean {
  if (!P || !Q) return P === Q;
  return F.isZero(F.sub(P[0], Q[0])) && F.isZero(F.sub(P[1], Q[1]));
}

/** The least n in 1..limit with n·P = O, or undefined. */
export function orderUpTo<T>(F: Field<T>, a: Coefficients<T>, P: Affine<T>, limit: number): number | undefined {
  let Q = P;
  for (let n = 1; n <= limit; n++) {
    if (!Q) return n;
    Q = addPoints(F, a, Q, P);
  }
  return undefined;
}
