import { bitLength, shift } from "./bits.ts";

/**
 * Square root of a nonnegative integer: |result − √n| < 2. Callers that need the floor correct it.
 *
 * Method   a double gives 51 bits; then s' = 2^e·s + (n' − 4^e·s²) div (2^(e+1)·s) doubles them, where n' is the part of n that counts.
 * Error    with |s − √(n'/4^e)| < 2 the next error is under (2·2^e)²/(2·2^k) + 1 for a result of k bits; e <= (k − 4)/2 makes it < 1.5.
 * Cost     about 2.4 products of half the length of n.
 */
export function sqrtNear(n: bigint): bigint {
  const length = bitLength(n);
  if (length <= 100) return sqrtShort(n);
  const wanted = (length + 1) >> 1;
  return extended(n, wanted, wanted);
}

/** The first `next` of the `wanted` bits of √n. */
function extended(n: bigint, wanted: number, next: number): bigint {
  if (next <= DOUBLE) return sqrtDouble(n >> shift(2 * (wanted - next)));
  const known = (next + 5) >> 1;
  const s = extended(n, wanted, known);
  const e = next - known;
  // The quotient needs e bits more than s has; the low e bits of the rest do not reach it.
  const rest = (n >> shift(2 * (wanted - next) + e)) - ((s * s) << shift(e));
  return (s << shift(e)) + rest / (s << 1n);
}

/** Bits that a double gives: √ of the nearest double, cut down, is within 1.5 units of a root of 51 bits. */
const DOUBLE = 51;

/** Floor of the square root of a nonnegative integer. */
export function isqrt(n: bigint): bigint {
  let s = sqrtNear(n);
  while (s * s > n) s -= 1n;
  for (let t = s + 1n; t * t <= n; t += 1n) s = t;
  return s;
}

/** n < 2^102 by a double, right to a relative 2^-52: within one unit of the root. */
function sqrtDouble(n: bigint): bigint {
  return BigInt(Math.floor(Math.sqrt(Number(n))));
}

/** Floor of the root of n < 2^100. */
function sqrtShort(n: bigint): bigint {
  let s = sqrtDouble(n);
  while (s * s > n) s -= 1n;
  for (let t = s + 1n; t * t <= n; t += 1n) s = t;
  return s;
}
