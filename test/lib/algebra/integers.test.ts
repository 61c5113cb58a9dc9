import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { factorInteger, isPrime, squarefreePart } from "../../../lib/algebra/factor.ts";
import { exactRoot, exactSqrt, integerSqrt, modularInverse } from "../../../lib/algebra/integer.ts";
import { primesUpTo } from "../../../lib/algebra/primes.ts";
import { rationalRoots } from "../../../lib/algebra/rationalroots.ts";
import { rationals as Q } from "../../../lib/algebra/rationals.ts";
import { mulUni, type Univariate } from "../../../lib/algebra/univariate.ts";
import { Rational } from "../../../lib/number/rational.ts";

const runs = { seed: 7, numRuns: 300 };

describe("integers — oracle: definitions", () => {
  it("⌊√n⌋² <= n < (⌊√n⌋ + 1)²", () => {
    fc.assert(
      fc.property(fc.bigInt({ min: 0n, max: 2n ** 300n }), (n) => {
        const r = integerSqrt(n);
        expect(r * r <= n && n < (r + 1n) ** 2n).toBe(true);
        expect(exactSqrt(n * n)).toBe(n);
        expect(exactSqrt(n * n + 1n)).toBe(n === 0n ? 1n : undefined);
        expect(exactRoot(-(n ** 3n), 3)).toBe(-n);
      }),
      runs,
    );
  });

  it("a factorisation multiplies back and its primes are prime — oracle: trial division", () => {
    fc.assert(
      fc.property(fc.bigInt({ min: 1n, max: 10n ** 13n }), (n) => {
        const powers = factorInteger(-n);
        expect(powers.reduce((product, { prime, exponent }) => product * prime ** BigInt(exponent), 1n)).toBe(n);
        for (const { prime } of powers) expect(isPrime(prime)).toBe(true);
      }),
      runs,
    );
  });

  it("1,000,000,007 · 998,244,353² splits — oracle: known primes; Carmichael numbers are composite", () => {
    expect(factorInteger(1000000007n * 998244353n ** 2n)).toEqual([
      { prime: 998244353n, exponent: 2 },
      { prime: 1000000007n, exponent: 1 },
    ]);
    for (const n of [561n, 1105n, 1729n, 294409n, 3215031751n]) expect(isPrime(n)).toBe(false);
    expect(isPrime(2n ** 127n - 1n)).toBe(true);
    expect(squarefreePart(-72n)).toBe(-2n);
  });

  it("there are 168 primes below 1000 and 9592 below 100,000 — oracle: published counts", () => {
    expect(primesUpTo(1000).length).toBe(168);
    expect(primesUpTo(100_000).length).toBe(9592);
    expect(primesUpTo(10)).toEqual([2, 3, 5, 7]);
    expect(modularInverse(3n, 7n)).toBe(5n);
    expect(modularInverse(3n, 6n)).toBe(undefined);
  });
});

describe("rational roots", () => {
  const root = fc
    .tuple(fc.integer({ min: -400, max: 400 }), fc.integer({ min: 1, max: 60 }))
    .map(([n, d]) => Rational.of(n, d));

  it("of a product of linear factors and of factors without roots are the roots put in — oracle: construction", () => {
    fc.assert(
      fc.property(fc.array(root, { maxLength: 5 }), fc.integer({ min: 1, max: 50 }), (roots, c) => {
        const rootless: Univariate<Rational> = [Rational.of(c * c + 1), Rational.zero, Rational.of(3)];
        const f = roots.reduce<Univariate<Rational>>((g, r) => mulUni(Q, g, [r.neg(), Rational.one]), rootless);
        const sorted = [...new Set(roots.map(String))].map(Rational.parse).sort((a, b) => a.compare(b));
        expect(rationalRoots(f).map(String)).toEqual(sorted.map(String));
      }),
      { ...runs, numRuns: 150 },
    );
  });
});
