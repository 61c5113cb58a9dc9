// Sine and cosine of balls.
import { bitLength, scaled, scaledRadius, shift, UP } from "../fixed/bits.ts";
import { piFixed } from "../fixed/constants.ts";
import { sinCosFixed } from "../fixed/trig.ts";
import { add, div, mul, round, spread, sub } from "./arithmetic.ts";
import { type Ball, finish, fromInt, isZero, magnitude, one, zero } from "./data.ts";
import { radiusExponent, usefulBits } from "./exp.ts";

export interface SinCos {
  readonly sin: Ball;
  readonly cos: Ball;
}

/**
 * sin x and cos x together.
 * Error    the kernel's unit and the reduction's, and the radius itself, since both functions move at a rate of at most 1. Near a zero the
 *          precision is raised once, so that the result has prec relative bits as far as x allows. A radius above 1 gives 0 ± 1.
 */
export function sinCos(x: Ball, prec: number): SinCos {
  if (isZero(x)) return { sin: zero, cos: one };
  if (radiusExponent(x) > 0) return { sin: spread(1n, 0), cos: spread(1n, 0) };
  const size = magnitude(x);
  if (size < -2 && -size > prec / 4) return tiny(x, prec);
  const work = usefulBits(x, prec + Math.max(0, -size)) + 8;
  const first = reduced(x, work, size);
  // A small r was lost in the reduction by as many bits as it is short; x may have them.
  const missing = work - bitLength(first.r) - 2;
  const wanted = usefulBits(x, prec + Math.max(0, -size) + Math.max(0, missing)) + 8;
  return missing > 4 && wanted > work
    ? finished(reduced(x, wanted, size), x, wanted, prec)
    : finished(first, x, work, prec);
}

interface Reduced {
  /** |r| <= π/4 (up to a unit), times 2^work, with x = n·π/2 + r; error under 3 units. */
  readonly r: bigint;
  readonly quadrant: number;
}

function reduced(x: Ball, work: number, size: number): Reduced {
  const more = Math.max(0, size) + 4;
  const fixed = scaled(x.man, x.exp + work + more);
  // π/2 in units of 2^-(work+more); its 2 units times n stay under 1 unit of 2^-work.
  const half = piFixed(work + more) >> 1n;
  const n = roundedQuotient(fixed, half);
  return { r: (fixed - n * half) >> shift(more), quadrant: Number(BigInt.asUintN(2, n)) };
}

function roundedQuotient(a: bigint, b: bigint): bigint {
  const shifted = 2n * a + b;
  const q = shifted / (2n * b);
  return shifted < 0n ? q - 1n : q;
}

function finished({ r, quadrant }: Reduced, x: Ball, work: number, prec: number): SinCos {
  const { sin, cos } = sinCosFixed(r < 0n ? -r : r, work);
  const s = r < 0n ? -sin : sin;
  const err = (5 + scaledRadius(x.rad, x.exp + work)) * UP;
  const ball = (value: bigint): Ball => finish(value, -work, err, prec);
  if (quadrant === 0) return { sin: ball(s), cos: ball(cos) };
  if (quadrant === 1) return { sin: ball(cos), cos: ball(-s) };
  if (quadrant === 2) return { sin: ball(-s), cos: ball(-cos) };
  return { sin: ball(-cos), cos: ball(s) };
}

/** |x| < 2^-2 and small against the precision: series in x itself, which keeps the relative accuracy of the sine. */
function tiny(x: Ball, prec: number): SinCos {
  const work = prec + 8;
  const u = mul(x, x, work);
  const perTerm = -magnitude(u);
  const count = Math.ceil(work / perTerm) + 1;
  let sin: Ball = one;
  let cos: Ball = one;
  for (let n = count; n > 0; n--) {
    sin = sub(one, mul(sin, div(u, fromInt(2 * n * (2 * n + 1)), work), work), work);
    cos = sub(one, mul(cos, div(u, fromInt(2 * n * (2 * n - 1)), work), work), work);
  }
  // Alternating with falling terms: the first left out bounds the rest, and it is under u^(count+1).
  const tail = spread(1n, -perTerm * (count + 1));
  return { sin: round(mul(x, add(sin, tail, work), work), prec), cos: add(cos, tail, prec) };
}
