import { describe, expect, it } from "vitest";
import { complex, enclose, exact, rational, real } from "../../../lib/number/convert.ts";
import { Quadratic } from "../../../lib/number/quadratic.ts";
import { Rational } from "../../../lib/number/rational.ts";
import { Complex, Real } from "../../../lib/number/values.ts";
import { DomainError, PoleError, UndecidedError } from "../../../lib/proof/errors.ts";
import { lattice } from "../../../lib/surface/make-lattice.ts";
import type { TorusPoint } from "../../../lib/surface/torus-point.ts";

const E = lattice({ invariants: [4, -1] });
const [w1, w2] = E.periods;

describe("exact numbers and lattices with exact periods", () => {
  const L = lattice({ periods: [2, exact`1 + 3 i`] });

  it("have exact coordinates — oracle: 3 + 2i = 7/6·2 + 2/3·(1 + 3i) by hand", () => {
    const { r, s } = L.locate(exact`3 + 2 i`);
    expect([`${r}`, `${s}`]).toEqual(["7/6", "2/3"]);
    const over = L.overlattice(L.at(rational(1, 3), 0));
    expect(`${over.locate(exact`3 + 3 i`).r}`).toBe("3");
    const H = lattice({ periods: [1, exact`(1+√-3)/2`] });
    expect([`${H.locate(exact`3 + √-3`).r}`, `${H.locate(exact`3 + √-3`).s}`]).toEqual(["2", "2"]);
  });

  it("are in the lattice, or not, by exact arithmetic — oracle: whole coordinates", () => {
    expect([4, exact`3 + 3 i`].map((z) => L.contains(z))).toEqual([true, true]);
    expect([3, exact`3 + 3 i + 1/10^500`].map((z) => L.contains(z))).toEqual([false, false]);
    expect(() => L.contains(enclose("4", "1e-6"))).toThrow(UndecidedError);
  });

  it("x and y of no point have no logarithm — oracle: y² = 120 at x = 4 for the roots 3, −1, −2", () => {
    expect(() => lattice({ roots: [3, -1, -2] }).logarithm(4, -1)).toThrow(/^logarithm: ℘′ = -1 where ℘ = 4/);
  });
});

describe("a lattice with real invariants", () => {
  it("has exact Δ = 37 and j = 110592/37 — oracle: worked by hand", () => {
    expect(`${E.discriminant} ${E.j}`).toBe("37 110592/37");
  });

  it("keeps ω1/3, (ω1+ω2)/2 and 3ω2/7 as exact points", () => {
    const half = w1.plus(w2).div(2) as TorusPoint;
    expect([w1.div(3), half, w2.times("3/7")].map((p) => (p as TorusPoint).name)).toEqual([
      "ω1/3",
      "(ω1 + ω2)/2",
      "3ω2/7",
    ]);
    expect(half.order).toBe(2n);
    expect(half.times(2).equals(w1.plus(w2))).toBe(true);
    expect((w1.plus("1/4") as TorusPoint).name).toBe("ω1 + 1/4");
  });

  it("gives real values on the real line and on ω2/2 + R, of either type of argument", () => {
    expect(E.wp("1/3")).toBeInstanceOf(Real);
    expect(E.wp.prime(w2.div(2).plus("1/4"))).toBeInstanceOf(Real);
    expect(E.zeta("1/3")).toBeInstanceOf(Real);
    expect(E.wp(complex("0.4", "0.3"))).toBeInstanceOf(Complex);
    const imaginary = E.wp.prime(complex(0, "1/3")) as Complex;
    expect(imaginary.disc.axis).toBe("imaginary");
  });

  it("has ℘ = e_k and ℘′ = 0 exactly at the half-periods", () => {
    E.halfPeriods.forEach((w, k) => {
      expect(E.wp(w).overlaps(E.roots[k]!)).toBe(true);
      expect(`${E.wp.prime(w)}`).toBe("0");
    });
  });

  it("shows 200 digits on request that begin with the 20 shown before — oracle: the same at higher precision", () => {
    const value = E.wp(complex("0.41", "0.27"));
    const [short] = `${value}`.split("...");
    expect(`${value.digits(200)}`.startsWith(short!)).toBe(true);
    expect(`${value.digits(200)}`.length).toBeGreaterThan(400);
  });

  it("finds z of the point (0, 0) of y² + y = x³ − x again — oracle: ℘ and ℘′ of the answer", () => {
    const z = E.logarithm(0, 1);
    expect(E.wp(z).overlaps(0)).toBe(true);
    expect(E.wp.prime(z).overlaps(1)).toBe(true);
    expect(real("1e-15").greaterThan(E.wp.prime(z).radius)).toBe(true);
  });

  it("locates a number by coordinates, nearest lattice point and rest", () => {
    const z = complex("7.41", "-5.27");
    const { r, s, nearest, rest } = E.locate(z);
    expect(w1.times(r).plus(w2.times(s)).overlaps(z)).toBe(true);
    expect(nearest.isLatticePoint).toBe(true);
    expect(rest.plus(nearest).overlaps(z)).toBe(true);
  });
});

describe("poles", () => {
  it("are named by their lattice point", () => {
    expect(() => E.wp(0)).toThrow(PoleError);
    expect(() => E.wp(0)).toThrow("lattice point 0;");
    expect(() => E.zeta(w1.minus(w2.times(2)))).toThrow("lattice point ω1 − 2ω2;");
    expect(() => E.wp.prime(w1.plus(w2).times("1.00"))).toThrow("lattice point ω1 + ω2;");
  });

  it("beside a far lattice point are evaluated: ℘(10^30 + 10^-30) on Z + Zi = 10^60 to 60 digits — oracle: 1/z² + O(z²)", () => {
    const square = lattice({ periods: [1, complex(0, 1)] });
    const value = square.wp(real("1e30").plus(real("1e-30"))).digits(60);
    expect(`${value}`).toMatch(/^1(\.0{30,}\d*)?(\.\.\.)?e60|^10{60}/);
  });
});

describe("lattices from periods", () => {
  it("names a real ratio — oracle: the agreed message", () => {
    expect(() => lattice({ periods: [4, 3] })).toThrow(
      "lattice: ω2/ω1 is real (3/4); expected two periods independent over R. Give one of them an imaginary part.",
    );
    expect(() => lattice({ periods: [real(2).sqrt(), real(3).sqrt()] })).toThrow(DomainError);
  });

  it("exchanges periods of negative orientation and says so", () => {
    const L = lattice({ periods: [1, complex("0.3", "-0.9")] });
    expect(L.notice).toContain("[[0, 1], [1, 0]]");
    expect(`${L.tau}`).toBe("1/3 + i");
  });

  it("refuses τ in the lower half-plane and on the real line", () => {
    expect(() => lattice({ tau: complex("1/2", -1) })).toThrow("expected Im τ > 0");
    expect(() => lattice({ tau: -1 })).toThrow("expected Im τ > 0");
  });

  it("reduces τ = (1+√−15)/2 exactly on the boundary: (−1+√−15)/2", () => {
    const L = lattice({ tau: Quadratic.of(Rational.of(1, 2), Rational.of(1, 2), -15) });
    expect(L.reduced.boundary).toBe("on");
    expect(`${L.reduced.tau}`).toBe("-1/2 + 1/2 √(-15)");
    expect(L.reduced.matrix).toEqual([
      [1n, -1n],
      [0n, 1n],
    ]);
    expect(L.j).toBeInstanceOf(Real);
    expect(L.shape).toBe("rhombic");
  });

  it("says the shape of exact lattices, and that measured ones stay open", () => {
    expect(lattice({ periods: [1, complex(0, 1)] }).shape).toBe("square");
    expect(lattice({ tau: Quadratic.of(Rational.of(1, 2), Rational.of(1, 2), -3) }).shape).toBe("hexagonal");
    expect(lattice({ periods: [1, complex(0, 2)] }).shape).toBe("rectangular");
    expect(lattice({ periods: [1, complex("1/3", 2)] }).shape).toBe("general");
    expect(() => lattice({ periods: [1, complex("1e-40 ± 1e-30", 1)] }).shape).toThrow(UndecidedError);
  });

  it("passes on the radius of a measured period", () => {
    const L = lattice({ periods: [real("2.5 ± 1e-9"), complex("0.3", "1.7")] });
    expect(L.wp("0.3").standing).toBe("measured");
    expect(`${L.area}`).toMatch(/^4\.25\d* ± /);
  });
});

describe("lattices from other data", () => {
  it("j = 0, 1728 and 8000 give lattices with that j", () => {
    for (const j of [0, 1728, 8000]) expect(`${lattice({ j }).j}`).toBe(`${j}`);
  });

  it("roots give their invariants, and must have the sum 0", () => {
    const L = lattice({ roots: [2, -3, 1] });
    expect(`${L.invariants}`).toBe("28,-24");
    expect(L.roots.map(String)).toEqual(["2", "1", "-3"]);
    expect(() => lattice({ roots: [1, 2, 3] })).toThrow("expected e1 + e2 + e3 = 0");
  });

  it("a double root is said to leave one period", () => {
    expect(() => lattice({ invariants: [3, 1] })).toThrow("trigonometric or hyperbolic");
  });

  it("more than one kind of input is refused with the list of kinds", () => {
    const both = { tau: complex(0, 1), j: 1728 } as unknown as Parameters<typeof lattice>[0];
    expect(() => lattice(both)).toThrow(
      "exactly one of periods, halfPeriods, tau, qTheta, qMod, invariants, roots, lambda, m, k, j, J",
    );
  });
});
