// `cubic`: a plane cubic over Q from its equation.

import { degree, homogenise, isHomogeneous, type Polynomial } from "../algebra/multivariate.ts";
import { rationals as Q } from "../algebra/rationals.ts";
import { plainPolynomial } from "../curve/equation/print.ts";
import { readEquation } from "../curve/equation/read.ts";
import { cubicC4C6, cubicInvariants, discriminantTimes1728 } from "../curve/map/invariants.ts";
import type { Model } from "../curve/map/model.ts";
import { isThreeLines, rationalSingularPoints } from "../curve/map/singularcubic.ts";
import type { Rational } from "../number/rational.ts";
import { DomainError } from "../proof/errors.ts";
import { PlaneCubic } from "./cubic.ts";
import { type ExactInput, rationalSlots } from "./input.ts";

/**
 * A nonsingular plane cubic over Q as it stands in a paper: cubic`u^3 + 2v^3 + 3w^3 = 6uvw`, homogeneous in three letters or
 * affine in two; without "=" it is set equal to 0.
 *
 * Throws   DomainError for text that cannot be read (the column is marked), another degree, or a singular cubic (its rational
 *          singular points are named, and whether it is three lines).
 */
export function cubic(strings: TemplateStringsArray, ...slots: readonly ExactInput[]): PlaneCubic {
  const { polynomial, source } = readEquation("cubic", strings.raw, rationalSlots("cubic", slots), 2);
  const d = degree(polynomial);
  const count = polynomial.variables.length;
  if (d !== 3 || count < 2) throw notCubic(source.text.trim(), d, count);
  const homogeneous = count === 3 && isHomogeneous(polynomial);
  const form = homogeneous ? polynomial : homogenise(polynomial, extraLetter(polynomial.variables));
  requireSmooth(form);
  const model: Model<Rational> = {
    kind: "cubic",
    field: Q,
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
    hint: d === 4 ? "y^2 = quartic is given as quartic`...`." : "",
    argument: "equation",
  });
}

function requireSmooth(form: Polynomial<Rational>): void {
  const lines = isThreeLines(form);
  const invariants = lines ? undefined : cubicInvariants(Q, form);
  const [c4, c6] = invariants ? cubicC4C6(Q, invariants) : [Q.zero, Q.zero];
  if (invariants && !Q.isZero(discriminantTimes1728(Q, c4, c6))) return;
  throw singularCubic(form, lines);
}

const KINDS = {
  "split node": "a node with rational tangents",
  "nonsplit node": "a node with conjugate tangents",
  cusp: "a point with one tangent",
  "triple point": "a triple point",
} as const;

function singularCubic(form: Polynomial<Rational>, lines: boolean): DomainError {
  const points = rationalSingularPoints(form);
  const named = points.map(({ point, kind }) => `(${point.join(" : ")}), ${KINDS[kind]}`);
  const where = named.length > 0 ? `at ${named.join("; ")}` : "at points that are conjugate over Q";
  const what = lines ? " It is a product of three lines over some field." : "";
  return new DomainError({
    subject: "cubic",
    given: `${plainPolynomial(Q, form)} = 0 is singular ${where}`,
    expected: "a nonsingular cubic",
    hint: `A singular cubic is no curve of genus 1.${what}`,
    argument: "equation",
  });
}
