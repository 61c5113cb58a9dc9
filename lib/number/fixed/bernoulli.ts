// Bernoulli numbers, exactly.
import { shift } from "./bits.ts";

/**
 * The tangent numbers T_1 .. T_n: tan x = Σ T_k x^(2k−1)/(2k−1)!.
 * Source   R. P. Brent, D. Harvey, Fast computation of Bernoulli, tangent and secant numbers, Springer Proc. Math. Stat. 50 (2013), algorithm 2.
 */
function tangentNumbers(n: number): bigint[] {
  const t: bigint[] = [0n, 1n];
  for (let k = 2; k <= n; k++) t[k] = BigInt(k - 1) * t[k - 1]!;
  for (let k = 2; k <= n; k++) {
    for (let j = k; j <= n; j++) t[j] = shift(j - k) * t[j - 1]! + shift(j - k + 2) * t[j]!;
  }
  return t;
}

let kept: readonly bigint[] = [];

/** |B_2|, |B_4| .. |B_2n| as numerators over 4^k(4^k − 1): |B_2k| = 2k·T_k/(4^k(4^k − 1)); the list is at least n long. Cost: n² short products. */
export function bernoulliNumerators(n: number): readonly bigint[] {
  if (kept.length <= n) kept = tangentNumbers(n + 8).map((t, k) => BigInt(2 * k) * t);
  return kept;
}
