import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { exactSqrt } from "../../../lib/algebra/integer.ts";
import { rationals as Q } from "../../../lib/algebra/rationals.ts";
import { globalMinimalModel, toRationals } from "../../../lib/arithmetic/minimal.ts";
import { torsionSubgroup } from "../../../lib/arithmetic/torsion.ts";
import { multiplyPoint } from "../../../lib/curve/group.ts";
import { Quadratic, quadratic } from "../../../lib/number/quadratic.ts";
import { gcd, Rational } from "../../../lib/number/rational.ts";
import type { Real } from "../../../lib/number/values.ts";
import { curve } from "../../../lib/surface/make-curve.ts";
import type { Point } from "../../../lib/surface/point.ts";
import printed from "./group.json" with { type: "json" };

interface Entry {
  readonly id: string;
  readonly quantity: string;
  readonly input: { readonly a_invariants: readonly number[]; readonly point?: readonly [string, string] };
  readonly expected: unknown;
  readonly source: string;
}
const entries = printed.entries as unknown as readonly Entry[];

describe("multiples of points against printed tables", () => {
  for (const { id, input, expected, source } of entries.filter((e) => e.quantity === "multiples_of_a_point")) {
    it(`${id} — oracle: ${source.slice(0, 90)}`, () => {
      const E = curve({ a: input.a_invariants });
      const P = E.point(...input.point!);
      (expected as string[][]).forEach((xy, k) => {
        expect(P.times(k + 1).toString()).toBe(`(${xy.join(", ")})`);
      });
      expect(P.order()).toBe(Infinity);
    });
  }
});

describe("torsion subgroups against printed examples", () => {
  for (const { id, input, expected, source } of entries.filter((e) => e.quantity === "torsion_structure")) {
    it(`${id} [${input.a_invariants}] — oracle: ${source.slice(0, 70)}`, () => {
      const { torsion_structure: structure, minimal_model: minimal } = expected as Record<string, number[]>;
      const model = globalMinimalModel(curve({ a: input.a_invariants }).a);
      expect(model.a.map(Number)).toEqual(minimal);
      const found = torsionSubgroup(model.a);
      expect(found.structure).toEqual(structure);
      const E = curve({ a: toRationals(model.a) });
      expect(found.generators.map((P) => E.point(...P).order())).toEqual(structure);
    });
  }
});

// Rank 3, generators by hand: enough points for random sums.
const E = curve({ a: [0, 0, 1, -7, 6] });
const generators = [E.point(1, 0), E.point(2, 0), E.point(0, 2)];
const torsionCurve = curve({ a: [1, 0, 1, -19, 26] }); // Z/2 × Z/6
const torsionPoints = torsionSubgroup([1n, 0n, 1n, -19n, 26n]).points.map((P) => torsionCurve.point(...P));

const freePoint = fc
  .tuple(...generators.map(() => fc.integer({ min: -3, max: 3 })))
  .map((n) => generators.reduce((sum, P, k) => sum.plus(P.times(n[k]!)), E.origin));
const torsionPoint = fc.constantFrom(torsionCurve.origin, ...torsionPoints);
const triple = fc.oneof(
  fc.tuple(freePoint, freePoint, freePoint),
  fc.tuple(torsionPoint, torsionPoint, torsionPoint),
) as fc.Arbitrary<[Point, Point, Point]>;

describe("the group law — oracle: axioms on random points, ends and special positions included", () => {
  const runs = { seed: 20240601, numRuns: 150 };

  it("is commutative and associative, with O and inverses", () => {
    fc.assert(
      fc.property(triple, ([P, Q, R]) => {
        expect(P.plus(Q).toString()).toBe(Q.plus(P).toString());
        expect(P.plus(Q).plus(R).toString()).toBe(P.plus(Q.plus(R)).toString());
        expect(P.plus(P.curve.origin).equals(P)).toBe(true);
        expect(P.minus(P).isOrigin).toBe(true);
      }),
      runs,
    );
  });

  it("has m(nP) = (mn)P and mP + nP = (m + n)P", () => {
    // The digits of a multiple grow as (mn)²: small factors on generators, larger ones on torsion points.
    const small = fc.integer({ min: -4, max: 4 });
    const pair = fc.oneof(
      fc.tuple(torsionPoint, fc.integer({ min: -40, max: 40 }), fc.integer({ min: -40, max: 40 })),
      fc.tuple(fc.constantFrom(...generators), small, small),
    );
    fc.assert(
      fc.property(pair, ([P, m, n]) => {
        expect(
          P.times(n)
            .times(m)
            .equals(P.times(m * n)),
        ).toBe(true);
        expect(
          P.times(m)
            .plus(P.times(n))
            .equals(P.times(m + n)),
        ).toBe(true);
      }),
      runs,
    );
  });

  it("keeps every sum on the curve — oracle: exact substitution", () => {
    fc.assert(
      fc.property(triple, ([P, Q]) => {
        const S = P.plus(Q);
        if (!S.isOrigin) expect(S.curve.point(S.x, S.y).equals(S)).toBe(true);
      }),
      runs,
    );
  });
});

describe("large multiples by division polynomials — oracle: repeated chords and tangents", () => {
  it("agree on integral and fractional models and points, torsion included", () => {
    const cases: [readonly (string | number)[], string | number][] = [
      [[0, 0, 1, -1, 0], "1/4"],
      [[1, 0, 1, -19, 26], 1],
      [["0", "0", "0", "-30625/768", "1850640625/55296"], "4225/48"],
      [[1, -1, 0, "7/3", "1/9"], 1],
      [[0, 1, 0, -4, 4], 0],
    ];
    for (const [a, x] of cases) {
      const C = curve({ a });
      for (const P of C.pointsWith({ x })) {
        for (const n of [8, 9, 12, 13, 24, 31, -15, -16]) {
          const plain = multiplyPoint(Q, C.a, BigInt(n), P.coordinates);
          const found = P.times(n);
          expect(found.toString()).toBe(plain ? `(${plain.join(", ")})` : "O");
        }
      }
    }
  });

  it("x(300·P) on y² + y = x³ − x has lowest terms with a square denominator", () => {
    const { x } = curve({ a: [0, 0, 1, -1, 0] })
      .point(0, 0)
      .times(300);
    expect(gcd(x.num, x.den)).toBe(1n);
    expect(exactSqrt(x.den)).toBeDefined();
    expect(x.num.toString().length).toBe(1998);
  });
});

describe("the Weil pairing", () => {
  const F = curve`y^2 = x^3 - x`.mod(13); // Z/2 × Z/4
  const T = F.pointsWith({ x: 0 })[0]!;
  const U = F.pointsWith({ x: 1 })[0]!;

  it("is −1 on a basis of the 2-torsion, 1 on (P, P) — oracle: alternating and nondegenerate", () => {
    expect(F.weilPairing(2, T, U).value).toBe(12n);
    expect(F.weilPairing(2, U, U).value).toBe(1n);
  });

  it("is bilinear and alternating on the 3-torsion over F_7 of y² = x³ + 2 (Z/3 × Z/3) — oracle: axioms", () => {
    const C = curve`y^2 = x^3 + 2`.mod(7);
    expect(C.structure).toEqual([3n, 3n]);
    const points = [0, 1, 2, 3, 4, 5, 6].flatMap((x) => C.pointsWith({ x }));
    for (const P of points) {
      for (const R of points) {
        const e = C.weilPairing(3, P, R);
        expect(e.times(C.weilPairing(3, R, P)).value).toBe(1n);
        for (const S of points) {
          const sum = C.weilPairing(3, P, R.plus(S));
          expect(sum.equals(e.times(C.weilPairing(3, P, S)))).toBe(true);
        }
      }
    }
  });

  it("e_3(ω1/3, ω2/3) = exp(2πi/3) — oracle: coordinates on the torus of points of y² = x³ + 16 over Q(√−3)", () => {
    const C = curve`y^2 = x^3 + 16`.over(quadratic(-3));
    const P = C.point(0, 4);
    const R = C.point(-4, quadratic(-3).times(4));
    const L = C.lattice();
    const coordinate = (c: Real) => Math.round(3 * c.toDouble());
    const [p, r] = [L.locate(C.logarithm(P)), L.locate(C.logarithm(R))];
    const determinant = coordinate(p.r) * coordinate(r.s) - coordinate(p.s) * coordinate(r.r);
    expect(Math.abs(determinant) % 3).not.toBe(0);
    // exp(2πi/3) = −1/2 + √−3/2
    const zeta = Quadratic.of(
      Rational.of(-1, 2),
      Rational.of(determinant % 3 === 1 || determinant % 3 === -2 ? 1 : -1, 2),
      -3n,
    );
    expect(C.weilPairing(3, P, R).equals(zeta)).toBe(true);
  });

  it("indices of points over F_p — oracle: multiplication", () => {
    const C = curve`y^2 + y = x^3 - x`.mod(1_000_003);
    const P = C.pointsWith({ x: 5 })[0] ?? C.pointsWith({ x: 6 })[0]!;
    expect(C.index(P.times(123_456), P)).toBe(123_456n % BigInt(P.order()));
  });
});

describe("orders — oracle: multiples by hand", () => {
  it("O has order 1, (0, 0) on y² = x³ − x has order 2, and a point of order 9", () => {
    expect(E.origin.order()).toBe(1);
    expect(curve`y^2 = x^3 - x`.point(0, 0).order()).toBe(2);
    const nine = torsionSubgroup([1n, -1n, 1n, -14n, 29n]);
    expect(nine.structure).toEqual([9]);
  });

  it("a point moved by 10^-30 is not on the curve rather than of unknown order", () => {
    const bad = curve`y^2 = x^3 - (30625/768)x + 1850640625/55296`;
    expect(bad.point("4225/48", "3375/4").order()).toBe(7);
    const moved = Rational.parse("3375/4").plus(Rational.parse("1e-30"));
    expect(() => bad.point("4225/48", moved)).toThrow(/is 1687500000000000000000000000000001\/10{60}; expected 0/);
  });
});
