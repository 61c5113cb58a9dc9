// A map as a formula to be read: quotients in lowest terms, with whole coefficients where they can be had.

import { type Field, power } from "../../algebra/field.ts";
import { allCoefficients, clearingFactor } from "../../algebra/integral.ts";
import { exactQuotient, gcdOf, lowestTerms } from "../../algebra/multigcd.ts";
import {
  constant as constantOf,
  derivative,
  fromTerms,
  multiply,
  type Polynomial,
  raise,
  scaleBy,
  sortedTerms,
  substitute,
  variable,
} from "../../algebra/multivariate.ts";
import type { Univariate } from "../../algebra/univariate.ts";
import { Rational } from "../../number/rational.ts";
import type { AbscissaMap } from "../abscissamap.ts";
import { ordinateOf } from "../isogeny.ts";
import type { FormMap } from "./map.ts";

/** letter = numerator/denominator, in the letters of the curve the map starts from. */
export interface FormulaPart<T> {
  readonly letter: string;
  readonly numerator: Polynomial<T>;
  readonly denominator: Polynomial<T>;
  /** The denominator as constant·∏ base^exponent, the bases squarefree and coprime. */
  readonly constant: T;
  readonly powers: readonly Power<T>[];
}

export interface Power<T> {
  readonly base: Polynomial<T>;
  readonly exponent: number;
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
  const { affine } = map.from;
  const forms = map.forms.map((f) => (affine ? substitute(F, f, affine) : inLetters(F, f, map.from.variables, from)));
  const letters = map.to.variables;
  if (to.length === letters.length) {
    const parts = simplestForms(F, lowestTerms(F, forms));
    const one = constantOf(F, from, F.one);
    return {
      kind: "projective",
      parts: parts.map((numerator, k) => ({
        letter: letters[k]!,
        numerator,
        denominator: one,
        constant: F.one,
        powers: [],
      })),
    };
  }
  const scale = letters.findLastIndex((name) => !to.includes(name));
  const parts = letters.flatMap((letter, k) => {
    if (!to.includes(letter)) return [];
    const below = map.to.weights[k] === 2 ? multiply(F, forms[scale]!, forms[scale]!) : forms[scale]!;
    return [{ letter, ...quotient(F, forms[k]!, below) }];
  });
  return { kind: "affine", parts };
}

function inLetters<T>(F: Field<T>, f: Polynomial<T>, all: readonly string[], used: readonly string[]): Polynomial<T> {
  const values = all.map((name) => (used.includes(name) ? variable(F, used, name) : constantOf(F, used, F.one)));
  return substitute(F, f, values);
}

/** The formula of a map of Weierstrass models that fixes O: its denominators are two·rest² and two²·rest³ as they stand. */
export function formulaOnAbscissa<T>(F: Field<T>, map: AbscissaMap<T>): Formula<T> {
  const { two, rest } = map.kernel;
  const form = (f: Univariate<T>, y: number) => f.map((c, k) => [c, [k, y]] as const);
  const inX = (...list: (readonly [T, readonly number[]])[][]) => fromTerms(F, ["x", "y"], list.flat());
  const [free, linear] = ordinateOf(F, map.source, map, map.factor);
  const bases = (a: number, b: number) => [
    { base: inX(form(two, 0)), exponent: a },
    { base: inX(form(rest, 0)), exponent: b },
  ];
  return {
    kind: "affine",
    parts: [
      { letter: "x", ...overPowers(F, inX(form(map.numerator, 0)), bases(1, 2)) },
      { letter: "y", ...overPowers(F, inX(form(free, 0), form(linear, 1)), bases(2, 3)) },
    ],
  };
}

function quotient<T>(F: Field<T>, above: Polynomial<T>, below: Polynomial<T>) {
  const common = gcdOf(F, above, below);
  const [numerator, denominator] = [exactQuotient(F, above, common), exactQuotient(F, below, common)];
  return overPowers(F, numerator, powersOf(F, denominator));
}

/** A numerator over a product of powers, with coprime whole coefficients in each base, the first positive, and a whole numerator. */
function overPowers<T>(F: Field<T>, above: Polynomial<T>, given: readonly Power<T>[]) {
  const powers: Power<T>[] = [];
  let numerator = above;
  for (const { base, exponent } of given) {
    const factor = leadingSign(F, base, clearing(F, [base]));
    numerator = scaleBy(F, power(F, factor, exponent), numerator);
    const simple = scaleBy(F, factor, base);
    if (!isConstant(simple)) powers.push({ base: simple, exponent });
  }
  const constant = clearingDenominators(F, numerator);
  const denominator = powers.reduce(
    (product, { base, exponent }) => multiply(F, product, raise(F, base, exponent)),
    constantOf(F, above.variables, constant),
  );
  return { numerator: scaleBy(F, constant, numerator), denominator, constant, powers };
}

/**
 * f as a product of powers of squarefree coprime polynomials, by radicals: f/gcd(f, f_x, f_y, ...) holds every factor once. In positive
 * characteristic, where derivatives may vanish, f itself.
 */
function powersOf<T>(F: Field<T>, f: Polynomial<T>): Power<T>[] {
  if (F.characteristic !== 0n || isConstant(f)) return [{ base: f, exponent: 1 }];
  const radical = (g: Polynomial<T>) =>
    exactQuotient(
      F,
      g,
      g.variables.reduce((common, name) => gcdOf(F, common, derivative(F, g, name)), g),
    );
  const powers: Power<T>[] = [];
  let [rest, whole] = [f, radical(f)];
  for (let exponent = 1; !isConstant(whole); exponent++) {
    rest = exactQuotient(F, rest, whole);
    const next = radical(rest);
    powers.push({ base: exactQuotient(F, whole, next), exponent });
    whole = next;
  }
  // What is left is a number; it belongs to the first base that stands alone.
  const [c] = rest.terms.values();
  return [{ base: constantOf(F, f.variables, c ?? F.one), exponent: 1 }, ...powers];
}

function isConstant<T>(f: Polynomial<T>): boolean {
  return [...f.terms.keys()].every((key) => key === 0);
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
