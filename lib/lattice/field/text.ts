// An elliptic function in words: polynomials in ℘ and ℘′.
import type { Element, ScalarPolynomial } from "./element.ts";
import { exactOf, type Scalar, scalarText } from "./scalar.ts";

/** "(℘² − 3)/(℘ − 1/2)", "4℘³ − ℘", "℘′". */
export function elementText({ A, B, D }: Element): string {
  const even = polynomialText(A, "");
  const odd = polynomialText(B, "℘′");
  const top = B.length === 0 ? even : A.length === 0 ? odd : joined(even, odd);
  if (D.length === 1 && exactOf(D[0]!)?.toString() === "1") return top;
  const bottom = polynomialText(D, "");
  return `${bracketed(top)}/${bracketed(bottom)}`;
}

function joined(a: string, b: string): string {
  return b.startsWith("−") ? `${a} − ${b.slice(1)}` : `${a} + ${b}`;
}

function bracketed(text: string): string {
  return / [+−] |·|\//.test(text) ? `(${text})` : text;
}

function polynomialText(p: ScalarPolynomial, factor: string): string {
  const terms: string[] = [];
  for (let k = p.length - 1; k >= 0; k--) {
    const c = p[k]!;
    if (c.size > 0) terms.push(term(c, power(k) + factor));
  }
  return terms.length === 0 ? "0" : terms.reduce(joined);
}

function power(k: number): string {
  if (k === 0) return "";
  const digits = [..."⁰¹²³⁴⁵⁶⁷⁸⁹"];
  return k === 1 ? "℘" : `℘${[...`${k}`].map((d) => digits[Number(d)]).join("")}`;
}

function term(c: Scalar, name: string): string {
  const text = scalarText(c);
  if (name === "") return text;
  if (text === "1") return name;
  if (text === "−1") return `−${name}`;
  return c.size > 1 || /[/ ]/.test(text) ? signedBracket(text) + name : text + name;
}

function signedBracket(text: string): string {
  // Numbers of a quadratic field come in brackets of their own.
  if (/^\((?:[^()]|\([^()]*\))*\)$/.test(text)) return text;
  return text.startsWith("−") && !/ [+−] /.test(text) ? `−(${text.slice(1)})` : `(${text})`;
}
