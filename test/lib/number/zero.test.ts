import { describe, expect, it } from "vitest";
import * as h from "../../../lib/index.ts";
import * as ball from "../../../lib/number/ball.ts";
import { recordOn, slopeOn } from "../../../lib/number/recorded.ts";
import { DomainError, UndecidedError } from "../../../lib/proof/errors.ts";

const { cos, enclose, exp, lattice, ln, real, sin, sqrt, tan, zero } = h;

describe("the zero of a function", () => {
  // OEIS A003957 (the fixed point of the cosine), A115365 (the first positive zero of tan x = x), A030178 (the omega constant).
  it.each([
    ["cos x = x", "0.73908513321516064165531208767387340401", (x: h.Real) => cos(x).minus(x), "0", "1"],
    ["tan x = x", "4.4934094579090641753078809272803220822", (x: h.Real) => tan(x).minus(x), "4", "4.7"],
    ["x eˣ = 1", "0.56714329040978387299996866221035554975", (x: h.Real) => x.times(exp(x)).minus(1), "0", "1"],
  ])("%s — oracle: published digits (OEIS)", (_name, digits, f, low, high) => {
    const root = zero(f, { between: [low, high] }).digits(36);
    expect(root.contains(real(digits)) || root.overlaps(enclose(digits, "1e-37"))).toBe(true);
    expect(String(root).startsWith(digits.slice(0, 34))).toBe(true);
  });

  it("is exact where it is a short rational number — oracle: f there is exactly 0", () => {
    expect(zero((x) => x.pow(2).minus(4), { between: [1, 3] }).exact?.toString()).toBe("2");
    expect(zero((x) => x.pow(2).minus(4), { between: [-3, "-0.1"] }).exact?.toString()).toBe("-2");
    expect(zero((x) => x.times(7).minus(3), { between: [0, 1] }).exact?.toString()).toBe("3/7");
    expect(zero((x) => sin(x), { between: [-1, 1] }).exact?.toString()).toBe("0");
    expect(zero((x) => x.minus(2), { between: [2, 3] }).exact?.toString()).toBe("2");
  });

  it("takes more digits later — oracle: the square root", () => {
    const root = zero((x) => x.pow(2).minus(2), { between: [1, 2] });
    expect(root.digits(300).minus(sqrt(2).digits(300)).abs().lessThan(real("1e-299"))).toBe(true);
  });

  it("keeps a measured input measured — oracle: √2 of the interval", () => {
    const root = zero((x) => x.pow(2).minus(enclose("2", "1e-10")), { between: [1, 2] });
    expect(root.standing).toBe("measured");
    expect(root.inputs).toEqual(["2 ± 1e-10"]);
    expect(root.contains(sqrt(2))).toBe(true);
    expect(ball.toDouble(ball.radius(root.ball))).toBeLessThan(1e-10);
  });

  it("knows ℘, ζ and functions made of ℘ and ℘′ — oracle: the value at the zero is the one asked for", () => {
    const L = lattice({ invariants: [4, 1] });
    const half = L.halfPeriods[0].re;
    const x = zero((t) => (L.wp(t) as h.Real).minus(3), { between: ["0.1", 1] });
    expect((L.wp(x) as h.Real).minus(3).abs().lessThan(real("1e-15"))).toBe(true);
    const third = zero((t) => L.wp.prime(t) as h.Real, { between: [1, "1.9"] });
    expect(third.minus(half).abs().lessThan(real("1e-15"))).toBe(true);
    const f = L.wp.pow(2).plus(L.wp.prime.times(3));
    const y = zero((t) => f(t) as h.Real, { between: [1, "1.3"] });
    expect(Math.abs((f(y) as h.Real).toDouble())).toBeLessThan(1e-15);
  });

  it.each<[string, (x: h.Real) => h.Real, number, number, string]>([
    ["two zeros", (x) => x.pow(2).minus(4), -3, 3, "2 zeros between -3 and 3, at -2, 2"],
    ["none", (x) => x.pow(2).plus(4), -3, 3, "no zero between -3 and 3"],
    ["the ends swapped", (x) => x, 3, -3, "the smaller number first"],
    ["a look at one number of the interval", (x) => real(x.toDouble()).minus(2), 1, 9, "asks x for its toDouble()"],
    ["a midpoint taken for x", (x) => x.midpoint.minus(2), 1, 9, "asks x for its midpoint"],
    ["an unknown derivative", (x) => h.agm(x, 1).minus(2) as h.Real, 1, 9, "uses agm of x"],
  ])("%s is refused — oracle: the message names what is wrong", (_name, f, low, high, message) => {
    const attempt = () => zero(f, { between: [low, high] });
    expect(attempt).toThrow(DomainError);
    expect(attempt).toThrow(message);
  });

  it("a chain longer than its record is refused, not believed — oracle: 301 operations in a row", () => {
    const long = (x: h.Real) => {
      let sum = x;
      for (let k = 0; k < 300; k++) sum = sum.plus(x);
      return sum.minus(1);
    };
    expect(() => zero(long, { between: [-1, 1] })).toThrow("more than 256 operations");
  });

  it.each<[string, (x: h.Real) => h.Real, number, number]>([
    ["a double zero", (x) => x.pow(2).minus(4).pow(2), 1, 3],
    ["a pole with a change of sign", (x) => tan(x).minus(x), 4, 5],
  ])("%s stays undecided — oracle: no sign of f or f′ tells it", (_name, f, low, high) => {
    expect(() => zero(f, { between: [low, high] })).toThrow(UndecidedError);
  });
});

describe("the derivative of a record", () => {
  it.each<[string, (x: h.Real) => h.Real | h.Complex]>([
    ["quotient", (x) => x.pow(3).minus(x).div(x.pow(2).plus(1))],
    ["negative power", (x) => x.pow(-3)],
    ["sqrt", (x) => sqrt(x)],
    ["exp", (x) => exp(x)],
    ["ln", (x) => ln(x)],
    ["sin cos tan", (x) => sin(x).times(cos(x)).plus(tan(x))],
    ["sinh cosh tanh", (x) => h.sinh(x).times(h.cosh(x)).plus(h.tanh(x))],
    ["asin acos atan", (x) => h.asin(x).plus(h.acos(x).times(h.atan(x)))],
    ["asinh acosh atanh", (x) => h.asinh(x).plus(h.acosh(x.plus(1)).times(h.atanh(x)))],
    ["general power", (x) => h.pow(x, x.plus(2))],
    ["nth root", (x) => h.nthRoot(x, 5)],
    ["atan2", (x) => h.atan2(x.pow(2), x.plus(1))],
    ["real part of a complex product", (x) => h.complex(x, x.pow(2)).times(h.i.plus(x)).re],
    ["conjugate and imaginary part", (x) => (exp(h.complex(x, x.pow(2)).conj()) as h.Complex).im],
  ])("%s — oracle: the mean value theorem, the difference quotient is a value of the derivative", (_name, f) => {
    const [low, high] = [real("0.4"), real("0.40625")];
    const range = ball.hull(low.ball, high.ball, 80);
    const slope = slopeOn(recordOn(f, range), range, 80);
    const rise = (f(high) as h.Real).minus(f(low) as h.Real);
    const quotient = rise.div(high.minus(low));
    expect(ball.overlaps(slope, quotient.ball)).toBe(true);
    // Sharp enough to say something: 15 % of the slope around the quotient.
    const width = ball.toDouble(ball.radius(slope));
    expect(width).toBeLessThan(0.15 * Math.abs(quotient.toDouble()) + 0.15);
  });
});
