// Exact arithmetic of rational and quadratic numbers as far as it stays within one field and within bounds.
import { absBig, bitLength } from "./fixed/bits.ts";
import { isqrt } from "./fixed/isqrt.ts";
import type { Exact } from "./origin.ts";
import { Quadratic } from "./quadratic.ts";
import { Rational } from "./rational.ts";

/** Exact values longer than this (in bits) go on as enclosures with an origin: an iteration would double them each time. */
const LONGEST = 20_000;

type Pair = readonly [Rational, Rational] | readonly [Quadratic, Quadratic];

function joined(x: Exact, y: Exact): Pair | undefined {
  if (x instanceof Rational) {
    if (y instanceof Rational) return [x, y];
    return [y.withRational(x), y];
  }
  if (y instanceof Rational) return [x, x.withRational(y)];
  const same = y.over(x.d);
  return same && [x, same];
}

/** A quadratic number without irrational part as a rational one; undefined if too long to carry on. */
export function settled(x: Exact): Exact | undefined {
  if (x instanceof Quadratic) {
    if (x.isRational()) return settled(x.a);
    return fits(x.a) && fits(x.b) ? x : undefined;
  }
  return fits(x) ? x : undefined;
}

function fits(q: Rational): boolean {
  return bitLength(q.num) < LONGEST && bitLength(q.den) < LONGEST;
}

export type Field = "plus" | "minus" | "times" | "div";

/** x + y, x − y, x·y or x/y if both are exact numbers of one field. Division by exact 0 throws PoleError. */
export function combine(method: Field, x: Exact | undefined, y: Exact | undefined): Exact | undefined {
  if (!x || !y) return undefined;
  if (x instanceof Rational && y instanceof Rational) return settled(x[method](y));
  const pair = joined(x, y);
  return pair && settled((pair[0] as Quadratic)[method](pair[1] as Quadratic));
}

/** x^n, if it stays short. */
export function power(x: Exact | undefined, n: number): Exact | undefined {
  if (!x) return undefined;
  const size =
    x instanceof Rational
      ? bitLength(x.num) + bitLength(x.den)
      : bitLength(x.a.num) + bitLength(x.b.num) + bitLength(x.a.den * x.b.den) + bitLength(x.d);
  if (size * Math.abs(n) > LONGEST) return undefined;
  return settled(x.pow(n));
}

/** The principal root of a rational number that is short: rational, or b√d. */
export function root(x: Exact | undefined): Exact | undefined {
  if (!(x instanceof Rational)) return undefined;
  if (bitLength(x.num) > 128 || bitLength(x.den) > 128) return rationalRoot(x);
  const negative = x.num < 0n;
  const whole = rationalRoot(x.abs());
  if (whole) return negative ? Quadratic.of(0, whole, -1) : whole;
  return settled(Quadratic.of(0, Rational.of(1n, x.den), x.num * x.den));
}

/** The real n-th root of a rational number, if it is rational: >= 0 of one >= 0, of a negative one for odd n. */
export function rationalRootOf(x: Exact | undefined, n: number): Rational | undefined {
  if (!(x instanceof Rational) || !Number.isSafeInteger(n) || n < 1 || (x.num < 0n && n % 2 === 0)) return undefined;
  const num = integerRoot(absBig(x.num), n);
  const den = integerRoot(x.den, n);
  if (num === undefined || den === undefined) return undefined;
  return Rational.of(x.num < 0n ? -num : num, den);
}

/** The n-th root of an integer >= 0, if it is one: by bisection on its few bits. */
function integerRoot(a: bigint, n: number): bigint | undefined {
  if (a <= 1n || n === 1) return a;
  let low = 1n;
  let high = 1n << BigInt(Math.ceil(bitLength(a) / n));
  while (low < high) {
    const middle = (low + high) >> 1n;
    if (middle ** BigInt(n) < a) low = middle + 1n;
    else high = middle;
  }
  return low ** BigInt(n) === a ? low : undefined;
}

function rationalRoot(x: Rational): Rational | undefined {
  if (x.num < 0n) return undefined;
  const n = isqrt(x.num);
  const d = isqrt(x.den);
  return n * n === x.num && d * d === x.den ? Rational.of(n, d) : undefined;
}

/** Whether two exact numbers lie in one field as they are written, so that their difference is exact. */
export function oneField(x: Exact | undefined, y: Exact | undefined): boolean {
  return x !== undefined && y !== undefined && joined(x, y) !== undefined;
}

/** The sign of x − y, exactly, however long they are; undefined if they are not real numbers of one field. */
export function exactOrder(x: Exact, y: Exact): -1 | 0 | 1 | undefined {
  const pair = joined(x, y);
  if (!pair) return undefined;
  if (pair[0] instanceof Rational) return pair[0].compare(pair[1] as Rational);
  return pair[0].minus(pair[1] as Quadratic).sign();
}

/** Whether two exact numbers are equal: of one field by comparison, of different fields only if both are rational. */
export function sameExact(x: Exact, y: Exact): boolean {
  const pair = joined(x, y);
  if (!pair) return x instanceof Quadratic && x.equals(y);
  return (pair[0] as Quadratic).equals(pair[1] as Quadratic);
}

/** Whether the exact number is real. */
export function isRealExact(x: Exact): boolean {
  return x instanceof Rational || x.d > 0n || x.isRational();
}

/** Real or imaginary part of an exact number. */
export function exactPart(exact: Exact | undefined, which: "re" | "im"): Exact | undefined {
  if (!exact) return undefined;
  if (exact instanceof Rational || exact.d > 0n) return which === "re" ? exact : Rational.zero;
  if (which === "re") return exact.a;
  return exact.d === -1n ? exact.b : Quadratic.of(0, exact.b, -exact.d);
}
