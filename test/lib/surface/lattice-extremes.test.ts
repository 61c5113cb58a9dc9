import { describe, expect, it } from "vitest";
import { complex, enclose, exact, i, lattice, rational, real, secondRoute } from "../../../lib/index.ts";
import type { DivisorFunction } from "../../../lib/surface/elliptic.ts";

describe("lattices far out — oracle: second algorithm, homogeneity", () => {
  it("Im τ from 1/1000 to 50, and τ beside the unit arc", () => {
    for (const tau of [exact`1/7 + 1/1000 i`, exact`1/3 + 50i`, exact`3/5 + 4/5 i`, complex("0.6", "0.8000000001")]) {
      const L = lattice({ tau });
      const z = L.at(rational("2/7"), rational("3/11"));
      for (const value of [L.wp(z), L.wp.prime(z), L.zeta(z), ...L.quasiPeriods]) {
        const pair = secondRoute(value);
        expect(pair.agree, `${pair}`).toBe(true);
        expect(pair.value.minus(pair.other).abs().minus(pair.value.abs().times("1e-18")).sign()).toBe(-1);
      }
    }
  });

  it("invariants of size 1e±200: ω of (t⁴g2, t⁶g3) is ω/t", () => {
    const base = lattice({ invariants: [4, -1] });
    for (const t of ["1e33", "1e-34"]) {
      const s = real(t);
      const L = lattice({ invariants: [s.pow(4).times(4), s.pow(6).neg()] });
      expect(L.periods[0].times(s).overlaps(base.periods[0])).toBe(true);
      expect(L.wp(real("0.3").div(s)).div(s.pow(2)).overlaps(base.wp("0.3"))).toBe(true);
    }
  });

  it("z at 1e-30 from a pole and from a half-period: the first terms of the series", () => {
    const L = lattice({ invariants: [4, -1] });
    const t = real("1e-30");
    expect(L.wp(t).minus(t.pow(-2)).abs().minus("1e-59").sign()).toBe(-1);
    // ℘(ω1/2 + t) − e1 = (6e1² − g2/2) t²/2 + ...
    const half = L.halfPeriods[0].plus(t);
    const gap = L.wp(half).minus(L.roots[0]).digits(20);
    const slope = L.roots[0].pow(2).times(3).minus(1);
    expect(gap.div(t.pow(2)).minus(slope).abs().minus("1e-15").sign()).toBe(-1);
  });
});

describe("Abel's condition says how it is known", () => {
  it("proved for exact points, certified for numbers", () => {
    const L = lattice({ tau: i });
    const c = L.at(rational("1/3"), 0);
    const exactly = L.elliptic({ zeros: [c, c.neg()], poles: [0, 0] }) as DivisorFunction;
    expect(exactly.abel.kind).toBe("proved");
    const near = enclose("0.25", "1e-12");
    const measured = L.elliptic({ zeros: [near, near.neg()], poles: [0, 0] }) as DivisorFunction;
    expect(measured.abel).toMatchObject({ kind: "certified" });
  });
});
