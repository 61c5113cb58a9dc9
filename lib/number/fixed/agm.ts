// Arithmetic-geometric mean in fixed point.
import { bitLength, scaled, shift } from "./bits.ts";
import { sqrtNear } from "./isqrt.ts";

/** agm(1+x, 1−x) = 1 − Σ b_n x^(2n): b_1 .. b_7 times 2^28. */
const TAIL: readonly bigint[] = [67108864n, 20971520n, 11534336n, 7684096n, 5648384n, 4409088n, 3584064n];
const TAIL_BITS = 28;

/** Terms of the tail: short numbers take more of them and one root less (measured). */
function tailTerms(work: number): number {
  return work < 600 ? 7 : 4;
}

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
  for (;;) {
    const sum = a + b;
    const difference = a > b ? a - b : b - a;
    if (difference <= 1n) return a;
    const lost = work - 1 - bitLength(difference, work);
    if (2 * (tailTerms(work) + 1) * lost > work) return closed(sum, difference, lost, work);
    b = sqrtNear(a * b);
    a = sum >> 1n;
  }
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
  let last = tailTerms(work);
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
