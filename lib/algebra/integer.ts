// Small integer arithmetic that the number folder has no need of.

/** ⌊√n⌋ for n >= 0, by Newton from above: the sequence falls until it passes the root. */
export function integerSqrt(n: bigint): bigint {
  if (n < 0x20_0000_0000_0000n) return BigInt(Math.floor(Math.sqrt(Number(n))));
  const bits = n.toString(16).length * 4;
  let x = 1n << BigInt((bits + 1) >> 1);
  for (;;) {
    const y = (x + n / x) >> 1n;
    if (y >= x) return x;
    x = y;
  }
}

/** √n if n is a perfect square. */
export function exactSqrt(n: bigint): bigint | undefined {
  if (n < 0n) return undefined;
  if (NOT_SQUARE_MOD_64[Number(n & 63n)]) return undefined;
  const root = integerSqrt(n);
  return root * root === n ? root : undefined;
}

// 12 of 64 residues are squares, so most non-squares never reach the root.
const SQUARES_MOD_64 = [0, 1, 4, 9, 16, 17, 25, 33, 36, 41, 49, 57];
const NOT_SQUARE_MOD_64: readonly boolean[] = Array.from({ length: 64 }, (_, r) => !SQUARES_MOD_64.includes(r));

/** The k-th root of n if n is a perfect k-th power (k >= 1; n may be negative for odd k). */
export function exactRoot(n: bigint, k: number): bigint | undefined {
  if (k === 2) return exactSqrt(n);
  if (n < 0n) {
    if (k % 2 === 0) return undefined;
    const root = exactRoot(-n, k);
    return root === undefined ? undefined : -root;
  }
  if (n < 2n) return n;
  const K = BigInt(k);
  let x = 1n << BigInt(Math.ceil((n.toString(16).length * 4) / k));
  for (;;) {
    const y = ((K - 1n) * x + n / x ** (K - 1n)) / K;
    if (y >= x) break;
    x = y;
  }
  return x ** K === n ? x : undefined;
}

/** a mod m in [0, m). */
export function modulo(a: bigint, m: bigint): bigint {
  const r = a % m;
  return r < 0n ? r + m : r;
}

/** The exponent of p in n, which must not be zero. */
export function valuation(n: bigint, p: bigint): number {
  let count = 0;
  for (let rest = n; rest % p === 0n; rest /= p) count++;
  return count;
}

/** a^e mod m for e >= 0. */
export function modularPower(a: bigint, e: bigint, m: bigint): bigint {
  let base = modulo(a, m);
  let result = 1n % m;
  for (let rest = e; rest > 0n; rest >>= 1n) {
    if (rest & 1n) result = (result * base) % m;
    base = (base * base) % m;
  }
  return result;
}

/** g = gcd(a, b) >= 0 with g = x·a + y·b. */
export function extendedGcd(a: bigint, b: bigint): { readonly g: bigint; readonly x: bigint; readonly y: bigint } {
  let [r0, r1] = [a, b];
  let [x0, x1] = [1n, 0n];
  let [y0, y1] = [0n, 1n];
  while (r1 !== 0n) {
    const q = r0 / r1;
    [r0, r1] = [r1, r0 - q * r1];
    [x0, x1] = [x1, x0 - q * x1];
    [y0, y1] = [y1, y0 - q * y1];
  }
  return r0 < 0n ? { g: -r0, x: -x0, y: -y0 } : { g: r0, x: x0, y: y0 };
}

/** The inverse of a modulo m, or undefined if they are not coprime. */
export function modularInverse(a: bigint, m: bigint): bigint | undefined {
  const { g, x } = extendedGcd(modulo(a, m), m);
  return g === 1n ? modulo(x, m) : undefined;
}

export function lcm(a: bigint, b: bigint): bigint {
  if (a === 0n || b === 0n) return 0n;
  const value = (a / extendedGcd(a, b).g) * b;
  return value < 0n ? -value : value;
}
