// Integers and rational numbers as products of prime powers.

import { factorInteger, isPrime, type PrimePower } from "../algebra/factor.ts";
import type { Rational } from "../number/rational.ts";
import { DomainError, PrecisionError } from "../proof/errors.ts";
import { type ExactInput, toRational } from "./input.ts";

/** A rational number ±p1^e1·p2^e2···, with ascending primes; the exponents of a denominator are negative. */
export class Factorisation {
  readonly sign: 1 | -1;
  readonly factors: readonly PrimePower[];
  readonly value: Rational;

  constructor(value: Rational, factors: readonly PrimePower[]) {
    this.value = value;
    this.sign = value.num < 0n ? -1 : 1;
    this.factors = factors;
  }

  /** The primes, ascending. */
  get primes(): bigint[] {
    return this.factors.map(({ prime }) => prime);
  }

  /** Such as -2^4·3^-1. */
  toString(): string {
    const product = this.factors.map(({ prime, exponent }) => (exponent === 1 ? `${prime}` : `${prime}^${exponent}`));
    return `${this.sign < 0 ? "-" : ""}${product.join("·") || "1"}`;
  }
}

/**
 * The factorisation of an integer or a rational number; every prime in it is proved to be one.
 *
 * Domain   exact numbers other than 0.
 * Error    exact.
 * Cost     about p^(1/2) steps for the second largest prime p: fractions of a second up to 12 digits, minutes near 20.
 * Throws   DomainError for 0 and for a number that is not exact.
 * Source   trial division; Brent, BIT 20 (1980).
 *
 * @example factor(-944784)   // -2^4·3^10
 */
export function factor(n: ExactInput): Factorisation {
  const q = toRational("factor", "n", n);
  if (q.num === 0n) {
    throw new DomainError({ subject: "factor", given: "0", expected: "a number other than 0", argument: "n" });
  }
  const below = factorInteger(q.den).map(({ prime, exponent }) => ({ prime, exponent: -exponent }));
  const factors = [...factorInteger(q.num), ...below].sort((a, b) => (a.prime < b.prime ? -1 : 1));
  for (const { prime } of factors) {
    if (isPrime(prime)) continue;
    throw new PrecisionError({
      subject: "factor",
      given: `the factor ${prime}, which passes the tests of a prime but is not proved to be one`,
      expected: "factors that are proved primes",
    });
  }
  return new Factorisation(q, factors);
}
