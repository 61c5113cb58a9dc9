import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { latticeOfInvariants } from "../../../lib/lattice/build.ts";
import { chainOf, periods } from "../../../lib/lattice/context.ts";
import { fixedLogarithm } from "../../../lib/lattice/fixed-logarithm.ts";
import { weierstrassValues } from "../../../lib/lattice/values.ts";
import * as ball from "../../../lib/number/ball.ts";
import * as disc from "../../../lib/number/disc.ts";
import { Rational } from "../../../lib/number/rational.ts";

const small = fc
  .tuple(fc.integer({ min: -30, max: 30 }), fc.integer({ min: 1, max: 7 }))
  .map(([n, d]) => Rational.of(n, d));

/** A cubic with a factor x − e and a point with the given place between its roots or beyond. */
const points = fc
  .record({
    e: small,
    p: small,
    place: fc.integer({ min: 1, max: 40 }),
    inner: fc.boolean(),
    below: fc.boolean(),
    scale: fc.constantFrom(0, 0, 1, 90, -90),
    prec: fc.constantFrom(50, 100, 175, 400, 1500),
  })
  .map(({ e, p, place, inner, below, scale, prec }) => {
    // 4(x − e)(x² + ex + p): g2 = 4(e² − p), g3 = 4ep
    const size = Rational.of(10).pow(scale);
    const [f, q] = [e.times(size), p.times(size).times(size)];
    const g2 = f.times(f).minus(q).times(4);
    const g3 = f.times(q).times(4);
    const x = f.plus(size.times(Rational.of(inner ? -place : place, 11)));
    const square = x.pow(3).times(4).minus(g2.times(x)).minus(g3);
    return { g2, g3, x, square, below, prec };
  })
  .filter(({ g2, g3, square }) => square.sign() > 0 && g2.pow(3).minus(g3.pow(2).times(27)).sign() !== 0);

describe("the logarithm of a real point in fixed point", () => {
  it("℘ and ℘′ there are the coordinates — oracle: theta series, another algorithm", () => {
    const taken = new Map<string, number>();
    fc.assert(
      fc.property(points, ({ g2, g3, x, square, below, prec }) => {
        const L = latticeOfInvariants(g2, g3);
        const chain = chainOf(L, prec);
        const root = ball.sqrt(ball.fromRational(square, prec + 90), prec + 80);
        const y = below ? ball.neg(root) : root;
        const found = chain && fixedLogarithm(chain, ball.fromRational(x, prec + 60), y);
        if (!found) return;
        expect(ball.bits(found.t)).toBeGreaterThan(prec - 2);
        const kind = `${L.components} ${found.component}`;
        taken.set(kind, (taken.get(kind) ?? 0) + 1);
        const { w1, w2 } = periods(L, prec + 40);
        const half = ball.ldexp(disc.real(w1), -1);
        expect(ball.compare(ball.abs(found.t), half)).toBe(-1);
        const shift = found.component === "bounded" ? disc.ldexp(w2, -1) : disc.zero;
        const z = disc.add(disc.fromBall(found.t), shift, prec + 40);
        const { wp, prime } = weierstrassValues(L, z, prec + 20, ["wp", "prime"]);
        expect(disc.overlaps(wp!, disc.fromRational(x, prec + 90))).toBe(true);
        expect(disc.overlaps(prime!, disc.fromBall(y))).toBe(true);
        expect(Math.max(disc.bits(wp!), disc.bits(prime!))).toBeGreaterThan(prec - 30);
      }),
      { numRuns: 400, seed: 4 },
    );
    for (const kind of ["1 identity", "2 identity", "2 bounded"])
      expect(taken.get(kind) ?? 0, kind).toBeGreaterThan(20);
  });

  it("a pair off the curve is left to the enclosures — oracle: the equation", () => {
    const L = latticeOfInvariants(Rational.of(4), Rational.of(-1));
    expect(fixedLogarithm(chainOf(L, 100)!, ball.fromInt(2), ball.fromInt(4))).toBeUndefined();
  });
});
