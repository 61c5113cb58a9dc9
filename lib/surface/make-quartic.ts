// `quartic`: y² = quartic(x) from its equation.

import { divide, type Field } from "../algebra/field.ts";
import { coefficient, degreeIn, type Polynomial, unpack } from "../algebra/multivariate.ts";
import { plainPolynomial } from "../curve/equation/print.ts";
import { readEquation } from "../curve/equation/read.ts";
import { type QuarticCoefficients, quarticModel } from "../curve/map/quartic.ts";
import { DomainError } from "../proof/errors.ts";
import type { Coordinate } from "./fields.ts";
import { type FieldOfInput, type NumberInput, readSlots } from "./input.ts";
import { Quartic, requireDistinctRoots } from "./quartic.ts";

/**
 * The curve y² = a x⁴ + b x³ + c x² + d x + e in any two letters: quartic`y^2 = x^4 - 17`. A factor of y² is divided out. Over Q, or over
 * Q(√d), R or C as the inserted numbers say.
 *
 * Throws   DomainError for text that cannot be read (the column is marked), another shape, or a quartic with a double root.
 */
export function quartic<S extends readonly NumberInput[]>(
  strings: TemplateStringsArray,
  ...slots: S
): Quartic<FieldOfInput<S[number]>>;
export function quartic(strings: TemplateStringsArray, ...slots: readonly NumberInput[]): Quartic<Coordinate> {
  const { polynomial, source, field } = readEquation("quartic", strings.raw, readSlots("quartic", slots), 2);
  const read = readQuartic(field, polynomial);
  if (!read) throw notQuartic(source.text.trim());
  const { coefficients, letters } = read;
  requireDistinctRoots(field, coefficients, `${plainPolynomial(field, polynomial)} = 0`);
  return new Quartic(quarticModel(field, coefficients, letters), letters, coefficients);
}

interface ReadQuartic<T> {
  readonly coefficients: QuarticCoefficients<T>;
  readonly letters: readonly [string, string];
}

/** c·y² − (quartic in x), in either letter; y alone must be a square without linear terms. */
function readQuartic<T>(F: Field<T>, f: Polynomial<T>): ReadQuartic<T> | undefined {
  if (f.variables.length !== 2) return undefined;
  for (const [x, y] of [f.variables, f.variables.toReversed()] as [string, string][]) {
    const k = f.variables.indexOf(x);
    const fits = [...f.terms.keys()].every((key) => {
      const e = unpack(key, 2);
      return e[1 - k] === 0 || (e[1 - k] === 2 && e[k] === 0);
    });
    const degree = degreeIn(f, x);
    if (!fits || degreeIn(f, y) !== 2 || degree < 3 || degree > 4) continue;
    const at = (i: number, j: number) => coefficient(F, f, k === 0 ? [i, j] : [j, i]);
    const unit = F.neg(at(0, 2));
    const coefficients = [4, 3, 2, 1, 0].map((i) => divide(F, at(i, 0), unit));
    return { coefficients: coefficients as unknown as QuarticCoefficients<T>, letters: [x, y] };
  }
  return undefined;
}

function notQuartic(text: string): DomainError {
  return new DomainError({
    subject: "quartic",
    given: text,
    expected: "y^2 = a*x^4 + b*x^3 + c*x^2 + d*x + e in two letters",
    hint: "A(x)y^2 + B(x)y + C(x) = 0 with coefficients of degree at most 2 is given as biquadratic`...`; else complete the square first.",
    argument: "equation",
  });
}
