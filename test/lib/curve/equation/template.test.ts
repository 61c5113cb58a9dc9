import { describe, expect, it } from "vitest";
import { Rational } from "../../../../lib/number/rational.ts";
import { DomainError } from "../../../../lib/proof/errors.ts";
import { curve } from "../../../../lib/surface/make-curve.ts";

const a = (text: string) => curve(Object.assign([text], { raw: [text] })).a.map(String);
const refusal = (text: string): string => {
  try {
    a(text);
  } catch (error) {
    expect(error).toBeInstanceOf(DomainError);
    return (error as DomainError).message;
  }
  throw new Error(`${text} was accepted`);
};

describe("equations as written", () => {
  it.each([
    ["y^2 + y = x^3 - x", "0,0,1,-1,0"],
    ["y² + y = x³ − x", "0,0,1,-1,0"],
    ["y**2 + y - x**3 + x", "0,0,1,-1,0"],
    ["s^2 + s = t^3 - t", "0,0,1,-1,0"],
    ["x^2 + x = y^3 - y", "0,0,1,-1,0"],
    ["y^2 + xy + 2y = x^3", "1,0,2,0,0"],
    ["y(y + x) + 2 y = x x x", "1,0,2,0,0"],
    ["x_1^2 = x_2^3 - x_2", "0,0,0,-1,0"],
    ["x₁² = x2^3 - x2", "0,0,0,-1,0"],
    ["\\lambda^{2} = \\mu^{3} - \\frac{3}{4}\\,\\mu + 0.5", "0,0,0,-3/4,1/2"],
    ["\\left(y\\right)^2 = x^3 - \\frac{30625}{768} x + 1{,}850", "0,0,0,-30625/768,1850"],
    ["y^2z + yz^2 = x^3 - xz^2", "0,0,1,-1,0"],
    ["y^2 = (x - 1)(x - 2)(x + 3)", "0,0,0,-7,6"],
    ["-y^2 = -x^3 + 7x - 6.", "0,0,0,-7,6"],
    ["y^2 = x^3 - (7/1)*x + 36 \\cdot 1/6", "0,0,0,-7,6"],
    ["y^2 = x^3 + \\sqrt{49} x - √36", "0,0,0,7,-6"],
  ])("%s — oracle: coefficients read by eye", (text, expected) => {
    expect(a(text).join()).toBe(expected);
  });

  it("rescales y² = 4x³ − g2 x − g3 by y = 2Y and keeps x — oracle: a4 = −g2/4, a6 = −g3/4", () => {
    const E = curve`y^2 = 4x^3 - 28x + 24`;
    expect(E.a.map(String).join()).toBe("0,0,0,-7,6");
    expect(`${E.given?.scaleX} ${E.given?.scaleY}`).toBe("1 2");
  });

  it("rescales 3y² + xy = 2x³ + 1 by a cube and a square — oracle: substitution by hand", () => {
    const E = curve`3y^2 + xy = 2x^3 + 1`;
    expect(E.a.map(String).join()).toBe("1/3,0,0,0,4/27");
    expect(`${E.given?.scaleX} ${E.given?.scaleY}`).toBe("3/2 3/2");
  });

  it("an inserted value is one bracketed factor", () => {
    expect(curve`y^2 = x^3 + ${-3}x^2 - ${Rational.of(1, 2)}x + 2${3}`.a.join()).toBe("0,-3,0,-1/2,6");
    expect(curve`y^${2} = x^${3n} + ${"0.125"}`.a.join()).toBe("0,0,0,0,1/8");
  });

  it("refuses 1/2x and names both readings", () => {
    expect(refusal("y^2 = x^3 - 1/2x")).toBe(
      "curve: 1/2x has two readings at column 13; expected (1/2)*x or 1/(2*x). Write the one that is meant.\n" +
        "    y^2 = x^3 - 1/2x\n                ^^^^",
    );
  });

  it.each([
    ["y^2 = x^3 - k x", "the unknown letter k", "Insert a number as "],
    ["y^2 = x^3 # 2", '"#" cannot be read at column 11', ""],
    ["y^2 = x^3 - (x", 'expected ")"', ""],
    ["y^2 = x^3 - 2 3x", "the number 3 beside 2", ""],
    ["y^2 = x^3 - x^2^2", "a power of a power", ""],
    ["y^2 = x^3/x", "a letter in a denominator", ""],
    ["y^2 = x^3 - \\sin x", "the TeX command \\sin", ""],
    ["y^2 = x = x^3", 'a second "="', ""],
    ["y^2 = x^3 - \\frac12 x", "a group in braces after \\frac", ""],
    ["y^2 = x^3 - x^0.5", "expected a whole exponent from 0 to 60", ""],
    ["y^2 = x^4 + 1", "degree 4", "quartic"],
    ["u^3 + v^3 = 6", "a plane cubic that is not in the long form", "C.through"],
    ["y^2 = x^2 + 1", "genus 0", ""],
    ["y^2 = 1/0*x^3", "division by zero", ""],
    ["  ", "nothing", ""],
  ])("%s is refused: %s", (text, part, hint) => {
    const message = refusal(text);
    expect(message).toContain(part);
    expect(message).toContain(hint);
  });

  it("marks the column under the line that it is on", () => {
    expect(refusal("y^2 + y\n  = x^3 - q x")).toContain("line 2, column 11");
    expect(refusal("y^2 + y\n  = x^3 - q x")).toContain("\n      = x^3 - q x\n              ^");
  });
});
