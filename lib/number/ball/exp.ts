// Exponential and logarithm of balls.
import { BranchError, DomainError } from "../../proof/errors.ts";
import { bitLength, exponent, scaled, scaledRadius, shift, UP } from "../fixed/bits.ts";
import { ln2Fixed } from "../fixed/constants.ts";
import { expFixed } from "../fixed/exp.ts";
import { lnFixed } from "../fixed/log.ts";
import { add, div, hull, ldexp, mul, round, sub, widenBy } from "./arithmetic.ts";
import { type Ball, finish, isZero, lower, lowerPositive, magnitude, one, sign, upper, zero } from "./data.ts";
import { shown } from "./shown.ts";

/** Exponent of the radius: it is under 2^this; -Infinity if exact. */
export function radiusExponent(x: { readonly exp: number; readonly rad: number }): number {
  return x.rad === 0 ? -Infinity : x.exp + exponent(x.rad);
}

/** Bits after the binary point that are worth computing for a result that moves with x at a rate of about 1. */
export function usefulBits(x: Ball, prec: number): number {
  return Math.max(8, Math.min(prec, 8 - radiusExponent(x)));
}

/**
 * e^x.
 * Error    the kernel's unit, the reduction's, and y·(e^δ − 1) <= y·δ(1 + δ) for a radius δ <= 1/2; a wider ball takes its ends.
 * Throws   DomainError if the result's exponent leaves ±2^45.
 */
export function exp(x: Ball, prec: number): Ball {
  if (isZero(x)) return one;
  const spread = radiusExponent(x);
  if (spread > -2) return hull(exp(lower(x), 32), exp(upper(x), 32), Math.min(prec, 32));
  const size = magnitude(x);
  if (size > 45) {
    throw new DomainError({
      subject: "exp",
      given: `an argument of size about 2^${size}`,
      expected: "a size under 2^45, so that the result has an exponent",
    });
  }
  const work = usefulBits(x, prec) + 6;
  const more = Math.max(0, size) + 4;
  // x and n·ln 2 with `more` bits to spare: r errs by under 2 units of 2^-work in all.
  const fixed = scaled(x.man, x.exp + work + more);
  const logTwo = ln2Fixed(work + more);
  const n = fixed / logTwo - (fixed < 0n ? 1n : 0n);
  const r = (fixed - n * logTwo) >> shift(more);
  const y = expFixed(r < 0n ? 0n : r, work);
  // exp(r) < 2, so the 3 units of r (cut, rounding, clamp at 0) weigh at most 6; and the ball's own radius.
  const err = 8 + 2 * scaledRadius(x.rad, x.exp + work) * 1.5;
  return finish(y, Number(n) - work, err * UP, prec);
}

/**
 * ln x for x > 0. Exactly 0 for exact 1.
 * Error    kernel and reduction under 4 units; ln(1 + ε) <= ε/(1 − ε) for the relative radius ε, and a ball with ε > 1/4 takes its ends.
 * Throws   DomainError for a ball of numbers <= 0, BranchError for one that holds 0 and positive numbers.
 */
export function ln(x: Ball, prec: number): Ball {
  const s = sign(x);
  if (s === 1) return lnPositive(x, prec);
  if (s === undefined) {
    throw new BranchError({
      subject: "ln",
      given: `${shown(x)}, which holds 0`,
      expected: "positive numbers",
      hint: "A sharper argument may do.",
    });
  }
  throw new DomainError({
    subject: "ln",
    given: s === 0 ? "0" : `the negative number ${shown(x)}`,
    expected: "a positive number",
    hint: s === 0 ? "" : "ln(complex(x)) takes others.",
  });
}

function lnPositive(x: Ball, prec: number): Ball {
  const length = bitLength(x.man, prec);
  if (x.rad > 0 && length - exponent(x.rad) < 3) {
    return hull(ln(lowerPositive(x), 32), ln(upper(x), 32), Math.min(prec, 32));
  }
  const mid: Ball = { man: x.man, exp: x.exp, rad: 0 };
  const off = sub(mid, one, 8);
  if (isZero(off)) return x.rad === 0 ? zero : lnNearOne(x, prec);
  const near = -magnitude(off);
  if (near > 16 && near > prec / 8) return lnNearOne(x, prec);
  const relative = x.rad === 0 ? Infinity : length - exponent(x.rad) + 8;
  const work = Math.min(prec + Math.max(0, near), relative) + 6;
  const n = x.exp + length - 1;
  const y = scaled(x.man, work - length + 1);
  const more = bitLength(BigInt(n));
  const value = lnFixed(y, work) + ((BigInt(n) * ln2Fixed(work + more)) >> shift(more));
  // ε = rad/man <= rad·2^(1−length); units of 2^-work. 1/(1 − ε) <= 4/3.
  const err = 8 + scaledRadius(x.rad, work + 1 - length) * 1.4;
  return finish(value, -work, err * UP, prec);
}

/** ln x = 2 artanh z with z = (x − 1)/(x + 1), |z| < 2^-8: the rest of the series after N terms is under |z|^(2N+1). */
function lnNearOne(x: Ball, prec: number): Ball {
  const work = prec + 8;
  const z = div(sub(x, one, work), add(x, one, work), work);
  const u = mul(z, z, work);
  const perTerm = -magnitude(u);
  if (isZero(z)) return zero;
  const count = Math.max(1, Math.ceil(work / Math.max(perTerm, 1)) + 1);
  let sum: Ball = zero;
  for (let n = count - 1; n >= 0; n--) {
    sum = add(mul(sum, u, work), div(one, { man: BigInt(2 * n + 1), exp: 0, rad: 0 }, work), work);
  }
  const tail: Ball = { man: 1n, exp: -perTerm * count, rad: 0 };
  return round(ldexp(mul(z, widenBy(sum, tail, work), work), 1), prec);
}
