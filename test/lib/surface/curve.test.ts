import { describe, expect, it } from "vitest";
import { DomainError } from "../../../lib/proof/errors.ts";
import { curve } from "../../../lib/surface/make-curve.ts";

const message = (f: () => unknown): string => {
  try {
    f();
  } catch (error) {
    expect(error).toBeInstanceOf(DomainError);
    return (error as DomainError).message;
  }
  throw new Error("nothing was refused");
};

describe("curves over Q", () => {
  it("37a1 [0,0,1,-1,0]: Δ = 37, j = 110592/37 — oracle: b- and c-invariants worked by hand", () => {
    const E = curve({ a: [0, 0, 1, -1, 0] });
    expect(E.b.join()).toBe("0,-2,1,-1");
    expect(`${E.c4} ${E.c6} ${E.discriminant} ${E.j}`).toBe("48 -216 37 110592/37");
    expect(`${E}`).toBe("y^2 + y = x^3 - x over Q");
  });

  it("a curve with given j has that j — oracle: definition", () => {
    for (const j of ["0", "1728", "-3375", "110592/37"]) expect(curve({ j }).j.toString()).toBe(j);
  });

  it("a point off the curve is refused with its residual and the points of that x", () => {
    const E = curve`y^2 + y = x^3 - x`;
    expect(message(() => E.point(1, 2))).toBe(
      "point: (1, 2) is not on y^2 + y = x^3 - x: there y^2 + y − (x^3 - x) is 6; expected 0. On this curve with x = 1 there is (1, 0) and (1, -1).",
    );
    expect(message(() => E.point(3, 2))).toContain("no point over Q has x = 3");
  });

  it.each([
    ["y^2 = x^3 - 3x + 2", "a node with conjugate tangents (nonsplit, slopes in Q(√3)) at (1, 0)", "norm 1 in Q(√3)"],
    ["y^2 = x^3 + 4x^2", "a node with two tangents over Q (split) at (0, 0)", "the multiplicative group of Q"],
    ["y^2 = x^3 - x^2", "an isolated real point", "norm 1 in Q(√-1)"],
    ["y^2 = x^3", "a cusp at (0, 0)", "the additive group of Q"],
    ["y^2 + 2xy + 2y = x^3 - 4x^2 + x - 2", "a cusp at (1, -2)", "additive"],
  ])("%s is refused: %s — oracle: tangents by hand", (text, kind, group) => {
    const refusal = message(() => curve(Object.assign([text], { raw: [text] })));
    expect(refusal).toContain(kind);
    expect(refusal).toContain(group);
  });

  it("points up to height 10 of y² + y = x³ − x — oracle: multiples of (0, 0) in the printed table", () => {
    const E = curve`y^2 + y = x^3 - x`;
    const found = E.points({ height: 10 }).map((P) => P.x.toString());
    expect(found).toEqual(["1", "0", "-1", "2", "1/4", "6", "-5/9"]);
    for (const P of E.points({ height: 10 })) expect(E.point(P.x, P.y).equals(P)).toBe(true);
    const moved = curve`y^2 = 4x^3 - 4x + 1`; // the same curve, y = 2Y
    expect(moved.points({ height: 10 }).length).toBe(7);
  });

  it("points of two curves do not add, and both equations are shown", () => {
    const P = curve`y^2 + y = x^3 - x`.point(0, 0);
    const Q = curve`y^2 = x^3 - x`.point(0, 0);
    expect(message(() => P.plus(Q))).toContain("y^2 + y = x^3 - x over Q and a point of y^2 = x^3 - x over Q");
  });
});
