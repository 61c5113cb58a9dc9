import temml from "temml";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { provedDigits } from "../../../lib/number/context.ts";
import { complex } from "../../../lib/number/convert.ts";
import { bundle } from "../../../lib/page/bundle.ts";
import { table } from "../../../lib/page/table.ts";
import { tex } from "../../../lib/page/typeset.ts";
import { lattice } from "../../../lib/surface/make-lattice.ts";

const before = provedDigits();
beforeEach(() => {
  provedDigits(30);
});
afterEach(() => {
  provedDigits(before);
});

const L = lattice({ invariants: [4, -1] });
const text = (value: unknown) => bundle(value)?.["text/plain"] as string;
const latex = (value: unknown) => bundle(value)?.["text/latex"] as string;

describe("lattices on a page", () => {
  // Real period of y² + y = x³ − x, published: 2.993458646231959629832009979452508...
  it("periods with the conventions below, each once — oracle: published period", () => {
    expect(text(L)).toMatch(
      /^lattice\n {2}ω1 = 2\.99345864623195962983200997945\d*\.\.\.\n {2}ω2 = 2\.4513\d+\.\.\. i\n/,
    );
    const lines = text(L).split("\n").slice(3);
    expect(lines.map((line) => line.split(":")[0])).toEqual(["cubic", "periods", "real basis"]);
    expect(latex(L).match(/full periods/g)?.length).toBe(1);
    expect(() => temml.renderToString(latex(L).slice(1, -1), { throwOnError: true })).not.toThrow();
  });

  it("a lattice given by its periods says nothing of a chosen basis; an exchange of the two is said", () => {
    const M = lattice({ periods: [1, complex("0.3", "-0.8")] });
    expect(text(M)).not.toContain("real basis");
    expect(text(M)).toContain("exchanged");
  });

  it("exact points keep their name", () => {
    expect(latex(L.at("1/3", 0))).toMatch(/\\frac\{\\omega_1\}\{3\} = 0\.99781/);
    expect(latex(L.at("1/2", "-1/2"))).toContain("\\frac{\\omega_1 - \\omega_2}{2} =");
    expect(text(L.halfPeriods)).toMatch(/^\[ω1\/2 = .*, \(ω1 \+ ω2\)\/2 = /);
  });

  it("a number carries the rows of what it was made from, through sums and products too", () => {
    const z = complex("0.41", "0.27");
    expect(text(L.wp(z))).toMatch(/\ncubic: /);
    expect(text(L.tau)).toMatch(/\nperiods: .*\nreal basis: /);
    const [w1] = L.periods;
    expect(text(L.zeta(z).plus(w1).times(3))).toMatch(/\nperiods: .*\nreal basis: .*\nquasi-periods: /);
    expect(text(complex(2).sqrt())).not.toContain("\n");
  });

  it("the conventions of a table stand once below it, and digits can be asked for", () => {
    const shown = text(table([{ z: "ω1/2", ℘: L.wp(L.halfPeriods[0]) }], { digits: 8 }));
    expect(shown.split("\n").at(-2)).toMatch(/^ω1\/2 {2}0\.8375654\d\.\.\.$/);
    expect(shown.split("\n").at(-1)).toMatch(/^cubic: /);
  });

  it("functions are shown as functions", () => {
    expect(latex(L.wp)).toContain("z \\mapsto \\wp(z)");
    expect(text(L.sigma)).toBe("σ, a function of z");
  });
});

describe("expansions on a page", () => {
  it("℘ at 0: 1/t² + t²/5 − t⁴/28 for g2 = 4, g3 = −1 — oracle: g2/20 and g3/28, DLMF 23.9.E2 and E5", () => {
    expect(text(L.wp.laurent(0, 8))).toMatch(/^t\^-2 \+ .*, t = z$/);
    expect(tex(L.wp.laurent(0, 8))).toContain("t^{-2} + \\frac{1}{5}\\, t^{2} - \\frac{1}{28}\\, t^{4} + O(t^{6})");
    expect(tex(L.wp.laurent(L.halfPeriods[0], 3))).toContain("t = z - \\frac{\\omega_1}{2}");
    expect(() =>
      temml.renderToString(tex(L.wp.laurent(complex("0.3", "0.2"), 3)), { throwOnError: true }),
    ).not.toThrow();
  });
});
