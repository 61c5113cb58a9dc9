import fc from "fast-check";
import { describe, expect, it } from "vitest";
import * as ball from "../../../lib/number/ball.ts";
import { agmFixed } from "../../../lib/number/fixed/agm.ts";
import { isqrt } from "../../../lib/number/fixed/isqrt.ts";
import { reciprocalCoefficient, squaredBinomial } from "../../../lib/number/fixed/means-series.ts";
import { Rational } from "../../../lib/number/rational.ts";

describe("the series that ends a long mean", () => {
  it("(1 − Σ b_n u^n)·Σ c_n u^n = 1 term by term, 0 <= b_n <= 1/4 — oracle: exact integer arithmetic", () => {
    const b = (n: number) => (n === 0 ? 1n : -reciprocalCoefficient(n));
    for (let n = 1; n <= 30; n++) {
      let sum = 0n;
      for (let k = 0; k <= n; k++) sum += b(k) * squaredBinomial(n - k);
      expect(sum).toBe(0n);
      expect(reciprocalCoefficient(n) > 0n && 4n * reciprocalCoefficient(n) <= 16n ** BigInt(n)).toBe(true);
    }
    expect([1, 2, 3].map(reciprocalCoefficient)).toEqual([4n, 20n, 176n]);
  });

  it("gives the mean to 12 bits less than the work — oracle: plain steps with 60 bits more", () => {
    fc.assert(
      fc.property(fc.integer({ min: 1000, max: 6000 }), fc.integer({ min: 251, max: 1000 }), (work, thousandths) => {
        const unit = 1n << BigInt(work);
        const [a, b] = [unit, (unit * BigInt(thousandths)) / 1000n];
        const found = agmFixed(a, b, work) << 60n;
        const reference = plainMean(a << 60n, b << 60n);
        const error = found > reference ? found - reference : reference - found;
        expect(error < reference >> BigInt(work - 12)).toBe(true);
      }),
      { numRuns: 100, seed: 20261201 },
    );
  });

  it("lies in enclosures of more digits, from 300 to 3,000 digits and far apart — oracle: the same at another precision", () => {
    for (const bits of [1000, 1300, 3322, 10_000]) {
      for (const q of ["1/3", "99/100", "1e-6", "1e-40", "7/2"]) {
        const mean = (prec: number) => ball.agm(ball.fromInt(1), ball.fromRational(Rational.parse(q), prec + 40), prec);
        expect(ball.overlaps(mean(bits), mean(bits + 150))).toBe(true);
        expect(ball.bits(mean(bits))).toBeGreaterThan(bits - 6);
      }
    }
  });
});

function plainMean(a: bigint, b: bigint): bigint {
  let [x, y] = [a, b];
  while ((x > y ? x - y : y - x) > 1n) [x, y] = [(x + y) >> 1n, isqrt(x * y)];
  return x;
}
