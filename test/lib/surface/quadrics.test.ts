import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { Rational } from "../../../lib/number/rational.ts";
import { curve } from "../../../lib/surface/make-curve.ts";
import { biquadratic, quadrics } from "../../../lib/surface/make-quadrics.ts";

const q = (text: string | number) => Rational.parse(String(text));

describe("curves of Edwards type, x² + y² = 1 + d x²y²", () => {
  it.each([2, 3, -1, "1/2", 5])(
    "d = %s: j = 16(d² + 14d + 1)³/(d(1 − d)⁴), a point of order 4 — oracle: Edwards 2007",
    (given) => {
      const d = q(given);
      const C = biquadratic`x^2 + y^2 = 1 + ${d} x^2 y^2`;
      const { curve: E, to, from } = C.through({ x: 0, y: 1 });
      const above = d.times(d).plus(d.times(14)).plus(1).pow(3).times(16);
      expect(E.j.equals(above.div(d.times(q(1).minus(d).pow(4))))).toBe(true);
      expect([to.verify().kind, from.verify().kind]).toEqual(["proved", "proved"]);
      expect(to(C.point({ x: 1, y: 0 })).order()).toBe(4);
      expect(C.jacobian().equals(E)).toBe(true);
      for (const [x, y] of [
        [0, 1],
        [0, -1],
        [1, 0],
        [-1, 0],
      ]) {
        const P = C.point({ x: x!, y: y! });
        expect(from(to(P)).equals(P)).toBe(true);
      }
      expect(from.factor).toEqual(q(1).div(to.factor as Rational));
    },
  );

  it("the law (x1y2 + x2y1)/(1 + d x1x2y1y2), (y1y2 − x1x2)/(1 − d x1x2y1y2) is the sum — oracle: Edwards's formula", () => {
    const d = q(3);
    const F = biquadratic`x^2 + y^2 = 1 + 3x^2 y^2`.mod(101);
    const { to, from } = F.through({ x: 0, y: 1 });
    const affine = Array.from({ length: 101 }, (_, x) => x).flatMap((x) =>
      Array.from({ length: 101 }, (_, y) => y).flatMap((y) =>
        (x * x + y * y - 1 - 3 * x * x * y * y) % 101 === 0 ? [F.point({ x, y })] : [],
      ),
    );
    expect(affine.length).toBeGreaterThan(80);
    const K = F.field;
    for (const P of affine.slice(0, 12)) {
      for (const R of affine.slice(-9)) {
        const { x: x1, y: y1 } = P.affine ?? coordinates(P);
        const { x: x2, y: y2 } = R.affine ?? coordinates(R);
        const t = K.mul(K.fromInt(d.num), K.mul(K.mul(x1!, x2!), K.mul(y1!, y2!)));
        const [one, two] = [K.add(K.one, t), K.sub(K.one, t)];
        if (K.isZero(one) || K.isZero(two)) continue;
        const x = K.mul(K.add(K.mul(x1!, y2!), K.mul(x2!, y1!)), K.inv(one));
        const y = K.mul(K.sub(K.mul(y1!, y2!), K.mul(x1!, x2!)), K.inv(two));
        expect(from(to(P).plus(to(R))).equals(F.point({ x, y }))).toBe(true);
      }
    }
  });

  it("points at infinity are named, and mapped there and back", () => {
    const C = biquadratic`x^2 + y^2 = 1 + 9x^2 y^2`;
    const { to, from } = C.through({ x: 0, y: 1 });
    expect(C.pointsAtInfinity.map(String)).toEqual(["(∞, -1/3)", "(∞, 1/3)", "(-1/3, ∞)", "(1/3, ∞)"]);
    for (const P of C.pointsAtInfinity) {
      expect(from(to(P)).equals(P)).toBe(true);
      expect(to(P).order()).not.toBe(Infinity);
    }
    const through = C.through(C.pointsAtInfinity[0]!);
    expect(through.curve.j.equals(C.jacobian().j)).toBe(true);
    expect(through.to.verify().kind).toBe("proved");
  });

  it("refuses d = 0 and d = 1, other shapes, and points that are not on it", () => {
    expect(() => biquadratic`x^2 + y^2 = 1 + x^2 y^2`).toThrow(/singular or reducible/);
    expect(() => biquadratic`x^3 + y = 1`).toThrow(/degree at most 2 in each/);
    expect(() => biquadratic`x^2 + y^2 = 1 + 3x^2 y^2`.point({ x: 1, y: 1 })).toThrow(/\(1, 1\) is not on/);
  });
});

/** x and y of a point with x·y = s, t = 1 written projectively. */
function coordinates(P: { readonly coordinates: readonly unknown[] }): Readonly<Record<string, never>> {
  const [x, y] = P.coordinates;
  return { x: x as never, y: y as never };
}

describe("intersections of two quadrics", () => {
  it.each([5, 6, 7, 13, 34])(
    "x² + n y² = z², x² − n y² = w² for n = %i is y² = x³ − n²x — oracle: congruent numbers (Koblitz, I.4)",
    (n) => {
      const C = quadrics`x^2 + ${n} y^2 = z^2; x^2 - ${n} y^2 = w^2`;
      const { curve: E, to, from } = C.through({ x: 1, y: 0, z: 1, w: 1 });
      expect(E.equals(curve({ a: [-(n * n), 0] }).minimal().curve)).toBe(true);
      expect([to.verify().kind, from.verify().kind]).toEqual(["proved", "proved"]);
      expect(C.jacobian().equals(E)).toBe(true);
      expect(to(C.point({ x: 1, y: 0, z: -1, w: 1 })).order()).toBe(2);
    },
  );

  it("the triangle of area 5 comes from a point of infinite order, and its multiples come back", () => {
    const C = quadrics`a^2 + 5b^2 = c^2, a^2 - 5b^2 = d^2`;
    const { to, from } = C.through({ a: 1, b: 0, c: 1, d: 1 });
    const P = C.point({ a: 41, b: 12, c: 49, d: 31 });
    expect(to(P).order()).toBe(Infinity);
    for (const n of [1, 2, 3, -2]) {
      const R = from(to(P).times(n));
      expect(to(R).equals(to(P).times(n))).toBe(true);
    }
  });

  it("affine in three letters, with parameters, line breaks and TeX", () => {
    const n = 7;
    const C = quadrics`
      x^2 - ${n} = y^2
      x^2 + ${n} = z^{2}`;
    expect(String(C)).toBe("x^2 - y^2 - 7 = 0, x^2 - z^2 + 7 = 0 over Q");
    const { curve: E } = C.through({ x: 1, y: 1, z: 1, w: 0 });
    expect(E.toString()).toBe("y^2 = x^3 - 49*x over Q");
  });

  it("random pairs through a point: there and back, Jacobian by the pencil — oracle: exact substitution", () => {
    const small = fc.integer({ min: -3, max: 3 });
    let smooth = 0;
    fc.assert(
      fc.property(fc.array(small, { minLength: 14, maxLength: 14 }), (c) => {
        const [a, b] = [c.slice(0, 7), c.slice(7)];
        try {
          // Both vanish at (0 : 0 : 1 : 0).
          const C = quadrics`
            ${a[0]!}x^2 + ${a[1]!}x y + ${a[2]!}y^2 + ${a[3]!}x w + ${a[4]!}w^2 + ${a[5]!}x z + ${a[6]!}y z
            ${b[0]!}x^2 + ${b[1]!}x y + ${b[2]!}y^2 + ${b[3]!}y w + ${b[4]!}w^2 + ${b[5]!}w z + ${b[6]!}y z`;
          const P = C.point({ x: 0, y: 0, z: 1, w: 0 });
          const { curve: E, to, from } = C.through(P);
          smooth++;
          expect(to.verify().kind).toBe("proved");
          expect(C.jacobian().equals(E)).toBe(true);
          expect(to(P).isOrigin && from(E.origin).equals(P)).toBe(true);
          for (const R of E.points({ height: 5 })) expect(to(from(R)).equals(R)).toBe(true);
        } catch (error) {
          expect(String(error)).toMatch(/singular or reducible|letters|of degree/);
        }
      }),
      { seed: 12, numRuns: 30 }, // each run verifies two maps and their compositions exactly
    );
    expect(smooth).toBeGreaterThan(8);
  }, 120_000);

  it("refuses one equation, another degree, too few letters, two cones", () => {
    expect(() => quadrics`x^2 + y^2 = z^2`).toThrow(/1 equation; expected two/);
    expect(() => quadrics`x^2 + y^2 = z^2, x + y = w`).toThrow(/of degree 1/);
    expect(() => quadrics`x^2 + y^2 = 1, x^2 = 2`).toThrow(/the 2 letters x, y/);
    expect(() => quadrics`x^2 + y^2 = z^2, x^2 = w^2`).toThrow(/singular or reducible/);
  });
});
