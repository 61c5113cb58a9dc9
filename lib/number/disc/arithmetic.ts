import * as real from "../ball/arithmetic.ts";
import { type Ball, fromInt } from "../ball/data.ts";
import { divisorZero, shownPair } from "../ball/shown.ts";
import { bitLength, DOWN, scaledRadius, shift, UP } from "../fixed/bits.ts";
import { integerPower, type PowerField } from "../fixed/power.ts";
import {
  along,
  below,
  containsZero,
  type Disc,
  finish,
  finishScaled,
  finishScaledPlus,
  fromBall,
  fromBalls,
  hypotSize,
  imag,
  imaginary,
  isZero,
  one,
  real as realPart,
  zero,
} from "./data.ts";

export function neg(x: Disc): Disc {
  return { re: -x.re, im: -x.im, exp: x.exp, rad: x.rad, axis: x.axis };
}

export function conj(x: Disc): Disc {
  return x.axis === "real" ? x : { re: x.re, im: -x.im, exp: x.exp, rad: x.rad, axis: x.axis };
}

/** i·x, exactly. */
export function mulI(x: Disc): Disc {
  if (isZero(x)) return x;
  const axis = x.axis === "real" ? "imaginary" : x.axis === "imaginary" ? "real" : "plane";
  return { re: -x.im, im: x.re, exp: x.exp, rad: x.rad, axis };
}

/** x·2^k, exactly. */
export function ldexp(x: Disc, k: number): Disc {
  return isZero(x) ? x : { re: x.re, im: x.im, exp: x.exp + k, rad: x.rad, axis: x.axis };
}

export function round(x: Disc, prec: number): Disc {
  if (x.axis === "real") return fromBall(real.round(along(x), prec));
  if (x.axis === "imaginary") return imaginary(real.round(along(x), prec));
  return finish(x.re, x.im, x.exp, x.rad, prec);
}

/** x + y: exact sum of centres and radii, then one rounding; far apart exponents as in the real sum. */
export function add(x: Disc, y: Disc, prec: number): Disc {
  if (x.axis === y.axis && x.axis !== "plane") {
    const sum = real.add(along(x), along(y), prec);
    return x.axis === "real" ? fromBall(sum) : imaginary(sum);
  }
  if (x.exp === y.exp) return finish(x.re + y.re, x.im + y.im, x.exp, (x.rad + y.rad) * UP, prec);
  if (isZero(x)) return round(y, prec);
  if (isZero(y)) return round(x, prec);
  return x.exp > y.exp ? addAligned(x, y, prec) : addAligned(y, x, prec);
}

function addAligned(high: Disc, low: Disc, prec: number): Disc {
  const gap = high.exp - low.exp;
  const cut = Math.max(0, gap - (high.rad > 0 ? 30 : prec + 4));
  const up = shift(gap - cut);
  if (cut === 0) {
    const err = high.rad === 0 ? low.rad : (scaledRadius(high.rad, gap) + low.rad) * UP;
    return finish((high.re << up) + low.re, (high.im << up) + low.im, low.exp, err, prec);
  }
  const down = BigInt(cut);
  const err = scaledRadius(high.rad, gap - cut) + scaledRadius(low.rad, -cut) + 1.415;
  return finish((high.re << up) + (low.re >> down), (high.im << up) + (low.im >> down), low.exp + cut, err * UP, prec);
}

export function sub(x: Disc, y: Disc, prec: number): Disc {
  return add(x, neg(y), prec);
}

/** Three products beat four from about this length on (measured). */
const THREE_PRODUCTS = 2500;

/**
 * x·y.
 * Error    |x| r_y + |y| r_x + r_x r_y, then one rounding. Products of axis values stay on their axis.
 */
export function mul(x: Disc, y: Disc, prec: number): Disc {
  if (x.axis !== "plane") return mulAxis(y, along(x), x.axis === "imaginary", prec);
  if (y.axis !== "plane") return mulAxis(x, along(y), y.axis === "imaginary", prec);
  let re: bigint;
  let im: bigint;
  if (prec < THREE_PRODUCTS) {
    re = x.re * y.re - x.im * y.im;
    im = x.re * y.im + x.im * y.re;
  } else {
    const p = x.re * y.re;
    const q = x.im * y.im;
    re = p - q;
    im = (x.re + x.im) * (y.re + y.im) - p - q;
  }
  return productEnd(x, y, re, im, prec);
}

function productEnd(x: Disc, y: Disc, re: bigint, im: bigint, prec: number): Disc {
  const exp = x.exp + y.exp;
  if (x.rad === 0 && y.rad === 0) return finish(re, im, exp, 0, prec);
  const a = hypotSize(x.re, x.im, prec);
  const b = hypotSize(y.re, y.im, prec);
  const unit = Math.max(y.rad > 0 ? a.e : 0, x.rad > 0 ? b.e : 0);
  if (unit === 0 && a.e === 0 && b.e === 0)
    return finishScaled(re, im, exp, (a.d * y.rad + b.d * x.rad + x.rad * y.rad) * UP, 0, prec);
  const err =
    a.d * scaledRadius(y.rad, a.e - unit) + b.d * scaledRadius(x.rad, b.e - unit) + x.rad * scaledRadius(y.rad, -unit);
  return finishScaled(re, im, exp, err * UP, unit, prec);
}

function mulAxis(x: Disc, y: Ball, turned: boolean, prec: number): Disc {
  const z = mulBall(x, y, prec);
  return turned ? mulI(z) : z;
}

/** x·y for a real ball y. */
export function mulBall(x: Disc, y: Ball, prec: number): Disc {
  if (x.axis === "real") return fromBall(real.mul(along(x), y, prec));
  if (x.axis === "imaginary") return imaginary(real.mul(along(x), y, prec));
  if (y.man === 0n && y.rad === 0) return zero;
  return productEnd(x, fromBall(y), x.re * y.man, x.im * y.man, prec);
}

export function mulInt(x: Disc, n: bigint | number, prec: number): Disc {
  return mulBall(x, fromInt(n), prec);
}

/** x² by (a − b)(a + b) and 2ab. */
export function sqr(x: Disc, prec: number): Disc {
  if (x.axis === "real") return fromBall(real.square(along(x), prec));
  if (x.axis === "imaginary") return fromBall(real.neg(real.square(along(x), prec)));
  return productEnd(x, x, (x.re - x.im) * (x.re + x.im), 2n * x.re * x.im, prec);
}

/**
 * x/y.
 * Error    (r_x + |q| r_y)/(|y| − r_y), then truncation and one rounding.
 * Throws   PoleError if y holds 0.
 */
export function div(x: Disc, y: Disc, prec: number): Disc {
  if (containsZero(y)) {
    throw divisorZero(shownPair(realPart(y), imag(y)), isZero(y));
  }
  if (isZero(x)) return zero;
  if (y.axis !== "plane") {
    const q = divBall(x, along(y), prec);
    return y.axis === "imaginary" ? neg(mulI(q)) : q;
  }
  return divPlane(x, y, prec);
}

/** x/y for a real ball y. Throws PoleError if y holds 0. */
export function divBall(x: Disc, y: Ball, prec: number): Disc {
  if (x.axis === "real") return fromBall(real.div(along(x), y, prec));
  if (x.axis === "imaginary") return imaginary(real.div(along(x), y, prec));
  if (x.rad === 0 && y.rad === 0) {
    return fromBalls(
      real.div({ man: x.re, exp: x.exp, rad: 0 }, y, prec),
      real.div({ man: x.im, exp: x.exp, rad: 0 }, y, prec),
      prec,
    );
  }
  return mulBall(x, real.inv(y, prec + 4), prec);
}

function divPlane(x: Disc, y: Disc, prec: number): Disc {
  const norm = y.re * y.re + y.im * y.im;
  const re = x.re * y.re + x.im * y.im;
  const im = x.im * y.re - x.re * y.im;
  const up = Math.max(
    0,
    prec + 3 + bitLength(norm, 2 * prec) - Math.max(bitLength(re, 2 * prec), bitLength(im, 2 * prec)),
  );
  const s = shift(up);
  const qr = (re << s) / norm;
  const qi = (im << s) / norm;
  const exp = x.exp - y.exp - up;
  if (x.rad === 0 && y.rad === 0) {
    const exact = qr * norm === re << s && qi * norm === im << s;
    return finish(qr, qi, exp, exact ? 0 : 1.415, prec);
  }
  const bound = hypotSize(y.re, y.im, prec);
  const low = (below(bound.d) - scaledRadius(y.rad, -bound.e)) * DOWN;
  if (!(low > bound.d * 2 ** -30)) {
    throw divisorZero(shownPair(realPart(y), imag(y)), false, "which nearly holds 0");
  }
  const q = hypotSize(qr, qi, prec);
  // In units of 2^unit: r_x·2^up/|y| and (|q| + 2) r_y/|y|.
  const unit = (y.rad === 0 ? up : x.rad === 0 ? q.e : Math.max(up, q.e)) - bound.e;
  const err = (scaledRadius(x.rad, up - bound.e - unit) + (q.d + 2) * scaledRadius(y.rad, q.e - bound.e - unit)) / low;
  return finishScaledPlus(qr, qi, exp, err, unit, 1.415, prec);
}

/** 1/x. Throws PoleError if x holds 0. */
export function inv(x: Disc, prec: number): Disc {
  return div(one, x, prec);
}

const FIELD: PowerField<Disc> = { one, square: sqr, mul, inv, round };

/** x^n for an integer n; x^0 is exactly 1. Throws PoleError for n < 0 if x holds 0. */
export function pow(x: Disc, n: number, prec: number): Disc {
  return integerPower(x, n, prec, FIELD);
}

/** x with its radius raised by an upper bound of |r|, in all directions (along the axis for an axis value if `axial`). */
export function widenBy(x: Disc, r: Ball, prec: number, axial = true): Disc {
  if (axial && x.axis === "real") return fromBall(real.widenBy(along(x), r, prec));
  if (axial && x.axis === "imaginary") return imaginary(real.widenBy(along(x), r, prec));
  const ball = real.widenBy({ man: 0n, exp: 0, rad: 0 }, r, 32);
  if (ball.rad === 0) return x;
  const blot: Disc = { re: 0n, im: 0n, exp: ball.exp, rad: ball.rad, axis: "plane" };
  return add({ ...x, axis: "plane" }, blot, prec);
}
