import fc from "fast-check";
import { describe, expect, it } from "vitest";
import * as ball from "../../../lib/number/ball.ts";
import { complex, enclose, exact, rational, real } from "../../../lib/number/convert.ts";
import * as disc from "../../../lib/number/disc.ts";
import { exp, ln, sqrt } from "../../../lib/number/functions.ts";
import { fromValueData, valueData } from "../../../lib/number/json.ts";
import { atPlaces, plainParts, rationalParts, significant, withRadius } from "../../../lib/number/print.ts";
import { Rational } from "../../../lib/number/rational.ts";
import { Complex, Real } from "../../../lib/number/values.ts";
import { DomainError } from "../../../lib/proof/errors.ts";
import { exact as exactPoint, pointed } from "./cases.ts";
import { pointedDisc } from "./disc-cases.ts";

describe("reading", () => {
  it("integers, decimals with exponents, fractions, i, roots — oracle: by hand", () => {
    const cases: readonly (readonly [string, string])[] = [
      ["3", "3"],
      ["-0.125", "-1/8"],
      ["1.5e-3", "3/2000"],
      ["22/7", "22/7"],
      [".5", "1/2"],
      ["1/2 + 3/4 i", "1/2 + 3/4 i"],
      ["0.41 + 0.27*i", "41/100 + 27/100 i"],
      ["(1+√5)/2", "1/2 + 1/2 √5"],
      ["√8", "2 √2"],
      ["√(-4)", "2 i"],
      ["√(-5)", "√(-5)"],
      ["sqrt(2)^3", "2 √2"],
      ["2**-3", "1/8"],
      ["-2^2", "-4"],
      ["2*-3", "-6"],
      ["3 i", "3 i"],
      ["−1/2", "-1/2"],
      ["(1+i)(1-i)", "2"],
      ["2√3", "2 √3"],
      ["√-5", "√(-5)"],
      ["√-4 + 1", "1 + 2 i"],
      ["\\sqrt{-5}", "√(-5)"],
      ["\\frac{1}{2} + \\frac3{4} i", "1/2 + 3/4 i"],
      ["2\\cdot\\left(1 + i\\right)^{2}", "4 i"],
    ];
    for (const [text, shown] of cases)
      expect(complex(text).toString()).toBe(
        shown.includes("√") && !shown.includes("(") ? complex(shown).toString() : shown,
      );
    expect(exact`(1+√5)/2`.toString()).toBe("1/2 + 1/2 √5");
    expect(exact`(1+√-163)/2`.toString()).toBe("1/2 + 1/2 √(-163)");
    expect(exact`\frac{1+\sqrt{5}}{2}`.toString()).toBe("1/2 + 1/2 √5");
    expect(exact`1/${rational("1/3")} + ${2} i`.toString()).toBe("3 + 2 i");
  });

  it("an inserted value is one bracketed factor", () => {
    expect(exact`2${exact`1 + i`}`.toString()).toBe("2 + 2 i");
    expect(exact`1/${exact`1 + i`}`.toString()).toBe("1/2 - 1/2 i");
  });

  it("measured numbers and digits that go on", () => {
    const x = real("1.25 ± 1e-6");
    expect(x.standing).toBe("measured");
    expect(x.contains("1.250001")).toBe(true);
    expect(x.contains("1.2500011")).toBe(false);
    expect(real("3.14...").contains("3.15")).toBe(true);
    expect(real("3.14...").contains("3.1501")).toBe(false);
    expect(real("2.5...e-10").contains("2.6e-10")).toBe(true);
    expect(complex("(1.25 + 0.5 i) ± 1e-6").contains(complex("1.2500005", "0.5000005"))).toBe(true);
  });

  it("refuses with the position of what does not fit", () => {
    const cases: readonly (readonly [string, RegExp])[] = [
      ["1.2.3", /position/],
      ["abc", /"a" at position 1 of "abc"/],
      ["2 + x", /"x" at position 5/],
      ["(1+2", /the end of/],
      ["1 +", /the end of/],
      ["", /the end of/],
      ["1/2i", /one reading/],
      ["3 4", /an operator between two numbers/],
      ["1 ± 2 ± 3", /one ±/],
      ["1 ± -2", /radius that is not negative/],
      ["√2 + √3", /one quadratic field/],
      ["2^(1/2)", /integer exponent/],
      ["1e9999999", /exponent/],
      ["\\frac12{3}", /expected braces/],
      ["\\sqrt12", /expected braces/],
    ];
    for (const [text, message] of cases) {
      expect(() => complex(text)).toThrow(DomainError);
      expect(() => complex(text)).toThrow(message);
    }
    expect(() => Rational.parse("1/x")).toThrow(/position 3/);
  });
});

const near = fc.integer({ min: -300, max: 300 });

function value(text: string): Rational {
  return Rational.parse(text);
}

function unit(places: number): Rational {
  return places >= 0 ? Rational.of(1n, 10n ** BigInt(places)) : Rational.of(10n ** BigInt(-places));
}

describe("printing", () => {
  it("a shown decimal is within one unit of its last place of every point of the ball — oracle: exact arithmetic", () => {
    fc.assert(
      fc.property(pointed(near), fc.integer({ min: 1, max: 60 }), ({ ball: x, point }, digits) => {
        const p = significant(x, digits);
        if (!p) return true;
        const shown = value(`${p.sign}${p.digits}e${p.exponent - p.digits.length + 1}`);
        const last = unit(p.digits.length - 1 - p.exponent);
        const off = exactPoint(point).minus(shown).abs();
        return p.ellipsis ? off.compare(last) <= 0 && p.digits.length >= digits : off.num === 0n;
      }),
      { numRuns: 2000, seed: 1 },
    );
  });

  it("enough digits always come: a ball of 40 spare bits shows them", () => {
    fc.assert(
      fc.property(fc.bigInt(1n, 2n ** 300n), near, fc.integer({ min: 1, max: 40 }), (man, exp, digits) => {
        const x = { man: man << 200n, exp, rad: 1.5 };
        return significant(x, digits) !== undefined;
      }),
      { numRuns: 1000, seed: 2 },
    );
  });

  it("decimals at a place, for parts of complex numbers — oracle: exact arithmetic", () => {
    fc.assert(
      fc.property(pointed(near), fc.integer({ min: -20, max: 60 }), ({ ball: x, point }, places) => {
        const p = atPlaces(x, places);
        if (!p) return true;
        const shown = value(`${p.sign}${p.digits}e${p.exponent - p.digits.length + 1}`);
        return exactPoint(point).minus(shown).abs().compare(unit(places)) <= 0;
      }),
      { numRuns: 1000, seed: 3 },
    );
  });

  it("what is printed with ± contains the ball, and reads back so", () => {
    fc.assert(
      fc.property(pointed(near), ({ ball: x }) => ball.contains(real(plainParts(withRadius(x))).ball, x)),
      { numRuns: 2000, seed: 4 },
    );
  });

  it("what is printed of a defined or exact number reads back as an enclosure of it", () => {
    for (const x of [
      sqrt(2),
      exp(50),
      exp(-50),
      real("1e-30").times(sqrt(3)),
      real("22/7"),
      real("1e40"),
      sqrt("1e41"),
    ]) {
      expect(real(x.toString()).overlaps(x.digits(40))).toBe(true);
    }
    const z = complex("1/3", "-2/7").sqrt();
    expect(complex(z.toString()).contains(z.digits(40))).toBe(true);
  });

  it("complex enclosures read back as they are printed", () => {
    fc.assert(
      fc.property(pointedDisc(near), ({ disc: d }) => {
        const z = new Complex(d, { standing: "measured" });
        return disc.contains(complex(z.toString()).disc, d);
      }),
      { numRuns: 1000, seed: 6 },
    );
  });

  it("rationals: the cut decimal, ended where it ends — oracle: by hand", () => {
    expect(plainParts(rationalParts(Rational.of(1, 3), 5))).toBe("0.33333...");
    expect(plainParts(rationalParts(Rational.of(-2, 3), 3))).toBe("-0.666...");
    expect(plainParts(rationalParts(Rational.of(1, 8), 10))).toBe("0.125");
    expect(plainParts(rationalParts(Rational.of(1, 7_000_000_000), 4))).toBe("1.428...e-10");
    expect(plainParts(rationalParts(Rational.of(123456), 3))).toBe("1.23...e5");
  });

  it("huge and tiny numbers go through logarithms — oracle: e^(10^9) by mpmath", () => {
    expect(exp("1e9").digits(20).toString()).toBe("8.0029817706609725330...e434294481");
    expect(exp("-1e9").digits(10).toString()).toMatch(/^1\.249534271\.\.\.e-434294482$/);
  });

  it("a value that cannot be told from 0 is shown by its bound", () => {
    const hidden = exp(ln(real(2))).minus(2);
    expect(hidden.toString()).toMatch(/^0 ± [\d.]+e-1\d\d\d$/);
  });
});

describe("values as data", () => {
  it("every number is a string, and what comes back contains what went in", () => {
    fc.assert(
      fc.property(pointed(near), pointedDisc(near), ({ ball: x }, { disc: d }) => {
        const a = new Real(x, { standing: "measured" });
        const b = new Complex(d, { standing: "measured" });
        const texts = [valueData(a), valueData(b)].flatMap((data) => Object.values(data));
        expect(texts.every((t) => typeof t === "string")).toBe(true);
        expect(ball.contains((fromValueData(valueData(a)) as Real).ball, x)).toBe(true);
        expect(disc.contains((fromValueData(valueData(b)) as Complex).disc, d)).toBe(true);
      }),
      { numRuns: 500, seed: 8 },
    );
  });

  it("exact values come back exactly; other data is refused", () => {
    for (const x of [rational("22/7"), exact`(1+√5)/2`, exact`1/2 - i`]) expect(fromValueData(valueData(x))).toEqual(x);
    expect(valueData(real("0.1"))).toEqual({ kind: "rational", value: "1/10" });
    expect(valueData(enclose("1.25", "1e-6"))).toMatchObject({ kind: "real", standing: "measured" });
    expect(JSON.parse(JSON.stringify({ x: sqrt(2), q: rational("1/2") }))).toEqual({
      x: valueData(sqrt(2)),
      q: valueData(rational("1/2")),
    });
    expect(() => fromValueData({ kind: "other" } as never)).toThrow(DomainError);
  });
});
