// The circular functions at rational multiples of π.
import { describe, expect, it } from "vitest";
import { exact, rational } from "../../../lib/number/convert.ts";
import { cos, exp, sin, sqrt, tan } from "../../../lib/number/functions.ts";
import { i, π } from "../../../lib/number/symbols.ts";
import { Complex, type Real } from "../../../lib/number/values.ts";
import { PoleError } from "../../../lib/proof/errors.ts";

const at = (n: number, d: number) => π.times(n).div(d);

describe("multiples of π", () => {
  it("have the exact values of the table — oracle: DLMF Table 4.17.1 (from memory)", () => {
    expect([sin(π), cos(π), sin(at(1, 6)), cos(at(2, 3)), tan(at(3, 4))].map(String)).toEqual([
      "0",
      "-1",
      "1/2",
      "-1/2",
      "-1",
    ]);
    expect(sin(at(1, 4)).equals(exact`√2/2`)).toBe(true);
    expect(cos(at(1, 6)).equals(exact`√3/2`)).toBe(true);
    expect(tan(at(1, 12)).equals(exact`2 - √3`)).toBe(true);
    expect(tan(at(5, 12)).equals(exact`2 + √3`)).toBe(true);
  });

  it("agree with the engine at 240 twelfths, exact or not — oracle: Math.sin, Math.cos, Math.tan to 10^-12", () => {
    for (let n = -120; n < 120; n++) {
      const x = (Math.PI * n) / 12;
      expect(sin(at(n, 12)).toDouble()).toBeCloseTo(Math.sin(x), 12);
      expect(cos(at(n, 12)).toDouble()).toBeCloseTo(Math.cos(x), 12);
      if (n % 12 !== 6 && n % 12 !== -6) expect(tan(at(n, 12)).toDouble()).toBeCloseTo(Math.tan(x), 11);
      const [re, im] = Complex.from(exp(at(n, 12).times(i))).toDouble();
      expect(re).toBeCloseTo(Math.cos(x), 12);
      expect(im).toBeCloseTo(Math.sin(x), 12);
    }
  });

  it("e^(iπ) = −1, and third and sixth roots of unity are exact — oracle: Euler", () => {
    expect(`${exp(π.times(i))}`).toBe("-1");
    expect(exp(at(2, 3).times(i)).equals(exact`-1/2 + √-3/2`)).toBe(true);
    expect(`${exp(at(1, 2).times(i).plus(i.times(π)))}`).toBe("-i");
    expect(`${exp(i.times(π).times(rational(5, 2)))}`).toBe("i");
  });

  it("tan has its poles named — oracle: cos π/2 = cos(−3π/2) = 0", () => {
    expect(() => tan(at(1, 2))).toThrow(/^tan: 1\/2·π, where the cosine is 0; expected a number away from/);
    expect(() => tan(at(-3, 2))).toThrow(PoleError);
  });

  it("a number near one is none", () => {
    expect(sin(π.plus("1e-30")).equals(0)).toBe(false);
    expect(sin(π.times("3.0000000000000000001").div(3)).equals(0)).toBe(false);
  });
});

describe("sums of roots of unity", () => {
  it("cos 2π/7 + cos 4π/7 + cos 6π/7 = −1/2 — oracle: the sum of all seventh roots of unity is 0", () => {
    const sum = [2, 4, 6].map((n) => cos(at(n, 7))).reduce((s, c) => s.plus(c));
    expect(sum.equals("-1/2")).toBe(true);
    expect(sum.equals(rational(-1, 2).plus(rational(1, 10n ** 60n)))).toBe(false);
  });

  it("2 cos π/32 by nested roots, sin π/10 = (√5 − 1)/4 — oracle: half angles; the pentagon", () => {
    const half = (x: Real) => x.plus(2).sqrt();
    expect(
      cos(at(1, 32))
        .times(2)
        .equals(half(half(half(sqrt(2))))),
    ).toBe(true);
    expect(sin(at(1, 10)).equals(exact`(√5 - 1)/4`)).toBe(true);
    expect(
      Complex.from(exp(at(1, 7).times(i)))
        .pow(7)
        .equals(-1),
    ).toBe(true);
  });
});
