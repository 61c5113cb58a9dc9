// Curves as written over the fields: quadratic fields in an embedding, F_p, enclosures over R and C.
import { describe, expect, it } from "vitest";
import { type Quadratic, quadratic } from "../../../lib/number/quadratic.ts";
import { Rational } from "../../../lib/number/rational.ts";
import { Complex, Real } from "../../../lib/number/values.ts";
import { cubic } from "../../../lib/surface/make-cubic.ts";
import { curve } from "../../../lib/surface/make-curve.ts";
import { biquadratic, quadrics } from "../../../lib/surface/make-quadrics.ts";
import { quartic } from "../../../lib/surface/make-quartic.ts";

describe("classical families by name — oracle: their j as printed in Silverman AEC and by Hesse", () => {
  const q = Rational.of;
  it.each([q(2), q(-1), q(1, 2), q(5, 3), q(-7, 4)])(
    "Legendre y² = x(x − 1)(x − λ), λ = %s: j = 2⁸(λ² − λ + 1)³/(λ²(λ − 1)²), AEC III.1.7",
    (l) => {
      const E = curve`y^2 = x(x - 1)(x - ${l})`;
      const top = l.times(l).minus(l).plus(1).pow(3).times(256);
      expect(E.j.equals(top.div(l.pow(2).times(l.minus(1).pow(2))))).toBe(true);
      expect(E.origin.divide(2).length).toBe(4);
    },
  );

  it.each([q(2), q(3), q(-1), q(1, 2), q(-5, 3)])(
    "Hesse x³ + y³ + z³ = 3k xyz, k = %s: j = 27k³(k³ + 8)³/(k³ − 1)³, O at the flex (1 : −1 : 0)",
    (k) => {
      const C = cubic`x^3 + y^3 + z^3 = 3 ${k} x y z`;
      const { curve: E, to, steps } = C.through({ x: 1, y: -1, z: 0 });
      expect(steps.flex).toBe(true);
      const k3 = k.pow(3);
      expect(E.j.equals(k3.times(27).times(k3.plus(8).pow(3)).div(k3.minus(1).pow(3)))).toBe(true);
      expect(to.verify().kind).toBe("proved");
      expect(to(C.point({ x: 0, y: 1, z: -1 })).order()).toBe(3);
    },
  );

  it.each([
    [q(3), q(1)],
    [q(-1), q(2)],
    [q(5, 2), q(-3)],
  ])("Montgomery B y² = x³ + A x² + x, A = %s, B = %s: j = 256(A² − 3)³/(A² − 4); (0, 0) has order 2", (A, B) => {
    const E = curve`${B} y^2 = x^3 + ${A} x^2 + x`;
    const A2 = A.times(A);
    expect(E.j.equals(A2.minus(3).pow(3).times(256).div(A2.minus(4)))).toBe(true);
    expect(E.point(0, 0).order()).toBe(2);
    expect(E.given === undefined).toBe(B.equals(1));
  });
});

describe("cubics, quartics and quadrics over F_p — oracle: all points of the plane or of space tried one by one", () => {
  const equal = (form: (...c: number[]) => number, p: number, n: number): number => {
    let zeros = 0;
    const loop = (c: number[]): void => {
      if (c.length === n) {
        if (form(...c) % p === 0 && c.some((x) => x !== 0)) zeros++;
        return;
      }
      for (let x = 0; x < p; x++) loop([...c, x]);
    };
    loop([]);
    return zeros / (p - 1);
  };

  it("u³ + 2v³ + 3w³ = 6uvw has as many points as its Weierstrass model and Jacobian; every point there and back", () => {
    const C = cubic`u^3 + 2v^3 + 3w^3 = 6u v w`;
    for (const p of [5, 7, 11, 13, 17]) {
      const D = C.mod(p);
      const { curve: E, to, from } = D.through({ u: 1, v: 1, w: 1 });
      const plain = equal((u, v, w) => u! ** 3 + 2 * v! ** 3 + 3 * w! ** 3 - 6 * u! * v! * w!, p, 3);
      expect([Number(E.count), Number(D.jacobian().count)]).toEqual([plain, plain]);
      expect(to.verify().kind).toBe("proved");
      for (let x = 0; x < p; x++) {
        for (const R of E.pointsWith({ x })) expect(to(from(R)).equals(R)).toBe(true);
      }
    }
    expect(() => C.mod(3)).toThrow(/expected a prime above 3/);
  });

  it("two quadrics and a curve of Edwards type", () => {
    const Q = quadrics`x^2 + 5y^2 = z^2, x^2 - 5y^2 = w^2`;
    for (const p of [7, 11, 13]) {
      const E = Q.mod(p).through({ x: 1, y: 0, z: 1, w: 1 }).curve;
      const both = (x: number, y: number, z: number, w: number) =>
        (x * x + 5 * y * y - z * z) % p === 0 && (x * x - 5 * y * y - w * w) % p === 0 ? 0 : 1;
      expect(Number(E.count)).toBe(equal(both as never, p, 4));
    }
    const C = biquadratic`x^2 + y^2 = 1 + 3x^2 y^2`.mod(13);
    const { curve: E, to } = C.through({ x: 0, y: 1 });
    expect(E.count).toBe(C.jacobian().count);
    expect(to.verify().kind).toBe("proved");
    expect(() => Q.mod(5)).toThrow(/singular or reducible/);
  });

  it("y² = x⁴ + x + 2 with a point at infinity", () => {
    const C = quartic`y^2 = x^4 + x + 2`;
    for (const p of [5, 7, 13, 29]) {
      const D = C.mod(p);
      let affine = 0;
      for (let x = 0; x < p; x++) for (let y = 0; y < p; y++) if ((y * y - x ** 4 - x - 2) % p === 0) affine++;
      const { curve: E, to, from } = D.through(D.pointsAtInfinity[0]!);
      expect(Number(E.count)).toBe(affine + 2);
      expect(to.verify().kind).toBe("proved");
      expect(from(E.origin).equals(D.pointsAtInfinity[0]!)).toBe(true);
    }
  });
});

describe("over a quadratic field in its embedding", () => {
  const root2 = quadratic(2);

  it("x³ + y³ = √2 through its flex at infinity — oracle: exact substitution; j = 0", () => {
    const C = cubic`x^3 + y^3 = ${root2}`;
    const { curve: E, to, from } = C.through({ x: 1, y: -1, z: 0 });
    expect(E.field.name).toBe("Q(√2)");
    expect([String(E.j), to.verify().kind, from.verify().kind]).toEqual(["0", "proved", "proved"]);
    expect(C.jacobian().j.equals(E.j)).toBe(true);
  });

  it("conjugate quartics have different real periods: the embedding is that of the number", () => {
    const make = (r: Quadratic) => quartic`y^2 = x^4 + ${r} x + 1`.through({ x: 0, y: 1 }).curve;
    const [E, F] = [make(root2), make(root2.conjugate())];
    expect(F.j.equals(E.j.conjugate())).toBe(true);
    // x ↦ −x exchanges the two curves, so their periods agree; j lies in Q here.
    expect(E.lattice().periods[0].re.overlaps(F.lattice().periods[0].re)).toBe(true);
    const [G, H] = [root2, root2.conjugate()].map((r) => curve`y^2 = x^3 + ${r} x + 1`);
    expect(G!.lattice().periods[0].re.overlaps(H!.lattice().periods[0].re)).toBe(false);
  });

  it("a rational cubic gains points over Q(√17): u³ + v³ = 9 at √17", () => {
    const C = cubic`u^3 + v^3 = 9`.over(quadratic(17));
    const P = C.point({ u: 1, v: 2 });
    expect(C.through(P).to.verify().kind).toBe("proved");
  });
});

describe("over R and C: enclosures where they decide", () => {
  it("y² = x⁴ + πx + 1 over R through (0, 1) — oracle: invariants of the Jacobian overlap", () => {
    const t = Real.from("3.25").sqrt();
    const C = quartic`y^2 = x^4 + ${t} x + 1`;
    const { curve: E, to } = C.through({ x: 0, y: 1 });
    expect(E.field.name).toBe("R");
    expect(E.j.overlaps(C.jacobian().j)).toBe(true);
    expect(to(C.point({ x: 0, y: 1 })).isOrigin).toBe(true);
  });

  it("a cubic over C through an exact point", () => {
    const C = cubic`x^3 + y^3 + ${Complex.of(0, 1)} z^3 = ${Complex.of(1, 1)} x y z`;
    const { curve: E } = C.through({ x: 1, y: -1, z: 0 });
    expect(E.field.name).toBe("C");
    expect(E.j.overlaps(C.jacobian().j)).toBe(true);
  });
});
