import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { realPeriods } from "../../../lib/lattice/agm-periods.ts";
import { discriminant } from "../../../lib/lattice/build.ts";
import { cubicRoots } from "../../../lib/lattice/cubic.ts";
import { fixedPeriods } from "../../../lib/lattice/fixed-periods.ts";
import * as ball from "../../../lib/number/ball.ts";
import * as disc from "../../../lib/number/disc.ts";
import { Rational } from "../../../lib/number/rational.ts";

/** Small, zero, huge and tiny invariants, and some beside a double root. */
const invariants = fc
  .record({
    a: fc.integer({ min: -25, max: 25 }),
    c: fc.integer({ min: -25, max: 25 }),
    near: fc.boolean(),
    scale: fc.constantFrom(0, 0, 1, 7, 100, -1, -7, -100),
    prec: fc.constantFrom(40, 64, 100, 175, 674, 1500, 4000),
  })
  .map(({ a, c, near, scale, prec }) => {
    const t = Rational.of(a);
    const power = (k: number) => Rational.of(10).pow(k * scale);
    const [p, q] = near
      ? [t.times(t).times(12), t.pow(3).times(-8).plus(Rational.of(c, 5))]
      : [Rational.of(a), Rational.of(c)];
    return { g2: p.times(power(2)), g3: q.times(power(3)), prec };
  })
  .filter(({ g2, g3 }) => g2.pow(3).minus(g3.pow(2).times(27)).sign() !== 0);

describe("periods of real invariants in fixed point", () => {
  it("meet the periods by the roots of the cubic at twice the precision — oracle: second algorithm, in enclosures", () => {
    let taken = 0;
    fc.assert(
      fc.property(invariants, ({ g2, g3, prec }) => {
        const components = g2.pow(3).minus(g3.pow(2).times(27)).sign() > 0 ? 2 : 1;
        const found = fixedPeriods(
          ball.fromRational(g2, prec + 32),
          ball.fromRational(g3, prec + 32),
          components,
          prec,
        );
        if (!found) return;
        taken++;
        const more = 2 * prec + 300;
        const roots = cubicRoots(
          disc.fromRational(g2, more),
          disc.fromRational(g3, more),
          discriminant(g2, g3, more),
          more,
        );
        const sharp = realPeriods(roots, components, more);
        for (const name of ["w1", "w2"] as const) {
          expect(disc.overlaps(found[name], sharp[name])).toBe(true);
          expect(disc.bits(found[name])).toBeGreaterThan(prec - 8);
        }
      }),
      { numRuns: 200, seed: 4 },
    );
    expect(taken).toBeGreaterThan(70);
  });

  it("a wide coefficient is left to the enclosures — oracle: none is sharper than the input", () => {
    const wide = ball.widen(ball.fromInt(4), ball.ldexp(ball.one, -40));
    expect(fixedPeriods(wide, ball.fromInt(-1), 2, 200)).toBeUndefined();
  });
});
