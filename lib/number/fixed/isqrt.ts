import { bitLength, pow2, shift } from "./bits.ts";

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
  return wanted > 90 && wanted <= 194 ? bySeries(n, wanted) : extended(n, wanted, wanted);
}

/**
 * √n of 91 to 194 bits from a double s, by √(S² + 2Sh) = S + h − h²/2S + h³/2S² − ... with S = 2^e·s and h = (n − S²)/2S: two short divisors instead of
 * two long ones (measured).
 *
 * Error    s is within 2 units of its 51 bits, so |h| < 2^-49·S and the fourth term 5h⁴/8S³ is under 2^-196·S, a quarter; h and h²/2S are cut by under 1/16 each,
 *          and the error of h changes h²/2S by nothing that counts; the double makes the cubic term wrong by under 2^-100·S·2^-48: together under 1/2
 *          before the rounding, so the root of a square is exact.
 */
function bySeries(n: bigint, wanted: number): bigint {
  const e = wanted - 51;
  const s = sqrtDouble(n >> shift(2 * e));
  // In units of 1/16.
  const h = ((n >> shift(e - 3)) - ((s * s) << shift(e + 3))) / s;
  const square = ((h * h) >> shift(e + 5)) / s;
  const cube = (Number(square) * Number(h)) / (16 * Number(s) * pow2(e));
  return ((s << shift(e + 4)) + h - square + BigInt(Math.floor(cube)) + 8n) >> 4n;
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
