import { describe, expect, it } from "vitest";
import * as figure from "../../../lib/figure/figures.ts";
import { complex } from "../../../lib/number/convert.ts";
import { atDigits } from "../../../lib/number/functions.ts";
import { curve } from "../../../lib/surface/make-curve.ts";
import { elements } from "./normalise.ts";

const E = curve`y^2 + y = x^3 - x`;
const P = E.point(0, 0);

/** Centres of the circles of a class. */
function centres(svg: string, className: string): [number, number][] {
  return elements(svg, className).map((text) => {
    const number = (name: string) => Number(new RegExp(` ${name}="([-\\d.]+)"`).exec(text)?.[1]);
    return [number("cx"), number("cy")];
  });
}

/** The dots of marked points, which have no class, with the centre and the radii of the circles. */
function polar(svg: string, middle: readonly [number, number]) {
  const dots = [...svg.matchAll(/<circle cx="([\d.]+)" cy="([\d.]+)" r="3.6"/g)];
  return dots.map((m) => {
    const [x, y] = [Number(m[1]) - middle[0], middle[1] - Number(m[2])];
    const turn = Math.atan2(y, x) / (2 * Math.PI);
    return { turn: turn < 0 ? turn + 1 : turn, radius: Math.hypot(x, y) };
  });
}

const MIDDLE = [330, 211] as const;

describe("figure.circle", () => {
  it("kP stand at k times the angle of P, odd ones on the inner circle — oracle: the logarithm is additive", () => {
    const multiples = [1, 2, 3, 4, 5].map((k) => P.times(k));
    const picture = figure.circle(E, { points: multiples });
    const places = polar(picture.svg, MIDDLE);
    expect(places.length).toBe(5);
    for (const [k, { turn, radius }] of places.entries()) {
      const expected = ((k + 1) * places[0]!.turn) % 1;
      const apart = Math.abs(turn - expected);
      // Pixels are rounded to a hundredth, at least 80 from the centre; k times that.
      expect(Math.min(apart, 1 - apart)).toBeLessThan((k + 1) * 2e-4);
      expect(radius < 0.8 * places[1]!.radius).toBe(k % 2 === 0);
    }
    expect(elements(picture.svg, "bounded").length).toBe(1);
    expect(picture.alt).toContain("P1 at t near 0.3105 ω1 on the bounded component");
  });

  it("torsion of order 5 divides the circle — oracle: exact multiples of ω1/5", () => {
    const F = curve`y^2 + y = x^3 - x^2`;
    const picture = figure.circle(F, { points: F.torsion().points });
    expect(Object.values(picture.data.logarithms as object).sort()).toEqual(["2ω1/5", "ω1/5", "−2ω1/5", "−ω1/5"]);
    expect(elements(picture.svg, "bounded").length).toBe(0);
    const turns = polar(picture.svg, MIDDLE).map(({ turn }) => turn * 5);
    for (const turn of turns) expect(Math.abs(turn - Math.round(turn))).toBeLessThan(1e-3);
  });

  it("O and the points of order two; data that do not depend on the digits", () => {
    const F = curve`y^2 = x^3 - x`;
    const points = { O: F.origin, A: F.point(1, 0), B: F.point(0, 0), C: F.point(-1, 0) };
    const alt = figure.circle(F, { points }).alt;
    expect(alt).toContain("O at t near 0 ω1; A at t near 0.5 ω1; B at t near 0.5 ω1 on the bounded component");
    const data = (digits: number) => atDigits(digits, () => figure.circle(E, { points: { P } }).data);
    expect(data(60)).toEqual(data(20));
  });

  it("a curve that is not real is refused", () => {
    const C = curve({ a: [0, 0, 0, complex(1, 1), complex(0, 1)] as never });
    expect(() => figure.circle(C)).toThrow(/real coefficients/);
  });
});

describe("figure.curve over F_p", () => {
  it("every pair (x, y) that satisfies the equation, and no other — oracle: all pairs tried", () => {
    for (const p of [2, 3, 23]) {
      const found: string[] = [];
      for (let x = 0; x < p; x++)
        for (let y = 0; y < p; y++) if ((y * y + y - x ** 3 + x) % p === 0) found.push(`(${x}, ${y})`);
      const picture = figure.curve(E.mod(p));
      expect(picture.data.points).toEqual(found);
      expect(centres(picture.svg, "point").length).toBe(found.length);
      expect(found.length + 1).toBe(Number(E.mod(p).count));
    }
  });

  it("marks points by name; x and y have one scale — fact: the dot of (22, 22) is on the diagonal", () => {
    const F = E.mod(23);
    const Q = F.point(0, 0);
    const picture = figure.curve(F, { points: { Q, R: Q.times(3), O: F.origin } });
    expect(picture.alt).toContain("Q at (0, 0); R at (22, 22); O is O, at infinity");
    const [q, r] = centres(picture.svg, "marked");
    expect(Math.abs((r![0] - q![0]) / (q![1] - r![1]) - 1)).toBeLessThan(1e-3);
  });

  it("a large prime, a chord and a point of another curve are refused", () => {
    expect(() => figure.curve(E.mod(223))).toThrow(/prime up to 211/);
    const F = E.mod(23);
    expect(() => figure.curve(F, { chord: [F.origin, F.origin] })).toThrow(/chord/);
    expect(() => figure.curve(F, { points: { P } })).toThrow(/not a point of/);
  });
});
