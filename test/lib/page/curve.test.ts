import { describe, expect, it } from "vitest";
import { bundle } from "../../../lib/page/bundle.ts";
import { tex } from "../../../lib/page/typeset.ts";
import { curve } from "../../../lib/surface/make-curve.ts";

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
