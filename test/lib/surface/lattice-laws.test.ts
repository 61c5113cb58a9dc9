import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { complex, lattice, rational, real, sinh } from "../../../lib/index.ts";
import type { Complex, Real } from "../../../lib/number/values.ts";
import type { Lattice } from "../../../lib/surface/lattice.ts";

const SEED = 20_261_201;
const RUNS = 100;

type Value = Real | Complex;

/** The enclosures meet, and the first is narrow beside the size of what it came from. */
function agree(x: Value, y: Value, size: Value = y): void {
  expect(x.overlaps(y), `${x} against ${y}`).toBe(true);
  const limit = size.abs().plus(1).times("1e-12");
  expect(x.minus(y).abs().minus(limit).sign(), `${x} against ${y} within ${limit}`).toBe(-1);
}

const quotient = fc
  .tuple(fc.integer({ min: -40, max: 40 }), fc.integer({ min: 1, max: 24 }))
  .map(([n, d]) => rational(`${n}/${d}`));
/** Re τ anywhere, Im τ from near the real line to far up; beside the unit arc, i and ρ. */
const tau = fc.oneof(
  fc.tuple(quotient, fc.constantFrom("1/200", "1/7", "4/5", "1", "7/4", "12", "50")).map(([x, y]) => complex(x, y)),
  fc.constantFrom(complex("3/5", "0.8000000001"), complex("1e-9", "1"), complex("-1/2", "0.8660254037844386")),
);
const scale = fc.constantFrom(complex(1), complex("3/7", -2), complex("1e-40", "2e-40"), complex(0, "-1e50"));
/** Coordinates in the basis: inside, near edges, half-periods and the pole, and outside. */
const coordinate = fc.oneof(
  quotient,
  fc.constantFrom("1e-9", "0.4999999999", "-0.5000001", "1001/7").map((x) => rational(x)),
);
const place = fc.tuple(coordinate, coordinate).filter(([r, s]) => !(r.isInteger() && s.isInteger()));

function made(t: Complex, s: Complex): Lattice {
  return lattice({ periods: [s, s.times(t)] });
}

const cases = fc.record({ t: tau, s: scale, z: place, w: place });

describe("laws of the functions on random lattices", () => {
  it("℘, ℘′ and ζ + η at z + m ω1 + n ω2 — oracle: (quasi-)periodicity, DLMF 23.2(iii)", () => {
    fc.assert(
      fc.property(cases, quotient, ({ t, s, z: [x, y] }, m) => {
        const L = made(t, s);
        const z = L.at(x, y);
        const [p, q] = [m.floor(), 3n];
        const moved = L.at(x.plus(p), y.plus(q));
        agree(L.wp(moved), L.wp(z));
        agree(L.wp.prime(moved), L.wp.prime(z));
        const [eta1, eta2] = L.quasiPeriods;
        const shift = eta1.times(p).plus(eta2.times(q));
        agree(L.zeta(moved).minus(shift), L.zeta(z), L.zeta(z).abs().plus(shift.abs()));
      }),
      { numRuns: RUNS, seed: SEED },
    );
  });

  it("℘(z + w) and ζ(z + w) — oracle: addition theorems, DLMF 23.10.1, 23.10.2", () => {
    fc.assert(
      fc.property(cases, ({ t, z: [x, y], w: [u, v] }) => {
        const away = (a: typeof x, b: typeof y) => !(a.isInteger() && b.isInteger());
        fc.pre(away(x.plus(u), y.plus(v)) && away(x.minus(u), y.minus(v)));
        const L = made(t, complex(1));
        const [z, w, sum] = [L.at(x, y), L.at(u, v), L.at(x.plus(u), y.plus(v))];
        const rise = L.wp(z).minus(L.wp(w));
        // Where the two values agree to all digits the quotient says nothing.
        fc.pre(!rise.overlaps(0));
        const slope = L.wp.prime(z).minus(L.wp.prime(w)).div(rise);
        const right = slope.pow(2).div(4).minus(L.wp(z)).minus(L.wp(w));
        expect(L.wp(sum).overlaps(right)).toBe(true);
        expect(L.zeta(sum).overlaps(L.zeta(z).plus(L.zeta(w)).plus(slope.div(2)))).toBe(true);
      }),
      { numRuns: RUNS, seed: SEED },
    );
  });

  it("℘(cz | cΛ) = c^−2 ℘(z | Λ), ζ(cz | cΛ) = ζ(z | Λ)/c — oracle: homogeneity, DLMF 23.10.17, 23.10.18", () => {
    fc.assert(
      fc.property(cases, ({ t, s, z: [x, y] }) => {
        const [L, M] = [made(t, complex(1)), made(t, s)];
        agree(M.wp(M.at(x, y)).times(s.pow(2)), L.wp(L.at(x, y)));
        agree(M.zeta(M.at(x, y)).times(s), L.zeta(L.at(x, y)));
      }),
      { numRuns: RUNS, seed: SEED },
    );
  });

  it("σ(2z) = −℘′(z) σ(z)⁴ — oracle: duplication, DLMF 23.10.10", () => {
    fc.assert(
      fc.property(tau, place, (t, [x, y]) => {
        // A σ of 1e±1000 is not what this asks.
        fc.pre(x.abs().plus(y.abs()).compare(rational(4)) < 0);
        const L = made(t, complex(1));
        const [z, twice] = [numberAt(L, x, y), numberAt(L, x.times(2), y.times(2))];
        const right = L.wp.prime(z).neg().times(L.sigma(z).pow(4));
        expect(L.sigma(twice).overlaps(right)).toBe(true);
      }),
      { numRuns: RUNS, seed: SEED },
    );
  });
});

/** x ω1 + y ω2 as a number. */
function numberAt(L: Lattice, x: ReturnType<typeof rational>, y: ReturnType<typeof rational>): Complex {
  return L.tau.times(y).plus(complex(x, 0)) as Complex;
}

describe("conversions there and back", () => {
  it("periods to invariants, roots, λ and j and back — oracle: j and the periods of the start", () => {
    fc.assert(
      fc.property(tau, (t) => {
        const L = lattice({ tau: t });
        const [e1, e2, e3] = L.roots;
        const back = [
          lattice({ invariants: [...L.invariants] as [Value, Value] }),
          lattice({ roots: [e1, e2, e3] }),
          lattice({ lambda: e2.minus(e3).div(e1.minus(e3)) }),
          lattice({ j: L.j }),
        ];
        for (const M of back) agree(M.j, L.j);
        for (const M of back.slice(0, 2)) {
          // The same lattice: the periods of the one are lattice points of the other.
          const { rest } = M.locate(complex(1));
          expect(rest.overlaps(0)).toBe(true);
          expect(rest.abs().minus("1e-12").sign()).toBe(-1);
        }
      }),
      // Each run makes four lattices, some of them through the whole ladder of precisions.
      { numRuns: 12, seed: SEED },
    );
  }, 90_000);

  it("τ = 2/5 + i/200 and i/200, whose roots agree to 500 digits — oracle: the periods of the start", () => {
    for (const t of ["2/5", "0"]) {
      const L = lattice({ tau: complex(rational(t), rational("1/200")) });
      const M = lattice({ invariants: [...L.invariants] as [Value, Value] });
      expect(M.locate(complex(1)).rest.abs().minus("1e-15").sign()).toBe(-1);
      agree(M.wp(rational("1/3")), L.wp(rational("1/3")));
    }
  });
});

describe("near a double root", () => {
  it("℘ of g2 = 12, g3 = −8 ± 1e-40 keeps its digits — oracle: 1 + 3/sinh²(√3 z), DLMF 23.10(iv) limit, off by under 1e-37", () => {
    for (const nudge of ["1e-40", "-1e-40"]) {
      const L = lattice({ invariants: [12, real(-8).plus(nudge)] });
      const z = real("0.7");
      const limit = real(3)
        .div(sinh(real(3).sqrt().times(z)).pow(2))
        .plus(1);
      const gap = L.wp(z).minus(limit).digits(10).abs();
      expect(gap.minus("1e-37").sign()).toBe(-1);
      expect(gap.sign()).toBe(1);
      expect(`${L.wp(z).digits(60)}`.length).toBeGreaterThan(58);
    }
  });
});
