// Exact numbers: rationals and numbers a + b√d.

import type { Residue } from "../algebra/primefield.ts";
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

/** A residue with its modulus; in an equation over F_p the number alone. */
export const residueKind: Kind<Residue> = {
  text: (r) => `${r.value} mod ${r.modulus}`,
  tex: (r) => `${texInteger(String(r.value))} \\bmod ${texInteger(String(r.modulus))}`,
  data: (r) => ({ kind: "residue", value: String(r.value), modulus: String(r.modulus) }),
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

/** (m + n√d) over one denominator; Gaussian numbers part by part. */
export function quadraticTex({ a, b, d }: Quadratic): string {
  if (b.num === 0n) return rationalTex(a);
  if (d === -1n) return gaussianTex(a, b);
  const den = (a.den * b.den) / gcd(a.den, b.den);
  const [m, n] = [(a.num * den) / a.den, (b.num * den) / b.den];
  const root = d < 0n ? `i\\sqrt{${texInteger(String(-d))}}` : `\\sqrt{${texInteger(String(d))}}`;
  const term = `${unit(n < 0n ? -n : n)}${root}`;
  const top = m === 0n ? term : `${texInteger(String(m))} ${n < 0n ? "-" : "+"} ${term}`;
  const sign = m === 0n && n < 0n ? "-" : "";
  return den === 1n ? `${sign}${top}` : `${sign}${fraction(top, texInteger(String(den)))}`;
}

function gaussianTex(a: Rational, b: Rational): string {
  const size = b.abs();
  const term = size.equals(1) ? "i" : `${rationalTex(size)}\\,i`;
  if (a.num === 0n) return `${b.num < 0n ? "-" : ""}${term}`;
  return `${rationalTex(a)} ${b.num < 0n ? "-" : "+"} ${term}`;
}

/** A factor in front of a root, left out where it is 1. */
function unit(n: bigint): string {
  return n === 1n ? "" : texInteger(String(n));
}

function gcd(a: bigint, b: bigint): bigint {
  return b === 0n ? a : gcd(b, a % b);
}

/** a + bi with integers a and b has digits to align. */
function gaussianCell({ a, b, d }: Quadratic): Cell | undefined {
  if (d !== -1n || a.den !== 1n || b.den !== 1n) return undefined;
  const [re, im] = [parseDecimal(String(a)), parseDecimal(String(b))];
  if (!re || !im) return undefined;
  return { kind: "number", im, ...(a.num === 0n ? {} : { re }) };
}
