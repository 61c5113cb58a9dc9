import { describe, expect, it } from "vitest";
import { curve } from "../../../lib/surface/make-curve.ts";
import table from "../arithmetic/curves.json" with { type: "json" };
import printed from "./isogenies.json" with { type: "json" };

describe("isogenies from a kernel — oracle: printed image curves", () => {
  for (const { id, input, expected, source } of printed.entries) {
    it(`${id} [${input.a_invariants}], degree ${input.degree} — ${source.slice(0, 60)}`, () => {
      const E = curve({ a: input.a_invariants });
      const kernel = input.kernel.map(([x, y]) => E.point(x!, y!));
      const phi = E.isogeny({ kernel });
      expect(phi.degree).toBe(input.degree);
      expect(phi.to.a.map(String)).toEqual(expected.image_a_invariants.map(String));
      expect(phi.to.minimal().curve.a.map(String)).toEqual(expected.image_minimal_model.map(String));
      expect(phi.verify().kind).toBe("proved");
      expect(String(phi.factor)).toBe("1");
      for (const P of kernel) expect(phi(P).isOrigin).toBe(true);
      const { point } = input as { readonly point: readonly [string, string] | null };
      if (point) expect(phi(E.point(...point)).isOrigin).toBe(false);
    });

    it(`${id}: dual∘φ is multiplication by the degree — oracle: group law on points, constant of the differential`, () => {
      const E = curve({ a: input.a_invariants });
      const phi = E.isogeny({ kernel: input.kernel.map(([x, y]) => E.point(x!, y!)) });
      const dual = phi.dual();
      expect(String(dual.factor)).toBe(String(phi.degree));
      expect(dual.to.equals(E)).toBe(true);
      const P = E.over("R").pointsWith({ x: 7 })[0] ?? E.over("R").pointsWith({ x: 100 })[0]!;
      expect(P.isOrigin).toBe(false);
      for (const T of E.torsion().points) expect(dual(phi(T)).equals(T.times(phi.degree))).toBe(true);
    });
  }
});

describe("isogeny classes over Q — oracle: Cremona, Table 1", () => {
  it("every prime degree and target of all tabulated curves", () => {
    let checked = 0;
    const listed = table.entries.filter((entry) => entry.prime_degree_isogenies);
    for (const entry of listed) {
      const key = (degree: number, a: readonly unknown[]) => `${degree}: ${a.join()}`;
      const found = curve({ a: entry.a })
        .isogenies()
        .map((phi) => key(phi.degree, phi.to.minimal().curve.a))
        .sort();
      expect(found).toEqual(entry.prime_degree_isogenies!.map(({ degree, to }) => key(degree, to)).sort());
      checked += found.length;
    }
    expect(checked).toBeGreaterThan(100);
  });

  it("the class of [0,-1,1,-10,-20] has three curves and that of [1,1,1,-10,-10] eight", () => {
    expect(curve({ a: [0, -1, 1, -10, -20] }).isogenyClass().length).toBe(3);
    expect(curve({ a: [1, 1, 1, -10, -10] }).isogenyClass().length).toBe(8);
  });
});
