import { describe, expect, it } from "vitest";
import { toCell } from "../../../lib/function/weierstrass.ts";
import { latticeOfInvariants, latticeOfPeriods, orientation } from "../../../lib/lattice/build.ts";
import { invariants, periods, quasiPeriods, reduced, roots } from "../../../lib/lattice/context.ts";
import type { PeriodLattice } from "../../../lib/lattice/period-lattice.ts";
import { logarithm } from "../../../lib/lattice/real-logarithm.ts";
import { weierstrassValues } from "../../../lib/lattice/values.ts";
import * as ball from "../../../lib/number/ball.ts";
import * as disc from "../../../lib/number/disc.ts";
import { Rational } from "../../../lib/number/rational.ts";
import { type Entry, entries, exact, expectHolds, toDisc } from "./fixture.ts";

const BITS = 170;
/** Enough for the g2 of a lattice that is hexagonal to 76 digits. */
const INVARIANT_BITS = 420;

/** The lattice of an entry, and the sign by which ω2 was turned to make the basis positive. */
function latticeOf({ input }: Entry): { lattice: PeriodLattice; flipped: boolean } {
  if (input.g2 !== undefined) return { lattice: latticeOfInvariants(exact(input.g2), exact(input.g3)), flipped: false };
  const [w1, w2] = [exact(input.period1), exact(input.period2)];
  if (orientation(w1, w2) > 0) return { lattice: latticeOfPeriods(w1, w2), flipped: false };
  const minus = { real: w2.real.neg(), imag: w2.imag.neg(), root: 1n };
  return { lattice: latticeOfPeriods(w1, minus), flipped: true };
}

describe("invariants, roots and quasi-periods of given periods — oracle: stored table, 40 digits", () => {
  for (const entry of entries("weierstrass.json", "lattice_invariants")) {
    it(`${entry.id} ${entry.input.lattice}`, () => {
      const { lattice, flipped } = latticeOf(entry);
      const { g2, g3 } = invariants(lattice, INVARIANT_BITS);
      const scale = 6;
      expectAbsolute(g2, entry.expected.g2, entry, scale);
      expectAbsolute(g3, entry.expected.g3, entry, scale);
      const [e1, e2, e3] = roots(lattice, INVARIANT_BITS);
      expectAbsolute(e1, entry.expected.e1, entry, scale);
      expectAbsolute(e2, entry.expected.e2, entry, scale);
      expectAbsolute(e3, entry.expected.e3, entry, scale);
      const [eta1, eta2] = quasiPeriods(lattice, INVARIANT_BITS);
      expectAbsolute(eta1, entry.expected.quasi_period1, entry, scale);
      expectAbsolute(flipped ? disc.neg(eta2) : eta2, entry.expected.quasi_period2, entry, scale);
    });
  }
});

/** A value that may be 0 or cancel: the unit is taken from the larger of its printed size and the size of the roots. */
function expectAbsolute(got: disc.Disc, printed: { re: string; im: string }, entry: Entry, spare: number): void {
  const zero = Number(printed.re) === 0 && Number(printed.im) === 0;
  if (zero) {
    const sizes = [entry.expected.e1, entry.expected.e2].map((e) => disc.magnitude(toDisc(e ?? "1", 64)));
    expect(disc.magnitude(got)).toBeLessThan(3 * Math.max(...sizes) - 130);
    return;
  }
  expectHolds(got, printed, entry.digits, spare);
}

describe("℘, ℘′, ζ, σ — oracle: stored table, 40 digits", () => {
  for (const entry of entries("weierstrass.json", "weierstrass_values")) {
    if (entry.input.degenerate) continue;
    it(entry.id, () => {
      const { lattice } = latticeOf(entry);
      const z = toDisc(entry.input.z, BITS + 64);
      const got = weierstrassValues(lattice, z, BITS, ["wp", "prime", "zeta", "sigma"]);
      const names = { wp: "p", prime: "p_prime", zeta: "zeta", sigma: "sigma" } as const;
      for (const [name, printed] of Object.entries(names) as ["wp", "p"][]) {
        // Two entries with a huge σ give no σ.
        if (entry.expected[printed] === undefined) continue;
        expectAbsolute(got[name]!, entry.expected[printed], { ...entry, expected: { e1: "1" } }, 6);
      }
    });
  }
});

describe("periods of given invariants — oracle: stored table, 40 digits, compared as lattices", () => {
  for (const entry of entries("weierstrass.json", "lattice_from_invariants")) {
    it(`${entry.id} ${entry.input.name}`, () => {
      const { lattice } = latticeOf(entry);
      const { w1, w2 } = periods(lattice, BITS);
      const { expected } = entry;
      if (expected.real_period) expectHolds(w1, expected.real_period, entry.digits);
      if (expected.other_period) expectHolds(w2, expected.other_period, entry.digits);
      // The stored basis has integer coordinates with determinant ±1 in ours.
      const rows = [expected.reduced_basis.period1, expected.reduced_basis.period2].map((printed) => {
        const p = toDisc(printed, BITS);
        const area = disc.imag(disc.mul(w2, disc.conj(w1), BITS));
        const x = ball.div(disc.imag(disc.mul(w2, disc.conj(p), BITS)), area, BITS);
        const y = ball.div(disc.imag(disc.mul(p, disc.conj(w1), BITS)), area, BITS);
        return [x, y].map((c) => {
          const n = Math.round(ball.toDouble(c));
          expect(ball.magnitude(ball.sub(c, ball.fromInt(n), BITS))).toBeLessThan(-118);
          return n;
        });
      });
      expect(Math.abs(rows[0]![0]! * rows[1]![1]! - rows[0]![1]! * rows[1]![0]!)).toBe(1);
      for (const e of roots(lattice, BITS)) {
        const near = (expected.roots as { re: string; im: string }[]).filter((printed) => {
          const gap = disc.sub(toDisc(printed, BITS), e, BITS);
          return disc.magnitude(gap) < -118 + disc.magnitude(w1) * -2;
        });
        expect(near.length).toBe(1);
      }
    });
  }
});

describe("real and second period of curves over Q — oracle: published tables, recomputed to 28 digits", () => {
  interface Curve {
    id: string;
    a: number[];
    c4: string;
    c6: string;
    components: number;
    real_period: string;
    second_period: { re: string; im: string };
  }
  for (const entry of entries("curve-periods.json") as unknown as Curve[]) {
    it(`${entry.id} [${entry.a}]`, () => {
      const g2 = Rational.of(BigInt(entry.c4), 12n);
      const g3 = Rational.of(BigInt(entry.c6), 216n);
      const lattice = latticeOfInvariants(g2, g3);
      const { w1, w2 } = periods(lattice, 110);
      expect(lattice.components).toBe(entry.components);
      expectHolds(w1, entry.real_period, 28);
      expectHolds(w2, entry.second_period, 28);
      expect(w1.axis).toBe("real");
    });
  }
});

describe("inverse of ℘ — oracle: stored table, modulo the lattice", () => {
  for (const entry of entries("weierstrass.json", "weierstrass_inverse")) {
    it(`${entry.id} ${entry.input.name}`, () => {
      const { lattice } = latticeOf(entry);
      const z = toDisc(entry.expected.z, 140);
      const y = weierstrassValues(lattice, z, 136, ["prime"]).prime!;
      // The stored z has 40 digits: its own ℘ and ℘′ give it back.
      const x = weierstrassValues(lattice, z, 136, ["wp"]).wp!;
      expect(disc.magnitude(disc.sub(x, toDisc(entry.input.p, 140), 140))).toBeLessThan(-100);
      const back = logarithm(lattice, { x, y }, 130);
      const { rest } = toCell(reduced(lattice, 140), disc.sub(back, z, 130), 130);
      expect(disc.magnitude(rest)).toBeLessThan(-110);
    });
  }
});
