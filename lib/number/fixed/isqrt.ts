import { bitLength, shift } from "./bits.ts";

/**
 * Square root of a nonnegative integer, from below or above: |result − √n| < 2. Callers that need the floor correct it.
 *
 * Cost     about 1.5 products of half the length of n on the last step.
 * Source   P. Zimmermann, Karatsuba Square Root (INRIA RR-3805, 1999): s = s'β + q with q = (r'β + a1) div 2s'.
 *          Each step is exact (root and remainder), except that the last leaves q² out: √n lies in (s − 1, s + 1).
 */
export function sqrtNear(n: bigint): bigint {
  const length = bitLength(n);
  if (length <= 104) return sqrtSmall(n);
  // Quarter blocks need the top bits set: n·4^t has length ≡ 0 mod 4 up to one bit.
  const quarter = Math.ceil(length / 4);
  const spare = (4 * quarter - length) >> 1;
  const m = spare ? n << shift(2 * spare) : n;
  const { root, rest } = sqrtRem(m >> shift(2 * quarter));
  const a1 = BigInt.asUintN(quarter, m >> shift(quarter));
  const q = ((rest << shift(quarter)) + a1) / (root << 1n);
  const s = (root << shift(quarter)) + q;
  return spare ? s >> shift(spare) : s;
}

/** Floor of the square root of a nonnegative integer. */
export function isqrt(n: bigint): bigint {
  let s = sqrtNear(n);
  while (s * s > n) s -= 1n;
  for (let t = s + 1n; t * t <= n; t += 1n) s = t;
  return s;
}

/** Floor of the root, and the remainder, exactly. */
function sqrtRem(n: bigint): { root: bigint; rest: bigint } {
  const length = bitLength(n);
  if (length <= 104) {
    const root = sqrtSmall(n);
    return { root, rest: n - root * root };
  }
  const quarter = Math.ceil(length / 4);
  const spare = (4 * quarter - length) >> 1;
  if (spare) {
    const scaledRoot = sqrtRemNormal(n << shift(2 * spare), quarter).root >> shift(spare);
    return { root: scaledRoot, rest: n - scaledRoot * scaledRoot };
  }
  return sqrtRemNormal(n, quarter);
}

function sqrtRemNormal(n: bigint, quarter: number): { root: bigint; rest: bigint } {
  const high = sqrtRem(n >> shift(2 * quarter));
  const top = (high.rest << shift(quarter)) + BigInt.asUintN(quarter, n >> shift(quarter));
  const twice = high.root << 1n;
  const q = top / twice;
  let root = (high.root << shift(quarter)) + q;
  let rest = ((top - q * twice) << shift(quarter)) + BigInt.asUintN(quarter, n) - q * q;
  if (rest < 0n) {
    rest += (root << 1n) - 1n;
    root -= 1n;
  }
  return { root, rest };
}

/** Floor of the root of n < 2^104: a double is right to a relative 2^-52, one Newton step does the rest. */
function sqrtSmall(n: bigint): bigint {
  if (n < 2n ** 50n) return BigInt(Math.floor(Math.sqrt(Number(n))));
  const x = BigInt(Math.floor(Math.sqrt(Number(n))));
  let s = (x + n / x) >> 1n;
  while (s * s > n) s -= 1n;
  for (let t = s + 1n; t * t <= n; t += 1n) s = t;
  return s;
}
