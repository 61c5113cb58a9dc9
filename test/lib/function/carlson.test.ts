import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { carlsonRC, carlsonRF } from "../../../lib/function/carlson-first.ts";
import { carlsonRG } from "../../../lib/function/carlson-second.ts";
import { carlsonRD, carlsonRJ } from "../../../lib/function/carlson-third.ts";
import * as ball from "../../../lib/number/ball.ts";
import type { Disc } from "../../../lib/number/disc.ts";
import * as disc from "../../../lib/number/disc.ts";
import { DomainError, PoleError } from "../../../lib/proof/errors.ts";
import { entries, expectDigits, read } from "./reference.ts";

const PREC = 200;

describe("Carlson's integrals — oracle: values of Carlson 1995 and of independent programs, 50 digits", () => {
  const routes: [string, readonly string[], (...x: Disc[]) => Disc][] = [
    ["carlson_RF", ["x", "y", "z"], (x, y, z) => carlsonRF(x!, y!, z!, PREC)],
    ["carlson_RC", ["x", "y"], (x, y) => carlsonRC(x!, y!, PREC)],
    ["carlson_RD", ["x", "y", "z"], (x, y, z) => carlsonRD(x!, y!, z!, PREC)],
    ["carlson_RJ", ["x", "y", "z", "p"], (x, y, z, p) => carlsonRJ(x!, y!, z!, p!, PREC)],
    ["carlson_RG", ["x", "y", "z"], (x, y, z) => carlsonRG(x!, y!, z!, PREC)],
  ];
  for (const [quantity, names, route] of routes) {
    it.each(entries("integrals", quantity))(`${quantity} $id`, ({ input, expected, digits }) => {
      const value = route(...names.map((name) => read(input[name], 2 * PREC)));
      expectDigits(value, expected, digits);
    });
  }
});

describe("the arithmetic-geometric mean that the complete integrals rest on", () => {
  it.each(entries("integrals", "agm"))(
    "$id — oracle: an independent ball arithmetic, 50 digits",
    ({ input, expected, digits }) => {
      expectDigits(disc.agm(read(input.a, 400), read(input.b, 400), PREC), expected, digits);
    },
  );
});

const unit = fc.integer({ min: -999, max: 999 });
/** Points of the cut plane, biased to its edges: beside the cut, huge, tiny. */
const cutPlane = fc
  .tuple(unit, fc.oneof(unit, fc.constantFrom(1, -1)), fc.integer({ min: -60, max: 60 }))
  .filter(([, im]) => im !== 0)
  .map(
    ([re, im, exp]): Disc => ({ re: BigInt(re), im: BigInt(im), exp, rad: 0, axis: re === 0 ? "imaginary" : "plane" }),
  );
const positive = fc
  .tuple(fc.integer({ min: 1, max: 999 }), fc.integer({ min: -80, max: 80 }))
  .map(([man, exp]): Disc => ({ re: BigInt(man), im: 0n, exp, rad: 0, axis: "real" }));
const RUNS = { numRuns: 100, seed: 1_995 };

/** Both enclosures hold one number, and neither is wide. */
function expectSame(x: Disc, y: Disc, bits: number): void {
  expect(disc.overlaps(x, y), `${disc.toDouble(x)} against ${disc.toDouble(y)}`).toBe(true);
  expect(Math.min(disc.bits(x), disc.bits(y))).toBeGreaterThan(bits);
}

describe("Carlson's integrals against each other", () => {
  it("RF(0, y, z) = π/(2 agm(√y, √z)) — oracle: second algorithm, DLMF 19.22.8", () => {
    fc.assert(
      fc.property(fc.oneof(positive, cutPlane), fc.oneof(positive, cutPlane), (y, z) => {
        const mean = disc.agm(disc.sqrt(y, PREC), disc.sqrt(z, PREC), PREC);
        const half = disc.fromBall(ball.ldexp(ball.pi(PREC), -1));
        expectSame(carlsonRF(disc.zero, y, z, PREC), disc.div(half, mean, PREC), 180);
      }),
      RUNS,
    );
  });

  it("RC(((x+y)/2)², xy) = ln(x/y)/(x − y) — oracle: the logarithm, DLMF 19.2.19", () => {
    fc.assert(
      fc.property(positive, positive, (x, y) => {
        fc.pre(!disc.isZero(disc.sub(x, y, 400)));
        const mean = disc.ldexp(disc.add(x, y, 400), -1);
        const value = carlsonRC(disc.sqr(mean, 800), disc.mul(x, y, 800), PREC);
        const log = ball.ln(disc.real(disc.div(x, y, 300)), 300);
        expectSame(value, disc.div(disc.fromBall(log), disc.sub(x, y, 400), 300), 180);
      }),
      RUNS,
    );
  });

  it("RD(x,y,z) + RD(y,z,x) + RD(z,x,y) = 3/√(xyz), root by root — oracle: identity, DLMF 19.21.8", () => {
    fc.assert(
      fc.property(fc.oneof(positive, cutPlane), cutPlane, cutPlane, (x, y, z) => {
        const sum = disc.add(
          disc.add(carlsonRD(x, y, z, PREC), carlsonRD(y, z, x, PREC), PREC),
          carlsonRD(z, x, y, PREC),
          PREC,
        );
        const roots = [x, y, z].map((w) => disc.sqrt(w, PREC)).reduce((a, b) => disc.mul(a, b, PREC));
        expect(disc.overlaps(sum, disc.div(disc.mulInt(disc.one, 3, PREC), roots, PREC))).toBe(true);
      }),
      RUNS,
    );
  });

  it("(p−x) RJ(p) + (q−x) RJ(q) = 3 RF − 3 RC(yz/x, pq/x), (p−x)(q−x) = (y−x)(z−x) — oracle: identity, DLMF 19.21.12", () => {
    fc.assert(
      fc.property(positive, positive, positive, positive, (x, dy, dz, dp) => {
        const wp = 600;
        const at = (d: Disc) => disc.add(x, d, wp);
        const [y, z, p] = [at(dy), at(dz), at(dp)];
        const dq = disc.div(disc.mul(dy, dz, wp), dp, wp);
        const q = at(dq);
        const left = disc.add(
          disc.mul(dp, carlsonRJ(x, y, z, p, PREC), wp),
          disc.mul(dq, carlsonRJ(x, y, z, q, PREC), wp),
          wp,
        );
        const rc = carlsonRC(disc.div(disc.mul(y, z, wp), x, wp), disc.div(disc.mul(p, q, wp), x, wp), PREC);
        const right = disc.mulInt(disc.sub(carlsonRF(x, y, z, PREC), rc, wp), 3, wp);
        expect(disc.overlaps(left, right)).toBe(true);
        expect(disc.bits(left)).toBeGreaterThan(185);
      }),
      RUNS,
    );
  });

  it("RG from a definition that treats the arguments alike — oracle: second formula, DLMF 19.21.11", () => {
    fc.assert(
      fc.property(positive, fc.oneof(positive, cutPlane), cutPlane, (x, y, z) => {
        const part = (a: Disc, b: Disc, c: Disc) =>
          disc.mul(disc.mul(a, disc.add(b, c, PREC), PREC), carlsonRD(b, c, a, PREC), PREC);
        const sum = disc.add(disc.add(part(x, y, z), part(y, z, x), PREC), part(z, x, y), PREC);
        expect(disc.overlaps(disc.mulInt(carlsonRG(x, y, z, PREC), 6, PREC), sum)).toBe(true);
      }),
      RUNS,
    );
  });

  it("60 bits hold what 130 bits hold, on wide and narrow arguments — oracle: the same code at higher precision", () => {
    const wide = cutPlane.map(
      (x): Disc => ({ ...x, re: x.re << 40n, im: x.im << 40n, exp: x.exp - 40, rad: 1, axis: "plane" }),
    );
    fc.assert(
      fc.property(positive, wide, wide, cutPlane, (x, y, z, p) => {
        const centre = (w: Disc): Disc => ({ ...w, re: w.re + 1n, rad: 0 });
        for (const f of [carlsonRF, carlsonRD, carlsonRG]) {
          expect(disc.overlaps(f(x, y, z, 60), f(x, centre(y), centre(z), 130))).toBe(true);
        }
        expect(disc.overlaps(carlsonRC(y, z, 60), carlsonRC(centre(y), centre(z), 130))).toBe(true);
        // RJ takes an RC a step: arguments 2^140 apart would cost thousands of roots.
        const [w, r] = [x, p].map((d): Disc => ({ ...d, exp: Math.trunc(d.exp / 8) })) as [Disc, Disc];
        expect(disc.overlaps(carlsonRJ(w, w, w, r, 60), carlsonRJ(w, w, w, r, 130))).toBe(true);
      }),
      RUNS,
    );
  });

  it("arguments in one half plane that is not the right one are turned there — oracle: RJ at a fourfold precision and RD for p = z", () => {
    const rj = (p: Disc) =>
      carlsonRJ(disc.i, read({ re: "-1", im: "1" }, 99), read({ re: "-3", im: "2" }, 99), p, PREC);
    const near = read({ re: "-3", im: "2.00000000000000000000000000000000000000001" }, 300);
    const value = carlsonRD(disc.i, read({ re: "-1", im: "1" }, 99), read({ re: "-3", im: "2" }, 99), PREC);
    const gap = disc.abs(disc.sub(rj(near), value, PREC), 60);
    expect(ball.magnitude(gap)).toBeLessThan(-125);
  });

  it("RJ with arguments all round the origin — oracle: the trapezoidal rule for t = e^w in doubles", () => {
    const polar = fc
      .tuple(fc.integer({ min: -280, max: 280 }), fc.integer({ min: 30, max: 300 }))
      .map(([angle, size]) => ({
        re: Math.round(10.24 * size * Math.cos(angle / 100)) / 1024,
        im: Math.round(10.24 * size * Math.sin(angle / 100)) / 1024,
      }));
    // 40 runs: each is a quadrature, and the branch is one of a few.
    fc.assert(
      fc.property(polar, polar, polar, polar, (...points) => {
        const [x, y, z, p] = points.map(({ re, im }) => disc.fromBalls(ball.fromDouble(re), ball.fromDouble(im)));
        const [re, im] = disc.toDouble(carlsonRJ(x!, y!, z!, p!, 64));
        const sum = trapezoid(points);
        expect(Math.hypot(re - sum.re, im - sum.im)).toBeLessThan(1e-9 * Math.hypot(re, im));
      }),
      { numRuns: 40, seed: 1_995 },
    );
  });

  it("far apart arguments keep their digits: RF(0, 1e-2000, 1) = ln(4·10^1000) + O(10^-1999) — oracle: DLMF 19.27.2", () => {
    const value = carlsonRF(disc.zero, read("1e-2000", 100), disc.one, 100);
    const log = ball.add(ball.ln(ball.fromInt(10n ** 1000n), 130), ball.ldexp(ball.ln2(130), 1), 130);
    expectSame(value, disc.fromBall(log), 98);
  });
});

describe("Carlson's integrals refuse, and say why", () => {
  const minus = disc.neg(disc.one);
  it("a negative argument of RF names the cut", () => {
    expect(() => carlsonRF(disc.one, minus, disc.zero, 60)).toThrow(DomainError);
    expect(() => carlsonRF(disc.one, minus, disc.zero, 60)).toThrow(/lies on the cut/);
  });
  it("two zeros diverge", () => {
    expect(() => carlsonRF(disc.one, disc.zero, disc.zero, 60)).toThrow(PoleError);
    expect(() => carlsonRJ(disc.one, disc.one, disc.one, disc.zero, 60)).toThrow(PoleError);
  });
});

interface Point {
  readonly re: number;
  readonly im: number;
}

/** (3/2)∫ e^w dw/(√(e^w+x) √(e^w+y) √(e^w+z) (e^w+p)): the error falls as e^(−2πd/h) with d the distance of arg(−x) and the like from 0. */
function trapezoid(points: readonly Point[]): Point {
  const h = 1 / 32;
  let sum: Point = { re: 0, im: 0 };
  for (let k = -1600; k <= 1600; k++) {
    const t = Math.exp(k * h);
    let bottom: Point = { re: 1, im: 0 };
    points.forEach(({ re, im }, n) => {
      const factor = { re: t + re, im };
      bottom = product(bottom, n < 3 ? root(factor) : factor);
    });
    const norm = bottom.re ** 2 + bottom.im ** 2;
    sum = { re: sum.re + (1.5 * t * h * bottom.re) / norm, im: sum.im - (1.5 * t * h * bottom.im) / norm };
  }
  return sum;
}

function product(x: Point, y: Point): Point {
  return { re: x.re * y.re - x.im * y.im, im: x.re * y.im + x.im * y.re };
}

function root({ re, im }: Point): Point {
  const u = Math.sqrt((Math.hypot(re, im) + Math.abs(re)) / 2);
  const v = Math.abs(im) / (2 * u);
  return re >= 0 ? { re: u, im: im < 0 ? -v : v } : { re: v, im: im < 0 ? -u : u };
}
