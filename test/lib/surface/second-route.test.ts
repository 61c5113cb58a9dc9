import { describe, expect, it } from "vitest";
import { atDigits, complex, exact, i, lattice, rational, routesOf, secondRoute, π } from "../../../lib/index.ts";
import type { Lattice } from "../../../lib/surface/lattice.ts";

const LATTICES: Readonly<Record<string, () => Lattice>> = {
  square: () => lattice({ tau: i }),
  "two real components": () => lattice({ invariants: [4, -1] }),
  "one real component": () => lattice({ invariants: [1, 1] }),
  "complex invariants": () => lattice({ invariants: [complex("1", "2"), complex("3", "-1")] }),
  "skew periods": () => lattice({ periods: [complex("1", "1/7"), complex("-1/3", "5/4")] }),
  "a tall cell": () => lattice({ tau: exact`1/3 + 9i` }),
};

describe("every key value by another method — oracle: second algorithm", () => {
  for (const [name, make] of Object.entries(LATTICES)) {
    it(name, () => {
      const L = make();
      const [z, far] = [complex("0.31", "0.17"), complex("7.31", "-9.17")];
      const third = L.at(rational("1/3"), rational("1/5"));
      const values = [
        ...[z, far, third].flatMap((p) => [L.wp(p), L.wp.prime(p), L.zeta(p)]),
        L.sigma(z),
        ...L.quasiPeriods,
        ...L.roots,
        L.discriminant,
        L.wp.inverse(complex("2", "1")),
        L.logarithm(L.wp(z), L.wp.prime(z)),
        ...L.invariants,
        ...L.periods,
      ];
      let pairs = 0;
      for (const value of values.filter((v) => !v.exact)) {
        for (const route of routesOf(value)) {
          const given = L.data.given.kind !== "invariants";
          if ((given && route === "Carlson RF" && "coordinates" in value) || route === "theta constants") continue;
          const pair = secondRoute(value, route);
          expect(pair.agree, `${pair}`).toBe(true);
          expect(pair.digits, `${pair}`).toBeGreaterThan(17);
          pairs++;
        }
      }
      expect(pairs).toBeGreaterThan(20);
    });
  }

  it("periods of given invariants by RF, with 300 digits", () => {
    atDigits(300, () => {
      const L = lattice({ invariants: [4, -1] });
      for (const w of L.periods) expect(secondRoute(w).digits).toBeGreaterThan(299);
    });
  });
});

describe("refusals", () => {
  it("an exact value, an unknown route and a given period say what to do", () => {
    const L = lattice({ invariants: [4, 0] });
    expect(() => secondRoute(L.roots[0])).toThrow("secondRoute: an exact value; expected a value of a function");
    expect(() => secondRoute(L.wp(complex("0.3", "0.1")), "guess")).toThrow(
      'secondRoute: the route "guess"; expected "sum over rows", "lattice sum"',
    );
    expect(() => secondRoute(lattice({ tau: π.times(i) }).periods[1])).toThrow("no period of given invariants");
  });
});
