import { describe, expect, it } from "vitest";
import * as ball from "../../../lib/number/ball.ts";
import * as disc from "../../../lib/number/disc.ts";

// An exact short operand beside a long inexact one: bounds are counted in powers of two that must not meet the floor of pow2.
describe("a long inexact operand and a short exact one — limit: four bits lost", () => {
  const short = ball.fromInt(7);
  const shortDisc: disc.Disc = { re: 3n, im: 5n, exp: 0, rad: 0, axis: "plane" };
  for (const prec of [300, 900, 1100, 5_000, 20_000]) {
    const long = ball.sqrt(ball.fromInt(2), prec);
    const longDisc = disc.sqrt({ re: 2n, im: 1n, exp: 0, rad: 0, axis: "plane" }, prec);
    it(`ball products and quotients at ${prec} bits`, () => {
      for (const value of [ball.mul(long, short, prec), ball.div(long, short, prec), ball.div(short, long, prec)]) {
        expect(ball.bits(value)).toBeGreaterThanOrEqual(prec - 4);
      }
    });
    it(`disc products and quotients at ${prec} bits`, () => {
      for (const f of [disc.mul, disc.div]) {
        expect(disc.bits(f(longDisc, shortDisc, prec))).toBeGreaterThanOrEqual(prec - 4);
        expect(disc.bits(f(shortDisc, longDisc, prec))).toBeGreaterThanOrEqual(prec - 4);
      }
    });
  }
});

it("a long inexact number times an exact 0 is exactly 0, at any precision — oracle: arithmetic", () => {
  const long = { man: (7n << 300n) + 1n, exp: -400, rad: 3 };
  for (const zero of [ball.zero, { man: 0n, exp: -5, rad: 0 }, { man: 0n, exp: 50, rad: 0 }]) {
    for (const prec of [16, 62, 200, 400]) {
      expect(ball.isZero(ball.mul(long, zero, prec))).toBe(true);
      expect(ball.isZero(ball.mul(zero, long, prec))).toBe(true);
      expect(disc.isZero(disc.mul(disc.fromBall(long), disc.fromBall(zero), prec))).toBe(true);
    }
  }
});
