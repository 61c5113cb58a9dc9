import { describe, expect, it } from "vitest";
import { Complex, complex, curve, exact, lattice, rational } from "../../../lib/index.ts";
import { DomainError } from "../../../lib/proof/errors.ts";

const z = complex("0.31", "0.17");

describe("an elliptic function as σ-quotient, ζ-sum and rational function — oracle: the values of the rational form", () => {
  for (const [name, L] of [
    ["real", lattice({ invariants: [4, -1] })],
    ["skew", lattice({ tau: exact`1/3 + 5/4 i` })],
  ] as const) {
    const c = L.at(rational("1/3"), 0);
    const d = L.at(rational("1/5"), rational("2/7"));
    const functions = {
      ℘: L.wp,
      "℘′": L.wp.prime,
      "℘″": L.wp.derivative(2),
      "℘² + 3℘′ − 2": L.wp.pow(2).plus(L.wp.prime.times(3)).minus(2),
      "1/(℘ − 2)": L.wp.minus(2).pow(-1),
      "given zeros and poles": L.elliptic({ zeros: [c, c, c.times(-2)], poles: [0, d, d.neg()] }),
    };
    for (const [formula, f] of Object.entries(functions)) {
      it(`${formula}, ${name} lattice`, () => {
        const [sigma, zeta] = [f.as("sigma"), f.as("zeta")];
        expect(sigma(z).overlaps(f(z))).toBe(true);
        expect(zeta(z).overlaps(f(z))).toBe(true);
        expect(sigma.as("rational")).toBe(f);
        expect(zeta.as("sigma")(z).overlaps(f(z))).toBe(true);
        expect(sigma.zeros.reduce((n, { multiplicity }) => n + multiplicity, 0)).toBe(f.order);
      });
    }
    it(`principal parts, ${name} lattice: the ζ-sum gives the parts back, and makes the function again`, () => {
      const parts = [
        { at: 0, coefficients: [1, 2] },
        { at: c, coefficients: [-1, 0, 3] },
      ];
      const f = L.elliptic({ principalParts: parts, constant: 5 });
      const zeta = f.as("zeta");
      expect(zeta(z).overlaps(f(z))).toBe(true);
      expect(`${zeta.constant}`).toBe("5");
      expect(`${f.residue(c)} ${f.residue(0)}`).toBe("-1 1");
      expect(f.laurent(c, 3).coefficients.map(String)).toEqual(["3", "0", "-1"]);
      expect(f.order).toBe(5);
      const again = L.elliptic({
        principalParts: zeta.parts.map(({ at, coefficients }) => ({ at, coefficients })),
        constant: zeta.constant,
      });
      expect(again(z).overlaps(f(z))).toBe(true);
    });
  }

  it("residues of a function with given zeros and poles add up to 0 — oracle: the residue theorem", () => {
    const L = lattice({ invariants: [4, -1] });
    const [c, d] = [L.at(rational("1/3"), 0), L.at(rational("1/5"), rational("2/7"))];
    const f = L.elliptic({ zeros: [c, c, c.times(-2)], poles: [0, d, d.neg()] });
    const sum = f.residue(0).plus(f.residue(d)).plus(f.residue(d.neg()));
    expect(sum.overlaps(0)).toBe(true);
    expect(sum.abs().minus("1e-18").sign()).toBe(-1);
  });

  it("refuses another form, and two parts at one point", () => {
    const L = lattice({ invariants: [4, -1] });
    expect(() => L.wp.as("theta" as "sigma")).toThrow('as: "theta"; expected "rational", "sigma" or "zeta"');
    const parts = [
      { at: 0, coefficients: [1] },
      { at: L.at(1, 0), coefficients: [-1] },
    ];
    expect(() => L.elliptic({ principalParts: parts })).toThrow("two principal parts at ω1");
  });
});

describe("the algebraic relation of two functions", () => {
  const L = lattice({ invariants: [4, -1] });
  it("℘ and ℘′, ℘ and ℘(2z), ℘′ and ℘″ — oracle: the differential equations by hand", () => {
    expect(`${L.wp.relation(L.wp.prime)}`).toBe("Y² − 4X³ + 4X − 1 = 0");
    expect(`${L.wp.relation(L.wp.pow(2))}`).toBe("Y − X² = 0");
    expect(`${L.wp.relation(L.wp.multiple(2))}`).toBe("4X³Y − 4XY + Y − X⁴ − 2X² + 2X − 1 = 0");
    const [f, g] = [L.wp.prime, L.wp.derivative(2)];
    const relation = f.relation(g);
    expect(relation.degrees).toEqual([4, 3]);
    expect(relation.at(f, g).equals(0)).toBe(true);
    expect(relation.at(f, g.plus(1)).equals(0)).toBe(false);
    expect(relation.standing.kind).toBe("proved");
    expect(`${L.wp.relation(L.wp.times(0).plus(3))}`).toBe("Y − 3 = 0");
  });

  it("asks for exact coefficients", () => {
    const M = lattice({ tau: exact`1/3 + i` });
    expect(() => M.wp.relation(M.wp.prime)).toThrow(DomainError);
    expect(() => L.wp.relation(M.wp)).toThrow("functions of two lattices");
  });
});

describe("multiplication by a CM number as a rational function", () => {
  it("i, 1 + i, 2 + i on the square lattice — oracle: ℘(iz) = −℘(z), and ℘ at αz", () => {
    const S = lattice({ invariants: [4, 0] });
    expect(`${S.wp.multiple(exact`i`)}`).toBe("−℘");
    // ℘((1+i)z) = −(i/2)(℘ − 1/℘) by ℘(2z) and ℘(iz).
    expect(S.wp.multiple(exact`1 + i`).equals(S.wp.minus(S.wp.pow(-1)).times(exact`-1/2 i`))).toBe(true);
    const composed = S.wp.multiple(exact`1 + i`).multiple(exact`1 - i`);
    expect(composed.equals(S.wp.multiple(2))).toBe(true);
    for (const a of [exact`2 + i`, exact`-1 + 2i`]) {
      expect(S.wp.multiple(a).order).toBe(10);
      expect(
        S.wp
          .multiple(a)(z)
          .overlaps(S.wp(z.times(a))),
      ).toBe(true);
      expect(
        S.wp.prime
          .multiple(a)(z)
          .overlaps(S.wp.prime(z.times(a))),
      ).toBe(true);
    }
  });

  it("√−2, (1+√−7)/2 and √−3 — oracle: ℘ at αz", () => {
    for (const [L, a] of [
      [curve`y^2 = x^3 + 4x^2 + 2x`.lattice(), exact`√-2`],
      [lattice({ j: -3375 }), exact`(1+√-7)/2`],
      [lattice({ invariants: [0, 1] }), exact`√-3`],
    ] as const) {
      expect(
        L.wp
          .multiple(a)(z)
          .overlaps(L.wp(z.times(a))),
      ).toBe(true);
    }
  });

  it("refuses what is no multiplication", () => {
    const L = lattice({ invariants: [4, -1] });
    expect(() => L.wp.multiple(exact`1 + i`)).toThrow("expected a complex multiplication of the lattice");
    expect(() => L.wp.multiple("0.5")).toThrow("n = 0.5; expected an integer other than 0");
    expect(() => L.wp.multiple(exact`√5`)).toThrow(DomainError);
    expect(() => L.wp.multiple(0)).toThrow(DomainError);
    expect(() => lattice({ tau: exact`2i` }).wp.multiple(exact`2i`)).toThrow("g2 and g3 are not both known exactly");
  });
});

describe("the inverse of ℘ with its choices", () => {
  const L = lattice({ invariants: [4, -1] });
  it("sign, component and line — oracle: ℘ and ℘′ at the answer", () => {
    for (const sign of [1, -1] as const) {
      const p = L.wp.inverse(2, { sign, component: "identity", line: "real" });
      expect(L.wp(p).overlaps(2)).toBe(true);
      expect(L.wp.prime(p).overlaps(5 * sign)).toBe(true);
      const b = L.wp.inverse(0, { sign, component: "bounded" });
      expect(L.wp.prime(b).overlaps(sign)).toBe(true);
      expect(b.im.overlaps(L.periods[1].im.div(2))).toBe(true);
      const t = L.wp.inverse(-3, { sign, line: "imaginary" });
      expect(`${t.re}`).toBe("0");
      expect(Complex.from(L.wp.prime(t)).im.sign()).toBe(sign);
    }
  });

  it("refuses values that do not lie where they should", () => {
    expect(() => L.wp.inverse(2, { component: "bounded" })).toThrow(
      "lies over the identity component; expected e3 <= w <= e2",
    );
    expect(() => L.wp.inverse(-3, { line: "real" })).toThrow("where ℘′ is imaginary");
    expect(() => L.wp.inverse(rational("1/2"), { component: "identity" })).toThrow(
      "where ℘′ is not real; expected w >= e1",
    );
    expect(() => L.wp.inverse(complex(0, 1), { sign: 1 })).toThrow("expected a real w and a real lattice");
    expect(() => L.wp.inverse(2, { sign: 2 as 1 })).toThrow("sign: 2; expected 1 or −1");
    expect(() => lattice({ invariants: [1, 1] }).wp.inverse(5, { component: "bounded" })).toThrow(
      "expected two components",
    );
  });
});
