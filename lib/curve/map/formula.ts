// A map as a formula to be read: quotients in lowest terms, with whole coefficients where they can be had.

import type { Field } from "../../algebra/field.ts";
import { allCoefficients, clearingFactor } from "../../algebra/integral.ts";
import { exactQuotient, gcdOf, lowestTerms } from "../../algebra/multigcd.ts";
import {
  constant,
  multiply,
  type Polynomial,
  scaleBy,
  sortedTerms,
  substitute,
  variable,
} from "../../algebra/multivariate.ts";
import { Rational } from "../../number/rational.ts";
import type { FormMap } from "./map.ts";

/** letter = numerator/denominator, in the letters of the curve the map starts from. */
export interface FormulaPart<T> {
  readonly letter: string;
  readonly numerator: Polynomial<T>;
  readonly denominator: Polynomial<T>;
}

export interface Formula<T> {
  /** "affine": each letter is a quotient; "projective": the letters are proportional to the numerators. */
  readonly kind: "affine" | "projective";
  readonly parts: readonly FormulaPart<T>[];
}

/**
 * The formula of a map. `from` and `to` are the letters in use at both ends: those of the model, or all but the one put to 1.
 */
export function formulaOf<T>(map: FormMap<T>, from: readonly string[], to: readonly string[]): Formula<T> {
  const F = map.from.field;
  const forms = map.forms.map((f) => inLetters(F, f, map.from.variables, from));
  const letters = map.to.variables;
  if (to.length === letters.length) {
    const parts = simplestForms(F, lowestTerms(F, forms));
    const one = constant(F, from, F.one);
    return {
      kind: "projective",
      parts: parts.map((numerator, k) => ({ letter: letters[k]!, numerator, denominator: one })),
    };
  }
  const scale = letters.findIndex((name) => !to.includes(name));
  const parts = letters.flatMap((letter, k) => {
    if (k === scale) return [];
    const below = map.to.weights[k] === 2 ? multiply(F, forms[scale]!, forms[scale]!) : forms[scale]!;
    return [{ letter, ...quotient(F, forms[k]!, below) }];
  });
  return { kind: "affine", parts };
}

function inLetters<T>(F: Field<T>, f: Polynomial<T>, all: readonly string[], used: readonly string[]): Polynomial<T> {
  const values = all.map((name) => (used.includes(name) ? variable(F, used, name) : constant(F, used, F.one)));
  return substitute(F, f, values);
}

function quotient<T>(F: Field<T>, above: Polynomial<T>, below: Polynomial<T>) {
  const common = gcdOf(F, above, below);
  const [numerator, denominator] = [exactQuotient(F, above, common), exactQuotient(F, below, common)];
  // The denominator gets coprime whole coefficients, the first positive; then the numerator is fixed.
  const factor = leadingSign(F, denominator, clearing(F, [denominator]));
  const [n, d] = [scaleBy(F, factor, numerator), scaleBy(F, factor, denominator)];
  const whole = clearingDenominators(F, n);
  return { numerator: scaleBy(F, whole, n), denominator: scaleBy(F, whole, d) };
}

function clearing<T>(F: Field<T>, forms: readonly Polynomial<T>[]): T {
  const q = clearingFactor(allCoefficients(forms as readonly Polynomial<unknown>[]));
  return F.mul(F.fromInt(q.num), F.inv(F.fromInt(q.den)));
}

/** The least positive integer that clears the denominators of one polynomial. */
function clearingDenominators<T>(F: Field<T>, f: Polynomial<T>): T {
  const q = clearingFactor([Rational.one, ...allCoefficients([f as Polynomial<unknown>])]);
  return F.fromInt(q.num);
}

function leadingSign<T>(F: Field<T>, f: Polynomial<T>, factor: T): T {
  const lead = sortedTerms(f)[0]!.coefficient;
  return lead instanceof Rational && lead.sign() < 0 ? F.neg(factor) : factor;
}

/** Forms with coprime whole coefficients in common, the first one positive. */
export function simplestForms<T>(F: Field<T>, forms: readonly Polynomial<T>[]): Polynomial<T>[] {
  const first = forms.find((f) => f.terms.size > 0)!;
  const factor = leadingSign(F, first, clearing(F, forms));
  return forms.map((f) => scaleBy(F, factor, f));
}
