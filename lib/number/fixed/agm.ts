// Arithmetic-geometric mean in fixed point.
import { bitLength, pow2, scaled, shift, UP } from "./bits.ts";
import { boundedCache } from "./cache.ts";
import { sqrtNear } from "./isqrt.ts";
import { LONG, MOST_TERMS, reciprocalCoefficient, seriesOfMeans } from "./means-series.ts";

/** agm(1+x, 1−x) = 1 − Σ b_n x^(2n): b_1 .. b_7 times 2^28. */
const TAIL: readonly bigint[] = [67108864n, 20971520n, 11534336n, 7684096n, 5648384n, 4409088n, 3584064n];
const TAIL_BITS = 28;

/** Up to here the sizes are doubles, and seven terms spare a root (measured). */
const SHORT = 600;
const LONG_TERMS = 4;

/**
 * agm(a, b) for integers a >= b >= a/4 in a common unit, a of about `work` bits; the relative error is under 2^(12 − work).
 *
 * Method   means until z = (a − b)/(a + b) is below 2^(−work/10), then five terms in z²; for short numbers 2^(−work/16) and eight.
 * Error    both means are monotone and homogeneous, so relative errors do not grow; a step adds under 2 units of a number of at least work − 3 bits,
 *          and there are at most 2 + log2(work) < 30; the tail as in the source, under z^10 or z^16; its correction is cut by under 12 units.
 * Source   1/agm(1+x, 1−x) = (2/π)K(x) = Σ (C(2n,n)/4^n)² x^(2n), whose coefficients are log-convex, so that the reciprocal is
 *          1 − Σ b_n x^(2n) with b_n >= 0 (Kaluza 1928) and Σ b_n = 1: the terms from n = N on are under x^(2N) for |x| < 1.
 */
export function agmFixed(a: bigint, b: bigint, work: number): bigint {
  const enough = work < SHORT ? pow2(-work) : 0;
  for (;;) {
    const sum = a + b;
    const difference = a > b ? a - b : b - a;
    if (difference <= 1n) return a;
    if (work < SHORT) {
      const z = (Number(difference) / Number(sum)) * UP;
      const square = z * z * UP;
      const fourth = square * square * UP;
      if (fourth * fourth * fourth * fourth * UP < enough) return closedShort(sum, difference, square, work);
    } else {
      const lost = work - 1 - bitLength(difference, work);
      if (work >= LONG && 2 * MOST_TERMS * lost >= work) return closedLong(sum, difference, work);
      if (2 * (LONG_TERMS + 1) * lost > work) return closed(sum, difference, lost, work);
    }
    b = sqrtNear(a * b);
    a = sum >> 1n;
  }
}

/**
 * The same for long numbers: sum/2·(1 − Σ b_n z^(2n)), z and the sum in units of 2^−work of which the sum is off by 20 (means-series.ts), the last product cut by
 * one of the result's, which has at least work − 3 bits: a relative error under 2^(8 − work).
 */
function closedLong(sum: bigint, difference: bigint, work: number): bigint {
  const w = shift(work);
  const z = (difference << w) / sum;
  const lost = bitLength(sum, work) - 1 - bitLength(difference, work);
  const series = seriesOfMeans((z * z) >> w, lost, work, reciprocalCoefficient);
  return (sum - ((sum * series) >> w)) >> 1n;
}

/** The coefficients in units of 2^-work. */
const coefficients = boundedCache(16, (work): readonly bigint[] => TAIL.map((b) => b << shift(work - TAIL_BITS)));

/**
 * The same for short numbers, where cutting to the digits that count costs more than it saves (measured): Horner's rule in units of 2^-work, each step cut
 * by under 3 units of which the next keeps a quarter at most: under 4 units of the sum, which is under 1/4, and 3 for z² and the last product.
 */
function closedShort(sum: bigint, difference: bigint, square: number, work: number): bigint {
  const w = shift(work);
  const b = coefficients(work);
  const z = (difference << w) / sum;
  const u = (z * z) >> w;
  let last = 1;
  // Terms from the first below a thousandth of a unit on are left out.
  for (let rest = square * square; last < b.length && rest > pow2(-work - 10); rest *= square) last++;
  let inner = b[last - 1]!;
  for (let n = last - 2; n >= 0; n--) inner = b[n]! + ((u * inner) >> w);
  const series = (u * inner) >> w;
  return (sum - ((sum * series) >> w)) >> 1n;
}

/**
 * sum/2·(1 − Σ b_n z^(2n)) for z = difference/sum < 2^-lost. The n-th term is below 2^(−2n·lost), so that `bits(n)` of its digits
 * count, and it is computed with these: every cut is under a unit of 2^-10 of the result's last place, and there are under 20.
 */
function closed(sum: bigint, difference: bigint, lost: number, work: number): bigint {
  const bits = (n: number): number => Math.max(20, work - 2 * n * lost + 10);
  const first = bits(1);
  const half = sum >> 1n;
  const cutSum = Math.max(0, bitLength(half, work) - first);
  const cutDifference = Math.max(0, bitLength(difference, work) - first);
  const top = half >> shift(cutSum);
  // z = q·2^(cutDifference − cutSum − 1 − first), z² = u·2^-scale.
  const q = ((difference >> shift(cutDifference)) << shift(first)) / top;
  const u = (q * q) >> shift(first);
  const scale = first + 2 * (cutSum - cutDifference + 1);
  // Terms below the last place are left out.
  let last = LONG_TERMS;
  while (last > 1 && 2 * last * lost > work + 10) last--;
  let inner = scaled(TAIL[last - 1]!, bits(last) - TAIL_BITS);
  for (let n = last - 1; n > 0; n--) {
    const less = first - bits(n + 1);
    inner =
      scaled(TAIL[n - 1]!, bits(n) - TAIL_BITS) +
      scaled((u >> shift(less)) * inner, bits(n) - bits(n + 1) - scale + less);
  }
  const series = (u * inner) >> shift(first);
  return half - scaled(top * series, cutSum - scale);
}
