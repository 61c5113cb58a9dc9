// The long Weierstrass form as a projective model, and changes of model as maps.

import { type Field, square } from "../../algebra/field.ts";
import { fromTerms } from "../../algebra/multivariate.ts";
import type { Affine } from "../group.ts";
import { type Coefficients, changeModel, invertChange, type ModelChange } from "../weierstrass.ts";
import type { FormMap } from "./map.ts";
import type { Coordinates, Model } from "./model.ts";

/** y²z + a1xyz + a3yz² = x³ + a2x²z + a4xz² + a6z³; O is (0 : 1 : 0). */
export function weierstrassModel<T>(F: Field<T>, [a1, a2, a3, a4, a6]: Coefficients<T>, letters = "xyz"): Model<T> {
  const variables = [...letters];
  const equation = fromTerms(F, variables, [
    [F.one, [0, 2, 1]],
    [a1, [1, 1, 1]],
    [a3, [0, 1, 2]],
    [F.neg(F.one), [3, 0, 0]],
    [F.neg(a2), [2, 0, 1]],
    [F.neg(a4), [1, 0, 2]],
    [F.neg(a6), [0, 0, 3]],
  ]);
  return { kind: "weierstrass", field: F, variables, weights: [1, 1, 1], equations: [equation] };
}

export function toCoordinates<T>(F: Field<T>, P: Affine<T>): Coordinates<T> {
  return P ? [P[0], P[1], F.one] : [F.zero, F.one, F.zero];
}

export function toAffine<T>(F: Field<T>, [x, y, z]: Coordinates<T>): Affine<T> {
  if (F.isZero(z!)) return undefined;
  const inverse = F.inv(z!);
  return [F.mul(x!, inverse), F.mul(y!, inverse)];
}

/** The isomorphism (x, y) ↦ (x′, y′) with x = u²x′ + r, y = u³y′ + su²x′ + t. */
export function changeMap<T>(F: Field<T>, a: Coefficients<T>, change: ModelChange<T>): FormMap<T> {
  const from = weierstrassModel(F, a);
  const to = weierstrassModel(F, changeModel(F, a, change));
  const { u, r, s, t } = invertChange(F, change);
  // x′ = u²x + r, y′ = u³y + su²x + t in the letters of the inverse change.
  const u2 = square(F, u);
  const { variables } = from;
  const forms = [
    fromTerms(F, variables, [
      [u2, [1, 0, 0]],
      [r, [0, 0, 1]],
    ]),
    fromTerms(F, variables, [
      [F.mul(s, u2), [1, 0, 0]],
      [F.mul(u2, u), [0, 1, 0]],
      [t, [0, 0, 1]],
    ]),
    fromTerms(F, variables, [[F.one, [0, 0, 1]]]),
  ];
  return { from, to, forms };
}
