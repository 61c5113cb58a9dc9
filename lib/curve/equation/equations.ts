// The equation of a long Weierstrass model as data, left and right side.

import type { Field } from "../../algebra/field.ts";
import { fromTerms } from "../../algebra/multivariate.ts";
import type { Coefficients } from "../weierstrass.ts";
import type { Equation } from "./print.ts";

/** y² + a1xy + a3y = x³ + a2x² + a4x + a6 in the given letters. */
export function longEquation<T>(
  F: Field<T>,
  [a1, a2, a3, a4, a6]: Coefficients<T>,
  letters: readonly [string, string] = ["x", "y"],
): Equation<T> {
  const left = fromTerms(F, letters, [
    [F.one, [0, 2]],
    [a1, [1, 1]],
    [a3, [0, 1]],
  ]);
  const right = fromTerms(F, letters, [
    [F.one, [3, 0]],
    [a2, [2, 0]],
    [a4, [1, 0]],
    [a6, [0, 0]],
  ]);
  return { left, right };
}
