import fc from "fast-check";
import { expect, it } from "vitest";
import { wpLambert, wpSeries } from "../../../lib/function/wp-series.ts";
import * as disc from "../../../lib/number/disc.ts";
import { Rational } from "../../../lib/number/rational.ts";

const at = (x: Rational, y: Rational) => disc.fromRational(x, 200, y);

it("both expansions enclose one value, at 60 and at 400 bits — oracle: the other expansion, and the same with more terms", () => {
  // v = r + sτ with |s| <= 1/2, and τ in the fundamental domain.
  const part = fc.integer({ min: -60, max: 60 }).map((k) => Rational.of(k, 120));
  fc.assert(
    fc.property(part, part, fc.integer({ min: 87, max: 900 }), part, (r, s, height, x) => {
      fc.pre(r.num !== 0n || s.num !== 0n);
      const tau = at(x, Rational.of(height + 14, 100));
      const v = disc.add(at(r, Rational.zero), disc.mul(at(s, Rational.zero), tau, 400), 400);
      const [low, high] = [60, 400].map((prec) => [wpSeries(v, tau, prec), wpLambert(v, tau, prec)] as const);
      for (const one of low!) for (const other of high!) expect(disc.overlaps(one, other)).toBe(true);
      expect(disc.overlaps(...high!)).toBe(true);
      for (const value of low!) expect(disc.bits(value)).toBeGreaterThan(10);
    }),
    { numRuns: 100, seed: 11 },
  );
});

it("at v = 1/2, τ = i it is −ϖ²/4π² with the lemniscate constant ϖ = 2.62205755... — oracle: e1 = ϖ² of the square lattice", () => {
  const value = wpSeries(at(Rational.of(1, 2), Rational.zero), at(Rational.zero, Rational.of(1)), 120);
  const lemniscate = 2.622057554292119;
  const expected = -(lemniscate ** 2) / (4 * Math.PI ** 2);
  expect(Math.abs(disc.toDouble(value)[0] - expected)).toBeLessThan(1e-15);
});

it("far from 0 it is refused", () => {
  expect(() => wpSeries(at(Rational.zero, Rational.of(3)), at(Rational.zero, Rational.of(1)), 60)).toThrow(/next to 0/);
});
