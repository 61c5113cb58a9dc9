// Complex numbers in fixed point with a counted error, the inside of the theta series.
//
// A number is (re + i im) 2^−places with |true − stored| <= err ulps, err a double. The product of x and y, each part floored, has error at
// most |x| e_y + |y| e_x + e_x e_y 2^−places + √2. Doubles here are sums and products of nonnegative numbers, each rounded by at most 2^−53
// relative; `UP` covers all of one update.

import { type Disc, finish } from "../number/disc/data.ts";
import { pow2, shift as shiftBy } from "../number/fixed/bits.ts";
import { PrecisionError } from "../proof/errors.ts";

/** Covers the roundings of one update of an error counter. */
export const UP = 1 + 2 ** -40;
/** √2, rounded up: two parts, each floored. */
export const ROOT2 = 1.4143;

export interface Fixed {
  readonly re: bigint;
  readonly im: bigint;
  readonly err: number;
}

/** d with the given binary places; exact where that is possible. */
export function toFixed(d: Disc, places: number): Fixed {
  const shift = d.exp + places;
  if (shift >= 0) {
    const by = shiftBy(shift);
    return { re: d.re << by, im: d.im << by, err: d.rad === 0 ? 0 : d.rad * pow2(shift) };
  }
  const by = shiftBy(-shift);
  return { re: d.re >> by, im: d.im >> by, err: (d.rad * pow2(shift) + ROOT2) * UP };
}

/** Upper bound of |x| as a double. */
export function absUpper(x: Fixed, places: number): number {
  const scale = pow2(-Math.min(places, 900));
  const down = shiftBy(Math.max(places - 900, 0));
  const part = (n: bigint) => (Number((n < 0n ? -n : n) >> down) + 1) * scale * UP;
  const [a, b] = [part(x.re), part(x.im)];
  return (Math.sqrt(a * a + b * b) + x.err * pow2(-places)) * UP;
}

/** A sum as a disc; a wide one loses the bits under its radius. */
export function sumDisc(re: bigint, im: bigint, err: number, places: number): Disc {
  if (!(err < 2 ** 900)) throw tooCoarse("an argument or a period ratio known too coarsely", "narrower enclosures");
  return finish(re, im, -places, Math.max(1, err), places + 64);
}

export function tooCoarse(given: string, expected: string): PrecisionError {
  return new PrecisionError({
    subject: "theta series",
    given,
    expected,
    hint: "Give the argument or the periods with more digits.",
  });
}

/**
 * x·y with the places of x, where y has `places` of its own.
 * @param bx at least |x|·2^(places of x − places of y)
 * @param by at least |y|
 */
export function product(x: Fixed, y: Fixed, bx: number, by: number, places: number): Fixed {
  const s = shiftBy(places);
  const err = (bx * y.err + by * x.err + x.err * y.err * pow2(-places) + ROOT2) * UP;
  if (x.im === 0n) return { re: (x.re * y.re) >> s, im: y.im === 0n ? 0n : (x.re * y.im) >> s, err };
  if (y.im === 0n) return { re: (x.re * y.re) >> s, im: (x.im * y.re) >> s, err };
  const [p, q] = [x.re * y.re, x.im * y.im];
  const cross = places < THREE_PRODUCTS ? x.re * y.im + x.im * y.re : (x.re + x.im) * (y.re + y.im) - p - q;
  return { re: (p - q) >> s, im: cross >> s, err };
}

/** Three products beat four from about this length on (measured). */
const THREE_PRODUCTS = 2500;

/** x², b at least |x|. */
export function square(x: Fixed, b: number, places: number): Fixed {
  const err = ((2 * b + x.err * pow2(-places)) * x.err + ROOT2) * UP;
  const s = shiftBy(places);
  if (x.im === 0n) return { re: (x.re * x.re) >> s, im: 0n, err };
  return { re: ((x.re - x.im) * (x.re + x.im)) >> s, im: (x.re * x.im) >> shiftBy(places - 1), err };
}

/** A number with a bound of its size, the stored one's and the true one's. */
export interface Sized extends Fixed {
  readonly size: number;
}

export function sized(x: Fixed, places: number): Sized {
  return { re: x.re, im: x.im, err: x.err, size: absUpper(x, places) };
}

export function times(x: Sized, y: Sized, places: number): Sized {
  const { re, im, err } = product(x, y, x.size, y.size, places);
  return { re, im, err, size: x.size * y.size * UP };
}

export function squared(x: Sized, places: number): Sized {
  const { re, im, err } = square(x, x.size, places);
  return { re, im, err, size: x.size * x.size * UP };
}

export function plus(x: Sized, y: Sized): Sized {
  return { re: x.re + y.re, im: x.im + y.im, err: (x.err + y.err) * UP, size: (x.size + y.size) * UP };
}

export function minus(x: Sized, y: Sized): Sized {
  return { re: x.re - y.re, im: x.im - y.im, err: (x.err + y.err) * UP, size: (x.size + y.size) * UP };
}

/** 2^k·x, k >= 0. */
export function doubled(x: Sized, k: number): Sized {
  const by = shiftBy(k);
  return { re: x.re << by, im: x.im << by, err: x.err * 2 ** k, size: x.size * 2 ** k };
}

/**
 * 1/x = conj(x)/|x|² for 2^−20 <= |x|; nothing for smaller ones or ones that are not sharp.
 *
 * Error    with l a lower bound of |x| and of the stored number: err/l² from that of x, 1/l³ from the cut of |x|² to the places, at most √2 from
 *          the quotients.
 */
export function inverse(x: Sized, places: number): Sized | undefined {
  const s = shiftBy(places);
  const norm = (x.re * x.re + x.im * x.im) >> s;
  const n = Number(norm >> shiftBy(places - 60)) * 2 ** -60;
  const low = Math.sqrt(Math.max(0, n - 2 ** -59)) * (1 - 2 ** -40) - x.err * pow2(-places);
  if (!(low > 2 ** -20)) return undefined;
  const re = (x.re << s) / norm;
  const im = x.im === 0n ? 0n : -((x.im << s) / norm);
  const err = ((x.err + 1 / low) / (low * low) + ROOT2) * UP;
  return { re, im, err, size: (1 / low + err * pow2(-places)) * UP };
}
