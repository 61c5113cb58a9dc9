import { absBig, bitLength, shift } from "./bits.ts";
import { sqrtNear } from "./isqrt.ts";

export interface Parts {
  readonly re: bigint;
  readonly im: bigint;
}

/** Below this the two real roots cost less than the complex steps (measured). */
const STEPS_FROM = 1200;

/**
 * √(a + ib) with real part >= 0 for integers of which the larger has at least 8 bits: |result − root| < 6.
 *
 * Method   short ones by two real roots. Long ones by s' = 2^e·s + (z' − 4^e·s²)/(2^(e+1)·s), which doubles the bits of s.
 */
export function complexSqrt(a: bigint, b: bigint): Parts {
  const length = Math.max(bitLength(a), bitLength(b));
  return length < STEPS_FROM ? byRealRoots(a, b) : extended(a, b, (length + 1) >> 1, (length + 1) >> 1);
}

/**
 * Error    r = |a + ib| within 2; u = √((r + |a|)/2) within 2 + 2/u, and u >= |root|/√2; v = |b|/2u within (v/u)·3 + 1 <= 4: under 6 in all.
 */
function byRealRoots(a: bigint, b: bigint): Parts {
  const r = sqrtNear(a * a + b * b);
  const u = sqrtNear((r + absBig(a)) >> 1n);
  const v = absBig(b) / (2n * u);
  if (a >= 0n) return { re: u, im: b < 0n ? -v : v };
  return { re: v, im: b < 0n ? -u : u };
}

/**
 * The first `next` of the `wanted` bits of √(a + ib).
 * Error    |s| >= 2^(known − 1). With |s − root| < 6 before, the step leaves (6·2^e)²/(2·2^e|s|) <= 36·2^(e − known) < 1/4, as e <= known − 8; the bits
 *          cut from the rest matter under 2^-known, and the two quotients are cut by under √2: below 2.
 */
function extended(a: bigint, b: bigint, wanted: number, next: number): Parts {
  const down = 2 * (wanted - next);
  if (next < STEPS_FROM / 2) return byRealRoots(a >> shift(down), b >> shift(down));
  const known = (next + 9) >> 1;
  const s = extended(a, b, wanted, known);
  const e = next - known;
  const up = shift(e);
  const restRe = (a >> shift(down + e)) - (((s.re - s.im) * (s.re + s.im)) << up);
  const restIm = (b >> shift(down + e)) - ((s.re * s.im) << shift(e + 1));
  // rest/2s = rest·conj(s)/(2|s|²): the rest has at most known + e + 4 bits and the quotient e + 4.
  const norm = (s.re * s.re + s.im * s.im) << 1n;
  const qr = (restRe * s.re + restIm * s.im) / norm;
  const qi = (restIm * s.re - restRe * s.im) / norm;
  return { re: (s.re << up) + qr, im: (s.im << up) + qi };
}
