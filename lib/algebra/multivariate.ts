// Polynomials in a few named variables over a field, sparse: the form in which equations and maps are kept.

import { divide, type Field } from "./field.ts";

/**
 * A polynomial in up to four variables. Terms are keyed by their packed exponents (see `pack`); no zero coefficient is
 * stored, so the zero polynomial has no terms.
 */
export interface Polynomial<T> {
  readonly variables: readonly string[];
  readonly terms: ReadonlyMap<number, T>;
}

// 12 bits an exponent keep four of them in a safe integer, and the key of a product is the sum of the keys.
const BASE = 4096;
const WEIGHTS = [BASE ** 3, BASE ** 2, BASE, 1] as const;

/** The key of a monomial; keys of one polynomial compare as the lexicographic order of their exponents. */
export function pack(exponents: readonly number[]): number {
  return exponents.reduce((key, exponent, k) => key + exponent * WEIGHTS[k]!, 0);
}

export function unpack(key: number, count: number): number[] {
  return WEIGHTS.slice(0, count).map((weight) => Math.floor(key / weight) % BASE);
}

export function constant<T>(F: Field<T>, variables: readonly string[], value: T): Polynomial<T> {
  return { variables, terms: new Map(F.isZero(value) ? [] : [[0, value]]) };
}

export function variable<T>(F: Field<T>, variables: readonly string[], name: string): Polynomial<T> {
  return { variables, terms: new Map([[WEIGHTS[variables.indexOf(name)]!, F.one]]) };
}

/** Builds a polynomial from coefficients with exponents, one number a variable. */
export function fromTerms<T>(
  F: Field<T>,
  variables: readonly string[],
  list: readonly (readonly [T, readonly number[]])[],
): Polynomial<T> {
  const terms = new Map<number, T>();
  for (const [coefficient, exponents] of list) accumulate(F, terms, pack(exponents), coefficient);
  return { variables, terms };
}

function accumulate<T>(F: Field<T>, terms: Map<number, T>, key: number, value: T): void {
  const old = terms.get(key);
  const next = old === undefined ? value : F.add(old, value);
  if (F.isZero(next)) terms.delete(key);
  else terms.set(key, next);
}

export function add<T>(F: Field<T>, f: Polynomial<T>, g: Polynomial<T>): Polynomial<T> {
  const terms = new Map(f.terms);
  for (const [key, value] of g.terms) accumulate(F, terms, key, value);
  return { variables: f.variables, terms };
}

export function negate<T>(F: Field<T>, f: Polynomial<T>): Polynomial<T> {
  return { variables: f.variables, terms: new Map([...f.terms].map(([key, value]) => [key, F.neg(value)])) };
}

export function subtract<T>(F: Field<T>, f: Polynomial<T>, g: Polynomial<T>): Polynomial<T> {
  return add(F, f, negate(F, g));
}

export function multiply<T>(F: Field<T>, f: Polynomial<T>, g: Polynomial<T>): Polynomial<T> {
  const terms = new Map<number, T>();
  for (const [k, a] of f.terms) for (const [l, b] of g.terms) accumulate(F, terms, k + l, F.mul(a, b));
  return { variables: f.variables, terms };
}

export function scaleBy<T>(F: Field<T>, c: T, f: Polynomial<T>): Polynomial<T> {
  return multiply(F, constant(F, f.variables, c), f);
}

export function raise<T>(F: Field<T>, f: Polynomial<T>, n: number): Polynomial<T> {
  let result = constant(F, f.variables, F.one);
  for (let k = 0; k < n; k++) result = multiply(F, result, f);
  return result;
}

export function isZero<T>(f: Polynomial<T>): boolean {
  return f.terms.size === 0;
}

export function coefficient<T>(F: Field<T>, f: Polynomial<T>, exponents: readonly number[]): T {
  return f.terms.get(pack(exponents)) ?? F.zero;
}

/**
 * Terms with their exponents in the order they are printed in: highest total degree first, of one degree the highest single power
 * (u³ + v³ + uvw, y² + xy), then by the letters.
 */
export function sortedTerms<T>(f: Polynomial<T>): { readonly coefficient: T; readonly exponents: number[] }[] {
  const list = [...f.terms].map(([key, coefficient]) => ({
    key,
    coefficient,
    exponents: unpack(key, f.variables.length),
  }));
  const total = (exponents: readonly number[]) => exponents.reduce((a, b) => a + b, 0);
  const highest = (exponents: readonly number[]) => Math.max(...exponents);
  list.sort(
    (s, t) => total(t.exponents) - total(s.exponents) || highest(t.exponents) - highest(s.exponents) || t.key - s.key,
  );
  return list.map(({ coefficient, exponents }) => ({ coefficient, exponents }));
}

/** Total degree; −1 for the zero polynomial. */
export function degree<T>(f: Polynomial<T>): number {
  return sortedTerms(f)[0]?.exponents.reduce((a, b) => a + b, 0) ?? -1;
}

export function degreeIn<T>(f: Polynomial<T>, name: string): number {
  const k = f.variables.indexOf(name);
  return Math.max(-1, ...[...f.terms.keys()].map((key) => unpack(key, f.variables.length)[k]!));
}

/** True if all terms have the same total degree. */
export function isHomogeneous<T>(f: Polynomial<T>): boolean {
  const degrees = sortedTerms(f).map(({ exponents }) => exponents.reduce((a, b) => a + b, 0));
  return degrees.every((d) => d === degrees[0]);
}

/** Makes every term of total degree d by powers of one more variable, put last. */
export function homogenise<T>(f: Polynomial<T>, name: string, d = degree(f)): Polynomial<T> {
  const terms = new Map<number, T>();
  const count = f.variables.length;
  for (const [key, value] of f.terms) {
    const exponents = unpack(key, count);
    terms.set(pack([...exponents, d - exponents.reduce((a, b) => a + b, 0)]), value);
  }
  return { variables: [...f.variables, name], terms };
}

export function derivative<T>(F: Field<T>, f: Polynomial<T>, name: string): Polynomial<T> {
  const k = f.variables.indexOf(name);
  const terms = new Map<number, T>();
  for (const [key, value] of f.terms) {
    const exponent = unpack(key, f.variables.length)[k]!;
    if (exponent > 0) accumulate(F, terms, key - WEIGHTS[k]!, F.mul(F.fromInt(BigInt(exponent)), value));
  }
  return { variables: f.variables, terms };
}

/** Arithmetic into which a polynomial may be evaluated: a field, a ring of polynomials, of series. */
export interface Target<S> {
  readonly one: S;
  readonly zero: S;
  add(a: S, b: S): S;
  mul(a: S, b: S): S;
}

/** f at the given values, one a variable, in any ring that holds the field through `lift`. */
export function evaluateIn<T, S>(f: Polynomial<T>, values: readonly S[], ring: Target<S>, lift: (c: T) => S): S {
  const powers = values.map((value) => [ring.one, value]);
  const powerOf = (k: number, n: number): S => {
    const table = powers[k]!;
    while (table.length <= n) table.push(ring.mul(table.at(-1)!, values[k]!));
    return table[n]!;
  };
  let total = ring.zero;
  for (const [key, value] of f.terms) {
    let term = lift(value);
    unpack(key, f.variables.length).forEach((n, k) => {
      if (n > 0) term = ring.mul(term, powerOf(k, n));
    });
    total = ring.add(total, term);
  }
  return total;
}

export function evaluate<T>(F: Field<T>, f: Polynomial<T>, values: readonly T[]): T {
  return evaluateIn(f, values, F, (c) => c);
}

/** The ring of polynomials in some variables, as a target of substitution. */
export function ringOf<T>(F: Field<T>, variables: readonly string[]): Target<Polynomial<T>> {
  return {
    zero: constant(F, variables, F.zero),
    one: constant(F, variables, F.one),
    add: (f, g) => add(F, f, g),
    mul: (f, g) => multiply(F, f, g),
  };
}

/** f with a polynomial (all in the same variables) put in the place of each variable. */
export function substitute<T>(F: Field<T>, f: Polynomial<T>, values: readonly Polynomial<T>[]): Polynomial<T> {
  const { variables } = values[0]!;
  return evaluateIn(f, values, ringOf(F, variables), (c) => constant(F, variables, c));
}

/**
 * Quotient and remainder of f by one polynomial g in the lexicographic order. The remainder is zero exactly when g
 * divides f, since a single polynomial is a Gröbner basis of the ideal it generates.
 */
export function divideBy<T>(
  F: Field<T>,
  f: Polynomial<T>,
  g: Polynomial<T>,
): { readonly quotient: Polynomial<T>; readonly remainder: Polynomial<T> } {
  const count = g.variables.length;
  const lead = Math.max(...g.terms.keys());
  const leadExponents = unpack(lead, count);
  const inverse = F.inv(g.terms.get(lead)!);
  const rest = new Map(f.terms);
  const quotient = new Map<number, T>();
  const remainder = new Map<number, T>();
  while (rest.size > 0) {
    const key = maximum(rest.keys());
    const value = rest.get(key)!;
    if (unpack(key, count).every((n, k) => n >= leadExponents[k]!)) {
      const factor = F.mul(value, inverse);
      quotient.set(key - lead, factor);
      rest.delete(key);
      for (const [k, c] of g.terms) {
        if (k !== lead) accumulate(F, rest, key - lead + k, F.neg(F.mul(factor, c)));
      }
    } else {
      remainder.set(key, value);
      rest.delete(key);
    }
  }
  const { variables } = f;
  return { quotient: { variables, terms: quotient }, remainder: { variables, terms: remainder } };
}

function maximum(keys: Iterable<number>): number {
  let best = -1;
  for (const key of keys) if (key > best) best = key;
  return best;
}

/** f with its coefficients carried to another field. */
export function mapCoefficients<S, T>(F: Field<T>, f: Polynomial<S>, carry: (c: S) => T): Polynomial<T> {
  const terms = new Map<number, T>();
  for (const [key, value] of f.terms) {
    const image = carry(value);
    if (!F.isZero(image)) terms.set(key, image);
  }
  return { variables: f.variables, terms };
}

/** f divided by its first coefficient in printing order. */
export function monic<T>(F: Field<T>, f: Polynomial<T>): Polynomial<T> {
  const lead = sortedTerms(f)[0];
  return lead ? scaleBy(F, divide(F, F.one, lead.coefficient), f) : f;
}
