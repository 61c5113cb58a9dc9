import temml from "temml";
import { describe, expect, it } from "vitest";
import { complex, real } from "../../../lib/number/convert.ts";
import { bundle } from "../../../lib/page/bundle.ts";
import { derivation } from "../../../lib/page/derivation.ts";
import { tex } from "../../../lib/page/typeset.ts";
import { working } from "../../../lib/page/working.ts";
import { claim } from "../../../lib/surface/claim.ts";
import { curve } from "../../../lib/surface/make-curve.ts";
import { lattice } from "../../../lib/surface/make-lattice.ts";

const text = (value: unknown) => bundle(value)?.["text/plain"] as string;

describe("derivations of one's own", () => {
  const E = curve`y^2 + y = x^3 - x`;
  const P = E.point(0, 0);
  const double = derivation("Doubling $P$")
    .step("the tangent at $P$ has slope $-1$", { formula: "y = -x", source: "Silverman AEC III.2.3" })
    .step("the double", { formula: "2P", value: P.plus(P), check: claim("double", P.plus(P), "=", E.point(1, 0)) });

  it("numbers its steps, and folds", () => {
    expect(text(double.show("outline"))).toBe(
      "Doubling P\n(1) the tangent at P has slope -1\n(2) the double\n1 of 2 steps checked; together proved",
    );
    expect(text(double)).toContain("(2) the double\n    2P = (1, 0)");
    expect(text(double)).not.toContain("Silverman");
    expect(text(double.show("all"))).toContain("source: Silverman AEC III.2.3");
    expect(text(double.show("all"))).toContain("check: proved (exact arithmetic)");
  });

  it("is typeset at each level, and refuted steps show", () => {
    for (const level of ["outline", "steps", "all"] as const) {
      expect(() => temml.renderToString(tex(double.show(level)), { throwOnError: true })).not.toThrow();
    }
    const wrong = double.step("and", { check: claim("wrong", P, "=", P.neg()) });
    expect(text(wrong)).toContain("2 of 3 steps checked; together refuted");
  });
});

describe("the forms of a derivation", () => {
  const steps = derivation("Half of $\\omega_1$")
    .step("the start", { formula: "a", value: 2, label: "start" })
    .step("by {start}, not by {nothing} nor $\\frac{1}{2}$", { value: 3, source: "our own", label: "end" });
  const html = (level: "outline" | "steps" | "all") => bundle(steps.show(level))?.["text/html"] as string;

  it("text cites a step by its label, which stays when steps are put before it", () => {
    expect(text(steps)).toContain("(2) by (1), not by {nothing} nor 1/2");
    expect(steps.cite("end")).toBe("(2)");
    expect(steps.anchor("end")).toBe("step-half-of-end");
    expect(steps.named("first case").anchor("end")).toBe("step-first-case-end");
    expect(steps.value("end")).toBe(3);
    expect(() => steps.anchor("and")).toThrow(/expected one of start, end/);
  });

  it("HTML has the anchors and links, and folds without a script: each level opens its own depth", () => {
    for (const level of ["outline", "steps", "all"] as const) {
      expect(html(level)).toContain('<li id="step-half-of-end"');
      expect(html(level)).toContain('<a href="#step-half-of-start">(1)</a>');
      expect(html(level)).not.toMatch(/<script|onclick/);
    }
    const open = (level: "outline" | "steps" | "all") => html(level).match(/<details open/g)?.length ?? 0;
    expect([open("outline"), open("steps"), open("all")]).toEqual([0, 2, 3]);
  });

  it("LaTeX is an enumeration whose items have labels; only what the level shows", () => {
    const latex = (level: "outline" | "steps" | "all") => bundle(steps.show(level))?.["text/latex"] as string;
    expect(latex("all")).toContain("\\item\\label{step-half-of-start} the start:\n\\[ {a} = 2 \\]");
    expect(latex("all")).toContain("by (\\ref{step-half-of-start}), not by");
    expect(latex("all")).toContain("Source: our own.");
    expect(latex("steps")).not.toContain("our own");
    expect(latex("outline")).not.toContain("\\[");
  });

  it("a trace is shown and is no result: its length depends on the digits", () => {
    const data = bundle(derivation("t").step("rows", { value: [1n, 2n], trace: true }))![
      "application/vnd.halfperiod.value+json"
    ];
    expect(JSON.stringify(data)).toContain('"value":null');
  });
});

describe("working", () => {
  it("a number: one step an operation, operands first, each with its value — oracle: the record by hand", () => {
    const L = lattice({ invariants: [4, -1] });
    const z = complex("0.41", "0.27");
    const x = L.wp(z).pow(2).minus(real(2).sqrt());
    const { steps } = working(x);
    expect(steps.map((step) => step.text)).toEqual(["value of ℘", "power", "difference"]);
    expect(steps.map((step) => step.formula)).toEqual([
      "\\wp(\\left(\\frac{41}{100} + \\frac{27}{100}\\,i\\right))",
      "(1)^{2}",
      "(2) - \\left(\\sqrt{2}\\right)",
    ]);
    expect(working(L.wp(L.at("1/3", 1))).steps.at(-1)?.formula).toBe("\\wp(\\frac{1}{3}\\,\\omega_1 + \\omega_2)");
    expect(steps.at(-1)?.value).toBe(x);
    expect(() => temml.renderToString(tex(working(x)), { throwOnError: true })).not.toThrow();
  });

  it("what keeps no record is refused, an exact number has one step", () => {
    expect(() => working({})).toThrow(/no record is kept/);
    expect(working(real("1/3")).steps.length).toBe(1);
  });
});
