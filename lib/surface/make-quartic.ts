// `quartic`: y² = quartic(x) over Q from its equation.

import { coefficient, degreeIn, type Polynomial, unpack } from "../algebra/multivariate.ts";
import { rationals as Q } from "../algebra/rationals.ts";
import { plainPolynomial } from "../curve/equation/print.ts";
import { readEquation } from "../curve/equation/read.ts";
import { discriminantTimes1728, quarticInvariants } from "../curve/map/invariants.ts";
import { type QuarticCoefficients, quarticModel } from "../curve/map/quartic.ts";
import type { Rational } from "../number/rational.ts";
import { DomainError } from "../proof/errors.ts";
import { type ExactInput, rationalSlots } from "./input.ts";
import { Quartic } from "./quartic.ts";

/**
 * The curve y² = a x⁴ + b x³ + c x² + d x + e over Q, in any two letters: quartic`y^2 = x^4 - 17`. A factor of y² is divided out.
 *
 * Throws   DomainError for text that cannot be read (the column is marked), another shape, or a quartic with a double root.
 */
export function quartic(strings: TemplateStringsArray, ...slots: readonly ExactInput[]): Quartic {
  const { polynomial, source } = readEquation("quartic", strings.raw, rationalSlots("quartic", slots), 2);
  const read = readQuartic(polynomial);
  if (!read) throw notQuartic(source.text.trim());
  const { coefficients, letters } = read;
  const { I, J } = quarticInvariants(Q, coefficients);
  const model = quarticModel(Q, coefficients, letters);
  if (Q.isZero(discriminantTimes1728(Q, I.times(16), J.times(32)))) {
    throw new DomainError({
      subject: "quartic",
      given: `${plainPolynomial(Q, polynomial)} = 0, whose quartic has a double root`,
      expected: "a quartic (or cubic) without double roots",
      hint: "With a double root the curve has genus 0.",
      argument: "equation",
    });
  }
  return new Quartic(model, letters, coefficients);
}

interface ReadQuartic {
  readonly coefficients: QuarticCoefficients<Rational>;
  readonly letters: readonly [string, string];
}

/** c·y² − (quartic in x), in either letter; y alone must be a square without linear terms. */
function readQuartic(f: Polynomial<Rational>): ReadQuartic | undefined {
  if (f.variables.length !== 2) return undefined;
  for (const [x, y] of [f.variables, f.variables.toReversed()] as [string, string][]) {
    const k = f.variables.indexOf(x);
    const fits = [...f.terms.keys()].every((key) => {
      const e = unpack(key, 2);
      return e[1 - k] === 0 || (e[1 - k] === 2 && e[k] === 0);
    });
    const degree = degreeIn(f, x);
    if (!fits || degreeIn(f, y) !== 2 || degree < 3 || degree > 4) continue;
    const at = (i: number, j: number) => coefficient(Q, f, k === 0 ? [i, j] : [j, i]);
    const unit = at(0, 2).inv().neg();
    const coefficients = [4, 3, 2, 1, 0].map((i) => at(i, 0).times(unit));
    return { coefficients: coefficients as unknown as QuarticCoefficients<Rational>, letters: [x, y] };
  }
  return undefined;
}

function notQuartic(text: string): DomainError {
  return new DomainError({
    subject: "quartic",
    given: text,
    expected: "y^2 = a*x^4 + b*x^3 + c*x^2 + d*x + e in two letters",
    hint: "A term in y or x*y is removed by completing the square first.",
    argument: "equation",
  });
}
