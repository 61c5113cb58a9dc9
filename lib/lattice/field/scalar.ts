// Coefficients of elliptic functions: polynomials, with exact numbers as coefficients, in constants of which only the name is used.
// "g2", "g3" and the roots "e1", "e2" of a lattice obey the relations of the cubic, so that equality of normal forms is equality of
// numbers up to relations among other constants.

import type { Field } from "../../algebra/field.ts";
import { combine } from "../../number/exactness.ts";
import type { Exact, Node } from "../../number/origin.ts";
import { Quadratic } from "../../number/quadratic.ts";
import { Rational } from "../../number/rational.ts";
import { DomainError } from "../../proof/errors.ts";

/** The power product of a term: names in order, with exponents >= 1. */
type Powers = readonly (readonly [name: string, exponent: number])[];

export interface Term {
  readonly coefficient: Exact;
  readonly powers: Powers;
}

/** A sum of terms by the text of their power product; no zero coefficients. */
export type Scalar = ReadonlyMap<string, Term>;

/** The constants that the names of an expression stand for. */
export type Constants = ReadonlyMap<string, Node>;

export const ZERO: Scalar = new Map();
export const ONE: Scalar = exactScalar(Rational.one);

export function exactScalar(value: Exact): Scalar {
  return isExactZero(value) ? new Map() : new Map([["", { coefficient: value, powers: [] }]]);
}

export function namedScalar(name: string): Scalar {
  return new Map([[name, { coefficient: Rational.one, powers: [[name, 1]] }]]);
}

/** The exact value of a scalar without named constants. */
export function exactOf(s: Scalar): Exact | undefined {
  if (s.size === 0) return Rational.zero;
  return s.size === 1 ? s.get("")?.coefficient : undefined;
}

export function isZeroScalar(s: Scalar): boolean {
  return s.size === 0;
}

export function addScalars(s: Scalar, t: Scalar): Scalar {
  const sum = new Map(s);
  for (const term of t.values()) put(sum, term);
  return sum;
}

export function negScalar(s: Scalar): Scalar {
  return new Map([...s].map(([key, { coefficient, powers }]) => [key, { coefficient: coefficient.neg(), powers }]));
}

export function subScalars(s: Scalar, t: Scalar): Scalar {
  return addScalars(s, negScalar(t));
}

/** The relations of one lattice: its g2 and g3 as scalars. */
export interface Relations {
  readonly g2: Scalar;
  readonly g3: Scalar;
}

export function mulScalars(s: Scalar, t: Scalar, relations: Relations): Scalar {
  const product = new Map<string, Term>();
  for (const x of s.values()) {
    for (const y of t.values()) {
      const term = { coefficient: exactly("times", x.coefficient, y.coefficient), powers: merged(x.powers, y.powers) };
      for (const part of reducedTerm(term, relations).values()) put(product, part);
    }
  }
  return product;
}

function put(sum: Map<string, Term>, term: Term): void {
  const key = term.powers.map(([name, e]) => (e === 1 ? name : `${name}^${e}`)).join(" ");
  const old = sum.get(key);
  const coefficient = old ? exactly("plus", old.coefficient, term.coefficient) : term.coefficient;
  if (isExactZero(coefficient)) sum.delete(key);
  else sum.set(key, { coefficient, powers: term.powers });
}

function merged(p: Powers, q: Powers): Powers {
  const all = new Map<string, number>(p);
  for (const [name, e] of q) all.set(name, (all.get(name) ?? 0) + e);
  return [...all].sort(([a], [b]) => (a < b ? -1 : 1));
}

/** e1³ = (g2 e1 + g3)/4 and e2² = −e1 e2 − e1² + g2/4, the minimal equations of the roots one over the other. */
function reducedTerm(term: Term, relations: Relations): Scalar {
  const power = (name: string) => term.powers.find(([n]) => n === name)?.[1] ?? 0;
  const rest = (name: string, by: number): Scalar =>
    single({ coefficient: term.coefficient, powers: lowered(term.powers, name, by) });
  const times = (s: Scalar, t: Scalar) => mulScalars(s, t, relations);
  const quarter = exactScalar(Rational.of(1, 4));
  const e1 = namedScalar("e1");
  if (power("e2") >= 2) {
    const square = subScalars(times(quarter, relations.g2), addScalars(times(e1, e1), times(e1, namedScalar("e2"))));
    return times(rest("e2", 2), square);
  }
  if (power("e1") >= 3) {
    const cube = times(quarter, addScalars(times(relations.g2, e1), relations.g3));
    return times(rest("e1", 3), cube);
  }
  return single(term);
}

function single(term: Term): Scalar {
  const sum = new Map<string, Term>();
  put(sum, term);
  return sum;
}

function lowered(powers: Powers, name: string, by: number): Powers {
  return powers.map(([n, e]) => [n, n === name ? e - by : e] as const).filter(([, e]) => e > 0);
}

function isExactZero(x: Exact): boolean {
  return x instanceof Quadratic ? x.a.sign() === 0 && x.b.sign() === 0 : x.sign() === 0;
}

/** Exact arithmetic within one field. Throws DomainError where two quadratic fields meet or a number grows past all bounds. */
export function exactly(method: "plus" | "minus" | "times" | "div", x: Exact, y: Exact): Exact {
  const value = combine(method, x, y);
  if (value) return value;
  throw new DomainError({
    subject: "elliptic function",
    given: `the coefficients ${x} and ${y}`,
    expected: "exact coefficients of one quadratic field",
    hint: "Give one of them as an enclosure: enclose(x).",
  });
}

/** The scalars of a lattice as a ring that the polynomial functions can use; `inv` knows exact numbers only. */
export function scalarRing(relations: Relations): Field<Scalar> {
  return {
    name: "constants",
    characteristic: 0n,
    zero: ZERO,
    one: ONE,
    fromInt: (n) => exactScalar(Rational.of(n)),
    add: addScalars,
    sub: subScalars,
    mul: (s, t) => mulScalars(s, t, relations),
    neg: negScalar,
    inv: (s) => exactScalar(exactly("div", Rational.one, exactOf(s) ?? refuse(s))),
    isZero: isZeroScalar,
    sqrt: () => undefined,
    format: scalarText,
  };
}

function refuse(s: Scalar): never {
  throw new DomainError({
    subject: "elliptic function",
    given: `division by ${scalarText(s)}`,
    expected: "an exact number",
  });
}

/** "g2/4 − 3 e1", names as they are. */
export function scalarText(s: Scalar): string {
  if (s.size === 0) return "0";
  const terms = [...s.entries()].map(([key, { coefficient }]) => {
    const name = key.replaceAll(" ", "·");
    const number = `${coefficient}`;
    const bracketed = /[ +]/.test(number) ? `(${number})` : number;
    return name === "" ? bracketed : number === "1" ? name : number === "-1" ? `-${name}` : `${bracketed}·${name}`;
  });
  return terms.join(" + ").replaceAll("+ -", "− ").replace(/^-/, "−");
}
