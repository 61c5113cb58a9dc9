// Euler's constant, and Γ at rational arguments of (0, 1], in fixed point.
import { shift } from "./bits.ts";

/**
 * Σ_{k>=0} N^k/(s(s+1)...(s+k))·2^work for s = num/den in (0, 1], with an upper bound of its error.
 *
 * Error    a term t_j is cut by under a unit, which goes on into the later ones by the factor R_j = Σ_{k>=j} t_k/t_j. The t_j rise and
 *          then fall and are >= 1 up to j = 2N, so R_j <= S there, and beyond R_j <= 2: together under 2N·S + 2K units.
 */
export function lowerGammaSum(
  num: bigint,
  den: bigint,
  n: number,
  work: number,
): { readonly sum: bigint; readonly count: number } {
  const step = BigInt(n) * den;
  let term = (den << shift(work)) / num;
  let sum = 0n;
  let bottom = num;
  let count = 0;
  while (term > 0n) {
    sum += term;
    bottom += den;
    term = (term * step) / bottom;
    count++;
  }
  return { sum, count };
}

/**
 * Euler's constant times 2^prec within 1 unit.
 *
 * Method   Brent and McMillan's algorithm B1: γ = U/V − ln n with V = Σ (n^k/k!)², U = Σ (n^k/k!)² H_k; the error is
 *          K0(2n)/I0(2n) < π e^(−4n).
 * Error    the running terms err as in `lowerGammaSum`, relatively under 2n units of V; the guard of 32 + 2·log2 n bits covers both sums.
 * Source   R. P. Brent, E. M. McMillan, Some new algorithms for high-precision computation of Euler's constant, Math. Comp. 34 (1980).
 *
 * @param lnFixed ln n times 2^work, within a few units.
 */
export function eulerFixed(prec: number, lnOf: (n: number, work: number) => bigint): bigint {
  const guard = 48;
  const work = prec + guard;
  // e^(−4n)·π < 2^−work
  const n = Math.ceil((work * 0.6931471805599454 + 1.2) / 4);
  const square = BigInt(n) * BigInt(n);
  let b = 1n << shift(work);
  let a = 0n;
  let u = 0n;
  let v = b;
  for (let k = 1n; b > 0n || a > 0n; k++) {
    b = (b * square) / (k * k);
    a = ((a * square) / k + b) / k;
    u += a;
    v += b;
  }
  return ((u << shift(work)) / v - lnOf(n, work)) >> BigInt(guard);
}
