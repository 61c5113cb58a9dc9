import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { provedDigits } from "../../../lib/number/context.ts";
import { exact } from "../../../lib/number/convert.ts";
import { exp } from "../../../lib/number/functions.ts";
import type { Quadratic } from "../../../lib/number/quadratic.ts";
import type { Rational } from "../../../lib/number/rational.ts";
import { i, π } from "../../../lib/number/symbols.ts";
import { Complex, Real } from "../../../lib/number/values.ts";
import { DomainError } from "../../../lib/proof/errors.ts";
import { jacobi } from "../../../lib/surface/jacobi.ts";
import { modular } from "../../../lib/surface/modular.ts";

const before = provedDigits();
beforeEach(() => {
  provedDigits(20);
});
afterEach(() => {
  provedDigits(before);
});

describe("modular in a cell", () => {
  it("prints the digits of the examples — oracle: Γ(1/4)/(2π^(3/4)) and 3Γ(1/4)^8/(2π)^6", () => {
    expect(String(modular.eta(i))).toBe("0.76822542232605665900...");
    expect(String(modular.E(4, i))).toBe("1.4557628922687093224...");
    expect(modular.E(2, i).overlaps(Real.from(3).div(π))).toBe(true);
  });

  it("j is exact at τ of class number one, whatever the form of the point — oracle: the thirteen values", () => {
    const known: [Complex, string][] = [
      [i, "1728"],
      [Complex.from(exact`2 i`), "287496"],
      [Complex.from(exact`(1+√(-3))/2`), "0"],
      [Complex.from(exact`(1+√(-7))/2`), "-3375"],
      [Complex.from(exact`(1+√(-163))/2`), "-262537412640768000"],
      [Complex.from(exact`(1+√(-163))/82`).plus(7), "-262537412640768000"],
    ];
    for (const [tau, value] of known) expect(modular.j(tau).exact?.toString()).toBe(value);
  });

  it("j of class number two is exact in its real quadratic field — oracle: Weber's tables", () => {
    const known: [Quadratic | Rational, string][] = [
      [exact`√(-5)`, "632000 + 282880 √5"],
      [exact`√(-6)`, "2417472 + 1707264 √2"],
      [exact`√(-15)`, "37018076625/2 + 16554983445/2 √5"],
      [exact`(1+√(-15))/2`, "-191025/2 - 85995/2 √5"],
      [exact`(1+√(-15))/4`, "-191025/2 + 85995/2 √5"],
    ];
    for (const [tau, value] of known) expect(String(modular.j(Complex.from(tau)).exact), String(tau)).toBe(value);
    const { exact: last } = modular.j(exact`(1+√(-427))/2`);
    expect((last as Quadratic).d).toBe(61n);
    expect(modular.j(exact`√(-23)`).exact).toBeUndefined();
  });

  it("λ at quadratic points is exact where it is a quadratic number — oracle: the singular moduli k² of DLMF 19.7 and Ramanujan", () => {
    const known: [Quadratic | Rational, string][] = [
      [exact`i`, "1/2"],
      [exact`1 + i`, "-1"],
      [exact`(1 + i)/2`, "2"],
      [exact`2 i`, "17 - 12 √2"],
      [exact`√(-2)`, "3 - 2 √2"],
      [exact`√(-3)`, "1/2 - 1/4 √3"],
      [exact`√(-7)`, "1/2 - 3/16 √7"],
      [exact`(1 + √(-3))/2`, "1/2 + 1/2 √(-3)"],
      [exact`(1 + √(-7))/2`, "1/32 + 3/32 √(-7)"],
    ];
    for (const [tau, value] of known) {
      expect(String(modular.lambda(Complex.from(tau)).exact), String(tau)).toBe(value);
      const sum = modular.lambda(Complex.from(tau)).plus(modular.lambdaComplement(Complex.from(tau)));
      expect(sum.exact?.toString()).toBe("1");
    }
    expect(modular.lambda(exact`√(-11)`).exact).toBeUndefined();
    expect(jacobi({ tau: i }).m.exact?.toString()).toBe("1/2");
  });

  it("E6(i), E4(ρ) and the symmetric G2 at both are exactly 0 — oracle: weights under the stabilisers", () => {
    const rho = exact`(-1+√(-3))/2`;
    expect(modular.E(6, i).exact?.toString()).toBe("0");
    expect(modular.E(4, rho).exact?.toString()).toBe("0");
    expect(modular.E(6, rho).exact).toBeUndefined();
    expect(modular.G(2, i, { order: "symmetric" }).exact?.toString()).toBe("0");
    expect(modular.G(2, i, { order: "rows" }).overlaps(π)).toBe(true);
    expect(modular.G(2, i, { order: "columns" }).overlaps(π.neg())).toBe(true);
  });

  it("real nomes give Reals: Re τ = 1/2, and j on the unit circle — oracle: q-series with real coefficients", () => {
    const tau = exact`(1+√(-23))/2`;
    for (const value of [modular.j(tau), modular.E(4, tau), modular.E(2, tau), modular.delta(tau)]) {
      expect(value).toBeInstanceOf(Real);
    }
    expect(modular.j(exact`3/5 + 4/5 i`)).toBeInstanceOf(Real);
    expect(modular.j(exact`1/3 + i`)).toBeInstanceOf(Complex);
  });

  it("act and reduce show matrix, factor and multiplier — oracle: η on both sides", () => {
    const moved = modular.act(
      [
        [2, 1],
        [1, 1],
      ],
      exact`i/3`,
    );
    expect(String(moved.tau)).toBe("11/10 + 3/10 i");
    const left = Complex.from(modular.eta(moved.tau));
    const turn = i.times(π).times(moved.etaTwentyFourths).div(12);
    const right = Complex.from(modular.eta(exact`i/3`)).times(Complex.from(moved.factor).sqrt());
    expect(left.overlaps(right.times(Complex.from(exp(turn))))).toBe(true);
    const reduced = modular.reduce(exact`3/10 + 9/10 i`);
    expect(String(reduced.tau)).toBe("-1/3 + i");
    expect(reduced.matrix.flat().map(String)).toEqual(["0", "-1", "1", "0"]);
    expect(() =>
      modular.act(
        [
          [2, 0],
          [0, 1],
        ],
        i,
      ),
    ).toThrow(DomainError);
  });

  it("class polynomials and expansions print as mathematics — oracle: published values", () => {
    expect(String(modular.classPolynomial(-23))).toBe("X^3 + 3491750 X^2 - 5151296875 X + 12771880859375");
    expect(modular.classPolynomial(-47n).classNumber).toBe(5);
    expect(String(modular.expansion("j", { terms: 4 }))).toBe(
      "q_mod^-1 + 744 + 196884 q_mod + 21493760 q_mod^2 + O(q_mod^3)",
    );
    const delta = modular.expansion("delta", { terms: 10 });
    expect([2, 3, 0].map((n) => String(delta.coefficient(n)))).toEqual(["-24", "252", "0"]);
    expect(() => delta.coefficient(11)).toThrow(RangeError);
    expect(String(modular.expansion({ E: 4 }, { terms: 3 }))).toBe("1 + 240 q_mod + 2160 q_mod^2 + O(q_mod^3)");
  });

  it("refusals: the lower half plane, a real τ, G2 without an order, an unknown name", () => {
    expect(() => modular.j(i.neg())).toThrow(/τ = -i/);
    expect(() => modular.eta(2)).toThrow(DomainError);
    expect(() => modular.G(2, i)).toThrow(/order of summation/);
    expect(() => modular.E(5, i)).toThrow(/even integer/);
    expect(() => modular.expansion("zeta" as "eta", { terms: 3 })).toThrow(/"theta2"/);
  });
});
