import { describe, expect, it } from "vitest";
import { complex, exact, exp, i, lattice, legendre, modular, rational, real, π } from "../../../lib/index.ts";

describe("a lattice from a nome, a modulus or J", () => {
  it("m, k and λ — oracle: ω1 = 2K(m), ω2 = 2iK(1 − m), λ of the ratio", () => {
    for (const m of [rational("1/3"), rational("999/1000"), complex("1/3", "1/2"), complex("-2", "-1")]) {
      const L = lattice({ m });
      expect(L.periods[0].overlaps(legendre.K({ m }).times(2))).toBe(true);
      expect(L.periods[1].overlaps(legendre.K({ m1: m }).times(2).times(i))).toBe(true);
      expect(modular.lambda(L.tau).overlaps(m)).toBe(true);
      expect(L.roots[0].minus(L.roots[2]).overlaps(1)).toBe(true);
    }
    // j = 256 (1 − m + m²)³/(m² (1 − m)²) at m = 1/4.
    expect(`${lattice({ lambda: rational("1/4") }).j} ${lattice({ k: rational("1/2") }).j}`).toBe("35152/9 35152/9");
  });

  it("qTheta, qMod and J — oracle: τ = i and τ = 1 + 2i", () => {
    expect(lattice({ qTheta: exp(π.neg()) }).tau.overlaps(i)).toBe(true);
    expect(lattice({ qMod: exp(π.times(-2)) }).tau.overlaps(i)).toBe(true);
    expect(lattice({ qTheta: exp(π.times(-2)).neg() }).tau.overlaps(complex(1, 2))).toBe(true);
    expect(`${lattice({ J: 2 }).j}`).toBe("3456");
  });

  it("keeps exact periods exact", () => {
    const L = lattice({ periods: [real("0.3"), exact`2i`] });
    expect(L.periods.map(String)).toEqual(["ω1 = 3/10", "ω2 = 2 i"]);
    expect(`${L.at(rational("1/3"), rational("1/2"))}`).toBe("(2ω1 + 3ω2)/6 = 1/10 + i");
  });

  it("refuses a bare nome, nomes outside the disc, m = 0 and 1, and two ways at once", () => {
    expect(() => lattice({ q: 0.1 })).toThrow("lattice: a bare nome q; expected { qTheta } for exp(πiτ) or { qMod }");
    expect(() => lattice({ qTheta: 1 })).toThrow("the nome 1; expected 0 < |q| < 1");
    expect(() => lattice({ qMod: 0 })).toThrow("the nome 0; expected 0 < |q| < 1");
    expect(() => lattice({ m: 1 })).toThrow("the parameter m = 1; expected m other than 0 and 1");
    expect(() => lattice({ m: 1, j: 2 } as never)).toThrow("expected exactly one of");
    expect(() => lattice({ tau: exact`-i` })).toThrow("expected Im τ > 0");
    expect(() => lattice({ tau: 2 })).toThrow("Two periods with a real ratio make no lattice");
    expect(() => lattice({ periods: [4, 3] })).toThrow("ω2/ω1 is real (3/4)");
  });

  it("names the lattice point of a pole", () => {
    const L = lattice({ tau: i });
    expect(() => L.wp(complex(3, -2))).toThrow("the lattice point 3ω1 − 2ω2");
    expect(() => L.zeta(L.at(1, 1))).toThrow("the lattice point ω1 + ω2");
  });
});
