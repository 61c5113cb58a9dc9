import { describe, expect, it } from "vitest";
import { classPolynomial } from "../../../lib/function/class-polynomial.ts";
import { reducedForms } from "../../../lib/function/quadratic-forms.ts";
import { DomainError } from "../../../lib/proof/errors.ts";
import { entries } from "./reference.ts";

describe("class polynomials — oracle: exact tables, class number up to 5", () => {
  it.each(entries("modular", "class_polynomial"))("D = $input.discriminant", ({ input, expected }) => {
    const { coefficients, forms } = classPolynomial(BigInt(input.discriminant));
    expect(coefficients.map(String)).toEqual(expected.coefficients);
    expect(forms).toHaveLength(expected.class_number);
    const key = (f: readonly (number | bigint)[]) => f.join(" ");
    expect(forms.map((f) => key([f.a, f.b, f.c])).sort()).toEqual(expected.reduced_forms.map(key).sort());
  });

  it.each(entries("modular", "cm_j_invariant"))("D = $input.discriminant has the one root $expected", (entry) => {
    const { coefficients } = classPolynomial(BigInt(entry.input.discriminant));
    expect(coefficients).toEqual([1n, -BigInt(entry.expected)]);
  });
});

describe("class polynomials by what they must satisfy", () => {
  it("the last fundamental discriminants of class number 1 to 7 — oracle: Watkins 2004, table 4", () => {
    const last = [-163n, -427n, -907n, -1555n, -2683n, -3763n, -5923n];
    expect(last.map((d) => reducedForms(d).length)).toEqual([1, 2, 3, 4, 5, 6, 7]);
  });

  it("D = −3299, h = 27: the constant term is a cube — oracle: j has its cube root in the class field for 3 ∤ D, Cox theorem 12.2", () => {
    const { coefficients } = classPolynomial(-3299n);
    expect(coefficients).toHaveLength(28);
    const constant = coefficients.at(-1)!;
    const size = constant < 0n ? -constant : constant;
    expect(cubeRoot(size) ** 3n).toBe(size);
  });

  it("D = −5, 7 and 0 are refused", () => {
    for (const d of [-5n, 7n, 0n]) expect(() => classPolynomial(d)).toThrow(DomainError);
  });
});

function cubeRoot(n: bigint): bigint {
  let root = 1n << BigInt(Math.ceil(n.toString(2).length / 3) + 1);
  for (;;) {
    const next = (2n * root + n / (root * root)) / 3n;
    if (next >= root) return root;
    root = next;
  }
}
