// Equations and polynomials as plain text that can be read back by the templates.

import type { Field } from "../../algebra/field.ts";
import { type Polynomial, sortedTerms } from "../../algebra/multivariate.ts";

/** An equation as data: page typesets it, `plainEquation` prints it. */
export interface Equation<T> {
  readonly left: Polynomial<T>;
  readonly right: Polynomial<T>;
}

/** "x^3 - 189*x - 999"; "0" for the zero polynomial. */
export function plainPolynomial<T>(F: Field<T>, f: Polynomial<T>, ordered = sortedTerms(f)): string {
  const terms = ordered.map(({ coefficient, exponents }) => plainTerm(F, f.variables, coefficient, exponents));
  if (terms.length === 0) return "0";
  return terms.map(({ sign, text }, k) => (k === 0 ? (sign === "-" ? `-${text}` : text) : ` ${sign} ${text}`)).join("");
}

export function plainEquation<T>(F: Field<T>, { left, right }: Equation<T>): string {
  return `${plainPolynomial(F, left, leadingSide(left))} = ${plainPolynomial(F, right)}`;
}

/** The terms of the left side of a long form in their usual order: y^2 before x*y. */
export function leadingSide<T>(f: Polynomial<T>): ReturnType<typeof sortedTerms<T>> {
  const last = f.variables.length - 1;
  return sortedTerms(f).sort((s, t) => (t.exponents[last] ?? 0) - (s.exponents[last] ?? 0));
}

function plainTerm<T>(F: Field<T>, variables: readonly string[], coefficient: T, exponents: readonly number[]) {
  const monomial = plainMonomial(variables, exponents);
  const { sign, text } = signed(F, coefficient);
  if (!monomial) return { sign, text };
  return { sign, text: text === "1" ? monomial : `${text}*${monomial}` };
}

/** x^2*y; "" for the constant monomial. */
export function plainMonomial(variables: readonly string[], exponents: readonly number[]): string {
  return variables
    .flatMap((name, k) => (exponents[k] === 0 ? [] : exponents[k] === 1 ? [name] : [`${name}^${exponents[k]}`]))
    .join("*");
}

/** A coefficient as a sign and what follows it, in brackets if it is a sum. */
function signed<T>(F: Field<T>, c: T): { readonly sign: "+" | "-"; readonly text: string } {
  const text = F.format(c);
  const negative = text.startsWith("-") && !isSum(text.slice(1));
  const size = negative ? text.slice(1) : text;
  return { sign: negative ? "-" : "+", text: isSum(size) ? `(${size})` : size };
}

function isSum(text: string): boolean {
  return /[ +±]|\w-/.test(text);
}
