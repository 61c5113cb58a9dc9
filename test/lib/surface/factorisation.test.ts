import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { bundle } from "../../../lib/page/bundle.ts";
import { DomainError } from "../../../lib/proof/errors.ts";
import { factor } from "../../../lib/surface/factorisation.ts";

describe("factor", () => {
  it("multiplies back to the number, with primes that no smaller number divides — oracle: integer arithmetic", () => {
    fc.assert(
      fc.property(fc.bigInt({ min: 1n, max: 10n ** 9n }), fc.boolean(), (n, negative) => {
        const { sign, factors } = factor(negative ? -n : n);
        expect(sign).toBe(negative ? -1 : 1);
        expect(factors.reduce((product, { prime, exponent }) => product * prime ** BigInt(exponent), 1n)).toBe(n);
        for (const { prime } of factors) {
          for (let d = 2n; d * d <= prime && d < 2000n; d++) expect(prime % d).not.toBe(0n);
        }
      }),
      { seed: 20261201, numRuns: 200 },
    );
  });

  it("knows repunits and Mersenne numbers — oracle: published factors (Cunningham tables), from memory, multiplied back", () => {
    expect(String(factor(11111111111111111n))).toBe("2071723·5363222357");
    expect(String(factor(2n ** 67n - 1n))).toBe("193707721·761838257287");
  });

  it("gives a denominator negative exponents and is typeset", () => {
    expect(String(factor("-117649/8118144"))).toBe("-2^-7·3^-7·7^6·29^-1");
    expect(bundle(factor(-944784))?.["text/latex"]).toBe("$\\displaystyle -2^{4} \\cdot 3^{10}$");
    expect(String(factor(-1))).toBe("-1");
  });

  it("refuses 0 and doubles", () => {
    expect(() => factor(0)).toThrow(DomainError);
    expect(() => factor(0.5)).toThrow(/factor: n = 0.5; expected an exact number/);
  });
});
