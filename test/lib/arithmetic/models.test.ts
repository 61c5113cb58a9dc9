import { describe, expect, it } from "vitest";
import { rationals as Q } from "../../../lib/algebra/rationals.ts";
import { globalMinimalModel, toRationals } from "../../../lib/arithmetic/minimal.ts";
import { torsionSubgroup } from "../../../lib/arithmetic/torsion.ts";
import { type Coefficients, changeModel, invariantsOf, jInvariant } from "../../../lib/curve/weierstrass.ts";
import { Rational } from "../../../lib/number/rational.ts";
import table from "./curves.json" with { type: "json" };

const model = (a: readonly number[]) => a.map((c) => Rational.of(c)) as unknown as Coefficients<Rational>;

describe(`invariants, minimal models and torsion of ${table.entries.length} tabulated curves — oracle: Cremona, Tables 1 to 5`, () => {
  it("Δ, c4, c6 and j", () => {
    for (const entry of table.entries) {
      const invariants = invariantsOf(Q, model(entry.a));
      const found = [invariants.discriminant, invariants.c4, invariants.c6, jInvariant(Q, invariants)];
      expect(found.map(String)).toEqual([entry.discriminant, entry.c4, entry.c6, entry.j_invariant]);
    }
  });

  it("a model moved away by (u, r, s, t) comes back to the tabulated one, by the change that is returned", () => {
    const q = Rational.of;
    table.entries.forEach((entry, k) => {
      const change = { u: q(k % 3 === 0 ? 6 : 5, 2 + (k % 4)), r: q(k, 3), s: q(1 - k, 2), t: q(7, 1 + k) };
      const moved = changeModel(Q, model(entry.a), change);
      const minimal = globalMinimalModel(moved);
      expect(minimal.a.map(Number)).toEqual(entry.a);
      expect(changeModel(Q, moved, minimal.change).map(String)).toEqual(entry.a.map(String));
    });
  });

  it("torsion structure", () => {
    for (const entry of table.entries) {
      const a = entry.a.map(BigInt) as unknown as Parameters<typeof torsionSubgroup>[0];
      const found = torsionSubgroup(a);
      expect(found.structure).toEqual(entry.torsion_structure);
      expect(found.order).toBe(entry.torsion_order);
      expect(toRationals(a).map(String)).toEqual(entry.a.map(String));
    }
  });
});
