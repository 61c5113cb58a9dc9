import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { complex } from "../../../lib/number/convert.ts";
import { Real } from "../../../lib/number/values.ts";
import { degenerate } from "../../../lib/surface/degenerate.ts";
import { lattice } from "../../../lib/surface/make-lattice.ts";

interface Entry {
  id: string;
  input: { degenerate?: boolean; g2: string; g3: string; z: { re: string; im: string } };
  expected: Record<string, { re: string; im: string }> & { real_period?: string };
}

const file = new URL("../lattice/weierstrass.json", import.meta.url);
const entries = (JSON.parse(readFileSync(file, "utf8")) as { entries: Entry[] }).entries.filter(
  ({ input }) => input.degenerate,
);

describe("limits with a double or triple root — oracle: stored table of the closed forms, 40 digits", () => {
  for (const { id, input, expected } of entries) {
    it(id, () => {
      const L = degenerate({ invariants: [input.g2, input.g3] });
      const z = input.z.im === "0" ? Real.from(input.z.re) : complex(input.z.re, input.z.im);
      for (const [name, printed] of [
        ["wp", "p"],
        ["prime", "p_prime"],
        ["zeta", "zeta"],
        ["sigma", "sigma"],
      ] as const) {
        const value = L[name](z);
        const stored = expected[printed]!;
        const near = complex(`${stored.re}...`, `${stored.im}...`);
        expect(value.overlaps(near), `${name}: ${value}`).toBe(true);
        expect(Number(`${value.radius.toDouble()}`)).toBeLessThan(1e-20);
        if (z instanceof Real) expect(value).toBeInstanceOf(Real);
      }
      if (expected.real_period) expect(L.period!.overlaps(`${expected.real_period}...`)).toBe(true);
    });
  }

  it("say in words what they are, and refuse a lattice", () => {
    expect(`${degenerate({ invariants: [12, -8] })}`).toContain("sinh²");
    expect(`${degenerate({ invariants: [12, 8] })}`).toContain("one real period");
    expect(degenerate({ invariants: [0, 0] }).kind).toBe("rational");
    expect(() => degenerate({ invariants: [4, -1] })).toThrow("g2³ − 27 g3² = 37");
    expect(() => lattice({ invariants: [12, 8] })).toThrow("double root leaves");
  });
});
