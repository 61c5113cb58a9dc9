import { describe, expect, it } from "vitest";
import { complex } from "../../../lib/number/convert.ts";
import { DomainError } from "../../../lib/proof/errors.ts";
import type { DivisorFunction } from "../../../lib/surface/elliptic.ts";
import { lattice } from "../../../lib/surface/make-lattice.ts";

const L = lattice({ invariants: [4, -1] });
const z = complex("0.31", "0.27");
const c = L.at("1/3", 0);
const d = L.at("1/5", "2/7");

describe("elliptic functions from zeros and poles", () => {
  it("zeros ±c and a double pole at 0 make ℘ − ℘(c), proved", () => {
    const f = L.elliptic({ zeros: [c, c.neg()], poles: [0, 0] });
    expect(f.equals(L.wp.minus(L.wp(c)))).toBe(true);
    expect(`${f}`).toBe("℘ − ℘(ω1/3)");
    expect(`${f(c)}`).toBe("0");
  });

  it("three zeros and three poles agree with the σ-quotient — oracle: second algorithm", () => {
    const e = L.at("1/2", "1/2");
    const poles = [L.at("1/7", 0), L.at(0, "1/7"), c.plus(d).plus(e).minus(L.at("1/7", "1/7"))];
    const f = L.elliptic({ zeros: [c, d, e], poles }) as DivisorFunction;
    expect(f(z).overlaps(f.bySigma(z))).toBe(true);
    expect(f(0).overlaps(1)).toBe(true);
    expect(f.order).toBe(3);
  });

  it("multiple zeros, numbers as points, and exact coefficients at rational points of order two", () => {
    const f = L.elliptic({
      zeros: [{ point: d, multiplicity: 2 }, d.times(-2)],
      poles: [{ point: 0, multiplicity: 3 }],
    }) as DivisorFunction;
    expect(f(z).overlaps(f.bySigma(z))).toBe(true);
    const g = L.elliptic({ zeros: [z, complex("0.1", "0.2")], poles: [complex("0.41", "0.47"), 0] }) as DivisorFunction;
    expect(g("0.9").overlaps(g.bySigma("0.9"))).toBe(true);
    const M = lattice({ invariants: [28, -24] });
    const [h1, h2, h3] = M.halfPeriods;
    const half = M.elliptic({ zeros: [h1, h2, h3], poles: [{ point: 0, multiplicity: 3 }] });
    expect(half.equals(M.wp.prime.div(-2))).toBe(true);
  });

  it("refuses what Abel's theorem and the residues forbid, with the failing sum", () => {
    expect(() => L.elliptic({ zeros: [c, c], poles: [0, 0] })).toThrow("sums differ by −ω1/3");
    expect(() => L.elliptic({ zeros: [c], poles: [c] })).toThrow("one simple pole");
    expect(() => L.elliptic({ zeros: [c, c], poles: [0] })).toThrow("2 zeros and 1 poles");
    expect(() => L.elliptic({ principalParts: [{ at: 0, coefficients: [1] }] })).toThrow(DomainError);
  });
});

describe("elliptic functions from principal parts", () => {
  it("are ζ-sums — oracle: ζ, ℘ and ℘′ at the shifted arguments", () => {
    const f = L.elliptic({
      principalParts: [
        { at: 0, coefficients: [1, 2] },
        { at: c, coefficients: [-1, 0, 3] },
      ],
      constant: 5,
    });
    const q = c.neg().plus(z);
    const sum = L.zeta(z).plus(L.wp(z).times(2)).minus(L.zeta(q)).minus(L.wp.prime(q).times("3/2")).plus(5);
    expect(f(z).overlaps(sum)).toBe(true);
    const series = f.laurent(0, 3);
    expect(`${series.coefficient(-2)} ${series.residue}`).toMatch(/^2(\.0+\.\.\.)? 1(\.0+\.\.\.)?$/);
  });
});

describe("multiplication", () => {
  it("℘(2z) = (℘⁴ + g2/2 ℘² + 2 g3 ℘ + g2²/16)/(4℘³ − g2 ℘ − g3) — oracle: DLMF 23.10.7 over Q", () => {
    expect(`${L.wp.multiple(2)}`).toBe("((1/4)℘⁴ + (1/2)℘² − (1/2)℘ + 1/4)/(℘³ − ℘ + 1/4)");
  });

  it("℘(3z) and ℘′(−3z) have the values of ℘ and ℘′ there", () => {
    expect(
      L.wp
        .multiple(3)(z)
        .overlaps(L.wp(z.times(3))),
    ).toBe(true);
    expect(
      L.wp.prime
        .multiple(-3)(z)
        .overlaps(L.wp.prime(z.times(-3))),
    ).toBe(true);
  });
});
