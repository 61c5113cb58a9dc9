// Real enclosures as data: construction, the one place where results are rounded outward, and what can be read off.
import { DomainError } from "../../proof/errors.ts";
import {
  absBig,
  bitLength,
  DOWN,
  exponent,
  leadingPart,
  pow2,
  shift,
  size,
  sizePower,
  trailingZeros,
  UP,
} from "../fixed/bits.ts";
import type { Rational } from "../rational.ts";

/** The set {(man + t)·2^exp : |t| <= rad}. `rad` is 0 (exact) or at least 1, and at most 2^30 (up to a rounding). */
export interface Ball {
  readonly man: bigint;
  readonly exp: number;
  readonly rad: number;
  /** What the operation that made the ball knew of its size: |man| <= lead·2^size, with few bits to spare. Asking a BigInt costs as much as a sum. */
  readonly lead?: number;
  readonly size?: number;
}

/** A radius above this drops mantissa bits. */
export const MAX_RAD = 2 ** 30;
export const MAX_EXPONENT = 2 ** 45;

export const zero: Ball = { man: 0n, exp: 0, rad: 0 };
export const one: Ball = { man: 1n, exp: 0, rad: 0 };

/**
 * The ball of centre man·2^exp and radius err ulps, rounded outward to about `prec` bits: up to 4 more are left, a radius
 * above 2^30 ulps cuts the mantissa. An exact value that fits stays exact. All results pass here.
 * Throws DomainError if the exponent leaves ±2^45.
 *
 * @param hint about the number of bits of man.
 */
export function finish(man: bigint, exp: number, err: number, prec: number, hint = prec): Ball {
  if (!(exp < MAX_EXPONENT && exp > -MAX_EXPONENT)) throw overflow(exp);
  const size = bitLength(man, hint);
  const lead = leadingPart();
  let drop = size - prec;
  if (err === 0) return exactly(man, exp, drop);
  if (!(err <= MAX_RAD)) {
    if (!(err < Infinity)) throw overflow(exp);
    const wide = exponent(err) - 30;
    if (wide > drop) drop = wide;
  }
  if (drop <= 4 && err <= MAX_RAD) return { man, exp, rad: Math.max(err, 1), lead, size };
  return cut(man, exp, drop, (err * pow2(-drop) + 1) * UP, lead, size);
}

/** man >> drop with a radius that counts it, and what is known of its size: floor moves a negative number out by less than a unit. */
export function cut(man: bigint, exp: number, drop: number, rad: number, lead: number, size: number): Ball {
  const kept = size - drop;
  return { man: man >> shift(drop), exp: exp + drop, rad, lead: lead + pow2(-kept), size: kept };
}

function exactly(man: bigint, exp: number, drop: number): Ball {
  if (man === 0n) return zero;
  if (drop <= 0) return { man, exp, rad: 0 };
  const spare = trailingZeros(man);
  if (spare >= drop) return { man: man >> shift(spare), exp: exp + spare, rad: 0 };
  return { man: man >> shift(drop), exp: exp + drop, rad: 1 };
}

export function overflow(exp: number): DomainError {
  return new DomainError({
    subject: "number",
    given: `a result with the binary exponent ${exp}`,
    expected: "an exponent within ±2^45",
  });
}

/** An integer, exactly, whatever its length. Throws DomainError for a number that is no safe integer. */
export function fromInt(n: bigint | number): Ball {
  if (typeof n === "number") {
    if (!Number.isSafeInteger(n)) {
      throw new DomainError({ subject: "fromInt", given: `${n}`, expected: "a bigint or a safe integer" });
    }
    return { man: BigInt(n), exp: 0, rad: 0 };
  }
  return { man: n, exp: 0, rad: 0 };
}

/** A finite double, exactly. Throws DomainError for NaN and the infinities. */
export function fromDouble(x: number): Ball {
  if (!Number.isFinite(x)) {
    throw new DomainError({ subject: "fromDouble", given: `${x}`, expected: "a finite number" });
  }
  if (Number.isSafeInteger(x)) return { man: BigInt(x), exp: 0, rad: 0 };
  let exp = Math.max(exponent(x) - 53, -1074);
  // Two steps, since 2^-exp may itself be out of range.
  const whole = exp < -1000 ? x * 2 ** 1000 * pow2(-exp - 1000) : x * pow2(-exp);
  const man = BigInt(whole);
  const spare = trailingZeros(man);
  exp += spare;
  return { man: man >> shift(spare), exp, rad: 0 };
}

/** num/den to prec bits; exact if the denominator is a power of two and the numerator fits. */
export function fromRational(q: Rational, prec: number): Ball {
  const { num, den } = q;
  if (den === 1n) return finish(num, 0, 0, prec);
  const power = trailingZeros(den);
  if (den >> shift(power) === 1n) return finish(num, -power, 0, prec);
  const up = Math.max(0, prec + 1 + bitLength(den) - bitLength(num, prec));
  return finish((num << shift(up)) / den, -up, 1, prec);
}

/** The smallest e with |x| < 2^e for every x in the ball; -Infinity for exact 0. */
export function magnitude(x: Ball): number {
  if (x.rad === 0) return x.man === 0n ? -Infinity : x.exp + bitLength(x.man);
  return x.exp + bitLength(absBig(x.man) + radiusInt(x));
}

/** Largest e with |x| >= 2^e for every x in the ball; -Infinity if the ball holds 0. */
export function lowMagnitude(x: Ball): number {
  const low = absBig(x.man) - radiusInt(x);
  return low <= 0n ? -Infinity : x.exp + bitLength(low) - 1;
}

/** The radius in ulps, rounded up to an integer. */
export function radiusInt(x: Ball): bigint {
  return BigInt(Math.ceil(x.rad));
}

/** Greatest lower and least upper bound in units of 2^exp, rounded outward to integers. */
export function ends(x: Ball): { low: bigint; high: bigint } {
  const r = radiusInt(x);
  return { low: x.man - r, high: x.man + r };
}

/** The lower end as an exact ball, rounded outward by less than an ulp. */
export function lower(x: Ball): Ball {
  return { man: x.man - radiusInt(x), exp: x.exp, rad: 0 };
}

/** The lower end of a ball of positive numbers, positive too. */
export function lowerPositive(x: Ball): Ball {
  const low = lower(x);
  if (low.man > 0n) return low;
  // 0 < man − rad < 1: the difference of a double's integer part and a double, so at least 2^-52.
  return { man: 1n, exp: x.exp - 53, rad: 0 };
}

/** The upper end as an exact ball, rounded outward by less than an ulp. */
export function upper(x: Ball): Ball {
  return { man: x.man + radiusInt(x), exp: x.exp, rad: 0 };
}

/** The centre as an exact ball. */
export function midpoint(x: Ball): Ball {
  return { man: x.man, exp: x.exp, rad: 0 };
}

/** The radius as an exact ball, rounded up by less than an ulp. */
export function radius(x: Ball): Ball {
  return { man: radiusInt(x), exp: x.exp, rad: 0 };
}

/** The smallest ball that the two ends span, from integers low <= high in units of 2^exp. */
export function span(low: bigint, high: bigint, exp: number, prec: number): Ball {
  // Doubled units, so that the midpoint is an integer.
  const width = high - low;
  const err = size(width, prec);
  const power = sizePower();
  if (power === 0) return finish(low + high, exp - 1, err, prec);
  return finish((low + high) >> shift(power), exp - 1 + power, (err + 1) * UP, prec);
}

/** -1, 0, 1, or undefined if the ball holds numbers of different sign. */
export function sign(x: Ball): -1 | 0 | 1 | undefined {
  if (x.rad === 0) return x.man === 0n ? 0 : x.man > 0n ? 1 : -1;
  if (!containsZero(x)) return x.man > 0n ? 1 : -1;
  return undefined;
}

const FAR_FROM_ZERO = 2n ** 41n;

export function containsZero(x: Ball): boolean {
  if (x.rad < 2 ** 40 && (x.man > FAR_FROM_ZERO || x.man < -FAR_FROM_ZERO)) return false;
  return absBig(x.man) <= radiusInt(x) && compareRadius(x);
}

// The radius is a double, so |man| <= rad is decided exactly: below 2^53 both are doubles without rounding.
function compareRadius(x: Ball): boolean {
  return Math.abs(Number(x.man)) <= x.rad;
}

/** Exactly 0 (not merely an enclosure of it). */
export function isZero(x: Ball): boolean {
  return x.man === 0n && x.rad === 0;
}

/** Accuracy in bits: -log2 of radius over size of the midpoint, rounded down; Infinity if exact, negative if hardly known. */
export function bits(x: Ball): number {
  if (x.rad === 0) return Infinity;
  return bitLength(x.man) - 1 - exponent(x.rad);
}

/** The nearest double of the midpoint, for pictures and first guesses; may overflow to ±Infinity or 0. */
export function toDouble(x: Ball): number {
  const length = bitLength(x.man);
  const low = Math.max(0, length - 64);
  const top = Number(x.man >> shift(low));
  const e = x.exp + low;
  if (e > 1100) return top === 0 ? 0 : top > 0 ? Infinity : -Infinity;
  if (e < -1200) return 0;
  // In two steps: a power below 2^-1074 alone would vanish.
  const half = Math.trunc(e / 2);
  return top * 2 ** half * 2 ** (e - half);
}

/** A positive lower bound of |man| in the sense of `size`, times 2^sizePower; 0 for 0. */
export function sizeBelow(n: bigint, hint: number): number {
  return size(n, hint) * DOWN;
}
