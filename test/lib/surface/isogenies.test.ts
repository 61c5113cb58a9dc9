import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { sortedTerms } from "../../../lib/algebra/multivariate.ts";
import { quadratic } from "../../../lib/number/quadratic.ts";
import { Rational } from "../../../lib/number/rational.ts";
import type { Curve } from "../../../lib/surface/curve.ts";
import { curve } from "../../../lib/surface/make-curve.ts";
import type { Point } from "../../../lib/surface/point.ts";

const rank3 = curve({ a: [0, 0, 1, -7, 6] });
const generators = [rank3.point(1, 0), rank3.point(2, 0), rank3.point(0, 2)];
const sumOf = (n: readonly number[]) => generators.reduce<Point>((sum, P, k) => sum.plus(P.times(n[k]!)), rank3.origin);
const small = fc.integer({ min: -3, max: 3 });

describe("the dual of an isogeny", () => {
  it.each([
    [[0, -1, 1, 0, 0], 5],
    [[1, 0, 0, -45, 81], 10],
    [[1, -1, 1, -14, 29], 9],
    [[1, 1, 1, -10, -10], 4],
    [[1, 0, 1, -19, 26], 6],
  ])("%s: dual∘φ is [%i], by formulas — oracle: exact substitution, and points", (a, n) => {
    const E = curve({ a });
    const P = E.torsion().points.find((R) => R.order() === n)!;
    const phi = E.isogeny({ kernel: P });
    expect(phi.degree).toBe(n);
    const standing = phi.verify();
    expect(standing.kind === "proved" && standing.argument).toContain(`multiplication by ${n}`);
    const dual = phi.dual();
    expect(dual.verify().kind).toBe("proved");
    const both = dual.compose(phi);
    expect([both.degree, String(both.factor), both.verify().kind]).toEqual([n * n, String(n), "proved"]);
    for (const T of E.torsion().points) expect(both(T).equals(T.times(n))).toBe(true);
    // The dual of the dual is the isogeny itself.
    expect(sortedTerms(dual.dual().formula.parts[0]!.numerator)).toEqual(sortedTerms(phi.formula.parts[0]!.numerator));
  });

  it("over F_101 it composes to [5] on all points — oracle: the group law", () => {
    const E = curve({ a: [0, -1, 1, 0, 0] }).mod(101);
    const phi = E.isogeny({ kernel: E.point(0, 0) });
    expect(phi.verify().kind).toBe("proved");
    const dual = phi.dual();
    for (let x = 0; x < 101; x++) {
      for (const P of E.pointsWith({ x })) expect(dual(phi(P)).equals(P.times(5))).toBe(true);
    }
  });

  it("over F_5 the degree 5 is refused — oracle: it is inseparable", () => {
    const E = curve`y^2 = x^3 + x + 1`.mod(5);
    expect(E.count).toBe(9n);
    const five = curve({ a: [0, -1, 1, 0, 0] }).mod(5);
    expect(() => five.isogeny({ kernel: five.point(0, 0) }).dual()).toThrow(/prime to the characteristic/);
  });
});

describe("multiplication by n as a map — oracle: the group law", () => {
  it("agrees on random points of rank 3, and has degree n² and factor n", () => {
    const maps = new Map([-3, -2, -1, 1, 2, 3, 4].map((n) => [n, rank3.multiplication(n)]));
    fc.assert(
      fc.property(fc.tuple(small, small, small), fc.constantFrom(...maps.keys()), (c, n) => {
        const P = sumOf(c);
        expect(maps.get(n)!(P).equals(P.times(n))).toBe(true);
      }),
      { seed: 3, numRuns: 100 },
    );
    for (const [n, map] of maps) {
      expect([map.degree, String(map.factor), map.verify().kind]).toEqual([n * n, String(n), "proved"]);
    }
  });

  it("x(nP) and x(P ± Q) from abscissas alone, on random points, O included", () => {
    fc.assert(
      fc.property(
        fc.tuple(small, small, small),
        fc.tuple(small, small, small),
        fc.integer({ min: -6, max: 6 }),
        (c, d, n) => {
          const [P, R] = [sumOf(c), sumOf(d)];
          if (P.isOrigin || R.isOrigin || P.x.equals(R.x)) return;
          const multiple = P.times(n);
          expect(String(rank3.abscissa(n, P.x))).toBe(multiple.isOrigin ? "undefined" : String(multiple.x));
          const { sum, product } = rank3.abscissasOfSums(P.x, R.x);
          expect(sum.equals(P.plus(R).x.plus(P.minus(R).x))).toBe(true);
          expect(product.equals(P.plus(R).x.times(P.minus(R).x))).toBe(true);
        },
      ),
      { seed: 4, numRuns: 100 },
    );
    // A torsion point: 7P = O, also where y is not rational.
    const seven = curve`y^2 - 5xy - 18y = x^3 - 18x^2`;
    expect([1, 2, 3, 7, 8].map((n) => String(seven.abscissa(n, 0)))).toEqual(["0", "18", "6", "undefined", "0"]);
  });

  it("refuses n = 0 and large n in words", () => {
    expect(() => rank3.multiplication(0)).toThrow(/expected an integer from −20 to 20 that is not 0/);
    expect(() => rank3.multiplication(21)).toThrow(/E\.abscissa/);
  });
});

describe("dividing points over Q", () => {
  it("finds all R with nR = P — oracle: the points it was made from, and torsion", () => {
    const P = sumOf([1, -1, 2]);
    for (const n of [2, 3, 5]) expect(P.times(n).divide(n).map(String)).toEqual([String(P)]);
    expect(generators[0]!.divide(2)).toEqual([]);
    const E = curve({ a: [1, 0, 1, -19, 26] }); // Z/2 × Z/6
    const halves = E.origin.divide(2).map(String);
    expect(halves.length).toBe(4);
    const Q = E.torsion().points.find((R) => R.order() === 3)!;
    const found = Q.divide(2);
    expect(found.length).toBe(4);
    for (const R of found) expect(R.times(2).equals(Q)).toBe(true);
    expect(E.origin.divide(6).length).toBe(12);
  });

  it("refuses other fields and n", () => {
    expect(() => generators[0]!.divide(1)).toThrow(/expected an integer from 2 to 30/);
    expect(() => rank3.over("R").pointsWith({ x: 1 })[0]!.divide(2)).toThrow(/expected a point over Q/);
  });
});

describe("kernels on the torus", () => {
  const E = curve({ a: [1, 1, 1, -10, -10] }); // Δ > 0, Z/2 × Z/4
  const L = E.lattice();

  it("every rational cyclic subgroup of order 4, by exact coordinates — oracle: the printed class of eight curves", () => {
    const found = new Map<string, string>();
    for (const [r, s] of [
      ["1/4", 0],
      ["1/4", "1/2"],
      [0, "1/4"],
      ["1/2", "1/4"],
      ["1/4", "1/4"],
      ["1/4", "3/4"],
    ] as const) {
      try {
        const phi = E.isogeny({ kernel: L.at(r, s) });
        expect([phi.degree, phi.verify().kind]).toEqual([4, "proved"]);
        found.set(`${r},${s}`, String(phi.to.minimal().curve));
      } catch (error) {
        expect(String(error)).toMatch(/a subgroup that is defined over Q/);
      }
    }
    const targets = E.isogenyClass().map(({ curve: F }) => String(F));
    expect(found.size).toBeGreaterThanOrEqual(2);
    for (const target of found.values()) expect(targets).toContain(target);
  });

  it("a kernel of composite order 15 — oracle: the class of [1,0,1,-1,-2], degrees 3 and 5 one after the other", () => {
    const C = curve({ a: [1, 0, 1, -1, -2] });
    const [three, five] = [3, 5].map((p) => C.isogenies().find((phi) => phi.degree === p)!);
    const M = C.lattice();
    const lines = (l: number) => [
      M.at(Rational.of(1, l), 0),
      M.at(Rational.of(M.realComponents === 1 ? -1 : 0, l), Rational.of(M.realComponents === 1 ? 2 : 1, l)),
    ];
    const places = lines(3).flatMap((p) => lines(5).map((q) => p.plus(q)));
    const found = places.flatMap((c) => {
      try {
        return [C.isogeny({ kernel: c })];
      } catch {
        return [];
      }
    });
    expect(found.length).toBeGreaterThan(0);
    const last = three!.to.isogenies().find((phi) => phi.degree === 5)!;
    expect(found[0]!.to.minimal().curve.equals(last.to.minimal().curve)).toBe(true);
    expect(five!.degree * three!.degree).toBe(found[0]!.degree);
  });
});

describe("an isogeny from an inclusion of lattices — oracle: Vélu's formulas with the kernel by points", () => {
  const E = curve`y^2 + xy + 2y = x^3`;
  const L = E.lattice();
  const byPoints = E.isogeny({ kernel: E.point(0, 0) });

  it("an overlattice, and the lattice of the other curve, give the same map", () => {
    for (const M of [L.overlattice(L.at("1/3", 0)), byPoints.to.lattice()]) {
      const phi = E.isogeny({ lattice: M });
      expect(phi.to.equals(byPoints.to)).toBe(true);
      expect(phi(E.point(0, 0)).isOrigin).toBe(true);
      expect(String(phi.factor)).toBe("1");
    }
  });

  it("a lattice with a quotient that is not cyclic: (1/2)Λ and (1/6)ω1, ω2/2", () => {
    const half = E.isogeny({ lattice: L.overlattice(L.at("1/2", 0), L.at(0, "1/2")) });
    expect([half.degree, String(half.factor)]).toEqual([4, "1"]);
    expect(half.to.j.equals(E.j)).toBe(true);
    const six = E.isogeny({ lattice: L.overlattice(L.at("1/6", 0), L.at(0, "1/2")) });
    expect([six.degree, String(six.factor), six.verify().kind]).toEqual([12, "1", "proved"]);
    expect(six.to.j.equals(byPoints.to.j)).toBe(true);
  });

  it("the matrix on the periods has the degree as determinant and belongs to the factor — oracle: enclosures", () => {
    const [[a, b], [c, d]] = byPoints.periodMatrix;
    expect(a * d - b * c).toBe(3n);
    const dual = byPoints.dual().periodMatrix;
    const times = (x: readonly bigint[], y: readonly (readonly bigint[])[]) =>
      [0, 1].map((k) => x[0]! * y[0]![k]! + x[1]! * y[1]![k]!);
    expect(byPoints.periodMatrix.map((row) => times(row, dual))).toEqual([
      [3n, 0n],
      [0n, 3n],
    ]);
  });

  it("refuses a lattice that does not contain Λ, with the coordinates", () => {
    expect(() =>
      E.isogeny({
        lattice: L.sublattice([
          [2, 0],
          [0, 1],
        ]),
      }),
    ).toThrow(/coordinates \(1\/2, 0\) and \(0, 1\) in the other lattice; expected integers/);
    expect(() => E.isogeny({ lattice: curve`y^2 = x^3 - x`.lattice() })).toThrow(/expected integers/);
  });
});

describe("a kernel by its polynomial", () => {
  const E = curve({ a: [0, -1, 1, 0, 0] });

  it("gives the isogeny of its points — oracle: Vélu's formulas by points", () => {
    const phi = E.isogeny({ kernel: E.point(0, 0) });
    const again = E.isogeny({ kernel: phi.kernelPolynomial as never });
    expect(again.to.equals(phi.to)).toBe(true);
    // The whole 2-torsion: degree 4, to a curve of the same j.
    const two = E.isogeny({ kernel: E.divisionPolynomial(2) });
    expect([two.degree, two.to.j.equals(E.j)]).toEqual([4, true]);
  });

  it("refuses abscissas of no subgroup, and constants", () => {
    expect(() => E.isogeny({ kernel: rank3.divisionPolynomial(3) })).toThrow(
      /abscissas that are not those of a subgroup/,
    );
  });
});

describe("isogenies over a quadratic field — oracle: exact substitution", () => {
  it("a kernel of order 2 over Q(√5) of y² = x³ − 5x", () => {
    const E: Curve<ReturnType<typeof quadratic>> = curve`y^2 = x^3 - 5x`.over(quadratic(5));
    const phi = E.isogeny({ kernel: E.point(quadratic(5), 0) });
    expect(phi.degree).toBe(2);
    expect(phi.verify().kind).toBe("proved");
    expect(phi.dual().compose(phi).verify().kind).toBe("proved");
  });
});
