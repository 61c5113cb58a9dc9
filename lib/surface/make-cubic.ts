// `cubic`: a plane cubic from its equation.

import { degree, homogenise, isHomogeneous } from "../algebra/multivariate.ts";
import { readEquation } from "../curve/equation/read.ts";
import type { Model } from "../curve/map/model.ts";
import { DomainError } from "../proof/errors.ts";
import { PlaneCubic } from "./cubic.ts";
import type { Coordinate } from "./fields.ts";
import { type FieldOfInput, type NumberInput, readSlots } from "./input.ts";
import { requireSmooth } from "./smooth.ts";

/**
 * A nonsingular plane cubic as it stands in a paper: cubic`u^3 + 2v^3 + 3w^3 = 6uvw`, homogeneous in three letters or affine in two; without
 * "=" it is set equal to 0. Over Q, or over Q(√d), R or C as the inserted numbers say.
 *
 * Throws   DomainError for text that cannot be read (the column is marked), another degree, or a singular cubic (its rational
 *          singular points are named, the lines in it, and the group of the smooth part).
 */
export function cubic<S extends readonly NumberInput[]>(
  strings: TemplateStringsArray,
  ...slots: S
): PlaneCubic<FieldOfInput<S[number]>>;
export function cubic(strings: TemplateStringsArray, ...slots: readonly NumberInput[]): PlaneCubic<Coordinate> {
  const { polynomial, source, field } = readEquation("cubic", strings.raw, readSlots("cubic", slots), 2);
  const d = degree(polynomial);
  const count = polynomial.variables.length;
  if (d !== 3 || count < 2) throw notCubic(source.text.trim(), d, count);
  const homogeneous = count === 3 && isHomogeneous(polynomial);
  const form = homogeneous ? polynomial : homogenise(polynomial, extraLetter(polynomial.variables));
  requireSmooth(field, form);
  const model: Model<Coordinate> = {
    kind: "cubic",
    field,
    variables: form.variables,
    weights: [1, 1, 1],
    equations: [form],
  };
  return new PlaneCubic(model, polynomial.variables);
}

/** A letter for the line at infinity that the equation does not use. */
export function extraLetter(used: readonly string[]): string {
  return ["z", "w", "t", "s"].find((name) => !used.includes(name))!;
}

function notCubic(text: string, d: number, count: number): DomainError {
  return new DomainError({
    subject: "cubic",
    given: `${text}, of degree ${d} in ${count === 1 ? "one letter" : `${count} letters`}`,
    expected: "a polynomial equation of degree 3 in two letters, or homogeneous in three",
    hint: d === 4 ? "y^2 = quartic is given as quartic`...`, A(x)y^2 + B(x)y + C(x) = 0 as biquadratic`...`." : "",
    argument: "equation",
  });
}
