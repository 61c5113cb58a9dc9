// Greatest common divisors of small polynomials in several variables, to put maps into lowest terms.

import type { Field } from "./field.ts";
import {
  constant,
  degreeIn,
  divideBy,
  fromTerms,
  isZero,
  monic,
  multiply,
  type Polynomial,
  raise,
  subtract,
  unpack,
  variable,
} from "./multivariate.ts";
import { gcdUni } from "./univariate.ts";

/**
 * A greatest common divisor, monic in printing order; 1 for coprime polynomials.
 * Method   primitive remainder sequences in the first variable that occurs, contents by recursion.
 * Cost     for polynomials of the size of map formulas, a few dozen terms.
 */
export function gcdOf<T>(F: Field<T>, f: Polynomial<T>, g: Polynomial<T>): Polynomial<T> {
  if (isZero(f)) return isZero(g) ? g : monic(F, g);
  if (isZero(g)) return monic(F, f);
  const name = f.variables.find((v) => degreeIn(f, v) > 0 || degreeIn(g, v) > 0);
  if (name === undefined) return constant(F, f.variables, F.one);
  // In one letter Euclid over the field keeps the coefficients small, which pseudo-division does not.
  if (isUnivariate(f, name) && isUnivariate(g, name)) return univariateGcd(F, f, g, name);
  const [cf, cg] = [contentIn(F, f, name), contentIn(F, g, name)];
  let [a, b] = [exactQuotient(F, f, cf), exactQuotient(F, g, cg)];
  if (degreeIn(a, name) < degreeIn(b, name)) [a, b] = [b, a];
  while (degreeIn(b, name) > 0) {
    const r = pseudoRemainder(F, a, b, name);
    [a, b] = [b, isZero(r) ? r : monic(F, exactQuotient(F, r, contentIn(F, r, name)))];
  }
  // A remainder without the letter means the primitive parts are coprime; zero means a is their divisor.
  const primitive = isZero(b) ? a : constant(F, f.variables, F.one);
  return monic(F, multiply(F, gcdOf(F, cf, cg), primitive));
}

function isUnivariate<T>(f: Polynomial<T>, name: string): boolean {
  return f.variables.every((v) => v === name || degreeIn(f, v) <= 0);
}

function univariateGcd<T>(F: Field<T>, f: Polynomial<T>, g: Polynomial<T>, name: string): Polynomial<T> {
  const list = (h: Polynomial<T>) => coefficientsIn(F, h, name).map((c) => c.terms.get(0) ?? F.zero);
  const common = gcdUni(F, list(f), list(g));
  const unit = f.variables.map((v) => (v === name ? 1 : 0));
  return fromTerms(
    F,
    f.variables,
    common.map((c, k) => [c, unit.map((u) => u * k)] as const),
  );
}

/** The gcd of the coefficients of f as a polynomial in one letter. */
function contentIn<T>(F: Field<T>, f: Polynomial<T>, name: string): Polynomial<T> {
  const zero = constant(F, f.variables, F.zero);
  return coefficientsIn(F, f, name).reduce((g, c) => (isZero(c) ? g : gcdOf(F, g, c)), zero);
}

/** Coefficients by powers of one letter, from the constant term up, in the same variables. */
export function coefficientsIn<T>(F: Field<T>, f: Polynomial<T>, name: string): Polynomial<T>[] {
  const k = f.variables.indexOf(name);
  const x = variable(F, f.variables, name);
  const weight = [...x.terms.keys()][0]!;
  const parts = Array.from({ length: degreeIn(f, name) + 1 }, () => new Map<number, T>());
  for (const [key, value] of f.terms) {
    const n = unpack(key, f.variables.length)[k]!;
    parts[n]!.set(key - n * weight, value);
  }
  return parts.map((terms) => ({ variables: f.variables, terms }));
}

function pseudoRemainder<T>(F: Field<T>, f: Polynomial<T>, g: Polynomial<T>, name: string): Polynomial<T> {
  const x = variable(F, f.variables, name);
  const n = degreeIn(g, name);
  const lead = coefficientsIn(F, g, name)[n]!;
  let rest = f;
  while (!isZero(rest) && degreeIn(rest, name) >= n) {
    const m = degreeIn(rest, name);
    const top = coefficientsIn(F, rest, name)[m]!;
    rest = subtract(F, multiply(F, lead, rest), multiply(F, multiply(F, top, raise(F, x, m - n)), g));
  }
  return rest;
}

/** f/g for a divisor g of f. */
export function exactQuotient<T>(F: Field<T>, f: Polynomial<T>, g: Polynomial<T>): Polynomial<T> {
  return divideBy(F, f, g).quotient;
}

/** Divides all by their common divisor. */
export function lowestTerms<T>(F: Field<T>, forms: readonly Polynomial<T>[]): Polynomial<T>[] {
  const common = forms.reduce((g, f) => gcdOf(F, g, f));
  return forms.map((f) => exactQuotient(F, f, common));
}
