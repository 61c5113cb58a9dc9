// Functions given by principal parts in their three forms.
import { describe, expect, it } from "vitest";
import { complex, enclose, exact, lattice, rational } from "../../../lib/index.ts";
import { UndecidedError } from "../../../lib/proof/errors.ts";

const z = complex("0.31", "0.17");

describe("principal parts as σ-quotient and ζ-sum — oracle: the values of the rational form", () => {
  for (const [name, L] of [
    ["real", lattice({ invariants: [4, -1] })],
    ["skew", lattice({ tau: exact`1/3 + 5/4 i` })],
  ] as const) {
    const c = L.at(rational("1/3"), 0);
    const d = L.at(rational("1/5"), rational("2/7"));
    const [e, g] = [L.at(rational("1/2"), 0), L.at(rational("1/2"), rational("1/2"))];
    const cases = {
      "a double pole at 0, a triple one at ω1/3": [
        { at: 0, coefficients: [1, 2] },
        { at: c, coefficients: [-1, 0, 3] },
      ],
      "simple poles at ±ω1/3: an even function": [
        { at: c, coefficients: [1] },
        { at: c.neg(), coefficients: [-1] },
      ],
      "double poles at ±ω1/3, even": [
        { at: c, coefficients: [0, 1] },
        { at: c.neg(), coefficients: [0, 1] },
      ],
      "poles of two orders at ±ω1/3": [
        { at: c, coefficients: [1, 2] },
        { at: c.neg(), coefficients: [-1] },
      ],
      "half-periods": [
        { at: e, coefficients: [2] },
        { at: g, coefficients: [-2, 0, 1] },
      ],
      "℘ moved by half a period": [{ at: e, coefficients: [0, 1] }],
      "one triple pole": [{ at: d, coefficients: [0, 0, 1] }],
      numbers: [
        { at: complex("0.3", "0.4"), coefficients: [exact`1 + i`] },
        { at: "-0.7", coefficients: [exact`-1 - i`, 2] },
      ],
      "a measured pole": [
        { at: enclose("0.3", "1e-9"), coefficients: [1] },
        { at: c, coefficients: [-1] },
      ],
    };
    for (const [title, principalParts] of Object.entries(cases)) {
      it(`${title}, ${name} lattice`, () => {
        const f = L.elliptic({ principalParts, constant: "5/2" });
        const [value, sigma, zeta] = [f(z), f.as("sigma"), f.as("zeta")];
        expect(value.radius.minus("1e-2").sign()).toBe(-1);
        for (const g of [sigma, zeta, sigma.as("zeta"), zeta.as("sigma"), zeta.as("rational")]) {
          expect(g(z).overlaps(value)).toBe(true);
        }
        const order = principalParts.reduce((sum, { coefficients }) => sum + coefficients.length, 0);
        expect(f.order).toBe(order);
        expect(f.zeros.reduce((sum, { multiplicity }) => sum + multiplicity, 0)).toBe(order);
        for (const { point } of f.zeros) expect(f(point).overlaps(0)).toBe(true);
      });
    }
  }

  it("a double zero that only numbers show is refused for σ, and ζ stands — oracle: the double zero of ℘(z − p) − e1", () => {
    const L = lattice({ tau: exact`1/3 + 5/4 i` });
    const principalParts = [{ at: L.at(rational("1/3"), 0), coefficients: [0, 1] }];
    const f = L.elliptic({ principalParts, constant: L.roots[0].neg() });
    expect(() => f.as("sigma")).toThrow(UndecidedError);
    expect(() => f.as("sigma")).toThrow(/expected simple zeros.*L\.elliptic\({ zeros, poles }\)/);
    expect(f.as("zeta")(z).overlaps(f(z))).toBe(true);
  });
});
