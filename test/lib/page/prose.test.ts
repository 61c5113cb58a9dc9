import { describe, expect, it } from "vitest";
import { prose } from "../../../lib/page/prose.ts";

describe("running text for TeX and HTML alike", () => {
  it("variables and signs are formulas", () => {
    expect(prose("the two sums have one x")).toBe("the two sums have one $x$");
    expect(prose("(j = 5 is a root for -28), c4^3 - c6^2")).toBe(
      "($j$ = 5 is a root for $-28$), $c_{4}^{3}$ $-$ $c_{6}^{2}$",
    );
  });

  it("indices and Greek letters in a formula", () => {
    expect(prose("the dual is φ_3/ψ_3^2")).toBe("the dual is $\\varphi _{3}/\\psi _{3}^{2}$");
  });

  it("plain words stand as they are", () => {
    expect(prose("the two sums have a point A")).toBe("the two sums have a point A");
    expect(prose("2y + 1 of Q (from its logarithm).")).toBe("2y + 1 of Q (from its logarithm).");
  });

  it("special characters become formulas, formulas stay, punctuation stays outside", () => {
    expect(prose("℘′ at ω1/2, and 50%")).toBe("$\\wp {}'$ at $\\omega_{1}\\text{/2}$, and $\\text{50}\\%$");
    expect(prose("agree within 10^-50; twice")).toBe("agree within $10^{-50}$; twice");
    expect(prose("(x^3 - 4*x^2) at $z_P$")).toBe("($x^{3}$ $-$ $4 x^{2}$) at $z_P$");
    expect(prose("a_b & c#d")).toBe("$\\text{a}\\_\\text{b}$ $\\&$ $\\text{c}\\#\\text{d}$");
  });

  it("no character with a meaning in TeX is left outside a formula", () => {
    const ascii = Array.from({ length: 95 }, (_, k) => String.fromCharCode(32 + k)).filter((c) => c !== "$");
    expect(prose(ascii.join(" ")).replace(/\$[^$]*\$/g, "")).not.toMatch(/[\\%#_^&~{}<>|]/);
  });
});
