// Decimal text of enclosures: the parts that plain text and LaTeX are made of, and the plain text itself.

import type { Ball } from "./ball.ts";
import * as ball from "./ball.ts";
import { absBig, bitLength, scaled } from "./fixed/bits.ts";
import { Rational } from "./rational.ts";

/**
 * A decimal d = ±0.d1d2d3... shown for a number x: the digits d1 d2 ... with d1·10^exponent the leading one, and d1 not "0" unless d is 0.
 * With `ellipsis` x goes on and |x − d| <= 1 unit of the last digit; without, x = d, or |x − d| <= radius if that is given.
 */
export interface DecimalParts {
  readonly sign: "" | "-";
  readonly digits: string;
  readonly exponent: number;
  readonly ellipsis: boolean;
  readonly radius?: { readonly digits: string; readonly exponent: number };
}

/** A decimal n·10^-places of x: the truncation if that is certain, else the nearest one. */
interface Placed {
  readonly n: bigint;
  readonly whole: boolean;
}

/** Sizes beyond this (in bits) are printed through logarithms instead of powers of ten. */
const FAR = 400_000;

/** n with |x − n·10^-places| <= 1 unit, or undefined if the enclosure is too wide to say. */
function placed(x: Ball, places: number): Placed | undefined {
  const power = 10n ** BigInt(Math.abs(places));
  const size = absBig(x.man);
  // Twice the radius in half units of 2^-32, exactly enough: rounded up.
  const radius = BigInt(Math.ceil(x.rad * 2 ** 20));
  const at = (m: bigint, up: boolean): bigint => {
    const top = places >= 0 ? m * power : m;
    const shifted = x.exp - 20 >= 0 ? top << BigInt(x.exp - 20) : top;
    const below = (places >= 0 ? 1n : power) << BigInt(x.exp - 20 >= 0 ? 0 : 20 - x.exp);
    const q = shifted / below;
    const rest = shifted - q * below;
    return rest < 0n ? q - 1n : up && rest > 0n ? q + 1n : q;
  };
  const low = at((size << 20n) - radius, false);
  const high = at((size << 20n) + radius, true);
  const negative = x.man < 0n;
  if (x.rad === 0 && low === high) return { n: negative ? -low : low, whole: true };
  // x lies in [low, high]: within one unit the lower end is the truncation.
  if (high - low <= 1n && low >= 0n) return { n: negative ? -low : low, whole: false };
  if (high - low === 2n) return { n: negative ? -(low + 1n) : low + 1n, whole: false };
  if (high <= 1n && low >= -1n) return { n: 0n, whole: false };
  return undefined;
}

/** Rough power of ten of the leading digit of |x|, right up to one. */
function leading(x: Ball): number {
  const size = absBig(x.man);
  const length = bitLength(size);
  const top = Number(scaled(size, 60 - length));
  return Math.floor((Math.log2(top) + length - 60 + x.exp) * 0.3010299956639812 + 1e-9);
}

/**
 * The parts of x with `digits` significant digits; undefined if x is not known well enough. An exact ball that ends
 * earlier is given without trailing zeros and without ellipsis.
 */
export function significant(x: Ball, digits: number): DecimalParts | undefined {
  if (ball.isZero(x)) return { sign: "", digits: "0", exponent: 0, ellipsis: false };
  if (ball.containsZero(x)) return undefined;
  if (beyond(x)) return far(x, digits);
  let e = leading(x);
  for (let tries = 0; tries < 3; tries++) {
    const found = placed(x, digits - 1 - e);
    if (!found) return undefined;
    const text = absBig(found.n).toString();
    if (found.n !== 0n && text.length === digits) return parts(found, text, e);
    // Rounded up to the next power of ten: the digits are still right, with one more.
    if (text.length === digits + 1 && /^10*$/.test(text)) return parts(found, text, e + 1);
    e += found.n === 0n ? -1 : text.length - digits;
  }
  return undefined;
}

function parts(found: Placed, text: string, exponent: number): DecimalParts {
  const sign = found.n < 0n ? "-" : "";
  if (!found.whole) return { sign, digits: text, exponent, ellipsis: true };
  return { sign, digits: text.replace(/0+$/, ""), exponent, ellipsis: false };
}

/** x = y·10^e with |2^exp of x| = t·10^e, 1/2 < t < 20: y is wider than x by a relative 2^-prec. No power of ten is built. */
function rescaled(x: Ball, prec: number): { readonly y: Ball; readonly e: number } {
  const log = ball.mulInt(ball.ln2(prec + 56), x.exp, prec + 56);
  const ten = ball.ln(ball.fromInt(10), prec + 104);
  const e = Math.floor(ball.toDouble(ball.div(log, ten, 64)));
  const t = ball.exp(ball.sub(log, ball.mulInt(ten, e, prec + 56), prec + 8), prec + 4);
  return { y: ball.mul({ man: x.man, exp: 0, rad: x.rad }, t, prec + 4), e };
}

/** Bits that keep what is known of x. */
function fullBits(x: Ball): number {
  return bitLength(x.man) + 64;
}

function far(x: Ball, digits: number): DecimalParts | undefined {
  const { y, e } = rescaled(x, Math.ceil(digits * 3.33) + 64);
  const found = significant(y, digits);
  return found && { ...found, exponent: found.exponent + e, ellipsis: true };
}

/** 0 ± r for an enclosure that holds 0: nothing is known but a bound of its size. */
export function aroundZero(x: Ball): DecimalParts {
  return withRadius({ man: 0n, exp: x.exp, rad: Number(absBig(x.man)) + x.rad + 1 });
}

/** The parts of x with the last digit at 10^-places; undefined if x is not known well enough. */
export function atPlaces(x: Ball, places: number): DecimalParts | undefined {
  if (ball.isZero(x)) return { sign: "", digits: "0", exponent: 0, ellipsis: false };
  // Under a hundredth of a unit: 0, without building the power of ten.
  if (ball.magnitude(x) < -places * 3.3219280948873626 - 8) return nothing(places, false);
  if (beyond(x)) {
    const { y, e } = rescaled(x, Math.max(64, Math.ceil(ball.magnitude(x) + places * 3.3219280948873626) + 64));
    const found = atPlaces(y, places + e);
    return found && { ...found, exponent: found.exponent + e, ellipsis: true };
  }
  const found = placed(x, places);
  if (!found) return undefined;
  const text = absBig(found.n).toString();
  if (found.n === 0n) return nothing(places, found.whole);
  return parts(found, text, text.length - 1 - places);
}

/** 0 with its last digit at 10^-places: "0.000..." or "0...e7". */
function nothing(places: number, whole: boolean): DecimalParts {
  if (whole) return { sign: "", digits: "0", exponent: 0, ellipsis: false };
  return places >= 0
    ? { sign: "", digits: "0".repeat(places + 1), exponent: 0, ellipsis: true }
    : { sign: "", digits: "0", exponent: -places, ellipsis: true };
}

/** The decimal parts of a rational number: exact if it ends within `digits`, else cut with an ellipsis. */
export function rationalParts(q: Rational, digits: number): DecimalParts {
  const { num, den } = q;
  if (num === 0n) return { sign: "", digits: "0", exponent: 0, ellipsis: false };
  const size = absBig(num);
  const rough = Math.floor((bitLength(size) - bitLength(den)) * 0.30103);
  for (let e = rough + 1; ; e--) {
    const places = digits - 1 - e;
    const power = 10n ** BigInt(Math.abs(places));
    const top = places >= 0 ? size * power : size;
    const bottom = places >= 0 ? den : den * power;
    const n = top / bottom;
    const text = n.toString();
    if (n !== 0n && text.length >= digits) return parts({ n: num < 0n ? -n : n, whole: n * bottom === top }, text, e);
  }
}

/** A middle and a radius as whole numbers of units 10^place, with every number of the enclosure within them. */
export interface DecimalBounds {
  readonly middle: bigint;
  readonly radius: bigint;
  readonly place: number;
}

/**
 * Two to four digits of radius, rounded up over what the rounding of the middle leaves, and the middle to the same place. Not for exact balls, unless
 * their size is beyond powers of ten that can be built.
 */
export function decimalBounds(x: Ball, digits = 2): DecimalBounds {
  if (beyond(x)) {
    const { y, e } = rescaled(x, fullBits(x));
    const bounds = decimalBounds(y, digits);
    return { ...bounds, place: bounds.place + e };
  }
  const radius = dyadic(BigInt(Math.ceil(x.rad * 2 ** 20)), x.exp - 20);
  const place = leading({ man: BigInt(Math.ceil(x.rad * 2 ** 20)), exp: x.exp - 20, rad: 0 }) + 1 - digits;
  const unit = place >= 0 ? Rational.of(10n ** BigInt(place)) : Rational.of(1n, 10n ** BigInt(-place));
  const middle = dyadic(x.man, x.exp).div(unit);
  const n = middle.round();
  const total = radius.div(unit).plus(middle.minus(n).abs());
  return { middle: n, radius: -total.neg().floor(), place };
}

/** Whether a number is too large or too small to be written out. */
export function beyond(x: Ball): boolean {
  return Math.abs(x.exp) > FAR;
}

function dyadic(man: bigint, exp: number): Rational {
  return exp >= 0 ? Rational.of(man << BigInt(exp)) : Rational.of(man, 1n << BigInt(-exp));
}

/** Midpoint and radius in decimals, x within them; see `decimalBounds`. */
export function withRadius(x: Ball): DecimalParts {
  if (x.rad === 0 && (ball.isZero(x) || !beyond(x))) return exactParts(x);
  const { middle: n, radius, place } = decimalBounds(x);
  const total = radius.toString();
  const text = absBig(n).toString();
  return {
    sign: n < 0n ? "-" : "",
    digits: text,
    exponent: n === 0n ? 0 : text.length - 1 + place,
    ellipsis: false,
    radius: { digits: trimmed(total), exponent: total.length - 1 + place },
  };
}

function trimmed(digits: string): string {
  return digits.replace(/(?<=.)0+$/, "");
}

function exactParts(x: Ball): DecimalParts {
  return rationalParts(dyadic(x.man, x.exp), Math.max(1, Math.ceil(Math.abs(x.exp) + bitLength(x.man)) + 2));
}

/** "3.14159...", "1.25 ± 1e-6", "-2.5...e-10": ungrouped, and read back by `real`. */
export function plainParts(p: DecimalParts): string {
  const dots = p.ellipsis ? "..." : "";
  const body = p.sign + decimalText(p.digits, p.exponent, dots);
  return p.radius ? `${body} ± ${decimalText(p.radius.digits, p.radius.exponent, "", -2)}` : body;
}

function decimalText(digits: string, exponent: number, dots: string, smallest = -7): string {
  const known = digits.length;
  const longest = dots ? known : 21;
  if (exponent >= smallest && exponent < 0) return `0.${"0".repeat(-exponent - 1)}${digits}${dots}`;
  if (exponent >= 0 && exponent < longest) {
    const whole = digits.slice(0, exponent + 1).padEnd(exponent + 1, "0");
    const rest = digits.slice(exponent + 1);
    return rest ? `${whole}.${rest}${dots}` : `${whole}${dots}`;
  }
  const rest = digits.slice(1);
  return `${digits[0]}${rest ? `.${rest}` : ""}${dots}e${exponent}`;
}
