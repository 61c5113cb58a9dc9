import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { quadratic } from "../../../lib/number/quadratic.ts";
import type { Real } from "../../../lib/number/values.ts";
import { curve } from "../../../lib/surface/make-curve.ts";
import type { Point } from "../../../lib/surface/point.ts";

describe("relations between points of y² + y = x³ − 7x + 6, of rank 3", () => {
  const E = curve({ a: [0, 0, 1, -7, 6] });
  const G = [E.point(1, 0), E.point(2, 0), E.point(0, 2)];
  const sum = (n: readonly number[]) => G.reduce<Point>((P, R, k) => P.plus(R.times(n[k]!)), E.origin);

  it("the generators are independent — oracle: Buhler, Gross, Zagier 1985 (rank 3)", () => {
    const { rank, basis, standing } = E.relations(G);
    expect([rank, basis.length, standing.kind]).toEqual([3, 0, "proved"]);
  });

  it("random combinations: the rank, and all relations — oracle: linear algebra on the coefficients", () => {
    const vector = fc.array(fc.integer({ min: -4, max: 4 }), { minLength: 3, maxLength: 3 });
    fc.assert(
      fc.property(vector, vector, vector, (a, b, c) => {
        const rows = [a, b, c];
        const found = E.relations(rows.map(sum));
        const det =
          a[0]! * (b[1]! * c[2]! - b[2]! * c[1]!) -
          a[1]! * (b[0]! * c[2]! - b[2]! * c[0]!) +
          a[2]! * (b[0]! * c[1]! - b[1]! * c[0]!);
        expect(found.rank === 3).toBe(det !== 0);
        expect(found.rank + found.basis.length).toBe(3);
        for (const n of found.basis) {
          // The same combination of the coefficient vectors vanishes, and it is primitive.
          for (const k of [0, 1, 2]) {
            expect(rows.reduce((total, row, l) => total + Number(n[l]!) * row[k]!, 0)).toBe(0);
          }
        }
      }),
      { seed: 7, numRuns: 25 }, // each run reduces lattices of logarithms
    );
  }, 60_000);

  it("2P and 3P: the relation is primitive — oracle: 3·2P = 2·3P", () => {
    const found = E.relations({ A: G[0]!.times(2), B: G[0]!.times(3) });
    expect(found.toString()).toBe("3*A - 2*B = O; rank 1: A has infinite order");
    expect(E.relations([G[0]!.times(2), G[0]!.times(3), G[0]!.times(5)]).basis.length).toBe(2);
  });
});

describe("relations with torsion", () => {
  it("says which torsion point remains — oracle: how the points were made", () => {
    const E = curve`y^2 = x^3 - 25x`;
    const P = E.point(-4, 6);
    const found = E.relations({ P, R: P.plus(E.point(0, 0)), S: P.times(2).plus(E.point(5, 0)) });
    expect(found.rank).toBe(1);
    found.basis.forEach((n, k) => {
      const total = found.points.reduce<Point>((T, R, l) => T.plus(R.times(n[l]!)), E.origin);
      expect(total.equals(found.values[k]!)).toBe(true);
      expect(total.order()).not.toBe(Infinity);
    });
  });

  it("torsion points alone, O, and none at all", () => {
    const E = curve({ a: [1, 0, 1, -19, 26] });
    const T = E.torsion().points;
    expect(E.relations([...T.slice(0, 2), E.origin]).rank).toBe(0);
    expect(E.relations([]).toString()).toBe("no relation; all of finite order");
  });

  it("refuses points of two curves", () => {
    const E = curve`y^2 = x^3 - 25x`;
    expect(() => E.relations([curve`y^2 = x^3 - x`.point(0, 0)])).toThrow(/expected two points of one curve/);
  });
});

describe("points of finite order by their places on the torus", () => {
  it("rational ones are exact: Z/7 at kω1/7 — oracle: the group law", () => {
    const E = curve`y^2 - 5xy - 18y = x^3 - 18x^2`;
    const L = E.lattice();
    const at = [1, 2, 3, 4, 5, 6].map((k) => E.exponential(L.at(k, 0).div(7)));
    expect(at.map(String)).toEqual(["(18, 0)", "(6, 12)", "(0, 0)", "(0, 18)", "(6, 36)", "(18, 108)"]);
    for (const P of at) expect((P.x as Real).exact).toBeDefined();
  });

  it("all n² − 1 of them lie on the curve, n kills them, the rational ones are those of E(Q) — oracle: division polynomials, torsion", () => {
    const E = curve`y^2 + xy + 2y = x^3`;
    for (const n of [2, 3]) {
      const places = E.torsionPoints(n);
      expect(places.length).toBe(n * n - 1);
      const rational = places.filter(({ point }) => point.curve.field.name === "Q");
      expect(rational.length + 1).toBe(E.origin.divide(n).length);
      for (const { z, point } of rational) {
        expect(z.times(n)).toBeDefined();
        expect((point as Point).times(n).isOrigin).toBe(true);
      }
      const f = E.divisionPolynomial(n);
      for (const { point } of places.filter(({ point: P }) => P.curve.field.name === "C")) {
        const value = [...f.terms].reduce(
          (total, [k, c]) => total.plus((point.x as Real).pow(k / 4096 ** 3).times(c)),
          (point.x as Real).times(0),
        );
        expect(value.overlaps(0)).toBe(true);
      }
    }
  });
});

describe("the endomorphism ring", () => {
  it("orders of class number one and two, and Z — oracle: the 13 rational values of j (Silverman ATAEC, appendix A)", () => {
    const ring = curve`y^2 = x^3 - 595x - 5586`.endomorphismRing();
    expect([ring.kind, ring.discriminant, ring.fundamental, ring.conductor]).toEqual([
      "quadratic order",
      -28n,
      -7n,
      2n,
    ]);
    expect(curve`y^2 = x^3 - x`.endomorphismRing().discriminant).toBe(-4n);
    expect(curve`y^2 = x^3 + 1`.endomorphismRing().discriminant).toBe(-3n);
    const none = curve`y^2 = x^3 - 189x - 999`.endomorphismRing();
    expect([none.kind, none.standing.kind]).toEqual(["integers", "proved"]);
    const root5 = quadratic(5);
    const j = root5.times(-85995).plus(-191025).div(2);
    expect(curve({ j }).endomorphismRing().discriminant).toBe(-15n);
  });

  it("ordinary or supersingular modulo p — oracle: y² = x³ − x is supersingular exactly for p = 3 mod 4", () => {
    for (const p of [5, 7, 11, 13, 17, 19, 23, 29]) {
      const ring = curve`y^2 = x^3 - x`.mod(p).endomorphismRing();
      expect(ring.kind === "quaternion order").toBe(p % 4 === 3);
      if (p % 4 === 1) expect(ring.fundamental).toBe(-4n);
    }
  });
});
