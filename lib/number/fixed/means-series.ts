// The closed form of the last steps of an arithmetic-geometric mean of long numbers.
//
// With s = a + b, z = (a − b)/s, u = z²:  s/(2 agm(a, b)) = Σ c_n u^n with c_n = (C(2n, n)/4^n)²  (DLMF 19.8.5 with 19.5.1), and its reciprocal
// is 1 − Σ b_n u^n with b_n >= 0 and Σ b_n = 1 (Kaluza 1928, since the c_n are log-convex). 16^n c_n and 16^n b_n are whole.
// From z < 2^−(W/40) on about twenty terms, whose powers are made in two stages of four or five with ever fewer places, cost less than the two
// or three steps that they spare (measured).

import { scaled, shift } from "./bits.ts";
import { boundedCache } from "./cache.ts";

/** From here on (in bits) the series costs less than steps (measured). */
export const LONG = 1000;
/** The steps end when so many terms suffice. */
export const MOST_TERMS = 20;

/**
 * Σ k_n 16^−n u^n in units of 2^−W, n from 0 on, for u < 2^(−2·lost) in the same units and whole k_n with 0 <= k_n <= 16^n/4 from n = 1 on.
 *
 * Error    the powers u^i are off by three units if u is by two, a stage (four products at most and their cuts) by 8, Horner's step by 8 more, what is
 *          left out by one unit, as 2·lost·N >= W for the N terms taken and the k_n 16^−n add up to at most 1 beyond: under 20 units.
 */
export function seriesOfMeans(u: bigint, lost: number, W: number, coefficient: (n: number) => bigint): bigint {
  const count = Math.ceil(W / (2 * lost));
  const m = Math.max(1, Math.ceil(Math.sqrt(count)));
  const powers = [u];
  for (let i = 2; i <= m; i++) powers.push((powers[i - 2]! * u) >> shift(W));
  const last = Math.ceil(count / m) - 1;
  // A stage is multiplied by u^(mj), so that it needs so many places only; at least 64, which the bound of the tail has no use for.
  const places = (j: number): number => Math.max(64, W - 2 * lost * m * j);
  let H = 0n;
  for (let j = last; j >= 0; j--) {
    const less = W - places(j);
    let sum = scaled(coefficient(m * j), places(j) - 4 * m * j);
    for (let i = 1; i < m; i++) {
      const n = m * j + i;
      sum += ((powers[i - 1]! >> shift(less)) * coefficient(n)) >> shift(4 * n);
    }
    H = j === last ? sum : sum + (((powers[m - 1]! >> shift(less)) * H) >> shift(places(j + 1)));
  }
  return H;
}

/** 16^n c_n = C(2n, n)². */
export const squaredBinomial = boundedCache(64, (n): bigint => {
  let binomial = 1n;
  for (let k = 1; k <= n; k++) binomial = (binomial * BigInt(2 * (2 * k - 1))) / BigInt(k);
  return binomial * binomial;
});

/** 16^n b_n, and 0 for n = 0: from (1 − Σ b_n u^n)·Σ c_n u^n = 1. */
export const reciprocalCoefficient = boundedCache(64, (n): bigint => {
  if (n === 0) return 0n;
  let b = squaredBinomial(n);
  for (let k = 1; k < n; k++) b -= reciprocalCoefficient(k) * squaredBinomial(n - k);
  return b;
});
