// Complex enclosures as data: construction, outward rounding in one place, and what can be read off.
import { add, spread, sqrt } from "../ball/arithmetic.ts";
import * as compareBall from "../ball/compare.ts";
import {
  type Ball,
  toDouble as ballDouble,
  fromRational as ballRational,
  finish as finishBall,
  MAX_EXPONENT,
  MAX_RAD,
  overflow,
} from "../ball/data.ts";
import {
  absBig,
  bitLength,
  DOWN,
  exponent,
  pow2,
  scaledRadius,
  shift,
  size,
  sizePower,
  trailingZeros,
  UP,
} from "../fixed/bits.ts";
import { Rational } from "../rational.ts";

export type Axis = "real" | "imaginary" | "plane";

/**
 * The set {(re + i·im + t)·2^exp : |t| <= rad}, with t complex on the plane; with axis "real" (im = 0n) t is real, with axis
 * "imaginary" (re = 0n) t is imaginary. `rad` is 0 or at least 1. Exact 0 is on the axis "real".
 */
export interface Disc {
  readonly re: bigint;
  readonly im: bigint;
  readonly exp: number;
  readonly rad: number;
  readonly axis: Axis;
}

export const zero: Disc = { re: 0n, im: 0n, exp: 0, rad: 0, axis: "real" };
export const one: Disc = { re: 1n, im: 0n, exp: 0, rad: 0, axis: "real" };
export const i: Disc = { re: 0n, im: 1n, exp: 0, rad: 0, axis: "imaginary" };

/** A real ball as a disc on the real axis. */
export function fromBall(x: Ball): Disc {
  return { re: x.man, im: 0n, exp: x.exp, rad: x.rad, axis: "real" };
}

/** i·x for a real ball x. */
export function imaginary(x: Ball): Disc {
  if (x.man === 0n && x.rad === 0) return zero;
  return { re: 0n, im: x.man, exp: x.exp, rad: x.rad, axis: "imaginary" };
}

/** The one number of a disc on an axis, as a real ball. */
export function along(d: Disc): Ball {
  return { man: d.axis === "imaginary" ? d.im : d.re, exp: d.exp, rad: d.rad };
}

/** The disc of centre (re + i·im)·2^exp and radius err ulps on the plane, rounded outward to about prec bits of the larger part. */
export function finish(re: bigint, im: bigint, exp: number, err: number, prec: number): Disc {
  if (err === 0) {
    if (im === 0n) return fromBall(finishBall(re, exp, 0, prec));
    if (re === 0n) return imaginary(finishBall(im, exp, 0, prec));
  }
  if (!(exp < MAX_EXPONENT && exp > -MAX_EXPONENT && err < Infinity)) {
    throw overflow(exp);
  }
  let drop = Math.max(bitLength(re, prec), bitLength(im, prec)) - prec;
  if (err > MAX_RAD) drop = Math.max(drop, exponent(err) - 30);
  if (err === 0 && drop > 0) {
    const spare = Math.min(trailingZeros(re), trailingZeros(im));
    if (spare >= drop)
      return { re: re >> shift(spare), im: im >> shift(spare), exp: exp + spare, rad: 0, axis: "plane" };
  }
  if (drop <= (err === 0 ? 0 : 4) && err <= MAX_RAD) {
    return { re, im, exp, rad: err === 0 ? 0 : Math.max(err, 1), axis: "plane" };
  }
  // Two cuts, each under one unit: 1.415 > √2.
  const s = shift(drop);
  return { re: re >> s, im: im >> s, exp: exp + drop, rad: (err * pow2(-drop) + 1.415) * UP, axis: "plane" };
}

/** `finish` for an error of err·2^unit ulps. */
export function finishScaled(re: bigint, im: bigint, exp: number, err: number, unit: number, prec: number): Disc {
  // With the error near 1 its unit tells its size.
  const lift = exponent(err);
  err *= pow2(-lift);
  unit += lift;
  const scaledErr = err * pow2(unit) * UP;
  if (unit < 900 && scaledErr < 2 ** 1000) return finish(re, im, exp, scaledErr, prec);
  const drop = unit - 40;
  const s = shift(drop);
  return finish(re >> s, im >> s, exp + drop, (err * pow2(unit - drop) + 1.415) * UP, prec);
}

/** `finish` for an error of err·2^unit + few ulps. Bounds that were cut at 2^-1000 do not matter: err >= 2^-500. */
export function finishScaledPlus(
  re: bigint,
  im: bigint,
  exp: number,
  err: number,
  unit: number,
  few: number,
  prec: number,
): Disc {
  if (unit <= 0) return finish(re, im, exp, (err * pow2(unit) + few) * UP, prec);
  return finishScaled(re, im, exp, (err + few * pow2(-unit)) * UP, unit, prec);
}

/** An upper bound of |re + i·im| as a double times 2^sizePower. */
export function hypotSize(re: bigint, im: bigint, hint: number): { readonly d: number; readonly e: number } {
  const a = size(re, hint);
  const ea = sizePower();
  const b = size(im, hint);
  const eb = sizePower();
  const e = Math.max(ea, eb);
  const p = a * pow2(ea - e);
  const q = b * pow2(eb - e);
  return { d: Math.sqrt((p * p + q * q) * UP) * UP, e };
}

/** re + i·im from two balls; an exactly zero part puts the disc on an axis. The radius is that of the corner. */
export function fromBalls(re: Ball, im: Ball, prec?: number): Disc {
  if (im.man === 0n && im.rad === 0) return fromBall(re);
  if (re.man === 0n && re.rad === 0) return imaginary(im);
  const [high, low] = re.exp >= im.exp ? [re, im] : [im, re];
  const wanted = prec ?? Math.max(bitLength(re.man), bitLength(im.man)) + 8;
  const gap = high.exp - low.exp;
  const cut = Math.max(0, gap - (high.rad > 0 ? 30 : Math.max(wanted, 64) + 4));
  const up = high.man << shift(gap - cut);
  const down = low.man >> shift(cut);
  const r1 = scaledRadius(high.rad, gap - cut);
  const r2 = cut === 0 ? low.rad : (scaledRadius(low.rad, -cut) + 1) * UP;
  const err = r1 === 0 ? r2 : r2 === 0 ? r1 : Math.sqrt((r1 * r1 + r2 * r2) * UP) * UP;
  const exp = low.exp + cut;
  const keep = prec ?? bitLength(up > 0n ? up : -up) + Math.max(bitLength(down), wanted);
  return high === re ? finish(up, down, exp, err, keep) : finish(down, up, exp, err, keep);
}

/** A rational number, or re + i·im of two, to prec bits. */
export function fromRational(re: Rational, prec: number, im: Rational = Rational.zero): Disc {
  return fromBalls(ballRational(re, prec), ballRational(im, prec), prec + 4);
}

/** The real part: the shadow of the disc, exact 0 on the imaginary axis. */
export function real(d: Disc): Ball {
  if (d.axis === "imaginary") return { man: 0n, exp: 0, rad: 0 };
  return { man: d.re, exp: d.exp, rad: d.rad };
}

/** The imaginary part: the shadow of the disc, exact 0 on the real axis. */
export function imag(d: Disc): Ball {
  if (d.axis === "real") return { man: 0n, exp: 0, rad: 0 };
  return { man: d.im, exp: d.exp, rad: d.rad };
}

export function isZero(d: Disc): boolean {
  return d.rad === 0 && d.re === 0n && d.im === 0n;
}

export function isExact(d: Disc): boolean {
  return d.rad === 0;
}

/** |d|² of the centre against rad² <= 2^62, exactly. */
export function containsZero(d: Disc): boolean {
  if (d.rad === 0) return d.re === 0n && d.im === 0n;
  const a = Number(d.re);
  const b = Number(d.im);
  if (!(Math.abs(a) < 2 ** 40 && Math.abs(b) < 2 ** 40)) return false;
  const r = BigInt(d.rad * 2 ** 52);
  return (d.re * d.re + d.im * d.im) << 104n <= r * r;
}

/** |d| to prec bits. */
export function abs(d: Disc, prec: number): Ball {
  if (d.axis !== "plane") {
    const x = along(d);
    return x.man < 0n ? nonNegative({ man: -x.man, exp: x.exp, rad: x.rad }) : nonNegative(x);
  }
  const root = sqrt({ man: d.re * d.re + d.im * d.im, exp: 2 * d.exp, rad: 0 }, prec);
  return d.rad === 0 ? root : nonNegative(add(root, spread(BigInt(Math.ceil(d.rad)), d.exp), prec));
}

// A ball of absolute values that reaches below 0 is cut there.
function nonNegative(x: Ball): Ball {
  const r = BigInt(Math.ceil(x.rad));
  if (x.man >= r) return x;
  return { man: x.man + r, exp: x.exp - 1, rad: Number(x.man + r) };
}

/** The smallest e (up to one) with |z| < 2^e for every z in the disc; -Infinity for exact 0. */
export function magnitude(d: Disc): number {
  if (isZero(d)) return -Infinity;
  const r = BigInt(Math.ceil(d.rad));
  if (d.axis !== "plane") return d.exp + bitLength(absBig(d.re + d.im) + r);
  const { d: h, e } = hypotSize(absBig(d.re) + r, absBig(d.im) + r, 0);
  return d.exp + e + exponent(h);
}

/** Accuracy in bits relative to |z|: Infinity if exact. */
export function bits(d: Disc): number {
  if (d.rad === 0) return Infinity;
  return Math.max(bitLength(d.re), bitLength(d.im)) - 1 - exponent(d.rad);
}

/** Whether some number lies in both, decided exactly for the discs (an axis counts as a segment only against its own kind). */
export function overlaps(x: Disc, y: Disc): boolean {
  if (x.axis === y.axis && x.axis !== "plane") return compareBall.overlaps(along(x), along(y));
  if (!compareBall.overlaps(real(x), real(y)) || !compareBall.overlaps(imag(x), imag(y))) return false;
  if (Math.abs(x.exp - y.exp) > 1_000_000) return true;
  const exp = Math.min(x.exp, y.exp);
  const a = shift(x.exp - exp);
  const b = shift(y.exp - exp);
  const re = (x.re << a) - (y.re << b);
  const im = (x.im << a) - (y.im << b);
  const r = (BigInt(x.rad * 2 ** 52) << a) + (BigInt(y.rad * 2 ** 52) << b);
  return (re * re + im * im) << 104n <= r * r;
}

/** Whether every number of y lies in x. */
export function contains(x: Disc, y: Disc | Ball | Rational): boolean {
  const inner = y instanceof Rational ? undefined : "axis" in y ? y : fromBall(y);
  if (!inner) {
    const q = y as Rational;
    return containsRational(x, q);
  }
  if (x.axis !== "plane") {
    const on = x.axis === "real" ? inner.im === 0n : inner.re === 0n;
    if (!on || (inner.axis !== x.axis && inner.rad > 0)) return false;
    const man = x.axis === "real" ? inner.re : inner.im;
    return compareBall.contains(along(x), { man, exp: inner.exp, rad: inner.rad });
  }
  if (Math.abs(x.exp - inner.exp) > 1_000_000) return isZero(inner) && containsZero(x);
  const exp = Math.min(x.exp, inner.exp);
  const a = shift(x.exp - exp);
  const b = shift(inner.exp - exp);
  const re = (x.re << a) - (inner.re << b);
  const im = (x.im << a) - (inner.im << b);
  const slack = (BigInt(x.rad * 2 ** 52) << a) - (BigInt(inner.rad * 2 ** 52) << b);
  return slack >= 0n && (re * re + im * im) << 104n <= slack * slack;
}

function containsRational(x: Disc, q: Rational): boolean {
  if (x.axis !== "plane") return x.axis === "real" || q.num === 0n ? compareBall.contains(along(x), q) : false;
  // With exponents a million apart a doubt is a no.
  if (Math.abs(x.exp) > 1_000_000) return q.num === 0n && containsZero(x);
  // |z − q|² <= r² times den²·4^k, with everything an integer.
  const down = x.exp < 0 ? shift(-x.exp) : 0n;
  const up = x.exp > 0 ? shift(x.exp) : 0n;
  const re = ((x.re * q.den) << up) - (q.num << down);
  const im = (x.im * q.den) << up;
  const r = (BigInt(x.rad * 2 ** 52) * q.den) << up;
  return (re * re + im * im) << 104n <= r * r;
}

/** The centre as doubles, for pictures and first guesses. */
export function toDouble(d: Disc): [number, number] {
  return [ballDouble(real(d)), ballDouble(imag(d))];
}

/** A lower bound from `hypotSize`. */
export function below(bound: number): number {
  return bound * DOWN * DOWN;
}
