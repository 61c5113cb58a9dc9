// Bad input as a user meets it, through the names of a cell: which class, what is said of it, and that the settings stay.
import { Complex as Complexjs } from "complex.js";
import { Decimal } from "decimal.js";
import { afterEach, describe, expect, it } from "vitest";
import {
  agm,
  arg,
  atDigits,
  complex,
  enclose,
  exact,
  exp,
  gamma,
  ln,
  nthRoot,
  pow,
  provedDigits,
  rational,
  real,
  sqrt,
  tan,
} from "../../../lib/index.ts";
import { BranchError, DomainError, LibraryError, PoleError } from "../../../lib/proof/errors.ts";

afterEach(() => {
  provedDigits(20);
});

type Row = readonly [text: string, run: () => unknown, error: new (...args: never[]) => Error, given: RegExp];

const around0 = () => enclose("0", "1e-3");
const onCut = () => complex(-2, around0());

const ROWS: readonly Row[] = [
  ["1/(0 ± 0.001)", () => real(1).div(around0()), PoleError, /0 ± 0\.001, which holds 0/],
  ["1/0", () => real(1).div(0), PoleError, /^the divisor 0$/],
  ["complex division", () => complex(1, 1).div(around0()), PoleError, /0 \+ 0 i ± 0\.001, which holds 0/],
  ["ln 0", () => ln(0), DomainError, /^0$/],
  ["ln −1", () => ln(-1), DomainError, /the negative number -1/],
  ["ln of both signs", () => ln(around0()), BranchError, /0 ± 0\.001, which holds 0/],
  ["ln on the cut", () => ln(onCut()), BranchError, /-2 \+ 0 i ± 0\.001, which meets the negative real axis/],
  ["arg on the cut", () => arg(onCut()), BranchError, /-2 \+ 0 i ± 0\.001, which meets the negative real axis/],
  ["arg 0", () => arg(0), DomainError, /0, which has no angle/],
  ["arg around 0", () => arg(complex(around0(), around0())), BranchError, /which holds 0/],
  ["√ of both signs", () => sqrt(around0()), BranchError, /0 ± 0\.001, which holds 0 and negative numbers/],
  ["√−1", () => sqrt(-1), DomainError, /the negative number -1/],
  ["√ on the cut", () => sqrt(onCut()), BranchError, /-2 \+ 0 i ± 0\.001/],
  ["an even root of −8", () => nthRoot(-8, 2), DomainError, /negative/],
  ["root of degree 0", () => nthRoot(2, 0), DomainError, /the degree 0/],
  ["agm of a negative number", () => agm(-1, 2), DomainError, /the negative number -1/],
  ["tan at its pole", () => tan(enclose("1.5707963", "1e-3")), PoleError, /which holds 0/],
  ["Γ(−1)", () => gamma(-1), PoleError, /-1/],
  ["e^(10^20)", () => exp("1e20"), DomainError, /about 2\^67/],
  ["2^(10^30)", () => pow(2, "1e30"), DomainError, /about 2\^100/],
  ["e^(2^53 − 1) by squaring", () => exp(1).pow(2 ** 53 - 1), DomainError, /binary exponent \d{14}/],
  ["a text beyond all exponents", () => real("1e99999999999"), DomainError, /decimal exponent 99999999999/],
  ["NaN", () => real(Number.NaN), DomainError, /NaN/],
  ["Infinity as an operand", () => real(1).plus(-Infinity), DomainError, /-Infinity/],
  ["NaN as a radius", () => enclose(1, Number.NaN), DomainError, /NaN/],
  ["a negative radius", () => enclose("1", "-1"), DomainError, /radius -1/],
  ["Decimal NaN", () => real(new Decimal(Number.NaN)), DomainError, /NaN/],
  ["complex.js infinity", () => complex(new Complexjs(Infinity, 0)), DomainError, /Infinity/],
  ["no digits", () => provedDigits(0), DomainError, /^0 digits$/],
  ["10^9 digits", () => provedDigits(1e9), DomainError, /^1000000000 digits$/],
  ["1.5 digits", () => provedDigits(1.5), DomainError, /1\.5 digits/],
  ["digits(0) of a value", () => sqrt(2).plus(sqrt(3)).digits(0), DomainError, /0 digits/],
  ["digits(1e9) of a value", () => sqrt(2).plus(sqrt(3)).digits(1e9), DomainError, /1000000000 digits/],
  ["atDigits(0)", () => atDigits(0, () => 1), DomainError, /0 digits/],
];

describe("bad input is refused by class and fields, and the digits asked for stay", () => {
  it.each(ROWS)("%s — oracle: the definition", (_text, run, error, given) => {
    const caught = (() => {
      try {
        run();
      } catch (thrown) {
        return thrown;
      }
      return undefined;
    })();
    expect(caught).toBeInstanceOf(error);
    expect(caught).toBeInstanceOf(LibraryError);
    const fields = caught as LibraryError;
    expect(fields.given).toMatch(given);
    expect(fields.subject).not.toBe("");
    expect(fields.expected).not.toBe("");
    expect(fields.message).toContain(fields.given);
    expect(provedDigits()).toBe(20);
    expect(sqrt(2).toString()).toBe("1.4142135623730950488...");
  });
});

describe("unparsable text", () => {
  it.each([
    ["1.2.3", 4, () => real("1.2.3")],
    ["12abc", 3, () => real("12abc")],
    ["1 + 2 j", 7, () => complex("1 + 2 j")],
    ["1.25 ± x", 8, () => real("1.25 ± x")],
    ["1,5 ± 1e-6", 2, () => real("1,5 ± 1e-6")],
    ["NaN", 1, () => real("NaN")],
  ])("%s: position %i — oracle: counted by hand", (text, position, run) => {
    expect(run).toThrow(
      expect.objectContaining({ given: expect.stringContaining(`at position ${position} of "${text}"`) }),
    );
    expect(run).toThrow(DomainError);
  });

  it.each([
    ["", () => real("")],
    ["1/2 + ", () => exact`1/2 + `],
    ["22/", () => rational("22/")],
    ["1.25 ±", () => real("1.25 ±")],
  ])("%s: at its end", (text, run) => {
    expect(run).toThrow(expect.objectContaining({ given: expect.stringContaining(`the end of "${text}"`) }));
  });

  it("what is no number at all is a TypeError that says what it is", () => {
    for (const x of [undefined, null, {}, [1]]) {
      expect(() => real(x as never)).toThrow(TypeError);
      expect(() => real(x as never)).toThrow(/^real: got (undefined|null|a value of type (Object|Array)); expected/);
    }
  });
});
