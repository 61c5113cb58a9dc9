// `curve`: an elliptic curve over Q from its equation or from its coefficients.

import { constant, isHomogeneous, type Polynomial, substitute, variable } from "../algebra/multivariate.ts";
import { rationals as Q } from "../algebra/rationals.ts";
import { type LongForm, longForm } from "../curve/equation/longform.ts";
import { readEquation } from "../curve/equation/read.ts";
import { notLongForm } from "../curve/equation/refuse.ts";
import { type Coefficients, invariantsOf } from "../curve/weierstrass.ts";
import { Rational } from "../number/rational.ts";
import { DomainError } from "../proof/errors.ts";
import { Curve, type Reading } from "./curve.ts";
import { type ExactInput, rationalSlots, toRational } from "./input.ts";
import { singularCurve } from "./singular.ts";

/** Coefficients of the long form, or of y² = x³ + a4x + a6. */
export interface CurveByCoefficients {
  readonly a: readonly ExactInput[];
}

/** The invariant of a curve to be chosen: one model with that j. */
export interface CurveByJ {
  readonly j: ExactInput;
}

/**
 * An elliptic curve over Q.
 *
 * As a tag it reads an equation as written: curve`y^2 + y = x^3 - x`, in any two letters, or three if it is homogeneous, with TeX
 * and unicode powers; `${value}` inserts an exact number as one factor. An equation α y² + ... = δ x³ + ... is rescaled to the
 * long form and the curve says so (`given`): with δ/α = m² by y = mY, so that y² = 4x³ − g2 x − g3 keeps its x and its periods.
 * As a function it takes { a: [a1, a2, a3, a4, a6] }, { a: [a4, a6] } or { j }.
 *
 * Throws   DomainError for text that cannot be read (the column is marked), another shape, or a singular cubic (the singular
 *          point, its kind and the group of the smooth part are named).
 * @example curve`y^2 + y = x^3 - x`.discriminant   // 37
 */
export function curve(strings: TemplateStringsArray, ...slots: readonly ExactInput[]): Curve;
export function curve(data: CurveByCoefficients | CurveByJ): Curve;
export function curve(
  first: TemplateStringsArray | CurveByCoefficients | CurveByJ,
  ...slots: readonly ExactInput[]
): Curve {
  if ("raw" in first) return fromTemplate(first.raw, slots);
  return nonsingular("a" in first ? coefficients(first.a) : modelWithJ(toRational("curve", "j", first.j)));
}

/** The curve of a model over Q, refused with its singular point if Δ = 0. */
export function nonsingular(a: Coefficients<Rational>, given?: Reading<Rational>): Curve {
  if (Q.isZero(invariantsOf(Q, a).discriminant)) throw singularCurve(Q, a);
  return new Curve(Q, a, given);
}

function fromTemplate(strings: readonly string[], slots: readonly ExactInput[]): Curve {
  const { polynomial } = readEquation("curve", strings, rationalSlots("curve", slots), 2);
  const form = affineForms(polynomial)
    .map((f) => longForm(Q, f))
    .find((found) => found !== undefined);
  if (!form) throw notLongForm(Q, polynomial);
  return nonsingular(form.a, readingOf(polynomial, form));
}

/** The polynomial itself in two letters; a homogeneous one in three with each letter in turn put to 1. */
function affineForms(f: Polynomial<Rational>): Polynomial<Rational>[] {
  if (f.variables.length === 2) return [f];
  if (f.variables.length !== 3 || !isHomogeneous(f)) return [];
  return [2, 1, 0].map((k) => {
    const rest = f.variables.filter((_, l) => l !== k);
    return substitute(
      Q,
      f,
      f.variables.map((name, l) => (l === k ? constant(Q, rest, Q.one) : variable(Q, rest, name))),
    );
  });
}

function readingOf(polynomial: Polynomial<Rational>, form: LongForm<Rational>): Reading<Rational> | undefined {
  const { scaleX, scaleY, letters } = form;
  if (scaleX.equals(1) && scaleY.equals(1)) return undefined;
  return { polynomial, letters, scaleX, scaleY };
}

function coefficients(a: readonly ExactInput[]): Coefficients<Rational> {
  const values = a.map((c, k) => toRational("curve", `a[${k}]`, c));
  if (values.length === 2) return [Q.zero, Q.zero, Q.zero, values[0]!, values[1]!];
  if (values.length === 5) return values as unknown as Coefficients<Rational>;
  throw new DomainError({
    subject: "curve",
    given: `${values.length} coefficients`,
    expected: "five, [a1, a2, a3, a4, a6], or two, [a4, a6]",
    argument: "a",
  });
}

/** A model with the given j. Source: Silverman AEC III.1.4(c). */
function modelWithJ(j: Rational): Coefficients<Rational> {
  const zero = Rational.zero;
  if (j.sign() === 0) return [zero, zero, Rational.one, zero, zero];
  if (j.equals(1728)) return [zero, zero, zero, Rational.one, zero];
  const k = j.minus(1728);
  return [Rational.one, zero, zero, Rational.of(-36).div(k), Rational.of(-1).div(k)];
}
