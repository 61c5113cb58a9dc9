import { describe, expect, it } from "vitest";
import { complex, rational, real } from "../../../lib/number/convert.ts";
import { Quadratic } from "../../../lib/number/quadratic.ts";
import { DomainError } from "../../../lib/proof/errors.ts";
import { homothety } from "../../../lib/surface/homothety.ts";
import { lattice } from "../../../lib/surface/make-lattice.ts";

describe("an overlattice of index 3 of the lattice of y² + xy + 2y = x³", () => {
  const L = lattice({ invariants: ["-47/12", "-793/216"] });
  const c = L.at(rational("1/3"), 0);
  const M = L.overlattice(c);

  it("has the invariants of y² + xy + 2y = x³ − 10x − 30 — oracle: c4 = 433, c6 = 24407 by hand", () => {
    expect(M.invariants[0].overlaps("433/12")).toBe(true);
    expect(M.invariants[1].overlaps("24407/216")).toBe(true);
    expect(M.within?.index).toBe(3n);
    expect(M.shape).toBe("rhombic");
  });

  it("has ℘(z) + Σ (℘(z ± c) − ℘(c)) as its ℘ — oracle: Vélu's sum", () => {
    const z = complex("0.41", "0.27");
    const sum = L.wp(z)
      .plus(L.wp(c.plus(z)))
      .plus(L.wp(c.neg().plus(z)))
      .minus(L.wp(c).times(2));
    // X = ℘ − 1/12 of a worked example to 40 digits.
    expect(sum.overlaps(M.wp(z))).toBe(true);
    expect(
      M.wp(z)
        .minus("1/12")
        .overlaps(
          complex("1.552895053477971330140422431883694307760...", "-3.254714491679287564674934806820147140957..."),
        ),
    ).toBe(true);
  });

  it("refuses a number beside a point of order 3, and scales the area by the index for a sublattice", () => {
    expect(() => L.overlattice(c.plus(real("1e-9")))).toThrow(
      "3p differs from the lattice point ω1 by 3.0e-9: not torsion",
    );
    const S = L.sublattice([
      [2, 0],
      [1, 3],
    ]);
    expect(S.within?.index).toBe(6n);
    expect(S.area.overlaps(L.area.times(6))).toBe(true);
  });
});

describe("overlattices of index 3", () => {
  const L = lattice({ invariants: ["-47/12", "-793/216"] });
  const list = L.overlattices(3);

  it("are four, one of them with c4 = 433, one more real — oracle: the roots of T³ + 4381T² + 2440387T − 45808987617", () => {
    expect(list.length).toBe(4);
    expect(list.filter((M) => M.invariants[0].overlaps("433/12")).length).toBe(1);
    expect(list.filter((M) => M.realComponents !== undefined).length).toBe(2);
    for (const M of list) {
      const T = M.invariants[0].times(12);
      if (T.overlaps(433)) continue;
      const value = T.pow(3).plus(T.pow(2).times(4381)).plus(T.times(2440387)).minus(45808987617);
      expect(value.overlaps(0)).toBe(true);
    }
  });

  it("hold the lattice with index 3, and not each other: the fractions are shown", () => {
    for (const M of list) expect(L.indexIn(M)).toBe(3n);
    expect(() => list[0]!.indexIn(list[1]!)).toThrow(/coordinates \(.*\/3.*expected integers/);
    expect(() => list[0]!.indexIn(L)).toThrow("/3");
    expect(L.sublattices(2).length).toBe(3);
  });
});

describe("complex multiplication — oracle: the thirteen rational values, and two conjugate ones of class number two", () => {
  const cases = [
    [16581375, -28n],
    [0, -3n],
    [1728, -4n],
    [8000, -8n],
    [-3375, -7n],
    [Quadratic.of(rational("-191025/2"), rational("-85995/2"), 5), -15n],
    [Quadratic.of(rational("-191025/2"), rational("85995/2"), 5), -15n],
  ] as const;
  for (const [j, D] of cases) {
    it(`j = ${String(j)}: ${D}`, () => {
      const answer = lattice({ j }).complexMultiplication();
      expect([answer.outcome, answer.discriminant]).toEqual(["yes", D]);
      expect(answer.standing.kind).toBe("proved");
    });
  }

  it("a τ that is i√7 is decided by its equation, one that only looks quadratic is not", () => {
    expect(lattice({ tau: complex(0, real(7).sqrt()) }).complexMultiplication().discriminant).toBe(-28n);
    const near = lattice({ j: "1437480000001/5000000" }).complexMultiplication();
    expect(near.outcome).toBe("no");
    expect(near.reason).toContain("not an algebraic integer");
  });

  it("an integral j that is none of the thirteen is refuted; digits alone are said to be consistent or excluded", () => {
    expect(lattice({ j: 790272 }).complexMultiplication().outcome).toBe("no");
    const root = lattice({ tau: complex(0, real(2).sqrt().sqrt()) }).complexMultiplication();
    expect(root.outcome).toBe("excluded");
    const measured = lattice({ tau: complex(0, real("2.64575131106459059050161575 ± 1e-25")) });
    expect(measured.complexMultiplication()).toMatchObject({ outcome: "consistent", discriminant: -28n });
  });
});

describe("homothety", () => {
  it("of two twists is proved by equal j, with α² = −1/5 — oracle: g2 of one over g2 of the other is α^−4", () => {
    // y² = x³ + 15x² − 14800x + 624000 and y² = x³ − 595x − 5586
    const A = lattice({ invariants: [59500, 2793000] });
    const B = lattice({ invariants: [2380, 22344] });
    const alpha = homothety(A, B);
    expect(alpha.standing.kind).toBe("proved");
    expect(alpha.factor.pow(4).times(B.invariants[0]).overlaps(A.invariants[0])).toBe(true);
  });

  it("of lattices with different j is refused with both", () => {
    const [L, M] = [lattice({ j: 8000 }), lattice({ j: 1728 })];
    expect(() => homothety(L, M)).toThrow(DomainError);
    expect(() => homothety(L, M)).toThrow("j = 8000 and j = 1728");
  });
});
