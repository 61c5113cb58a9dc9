import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { provedDigits } from "../../../lib/number/context.ts";
import { type Complex, Real } from "../../../lib/number/values.ts";
import { zero } from "../../../lib/number/zero.ts";
import { carlson } from "../../../lib/surface/carlson.ts";
import { jacobi } from "../../../lib/surface/jacobi.ts";
import { legendre } from "../../../lib/surface/legendre.ts";
import { routesOf, secondRoute } from "../../../lib/surface/second-route.ts";

const before = provedDigits();
beforeEach(() => {
  provedDigits(40);
});
afterEach(() => {
  provedDigits(before);
});

describe("second routes of integrals — oracle: another formula for the same value", () => {
  const values: [string, () => Real | Complex][] = [
    ["RF(1, 2, 3)", () => carlson.RF(1, 2, 3)],
    ["RF(0, 2, 3)", () => carlson.RF(0, 2, 3)],
    ["RF(10^-300, 2, 3)", () => carlson.RF("1e-300", 2, 3)],
    ["RF(1, 3, 3)", () => carlson.RF(1, 3, 3)],
    ["RC(1, 2)", () => carlson.RC(1, 2)],
    ["RC(2, 1)", () => carlson.RC(2, 1)],
    ["RC(0, 1)", () => carlson.RC(0, 1)],
    ["RD(1, 2, 3)", () => carlson.RD(1, 2, 3)],
    ["RG(0, 2, 3)", () => carlson.RG(0, 2, 3)],
    ["RJ(1, 2, 3, 4)", () => carlson.RJ(1, 2, 3, 4)],
    ["RJ(1, 2, 3, 1/2)", () => carlson.RJ(1, 2, 3, "1/2")],
    ["RJ(1, 2, 3, 5/2)", () => carlson.RJ(1, 2, 3, "5/2")],
    ["K(1/2)", () => legendre.K({ m: "1/2" })],
    ["K(−10^20)", () => legendre.K({ m: "-1e20" })],
    ["E(1/2)", () => legendre.E({ m: "1/2" })],
    ["E(m1 = 10^−50)", () => legendre.E({ m1: "1e-50" })],
    ["D(1/2)", () => legendre.D({ m: "1/2" })],
    ["B(−1/2)", () => legendre.B({ m: "-1/2" })],
  ];
  it.each(values)("%s agrees with each of its routes to 38 digits or more", (_name, make) => {
    const value = make();
    expect(routesOf(value).length).toBeGreaterThan(0);
    for (const name of routesOf(value)) {
      const { agree, digits } = secondRoute(value, name);
      expect(agree, name).toBe(true);
      expect(digits).toBeGreaterThanOrEqual(38);
    }
  });
});

describe("zeros of functions of this half — oracle: the inverse function, or the value put in", () => {
  it("F(φ | 1/2) = 1 has φ = am(1)", () => {
    const phi = zero((x) => legendre.F({ phi: x, m: "1/2" }).minus(1) as Real, { between: ["1/10", "3/2"] });
    expect(jacobi({ m: "1/2" }).am(1).overlaps(phi)).toBe(true);
  });

  it("K(m) = 2, E(m) = 5/4, F(1 | m) = 11/10 and E(1 | m) = 9/10 are met by the m found", () => {
    const cases: [(m: Real) => Real | Complex, string][] = [
      [(m) => legendre.K({ m }), "2"],
      [(m) => legendre.E({ m }), "5/4"],
      [(m) => legendre.F({ phi: 1, m }), "11/10"],
      [(m) => legendre.E({ phi: 1, m }), "9/10"],
    ];
    for (const [f, value] of cases) {
      const m = zero((x) => f(x).minus(value) as Real, { between: ["1/10", "9/10"] });
      expect(f(Real.from(m)).overlaps(value), value).toBe(true);
    }
  });

  it("RF(1, 2, x) = 7/10", () => {
    const x = zero((t) => carlson.RF(1, 2, t).minus("7/10") as Real, { between: ["1", "10"] });
    expect(carlson.RF(1, 2, x).overlaps("7/10")).toBe(true);
  });
});
