import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { Rational } from "../../../lib/number/rational.ts";
import { Complex, Real } from "../../../lib/number/values.ts";
import { DomainError } from "../../../lib/proof/errors.ts";
import { curve } from "../../../lib/surface/make-curve.ts";
import { TorusPoint } from "../../../lib/surface/torus-point.ts";
import table from "../arithmetic/curves.json" with { type: "json" };

/** The enclosure holds the printed value (cut or rounded after `digits` decimals) and is itself sharper than that. */
function expectDigits(x: Real, printed: string, digits: number): void {
  const sharp = x.digits(digits + 6);
  const unit = Rational.parse(`1e-${digits}`);
  const difference = sharp.minus(Rational.parse(printed)).abs();
  expect(difference.lessThan(unit)).toBe(true);
  expect(sharp.radius.lessThan(Rational.parse(`1e-${digits + 3}`))).toBe(true);
}

describe(`real periods of ${table.entries.length} tabulated curves — oracle: Cremona's tables, recomputed with mpmath to 28 digits`, () => {
  it("ω1 > 0 and ω2 with real part 0 (two components) or ω1/2 (one)", () => {
    for (const entry of table.entries) {
      const E = curve({ a: entry.a });
      expect(E.components).toBe(entry.real_components);
      const [w1, w2] = E.lattice().periods;
      const places = (text: string) => text.split(".")[1]!.length - 2;
      expectDigits(w1.re, entry.real_period, places(entry.real_period));
      expectDigits(w2.im, entry.second_period.im, places(entry.second_period.im));
      if (entry.real_components === 2) expect(w2.re.equals(0)).toBe(true);
      else expectDigits(w2.re, entry.second_period.re, places(entry.second_period.re));
    }
  });
});

describe("a cubic with two components, y² = x³ − 189x − 999 — oracle: mpmath at 100 digits", () => {
  const E = curve({ a: [-189, -999] });
  const P = E.point(-8, 1);

  it("periods", () => {
    const [w1, w2] = E.lattice().periods;
    expectDigits(w1.re, "0.6438535690592935752694490077520897067355", 39);
    expectDigits(w2.im, "1.391493277287892038911814221187474614148", 38);
  });

  it("(−8, 1) on the bounded component is ω2/2 + 0.1295991...", () => {
    const z = E.logarithm(P);
    expect(z).toBeInstanceOf(TorusPoint);
    const { coordinates, remainder } = z as TorusPoint;
    expect(coordinates.map(String)).toEqual(["0", "1/2"]);
    expectDigits(remainder as Real, "0.1295991169362497281236462880949217184388", 39);
  });

  it("another representative and the component, as chosen — oracle: the same point, the difference a period by hand", () => {
    const [w1, w2] = E.lattice().periods;
    const z = Complex.from(E.logarithm(P));
    const below = Complex.from(E.logarithm(P, { near: w2.div(-2) }));
    expectDigits(below.im.neg(), "0.695746638643946019455907110593737307074", 37);
    expectDigits(below.re, "0.1295991169362497281236462880949217184388", 39);
    expectDigits(
      Complex.from(E.logarithm(P, { near: z.plus(w1.times(3)) }))
        .re.minus(z.re)
        .div(w1.re),
      "3",
      30,
    );
    const Q = P.times(2); // on the component of O
    const far = E.logarithm(Q, { near: w1.re.times(-5) });
    expect(far).toBeInstanceOf(Real);
    expectDigits((far as Real).minus(E.logarithm(Q) as Real).div(w1.re), "-5", 30);
    expect(String(E.logarithm(P, { component: "bounded" }))).toBe(String(E.logarithm(P)));
    expect(() => E.logarithm(P, { component: "identity" })).toThrow(
      "a point on the bounded component; expected a point on the identity component",
    );
    expect(() => E.logarithm(Q, { component: "bounded" })).toThrow(DomainError);
  });

  it("a point with y > 0 near O has small negative z — oracle: the convention dx/2y = dz", () => {
    const near = E.pointsWith({ x: "73/4" })[0]!;
    expect(near.y.toString()).toBe("323/8");
    expect((E.logarithm(near) as Real).sign()).toBe(-1);
  });

  it("sums on the curve and on the torus agree to 30 digits — oracle: exact group law", () => {
    const z = E.logarithm(P);
    for (let n = 2; n <= 5; n++) {
      const onCurve = P.times(n);
      const onTorus = E.exponential(z.times(n));
      for (const [a, b] of [
        [onTorus.x, onCurve.x],
        [onTorus.y, onCurve.y],
      ] as const) {
        const gap = (a as Real).digits(40).minus(b).abs();
        expect(gap.lessThan(Rational.parse("1e-30"))).toBe(true);
      }
    }
  });

  it("points over Q and over R add over R, also where they are the same point", () => {
    const R = E.exponential(E.logarithm(P));
    const sum = R.plus(P);
    expect(sum.curve.field.name).toBe("R");
    expect((sum.x as Real).contains(P.times(2).x)).toBe(true);
    expect((sum.x as Real).radius.lessThan(Rational.parse("1e-15"))).toBe(true);
    expect(() => R.minus(P)).toThrow(/stays open/);
  });
});

describe("one component and torsion", () => {
  const bad = curve`y^2 = x^3 - (30625/768)x + 1850640625/55296`;
  const T = bad.point("4225/48", "3375/4");

  it("ω1 of dx/2y — oracle: mpmath at 100 digits", () => {
    expectDigits(bad.lattice().periods[0].re, "0.7439215834054005887941495606985458563046", 39);
  });

  it("multiples of a point of order 7 are exact multiples of ω1/7 — oracle: addition in Z/7", () => {
    const first = (bad.logarithm(T) as TorusPoint).coordinates[0];
    for (let k = 1; k < 7; k++) {
      const z = bad.logarithm(T.times(k)) as TorusPoint;
      const [r, s] = z.coordinates;
      expect(s.sign()).toBe(0);
      expect(r.minus(first.times(k)).isInteger()).toBe(true);
      expect(r.compare(Rational.of(1, 2)) <= 0 && r.compare(Rational.of(-1, 2)) > 0).toBe(true);
    }
    expect(bad.logarithm(bad.origin).equals(0)).toBe(true);
  });

  it("points of order two are the half periods in the order of the roots — oracle: ω1/2, (ω1+ω2)/2, ω2/2 for e1 > e2 > e3", () => {
    const E = curve`y^2 = x^3 - x`;
    const names = [1, 0, -1].map((x) => (E.logarithm(E.point(x, 0)) as TorusPoint).coordinates.join());
    expect(names).toEqual(["1/2,0", "1/2,1/2", "0,1/2"]);
  });

  it("exact torus points give points of E: ℘ at k·ω1/7 — oracle: exact multiples", () => {
    const L = bad.lattice();
    const P = bad.exponential(L.at("3/7", 0));
    const exact = [1, 2, 3, 4, 5, 6]
      .map((n) => T.times(n))
      .find((R) => (bad.logarithm(R) as TorusPoint).coordinates[0].toString() === "3/7")!;
    expect((P.x as Real).contains(exact.x)).toBe(true);
    expect((P.y as Real).contains(exact.y)).toBe(true);
  });
});

describe("round trips — oracle: exponential and logarithm are inverse", () => {
  const curves = [curve({ a: [0, 0, 1, -1, 0] }), curve({ a: [0, -1, 1, -10, -20] }), curve({ a: [1, 0, 2, 0, 0] })];

  it("exponential(logarithm(P)) holds P on random multiples", () => {
    const E = curves[0]!;
    const P = E.point(0, 0);
    fc.assert(
      fc.property(fc.integer({ min: -9, max: 9 }), (n) => {
        const R = P.times(n);
        const back = E.exponential(E.logarithm(R));
        expect(back.isOrigin).toBe(R.isOrigin);
        if (!R.isOrigin) expect((back.x as Real).contains(R.x) && (back.y as Real).contains(R.y)).toBe(true);
      }),
      { seed: 3, numRuns: 100 },
    );
  });

  it("logarithm(exponential(z)) agrees with z modulo Λ at complex z", () => {
    const part = fc.integer({ min: -400, max: 400 }).map((n) => Rational.of(2 * n + 1, 1009));
    fc.assert(
      fc.property(fc.constantFrom(...curves), part, part, (E, x, y) => {
        const z = Complex.of(x, y);
        const P = E.exponential(z);
        const { r, s } = E.lattice().locate(E.logarithm(P).minus(z));
        for (const c of [r, s]) {
          const integer = c.plus(Rational.of(1, 2)).floor()!;
          expect(c.minus(integer).abs().lessThan(Rational.parse("1e-15"))).toBe(true);
        }
      }),
      { seed: 4, numRuns: 60 }, // each run takes a complex logarithm
    );
  });
});
