import { expect, it } from "vitest";
import { Complex } from "../../../lib/number/values.ts";
import { standingOf } from "../../../lib/surface/claim-parts.ts";
import { lattice } from "../../../lib/surface/make-lattice.ts";

it.each([
  ["two components", [4, -1]],
  ["one component", [-4, 1]],
] as const)("2ζ(ω/2) = η at the exact half-periods, %s — oracle: definition of the quasi-periods", (_, invariants) => {
  const L = lattice({ invariants: [...invariants] });
  const [eta1, eta2] = L.quasiPeriods.map((eta) => Complex.from(eta)) as [Complex, Complex];
  const [first, middle, second] = L.halfPeriods.map((w) => Complex.from(L.zeta(w)).times(2));
  expect(standingOf(first, "=", eta1).kind).toBe("certified");
  expect(standingOf(second, "=", eta2).kind).toBe("certified");
  expect(standingOf(middle, "=", eta1.plus(eta2)).kind).toBe("certified");
  expect(standingOf(L.zeta(L.halfPeriods[2].times(3)), "=", eta2.times("3/2")).kind).toBe("certified");
});
