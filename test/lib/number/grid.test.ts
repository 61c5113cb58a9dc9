import { Complex as Complexjs } from "complex.js";
import { describe, expect, it } from "vitest";
import * as ball from "../../../lib/number/ball.ts";
import { complex, real } from "../../../lib/number/convert.ts";
import type { Disc } from "../../../lib/number/disc.ts";
import * as disc from "../../../lib/number/disc.ts";
import { sqrt } from "../../../lib/number/functions.ts";
import type { Grid } from "../../../lib/number/grid.ts";
import * as lane from "../../../lib/number/grid.ts";
import { toComplexjs, toDecimal, toFraction } from "../../../lib/number/interchange.ts";
import { DomainError } from "../../../lib/proof/errors.ts";

const points = lane.gridOf({ re: [-2.3, 2.1], im: [-1.9, 2.2], columns: 23, rows: 19 });
const others = lane.gridOf({ re: [0.7, 3.1], im: [1.3, -2.2], columns: 23, rows: 19 });

const at = (g: Grid, k: number): Disc => disc.fromBalls(ball.fromDouble(g.re[k]!), ball.fromDouble(g.im[k]!));

const CUBIC: readonly (readonly [number, number])[] = [
  [1, 0.25],
  [0.3, -0.2],
  [0, 1],
  [5, 7],
];
const pair = ([re, im]: readonly [number, number]): Disc => disc.fromBalls(ball.fromDouble(re), ball.fromDouble(im));

const ONE: Readonly<Record<string, readonly [(x: Grid, out: Grid) => Grid, (x: Disc) => Disc]>> = {
  sqr: [lane.gridSqr, (x) => disc.sqr(x, 80)],
  inv: [lane.gridInv, (x) => disc.inv(x, 80)],
  polynomial: [
    (x, out) => lane.gridPolynomial(CUBIC, x, out),
    (x) => CUBIC.map(pair).reduce((sum, c) => disc.add(disc.mul(sum, x, 80), c, 80)),
  ],
  sqrt: [lane.gridSqrt, (x) => disc.sqrt(x, 80)],
  exp: [lane.gridExp, (x) => disc.exp(x, 80)],
  ln: [lane.gridLn, (x) => disc.ln(x, 80)],
  sin: [lane.gridSin, (x) => disc.sinCos(x, 80).sin],
  cos: [lane.gridCos, (x) => disc.sinCos(x, 80).cos],
};
const TWO: Readonly<Record<string, readonly [(x: Grid, y: Grid, out: Grid) => Grid, (x: Disc, y: Disc) => Disc]>> = {
  add: [lane.gridAdd, (x, y) => disc.add(x, y, 80)],
  sub: [lane.gridSub, (x, y) => disc.sub(x, y, 80)],
  mul: [lane.gridMul, (x, y) => disc.mul(x, y, 80)],
  div: [lane.gridDiv, (x, y) => disc.div(x, y, 80)],
};

function worst(result: Grid, truth: (k: number) => Disc): number {
  let largest = 0;
  for (let k = 0; k < result.re.length; k++) {
    const t = truth(k);
    const off = disc.abs(disc.sub(at(result, k), t, 80), 30);
    largest = Math.max(largest, ball.toDouble(off) / ball.toDouble(disc.abs(t, 30)));
  }
  return largest;
}

describe("double-precision lane: relative error at most 1e-13 — oracle: the same function with 80 proved bits", () => {
  for (const [name, [f, truth]] of Object.entries(ONE)) {
    it(name, () => {
      expect(worst(f(points, lane.emptyGrid(points.re.length)), (k) => truth(at(points, k)))).toBeLessThan(1e-13);
    });
  }
  for (const [name, [f, truth]] of Object.entries(TWO)) {
    it(name, () => {
      const out = f(points, others, lane.emptyGrid(points.re.length));
      expect(worst(out, (k) => truth(at(points, k), at(others, k)))).toBeLessThan(1e-13);
    });
  }

  it("exp on a window", () => {
    const window = { re: [-2.3, 2.1], im: [-1.9, 2.2], columns: 23, rows: 19 } as const;
    const out = lane.windowExp(window, lane.emptyGrid(points.re.length));
    expect(worst(out, (k) => disc.exp(at(points, k), 80))).toBeLessThan(1e-13);
  });

  // Rows, lone points, short runs, and sizes beyond the tables.
  const mixed: Grid = {
    re: Float64Array.of(
      1.5,
      -3.25,
      0,
      0.1,
      0.2,
      0.3,
      0.4,
      0.5,
      699.9,
      -600,
      709.5,
      3,
      0.25,
      1e-300,
      -1e-9,
      0.1,
      0.2,
      0.3,
      0.4,
      0.5,
    ),
    im: Float64Array.of(0.5, -1e4, 3, 1, 1, 1, 1, 1, 2.5, 99_999, 0.5, 1e9, -0.75, 0, 1e-9, 2, 2, 2, 2, 2),
  };

  it("exp at scattered points, short rows and large sizes; in place the same to the bit", () => {
    const out = lane.gridExp(mixed, lane.emptyGrid(mixed.re.length));
    expect(worst(out, (k) => disc.exp(at(mixed, k), 120))).toBeLessThan(1e-13);
    const copy: Grid = { re: mixed.re.slice(), im: mixed.im.slice() };
    expect(lane.gridExp(copy, copy)).toEqual(out);
    const apart: Grid = { re: points.im, im: points.re };
    expect(worst(lane.gridExp(apart, lane.emptyGrid(apart.re.length)), (k) => disc.exp(at(apart, k), 80))).toBeLessThan(
      1e-14,
    );
  });

  it("in place the same to the bit, for a number of points that is no multiple of four", () => {
    for (const f of [lane.gridMul, lane.gridDiv]) {
      const copy: Grid = { re: points.re.slice(), im: points.im.slice() };
      expect(f(copy, others, copy)).toEqual(f(points, others, lane.emptyGrid(points.re.length)));
    }
    for (const f of [lane.gridInv, lane.gridSqrt]) {
      const copy: Grid = { re: points.re.slice(), im: points.im.slice() };
      expect(f(copy, copy)).toEqual(f(points, lane.emptyGrid(points.re.length)));
    }
  });

  it("quotients at the ends of the range of doubles", () => {
    const small = { re: Float64Array.of(1e-200, 3e200), im: Float64Array.of(-2e-200, 1e200) };
    const inverse = lane.gridInv(small, lane.emptyGrid(2));
    expect(worst(inverse, (k) => disc.inv(at(small, k), 80))).toBeLessThan(1e-13);
    expect(worst(lane.gridDiv(small, small, lane.emptyGrid(2)), () => disc.one)).toBeLessThan(1e-13);
  });

  it("affine steps in place are Horner's rule", () => {
    const z = lane.gridOf({ re: [0, 1], im: [0, 1], columns: 2, rows: 2 });
    lane.gridAffine(z, [0, 1], [2, 0], z);
    expect([...z.re]).toEqual([1, 1, 2, 2]);
    expect([...z.im]).toEqual([0, 1, 0, 1]);
    expect(() => lane.gridOf({ re: [0, 1], im: [0, 1], columns: 1, rows: 2 })).toThrow(DomainError);
  });
});

describe("interchange", () => {
  it("Decimal: within a unit, exact rationals half to even; complex.js: the midpoint; Fraction: exactly", () => {
    expect(toDecimal(sqrt(2), 30).toString()).toBe("1.41421356237309504880168872421");
    expect(toDecimal("1/8", 2).toString()).toBe("0.12");
    expect(toDecimal("3/8", 2).toString()).toBe("0.38");
    expect(toDecimal(real("1e-400").times(sqrt(2)), 5).toString()).toBe("1.4142e-400");
    expect(toComplexjs(complex("1/2", "3/4"))).toEqual(new Complexjs(0.5, 0.75));
    expect(toFraction("22/7").toFraction()).toBe("22/7");
    expect(() => toFraction(sqrt(2))).toThrow(DomainError);
  });
});
