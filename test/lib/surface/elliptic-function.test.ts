import { describe, expect, it } from "vitest";
import { complex, enclose } from "../../../lib/number/convert.ts";
import type { Complex } from "../../../lib/number/values.ts";
import { PoleError } from "../../../lib/proof/errors.ts";
import { lattice } from "../../../lib/surface/make-lattice.ts";

const LATTICES = {
  "rational invariants 4, −1": lattice({ invariants: [4, -1] }),
  "rational roots 2, 1, −3": lattice({ invariants: [28, -24] }),
  "periods 1, 0.3 + 1.2i": lattice({ periods: [1, complex("0.3", "1.2")] }),
  "Gaussian invariants": lattice({ invariants: [complex(1, 1), complex(0, 2)] }),
};

for (const [name, L] of Object.entries(LATTICES)) {
  describe(`functions of the lattice with ${name}`, () => {
    const p = L.wp;
    const q = p.prime;
    const [g2, g3] = L.invariants;
    const z = complex("0.31", "0.17");

    it("℘′² = 4℘³ − g2 ℘ − g3 by normal forms, and a wrong g3 is refuted", () => {
      const right = p.pow(3).times(4).minus(p.times(g2)).minus(g3);
      expect(q.pow(2).equals(right)).toBe(true);
      expect(q.pow(2).equals(right.plus("1e-30"))).toBe(false);
    });

    it("℘′² = 4(℘ − e1)(℘ − e2)(℘ − e3) by the relations of the roots", () => {
      const [e1, e2, e3] = L.roots;
      expect(p.minus(e1).times(p.minus(e2)).times(p.minus(e3)).times(4).equals(q.pow(2))).toBe(true);
    });

    it("℘″ = 6℘² − g2/2 and the fourth derivative 120℘³ − 18 g2 ℘ − 12 g3 — oracle: DLMF 23.3.12 derived twice", () => {
      expect(p.derivative(2).equals(p.pow(2).times(6).minus(g2.div(2)))).toBe(true);
      const fourth = p.pow(3).times(120).minus(p.times(g2).times(18)).minus(g3.times(12));
      expect(p.derivative(4).equals(fourth)).toBe(true);
    });

    it("a quotient has the value of its parts, its inverse the reciprocal", () => {
      const f = q.plus(1).div(p.pow(2).minus(3));
      const parts = q(z).plus(1).div(p(z).pow(2).minus(3));
      expect(f(z).overlaps(parts)).toBe(true);
      expect(f.times(f.pow(-1)).equals(1)).toBe(true);
    });

    it("zeros and poles balance in number and lie where the function says — oracle: Abel's theorem", () => {
      const f = q.plus(1).div(p);
      const count = (list: typeof f.zeros) => list.reduce((sum, { multiplicity }) => sum + multiplicity, 0);
      expect(count(f.zeros)).toBe(f.order);
      for (const { point } of f.zeros) expect(f(point).overlaps(0)).toBe(true);
      const sum = (list: typeof f.zeros) =>
        list.reduce<Complex>((total, { point, multiplicity }) => total.plus(point.times(multiplicity)), complex(0));
      const { rest } = L.locate(sum(f.zeros).minus(sum(f.poles)));
      expect(rest.overlaps(0)).toBe(true);
    });

    it("residues add up to 0 — oracle: the residue theorem", () => {
      const f = q.plus(1).div(p);
      const total = f.poles.map(({ point }) => f.residue(point)).reduce((a, b) => (a as Complex).plus(b));
      expect(total.overlaps(0)).toBe(true);
    });

    it("the Laurent series at 0 begins t^−2 + g2/20 t² + g3/28 t⁴ + g2²/1200 t⁶ — oracle: DLMF 23.9.2", () => {
      const series = p.laurent(0, 9);
      expect(series.order).toBe(-2);
      expect(series.coefficient(2).overlaps(g2.div(20))).toBe(true);
      expect(series.coefficient(4).overlaps(g3.div(28))).toBe(true);
      expect(series.coefficient(6).overlaps(g2.pow(2).div(1200))).toBe(true);
      expect(`${series.coefficient(1)}`).toBe("0");
    });

    it("1/(℘ − e1) has a double pole at ω1/2 without residue, leading coefficient 2/℘″(ω1/2)", () => {
      const f = p.minus(L.roots[0]).pow(-1);
      const series = f.laurent(L.halfPeriods[0], 3);
      expect(series.order).toBe(-2);
      expect(`${series.residue}`).toBe("0");
      expect(series.coefficients[0]!.times(p.derivative(2)(L.halfPeriods[0])).overlaps(2)).toBe(true);
    });

    it("℘ of the inverse is the number again, with the chosen ℘′", () => {
      const w = complex("0.7", "-0.2");
      const back = p.inverse(w);
      expect(p(back).overlaps(w)).toBe(true);
      const other = p.inverse(w, { prime: q(back).neg() });
      expect(L.locate(back.plus(other)).rest.overlaps(0)).toBe(true);
    });
  });
}

describe("values at lattice points", () => {
  const L = LATTICES["rational invariants 4, −1"];

  it("are exact where the function is finite: ℘′²/℘³ = 4, 1/℘ = 0", () => {
    expect(`${L.wp.prime.pow(2).div(L.wp.pow(3))(L.at(0, 0))}`).toBe("4");
    expect(`${L.wp.pow(-1)(L.at(2, 1))}`).toBe("0");
    expect(() => L.wp.prime.div(L.wp)(L.at(0, 0))).toThrow(PoleError);
  });
});

describe("real points on real lattices", () => {
  const L = LATTICES["rational invariants 4, −1"];

  it("zeros of ℘ lie on ω2/2 + R: their imaginary part is that of ω2/2", () => {
    for (const { point } of L.wp.zeros) expect(point.im.overlaps(L.periods[1].im.div(2))).toBe(true);
  });

  it("{ prime } that is no value of ℘′ over w is refused, not used — oracle: ℘′² = 4·4³ − 28·4 − 24 = 120 for the roots 3, −1, −2", () => {
    const T = lattice({ roots: [3, -1, -2] });
    expect(() => T.wp.inverse(4, { prime: -1 })).toThrow(/℘′ = -1 where ℘ = 4; expected 10\.954451/);
    const rough = T.wp.inverse(4, { prime: enclose("-10.95", "0.01") });
    expect(`${rough.digits(30)}`).toBe(`${T.wp.inverse(4).digits(30)}`);
    expect(T.wp.prime(rough).pow(2).overlaps(120)).toBe(true);
  });

  it("the inverse of a large number is a small positive real number", () => {
    const z = L.wp.inverse(100);
    expect(z.isReal).toBe(true);
    expect(z.re.greaterThan(0)).toBe(true);
  });
});
