// `curve`: an elliptic curve from its equation or from its coefficients.

import { type Field, fraction } from "../algebra/field.ts";
import { constant, isHomogeneous, type Polynomial, substitute, variable } from "../algebra/multivariate.ts";
import { type LongForm, longForm } from "../curve/equation/longform.ts";
import { readEquation } from "../curve/equation/read.ts";
import { notLongForm } from "../curve/equation/refuse.ts";
import { type Coefficients, invariantsOf } from "../curve/weierstrass.ts";
import { DomainError } from "../proof/errors.ts";
import { Curve, type Reading } from "./curve.ts";
import type { Coordinate } from "./fields.ts";
import { type FieldOfInput, inOneField, type NumberInput, readSlots } from "./input.ts";
import { singularCurve } from "./singular.ts";

/** Coefficients of the long form, or of y² = x³ + a4x + a6. */
export interface CurveByCoefficients<S extends NumberInput> {
  readonly a: readonly S[];
}

/** The invariant of a curve to be chosen: one model with that j. */
export interface CurveByJ<S extends NumberInput> {
  readonly j: S;
}

/**
 * An elliptic curve, over Q if all its numbers are exact rational ones, else over Q(√d), R or C as the inserted numbers say.
 *
 * As a tag it reads an equation as written: curve`y^2 + y = x^3 - x`, in any two letters, or three if it is homogeneous, with TeX
 * and unicode powers; `${value}` inserts a number as one factor. An equation α y² + ... = δ x³ + ... is rescaled to the
 * long form and the curve says so (`given`): with δ/α = m² by y = mY, so that y² = 4x³ − g2 x − g3 keeps its x and its periods.
 * As a function it takes { a: [a1, a2, a3, a4, a6] }, { a: [a4, a6] } or { j }.
 *
 * Throws   DomainError for text that cannot be read (the column is marked), another shape, or a singular cubic (the singular
 *          point, its kind and the group of the smooth part are named).
 * @example curve`y^2 + y = x^3 - x`.discriminant   // 37
 */
export function curve<S extends readonly NumberInput[]>(
  strings: TemplateStringsArray,
  ...slots: S
): Curve<FieldOfInput<S[number]>>;
export function curve<S extends NumberInput>(data: CurveByCoefficients<S> | CurveByJ<S>): Curve<FieldOfInput<S>>;
export function curve(
  first: TemplateStringsArray | CurveByCoefficients<NumberInput> | CurveByJ<NumberInput>,
  ...slots: readonly NumberInput[]
): Curve<Coordinate> {
  if ("raw" in first) return fromTemplate(first.raw, slots);
  const { field, values } = inOneField("curve", "a" in first ? first.a : [first.j]);
  return nonsingular(field, "a" in first ? coefficients(field, values) : modelWithJ(field, values[0]!));
}

/** The curve of a model, refused with its singular point if Δ = 0. */
export function nonsingular<T>(F: Field<T>, a: Coefficients<T>, given?: Reading<T>): Curve<T> {
  if (F.isZero(invariantsOf(F, a).discriminant)) throw singularCurve(F, a);
  return new Curve(F, a, given);
}

function fromTemplate(strings: readonly string[], slots: readonly NumberInput[]): Curve<Coordinate> {
  const { polynomial, field } = readEquation("curve", strings, readSlots("curve", slots), 2);
  const form = affineForms(field, polynomial)
    .map((f) => longForm(field, f))
    .find((found) => found !== undefined);
  if (!form) throw notLongForm(field, polynomial);
  return nonsingular(field, form.a, readingOf(field, polynomial, form));
}

/** The polynomial itself in two letters; a homogeneous one in three with each letter in turn put to 1. */
function affineForms<T>(F: Field<T>, f: Polynomial<T>): Polynomial<T>[] {
  if (f.variables.length === 2) return [f];
  if (f.variables.length !== 3 || !isHomogeneous(f)) return [];
  return [2, 1, 0].map((k) => {
    const rest = f.variables.filter((_, l) => l !== k);
    return substitute(
      F,
      f,
      f.variables.map((name, l) => (l === k ? constant(F, rest, F.one) : variable(F, rest, name))),
    );
  });
}

function readingOf<T>(F: Field<T>, polynomial: Polynomial<T>, form: LongForm<T>): Reading<T> | undefined {
  const { scaleX, scaleY, letters } = form;
  if ([scaleX, scaleY].every((scale) => F.isZero(F.sub(scale, F.one)))) return undefined;
  return { polynomial, letters, scaleX, scaleY };
}

function coefficients<T>(F: Field<T>, values: readonly T[]): Coefficients<T> {
  if (values.length === 2) return [F.zero, F.zero, F.zero, values[0]!, values[1]!];
  if (values.length === 5) return values as unknown as Coefficients<T>;
  throw new DomainError({
    subject: "curve",
    given: `${values.length} coefficients`,
    expected: "five, [a1, a2, a3, a4, a6], or two, [a4, a6]",
    argument: "a",
  });
}

/** A model with the given j. Source: Silverman AEC III.1.4(c). */
function modelWithJ<T>(F: Field<T>, j: T): Coefficients<T> {
  const { zero, one } = F;
  if (F.isZero(j)) return [zero, zero, one, zero, zero];
  const k = F.sub(j, F.fromInt(1728n));
  if (F.isZero(k)) return [zero, zero, zero, one, zero];
  const inverse = F.inv(k);
  return [one, zero, zero, F.mul(fraction(F, -36n, 1n), inverse), F.neg(inverse)];
}
