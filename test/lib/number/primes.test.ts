import { describe, expect, it } from "vitest";
import { expFixed } from "../../../lib/number/fixed/exp.ts";
import {
  ANGLE_ARGUMENTS,
  ANGLE_DENOMINATOR,
  ANGLE_ROWS,
  GAUSSIAN_PRIMES,
  LOG_ARGUMENTS,
  LOG_ROWS,
  PRIMES,
} from "../../../lib/number/fixed/machin.ts";
import { byAngles, byPrimes } from "../../../lib/number/fixed/primes.ts";
import { ANGLE_LEVELS, LOG_LEVELS } from "../../../lib/number/fixed/relations.ts";
import { sinCosFixed } from "../../../lib/number/fixed/trig.ts";

function valuation(n: bigint, p: bigint): number {
  let count = 0;
  for (let m = n; m % p === 0n; m /= p) count++;
  return count;
}

/** How often a + bi divides x + i, less how often a − bi does: only one of them can. */
function turns(x: bigint, [a, b]: readonly [number, number]): number {
  const p = BigInt(a * a + b * b);
  const count = valuation(x * x + 1n, p);
  return (x * BigInt(a) + 1n * BigInt(b)) % p === 0n ? count : -count;
}

describe("formulas for logarithms of primes and angles of Gaussian primes", () => {
  it("ln p = Σ c·artanh(1/x) exactly — oracle: 2 artanh(1/x) = ln((x + 1)/(x − 1)), factored", () => {
    LOG_ROWS.forEach((row, j) => {
      PRIMES.forEach((p, k) => {
        const power = LOG_ARGUMENTS.reduce((sum, x, i) => {
          const up = valuation(BigInt(x) + 1n, BigInt(p)) - valuation(BigInt(x) - 1n, BigInt(p));
          return sum + BigInt(row[i]!) * BigInt(up);
        }, 0n);
        expect(power).toBe(j === k ? 2n : 0n);
      });
    });
    for (const x of LOG_ARGUMENTS) {
      const rest = PRIMES.reduce((n, p) => n / BigInt(p) ** BigInt(valuation(n, BigInt(p))), BigInt(x) ** 2n - 1n);
      expect(rest).toBe(1n);
    }
  });

  it("angles of Gaussian primes exactly — oracle: x + i factored; the quarter turns by doubles", () => {
    ANGLE_ROWS.forEach((row, j) => {
      GAUSSIAN_PRIMES.slice(1).forEach((prime, k) => {
        const power = ANGLE_ARGUMENTS.reduce((sum, x, i) => sum + row[i]! * turns(BigInt(x), prime), 0);
        expect(power).toBe(j === k ? 2 * Number(ANGLE_DENOMINATOR) : 0);
      });
      // What is left is a multiple of π/4 by the factor 1 + i and the units; doubles tell which.
      const [a, b] = GAUSSIAN_PRIMES[j + 1]!;
      const sum = ANGLE_ARGUMENTS.reduce((s, x, i) => s + row[i]! * Math.atan(1 / x), (row[12]! * Math.PI) / 2);
      expect(Math.abs(sum - 2 * Number(ANGLE_DENOMINATOR) * Math.atan2(b, a))).toBeLessThan(1e-6);
    });
  });

  it("a row of coefficients has a sum of sizes below 2^33, the tables of relations allow under 2^15 in all — oracle: addition", () => {
    const sizes = (row: readonly number[]): number => row.reduce((sum, x) => sum + Math.abs(x), 0);
    for (const row of [...LOG_ROWS, ...ANGLE_ROWS]) expect(sizes(row)).toBeLessThan(2 ** 33);
    for (const levels of [LOG_LEVELS, ANGLE_LEVELS]) {
      expect(levels.reduce((sum, { rows }) => sum + sizes(rows) / 2 + 100, 0)).toBeLessThan(2 ** 15);
    }
  });
});

describe("reduction", () => {
  const work = 4096;
  const numbers = [0n, 1n, (1n << 4096n) - 1n, 1n << 4095n, ((1n << 4096n) * 22n) / 27n, (1n << 4096n) / 1009n];

  it.each([1, 2, 3, 4, 5])(
    "%i levels leave at most 2^-(18·levels − 4) — oracle: half the sum of the relations' sizes",
    (used) => {
      for (const x of numbers) {
        for (const { rest } of [byPrimes(x, work, used), byAngles(x, work, used)]) {
          expect(rest < 0n ? -rest : rest).toBeLessThan(1n << BigInt(work - 18 * used + 4));
        }
      }
    },
  );

  it("the short factors of an angle have size 1 — oracle: re² + im² = norm²", () => {
    for (const x of numbers) {
      const { re, im, norm } = byAngles(x, work, 3);
      expect(re * re + im * im).toBe(norm * norm);
    }
  });
});

// The routes change at 800 and 1300 bits.
describe.each([
  [700, 900],
  [1200, 1400],
  [3000, 33_300],
])("%i bits against %i", (few, many) => {
  const up = BigInt(many - few);
  it.each([0, 1 / 1024, 0.3, 0.5, 0.999])(
    "exp, sin and cos of %d agree to 2 units — oracle: the other route, or the same at another precision",
    (x) => {
      const short = BigInt(Math.floor(x * 2 ** 50)) << BigInt(few - 50);
      const near = (a: bigint, b: bigint): void => {
        const off = (a << up) - b;
        expect(off < 0n ? -off : off).toBeLessThan((1n << up) * 2n);
      };
      near(expFixed(short, few), expFixed(short << up, many));
      const a = sinCosFixed(short, few);
      const b = sinCosFixed(short << up, many);
      near(a.sin, b.sin);
      near(a.cos, b.cos);
      // sin² + cos² = 1 within 8 units.
      const one = b.sin * b.sin + b.cos * b.cos - (1n << BigInt(2 * many));
      expect(one < 0n ? -one : one).toBeLessThan(1n << BigInt(many + 3));
    },
  );
});
