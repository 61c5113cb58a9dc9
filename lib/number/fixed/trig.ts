// sin and cos in fixed point.
import { bitLength, shift } from "./bits.ts";
import { powersOf } from "./exp.ts";
import { sqrtNear } from "./isqrt.ts";

/**
 * sin and cos of x/2^prec, times 2^prec, for 0 <= x < 2·2^prec; error of each under 1 unit.
 *
 * Method   t = x/2^k; sin t by its Taylor series in √N columns, cos t = √(1 − sin²), k doublings
 *          s' = 2sc, c' = 1 − 2s².
 * Error    |δs'| <= 2(|δs| + |δc|) + 1 and |δc'| <= 4|δs| + 2, so a doubling multiplies the larger error by at most 4;
 *          2k + 2·log2(prec) + 8 guard bits hold 4^k·(4N + 2m + 8).
 */
export function sinCosFixed(x: bigint, prec: number): { sin: bigint; cos: bigint } {
  const k = Math.max(4, Math.round(0.45 * Math.sqrt(prec)));
  const guard = 2 * k + 2 * bitLength(BigInt(prec)) + 8;
  const work = prec + guard;
  const w = shift(work);
  const unit = 1n << w;
  const t = (x << shift(guard)) >> shift(k);
  let sin = sinTaylor(t, work, k - 1);
  let cos = sqrtNear((unit << w) - sin * sin);
  for (let j = 0; j < k; j++) {
    const product = sin * cos;
    cos = unit - ((sin * sin) >> shift(work - 1));
    sin = product >> shift(work - 1);
  }
  return { sin: sin >> shift(guard), cos: cos >> shift(guard) };
}

/** sin t = t·Σ (−1)^n t^(2n)/(2n+1)! for 0 <= t < 2^(work−k), k >= 2; the error bound is that of the exponential. */
function sinTaylor(t: bigint, work: number, k: number): bigint {
  const w = shift(work);
  const u = (t * t) >> w;
  let count = 1;
  for (let reached = 2 * k; reached < work + 2; count++) reached += 2 * k + 2 * bitLength(BigInt(2 * count)) - 2;
  const columns = Math.max(1, Math.round(Math.sqrt(count)));
  const powers = powersOf(u, columns, w);
  const sums: bigint[] = new Array(columns).fill(0n);
  const step = powers[columns]!;
  let a = 1n << w;
  for (let n = 0; a > 0n; ) {
    for (let i = 0; i < columns; i++) {
      // The sign of a term follows its number.
      sums[i] = n % 2 === 0 ? sums[i]! + a : sums[i]! - a;
      n++;
      a /= BigInt(2 * n * (2 * n + 1));
    }
    a = (a * step) >> w;
  }
  let y = 0n;
  for (let i = columns - 1; i > 0; i--) y += sums[i]! * powers[i]!;
  return (((y >> w) + sums[0]!) * t) >> w;
}
