import { Complex as Complexjs } from "complex.js";
import { Decimal } from "decimal.js";
import { Fraction } from "fraction.js";
import { afterEach, describe, expect, it } from "vitest";
import { provedDigits, workingPrecision } from "../../../lib/number/context.ts";
import { complex, enclose, exact, rational, real } from "../../../lib/number/convert.ts";
import * as functions from "../../../lib/number/functions.ts";
import { agm, atDigits, cos, exp, gamma, ln, pow, sin, sqrt } from "../../../lib/number/functions.ts";
import { operate, operatePower } from "../../../lib/number/operate.ts";
import { DEEPEST } from "../../../lib/number/origin.ts";
import { Quadratic, quadratic } from "../../../lib/number/quadratic.ts";
import { Rational } from "../../../lib/number/rational.ts";
import { eulerGamma, i, π } from "../../../lib/number/symbols.ts";
import type { Real } from "../../../lib/number/values.ts";
import { DomainError, PoleError, PrecisionError, UndecidedError } from "../../../lib/proof/errors.ts";

afterEach(() => {
  provedDigits(20);
});

describe("exact, defined, measured, double", () => {
  it("exact stays exact through field operations, integer powers and roots of squares", () => {
    expect(real("0.1").plus("0.2").toString()).toBe("3/10");
    expect(real("4/9").sqrt().toString()).toBe("2/3");
    expect(real(2).sqrt().pow(2).toString()).toBe("2");
    expect(complex("1/2", "3/4").times(i).toString()).toBe("-3/4 + 1/2 i");
    expect(complex(3, 4).abs().toString()).toBe("5");
    expect(operatePower(exact`(1+√5)/2`, 10).toString()).toBe("123/2 + 55/2 √5");
    expect(real("1/3").standing).toBe("exact");
  });

  it("an iteration that doubles exact numbers goes on as an enclosure", () => {
    let x = real("1/3");
    for (let k = 0; k < 60; k++) x = x.times(x).minus("7/5");
    expect(x.standing).toBe("defined");
    expect(x.digits(30).toString()).toMatch(/^-?\d\.\d{20,}.*\.\.\./);
  });

  it("defined values show the digits asked for and give more later — oracle: published decimals of √2, π, e", () => {
    expect(sqrt(2).toString()).toBe("1.4142135623730950488...");
    expect(sqrt(2).digits(60).toString()).toBe("1.41421356237309504880168872420969807856967187537694807317667...");
    provedDigits(40);
    expect(π.toString()).toBe("3.141592653589793238462643383279502884197...");
    expect(exp(1).toString()).toBe("2.718281828459045235360287471352662497757...");
    expect(eulerGamma.toString()).toBe("0.5772156649015328606065120900824024310421...");
  });

  it("a constant follows the context: digits asked for later are there", () => {
    const before = workingPrecision();
    provedDigits(100);
    expect(workingPrecision()).toBeGreaterThan(before);
    const twice = π.plus(π);
    provedDigits(20);
    expect(twice.digits(100).toString()).toContain(
      "6.283185307179586476925286766559005768394338798750211641949889184615632812572417997256069650684234135",
    );
  });

  it("a measured value comes back as sharp as its input allows, and names it", () => {
    const x = enclose("1.25", "1e-6").times(sqrt(2));
    expect(x.standing).toBe("measured");
    expect(x.inputs).toEqual(["1.25 ± 1e-6"]);
    expect(x.digits(100).toString()).toBe("1.7677670 ± 1.5e-6");
    expect(x.digits(100).contains(real("1.25").times(sqrt(2)))).toBe(true);
  });

  it("a plain number that is no safe integer is right to half an ulp by assumption, and caps what is built on it", () => {
    const x = real(0.1);
    expect(x.standing).toBe("double");
    expect(x.contains("0.1")).toBe(true);
    expect(x.contains("0.10000000000000002")).toBe(false);
    expect(x.plus(enclose("1", "1e-3")).standing).toBe("double");
    expect(enclose(0.1).standing).toBe("measured");
    expect(enclose(0.1).toString()).toBe("0.1000000000000000056 ± 7e-18");
    expect(real(enclose(0.1).toString()).contains(0.1)).toBe(true);
    expect(real(3).standing).toBe("exact");
    expect(real(2 ** 60).standing).toBe("double");
  });

  it("a chain deeper than the cap is what it is; one below gives digits", () => {
    const chain = (n: number): Real => {
      let x: Real = π;
      for (let k = 0; k < n; k++) x = x.plus(1).div(2) as Real;
      return x;
    };
    expect(chain(60).digits(100).toString().length).toBeGreaterThan(100);
    const deep = chain(DEEPEST);
    expect(deep.toString()).toBe("1.0000000000000000000...");
    expect(() => deep.digits(100)).toThrow(PrecisionError);
  });

  it("a DAG with shared nodes is computed once a node: 2^40 paths end at once", () => {
    let x: Real = sqrt(2);
    for (let k = 0; k < 40; k++) x = x.plus(x).div(2) as Real;
    expect(x.digits(50).toString()).toBe(sqrt(2).digits(50).toString());
  });
});

describe("atDigits", () => {
  it("reruns until its result has the digits — oracle: the same number by another road", () => {
    // √(10^30 + 1) − 10^15 = 1/(√(10^30 + 1) + 10^15)
    const big = real(10).pow(30).plus(1);
    const x = atDigits(50, () => sqrt(big).minus("1e15"));
    const y = real(1).div(sqrt(big).plus("1e15")).digits(50);
    expect(x.toString()).toBe(y.toString());
  });

  it("serves arrays, gives measured results as they are, and leaves the context alone", () => {
    const [s, c] = atDigits(30, () => [sin(1), cos(1)] as const);
    expect(s.toString()).toBe("0.841470984807896506652502321630...");
    expect(c.toString()).toBe("0.540302305868139717400936607442...");
    expect(atDigits(30, () => enclose("1", "1e-3").plus(π)).standing).toBe("measured");
    expect(provedDigits()).toBe(20);
    expect(() =>
      atDigits(3, () => {
        throw new RangeError("mine");
      }),
    ).toThrow(RangeError);
    expect(provedDigits()).toBe(20);
  });

  it("ends in PrecisionError for a hidden zero", () => {
    expect(() => atDigits(5, () => exp(ln(real(2))).minus(2))).toThrow(PrecisionError);
  });
});

describe("scalars of other libraries", () => {
  it("Decimal, Fraction and complex.js values are read exactly where they are exact", () => {
    expect(real(new Decimal("0.1")).toString()).toBe("1/10");
    expect(real(new Fraction("22/7")).toString()).toBe("22/7");
    expect(complex(new Complexjs(3, -4)).toString()).toBe("3 - 4 i");
    expect(complex(new Complexjs(0.5, 1)).standing).toBe("double");
    expect(sqrt(2).plus(new Decimal(1)).toString()).toBe("2.4142135623730950488...");
  });

  it("NaN, infinities and things that are no number are refused", () => {
    for (const bad of [Number.NaN, Infinity, new Decimal("NaN"), new Decimal(-Infinity)])
      expect(() => real(bad)).toThrow(DomainError);
    for (const bad of [null, undefined, {}, [], true, Symbol("x")]) expect(() => real(bad as never)).toThrow(TypeError);
    expect(() => real(complex(1, 1) as never)).toThrow(TypeError);
  });
});

describe("comparison", () => {
  it("equals says yes by an exact argument or the same construction, no by enclosures", () => {
    expect(real("0.5").equals("1/2")).toBe(true);
    expect(sqrt(8).equals(sqrt(2).times(2))).toBe(true);
    expect(sin(sqrt(2)).equals(sin(sqrt(2)))).toBe(true);
    expect(exp(1).equals("2.718281828459045235360287471352662497757247093699959574966967627724")).toBe(false);
    expect(complex(1, 2).equals(complex(1, 3))).toBe(false);
    expect(() => enclose("1", "1e-3").equals(1)).toThrow(UndecidedError);
  });

  it("sign and order refine as far as needed", () => {
    expect(
      exp(π.times(sqrt(163)))
        .minus("262537412640768744")
        .sign(),
    ).toBe(-1);
    expect(
      sqrt(2).lessThan(
        "1.41421356237309504880168872420969807856967187537694807317667973799073247846210703885038753432764157273",
      ),
    ).toBe(
      sqrt(2).compare(
        "1.41421356237309504880168872420969807856967187537694807317667973799073247846210703885038753432764157273",
      ) === -1,
    );
    const long = (n: bigint): Real => real(Rational.of(n, 7n ** 8_000n));
    expect(long(3n ** 15_000n).compare(long(3n ** 15_000n))).toBe(0);
    expect(long(3n ** 15_000n).compare(long(3n ** 15_000n + 1n))).toBe(-1);
    expect(long(3n ** 15_000n).equals(long(3n ** 15_000n + 1n))).toBe(false);
    expect(quadratic(2).sign()).toBe(1);
    expect(Quadratic.of(3, -2, 2).sign()).toBe(1);
    expect(Quadratic.of(-3, 2, 2).sign()).toBe(-1);
    expect(Quadratic.of(1, -1, 2).sign()).toBe(-1);
  });

  it("floor is an integer or unknown", () => {
    expect(exp(10).floor()).toBe(22026n);
    expect(real("-7/2").floor()).toBe(-4n);
    expect(enclose("3", "1e-9").floor()).toBeUndefined();
  });
});

describe("refusals", () => {
  it("division by 0 and by what may be 0, exactly and not", () => {
    expect(() => real(1).div(0)).toThrow(PoleError);
    expect(() => real(1).div(enclose("0", "1e-5"))).toThrow(PoleError);
    expect(() => rational("1/0")).toThrow(PoleError);
    expect(() => complex(1, 1).div(complex(0, 0))).toThrow(PoleError);
  });

  it("provedDigits takes 1 to a million, and keeps the old setting else", () => {
    for (const n of [0, -1, 1.5, 1e9, Number.NaN]) expect(() => provedDigits(n)).toThrow(DomainError);
    expect(provedDigits()).toBe(20);
    expect(() => sqrt(2).digits(0)).toThrow(DomainError);
  });

  it("conversion to a plain number is refused, text is not", () => {
    for (const x of [π, i, rational("1/3"), quadratic(5)]) {
      expect(() => Number(x)).toThrow(TypeError);
      expect(() => (x as unknown as number) + 1).toThrow(/use its methods/);
      expect(`${x}`).toBe(x.toString());
    }
  });

  it("Γ at a pole and at an inexact argument", () => {
    expect(() => gamma(0)).toThrow(PoleError);
    expect(() => gamma(-3)).toThrow(PoleError);
    expect(() => gamma(π)).toThrow(DomainError);
    expect(gamma(11).toString()).toBe("3628800");
  });
});

describe("operators on scalars", () => {
  it("join the kinds: rational, quadratic, real, complex", () => {
    expect(operate("plus", rational("1/2"), rational("1/3"))).toEqual(Rational.of(5, 6));
    expect(operate("times", rational("3/7"), π).toString()).toBe("1.3463968515384828164...");
    expect(operate("plus", rational("0.41"), operate("times", rational("0.27"), i)).toString()).toBe(
      "41/100 + 27/100 i",
    );
    expect(operate("plus", quadratic(2), quadratic(3)).toString()).toBe("3.1462643699419723423...");
    expect(pow(2, "1/2").toString()).toBe("1.4142135623730950488...");
  });

  it("identities — oracle: Lemniscate constant π/agm(1, √2), Γ(1/4)²/(2√(2π)); e^(iπ) = −1", () => {
    expect(
      π.div(agm(1, sqrt(2))).overlaps(
        gamma("1/4")
          .pow(2)
          .div(sqrt(π.times(2)).times(2)),
      ),
    ).toBe(true);
    expect(π.div(agm(1, sqrt(2))).toString()).toBe("2.6220575542921198104...");
    expect(exp(i.times(π)).overlaps(-1)).toBe(true);
    expect(ln(exp(3)).contains(3)).toBe(true);
  });
});

describe("functions as methods", () => {
  const names = [
    "exp",
    "ln",
    "sin",
    "cos",
    "tan",
    "asin",
    "acos",
    "atan",
    "sinh",
    "cosh",
    "tanh",
    "asinh",
    "atanh",
  ] as const;

  const FUNCTIONS = { ...functions };

  it.each(names)("x.%s() is the function of x, real and complex — oracle: the same construction", (name) => {
    for (const x of [sqrt("1/3"), complex(sqrt("1/3"), "1/7")]) {
      const y = x[name]();
      expect(y.equals(FUNCTIONS[name](x))).toBe(true);
      expect(y.origin?.operation.name).toBe(name);
    }
  });

  it("acosh begins at 1; exact values stay exact", () => {
    expect(real(2).acosh().toString()).toBe(functions.acosh(2).toString());
    expect(real(0).cos().exact?.equals(1)).toBe(true);
    expect(() => real("1/2").acosh()).toThrow(DomainError);
  });
});

describe("the record of a sum or product", () => {
  it("is made when it is read, once, with its operands", () => {
    const x = sqrt(2);
    const y = sqrt(3);
    const z = x.plus(y).times(x);
    expect(z.origin).toBe(z.origin);
    expect(z.origin?.operation.name).toBe("times");
    expect(z.origin?.depth).toBe(z.depth);
    expect(z.depth).toBe(2);
    expect(z.origin?.operands[1]).toBe(x);
  });
});
