import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { evaluate, multiply, realRoots } from "../../../lib/figure/polynomial.ts";

describe("real roots in double precision", () => {
  it("finds the integers a product was made of, multiple ones once — oracle: the factors", () => {
    fc.assert(
      fc.property(fc.array(fc.integer({ min: -9, max: 9 }), { minLength: 1, maxLength: 5 }), (roots) => {
        const p = multiply(...roots.map((r) => [-r, 1]));
        const expected = [...new Set(roots)].sort((a, b) => a - b);
        const found = realRoots(p, -10, 10);
        expect(found.length).toBe(expected.length);
        // A root of multiplicity m is only known to about eps^(1/m) of the range.
        found.forEach((x, k) => {
          expect(Math.abs(x - expected[k]!)).toBeLessThan(2e-2);
        });
      }),
      { numRuns: 300, seed: 7 },
    );
  });

  it("x² − 2 on [0, 2] gives √2 to the last bits, x² + 1 nothing — oracle: square root of the platform", () => {
    expect(realRoots([-2, 0, 1], 0, 2)[0]).toBeCloseTo(Math.SQRT2, 14);
    expect(realRoots([1, 0, 1], -5, 5)).toEqual([]);
  });

  it("evaluates by Horner's rule — oracle: 1 + 2·3 + 4·9 by hand", () => {
    expect(evaluate([1, 2, 4], 3)).toBe(43);
  });
});
