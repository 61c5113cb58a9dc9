// Whole jobs with values computed by mpmath at 60 and again at 100 digits, each by a second formula too.
import { describe, expect, it } from "vitest";
import { rationals as Q } from "../../../lib/algebra/rationals.ts";
import { plainPolynomial } from "../../../lib/curve/equation/print.ts";
import { Quadratic, quadratic } from "../../../lib/number/quadratic.ts";
import { Rational } from "../../../lib/number/rational.ts";
import { Complex, type Real } from "../../../lib/number/values.ts";
import { DomainError } from "../../../lib/proof/errors.ts";
import { cubic } from "../../../lib/surface/make-cubic.ts";
import { curve } from "../../../lib/surface/make-curve.ts";

function expectDigits(x: Real, printed: string): void {
  const digits = printed.split(".")[1]!.length;
  const sharp = x.digits(digits + 6);
  expect(
    sharp
      .minus(Rational.parse(printed))
      .abs()
      .lessThan(Rational.parse(`1e-${digits}`)),
  ).toBe(true);
}
const text = (f: unknown) => plainPolynomial(Q, f as never);

describe("a weighted cubic with an obvious point, u³ + 2v³ + 3w³ = 6uvw", () => {
  const C = cubic`u^3 + 2v^3 + 3w^3 = 6uvw`;
  const P = C.point({ u: 1, v: 1, w: 1 });
  const { curve: E, to, from } = C.through(P);
  const third = C.tangent(P).meets;
  const first = to(third);

  it("the tangent u = w meets the cubic again at (1 : −2 : 1)", () => {
    expect(text(C.tangent(P).form)).toBe("-u + w");
    expect(third.toString()).toBe("(1 : -2 : 1)");
  });

  it("is y² = x³ − 189x − 999 with c4 = 2⁴3⁴7, Δ = 2⁴3¹⁰, j = 2⁸3²7³, maps verified exactly", () => {
    expect(E.toString()).toBe("y^2 = x^3 - 189*x - 999 over Q");
    expect([E.c4, E.c6, E.discriminant, E.j].map(String)).toEqual(["9072", "863136", "944784", "790272"]);
    expect(to.verify().kind).toBe("proved");
    expect(String(to.factor)).toBe("-1");
  });

  it("the multiples of the tangent's point go to the listed points of the cubic", () => {
    const listed = new Map([
      ["(-8, 1)", first.y.sign() > 0 ? "(1 : -2 : 1)" : "(-19 : -4 : 17)"],
      ["(-8, -1)", first.y.sign() > 0 ? "(-19 : -4 : 17)" : "(1 : -2 : 1)"],
    ]);
    for (const [point, image] of listed) {
      const [x, y] = point.slice(1, -1).split(", ");
      expect(from(E.point(x!, y!)).toString()).toBe(image);
    }
    const images = [2, -2, 3].map((n) => from(first.times(n)).toString());
    expect(images).toEqual(["(143 : 113 : 71)", "(16307 : 9281 : 8747)", "(-282473 : 86392 : 114427)"]);
    expect(first.times(3).x.toString()).toBe("-85616/11025");
    expect(first.order()).toBe(Infinity);
  });

  it("a map takes coordinates as the curve does, and refuses a point off it — oracle: 1 + 2 + 3·8 − 6·2 = 15", () => {
    expect(to({ u: 1, v: -2, w: 1 }).equals(first)).toBe(true);
    expect(() => to({ u: 1, v: 1, w: 2 })).toThrow("is 15 there");
    expect(() => to({ u: 1, v: 1, z: 2 })).toThrow(DomainError);
  });

  it("there is no other primitive solution up to 60", () => {
    expect(C.points({ height: 60 }).map(String)).toEqual(["(1 : 1 : 1)", "(1 : -2 : 1)", "(-19 : -4 : 17)"]);
  });

  it("torsion is trivial although 3 divides all counts; the 3-division polynomial is 3(x + 9)(x³ − 9x² − 297x − 1323)", () => {
    expect([5, 7, 11, 13, 17, 19, 23, 29].map((p) => Number(E.mod(p).count))).toEqual([9, 9, 15, 15, 24, 24, 21, 33]);
    expect(E.torsion().structure).toEqual([]);
    expect(E.torsion().settledByDivision).toEqual([3]);
    expect(text(E.divisionPolynomial(3))).toBe("3*x^4 - 1134*x^2 - 11988*x - 35721");
    expect(E.pointsWith({ x: -9 })).toEqual([]);
  });

  it("refusals: a point off the cubic, a singular cubic; the Jacobian without a point", () => {
    expect(() => C.point({ u: 1, v: 1, w: 2 })).toThrow(/is 15 there/);
    expect(() => cubic`u^3 + v^3 + w^3 = 3uvw`).toThrow(/singular at \(1 : 1 : 1\).*three lines/s);
    expect(C.jacobian().equals(E)).toBe(true);
  });
});

describe("torsion hidden in a bad model", () => {
  const bad = curve`y^2 = x^3 - (30625/768)x + 1850640625/55296`;
  const working = curve`y^2 - 5xy - 18y = x^3 - 18x^2`;

  it("minimal model y² + xy = x³ − x + 137 and the change of model", () => {
    const { curve: E, to } = bad.minimal();
    expect(E.toString()).toBe("y^2 + x*y = x^3 - x + 137 over Q");
    expect([E.c4, E.c6, E.discriminant, E.j].map(String)).toEqual(["49", "-118441", "-8118144", "-117649/8118144"]);
    expect(to.verify().kind).toBe("proved");
    const { u, r, s, t } = to.change!;
    expect([u, r, s, t].map(String)).toEqual(["5/2", "25/48", "5/4", "0"]);
    const iso = bad.isomorphism(working)!;
    expect(String(iso(bad.point("4225/48", "3375/4")).x)).toBe("18");
  });

  it("Z/7, proved; nP on the working model", () => {
    expect(bad.torsion().toString()).toBe("Z/7");
    expect([bad.mod(5).count, bad.mod(7).count]).toEqual([7n, 7n]);
    const P = working.point(0, 0);
    const multiples = [1, 2, 3, 4, 5, 6, 7].map((n) => P.times(n).toString());
    expect(multiples).toEqual(["(0, 0)", "(18, 108)", "(6, 12)", "(6, 36)", "(18, 0)", "(0, 18)", "O"]);
  });

  it("Ω, ω2 and the ratio 2/5 of the real periods; (0, 0) is 3Ω/7", () => {
    const [w1, w2] = working.lattice().periods;
    expectDigits(w1.re, "1.859803958513501471985373901746364640761");
    expectDigits(w2.im, "0.5326696123660310190434545340947246191711");
    expectDigits(bad.lattice().periods[0].re.div(w1.re), `0.4${"0".repeat(38)}`);
    const z = working.logarithm(working.point(0, 0));
    expect((z as unknown as { name: string }).name).toBe("3ω1/7");
    const xs = [1, 2, 3, 4, 5, 6].map((k) => working.exponential(working.lattice().at(Rational.of(k, 7), 0)));
    expect(xs.map((P) => Math.round((P.x as Real).toDouble()) + 0)).toEqual([18, 6, 0, 0, 6, 18]);
    expect(xs.map((P) => Math.round((P.y as Real).toDouble()) + 0)).toEqual([0, 12, 0, 18, 36, 108]);
  });
});

describe("complex multiplication or not: twists and two embeddings of a quadratic j", () => {
  const A = curve`y^2 = x^3 + 15x^2 - 14800x + 624000`;
  const B = curve`y^2 = x^3 - 595x - 5586`;

  it("A and B: j = 255³, twists by −5, isomorphic over Q(√−5) only", () => {
    expect([A.j, B.j].map(String)).toEqual(["16581375", "16581375"]);
    expect(A.discriminant.equals(2n ** 12n * 5n ** 6n * 7n ** 3n)).toBe(true);
    expect(A.twist(-5).equals(B.minimal().curve)).toBe(true);
    expect(A.isomorphism(B)).toBe(undefined);
    const over = A.over(quadratic(-5)).isomorphism(B.over(quadratic(-5)))!;
    expect(over.verify().kind).toBe("proved");
    expectDigits(A.lattice().tau.im, "0.3779644730092272272145165362341800608158");
    expectDigits(A.lattice().periods[0].re, "0.571881314801472759885557697335946755158");
    expectDigits(B.lattice().periods[0].re, "0.4833279264042028866832692097574534327625");
  });

  it("y² = 4x³ − gx − g over Q(√5) and its conjugate: periods of both, in the embedding of the number", () => {
    const j = Quadratic.of(Rational.of(-191025, 2), Rational.of(-85995, 2), 5n);
    const g = j.times(27).div(j.minus(1728));
    expect(String(g)).toBe("675/121 + 56160/5929 √5");
    const plus = curve`y^2 = 4x^3 - ${g}x - ${g}`;
    const minus = curve`y^2 = 4x^3 - ${g.conjugate()}x - ${g.conjugate()}`;
    expect(plus.j.equals(j) && minus.j.equals(j.conjugate())).toBe(true);
    expectDigits(plus.lattice().periods[0].re, "1.483824794570827401840395776610873850307");
    expectDigits(minus.lattice().periods[0].re, "2.769068513595511194136830733448553369606");
    expectDigits(minus.lattice().tau.im, "0.3872983346207416885179265399782399610833");
  });
});

describe("isogenous by inclusion: a third of the real period of y² + xy + 2y = x³", () => {
  const E = curve`y^2 + xy + 2y = x^3`;
  const L = E.lattice();
  const phi = E.isogeny({ kernel: L.at("1/3", 0) });

  it("kernel {O, (0, 0), (0, −2)}, x ↦ x + 2/x + 4/x², target with c4 = 433, c6 = 24407", () => {
    expect(phi(E.point(0, 0)).isOrigin && phi(E.point(0, -2)).isOrigin).toBe(true);
    const [x] = phi.formula.parts;
    expect([text(x!.numerator), text(x!.denominator)]).toEqual(["x^3 + 2*x + 4", "x^2"]);
    expect([phi.to.c4, phi.to.c6, phi.to.discriminant, phi.to.j].map(String)).toEqual([
      "433",
      "24407",
      "-297754",
      "-81182737/297754",
    ]);
  });

  it("at z = 0.41 + 0.27i both descriptions agree with the listed values", () => {
    const z = Complex.of("0.41", "0.27");
    const P = E.exponential(z);
    expectDigits((P.x as Complex).re, "1.542183807010394571041421493420004068999");
    expectDigits((P.x as Complex).im.neg(), "3.860888300297573083044559549493280175689");
    const R = phi.to.exponential(z);
    expectDigits((R.x as Complex).re, "1.552895053477971330140422431883694307760");
    expectDigits((R.x as Complex).im.neg(), "3.254714491679287564674934806820147140957");
  });

  it("ω1 is divided by 3; the dual composes to multiplication by 3", () => {
    expectDigits(L.periods[0].re, "3.785783058608572345708102987819868017866");
    expect(phi.to.lattice().periods[0].re.times(3).overlaps(L.periods[0].re)).toBe(true);
    const three = phi.dual().compose(phi);
    expect(three.degree).toBe(9);
    expect(String(three.factor)).toBe("3");
    expect(three.verify().kind).toBe("proved");
  });

  it("refusals: a number near ω1/3, another third, points that are no subgroup", () => {
    expect(() => E.isogeny({ kernel: L.periods[0].div(3).plus("1e-9") })).toThrow(
      /3-fold differs from a period by 3\.0000/,
    );
    expect(() => E.isogeny({ kernel: L.at("1/3", "1/3") })).toThrow(/expected a subgroup that is defined over Q/);
    expect(() => E.isogeny({ kernel: [E.point(0, 0)] })).toThrow(/\(0, 0\) \+ \(0, 0\) = \(0, -2\)/);
  });
});
