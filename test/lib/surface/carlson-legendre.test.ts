import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { provedDigits } from "../../../lib/number/context.ts";
import { enclose, exact } from "../../../lib/number/convert.ts";
import { exp } from "../../../lib/number/functions.ts";
import { i, π } from "../../../lib/number/symbols.ts";
import { Complex, Real } from "../../../lib/number/values.ts";
import { DomainError, PoleError } from "../../../lib/proof/errors.ts";
import { carlson } from "../../../lib/surface/carlson.ts";
import { jacobi } from "../../../lib/surface/jacobi.ts";
import { legendre } from "../../../lib/surface/legendre.ts";
import { modular } from "../../../lib/surface/modular.ts";
import type { ModulusInput } from "../../../lib/surface/modulus.ts";

const before = provedDigits();
beforeEach(() => {
  provedDigits(20);
});
afterEach(() => {
  provedDigits(before);
});

describe("carlson in a cell", () => {
  it("prints the digits of the examples — oracle: Carlson 1995", () => {
    expect(String(carlson.RF(1, 2, 0))).toBe("1.3110287771460599052...");
    expect(String(carlson.RC(0, "1/4"))).toBe("3.1415926535897932384...");
    expect(String(carlson.RJ(2, 3, 4, 5))).toBe("0.14297579667156753833...");
    expect(String(carlson.RD(0, 2, 1))).toBe("1.7972103521033883111...");
    expect(String(carlson.RG(2, 3, 4))).toBe("1.7255030280692277601...");
  });

  it("more digits are had of the value itself — oracle: Carlson 1995 and the tables, 50 digits", () => {
    expect(String(carlson.RJ(2, 3, 4, -5).digits(44))).toBe("-0.12711230042963911011828031981797989496426185...");
  });

  it("conjugate arguments give a Real, also when no double holds them — oracle: symmetry under conjugation", () => {
    expect(carlson.RF(i, i.neg(), 2)).toBeInstanceOf(Real);
    expect(carlson.RF(exact`(1+i)/3`, exact`(1-i)/3`, "1/7")).toBeInstanceOf(Real);
    expect(carlson.RJ(exact`(1+i)/3`, exact`(1-i)/3`, "1/7", 2)).toBeInstanceOf(Real);
    expect(carlson.RF(exact`(1+i)/3`, exact`(1-i)/5`, "1/7")).not.toBeInstanceOf(Real);
  });

  it("RJ with p equal to another argument is RD wherever the others lie — oracle: DLMF 19.20.10 by name", () => {
    const [x, y, z] = [exact`(-1+i)/3`, exact`(-2-i)/3`, exact`-i/3`];
    const scale = exact`√3`.pow(3);
    const value = carlson.RJ(x, y, z, x);
    expect(value.overlaps(carlson.RD(y, z, x))).toBe(true);
    // Carlson's check value for (−1+i, −2−i, −i, −1+i) times 3^(3/2), by homogeneity.
    expect(String(Complex.from(value).div(scale).digits(15))).toBe("1.82490273937038... - 1.22184757848270... i");
  });

  it("a measured argument gives a measured value that holds both ends — oracle: values at the ends", () => {
    const value = carlson.RF(enclose("1.25", "1e-6"), 2, 3);
    expect(value.standing).toBe("measured");
    expect(value.overlaps(carlson.RF("1.250001", 2, 3))).toBe(true);
    expect(value.overlaps(carlson.RF("1.249999", 2, 3))).toBe(true);
  });

  it("coarse arguments give an enclosure, of RF, RC and F — oracle: values at the ends", () => {
    const [rf, rc] = [carlson.RF(enclose("1", "0.5"), 2, 3), carlson.RC(enclose("1", "0.5"), 2)];
    const f = legendre.F({ phi: enclose("1", "0.1"), m: "1/2" });
    for (const x of ["0.5", "1", "1.5"]) {
      expect(rf.overlaps(carlson.RF(x, 2, 3))).toBe(true);
      expect(rc.overlaps(carlson.RC(x, 2))).toBe(true);
    }
    for (const phi of ["0.9", "1.1"]) expect(f.overlaps(legendre.F({ phi, m: "1/2" }))).toBe(true);
    expect((rf as Real).radius.toDouble()).toBeLessThan(1);
    expect((f as Real).radius.toDouble()).toBeLessThan(1);
  });

  it("RC(0, −1) is exactly 0; a negative argument of RF and a zero of RC are refused", () => {
    expect(carlson.RC(0, -1).exact?.toString()).toBe("0");
    expect(() => carlson.RF(-1, 2, 3)).toThrow(DomainError);
    expect(() => carlson.RC(1, 0)).toThrow(PoleError);
  });

  it("the perimeter of the ellipse with half axes 2 and 1 is 8 RG(0, 4, 1) = 8 E(3/4) — oracle: DLMF 19.30.5, 19.30.2", () => {
    const perimeter = carlson.RG(0, 4, 1).times(8);
    expect(perimeter.overlaps(legendre.E({ m: "3/4" }).times(8))).toBe(true);
    expect(String(perimeter)).toBe("9.6884482205476761984...");
  });
});

describe("legendre in a cell", () => {
  it("prints the digits of the examples — oracle: Abramowitz & Stegun, table 17.1", () => {
    expect(String(legendre.K({ m: "1/2" }))).toBe("1.8540746773013719184...");
    expect(String(legendre.E({ m: "1/2" }))).toBe("1.3506438810476755025...");
    expect(String(legendre.Pi({ n: "1/10", m: "1/2" }))).toBe("1.9632597071434658482...");
  });

  it("every name of one modulus gives one K: m, m1, k, τ, both nomes, roots — oracle: the conversions", () => {
    const K = legendre.K({ m: "1/2" });
    const root = exact`√2/2`;
    const others: ModulusInput[] = [
      { m1: "1/2" },
      { k: root },
      { tau: i },
      { roots: [1, 0, -1] },
      { qTheta: exp(π.neg()) },
    ];
    others.push({ qMod: exp(π.times(-2)) });
    for (const input of others) expect(legendre.K(input).overlaps(K), JSON.stringify(Object.keys(input))).toBe(true);
  });

  it("K beside m = 1 keeps its digits: m1 = 10^−300 — oracle: ln 4 + 150 ln 10 to O(10^−298)", () => {
    expect(String(legendre.K({ m1: "1e-300" }))).toBe("346.77405831022674322...");
  });

  it("F(π/2) is K though π/2 is known by digits only; F(0) and E(m = 1) are exact", () => {
    expect(legendre.F({ phi: π.div(2), m: "1/2" }).overlaps(legendre.K({ m: "1/2" }))).toBe(true);
    expect(legendre.F({ phi: 0, m: "1/2" }).exact?.toString()).toBe("0");
    expect(legendre.E({ m: 1 }).exact?.toString()).toBe("1");
  });

  it("a bare nome is refused with both names, and two names at once", () => {
    expect(() => legendre.K({ q: "0.1" })).toThrow(/\{ qTheta \} for q = exp\(πiτ\) or \{ qMod \}/);
    expect(() => legendre.K({ m: "1/2", k: 1 } as ModulusInput)).toThrow(/\{ m, k \} together/);
    expect(() => legendre.K({} as ModulusInput)).toThrow(TypeError);
  });

  it("m on the cut without a side, a word that is no side, m1 known to hold 0", () => {
    expect(() => legendre.K({ m: 2 })).toThrow(/the side of it.*K\(1\/m\) ± i K\(1 − 1\/m\)/);
    expect(() => legendre.F({ phi: 1, m: 2 })).toThrow(/side: "above"/);
    expect(() => legendre.K({ m: 2, side: "left" as "above" })).toThrow(/"above" \(Im m > 0\) or "below"/);
    expect(() => legendre.K({ m: enclose("0.9", "0.2") })).toThrow(/an enclosure of m that holds 1/);
  });
});

/** 2 + 10^−30 i: what is continuous differs there by about 10^−30 from the limit. */
const beside = exact`2 + 1/1000000000000000000000000000000 i`;

function expectLimit(limit: Real | Complex, near: Real | Complex): void {
  expect(Complex.from(limit).minus(near).abs().toDouble()).toBeLessThan(1e-28);
}

describe("the sides of the cut m > 1", () => {
  it("K, E, D, B from above — oracle: the same functions at 2 + 10^−30 i", () => {
    for (const name of ["K", "E", "D", "B"] as const) {
      expectLimit(legendre[name]({ m: 2, side: "above" }), legendre[name]({ m: beside }));
    }
  });

  it("Π(n | 2) — oracle: the same at 2 + 10^−30 i", () => {
    for (const n of ["1/10", "-7/3"]) {
      expectLimit(legendre.Pi({ n, m: 2, side: "above" }), legendre.Pi({ n, m: beside }));
    }
  });

  it("F, E, D, B, Π at φ on both sides of the branch point and beyond π/2 — oracle: the same at 2 + 10^−30 i", () => {
    for (const phi of ["1/2", "1", "-6/5", "3", "7"]) {
      for (const name of ["F", "E", "D", "B"] as const) {
        expectLimit(legendre[name]({ phi, m: 2, side: "above" }), legendre[name]({ phi, m: beside }));
      }
      expectLimit(legendre.Pi({ n: "1/2", phi, m: 2, side: "above" }), legendre.Pi({ n: "1/2", phi, m: beside }));
    }
  });

  it("below is the conjugate; K(m + i0) = (K(1/m) + i K(1 − 1/m))/√m — oracle: DLMF 19.7.3", () => {
    const above = legendre.K({ m: 2, side: "above" });
    expect(legendre.K({ m: 2, side: "below" }).overlaps(Complex.from(above).conj())).toBe(true);
    const k = legendre.K({ m: "1/2" });
    expect(Complex.from(k).plus(i.times(k)).div(exact`√2`).overlaps(above)).toBe(true);
  });

  it("jacobi on the cut: λ(τ) is m again, for m = 2 and for m = −3 from below — oracle: theta functions", () => {
    const above = jacobi({ m: 2, side: "above" });
    expect(modular.lambda(above.tau).overlaps(2)).toBe(true);
    expect(modular.lambda(jacobi({ m: -3, side: "below" }).tau).overlaps(-3)).toBe(true);
    expect(above.sn(above.K).exact?.toString()).toBe("1");
    expect(() => jacobi({ m: 2 }).tau).toThrow(DomainError);
  });
});
