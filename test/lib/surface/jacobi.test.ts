import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { provedDigits } from "../../../lib/number/context.ts";
import { exact } from "../../../lib/number/convert.ts";
import { i } from "../../../lib/number/symbols.ts";
import { Complex, Real } from "../../../lib/number/values.ts";
import { DomainError, PoleError } from "../../../lib/proof/errors.ts";
import { jacobi } from "../../../lib/surface/jacobi.ts";
import type { Lattice } from "../../../lib/surface/lattice.ts";
import { legendre } from "../../../lib/surface/legendre.ts";
import { lattice } from "../../../lib/surface/make-lattice.ts";
import type { ModulusInput } from "../../../lib/surface/modulus.ts";
import { type ThetaInput, theta, thetaLogarithmic } from "../../../lib/surface/theta.ts";

const before = provedDigits();
beforeEach(() => {
  provedDigits(20);
});
afterEach(() => {
  provedDigits(before);
});

describe("jacobi in a cell", () => {
  it("prints the digits of the examples — oracle: Abramowitz & Stegun, chapter 16", () => {
    expect(String(jacobi({ m: "81/100" }).dn("1/5"))).toBe("0.98405602896456651553...");
    expect(String(jacobi({ m: "0.64" }).nc("1.9965"))).toBe("-1392.1111443413939383...");
  });

  it("all twelve are quotients of three — oracle: definition, at complex u and complex m", () => {
    const J = jacobi({ m: Complex.from("1/3").plus(i.div(4)) });
    const u = Complex.from("0.4").plus(i.times("0.7"));
    const base: Record<string, Real | Complex> = { s: J.sn(u), c: J.cn(u), d: J.dn(u), n: Real.from(1) };
    for (const p of "scdn") {
      for (const q of "scdn") {
        if (p === q) continue;
        const value = (J[`${p}${q}` as "sn"] as (x: typeof u) => Complex).call(J, u);
        expect(value.overlaps(Complex.from(base[p]!).div(base[q]!)), p + q).toBe(true);
      }
    }
  });

  it("m1 = 10^−40: cn and dn differ in their 41st digit — oracle: dn² − cn² = m1 sn²", () => {
    const J = jacobi({ m1: "1e-40" });
    const [sn, cn, dn] = [J.sn(5), J.cn(5), J.dn(5)].map((x) => x.digits(120)) as [Real, Real, Real];
    provedDigits(120);
    expect(dn.times(dn).minus(cn.times(cn)).overlaps(sn.times(sn).times("1e-40"))).toBe(true);
    expect(dn.greaterThan(cn)).toBe(true);
  });

  it("values at 0 and at its own K are exact; iK′ is a pole — oracle: table DLMF 22.5.1", () => {
    const J = jacobi({ m: "1/3" });
    expect([J.sn(0), J.cn(0), J.sn(J.K), J.cn(J.K), J.cd(J.K)].map(String)).toEqual(["0", "1", "1", "0", "0"]);
    expect(() => J.ns(0)).toThrow(PoleError);
    expect(() => J.sn(i.times(J.K1))).toThrow(PoleError);
  });

  it("k, τ and both nomes lead back to m — oracle: λ by theta functions", () => {
    const J = jacobi({ m: "1/3" });
    for (const input of [{ k: J.k }, { tau: J.tau }, { qTheta: J.qTheta }, { qMod: J.qMod }]) {
      expect(jacobi(input).m.overlaps("1/3"), Object.keys(input)[0]).toBe(true);
    }
  });

  it("inverses, amplitude, ε and Z fit together — oracle: E(am u) by Carlson's integrals", () => {
    const J = jacobi({ m: "7/10" });
    expect(J.sn(J.arcsn("1/2")).overlaps("1/2")).toBe(true);
    expect(J.cn(J.arccn("-1/2")).overlaps("-1/2")).toBe(true);
    expect(legendre.E({ phi: J.am(20), m: "7/10" }).overlaps(J.epsilon(20))).toBe(true);
    expect(J.zeta(J.K.times(2).plus(1)).overlaps(J.zeta(1))).toBe(true);
    expect(String(J.am(20))).toBe("14.998392819909866057...");
  });
});

describe("one modulus by all its names", () => {
  it("m → K, K′, τ, both nomes, k, λ, periods, half-periods, roots, g2 g3, j, J, lattice → m — oracle: there and back", () => {
    for (const m of ["1/3", "1/1000000", "999/1000"]) {
      const J = jacobi({ m });
      const [w1, w2] = [J.K.times(2), i.times(J.K1).times(2)];
      const lattice = J.lattice;
      const names: ModulusInput[] = [
        { m1: J.m1 },
        { k: J.k },
        { lambda: m },
        { tau: J.tau },
        { qTheta: J.qTheta },
        { qMod: J.qMod },
        { periods: [w1, w2] },
        { halfPeriods: [w1.div(2), w2.div(2)] },
        { roots: [J.m1.plus(1), J.m.minus(J.m1), J.m.neg().minus(1)] },
        { invariants: lattice.invariants as unknown as [Real, Real] },
        { lattice },
      ];
      for (const input of names) {
        const back = jacobi(input);
        expect(back.m.overlaps(m), `${m} by ${Object.keys(input)[0]}`).toBe(true);
        expect(back.K.overlaps(J.K)).toBe(true);
        expect(theta(3, { v: "1/5", ...input }).overlaps(theta(3, { v: "1/5", tau: J.tau }))).toBe(true);
      }
      // j and J do not say which of the six values of λ: the least of the real basis is taken.
      for (const input of [{ j: J.j }, { J: J.j.div(1728) }]) expect(jacobi(input).j.overlaps(J.j)).toBe(true);
    }
  });

  it("℘(z) = e3 + (scale·ns(scale·z))² for periods, invariants and lattices, also complex ones — oracle: ℘ by theta jets, DLMF 22.16(ii), 23.6.24", () => {
    const inputs = [
      { periods: [exact`1 + i/7`, exact`1/3 + 2 i`] },
      { halfPeriods: [1, exact`1/5 + i/3`] },
      { invariants: [4, "1/3"] },
      { invariants: ["-3/2", 5] },
    ] as const;
    for (const input of inputs) {
      const [L, J] = [lattice(input), jacobi(input)];
      const z = Complex.from(exact`1/3 + i/11`);
      const ns = J.ns(J.scale.times(z)).times(J.scale);
      expect(L.roots[2].plus(ns.pow(2)).overlaps(L.wp(z)), JSON.stringify(Object.keys(input))).toBe(true);
      expect(J.j.overlaps(L.j)).toBe(true);
      expect(jacobi({ lattice: L }).m.overlaps(J.m)).toBe(true);
    }
  });

  it("exact moduli of exact lattices — oracle: roots 1, 0, −1; λ(i) = 1/2", () => {
    expect(jacobi({ invariants: [4, 0] }).m.exact?.toString()).toBe("1/2");
    expect(jacobi({ halfPeriods: [1, i] }).m.exact?.toString()).toBe("1/2");
    expect(jacobi({ J: 1 }).m.exact?.toString()).toBe("1/2");
    expect(jacobi({ lambda: "1/3" }).j.exact?.toString()).toBe("21952/9");
  });

  it("periods below the axis, a real ratio, no lattice, no lattice of m = 0", () => {
    expect(() => jacobi({ periods: [1, i.neg()] })).toThrow(/ω2\/ω1 = -i, below the real axis.*Exchange the periods/);
    expect(() => jacobi({ periods: [1, 2] })).toThrow(DomainError);
    expect(() => jacobi({ lattice: 3 as unknown as Lattice })).toThrow(/a value of lattice\(/);
    expect(() => jacobi({ m: 0 }).lattice).toThrow(/multiple root/);
  });
});

describe("theta in a cell", () => {
  it("prints the digits of the examples — oracle: π^(1/4)/Γ(3/4), DLMF 20.4", () => {
    expect(String(theta(3, { v: 0, tau: i }))).toBe("1.0864348112133080145...");
    expect(String(theta(1, { z: "3/10", qTheta: "1/10" }))).toBe("0.32355762928491788730...");
    expect(String(theta(1, { z: "3/10", qTheta: "1/10" }, { derivative: 1 }))).toBe("1.0534773539851380299...");
  });

  it("characteristics [0,0], [1/2,0], [0,1/2], [1/2,1/2] are θ3, θ2, θ4, −θ1 — oracle: DLMF 20.2(i), 21.2.9", () => {
    const at = { v: "1/5", tau: i.times("4/3").plus("1/7") };
    expect(theta([0, 0], at).overlaps(theta(3, at))).toBe(true);
    expect(theta(["1/2", 0], at).overlaps(theta(2, at))).toBe(true);
    expect(theta([0, "1/2"], at).overlaps(theta(4, at))).toBe(true);
    expect(theta(["1/2", "1/2"], at).overlaps(theta(1, at).neg())).toBe(true);
  });

  it("the logarithmic derivative is θ′/θ in the named variable — oracle: quotient", () => {
    const at = { z: "1/5", tau: i.times("4/3") };
    const quotient = theta(4, at, { derivative: 1 }).div(theta(4, at) as Real);
    expect(thetaLogarithmic(4, at).overlaps(quotient)).toBe(true);
    expect(() => thetaLogarithmic(1, { v: 0, tau: i })).toThrow(PoleError);
  });

  it("symmetry gives exact zeros; a bare nome, no argument and the lower half plane are refused", () => {
    expect(theta(1, { v: 0, tau: i }).exact?.toString()).toBe("0");
    expect(theta(3, { v: 0, tau: i }, { derivative: 1 }).exact?.toString()).toBe("0");
    expect(() => theta(1, { z: 1, q: "0.1" })).toThrow(/qMod/);
    expect(() => theta(1, { tau: i } as unknown as ThetaInput)).toThrow(/\{ v \} in sin πv/);
    expect(() => theta(1, { v: 1, tau: i.neg() })).toThrow(/Im τ > 0/);
    expect(() => theta(1, { v: 1, tau: i }, { derivative: 1.5 })).toThrow(/an integer from 0/);
  });
});
