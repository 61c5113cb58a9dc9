// Products and quotients of power series with integer coefficients, long ones as products of two long integers.

/** Below this many products of coefficients they are taken one by one (measured). */
const FEW_PRODUCTS = 20_000;
const SHORT = 48;

/** The first `count` coefficients of x·y. */
export function multiply(x: readonly bigint[], y: readonly bigint[], count: number): bigint[] {
  const work = nonzero(x) * nonzero(y);
  return work <= FEW_PRODUCTS ? oneByOne(x, y, count) : packed(x, y, count);
}

function nonzero(x: readonly bigint[]): number {
  return x.reduce((n, c) => (c === 0n ? n : n + 1), 0);
}

function oneByOne(x: readonly bigint[], y: readonly bigint[], count: number): bigint[] {
  const z: bigint[] = new Array(count).fill(0n);
  x.forEach((a, i) => {
    if (a === 0n) return;
    for (let k = 0; k + i < count; k++) if (y[k]) z[i + k]! += a * y[k]!;
  });
  return z;
}

/**
 * Both series at q = 2^slot, multiplied as integers (L. Kronecker 1882). With 2^slot above twice every |coefficient| of the product the digits to
 * the base 2^slot, each moved by half of it, are the coefficients.
 */
function packed(x: readonly bigint[], y: readonly bigint[], count: number): bigint[] {
  const bits = longest(x) + longest(y) + count.toString(2).length + 2;
  const nibbles = Math.ceil(bits / 4);
  const slot = 4 * nibbles;
  const half = 1n << BigInt(slot - 1);
  const halves = BigInt(`0x${half.toString(16).padStart(nibbles, "0").repeat(count)}`);
  const product = BigInt.asUintN(
    slot * count,
    at(x.slice(0, count), nibbles) * at(y.slice(0, count), nibbles) + halves,
  );
  const digits = product.toString(16).padStart(nibbles * count, "0");
  return Array.from({ length: count }, (_, k) => {
    const end = digits.length - k * nibbles;
    return BigInt(`0x${digits.slice(end - nibbles, end)}`) - half;
  });
}

function longest(x: readonly bigint[]): number {
  return x.reduce((most, c) => Math.max(most, c.toString(16).length * 4), 1);
}

/** Σ x_k 2^(4·nibbles·k). */
function at(x: readonly bigint[], nibbles: number): bigint {
  const part = (f: (c: bigint) => bigint) =>
    BigInt(
      `0x${
        [...x]
          .reverse()
          .map((c) => f(c).toString(16).padStart(nibbles, "0"))
          .join("") || "0"
      }`,
    );
  return part((c) => (c > 0n ? c : 0n)) - part((c) => (c < 0n ? -c : 0n));
}

/** The first `count` coefficients of x/y for a series y with constant term 1; by Newton's g ← g (2 − y g) for long ones. */
export function divide(x: readonly bigint[], y: readonly bigint[], count: number): bigint[] {
  if (count <= SHORT) return recursive(x, y, count);
  return multiply(x.slice(0, count), inverse(y, count), count);
}

function inverse(y: readonly bigint[], count: number): bigint[] {
  if (count <= SHORT) return recursive([1n], y, count);
  const half = inverse(y, Math.ceil(count / 2));
  const product = multiply(y.slice(0, count), half, count).map((c) => -c);
  product[0]! += 2n;
  return multiply(half, product, count);
}

function recursive(x: readonly bigint[], y: readonly bigint[], count: number): bigint[] {
  const z: bigint[] = [];
  for (let n = 0; n < count; n++) {
    let value = x[n] ?? 0n;
    for (let k = 1; k <= n; k++) if (y[k]) value -= y[k]! * z[n - k]!;
    z[n] = value;
  }
  return z;
}
