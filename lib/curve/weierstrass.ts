// The long Weierstrass form y² + a1xy + a3y = x³ + a2x² + a4x + a6 over any field: invariants and changes of model.

import { cube, divide, type Field, scale, square, sum } from "../algebra/field.ts";

/** [a1, a2, a3, a4, a6]. */
export type Coefficients<T> = readonly [T, T, T, T, T];

/** The classical quantities of a model; Δ = 0 is allowed here. */
export interface Invariants<T> {
  readonly b2: T;
  readonly b4: T;
  readonly b6: T;
  readonly b8: T;
  readonly c4: T;
  readonly c6: T;
  readonly discriminant: T;
}

/** b2, b4, b6, b8, c4, c6 and Δ of a model. Source: Silverman AEC III.1. */
export function invariantsOf<T>(F: Field<T>, [a1, a2, a3, a4, a6]: Coefficients<T>): Invariants<T> {
  const b2 = F.add(square(F, a1), scale(F, 4, a2));
  const b4 = F.add(F.mul(a1, a3), scale(F, 2, a4));
  const b6 = F.add(square(F, a3), scale(F, 4, a6));
  const b8 = sum(
    F,
    F.mul(square(F, a1), a6),
    scale(F, 4, F.mul(a2, a6)),
    F.neg(F.mul(a1, F.mul(a3, a4))),
    F.mul(a2, square(F, a3)),
    F.neg(square(F, a4)),
  );
  const c4 = F.sub(square(F, b2), scale(F, 24, b4));
  const c6 = sum(F, F.neg(cube(F, b2)), scale(F, 36, F.mul(b2, b4)), scale(F, -216, b6));
  const discriminant = sum(
    F,
    F.neg(F.mul(square(F, b2), b8)),
    scale(F, -8, cube(F, b4)),
    scale(F, -27, square(F, b6)),
    scale(F, 9, F.mul(b2, F.mul(b4, b6))),
  );
  return { b2, b4, b6, b8, c4, c6, discriminant };
}

/** j = c4³/Δ; the discriminant must not be zero. */
export function jInvariant<T>(F: Field<T>, { c4, discriminant }: Invariants<T>): T {
  return divide(F, cube(F, c4), discriminant);
}

/** The change of model x = u²x′ + r, y = u³y′ + su²x′ + t, from the old letters (x, y) to the new (x′, y′). */
export interface ModelChange<T> {
  readonly u: T;
  readonly r: T;
  readonly s: T;
  readonly t: T;
}

/** Coefficients of the new model. Source: Silverman AEC III.1, Table 3.1. */
export function changeModel<T>(F: Field<T>, a: Coefficients<T>, { u, r, s, t }: ModelChange<T>): Coefficients<T> {
  const [a1, a2, a3, a4, a6] = a;
  const b1 = F.add(a1, scale(F, 2, s));
  const b2 = sum(F, a2, F.neg(F.mul(s, a1)), scale(F, 3, r), F.neg(square(F, s)));
  const b3 = sum(F, a3, F.mul(r, a1), scale(F, 2, t));
  const b4 = sum(
    F,
    a4,
    F.neg(F.mul(s, a3)),
    scale(F, 2, F.mul(r, a2)),
    F.neg(F.mul(F.add(t, F.mul(r, s)), a1)),
    scale(F, 3, square(F, r)),
    scale(F, -2, F.mul(s, t)),
  );
  const b6 = sum(
    F,
    a6,
    F.mul(r, a4),
    F.mul(square(F, r), a2),
    cube(F, r),
    F.neg(F.mul(t, a3)),
    F.neg(square(F, t)),
    F.neg(F.mul(r, F.mul(t, a1))),
  );
  const v = F.inv(u);
  const v2 = square(F, v);
  const v3 = F.mul(v2, v);
  const v6 = square(F, v3);
  return [F.mul(v, b1), F.mul(v2, b2), F.mul(v3, b3), F.mul(square(F, v2), b4), F.mul(v6, b6)];
}

/** The change back from the new model to the old. */
export function invertChange<T>(F: Field<T>, { u, r, s, t }: ModelChange<T>): ModelChange<T> {
  const v = F.inv(u);
  const v2 = square(F, v);
  const v3 = F.mul(v2, v);
  return { u: v, r: F.neg(F.mul(v2, r)), s: F.neg(F.mul(v, s)), t: F.mul(v3, F.sub(F.mul(r, s), t)) };
}

/** The point of the new model that a point (x, y) of the old one becomes. */
export function changePoint<T>(F: Field<T>, { u, r, s, t }: ModelChange<T>, [x, y]: readonly [T, T]): readonly [T, T] {
  const v = F.inv(u);
  const v2 = square(F, v);
  const dx = F.sub(x, r);
  return [F.mul(v2, dx), F.mul(F.mul(v2, v), sum(F, y, F.neg(F.mul(s, dx)), F.neg(t)))];
}

/** y² + a1xy + a3y − x³ − a2x² − a4x − a6 at (x, y): zero exactly on the curve. */
export function residual<T>(F: Field<T>, a: Coefficients<T>, x: T, y: T): T {
  const [a1, a2, a3, a4, a6] = a;
  const left = F.mul(y, sum(F, y, F.mul(a1, x), a3));
  const right = F.add(F.mul(F.add(F.mul(F.add(x, a2), x), a4), x), a6);
  return F.sub(left, right);
}
