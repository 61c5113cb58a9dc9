// π over an arithmetic-geometric mean of long numbers, without the last steps and with one quotient less.
//
// With s = a + b, z = (a − b)/s, u = z²:  1/agm(a, b) = (2/s) Σ c_n u^n, c_n = (C(2n, n)/4^n)²   (DLMF 19.8.5 with 19.5.1).
// The steps end at z < 2^−(W/40): about twenty terms, whose powers are made in two stages of four or five with ever fewer places, cost less than the
// two or three steps that they spare (measured).

import { bitLength, scaled, shift } from "../number/fixed/bits.ts";
import { boundedCache } from "../number/fixed/cache.ts";
import { piFixed } from "../number/fixed/constants.ts";
import { sqrtNear } from "../number/fixed/isqrt.ts";

/** From here on the series costs less than steps (measured). */
export const LONG = 1000;
const MOST_TERMS = 20;

export interface ReciprocalMean {
  /** π/agm in units of 2^−W. */
  readonly value: bigint;
  readonly steps: number;
}

/**
 * π/agm(a, b) for a >= b >= a/4 > 0 in units of 2^−W, a between 2^−6 and 4.
 *
 * Error    a step adds at most three units of a number that is not below b at the start: the caller counts them from `steps`. For the closed form:
 *          z is off by a unit, u by two, the powers u^i by three, a stage (c_n <= 1/4 from n = 1 on, four products at most and their cuts) by 8, Horner's
 *          step by 8 more, what is left out by one unit as 2·lost·N >= W: F = Σ c_n u^n < 1.1 by 20 units. 2π/s < 2^9 is off by
 *          2^9 units (π by 2 units, and 2/s < 2^7). So the value is off by under 2^14 units.
 */
export function reciprocalMean(a: bigint, b: bigint, W: number): ReciprocalMean {
  const w = shift(W);
  for (let steps = 0; ; steps++) {
    const sum = a + b;
    const difference = a > b ? a - b : b - a;
    const lost = bitLength(sum, W) - 1 - bitLength(difference, W);
    if (2 * MOST_TERMS * lost >= W) {
      const outer = (piFixed(W + 1) << w) / sum;
      const z = (difference << w) / sum;
      const F = difference === 0n ? 1n << w : series((z * z) >> w, lost, W);
      return { value: (outer * F) >> w, steps };
    }
    b = sqrtNear(a * b);
    a = sum >> 1n;
  }
}

/** Σ c_n u^n for u < 2^(−2·lost). */
function series(u: bigint, lost: number, W: number): bigint {
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

/** C(2n, n)². */
const coefficient = boundedCache(64, (n): bigint => {
  let binomial = 1n;
  for (let k = 1; k <= n; k++) binomial = (binomial * BigInt(2 * (2 * k - 1))) / BigInt(k);
  return binomial * binomial;
});
