// Primes: a table grown on demand, and a proof of primality for any size that a curve over Q brings up.

import { gcd } from "../number/rational.ts";
import { modularPower } from "./integer.ts";

let table: readonly number[] = [];
let tableLimit = 0;

/** All primes up to a limit, ascending. The sieve is kept and extended. */
export function primesUpTo(limit: number): readonly number[] {
  if (limit > tableLimit) {
    const size = Math.max(1000, limit, Math.min(2 * tableLimit, 2_000_000));
    const found = sieve(size);
    table = found; // assigned once complete: an interrupt may end the sieve anywhere
    tableLimit = size;
  }
  let count = table.length;
  if (tableLimit > limit) count = lowerCount(limit);
  return count === table.length ? table : table.slice(0, count);
}

function lowerCount(limit: number): number {
  let [low, high] = [0, table.length];
  while (low < high) {
    const middle = (low + high) >> 1;
    if (table[middle]! <= limit) low = middle + 1;
    else high = middle;
  }
  return low;
}

function sieve(size: number): number[] {
  const composite = new Uint8Array(size + 1);
  const found: number[] = [];
  for (let p = 2; p <= size; p++) {
    if (composite[p]) continue;
    found.push(p);
    for (let multiple = p * p; multiple <= size; multiple += p) composite[multiple] = 1;
  }
  return found;
}

// The first thirteen primes as bases decide every n below this bound. Source: Sorenson and Webster, Math. Comp. 86 (2017).
const DETERMINISTIC_BOUND = 3317044064679887385961981n;
const BASES = [2n, 3n, 5n, 7n, 11n, 13n, 17n, 19n, 23n, 29n, 31n, 37n, 41n];

/** False is proved; true is proved below 3.3·10^24 and a strong probable prime to thirteen bases above. */
export function passesPrimeTests(n: bigint): boolean {
  if (n < 2n) return false;
  for (const p of BASES) {
    if (n === p) return true;
    if (n % p === 0n) return false;
  }
  if (n < 1681n) return true;
  const bases = n < 3215031751n ? BASES.slice(0, 4) : BASES;
  return bases.every((base) => strongProbablePrime(n, base));
}

function strongProbablePrime(n: bigint, base: bigint): boolean {
  let odd = n - 1n;
  let twos = 0;
  while ((odd & 1n) === 0n) {
    odd >>= 1n;
    twos++;
  }
  let x = modularPower(base, odd, n);
  if (x === 1n || x === n - 1n) return true;
  for (let k = 1; k < twos; k++) {
    x = (x * x) % n;
    if (x === n - 1n) return true;
  }
  return false;
}

/**
 * True if n is proved prime: by the tests below 3.3·10^24, above by Pocklington's theorem with a factored part of n − 1
 * larger than √n. `primeFactorsOf` gives primes of n − 1 (proved themselves).
 */
export function isProvedPrime(n: bigint, primeFactorsOf: (m: bigint) => readonly bigint[]): boolean {
  if (!passesPrimeTests(n)) return false;
  if (n < DETERMINISTIC_BOUND) return true;
  let factored = 1n;
  for (const q of primeFactorsOf(n - 1n)) {
    if (!pocklingtonWitness(n, q)) continue;
    for (let rest = n - 1n; rest % q === 0n; rest /= q) factored *= q;
    if (factored * factored > n) return true;
  }
  return false;
}

function pocklingtonWitness(n: bigint, q: bigint): boolean {
  for (let a = 2n; a < 50n; a++) {
    if (modularPower(a, n - 1n, n) !== 1n) return false;
    if (gcd(modularPower(a, (n - 1n) / q, n) - 1n, n) === 1n) return true;
  }
  return false;
}
