import { describe, expect, expectTypeOf, it } from "vitest";
import type { Rational } from "../../../lib/number/rational.ts";
import type { Real } from "../../../lib/number/values.ts";
import { curve } from "../../../lib/surface/make-curve.ts";
import { add, mul, neg, sub } from "../../../lib/surface/operators.ts";
import type { Point } from "../../../lib/surface/point.ts";

describe("operators on points — oracle: the group law by methods", () => {
  const E = curve`y^2 + y = x^3 - x`;
  const P = E.point(0, 0);

  it("P + Q, P − Q, −P, 3·P and P·3 over Q", () => {
    const sum = add(P, P);
    expectTypeOf(sum).toEqualTypeOf<Point<Rational>>();
    expect(sum.equals(P.times(2))).toBe(true);
    expect(sub(P, sum).equals(P.neg())).toBe(true);
    expect(neg(P).equals(P.neg())).toBe(true);
    expect(mul(3, P).equals(mul(P, 3n))).toBe(true);
  });

  it("a point over Q plus one over R is a point over R", () => {
    const R = E.exponential("1/3");
    const sum = add(P, R);
    expectTypeOf(sum).toEqualTypeOf<Point<Real>>();
    expect(sum.curve.field.name).toBe("R");
  });
});
