import { absBig, bitLength, shift } from "../fixed/bits.ts";
import { Rational } from "../rational.ts";
import { sub } from "./arithmetic.ts";
import { type Ball, containsZero, fromRational, sign } from "./data.ts";

/** -1, 0 or 1 if every pair of numbers of the two enclosures stands so; undefined if they overlap (and are not both exact). */
export function compare(x: Ball, y: Ball): -1 | 0 | 1 | undefined {
  return sign(difference(x, y));
}

/** Whether some number lies in both. */
export function overlaps(x: Ball, y: Ball): boolean {
  return containsZero(difference(x, y));
}

/** Whether every number of y (a rational, or a ball) lies in x; decided exactly, but for exponents a million apart: there a doubt is a no. */
export function contains(x: Ball, y: Rational | Ball): boolean {
  if (y instanceof Rational) return containsRational(x, y);
  const exp = Math.min(x.exp, y.exp);
  if (Math.max(x.exp, y.exp) - exp > 1_000_000) return containsFar(x, y);
  const up = shift(x.exp - exp);
  const across = shift(y.exp - exp);
  const apart = absBig((x.man << up) - (y.man << across)) << 52n;
  return apart + (fineRadius(y) << across) <= fineRadius(x) << up;
}

function containsRational(x: Ball, q: Rational): boolean {
  if (Math.abs(x.exp) > 1_000_000) return containsFar(x, fromRational(q, bitLength(q.num) + bitLength(q.den) + 64));
  const up = x.exp > 0 ? 1n << shift(x.exp) : 1n;
  const down = x.exp < 0 ? 1n << shift(-x.exp) : 1n;
  const distance = absBig(q.num * down - x.man * q.den * up);
  return distance << 52n <= fineRadius(x) * q.den * up;
}

/** The radius times 2^52, exactly: it is 0 or a double not below 1. */
function fineRadius(x: Ball): bigint {
  return BigInt(x.rad * 2 ** 52);
}

function containsFar(x: Ball, y: Ball): boolean {
  const inner = difference(y, { man: x.man, exp: x.exp, rad: 0 });
  const slack: Ball = { man: BigInt(Math.floor(x.rad)), exp: x.exp, rad: 0 };
  const above = sign(sub(slack, inner, 64));
  const below = sign(sub(slack, { ...inner, man: -inner.man }, 64));
  return above !== undefined && above >= 0 && below !== undefined && below >= 0;
}

/** x − y with as many bits as needed to keep short exact values exact. */
function difference(x: Ball, y: Ball): Ball {
  const gap = Math.abs(x.exp - y.exp);
  return sub(x, y, gap > 1_000_000 ? 128 : exactPrec(x) + exactPrec(y) + gap);
}

function exactPrec(x: Ball): number {
  return 64 + 4 * absBig(x.man).toString(16).length;
}
