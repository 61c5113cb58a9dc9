import { afterEach, describe, expect, it } from "vitest";
import * as ball from "../../../lib/number/ball.ts";
import { provedDigits } from "../../../lib/number/context.ts";
import { complex, enclose, real } from "../../../lib/number/convert.ts";
import * as disc from "../../../lib/number/disc.ts";
import {
  acos,
  acosh,
  arg,
  asinh,
  atan,
  atanh,
  conj,
  exp,
  ln,
  nthRoot,
  pow,
  sqrt,
} from "../../../lib/number/functions.ts";
import { i, π } from "../../../lib/number/symbols.ts";
import { type Complex, Real } from "../../../lib/number/values.ts";
import { BranchError, DomainError, PoleError } from "../../../lib/proof/errors.ts";

afterEach(() => {
  provedDigits(20);
});

const on = { cut: "continuous" } as const;
const above = enclose(complex("-4", "1e-7"), "1e-6");
const below = enclose(complex("-4", "-1e-7"), "1e-6");

describe("functions continued across their cut", () => {
  it("a measured number that meets the cut is refused, or continued from its midpoint — oracle: the values at ±0 by hand", () => {
    for (const f of [sqrt, ln, arg]) expect(() => f(above)).toThrow(BranchError);
    expect(() => pow(above, "1/3")).toThrow(BranchError);
    expect(() => nthRoot(above, 3)).toThrow(BranchError);
    expect(complex(sqrt(above, on)).contains(complex(0, 2))).toBe(true);
    expect(complex(sqrt(below, on)).contains(complex(0, -2))).toBe(true);
    expect(arg(above, on).contains(π)).toBe(true);
    expect(arg(below, on).contains(π.neg())).toBe(true);
    expect(ln(above, on).overlaps(complex(ln(4), π))).toBe(true);
    expect(pow(below, "1/3", on).overlaps(conj(pow(complex(-4), "1/3")))).toBe(true);
    expect(nthRoot(below, 3, on).overlaps(conj(nthRoot(complex(-4), 3)))).toBe(true);
  });

  it("what is clear of the cut is the principal value, with the option too", () => {
    expect(sqrt(complex(-4), on).toString()).toBe("2 i");
    expect(ln(complex(3, 4), on).equals(ln(complex(3, 4)))).toBe(true);
  });

  it("more digits are digits of the same branch, wherever rounding puts the midpoint — oracle: the first value", () => {
    // The imaginary part is 0, which no enclosure shows and no exact argument.
    const hidden = exp(ln(real(2))).minus(2);
    const z = complex(-4, hidden);
    expect(() => sqrt(z)).toThrow(BranchError);
    for (const f of [sqrt, ln] as const) {
      const w = f(z, on);
      for (const n of [40, 77, 120, 233, 300]) expect((w as Complex).digits(n).overlaps(w)).toBe(true);
    }
  });

  it("a side can be named: the branch comes from there whatever side the midpoint is on — oracle: e^ln, squares, a full turn", () => {
    const d = disc.fromBalls(ball.fromInt(-4), ball.fromDouble(2 ** -20));
    const turned = disc.ln(d, 80, { cut: "lower" });
    expect(disc.overlaps(disc.exp(turned, 80), d)).toBe(true);
    expect(ball.sign(disc.imag(turned))).toBe(-1);
    expect(disc.overlaps(disc.sqr(disc.sqrt(d, 80, { cut: "lower" }), 80), d)).toBe(true);
    expect(ball.sign(disc.imag(disc.sqrt(d, 80, { cut: "lower" })))).toBe(-1);
    expect(disc.ln(d, 80, { cut: "upper" })).toEqual(disc.ln(d, 80));
  });
});

describe("inverse hyperbolic functions and roots of complex numbers", () => {
  it("on the cut the value belongs to the upper side — oracle: acosh(−2) = ln(2 + √3) + πi, acosh(1/2) = iπ/3 by hand", () => {
    expect(acosh(complex(-2)).overlaps(complex(ln(sqrt(3).plus(2)), π))).toBe(true);
    expect(acosh(complex("1/2")).overlaps(π.div(3).times(i))).toBe(true);
    expect(() => acosh(enclose(complex("1/2", "1e-9"), "1e-6"))).toThrow(BranchError);
    expect(() => atanh(enclose(complex("2", "1e-9"), "1e-6"))).toThrow(BranchError);
  });

  it("asinh and atanh are atan and asin turned — oracle: identity asinh(iy) = i·asin y; tan", () => {
    expect(asinh(complex(0, "1/2")).overlaps(π.div(6).times(i))).toBe(true);
    expect(atanh(complex(0, "3/7")).overlaps(atan("3/7").times(i))).toBe(true);
    expect(acosh(complex("0.3", "0.4")).overlaps(acos(complex("0.3", "0.4")).times(i))).toBe(true);
  });

  it("real arguments stay real, and say where complex(x) helps", () => {
    for (const f of [asinh, acosh, atanh]) expect(f(f === atanh ? "1/3" : 3)).toBeInstanceOf(Real);
    expect(() => acosh("1/2")).toThrow(/acosh: a number below 1; expected a number >= 1. acosh\(complex\(x\)\)/);
    expect(() => atanh(2)).toThrow(DomainError);
    for (const x of [1, complex(1), complex(-1)]) expect(() => atanh(x)).toThrow(PoleError);
    expect(acosh(complex(1)).equals(0)).toBe(true);
  });

  it("the real cube root of −8 is −2, the principal one 1 + √3 i — oracle: by hand, and the third power", () => {
    expect(nthRoot(-8, 3).toString()).toBe("-2");
    expect(nthRoot(complex(-8), 3).overlaps(complex(1, sqrt(3)))).toBe(true);
    expect(
      complex(nthRoot(complex(2, 11), 3))
        .pow(3)
        .contains(complex(2, 11)),
    ).toBe(true);
    expect(nthRoot(complex(8), 3).equals(2)).toBe(true);
    expect(nthRoot("-27/8", 3).equals("-3/2")).toBe(true);
    expect(pow("27/8", "2/3").equals("9/4")).toBe(true);
    expect(() => nthRoot(complex(1, 1), 0)).toThrow(DomainError);
    expect(complex(exp(ln(complex(-3, 4)))).contains(real(-3).plus(complex(0, 4)))).toBe(true);
  });
});
