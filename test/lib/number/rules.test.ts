// The rules of rigour, one by one: each test fails when its rule is broken.
import fc from "fast-check";
import { afterEach, describe, expect, it } from "vitest";
import * as ball from "../../../lib/number/ball.ts";
import { provedDigits } from "../../../lib/number/context.ts";
import { complex, enclose, real } from "../../../lib/number/convert.ts";
import * as disc from "../../../lib/number/disc.ts";
import { size, sizePower } from "../../../lib/number/fixed/bits.ts";
import { agm, exp, ln, sin, sqrt } from "../../../lib/number/functions.ts";
import { decide, LADDER } from "../../../lib/number/ladder.ts";
import { Rational } from "../../../lib/number/rational.ts";
import { i, π } from "../../../lib/number/symbols.ts";
import { Complex, Real } from "../../../lib/number/values.ts";
import { BranchError, DomainError, PrecisionError, UndecidedError } from "../../../lib/proof/errors.ts";

afterEach(() => {
  provedDigits(20);
});

describe("radii", () => {
  it("a radius is 0 or at least 1, also where an error bound came out smaller — oracle: the definition", () => {
    expect(ball.finish(12345n, 0, 0.001, 53).rad).toBe(1);
    expect(ball.finish(12345n, 0, 0, 53).rad).toBe(0);
  });

  it("an error bound that is NaN or infinite is refused, not stored", () => {
    expect(() => ball.finish(1n, 0, Number.NaN, 53)).toThrow(DomainError);
    expect(() => ball.finish(1n, 0, Infinity, 53)).toThrow(DomainError);
  });

  it("the size of a BigInt that Number() rounds down is still an upper bound — oracle: exact comparison", () => {
    for (const n of [2n ** 53n + 1n, 2n ** 100n + 1n, 2n ** 500n + 3n, 2n ** 3000n + 1n]) {
      const d = size(n, 2000);
      const bound = Rational.of(BigInt(d * 2 ** 60))
        .times(Rational.of(2n ** BigInt(sizePower())))
        .div(2n ** 60n);
      expect(bound.compare(n)).toBe(1);
    }
  });

  it("cutting a negative mantissa goes down and is counted — oracle: exact comparison", () => {
    const x = ball.finish(-(2n ** 100n) - 1n, 0, 0, 53);
    expect(ball.contains(x, Rational.of(-(2n ** 100n) - 1n))).toBe(true);
    expect(x.rad).toBe(1);
  });

  it("a radius above 2^30 ulps drops mantissa bits", () => {
    const x = ball.finish(2n ** 200n + 12345n, 0, 2 ** 100, 300);
    expect(x.rad).toBeLessThanOrEqual(2 ** 30 + 2);
    expect(x.exp).toBeGreaterThanOrEqual(70);
    expect(ball.contains(x, Rational.of(2n ** 200n + 12345n + 2n ** 100n))).toBe(true);
  });

  it("an exponent gap beyond the precision goes into the radius, not into the mantissa", () => {
    const tiny = { man: 1n, exp: -1_000_000_000, rad: 0 };
    const x = ball.add(ball.fromRational(Rational.of(1n, 3n), 64), tiny, 64);
    expect(x.man.toString(2).length).toBeLessThan(140);
    expect(x.rad).toBeGreaterThanOrEqual(1);
  });

  it("an exponent that overflows is an error with fields, not a wrong number", () => {
    expect(() => ball.mul({ man: 1n, exp: 2 ** 44, rad: 0 }, { man: 3n, exp: 2 ** 45 - 1, rad: 0 }, 53)).toThrow(
      DomainError,
    );
    expect(() => exp("1e20")).toThrow(expect.objectContaining({ subject: "exp" }));
  });
});

describe("zeros and axes", () => {
  it("a value that is 0 by symmetry is exactly 0", () => {
    expect(ball.sin(ball.zero, 53)).toEqual(ball.zero);
    expect(ball.ln(ball.one, 53)).toEqual(ball.zero);
    expect(sin(0).exact).toEqual(Rational.zero);
  });

  it("products, quotients and squares keep the axis exactly", () => {
    const x = disc.fromBall(ball.pi(64));
    const y = disc.imaginary(ball.pi(64));
    expect(disc.mul(x, x, 64).axis).toBe("real");
    expect(disc.mul(x, y, 64).axis).toBe("imaginary");
    expect(disc.mul(y, y, 64).axis).toBe("real");
    expect(disc.div(x, y, 64).axis).toBe("imaginary");
    expect(disc.add(x, y, 64).axis).toBe("plane");
    expect(disc.mul(x, disc.zero, 64)).toEqual(disc.zero);
  });

  it("a hidden zero ends in PrecisionError that says how near, at the cap of bits", () => {
    const hidden = exp(ln(real(2))).minus(2);
    expect(() => hidden.digits(30)).toThrow(PrecisionError);
    expect(() => hidden.digits(30)).toThrow(/cannot be told from 0 at 10\^-1\d\d\d/);
  });

  it("1 − k² of a pendulum swung to π − 10^-20 keeps its digits — oracle: sin²(5·10^-21) by hand", () => {
    const k = sin(π.minus("1e-20").div(2));
    // sin²t = t² − t⁴/3 + ..., t = 5e-21: 2.5e-41·(1 − 8.33e-42)
    expect(real(1).minus(k.pow(2)).digits(60).toString()).toBe(`2.4${"9".repeat(39)}7916666666666666666...e-41`);
  });
});

describe("cuts", () => {
  it("a real argument never becomes a disc: ln and sqrt of a Real are Real", () => {
    expect(ln(2)).toBeInstanceOf(Real);
    expect(sqrt("1/3")).toBeInstanceOf(Real);
    expect(ln(complex(-1))).toBeInstanceOf(Complex);
  });

  it("the negative real axis belongs to the upper side, for exactly real numbers", () => {
    expect(complex(-4).sqrt().toString()).toBe("2 i");
    expect(ln(complex(-1)).toString()).toBe("3.1415926535897932384... i");
    expect(disc.arg(disc.fromBall(ball.fromInt(-1)), 64)).toEqual(ball.pi(64));
  });

  it("a disc that meets the cut throws, and continues from its midpoint if asked", () => {
    const d = disc.widenBy(
      disc.fromBalls(ball.fromInt(-4), ball.fromDouble(2 ** -20)),
      ball.fromDouble(2 ** -10),
      64,
      false,
    );
    for (const f of [disc.sqrt, disc.ln]) expect(() => f(d, 64)).toThrow(BranchError);
    expect(() => disc.arg(d, 64)).toThrow(BranchError);
    const root = disc.sqrt(d, 64, { cut: "continuous" });
    expect(ball.toDouble(disc.imag(root))).toBeCloseTo(2, 3);
    expect(disc.contains(root, disc.fromBalls(ball.fromDouble(0), ball.fromInt(2)))).toBe(true);
    expect(ball.toDouble(disc.arg(d, 64, { cut: "continuous" }))).toBeCloseTo(Math.PI, 3);
  });

  it("a disc that holds 0 has no root, logarithm or argument, even continued", () => {
    const d = disc.widenBy(
      disc.fromBalls(ball.fromDouble(2 ** -20), ball.fromDouble(2 ** -20)),
      ball.fromDouble(2 ** -10),
      64,
      false,
    );
    for (const f of [disc.sqrt, disc.ln, disc.arg]) expect(() => f(d, 64, { cut: "continuous" })).toThrow(BranchError);
  });

  it("an enclosure of both signs is refused by real ln and sqrt, a negative one by DomainError", () => {
    const both = enclose("0", "1e-3");
    expect(() => ln(both)).toThrow(BranchError);
    expect(() => sqrt(both)).toThrow(BranchError);
    expect(() => sqrt(enclose("-1", "1e-3"))).toThrow(DomainError);
  });

  it("a straddle by rounding alone is cured through the origin", () => {
    provedDigits(15);
    const small = sqrt(2)
      .plus(1)
      .minus(
        sqrt("3.0000000000000000000000000000000000000000001")
          .plus(sqrt(2).minus(sqrt(3)))
          .plus(1),
      );
    // small is −1e-43/(2√3), about −2.9e-44: its negative has a logarithm.
    expect(ln(small.neg()).digits(5).toString()).toBe("-100.25...");
  });
});

describe("complex arithmetic-geometric mean", () => {
  it("agm(1, −2): the tie |a − b| = |a + b| takes Im(b'/a') > 0 — oracle: the step by hand", () => {
    // a' = −1/2 and b' = ∓i√2; b'/a' has positive imaginary part for b' = −i√2.
    const byHand = agm(complex("-1/2"), sqrt(2).times(i).neg());
    expect(agm(complex(1), complex(-2)).overlaps(byHand)).toBe(true);
  });

  it("opposite numbers have mean 0, and 0 stays 0", () => {
    expect(disc.agm(disc.i, disc.neg(disc.i), 64)).toEqual(disc.zero);
    expect(disc.agm(disc.i, disc.zero, 64)).toEqual(disc.zero);
  });

  it("enclosures that leave the root open are refused", () => {
    const wide = disc.widenBy(
      disc.fromBalls(ball.fromInt(-2), ball.fromDouble(2 ** -30)),
      ball.fromDouble(2 ** -20),
      64,
      false,
    );
    expect(() => disc.agm(disc.one, wide, 64)).toThrow(BranchError);
  });

  it("is homogeneous and symmetric — oracle: identity", () => {
    fc.assert(
      fc.property(fc.integer({ min: -50, max: 50 }), fc.integer({ min: 1, max: 50 }), (a, b) => {
        const z = complex(a, b);
        const w = complex(b + 1, a);
        const m = agm(z, w);
        expect(m.overlaps(agm(w, z))).toBe(true);
        expect(agm(z.times(complex(2, 3)), w.times(complex(2, 3))).overlaps(m.times(complex(2, 3)))).toBe(true);
        return true;
      }),
      { numRuns: 100, seed: 3 },
    );
  });
});

describe("decisions", () => {
  it("climb their own ladder, whatever the digits on display", () => {
    const tried: number[][] = [];
    for (const digits of [1, 500]) {
      provedDigits(digits);
      const seen: number[] = [];
      decide("test", (prec) => {
        seen.push(prec);
        return prec >= 512 ? true : undefined;
      });
      tried.push(seen);
    }
    expect(tried).toEqual([
      [64, 128, 256, 512],
      [64, 128, 256, 512],
    ]);
    expect(LADDER.at(-1)).toBe(16384);
  });

  it("end in UndecidedError that shows the evidence and the precision tried; errors that more bits may cure count as no answer", () => {
    const never = (): undefined => {
      throw new BranchError({ subject: "x", given: "a straddle", expected: "none" });
    };
    expect(() => decide("root order", never)).toThrow(UndecidedError);
    expect(() => decide("root order", never)).toThrow(/root order: a straddle, tried up to 16384 bits/);
    expect(() =>
      decide("other", () => {
        throw new RangeError("bug");
      }),
    ).toThrow(RangeError);
  });

  it("a comparison of equal numbers that no exact argument settles shows both sides", () => {
    const a = exp(ln(real("98/10")));
    const b = real("98/10");
    expect(a.compare(b)).toBeUndefined();
    expect(() => a.equals(b)).toThrow(UndecidedError);
    expect(() => a.equals(b)).toThrow(/9\.7999.* ± .* = 49\/5 stays open after working with 4096 bits/);
    expect(() => a.lessThan(b)).toThrow(UndecidedError);
  });
});
