import { describe, expect, it } from "vitest";
import { agm, complex, curve, exact, i, lattice, rational, real } from "../../../lib/index.ts";
import { Rational } from "../../../lib/number/rational.ts";
import type { Complex, Real } from "../../../lib/number/values.ts";
import { type Entry, entries } from "../lattice/fixture.ts";

describe("Laurent coefficients of ℘ and σ at 0, exact over Q — oracle: stored table, DLMF 23.9", () => {
  for (const { id, input, expected } of entries("weierstrass.json", "laurent_coefficients")) {
    it(id, () => {
      const L = lattice({ invariants: [rational(input.g2), rational(input.g3)] });
      for (const [name, f] of [
        ["p", L.wp],
        ["sigma", L.sigma],
      ] as const) {
        const series = f.laurent(0, 45);
        for (const [exponent, value] of expected[name] as [number, string][]) {
          const got = series.coefficient(exponent).exact;
          expect(got?.equals(Rational.parse(value)), `${name} ${exponent}: ${got} against ${value}`).toBe(true);
        }
      }
      // ζ′ = −℘
      const [zeta, wp] = [L.zeta.laurent(0, 40), L.wp.laurent(0, 40)];
      for (let n = -2; n < 36; n++) {
        const derived = zeta.coefficient(n + 1).times(n + 1).exact!;
        expect(derived.equals(wp.coefficient(n).neg().exact as Rational)).toBe(true);
      }
    });
  }
});

describe("special constants — oracle: stored table, 50 digits", () => {
  const value = ({ input }: Entry): Real | Complex => {
    const what: string = input.what;
    if (what.includes("int_0^1")) return lattice({ invariants: [4, 0] }).periods[0].re;
    if (what.includes("agm")) return real(1).div(agm(1, real(2).sqrt()));
    const tau = input.period2 === "exp(i pi/3)" ? exact`(1+√-3)/2` : i;
    const L = input.g2 === undefined ? lattice({ tau }) : lattice({ invariants: [input.g2, input.g3] });
    const half = L.halfPeriods[0];
    if (what === "g2") return L.invariants[0];
    if (what === "g3") return L.invariants[1];
    if (what.startsWith("p(")) return L.wp(rational("1/2"));
    if (what.startsWith("zeta")) return L.zeta(half);
    if (what.startsWith("sigma")) return L.sigma(half);
    return what.startsWith("half") ? half.re : L.roots[0];
  };
  for (const entry of entries("weierstrass.json", "special_constant")) {
    it(`${entry.id} ${entry.input.name}`, () => {
      const got = value(entry).digits(52);
      const gap = got.minus(real(entry.expected)).abs();
      expect(gap.minus(real("1e-48").times(real(entry.expected).abs())).sign(), `${got}`).toBe(-1);
    });
  }
});

describe("series at any point", () => {
  const L = lattice({ invariants: [4, -1] });
  const t = real("0.01");

  it("sum to the function beside the point — oracle: the function at p + t", () => {
    for (const f of [L.wp, L.wp.prime, L.zeta, L.sigma]) {
      for (const p of [
        L.at(1, 1),
        L.at(-2, 1),
        L.at(rational("1/3"), rational("1/2")),
        complex("0.3", "0.2"),
        L.halfPeriods[2],
      ]) {
        const series = f.laurent(p, 24);
        const sum = series.coefficients.reduce<Real | Complex>(
          (s, c, k) => s.plus(c.times(t.pow(series.order + k))),
          real(0),
        );
        const gap = sum.minus(f(L.at(0, 0).plus(p).plus(t))).abs();
        expect(gap.minus(real("1e-18")).sign(), `${f} at ${p}: ${gap}`).toBe(-1);
      }
    }
  });

  it("is exact at the logarithm of a rational point — oracle: ℘″ = 6℘² − g2/2 by hand", () => {
    const p = L.logarithm(2, 5);
    expect(`${L.wp.laurent(p, 5)}`).toBe("2 + 5 t + 11 t^2 + 20 t^3 + (69/2) t^4 + O(t^5)");
    expect(`${L.wp.minus(2).laurent(p, 3)}`).toBe("5 t + 11 t^2 + 20 t^3 + O(t^4)");
    expect(`${L.wp.minus(2).pow(-1).laurent(p, 2)}`).toBe("(1/5) t^-1 − 11/25 + O(t)");
  });

  it("is exact at rational points of finite order — oracle: the multiples of (0, 0) on y² + y = x³ − x², by hand", () => {
    const M = curve`y^2 + y = x^3 - x^2`.lattice();
    const values = [1, 2, 3, 4].map((k) => M.at(rational(`${k}/5`), 0)).map((p) => `${M.wp(p)} ${M.wp.prime(p)}`);
    // x = ℘ + 1/3, 2y + 1 = ℘′ on (1, 0), (0, 0), (0, −1), (1, −1).
    expect(values).toEqual(["2/3 -1", "-1/3 -1", "-1/3 1", "2/3 1"]);
    expect(`${M.wp.laurent(M.at(rational("1/5"), 0), 3)}`).toBe("2/3 − t + t^2 + O(t^3)");
    expect(M.wp(M.at(rational("1/7"), 0)).exact).toBeUndefined();
    // The overlattice by this point is the lattice of y² + y = x³ − x² − 10x − 20: c4 = 496, c6 = 20008.
    expect(M.overlattice(M.at(rational("1/5"), 0)).invariants.map(String)).toEqual(["124/3", "2501/27"]);
  });

  it("knows the zeros that symmetry makes", () => {
    expect(`${lattice({ tau: i }).invariants[1]} ${lattice({ tau: i }).j}`).toBe("0 1728");
    expect(`${lattice({ tau: exact`(1+√-163)/2` }).j}`).toBe("-262537412640768000");
    expect(`${lattice({ tau: exact`√-2` }).j}`).toBe("8000");
  });

  it("prints signs as in print", () => {
    expect(`${L.wp.pow(2).minus(L.wp.prime.times(3)).laurent(0, 4)}`).toBe("t^-4 + 6 t^-3 + O(1)");
    expect(`${L.wp.pow(2).plus(L.wp.prime.times(3)).laurent(0, 4)}`).toBe("t^-4 − 6 t^-3 + O(1)");
  });
});

describe("n-fold formulas", () => {
  it("n z by division polynomials — oracle: ℘ at n z", () => {
    const L = lattice({ tau: exact`1/3 + 5/4 i` });
    const z = complex("0.31", "0.17");
    for (const n of [-3, 2, 3, 4, 5, 7]) {
      expect(
        L.wp
          .multiple(n)(z)
          .overlaps(L.wp(z.times(n))),
      ).toBe(true);
      if (Math.abs(n) < 4)
        expect(
          L.wp.prime
            .multiple(n)(z)
            .overlaps(L.wp.prime(z.times(n))),
        ).toBe(true);
    }
  });

  it("duplication over Q — oracle: DLMF 23.10.7 by hand", () => {
    const L = lattice({ invariants: [4, -1] });
    expect(`${L.wp.multiple(2)}`).toBe("((1/4)℘⁴ + (1/2)℘² − (1/2)℘ + 1/4)/(℘³ − ℘ + 1/4)");
    expect(L.wp.multiple(2).multiple(2).equals(L.wp.multiple(4))).toBe(true);
    expect(L.wp.multiple(5).order).toBe(50);
  });
});
