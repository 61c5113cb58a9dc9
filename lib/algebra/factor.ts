// Factorisation of integers: trial division, then Pollard's rho in Brent's form.

import { gcd } from "../number/rational.ts";
import { DomainError } from "../proof/errors.ts";
import { exactSqrt } from "./integer.ts";
import { isProvedPrime, passesPrimeTests, primesUpTo } from "./primes.ts";

export interface PrimePower {
  readonly prime: bigint;
  readonly exponent: number;
}

// Above 2^12 the rho method finds a factor sooner than trial division.
const TRIAL_LIMIT = 4096;

/**
 * The prime powers of |n|, ascending; empty for ±1.
 *
 * Domain   n ≠ 0.
 * Cost     about p^(1/2) steps for the second largest prime p: fractions of a second up to 12 digits, minutes near 20.
 * Throws   DomainError for 0.
 */
export function factorInteger(n: bigint): PrimePower[] {
  if (n === 0n) {
    throw new DomainError({ subject: "factor", given: "0", expected: "an integer that is not 0", argument: "n" });
  }
  let rest = n < 0n ? -n : n;
  const found: PrimePower[] = [];
  for (const p of primesUpTo(TRIAL_LIMIT)) {
    const prime = BigInt(p);
    if (prime * prime > rest) break;
    let exponent = 0;
    for (; rest % prime === 0n; rest /= prime) exponent++;
    if (exponent > 0) found.push({ prime, exponent });
  }
  const large = splitFully(rest).sort((a, b) => (a < b ? -1 : a > b ? 1 : 0));
  for (const prime of new Set(large)) found.push({ prime, exponent: large.filter((q) => q === prime).length });
  return found;
}

/** The primes that divide n, ascending. */
export function primeDivisors(n: bigint): bigint[] {
  return factorInteger(n).map(({ prime }) => prime);
}

/** The squarefree integer d with n = d·m²; n ≠ 0. */
export function squarefreePart(n: bigint): bigint {
  const odd = factorInteger(n).filter(({ exponent }) => exponent % 2 === 1);
  return odd.reduce((product, { prime }) => product * prime, n < 0n ? -1n : 1n);
}

/** True if n is prime, proved. */
export function isPrime(n: bigint): boolean {
  return isProvedPrime(n, primeDivisors);
}

function splitFully(n: bigint): bigint[] {
  if (n === 1n) return [];
  if (n < BigInt(TRIAL_LIMIT) ** 2n || passesPrimeTests(n)) return [n];
  const root = exactSqrt(n);
  const factor = root ?? rhoFactor(n);
  return [...splitFully(factor), ...splitFully(n / factor)];
}

/** A proper factor of a composite n without small factors. Source: Brent, BIT 20 (1980). */
function rhoFactor(n: bigint): bigint {
  for (let c = 1n; ; c++) {
    const factor = rhoAttempt(n, c);
    if (factor !== n) return factor;
  }
}

function rhoAttempt(n: bigint, c: bigint): bigint {
  const step = (v: bigint) => (v * v + c) % n;
  const distance = (a: bigint, b: bigint) => (a > b ? a - b : b - a);
  let y = 2n;
  for (let length = 1; ; length *= 2) {
    const x = y;
    for (let k = 0; k < length; k++) y = step(y);
    for (let done = 0; done < length; done += BATCH) {
      const start = y;
      const batch = Math.min(BATCH, length - done);
      let product = 1n;
      for (let k = 0; k < batch; k++) {
        y = step(y);
        product = (product * distance(x, y)) % n;
      }
      if (gcd(product, n) === 1n) continue;
      let z = start;
      for (;;) {
        z = step(z);
        const g = gcd(distance(x, z), n);
        if (g !== 1n) return g;
      }
    }
  }
}

const BATCH = 128;
