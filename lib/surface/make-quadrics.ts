// `quadrics` and `biquadratic`: curves of genus 1 in space and in P¹ × P¹ from their equations.

import { degree, degreeIn, homogenise, isHomogeneous, type Polynomial } from "../algebra/multivariate.ts";
import { parseEquation } from "../curve/equation/parser.ts";
import { lettersOf, polynomialOf } from "../curve/equation/polynomial.ts";
import { plainPolynomial } from "../curve/equation/print.ts";
import { readEquation } from "../curve/equation/read.ts";
import { sourceOf } from "../curve/equation/source.ts";
import { quadricsModel } from "../curve/map/quadrics.ts";
import { DomainError } from "../proof/errors.ts";
import type { Coordinate } from "./fields.ts";
import { type FieldOfInput, type NumberInput, readSlots } from "./input.ts";
import { type Biquadratic, biquadraticOf, QuadricPair, requireSmoothPair } from "./quadrics.ts";

/**
 * The curve in which two quadrics meet: quadrics`x^2 + y^2 = z^2, x^2 + 6y^2 = w^2`, homogeneous in four letters or both affine in three. The
 * equations are separated by a comma, a semicolon or a line break. Over Q, or over Q(√d), R or C as the inserted numbers say.
 *
 * Throws   DomainError for text that cannot be read (the column is marked), equations of another degree, or a curve that is not smooth.
 */
export function quadrics<S extends readonly NumberInput[]>(
  strings: TemplateStringsArray,
  ...slots: S
): QuadricPair<FieldOfInput<S[number]>>;
export function quadrics(strings: TemplateStringsArray, ...slots: readonly NumberInput[]): QuadricPair<Coordinate> {
  const parts = separated(strings.raw);
  if (parts.length !== 2) {
    throw new DomainError({
      subject: "quadrics",
      given: `${parts.length} ${parts.length === 1 ? "equation" : "equations"}`,
      expected: "two, separated by a comma or a semicolon",
      argument: "equation",
    });
  }
  const { printed, reading } = readSlots("quadrics", slots);
  const { field: F } = reading;
  const sources = parts.map((part) =>
    sourceOf(
      "quadrics",
      part.strings,
      part.slots.map((k) => printed[k]!),
    ),
  );
  const trees = sources.map(parseEquation);
  const letters = [...new Set(trees.flatMap((tree) => lettersOf(tree).map(({ name }) => name)))].sort();
  const forms = trees.map((tree, k) => {
    const own = parts[k]!.slots;
    const shifted = {
      ...reading,
      slot: (i: number) => reading.slot(own[i]!),
      exponent: (i: number) => reading.exponent(own[i]!),
    };
    return polynomialOf(sources[k]!, tree, letters, shifted);
  });
  const wrong = forms.find((f) => degree(f) !== 2);
  const homogeneous = letters.length === 4 && forms.every(isHomogeneous);
  if (wrong || !(homogeneous || letters.length === 3)) {
    throw new DomainError({
      subject: "quadrics",
      given: wrong
        ? `${plainPolynomial(F, wrong)} = 0, of degree ${degree(wrong)}`
        : `equations in the ${letters.length} letters ${letters.join(", ")}`,
      expected: "two equations of degree 2, homogeneous in four letters or in three letters",
      argument: "equation",
    });
  }
  const extra = ["w", "t", "s", "z"].find((name) => !letters.includes(name))!;
  const whole = forms.map((f) => (homogeneous ? f : homogenise(f, extra, 2)));
  const pair = whole as unknown as readonly [Polynomial<Coordinate>, Polynomial<Coordinate>];
  requireSmoothPair(F, pair, "quadrics", forms.map((f) => `${plainPolynomial(F, f)} = 0`).join(", "));
  return new QuadricPair(quadricsModel(F, pair), letters);
}

interface Part {
  readonly strings: string[];
  /** Indices of the slots between them. */
  readonly slots: number[];
}

/** The equations of a template: split at commas, semicolons and line breaks; empty ones (a final break) are left out. */
function separated(strings: readonly string[]): Part[] {
  const parts: Part[] = [{ strings: [""], slots: [] }];
  strings.forEach((string, k) => {
    if (k > 0) {
      parts.at(-1)!.slots.push(k - 1);
      parts.at(-1)!.strings.push("");
    }
    // A TeX digit group such as 36{,}000 or 36\,000 is no separator.
    string.split(/(?<![\\{]),(?!\})|;|\\\\|\n/).forEach((piece, n) => {
      if (n > 0) parts.push({ strings: [""], slots: [] });
      const { strings: own } = parts.at(-1)!;
      own[own.length - 1] += piece;
    });
  });
  return parts.filter((part) => part.slots.length > 0 || part.strings.some((string) => /[^\s.]/.test(string)));
}

/**
 * The curve A(x)y² + B(x)y + C(x) = 0 with coefficients of degree at most 2 in two letters: biquadratic`x^2 + y^2 = 1 + 3x^2 y^2`. Over Q, or
 * over Q(√d), R or C as the inserted numbers say.
 *
 * Throws   DomainError for text that cannot be read (the column is marked), another shape, or a curve singular in P¹ × P¹.
 */
export function biquadratic<S extends readonly NumberInput[]>(
  strings: TemplateStringsArray,
  ...slots: S
): Biquadratic<FieldOfInput<S[number]>>;
export function biquadratic(strings: TemplateStringsArray, ...slots: readonly NumberInput[]): Biquadratic<Coordinate> {
  const { polynomial: f, field } = readEquation("biquadratic", strings.raw, readSlots("biquadratic", slots), 2);
  const [x, y] = f.variables;
  if (f.variables.length === 2 && degreeIn(f, x!) <= 2 && degreeIn(f, y!) <= 2) return biquadraticOf(field, f);
  throw new DomainError({
    subject: "biquadratic",
    given: `${plainPolynomial(field, f)} = 0`,
    expected: "an equation in two letters, of degree at most 2 in each",
    argument: "equation",
  });
}
