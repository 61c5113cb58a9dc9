// Numbers built from radicals that are equal without looking so.
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { exact, rational, real } from "../../../lib/number/convert.ts";
import { cos, exp, ln, nthRoot, sqrt } from "../../../lib/number/functions.ts";
import { vanishes } from "../../../lib/number/origin.ts";
import { recognise } from "../../../lib/number/recognise.ts";
import { separation } from "../../../lib/number/separation.ts";
import { Complex, Real } from "../../../lib/number/values.ts";
import { UndecidedError } from "../../../lib/proof/errors.ts";

const cubeRoot = (x: Real | Rational) => nthRoot(x, 3) as Real;
type Rational = ReturnType<typeof rational>;
const a = sqrt(2).plus(sqrt(3));
const b = sqrt(real(5).plus(sqrt(6).times(2)));

describe("equal radicals", () => {
  it("√2 √3 = √6, √2 + √3 = √(5 + 2√6) — oracle: squares worked by hand", () => {
    expect(sqrt(2).times(sqrt(3)).equals(sqrt(6))).toBe(true);
    expect(a.equals(b)).toBe(true);
    expect([a.compare(b), a.minus(b).sign()]).toEqual([0, 0]);
    expect(`${a.minus(b)}`).toBe("0");
  });

  it("cube roots nest: ³√(³√2 − 1) = ³√(1/9) − ³√(2/9) + ³√(4/9) — oracle: Ramanujan's identity, cubed by hand", () => {
    const left = cubeRoot(cubeRoot(real(2)).minus(1));
    const right = cubeRoot(rational(1, 9))
      .minus(cubeRoot(rational(2, 9)))
      .plus(cubeRoot(rational(4, 9)));
    expect(left.equals(right)).toBe(true);
    expect(left.equals(right.plus(rational(1, 10n ** 200n)))).toBe(false);
  });

  it("complex roots: √(3 + 4i)·√(−3 + 4i) is not √−25 but 5i — oracle: arguments add up to less than π", () => {
    const product = Complex.from(sqrt(exact`3 + 4 i`)).times(sqrt(exact`-3 + 4 i`));
    expect(product.equals(exact`5 i`)).toBe(true);
    const root = Complex.from(sqrt(Complex.from(sqrt(exact`1 + i`))));
    expect(root.pow(4).equals(exact`1 + i`)).toBe(true);
  });

  it("tells numbers apart that are near: 10^-300, either side", () => {
    const near = b.plus(rational(1, 10n ** 300n));
    expect([a.equals(near), a.compare(near), near.compare(a)]).toEqual([false, -1, 1]);
  });

  it("a recognised number is proved, not conjectured — oracle: √2 √3 √6 = 6 by hand", () => {
    const found = recognise(sqrt(2).times(sqrt(3)).times(sqrt(6)).div(18))!;
    expect([`${found.value}`, found.standing.kind]).toEqual(["1/3", "proved"]);
    expect(recognise(exp(ln(real(3)).neg()))!.standing.kind).toBe("conjectured");
  });

  it("leaves other functions alone", () => {
    expect(vanishes(exp(ln(real(2))), undefined)).toBeUndefined();
    expect(() => exp(ln(real(2))).equals(2)).toThrow(UndecidedError);
    expect(separation(cos(real(1)), undefined, 1e6)).toBeUndefined();
  });
});

describe("the least size of a number that is not 0", () => {
  it("bounds every conjugate: a + b√2 + c√3 + d√6 — oracle: the norm, a whole number, as the product of the four conjugates", () => {
    const whole = fc.integer({ min: -50, max: 50 });
    fc.assert(
      fc.property(whole, whole, whole, whole, fc.integer({ min: 1, max: 9 }), (p, q, r, s, t) => {
        const value = real(p).plus(sqrt(2).times(q)).plus(sqrt(3).times(r)).plus(sqrt(6).times(s)).div(t);
        const bits = separation(value, undefined, 1e9)!;
        const zero = p === 0 && q === 0 && r === 0 && s === 0;
        expect(value.sign() === 0).toBe(zero);
        if (!zero) expect(Math.log2(Math.abs(value.toDouble()))).toBeGreaterThanOrEqual(-bits);
      }),
      { numRuns: 200, seed: 20261201 },
    );
  });

  it("is not waited for where it is far out", () => {
    const deep = Array.from({ length: 30 }).reduce<Real>((x) => real(2).plus(x).sqrt() as Real, Real.from(1));
    expect(separation(deep, undefined, 16384)).toBeUndefined();
  });
});
