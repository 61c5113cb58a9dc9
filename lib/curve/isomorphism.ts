// Isomorphisms between two long models over one field, and twists.

import { cube, divide, equal, type Field, fraction, scale, square, sum } from "../algebra/field.ts";
import { type Coefficients, changeModel, invariantsOf, type ModelChange } from "./weierstrass.ts";

/**
 * The changes of model from a to b over the field: none, or as many as b has automorphisms there (2, 4 or 6).
 * Domain   characteristic not 2 or 3.
 * Source   Silverman AEC III.1.4(b): c4 = u⁴c4′, c6 = u⁶c6′.
 */
export function isomorphisms<T>(F: Field<T>, a: Coefficients<T>, b: Coefficients<T>): ModelChange<T>[] {
  const [x, y] = [invariantsOf(F, a), invariantsOf(F, b)];
  if (F.isZero(x.c4) !== F.isZero(y.c4) || F.isZero(x.c6) !== F.isZero(y.c6)) return [];
  return scales(F, x, y)
    .map((u) => changeWithScale(F, a, b, u))
    .filter((change) => changeModel(F, a, change).every((c, k) => equal(F, c, b[k]!)));
}

interface C4C6<T> {
  readonly c4: T;
  readonly c6: T;
}

/** Candidates for u, from u² = (c6/c6′)/(c4/c4′), or u⁴ or u⁶ where one of them vanishes. */
function scales<T>(F: Field<T>, x: C4C6<T>, y: C4C6<T>): T[] {
  if (F.isZero(x.c4)) return rootsOfPower(F, divide(F, x.c6, y.c6), 6);
  if (F.isZero(x.c6)) return rootsOfPower(F, divide(F, x.c4, y.c4), 4);
  return rootsOfPower(F, divide(F, F.mul(x.c6, y.c4), F.mul(x.c4, y.c6)), 2);
}

/** All u in the field with u^n = c, for n = 2, 4, 6. */
function rootsOfPower<T>(F: Field<T>, c: T, n: 2 | 4 | 6): T[] {
  const root = F.sqrt(c);
  if (root === undefined) return [];
  const both = [root, F.neg(root)];
  if (n === 2) return both;
  if (n === 4) return both.flatMap((r) => rootsOfPower(F, r, 2));
  return both.flatMap((r) => cubeRoots(F, r));
}

/** Cube roots in Q; other fields are not asked for them, where the identity scale 1 still serves. */
function cubeRoots<T>(F: Field<T>, c: T): T[] {
  return [F.cbrt?.(c), F.isZero(F.sub(c, F.one)) ? F.one : undefined].filter((r) => r !== undefined);
}

function changeWithScale<T>(F: Field<T>, a: Coefficients<T>, b: Coefficients<T>, u: T): ModelChange<T> {
  const half = fraction(F, 1n, 2n);
  const u2 = square(F, u);
  const s = F.mul(half, F.sub(F.mul(u, b[0]), a[0]));
  const r = F.mul(fraction(F, 1n, 3n), sum(F, F.mul(u2, b[1]), F.neg(a[1]), F.mul(s, a[0]), square(F, s)));
  const t = F.mul(half, sum(F, F.mul(cube(F, u), b[2]), F.neg(a[2]), F.neg(F.mul(r, a[0]))));
  return { u, r, s, t };
}

/** The quadratic twist by d: y² = x³ + d b2/4 x² + d² b4/2 x + d³ b6/4, whose points over K are those of a over K(√d) with conjugate −P. */
export function quadraticTwist<T>(F: Field<T>, a: Coefficients<T>, d: T): Coefficients<T> {
  const { b2, b4, b6 } = invariantsOf(F, a);
  const quarter = fraction(F, 1n, 4n);
  return [
    F.zero,
    F.mul(quarter, F.mul(d, b2)),
    F.zero,
    F.mul(quarter, scale(F, 2, F.mul(square(F, d), b4))),
    F.mul(quarter, F.mul(cube(F, d), b6)),
  ];
}
