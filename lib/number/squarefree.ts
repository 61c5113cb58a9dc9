// Square factors of integers, as far as a few milliseconds find them.
import { absBig } from "./fixed/bits.ts";
import { isqrt } from "./fixed/isqrt.ts";

/** Trial division of integers that are no safe ones stops here. */
const TRIAL = 2_000n;
/** Steps of the rho method: primes up to about 10^7 are found with it. */
const STEPS = 4_096;

/**
 * d = root²·free. `free` is squarefree for |d| < 2^53 (at least); of a longer d the squares of primes above about 10^7 may stay, unless d is a square times
 * small primes.
 */
export function squarefree(d: bigint): { root: bigint; free: bigint } {
  if (d === 0n) return { root: 0n, free: 0n };
  let rest = absBig(d);
  let free = d < 0n ? -1n : 1n;
  let root = 1n;
  const take = (p: bigint): void => {
    for (; rest % (p * p) === 0n; rest /= p * p) root *= p;
    if (rest % p === 0n) {
      rest /= p;
      free *= p;
    }
  };
  // Once p³ exceeds the rest, it is 1, a prime, two primes or the square of one.
  let p = 2n;
  for (; p <= TRIAL && p * p * p <= rest; p += p === 2n ? 1n : 2n) if (rest % p === 0n) take(p);
  if (rest < 2n ** 53n) for (const q of smallFactors(rest, Number(p))) take(BigInt(q));
  const large = largeSquares(rest);
  return { root: root * large.root, free: free * large.free };
}

/** The primes p >= from of n < 2^53 with p³ <= n. */
function smallFactors(n: bigint, from: number): number[] {
  const found: number[] = [];
  let rest = Number(n);
  for (let p = from; p * p * p <= rest; p += p === 2 ? 1 : 2) {
    if (rest % p !== 0) continue;
    found.push(p);
    while (rest % p === 0) rest /= p;
  }
  return found;
}

function largeSquares(n: bigint): { root: bigint; free: bigint } {
  const s = isqrt(n);
  if (s * s === n) return { root: s, free: 1n };
  if (n < 2n ** 53n) return { root: 1n, free: n };
  const factor = rho(n);
  if (factor === undefined) return { root: 1n, free: n };
  const other = n / factor;
  const common = gcd(factor, other);
  if (common > 1n) {
    const inner = largeSquares(n / (common * common));
    return { root: common * inner.root, free: inner.free };
  }
  const a = largeSquares(factor);
  const b = largeSquares(other);
  return { root: a.root * b.root, free: a.free * b.free };
}

/** A proper factor of n, if a few steps find one. Source: J. M. Pollard, BIT 15 (1975). */
function rho(n: bigint): bigint | undefined {
  let slow = 2n;
  let fast = 2n;
  let product = 1n;
  const next = (x: bigint): bigint => (x * x + 1n) % n;
  for (let k = 1; k <= STEPS; k++) {
    slow = next(slow);
    fast = next(next(fast));
    product = (product * (slow - fast)) % n;
    if (k % 128 !== 0) continue;
    const g = gcd(absBig(product), n);
    if (g === n || product === 0n) return undefined;
    if (g > 1n) return g;
  }
  return undefined;
}

function gcd(a: bigint, b: bigint): bigint {
  while (b > 0n) [a, b] = [b, a % b];
  return a;
}
