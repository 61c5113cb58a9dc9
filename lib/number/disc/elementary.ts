// Roots, exponential and trigonometric functions of discs.
import { BranchError } from "../../proof/errors.ts";
import * as real from "../ball/arithmetic.ts";
import { type Ball, containsZero as ballContainsZero, sign } from "../ball/data.ts";
import { exp as ballExp, radiusExponent } from "../ball/exp.ts";
import { sinhCosh } from "../ball/hyperbolic.ts";
import { shownPair } from "../ball/shown.ts";
import { sinCos as ballSinCos } from "../ball/trig.ts";
import { absBig, bitLength, DOWN, scaledRadius, shift, size, sizePower, UP } from "../fixed/bits.ts";
import { complexSqrt } from "../fixed/complex-sqrt.ts";
import { mulBall, neg, widenBy } from "./arithmetic.ts";
import {
  along,
  below,
  containsZero,
  type Disc,
  finish,
  finishScaledPlus,
  fromBall,
  fromBalls,
  hypotSize,
  imag,
  imaginary,
  isZero,
  real as realPart,
  zero,
} from "./data.ts";

/**
 * How a disc that meets the cut of a function is treated: "continuous" goes on across it from the midpoint, "upper" and "lower" go on from that side of
 * the cut, whatever side the midpoint is on (the upper side has the cut itself).
 */
export interface CutOptions {
  readonly cut?: "continuous" | "upper" | "lower";
}

/** 0 if the principal branch at the midpoint is the one that the options ask for, else the full turns to add to the argument: 1 or −1. */
export function turnsAcross(x: Disc, { cut }: CutOptions): -1 | 0 | 1 {
  if (cut === undefined || cut === "continuous" || x.re >= 0n) return 0;
  const side = x.im >= 0n ? "upper" : "lower";
  if (side === cut) return 0;
  return cut === "upper" ? 1 : -1;
}

/**
 * Principal √x, real part >= 0.
 *
 * Branch   cut along the negative real axis, which belongs to the upper side: √(−4) = 2i for an exactly real argument. A disc
 *          that meets the cut throws, unless `{ cut: "continuous" }`.
 * Error    |√(m+t) − √m| <= |√m|·ε/(1 + √(1−ε)) with ε = r/|m|; the root of the midpoint within 5 units.
 * Throws   BranchError for a disc that meets the cut, or holds 0 without being 0.
 */
export function sqrt(x: Disc, prec: number, options: CutOptions = {}): Disc {
  if (x.axis === "real") {
    const s = sign(along(x));
    if (s === -1) return imaginary(real.sqrt(real.neg(along(x)), prec));
    if (s !== undefined) return fromBall(real.sqrt(along(x), prec));
  }
  if (isZero(x)) return zero;
  if (containsZero(x) || (options.cut === undefined && meetsCut(x))) throw onCut("sqrt", x);
  const root = sqrtPlane(x, prec);
  return turnsAcross(x, options) === 0 ? root : neg(root);
}

/** Whether a disc off the real axis meets the half-line of numbers <= 0. */
export function meetsCut(x: Disc): boolean {
  if (x.axis === "real") return false;
  if (containsZero(x)) return true;
  if (!ballContainsZero(imag(x))) return false;
  return x.re < 0n;
}

export function onCut(subject: string, x: Disc): BranchError {
  return new BranchError({
    subject,
    given: `${shownPair(realPart(x), imag(x))}, which ${containsZero(x) ? "holds 0" : "meets the negative real axis"}`,
    expected: "one that is away from the cut",
    hint: 'Give a sharper argument, or { cut: "continuous" } to go on across the cut from the midpoint.',
  });
}

function sqrtPlane(x: Disc, prec: number): Disc {
  const length = Math.max(bitLength(x.re, prec), bitLength(x.im, prec));
  let up = 2 * (prec + 3) - length;
  if ((x.exp - up) % 2 !== 0) up += 1;
  const a = up >= 0 ? x.re << shift(up) : x.re >> shift(-up);
  const b = up >= 0 ? x.im << shift(up) : x.im >> shift(-up);
  const { re, im } = complexSqrt(a, b);
  const exp = (x.exp - up) / 2;
  if (x.rad === 0) {
    const exact = up >= 0 && re * re - im * im === a && 2n * re * im === b;
    return finish(re, im, exp, exact ? 0 : 7, prec);
  }
  const m = hypotSize(x.re, x.im, prec);
  const part = scaledRadius(x.rad, -m.e) / below(m.d);
  const s = hypotSize(re, im, prec);
  const err = ((s.d + 7) * x.rad) / below(m.d) / (1 + Math.sqrt(Math.max(0, 1 - part * UP) * DOWN) * DOWN);
  return finishScaledPlus(re, im, exp, err * UP, s.e - m.e, 7, prec);
}

/**
 * e^x.
 * Error    that of the real factors, and |e^m|·(e^δ − 1) <= |e^m|·2δ for a radius δ <= 1; beyond, |e^m|·e^δ around 0.
 */
export function exp(x: Disc, prec: number): Disc {
  if (x.axis === "real") return fromBall(ballExp(along(x), prec));
  const work = prec + 6;
  const angle = ballSinCos({ man: x.im, exp: x.exp, rad: x.axis === "imaginary" ? x.rad : 0 }, work);
  const turn = fromBalls(angle.cos, angle.sin, work);
  if (x.axis === "imaginary") return fromBalls(angle.cos, angle.sin, prec);
  const modulus = ballExp({ man: x.re, exp: x.exp, rad: 0 }, work);
  return moved(mulBall(turn, modulus, work), modulus, x, prec);
}

/** y widened by rate·(e^δ − 1), where the function moves at most at `rate`·e^t at the distance t <= δ from the midpoint of x. */
function moved(y: Disc, rate: Ball, x: Disc, prec: number): Disc {
  if (x.rad === 0) return finish(y.re, y.im, y.exp, y.rad, prec);
  const spread = radiusExponent(x);
  if (spread <= -10) {
    // e^δ − 1 <= (1 + 2^-9)δ, in ulps of y.
    const top = size(rate.man, prec) + rate.rad;
    const err = top * scaledRadius(x.rad, x.exp + rate.exp + sizePower() - y.exp) * (1 + 2 ** -9);
    if (err < 2 ** 1000) return finish(y.re, y.im, y.exp, (y.rad + err) * UP, prec);
  }
  const delta: Ball = { man: BigInt(Math.ceil(x.rad)), exp: x.exp, rad: 0 };
  // e^δ − 1 <= 2δ for δ <= 1; else e^δ itself.
  const factor = spread <= 0 ? real.ldexp(delta, 1) : ballExp(delta, 32);
  return widenBy(y, real.mul(rate, factor, 32), prec, false);
}

export interface SinCos {
  readonly sin: Disc;
  readonly cos: Disc;
}

/**
 * sin x and cos x together, sin(a + bi) = sin a cosh b + i cos a sinh b, cos(a + bi) = cos a cosh b − i sin a sinh b.
 * Error    that of the real factors; both functions move at most at the rate cosh(|b| + δ) <= e^(|b| + δ).
 */
export function sinCos(x: Disc, prec: number): SinCos {
  if (x.axis === "real") {
    const { sin, cos } = ballSinCos(along(x), prec);
    return { sin: fromBall(sin), cos: fromBall(cos) };
  }
  if (x.axis === "imaginary") {
    const { sinh, cosh } = sinhCosh(along(x), prec);
    return { sin: imaginary(sinh), cos: fromBall(cosh) };
  }
  const work = prec + 8;
  const { sin: s, cos: c } = ballSinCos({ man: x.re, exp: x.exp, rad: 0 }, work);
  const { sinh: sh, cosh: ch } = sinhCosh({ man: x.im, exp: x.exp, rad: 0 }, work);
  const rate = ballExp({ man: absBig(x.im), exp: x.exp, rad: 0 }, 32);
  const sin = fromBalls(real.mul(s, ch, work), real.mul(c, sh, work), work);
  const cos = fromBalls(real.mul(c, ch, work), real.neg(real.mul(s, sh, work)), work);
  return { sin: movedOff(sin, rate, x, prec), cos: movedOff(cos, rate, x, prec) };
}

function movedOff(y: Disc, rate: Ball, x: Disc, prec: number): Disc {
  return x.rad === 0 ? y : moved(y, rate, x, prec);
}
