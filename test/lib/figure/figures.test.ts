import { describe, expect, it } from "vitest";
import * as figure from "../../../lib/figure/figures.ts";
import { complex } from "../../../lib/number/convert.ts";
import { atDigits } from "../../../lib/number/functions.ts";
import { bundle } from "../../../lib/page/bundle.ts";
import { cubic } from "../../../lib/surface/make-cubic.ts";
import { curve } from "../../../lib/surface/make-curve.ts";
import { lattice } from "../../../lib/surface/make-lattice.ts";
import { quartic } from "../../../lib/surface/make-quartic.ts";
import { elements } from "./normalise.ts";

const E = curve`y^2 + y = x^3 - x`;
const P = E.point(0, 0);
const Q = E.point(-1, -1);
const L = lattice({ invariants: [4, -1] });

/** Plane coordinates of the pixels of circles, by the scale that the ticks show. */
function circles(svg: string): [number, number][] {
  return [...svg.matchAll(/<circle cx="([\d.]+)" cy="([\d.]+)" r="3.6"/g)].map((m) => [Number(m[1]), Number(m[2])]);
}

describe("figure.curve", () => {
  it("names the points as they were given, and the sum — oracle: P + Q = (2, −3) by hand", () => {
    const picture = figure.curve(E, { points: { P, Q }, chord: [P, Q] });
    expect(picture.alt).toContain("P near (0, 0); Q near (-1, -1); −(P + Q) near (2, 2); P + Q near (2, -3)");
    expect(picture.data.points).toEqual({ P: "(0, 0)", Q: "(-1, -1)" });
    expect(picture.data.closed).toBe("1");
  });

  it("P, Q and −(P + Q) are drawn on one line — oracle: cross product of the dots", () => {
    const [p, q, r] = circles(figure.curve(E, { points: { P, Q }, chord: [P, Q] }).svg);
    const cross = (q![0] - p![0]) * (r![1] - p![1]) - (q![1] - p![1]) * (r![0] - p![0]);
    expect(Math.abs(cross) / 1e5).toBeLessThan(0.02);
  });

  it("the tangent gives 2P; P and −P give an upright line", () => {
    expect(figure.curve(E, { points: { P }, chord: [P, P] }).alt).toContain("2P near (1, 0)");
    expect(figure.curve(E, { points: { P }, chord: [P, P.neg()] }).alt).toContain("upright");
    expect(figure.curve(E, { chord: [P, E.origin] }).alt).toContain("O");
  });

  it("a window is kept, an empty one refused", () => {
    const picture = figure.curve(E, { window: { x: [-2, "3.5"], y: [-1, 1] } });
    expect(picture.alt).toContain("x from -2 to 3.5 and y from -1 to 1");
    expect(() => figure.curve(E, { window: { x: [2, 1], y: [0, 1] } })).toThrow(/lower end first/);
  });

  it("bundle: picture and words, no formula", () => {
    const shown = bundle(figure.curve(E));
    expect(Object.keys(shown ?? {}).sort()).toEqual([
      "application/vnd.halfperiod.value+json",
      "image/svg+xml",
      "text/plain",
    ]);
  });
});

describe("figure.lattice and figure.fundamentalDomain", () => {
  it("marks points by name, exact ones by their coordinates", () => {
    expect(figure.lattice(L, { points: { z1: complex("0.5", "0.25") } }).alt).toContain("z1 near 0.5 + 0.25 i");
    expect(figure.lattice(L, { points: L.halfPeriods }).alt).toContain("(ω1 + ω2)/2 near 1.497 + 1.226 i");
  });

  it("the periods are those of the lattice — oracle: published real period 2.99345864", () => {
    const picture = figure.lattice(L);
    expect(picture.alt).toContain("ω1 near 2.993 + 0 i and ω2 near 0 + 2.451 i");
    expect((picture.data.periods as string[])[0]).toBe("2.99345864623...");
  });

  it("a second lattice is drawn as rings — oracle: three times as many points in Λ + Zω1/3", () => {
    const [w1, w2] = L.periods;
    const M = lattice({ periods: [w1.div(3), w2] });
    const picture = figure.lattice(L, { overlay: M, window: { x: [-3.1, 6.1], y: [-2.6, 2.6] } });
    expect(elements(picture.svg, "other").length).toBeGreaterThan(2 * elements(picture.svg, "lattice").length);
    expect(picture.alt).toContain("second lattice is drawn as rings");
  });

  it("the data do not depend on the digits asked for — oracle: the same picture at 20 and at 60 digits", () => {
    const zP = E.logarithm(P);
    const data = (digits: number) =>
      atDigits(digits, () => figure.lattice(E.lattice(), { points: { zP, third: E.lattice().at("1/3", 0) } }).data);
    expect(data(60)).toEqual(data(20));
    expect((data(20).points as Record<string, string>).third).toBe("ω1/3");
  });

  it("a lattice stands for its reduced τ; τ below the axis is refused", () => {
    const picture = figure.fundamentalDomain({ points: { L, i: complex(0, 1) } });
    expect(picture.alt).toContain("L near 0 + 1.221 i; i near 0 + 1 i");
    expect(picture.alt).toContain("L: inside");
    expect(elements(picture.svg, "included").length).toBe(1);
    expect(() => figure.fundamentalDomain({ points: [complex(0, -1)] })).toThrow(/Im τ > 0/);
  });

  it("what is no number is refused by name", () => {
    expect(() => figure.lattice(L, { points: { z: {} as never } })).toThrow(/figure\.lattice/);
  });
});

describe("figure.curve of plane cubics and quartics", () => {
  const C = cubic`u^3 + 2v^3 + 3w^3 = 6 u v w`;
  const A = C.point({ u: 1, v: 1, w: 1 });

  it("the tangent at (1:1:1) meets the cubic again at (1:−2:1) — oracle: substitution by hand", () => {
    const picture = figure.curve(C, { points: { A }, chord: [A, A] });
    expect(picture.alt).toContain("A near (1, 1); R near (1, -2)");
    expect(picture.alt).toContain("for u from");
    expect(picture.data.closed).toBe("1");
  });

  it("another letter can be put to 1, an unknown one is refused; points at infinity are named", () => {
    expect(figure.curve(C, { chart: "u" }).alt).toContain("for v from");
    expect(() => figure.curve(C, { chart: "x" })).toThrow(/letters u, v, w/);
    const flex = cubic`x^3 + y^3 + z^3 = 5 x y z`;
    const O = flex.point({ x: 1, y: -1, z: 0 });
    expect(figure.curve(flex, { points: { O } }).alt).toContain("At infinity: O.");
  });

  it("y² = x⁴ − 5x² + 4: one oval between −1 and 1, two branches — oracle: its four real roots", () => {
    const picture = figure.curve(quartic`y^2 = x^4 - 5x^2 + 4`);
    expect(picture.alt).toContain("1 closed oval, 2 branches");
  });

  it("a point of another kind of curve is refused", () => {
    expect(() => figure.curve(E, { points: { A: A as never } })).toThrow(/another kind/);
  });
});

describe("windows that are chosen", () => {
  it("an oval that would be a speck is looked at closely — fact: height of the oval near (−8, ±1)", () => {
    const alt = figure.curve(curve`y^2 = x^3 - 189x - 999`).alt;
    const [, low, high] = /y from (-?[\d.]+) to (-?[\d.]+)/.exec(alt) ?? [];
    expect(Number(high) - Number(low)).toBeLessThan(30);
    expect(alt).toContain("1 closed oval, 1 branch");
  });
});
