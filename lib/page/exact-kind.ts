// Exact numbers: rationals and numbers a + b√d.

import type { Quadratic } from "../number/quadratic.ts";
import type { Rational } from "../number/rational.ts";
import { parseDecimal, texInteger } from "./digits.ts";
import type { Cell, Kind } from "./kind.ts";
import { fraction } from "./tex.ts";

export const rationalKind: Kind<Rational> = {
  text: (q) => String(q),
  tex: rationalTex,
  cell: (q) => {
    const re = q.den === 1n ? parseDecimal(String(q)) : undefined;
    return re ? { kind: "number", re } : { kind: "formula", text: String(q), tex: rationalTex(q) };
  },
  data: (q) => ({ kind: "rational", value: String(q) }),
};

export function rationalTex(q: Rational): string {
  if (q.den === 1n) return texInteger(String(q.num));
  const size = q.num < 0n ? -q.num : q.num;
  return `${q.num < 0n ? "-" : ""}${fraction(texInteger(String(size)), texInteger(String(q.den)))}`;
}

export const quadraticKind: Kind<Quadratic> = {
  text: (x) => String(x),
  tex: quadraticTex,
  cell: (x) => gaussianCell(x) ?? { kind: "formula", text: String(x), tex: quadraticTex(x) },
  data: (x) => ({ ...x.toJSON() }),
};

function quadraticTex({ a, b, d }: Quadratic): string {
  if (b.num === 0n) return rationalTex(a);
  const root = d === -1n ? "i" : d < 0n ? `i\\sqrt{${-d}}` : `\\sqrt{${d}}`;
  const size = b.abs();
  const term = size.equals(1) ? root : `${rationalTex(size)}${d === -1n ? "\\," : ""}${root}`;
  const negative = b.num < 0n;
  if (a.num === 0n) return `${negative ? "-" : ""}${term}`;
  return `${rationalTex(a)} ${negative ? "-" : "+"} ${term}`;
}

/** a + bi with integers a and b has digits to align. */
function gaussianCell({ a, b, d }: Quadratic): Cell | undefined {
  if (d !== -1n || a.den !== 1n || b.den !== 1n) return undefined;
  const [re, im] = [parseDecimal(String(a)), parseDecimal(String(b))];
  if (!re || !im) return undefined;
  return { kind: "number", im, ...(a.num === 0n ? {} : { re }) };
}
