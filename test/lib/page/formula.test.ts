import { describe, expect, it } from "vitest";
import { bundle } from "../../../lib/page/bundle.ts";
import { conventionHtml } from "../../../lib/page/convention.ts";
import { formulaHtml, formulaText } from "../../../lib/page/formula/write.ts";
import { htmlFormulas } from "../../../lib/page/plain-formula.ts";
import { table } from "../../../lib/page/table.ts";
import type { ConventionKey } from "../../../lib/proof/conventions.ts";
import { curve } from "../../../lib/surface/make-curve.ts";

describe("formulas in a line — oracle: written by hand", () => {
  it.each([
    ["\\#E(\\mathbb{F}_p)", "#E(F_p)", "#<i>E</i>(<b>F</b><sub><i>p</i></sub>)"],
    ["y^2 = x^{3}-x", "y^2 = x^3 - x", "<i>y</i><sup>2</sup> = <i>x</i><sup>3</sup> − <i>x</i>"],
    ["-\\frac{1}{4}\\,i", "-1/4 i", "−1/4\u2009<i>i</i>"],
    ["\\frac{1}{4} x + \\tfrac12", "(1/4)x + 1/2", "(1/4)<i>x</i> + 1/2"],
    ["\\frac{1 + \\sqrt{5}}{2ab}", "(1 + √5)/(2ab)", "(1 + √5)/(2<i>a</i><i>b</i>)"],
    ["\\tfrac12(u + v)", "(1/2)(u + v)", "(1/2)(<i>u</i> + <i>v</i>)"],
    ["\\wp'^2", "℘′^2", "℘′<sup>2</sup>"],
    ["(-1, \\; -2)", "(-1, -2)", "(−1, −2)"],
    ["\\hat h(P) < 10^{-6}", "ĥ(P) < 10^-6", "<i>ĥ</i>(<i>P</i>) &lt; 10<sup>−6</sup>"],
    ["\\sin^2\\varphi", "sin^2 φ", "sin<sup>2</sup> <i>φ</i>"],
    ["1 - n \\sin \\pi v", "1 - n sin πv", "1 − <i>n</i> sin <i>π</i><i>v</i>"],
    ["T^n: \\tau + n", "T^n: τ + n", "<i>T</i><sup><i>n</i></sup>: <i>τ</i> + <i>n</i>"],
    ["\\left(\\frac{a}{b}\\right)^{2}", "(a/b)^2", "(<i>a</i>/<i>b</i>)<sup>2</sup>"],
    ["a_{n+1} b", "a_(n+1) b", "<i>a</i><sub><i>n</i>+1</sub><i>b</i>"],
  ])("%s", (tex, text, html) => {
    expect(formulaText(tex)).toBe(text);
    expect(formulaHtml(tex)).toBe(html);
  });

  it("digits in groups are copied without a gap", () => {
    expect(formulaHtml("-12\\,345.678\\,9\\ldots")?.replace(/<[^>]*>/g, "")).toBe("−12345.6789...");
    expect(formulaText("12\\,345\\,678")).toBe("12345678");
  });

  it.each(["\\begin{array}{l} a \\end{array}", "\\unknown x", "x^", "{a", "a}", "\\sqrt[3]{x}", "x_1_2", "\\frac{1}"])(
    "%s is left to a mathematics renderer",
    (tex) => {
      expect(formulaHtml(tex)).toBeUndefined();
      expect(htmlFormulas(`so $${tex}$`)).toMatch(/^so \$.*\$$/);
    },
  );
});

it("a table reads without a mathematics renderer: no $ is left in its HTML, nor a tag of the cells", () => {
  const E = curve`y^2 + y = x^3 - x`;
  const html = bundle(
    table(
      [
        [E, E.point(0, 0), "the point $P$ & <b>"],
        [
          E.j,
          { a: 1n, b: E.j },
          [
            [1n, 2n],
            [3n, 4n],
          ] as never,
        ],
      ],
      { columns: ["ω1", "$\\#E(\\mathbb{F}_p)$", "what is <said>"], caption: "Of $y^2$" },
    ),
  )?.["text/html"] as string;
  expect(html).not.toMatch(/[$\\]/);
  expect(html).toContain("<i>y</i><sup>2</sup> + <i>y</i> = <i>x</i><sup>3</sup> − <i>x</i>");
  expect(html).toContain("&lt;said&gt;");
  expect(html).toContain("the point <i>P</i> &amp; &lt;b&gt;");
});

it("the rows of the conventions read without a mathematics renderer", () => {
  const keys: ConventionKey[] = [
    "cubic",
    "periods",
    "roots",
    "realBasis",
    "fundamentalDomain",
    "discriminant",
    "height",
    "nome",
  ];
  for (const key of keys) expect(conventionHtml([key])).toMatch(/^<div.*<i>[^$\\]*$/);
});

it("integrals, sums and conjugates — oracle: written by hand", () => {
  expect(formulaText("\\int_0^\\infty \\frac{dt}{\\sqrt{t + x}}")).toBe("∫_0^∞ dt/(√(t + x))");
  expect(formulaText("\\sum_{n \\ge 1} n q^n")).toBe("Σ_(n≥1) nq^n");
  expect(formulaText("\\operatorname{Im}(\\overline{\\omega_1}\\, \\omega_2)")).toBe("Im(conj(ω1) ω2)");
});
