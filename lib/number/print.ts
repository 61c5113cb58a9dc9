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
  if (Math.abs(x.exp) > FAR) return far(x, digits);
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

// |x| = 10^E·y with y = exp(ln|x| − E·ln 10).
function far(x: Ball, digits: number): DecimalParts | undefined {
  const prec = Math.ceil(digits * 3.33) + 64;
  const log = ball.ln(ball.abs(x), prec + 48);
  const ten = ball.ln(ball.fromInt(10), prec + 96);
  const e = Math.floor(ball.toDouble(ball.div(log, ten, 64)));
  const rest = ball.sub(log, ball.mulInt(ten, e, prec + 48), prec + 8);
  const y = ball.exp(rest, prec);
  const found = significant(x.man < 0n ? ball.neg(y) : y, digits);
  return found && { ...found, exponent: found.exponent + e, ellipsis: true };
}

/** 0 ± r for an enclosure that holds 0: nothing is known but a bound of its size. */
export function aroundZero(x: Ball): DecimalParts {
  return withRadius({ man: 0n, exp: x.exp, rad: Number(absBig(x.man)) + x.rad + 1 });
}

/** The parts of x with the last digit at 10^-places; undefined if x is not known well enough. */
export function atPlaces(x: Ball, places: number): DecimalParts | undefined {
  if (ball.isZero(x)) return { sign: "", digits: "0", exponent: 0, ellipsis: false };
  if (Math.abs(x.exp) > FAR) return undefined;
  const found = placed(x, places);
  if (!found) return undefined;
  const text = absBig(found.n).toString();
  if (found.n === 0n)
    return { sign: "", digits: "0".repeat(Math.max(1, places + 1)), exponent: 0, ellipsis: !found.whole };
  return parts(found, text, text.length - 1 - places);
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

/** Two to four digits of radius, rounded up over what the rounding of the middle leaves, and the middle to the same place. Not for exact balls. */
export function decimalBounds(x: Ball, digits = 2): DecimalBounds {
  const radius = dyadic(BigInt(Math.ceil(x.rad * 2 ** 20)), x.exp - 20);
  const place = leading({ man: BigInt(Math.ceil(x.rad * 2 ** 20)), exp: x.exp - 20, rad: 0 }) + 1 - digits;
  const unit = place >= 0 ? Rational.of(10n ** BigInt(place)) : Rational.of(1n, 10n ** BigInt(-place));
  const middle = dyadic(x.man, x.exp).div(unit);
  const n = middle.round();
  const total = radius.div(unit).plus(middle.minus(n).abs());
  return { middle: n, radius: -total.neg().floor(), place };
}

function dyadic(man: bigint, exp: number): Rational {
  return exp >= 0 ? Rational.of(man << BigInt(exp)) : Rational.of(man, 1n << BigInt(-exp));
}

/** Midpoint and radius in decimals, x within them; see `decimalBounds`. */
export function withRadius(x: Ball): DecimalParts {
  if (x.rad === 0) return exactParts(x);
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
