import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { toCell } from "../../../lib/function/weierstrass.ts";
import { latticeOfPeriods } from "../../../lib/lattice/build.ts";
import { invariants, periods, quasiPeriods, reduced, roots } from "../../../lib/lattice/context.ts";
import type { PeriodLattice } from "../../../lib/lattice/period-lattice.ts";
import type { ExactComplex } from "../../../lib/lattice/quantity.ts";
import { logarithm } from "../../../lib/lattice/real-logarithm.ts";
import { weierstrassValues } from "../../../lib/lattice/values.ts";
import * as ball from "../../../lib/number/ball.ts";
import type { Disc } from "../../../lib/number/disc.ts";
import * as disc from "../../../lib/number/disc.ts";
import { Rational } from "../../../lib/number/rational.ts";

const BITS = 128;
const SEED = 20_261_201;

const exactly = (real: Rational, imag: Rational): ExactComplex => ({ real, imag, root: 1n });
const at = ({ real, imag }: ExactComplex, prec = BITS + 64): Disc => disc.fromRational(real, prec, imag);

/** Rationals of many sizes: small quotients, and ones next to them. */
const rational = fc
  .tuple(
    fc.integer({ min: -40, max: 40 }),
    fc.integer({ min: 1, max: 24 }),
    fc.constantFrom(0, 0, 0, 1, -1),
    fc.integer({ min: 6, max: 30 }),
  )
  .map(([n, d, nudge, e]) => Rational.of(n, d).plus(Rational.of(nudge, 10n ** BigInt(e))));
const tau = fc
  .tuple(rational, fc.constantFrom("1/1000", "1/37", "1/5", "4/5", "1", "1.0000001", "7/4", "12", "50"))
  .map(([x, y]) => exactly(x, Rational.parse(y)));
const scale = fc.constantFrom(
  exactly(Rational.one, Rational.zero),
  exactly(Rational.parse("3/7"), Rational.parse("-2")),
  exactly(Rational.parse("1e-40"), Rational.parse("2e-40")),
  exactly(Rational.zero, Rational.parse("-1e50")),
);
const basis = fc.tuple(tau, scale).map(([t, s]): [ExactComplex, ExactComplex] => [s, product(s, t)]);
/** Coordinates of z in the cell, near its edges and near the pole too. */
const place = fc.tuple(
  fc.constantFrom("1/2", "1/3", "0", "1e-30", "0.4999999999", "-7/5", "1001/7"),
  fc.constantFrom("1/2", "2/5", "1e-9", "-0.5000001", "3/7", "-12/5"),
);

function product(x: ExactComplex, y: ExactComplex): ExactComplex {
  return exactly(x.real.times(y.real).minus(x.imag.times(y.imag)), x.real.times(y.imag).plus(x.imag.times(y.real)));
}

function combined([w1, w2]: readonly [ExactComplex, ExactComplex], r: Rational, s: Rational): ExactComplex {
  return exactly(w1.real.times(r).plus(w2.real.times(s)), w1.imag.times(r).plus(w2.imag.times(s)));
}

/** The enclosures meet, and the first one is narrow beside the size of what it came from. */
function agree(x: Disc, y: Disc, size: Disc, bits = BITS - 40): void {
  expect(disc.overlaps(x, y), `${disc.toDouble(x)} against ${disc.toDouble(y)}`).toBe(true);
  const radius = ball.magnitude({ man: BigInt(Math.ceil(x.rad)), exp: x.exp, rad: 0 });
  expect(radius).toBeLessThan(disc.magnitude(size) - bits);
}

describe("random lattices, near the real line, the arc, i and high up", () => {
  it("η1 ω2 − η2 ω1 = 2πi — oracle: Legendre's relation, DLMF 23.2.14", () => {
    fc.assert(
      fc.property(basis, ([w1, w2]) => {
        const L = latticeOfPeriods(w1, w2);
        const [eta1, eta2] = quasiPeriods(L, BITS);
        const { w1: x, w2: y } = periods(L, BITS);
        const [p, q] = [disc.mul(eta1, y, BITS), disc.mul(eta2, x, BITS)];
        agree(disc.sub(p, q, BITS), disc.imaginary(ball.ldexp(ball.pi(BITS), 1)), disc.add(p, disc.one, BITS));
      }),
      { numRuns: 150, seed: SEED },
    );
  });

  it("℘ by theta series meets ℘ by a row sum of 1/sin² — oracle: second algorithm", () => {
    fc.assert(
      fc.property(basis, place, (pair, [r, s]) => {
        const L = latticeOfPeriods(...pair);
        const z = combined(pair, Rational.parse(r), Rational.parse(s));
        const value = weierstrassValues(L, at(z, 700), BITS, ["wp"]).wp!;
        const other = rowSum(L, at(z, 700), 200);
        agree(value, other, disc.add(value, roots(L, 64)[0], 64));
      }),
      { numRuns: 150, seed: SEED },
    );
  });

  it("℘′² = 4℘³ − g2 ℘ − g3 — oracle: differential equation, DLMF 23.3.10", () => {
    fc.assert(
      fc.property(basis, place, (pair, [r, s]) => {
        const L = latticeOfPeriods(...pair);
        const z = combined(pair, Rational.parse(r), Rational.parse(s));
        const { wp, prime } = weierstrassValues(L, at(z, 700), BITS, ["wp", "prime"]);
        const { g2, g3 } = invariants(L, BITS);
        const x = wp!;
        const cube = disc.mul(disc.sub(disc.ldexp(disc.sqr(x, BITS), 2), g2, BITS), x, BITS);
        const size = disc.add(disc.sqr(prime!, 64), disc.mul(g2, roots(L, 64)[0], 64), 64);
        agree(disc.sub(cube, g3, BITS), disc.sqr(prime!, BITS), size);
      }),
      { numRuns: 150, seed: SEED },
    );
  });

  it("another basis of the same lattice gives the same ℘ and ζ — oracle: invariance under SL2(Z)", () => {
    fc.assert(
      fc.property(
        basis,
        place,
        fc.integer({ min: -9, max: 9 }),
        fc.integer({ min: -9, max: 9 }),
        (pair, [r, s], m, n) => {
          const L = latticeOfPeriods(...pair);
          // (ω1, ω2) ↦ (ω1 + m(ω2 + nω1), ω2 + nω1)
          const second = combined(pair, Rational.of(n), Rational.one);
          const first = combined([pair[0], second], Rational.one, Rational.of(m));
          const M = latticeOfPeriods(first, second);
          const z = at(combined(pair, Rational.parse(r), Rational.parse(s)), 700);
          const [a, b] = [L, M].map((lattice) => weierstrassValues(lattice, z, BITS, ["wp", "zeta"])) as [
            { wp: Disc; zeta: Disc },
            { wp: Disc; zeta: Disc },
          ];
          agree(a.wp, b.wp, disc.add(a.wp, roots(L, 64)[0], 64));
          expect(disc.overlaps(a.zeta, b.zeta)).toBe(true);
        },
      ),
      { numRuns: 150, seed: SEED },
    );
  });

  it("the logarithm of (℘, ℘′)(z) is z modulo the lattice — oracle: the exact z", () => {
    fc.assert(
      fc.property(basis, place, (pair, [r, s]) => {
        const L = latticeOfPeriods(...pair);
        // In the middle of a cell 1000 times as high as wide ℘ − e2 is e^(−1000π), so its bits count from there.
        const high = ball.toDouble(disc.imag(reduced(L, 64).tau)) * 20;
        const bits = BITS + 80 + Math.round(high);
        const z = at(combined(pair, Rational.parse(r), Rational.parse(s)), bits + 700);
        const { wp, prime } = weierstrassValues(L, z, bits, ["wp", "prime"]);
        const back = logarithm(L, { x: wp!, y: prime! }, BITS);
        const { rest } = toCell(reduced(L, 700), disc.sub(back, z, 700), 700);
        expect(disc.containsZero(rest)).toBe(true);
        expect(disc.magnitude(rest)).toBeLessThan(disc.magnitude(reduced(L, 64).r1) - BITS + 50);
      }),
      { numRuns: 100, seed: SEED },
    );
  });

  it("values at points of a wide argument lie in the value of the whole — oracle: the same code on exact points", () => {
    const direction = fc.tuple(fc.integer({ min: -100, max: 100 }), fc.integer({ min: -100, max: 100 }));
    fc.assert(
      fc.property(basis, place, fc.integer({ min: 12, max: 60 }), direction, (pair, [r, s], e, [dx, dy]) => {
        const L = latticeOfPeriods(...pair);
        const unit = disc.magnitude(reduced(L, 64).r1) - e;
        const middle = at(combined(pair, Rational.parse(r), Rational.parse(s)), 400);
        const wide = disc.widenBy(middle, { man: 1n, exp: unit, rad: 0 }, 400, false);
        // A point of the disc: at most a hundred hundredths of √1/2 each way.
        const step = disc.ldexp(disc.fromBalls(ball.fromInt(dx), ball.fromInt(dy)), unit - 8);
        const inner = disc.add(middle, step, 400);
        const names = ["wp", "prime", "zeta", "sigma"] as const;
        let whole: ReturnType<typeof weierstrassValues>;
        try {
          whole = weierstrassValues(L, wide, BITS, names);
        } catch {
          // The disc may hold a pole.
          return;
        }
        const point = weierstrassValues(L, inner, 256, names);
        for (const name of names) expect(disc.overlaps(whole[name]!, point[name]!), name).toBe(true);
      }),
      { numRuns: 200, seed: SEED },
    );
  });
});

/**
 * ℘(z) = (π/r1)² (Σ_n csc²(π(z + n r2)/r1) − 1/3 − 2 Σ_{n>=1} csc²(πnτ)) on the reduced basis. For the argument in the cell and
 * Im τ >= √3/2 the terms from |n| = N on are under 5 e^(−2π(N − 1/2)√3/2) together.
 */
function rowSum(L: PeriodLattice, z: Disc, prec: number): Disc {
  const l = reduced(L, prec + 40);
  const wp = prec + 40;
  const pi = ball.pi(wp);
  const { v } = toCell(l, z, wp);
  const inverseSquare = (x: Disc) => {
    const { sin } = disc.sinCos(disc.mulBall(x, pi, wp), wp);
    return disc.inv(disc.sqr(sin, wp), wp);
  };
  const rows = Math.ceil(prec / 7) + 4;
  let sum = inverseSquare(v);
  for (let n = 1; n <= rows; n++) {
    const shift = disc.mulInt(l.tau, n, wp);
    sum = disc.add(sum, inverseSquare(disc.add(v, shift, wp)), wp);
    sum = disc.add(sum, inverseSquare(disc.sub(v, shift, wp)), wp);
    sum = disc.sub(sum, disc.ldexp(inverseSquare(shift), 1), wp);
  }
  const third = disc.fromRational(Rational.of(1, 3), wp);
  const tail = { man: 1n, exp: 3 - 7 * rows, rad: 0 };
  return disc.mul(disc.widenBy(disc.sub(sum, third, wp), tail, wp, false), l.scale, wp);
}
