import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { atCell, toCell, type WeierstrassValues, weierstrass } from "../../../lib/function/weierstrass.ts";
import { latticeOfInvariants, latticeOfPeriods } from "../../../lib/lattice/build.ts";
import { reduced } from "../../../lib/lattice/context.ts";
import type { PeriodLattice } from "../../../lib/lattice/period-lattice.ts";
import type { Disc } from "../../../lib/number/disc.ts";
import * as disc from "../../../lib/number/disc.ts";
import { Rational } from "../../../lib/number/rational.ts";

const NAMES = ["wp", "prime", "zeta"] as const;

const lattices: readonly PeriodLattice[] = [
  latticeOfInvariants(Rational.of(4), Rational.of(-1)),
  latticeOfInvariants(Rational.of(1), Rational.of(3)),
  latticeOfInvariants(Rational.zero, Rational.one),
  latticeOfInvariants(Rational.of(10n ** 60n), Rational.of(7, 3)),
  latticeOfPeriods(
    { real: Rational.of(5, 7), imag: Rational.of(2, 9), root: 1n },
    { real: Rational.of(-8, 11), imag: Rational.of(13, 4), root: 1n },
  ),
];

/** Multiples of the first period and of i, in the cell, on its edges, near the pole and far out. */
const coordinate = fc.oneof(
  fc.integer({ min: -1000, max: 1000 }).map((n) => Rational.of(n, 777)),
  fc.constantFrom("0", "1/2", "1e-3", "1e-30", "0.4999999999", "-7/5", "1000001/7").map((x) => Rational.parse(x)),
);

/** z with `extra` bits beyond prec. */
function argument(l: { readonly r1: Disc }, x: Rational, y: Rational, bits: number): Disc {
  const w = disc.toDouble(l.r1);
  const size = Rational.of(2).pow(Math.ceil(Math.log2(Math.hypot(...w))));
  return disc.fromRational(x.times(size), bits, y.times(size));
}

/** undefined for an argument that meets the lattice. */
function quietly(f: () => WeierstrassValues): WeierstrassValues | undefined {
  try {
    return f();
  } catch (error) {
    if (error instanceof Error && error.name === "PoleError") return undefined;
    throw error;
  }
}

describe("℘, ℘′ and ζ in fixed point", () => {
  it("hold the values of 200 bits more and lose no digits — oracle: the formulas in enclosures, at higher precision", () => {
    let compared = 0;
    fc.assert(
      fc.property(
        fc.constantFrom(...lattices),
        coordinate,
        coordinate,
        fc.constantFrom(60, 100, 175, 300, 674, 1200),
        (L, x, y, prec) => {
          const [l, sharp] = [reduced(L, prec), reduced(L, prec + 200)];
          const z = argument(l, x, y, prec + 60);
          const found = quietly(() => weierstrass(l, z, prec, NAMES));
          const high = argument(l, x, y, prec + 260);
          const other = quietly(() => atCell(sharp, toCell(sharp, high, prec + 200), prec + 200, NAMES));
          if (!found || !other) return;
          const same = atCell(l, toCell(l, z, prec), prec, NAMES);
          for (const name of NAMES) {
            expect(disc.overlaps(found[name]!, other[name]!), name).toBe(true);
            expect(disc.bits(found[name]!)).toBeGreaterThan(Math.min(prec, disc.bits(same[name]!)) - 3);
            expect(found[name]!.axis).toBe(same[name]!.axis);
            compared++;
          }
        },
      ),
      { numRuns: 250, seed: 4 },
    );
    expect(compared).toBeGreaterThan(500);
  });

  it("at 2,400 digits, where the series is split — oracle: ℘′² = 4℘³ − g2 ℘ − g3 and ζ(2z) = 2ζ(z) + ℘″/2℘′, DLMF 23.3.10, 23.10.8", () => {
    const bits = 8000;
    const wp = bits + 20;
    // g2 = 0, g3 = 1
    const l = reduced(lattices[2]!, bits);
    for (const [x, y] of [
      ["0.41", "0.27"],
      ["0.3", "0"],
    ] as const) {
      const z = disc.fromRational(Rational.parse(x), bits + 40, Rational.parse(y));
      const { wp: p, prime, zeta } = weierstrass(l, z, bits, NAMES) as Required<WeierstrassValues>;
      const square = disc.sqr(p, wp);
      const cubic = disc.sub(disc.ldexp(disc.mul(square, p, wp), 2), disc.one, wp);
      expect(disc.overlaps(disc.sqr(prime, wp), cubic)).toBe(true);
      const twice = weierstrass(l, disc.ldexp(z, 1), bits, ["zeta"]).zeta!;
      const slope = disc.div(disc.mulInt(square, 3n, wp), prime, wp);
      expect(disc.overlaps(twice, disc.add(disc.ldexp(zeta, 1), slope, wp))).toBe(true);
      expect(Math.min(...[p, prime, zeta].map(disc.bits))).toBeGreaterThan(bits - 10);
    }
  });
});
