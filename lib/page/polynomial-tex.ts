// Polynomials and equations over a field as TeX.

import type { Field } from "../algebra/field.ts";
import { type Polynomial, sortedTerms } from "../algebra/multivariate.ts";
import { Residue } from "../algebra/primefield.ts";
import { type Equation, leadingSide } from "../curve/equation/print.ts";
import { texInteger } from "./digits.ts";
import type { Show } from "./kind.ts";
import { texName, texWords } from "./tex.ts";

/** What typesetting needs of a field. */
export type Coefficients<T> = Pick<Field<T>, "format" | "neg">;

/** An element of a field: typeset by its class where it has one, else by the text of the field. */
export function elementTex<T>(F: Coefficients<T>, c: T, show: Show): string {
  if (c instanceof Residue) return texInteger(F.format(c));
  return typeof c === "object" && c !== null ? show.tex(c) : texWords(F.format(c));
}

export function polynomialTex<T>(F: Coefficients<T>, f: Polynomial<T>, show: Show, ordered = sortedTerms(f)): string {
  const terms = ordered.map(({ coefficient, exponents }) => term(F, f.variables, coefficient, exponents, show));
  if (terms.length === 0) return "0";
  return terms
    .map(({ negative, tex }, k) => (k === 0 ? (negative ? `-${tex}` : tex) : ` ${negative ? "-" : "+"} ${tex}`))
    .join("");
}

export function equationTex<T>(F: Coefficients<T>, { left, right }: Equation<T>, show: Show): string {
  return `${polynomialTex(F, left, show, leadingSide(left))} = ${polynomialTex(F, right, show)}`;
}

function term<T>(F: Coefficients<T>, variables: readonly string[], c: T, exponents: readonly number[], show: Show) {
  const text = F.format(c);
  // A coefficient that is itself a sum keeps its sign inside brackets.
  const sum = /.[+±]|\S\s*-|\s/.test(text.slice(1));
  const negative = text.startsWith("-") && !sum;
  const size = negative ? F.neg(c) : c;
  const monomial = monomialTex(variables, exponents);
  const coefficient = elementTex(F, size, show);
  if (monomial === "") return { negative, tex: sum ? `\\left(${coefficient}\\right)` : coefficient };
  if (F.format(size) === "1") return { negative, tex: monomial };
  return { negative, tex: `${sum ? `\\left(${coefficient}\\right)` : coefficient} ${monomial}` };
}

function monomialTex(variables: readonly string[], exponents: readonly number[]): string {
  return variables
    .flatMap((name, k) => {
      const exponent = exponents[k] ?? 0;
      if (exponent === 0) return [];
      return [exponent === 1 ? texName(name) : `${texName(name)}^{${exponent}}`];
    })
    .join(" ");
}

/** Q as a blackboard letter, Q(√5), F_7; other names as words. */
export function fieldTex(name: string): string {
  const match = /^([QRCF])(?:_(\d+))?(?:\(√(-?\d+)\)|\(i\))?$/.exec(name);
  if (!match) return texWords(name);
  const index = match[2] === undefined ? "" : `_{${match[2]}}`;
  const root = match[3] !== undefined ? `(\\sqrt{${match[3]}})` : name.endsWith("(i)") ? "(i)" : "";
  return `\\mathbb{${match[1]}}${index}${root}`;
}
