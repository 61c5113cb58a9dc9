import temml from "temml";
import { describe, expect, it } from "vitest";
import { bundle } from "../../../lib/page/bundle.ts";
import { tex } from "../../../lib/page/typeset.ts";
import { cubic } from "../../../lib/surface/make-cubic.ts";
import { curve } from "../../../lib/surface/make-curve.ts";
import { quartic } from "../../../lib/surface/make-quartic.ts";

const E = curve`y^2 + y = x^3 - x`;

describe("curves and points on a page", () => {
  it("an equation with its field", () => {
    expect(bundle(E)?.["text/plain"]).toBe("y^2 + y = x^3 - x over Q");
    expect(tex(E)).toBe("y^{2} + y = x^{3} - x \\quad \\text{over } \\mathbb{Q}");
    expect(tex(curve({ a: ["1/2", 0, 0, "-4/3", 12345] }))).toBe(
      "y^{2} + \\frac{1}{2} x y = x^{3} - \\frac{4}{3} x + 12\\,345 \\quad \\text{over } \\mathbb{Q}",
    );
  });

  it("a rescaled equation says what it was given as", () => {
    expect(bundle(curve`y^2 = 4x^3 - 4x + 1`)?.["text/plain"]).toBe(
      "y^2 = x^3 - x + 1/4 over Q, given as y^2 = 4*x^3 - 4*x + 1, whose y is 2*y here",
    );
  });

  it("points, O, and lists of them", () => {
    expect(tex(E.point("1/4", "-5/8"))).toBe("\\left( \\frac{1}{4},\\; -\\frac{5}{8} \\right)");
    expect(tex(E.origin)).toBe("O");
    expect(bundle([E.point(0, 0), E.origin])?.["text/plain"]).toBe("[(0, 0), O]");
    expect(bundle([E.point(0, 0), E.origin])?.["text/latex"]).toContain("O");
  });
});

describe("plane curves and maps on a page", () => {
  const C = cubic`u^3 + 2v^3 + 3w^3 = 6 u v w`;
  const { curve: F, to, from } = C.through({ u: 1, v: 1, w: 1 });

  it("a homogeneous cubic and its points", () => {
    expect(tex(C)).toBe("u^{3} + 2 v^{3} + 3 w^{3} - 6 u v w = 0 \\quad \\text{over } \\mathbb{Q}");
    expect(tex(C.point({ u: 1, v: -2, w: 1 }))).toBe("\\left( 1 : -2 : 1 \\right)");
  });

  it("maps are shown by their formulas, both ways, and read by a TeX reader", () => {
    expect(tex(to)).toContain("x' & = & \\displaystyle \\frac{-3 u + 6 v + 15 w}{u - w}");
    expect(bundle(from)?.["text/plain"]).toContain("(u′ : v′ : w′) = (x^2 + 27*x - y + 153 : ");
    for (const value of [C, to, from, { F, to, from }, C.tangent({ u: 1, v: 1, w: 1 })]) {
      expect(() => temml.renderToString(tex(value), { throwOnError: true })).not.toThrow();
    }
  });

  it("the form of a line is shown as a polynomial", () => {
    expect(bundle(C.tangent({ u: 1, v: 1, w: 1 }))?.["text/plain"]).toBe("{ form: -u + w, meets: (1 : -2 : 1) }");
  });

  it("y² = quartic keeps its two sides", () => {
    expect(tex(quartic`y^2 = x^4 - 17`)).toBe("y^{2} = x^{4} - 17 \\quad \\text{over } \\mathbb{Q}");
  });
});
