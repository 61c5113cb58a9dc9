// π over an arithmetic-geometric mean of long numbers, without the last steps and with one quotient less.

import { bitLength, shift } from "../number/fixed/bits.ts";
import { piFixed } from "../number/fixed/constants.ts";
import { sqrtNear } from "../number/fixed/isqrt.ts";
import { MOST_TERMS, seriesOfMeans, squaredBinomial } from "../number/fixed/means-series.ts";

export interface ReciprocalMean {
  /** π/agm in units of 2^−W. */
  readonly value: bigint;
  readonly steps: number;
}

/**
 * π/agm(a, b) for a >= b >= a/4 > 0 in units of 2^−W, a between 2^−6 and 4.
 *
 * Error    a step adds at most three units of a number that is not below b at the start: the caller counts them from `steps`. For the closed form:
 *          z is off by a unit, u by two, so F = Σ c_n u^n < 1.1 by 20 units (means-series.ts). 2π/s < 2^9 is off by
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
      const F = difference === 0n ? 1n << w : seriesOfMeans((z * z) >> w, lost, W, squaredBinomial);
      return { value: (outer * F) >> w, steps };
    }
    b = sqrtNear(a * b);
    a = sum >> 1n;
  }
}
