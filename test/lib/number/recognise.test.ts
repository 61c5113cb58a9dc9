import { describe, expect, it } from "vitest";
import * as ball from "../../../lib/number/ball.ts";
import { complex, enclose, exact, real } from "../../../lib/number/convert.ts";
import { cos, exp, ln, sqrt } from "../../../lib/number/functions.ts";
import type { Quadratic } from "../../../lib/number/quadratic.ts";
import { Rational } from "../../../lib/number/rational.ts";
import { simplestRational } from "../../../lib/number/recognise/candidates.ts";
import { reducedBasis } from "../../../lib/number/recognise/reduction.ts";
import { type Recognition, recognise } from "../../../lib/number/recognise.ts";
import { i, π } from "../../../lib/number/symbols.ts";

function same(found: Recognition | undefined, wanted: Rational | Quadratic): boolean {
  return found !== undefined && complex(found.value).equals(wanted);
}

describe("recognition", () => {
  it("of rationals: e^(−ln 2) = 1/2, ln(e³)/7 = 3/7 — oracle: by hand", () => {
    const half = recognise(exp(ln(real(2)).neg()));
    expect(half?.value.toString()).toBe("1/2");
    expect(half?.standing.kind).toBe("conjectured");
    expect(half?.spare).toBeGreaterThanOrEqual(8);
    expect(recognise(ln(exp(1).pow(3)).div(7))?.value.toString()).toBe("3/7");
  });

  it("of quadratic irrationals: 2cos(π/5) is the golden ratio, cos²(π/8) = 1/2 + √2/4", () => {
    expect(same(recognise(cos(π.div(5)).times(2)), exact`(1+√5)/2`)).toBe(true);
    expect(same(recognise(cos(π.div(8)).pow(2), { height: 100 }), exact`1/2 + √2/4`)).toBe(true);
    expect(same(recognise(sqrt(2).plus(1).pow(5).plus(0).times(sqrt(1))), exact`(1+√2)^5`)).toBe(true);
  });

  it("of Gaussian and other imaginary quadratic numbers", () => {
    const gauss = exp(i.times(π).div(2)).times("3/7").plus("1/2");
    expect(same(recognise(gauss), exact`1/2 + 3/7 i`)).toBe(true);
    const cubeRoot = exp(i.times(π).times("2/3"));
    expect(same(recognise(cubeRoot), exact`-1/2 + √(-3)/2`)).toBe(true);
  });

  it("says nothing of π, e^π and √2 + √3, and of too few digits", () => {
    for (const x of [π, exp(π), sqrt(2).plus(sqrt(3))]) expect(recognise(x, { height: 1000 })).toBeUndefined();
    expect(recognise(enclose("0.333333", "1e-6"), { height: 1000, spare: 8 })).toBeUndefined();
    expect(recognise(enclose("0.333333", "1e-6"), { height: 1000, spare: 3 })?.value.toString()).toBe("1/3");
    expect(recognise(exp(ln(real(2)).neg()), { height: 1 })).toBeUndefined();
  });

  it("what is exact is proved", () => {
    expect(recognise(real("22/7"))?.standing.kind).toBe("proved");
    expect(same(recognise(complex(1, 2)), exact`1 + 2 i`)).toBe(true);
  });

  it("the simplest rational of an interval — oracle: search by denominators", () => {
    for (const [middle, radius] of [
      ["3.1415", "0.01"],
      ["0.7", "0.003"],
      ["-2.718", "0.0004"],
      ["17.99", "0.001"],
    ] as const) {
      const x = enclose(middle, radius).ball;
      let den = 1n;
      let found: Rational | undefined;
      for (; !found; den++) {
        const q = Rational.of(Rational.parse(middle).times(den).round(), den);
        if (ball.contains(x, q)) found = q;
      }
      expect(simplestRational(x, 10n ** 6n)).toEqual(found);
    }
  });

  it("a reduced basis spans the same lattice and is short — oracle: determinant and Minkowski-type bound of LLL", () => {
    const rows = [
      [1n, 0n, 123456789n],
      [0n, 1n, 987654321n],
      [0n, 0n, 1000000007n],
    ];
    const b = reducedBasis(rows);
    const [p, q, r] = b as [bigint[], bigint[], bigint[]];
    const det =
      p[0]! * (q[1]! * r[2]! - q[2]! * r[1]!) -
      p[1]! * (q[0]! * r[2]! - q[2]! * r[0]!) +
      p[2]! * (q[0]! * r[1]! - q[1]! * r[0]!);
    expect(det < 0n ? -det : det).toBe(1000000007n);
    // |b1| <= 2^(1/2)·det^(1/3) = 1.41·1000
    expect(Math.sqrt(Number(p.reduce((s, v) => s + v * v, 0n)))).toBeLessThan(1415);
  });
});
