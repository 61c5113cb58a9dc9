// What is accepted where a number is expected, and how it is read: as an exact number or as an enclosure with a standing.
import type { Complex as Complexjs } from "complex.js";
import type { Decimal } from "decimal.js";
import type Fraction from "fraction.js";
import { DomainError } from "../proof/errors.ts";
import type { Ball } from "./ball.ts";
import * as ball from "./ball.ts";
import * as disc from "./disc.ts";
import type { Enclosure, Exact, NumberStanding } from "./origin.ts";
import { Quadratic } from "./quadratic.ts";
import { Rational } from "./rational.ts";
import { readNumber } from "./read.ts";

/** A scalar of another library, of the language, or text. */
export type ForeignReal = bigint | number | string | Decimal | Fraction;
export type ForeignComplex = ForeignReal | Complexjs;

/** The start of a value: exact, or an enclosure. */
export interface Leaf {
  readonly exact?: Exact;
  readonly enclosure?: Enclosure;
  readonly standing: NumberStanding;
  readonly source?: string;
}

/**
 * Reads a scalar. Exactly: bigints, safe integers, text, Decimal and Fraction values. Any other number is taken as right to half a
 * unit of its last place, with the standing "double".
 * Throws   DomainError for NaN and the infinities and for unreadable text (position shown); TypeError for what is no number.
 */
export function leafOf(x: unknown, subject: string): Leaf {
  if (x instanceof Rational || x instanceof Quadratic) return exactLeaf(x);
  if (typeof x === "bigint") return exactLeaf(Rational.of(x));
  if (typeof x === "number") return numberLeaf(x, subject);
  if (typeof x === "string") return readNumber(x, subject);
  if (isDecimal(x)) return decimalLeaf(x, subject);
  if (isFraction(x)) return exactLeaf(Rational.of(x.s * x.n, x.d));
  if (isComplexjs(x)) return complexLeaf(x, subject);
  throw new TypeError(
    `${subject}: got ${described(x)}; expected a number, a bigint, text, or a value of decimal.js, fraction.js or complex.js`,
  );
}

function exactLeaf(exact: Exact): Leaf {
  return { exact: exact instanceof Quadratic && exact.isRational() ? exact.a : exact, standing: "exact" };
}

function numberLeaf(x: number, subject: string): Leaf {
  if (Number.isSafeInteger(x)) return exactLeaf(Rational.of(x));
  return { enclosure: halfUlp(x, subject), standing: "double", source: String(x) };
}

/** x ± half a unit in its last place. */
function halfUlp(x: number, subject: string): Ball {
  if (!Number.isFinite(x)) {
    throw new DomainError({ subject, given: `the number ${x}`, expected: "a finite number" });
  }
  const { man, exp } = ball.fromDouble(x);
  // The last place of a normal double is 2^(magnitude − 53), of a subnormal one 2^-1074.
  const last = Math.max(ball.magnitude({ man, exp, rad: 0 }) - 53, -1074);
  return { man: man << BigInt(exp - last + 1), exp: last - 1, rad: 1 };
}

function decimalLeaf(x: Decimal, subject: string): Leaf {
  if (!x.isFinite()) throw new DomainError({ subject, given: `the decimal ${x}`, expected: "a finite number" });
  return exactLeaf(Rational.parse(x.toString()));
}

function complexLeaf(x: { readonly re: number; readonly im: number }, subject: string): Leaf {
  const { re, im } = x;
  if (Number.isSafeInteger(re) && Number.isSafeInteger(im)) return exactLeaf(Quadratic.of(re, im, -1));
  const part = (value: number): Ball =>
    Number.isSafeInteger(value) ? ball.fromDouble(value) : halfUlp(value, subject);
  return { enclosure: disc.fromBalls(part(re), part(im)), standing: "double", source: `${re} + ${im}i` };
}

function isObject(x: unknown): x is Record<string, unknown> {
  return typeof x === "object" && x !== null;
}

function isDecimal(x: unknown): x is Decimal {
  return isObject(x) && typeof x.toSignificantDigits === "function" && typeof x.isFinite === "function";
}

function isFraction(x: unknown): x is { readonly s: bigint; readonly n: bigint; readonly d: bigint } {
  return isObject(x) && typeof x.s === "bigint" && typeof x.n === "bigint" && typeof x.d === "bigint";
}

function isComplexjs(x: unknown): x is { readonly re: number; readonly im: number } {
  return isObject(x) && typeof x.re === "number" && typeof x.im === "number";
}

export function described(x: unknown): string {
  if (x === null) return "null";
  if (isObject(x)) return `a value of type ${x.constructor?.name ?? "object"}`;
  return typeof x === "function" ? "a function" : `${typeof x === "symbol" ? "a symbol" : String(x)}`;
}
