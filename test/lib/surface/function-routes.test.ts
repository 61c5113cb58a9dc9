import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { provedDigits } from "../../../lib/number/context.ts";
import { exact } from "../../../lib/number/convert.ts";
import { i } from "../../../lib/number/symbols.ts";
import { type Complex, Real } from "../../../lib/number/values.ts";
import { zero } from "../../../lib/number/zero.ts";
import { carlson } from "../../../lib/surface/carlson.ts";
import { jacobi } from "../../../lib/surface/jacobi.ts";
import { legendre } from "../../../lib/surface/legendre.ts";
import { modular } from "../../../lib/surface/modular.ts";
import { routesOf, secondRoute } from "../../../lib/surface/second-route.ts";
import { theta, thetaLogarithmic } from "../../../lib/surface/theta.ts";

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
    ["sn(2 | 1/3)", () => jacobi({ m: "1/3" }).sn(2)],
    ["cd(7 | 1/3)", () => jacobi({ m: "1/3" }).cd(7)],
    ["dn(1 + i | 1/3 + 2i)", () => jacobi({ m: exact`1/3 + 2 i` }).dn(exact`1 + i`)],
    ["ε(3 | 1/3)", () => jacobi({ m: "1/3" }).epsilon(3)],
    ["θ1(1/5)", () => theta(1, { v: "1/5", tau: exact`1/3 + i/2` })],
    ["θ[1/3, 1/7]″", () => theta(["1/3", "1/7"], { v: "1/5", tau: exact`1/3 + i/10` }, { derivative: 2 })],
    ["λ(1/3 + 2i)", () => modular.lambda(exact`1/3 + 2 i`)],
    ["j(1/3 + i/2)", () => modular.j(exact`1/3 + i/2`)],
  ];
  it.each(values)("%s agrees with each of its routes to 35 places or more", (_name, make) => {
    const value = make();
    expect(routesOf(value).length).toBeGreaterThan(0);
    for (const name of routesOf(value)) {
      const { agree, digits } = secondRoute(value, name);
      expect(agree, name).toBe(true);
      expect(digits).toBeGreaterThanOrEqual(35);
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

  it("each of the twelve takes its value at 3/4 there only, between 1/2 and 1.1", () => {
    const J = jacobi({ m: "1/3" });
    for (const name of ["sn", "cn", "dn", "ns", "nc", "nd", "sc", "sd", "cs", "cd", "ds", "dc"] as const) {
      const value = J[name]("3/4");
      const x = zero((u) => J[name](u).minus(value) as Real, { between: ["1/2", "11/10"] });
      expect(Real.from(x).overlaps("3/4"), name).toBe(true);
    }
  });

  it("am, ε, arcsn, θ1 and its logarithmic derivative", () => {
    const J = jacobi({ m: "1/3" });
    const cases: [(x: Real) => Real | Complex, string, string][] = [
      [(x) => J.am(x), "1", "3/2"],
      [(x) => J.epsilon(x), "1", "5/2"],
      [(x) => J.arcsn(x), "1/2", "3/5"],
      [(x) => theta(1, { v: x, tau: i }), "1/2", "2/5"],
      [(x) => thetaLogarithmic(1, { v: x, tau: i }), "1/2", "3/5"],
    ];
    for (const [f, value, end] of cases) {
      const x = zero((u) => f(u).minus(value) as Real, { between: ["1/10", end] });
      expect(f(Real.from(x)).overlaps(value), value).toBe(true);
    }
  });

  it("RF(1, 2, x) = 7/10", () => {
    const x = zero((t) => carlson.RF(1, 2, t).minus("7/10") as Real, { between: ["1", "10"] });
    expect(carlson.RF(1, 2, x).overlaps("7/10")).toBe(true);
  });
});
