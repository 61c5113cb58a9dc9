// Logarithm, argument and what is made of them, for discs.
import { DomainError, PoleError } from "../../proof/errors.ts";
import * as real from "../ball/arithmetic.ts";
import { atan2, acos as ballAcos, asin as ballAsin, atan as ballAtan, turn } from "../ball/atan.ts";
import { pi } from "../ball/constants.ts";
import { type Ball, magnitude as ballMagnitude, finish as finishBall, fromInt, sign } from "../ball/data.ts";
import { ln as ballLn } from "../ball/exp.ts";
import { asinh as ballAsinh, nthRoot as ballRoot } from "../ball/power.ts";
import { add, div, divBall, ldexp, mul, mulI, neg, round, sqr, sub, widenBy } from "./arithmetic.ts";
import { along, containsZero, type Disc, fromBall, fromBalls, isZero, magnitude, one, zero } from "./data.ts";
import { type CutOptions, exp, meetsCut, onCut, sinCos, sqrt, turnsAcross } from "./elementary.ts";

/** An upper bound of radius/|midpoint|. */
function relativeRadius(x: Disc): Ball {
  const norm: Ball = { man: x.re * x.re + x.im * x.im, exp: 0, rad: 0 };
  return real.div({ man: BigInt(Math.ceil(x.rad * 2 ** 20)), exp: -20, rad: 0 }, real.sqrt(norm, 40), 40);
}

/**
 * The argument in (−π, π].
 *
 * Branch   cut along the negative real axis, which belongs to the upper side: arg(−1) = π for an exactly real number. A disc that meets it
 *          throws, unless `{ cut: "continuous" }`.
 * Error    that of the midpoint's angle, and asin(radius/|midpoint|).
 * Throws   DomainError for exact 0, BranchError for a disc that meets the cut or holds 0.
 */
export function arg(x: Disc, prec: number, options: CutOptions = {}): Ball {
  if (x.axis === "real") return atan2({ man: 0n, exp: 0, rad: 0 }, along(x), prec);
  if (containsZero(x) || (options.cut === undefined && meetsCut(x))) throw onCut("arg", x);
  const principal = atan2({ man: x.im, exp: x.exp, rad: 0 }, { man: x.re, exp: x.exp, rad: 0 }, prec);
  const turns = turnsAcross(x, options);
  const angle = turns === 0 ? principal : real.add(principal, real.mulInt(pi(prec), 2 * turns, prec), prec);
  // On the imaginary axis the angle is one of two, whatever the radius.
  return x.rad === 0 || x.axis === "imaginary" ? angle : real.widenBy(angle, turn(relativeRadius(x)), prec);
}

/**
 * Principal logarithm ln|x| + i·arg x.
 *
 * Branch   as for `arg`.
 * Error    that of the midpoint, and |ln(1 + ε)| <= |ε|/(1 − |ε|).
 * Throws   DomainError for exact 0, BranchError for a disc that meets the cut or holds 0.
 */
export function ln(x: Disc, prec: number, options: CutOptions = {}): Disc {
  if (isZero(x)) throw new DomainError({ subject: "ln", given: "0", expected: "a number other than 0" });
  if (x.axis === "real" && sign(along(x)) === 1) return fromBall(ballLn(along(x), prec));
  if (containsZero(x) || (options.cut === undefined && meetsCut(x))) throw onCut("ln", x);
  const angle = arg({ ...x, rad: x.axis === "real" ? x.rad : 0 }, prec + 4, options);
  const norm: Ball = { man: x.re * x.re + x.im * x.im, exp: 2 * x.exp, rad: 0 };
  const middle = fromBalls(real.ldexp(ballLn(norm, prec + 4), -1), angle, prec + 4);
  if (x.rad === 0) return round(middle, prec);
  const rho = relativeRadius(x);
  if (ballMagnitude(rho) > 0) throw onCut("ln", x);
  const moved = real.div(rho, real.sub(finishBall(1n, 0, 0, 40), rho, 40), 40);
  if (x.axis === "plane") return round(widenBy(middle, moved, prec + 4, false), prec);
  // Along an axis only the real part moves.
  const size = real.widenBy(real.ldexp(ballLn(norm, prec + 4), -1), moved, prec + 4);
  return fromBalls(size, angle, prec);
}

/** x^y = exp(y·ln x), principal; x^0 = 1. Throws as `ln`. */
export function power(x: Disc, y: Disc, prec: number, options: CutOptions = {}): Disc {
  if (isZero(y)) return one;
  const more = Math.max(0, magnitude(y)) + 16;
  return exp(mul(y, ln(x, prec + more, options), prec + more), prec);
}

/** tan x. Throws PoleError if the cosine may vanish. */
export function tan(x: Disc, prec: number): Disc {
  const { sin, cos } = sinCos(x, prec + 6);
  return div(sin, cos, prec);
}

/** The hyperbolic pair: sinh x = −i sin ix, cosh x = cos ix. */
export function sinhCosh(x: Disc, prec: number): { readonly sinh: Disc; readonly cosh: Disc } {
  const { sin, cos } = sinCos(mulI(x), prec);
  return { sinh: neg(mulI(sin)), cosh: cos };
}

/**
 * atan x = (1/2i) ln((1 + ix)/(1 − ix)).
 * Branch   cuts along the imaginary axis beyond ±i. Throws PoleError at ±i, BranchError for a disc that meets a cut.
 */
export function atan(x: Disc, prec: number): Disc {
  if (x.axis === "real") return fromBall(ballAtan(along(x), prec));
  const work = prec + 12 + Math.max(0, -magnitude(x));
  const ix = mulI(x);
  const top = add(one, ix, work);
  const bottom = sub(one, ix, work);
  if (isZero(top) || isZero(bottom)) {
    throw new PoleError({ subject: "atan", given: isZero(top) ? "i" : "−i", expected: "a number other than ±i" });
  }
  return round(neg(mulI(ldexp(ln(div(top, bottom, work), work), -1))), prec);
}

/**
 * asin x = −i ln(ix + √(1 − x²)).
 * Branch   cuts along the real axis beyond ±1, where a real argument lies on its upper side for x < −1 and its lower side for x > 1.
 */
export function asin(x: Disc, prec: number): Disc {
  if (x.axis === "real" && within(along(x))) return fromBall(ballAsin(along(x), prec));
  const work = prec + 16 + 2 * Math.max(0, magnitude(x), -magnitude(x));
  const root = sqrt(sub(one, sqr(x, work), work), work);
  return round(neg(mulI(ln(add(mulI(x), root, work), work))), prec);
}

/** acos x = π/2 − asin x; branch as for `asin`. */
export function acos(x: Disc, prec: number): Disc {
  if (x.axis === "real" && within(along(x))) return fromBall(ballAcos(along(x), prec));
  return sub(fromBall(real.ldexp(pi(prec + 8), -1)), asin(x, prec + 8), prec);
}

/** asinh x = −i asin(ix). Branch: cuts along the imaginary axis beyond ±i, as `asin` has them along the real one. */
export function asinh(x: Disc, prec: number): Disc {
  if (x.axis === "real") return fromBall(ballAsinh(along(x), prec));
  return neg(mulI(asin(mulI(x), prec)));
}

/** atanh x = −i atan(ix). Branch: cuts along the real axis beyond ±1. Throws PoleError at ±1, BranchError for a disc that meets a cut. */
export function atanh(x: Disc, prec: number): Disc {
  if (x.im === 0n && x.rad === 0 && isZero(sub(sqr(x, 128), one, 128))) {
    throw new PoleError({ subject: "atanh", given: x.re > 0n ? "1" : "−1", expected: "a number other than ±1" });
  }
  return neg(mulI(atan(mulI(x), prec)));
}

/**
 * acosh x = ln(x + √(x + 1) √(x − 1)).
 * Branch   cut along the real axis below 1, which belongs to the upper side: acosh(−2) = ln(2 + √3) + πi. Throws BranchError for a disc that meets it.
 */
export function acosh(x: Disc, prec: number): Disc {
  const off = sub(x, one, 64);
  if (isZero(off)) return zero;
  const work = prec + 16 + Math.max(0, magnitude(x)) + Math.max(0, -magnitude(off));
  const root = mul(sqrt(add(x, one, work), work), sqrt(sub(x, one, work), work), work);
  return ln(add(x, root, work), prec);
}

/**
 * The principal n-th root exp((ln x)/n), n >= 1, of argument in (−π/n, π/n]; 0 of exact 0.
 * Branch   as for `ln`. Throws DomainError for another degree, else as `ln`.
 */
export function nthRoot(x: Disc, n: number, prec: number, options: CutOptions = {}): Disc {
  const positive = x.axis === "real" && sign(along(x)) !== -1;
  if (positive || !(Number.isSafeInteger(n) && n > 2)) {
    if (positive || !(n === 1 || n === 2)) return fromBall(ballRoot(along(x), n, prec));
    return n === 1 ? round(x, prec) : sqrt(x, prec, options);
  }
  const log = ln(x, prec + 16, options);
  return exp(divBall(log, fromInt(n), prec + 16), prec);
}

function within(x: Ball): boolean {
  const s = sign(real.sub({ man: 1n, exp: 0, rad: 0 }, real.abs(x), 64));
  return s === 1 || s === 0;
}
