// Sizes of BigInts and the doubles that bound them. Everything that an error bound is made of goes through here.

/** One outward step for a chain of up to eight nonnegative double operations: each errs by at most 2^-53 relatively. */
export const UP = 1 + 2 ** -48;
/** The same for a lower bound. */
export const DOWN = 1 - 2 ** -48;

const view = new Float64Array(1);
const words = new Uint32Array(view.buffer);
const HIGH = new Uint8Array(new Float64Array([-2]).buffer)[7] ? 1 : 0;

/** Smallest e with |x| < 2^e, for a finite double x that is not 0 and not subnormal; -1022 for those. */
export function exponent(x: number): number {
  view[0] = x;
  return ((words[HIGH]! >>> 20) & 2047) - 1022;
}

// A look-up, since putting a double together from its words costs as much as three products.
const LEAST_POWER = -1000;
const powers = new Float64Array(1023 - LEAST_POWER + 1);
for (let k = 0, value = 2 ** LEAST_POWER; k < powers.length; k++, value *= 2) powers[k] = value;

/** 2^k as a double, for use in upper bounds: never less than 2^k while k <= 1023, at least 2^-1000. */
export function pow2(k: number): number {
  if (k > 1023) return Infinity;
  return powers[k < LEAST_POWER ? 0 : k - LEAST_POWER]!;
}

/** rad·2^k as an upper bound; a radius 0 stays 0 whatever k is. */
export function scaledRadius(rad: number, k: number): number {
  return rad === 0 ? 0 : rad * pow2(k);
}

// Where |n| needs more than 1023 bits a bound is a double times a power of two; `size` leaves the power here.
let power = 0;

/**
 * A double d and an integer e (read it at once with `sizePower`) with |n| <= d·2^e, relative excess under 2^-50.
 * A good `hint` for the number of bits makes this O(1) for long n.
 */
export function size(n: bigint, hint: number): number {
  let d = Number(n);
  power = 0;
  if (d === Infinity || d === -Infinity) {
    let low = hint - 512;
    d = low > 0 ? Number(n >> shift(low)) : Infinity;
    if (!(Math.abs(d) < Infinity && Math.abs(d) > 2 ** 60)) {
      low = bitLength(n, hint) - 512;
      d = Number(n >> shift(low));
    }
    power = low;
  }
  // Number() rounds to nearest, and the shift lost less than one unit of a number above 2^60.
  d = Math.abs(d) * (1 + 2 ** -51);
  // Kept in [2^200, 2^500) if long: squares stay finite, and one unit more or less is nothing.
  if (d < 2 ** 500) return d;
  const less = d < 2 ** 800 ? 300 : 600;
  power += less;
  return d * (less === 300 ? 2 ** -300 : 2 ** -600);
}

/** The exponent that belongs to the last result of `size`. */
export function sizePower(): number {
  return power;
}

const shifts: bigint[] = [];

/** A shift count as a BigInt; the small ones are kept, because making a BigInt costs as much as a short shift. */
export function shift(k: number): bigint {
  if (k >= 8192 || k < 0) return BigInt(k);
  const kept = shifts[k];
  if (kept !== undefined) return kept;
  for (let j = shifts.length; j <= k; j++) shifts[j] = BigInt(j);
  return shifts[k]!;
}

let lead = 0;

/** For the number n that `bitLength` measured last, with e bits: d with |n| <= d·2^e and d <= 1, or 0 for 0. */
export function leadingPart(): number {
  return lead;
}

/**
 * Number of bits of |n|: the smallest e with |n| < 2^e; 0 for 0. `hint` is a guess that makes long n cheap; a wrong
 * one costs time only.
 */
export function bitLength(n: bigint, hint = 0): number {
  const d = Number(n);
  if (d === 0) {
    lead = 0;
    return 0;
  }
  if (d !== Infinity && d !== -Infinity) return doubleLength(n, d, 0);
  // Find a shift that leaves 1 to 1023 bits: the hint's, else by doubling and halving.
  const m = absBig(n);
  let low = Math.max(hint - 512, 512);
  let short = 0;
  let long = Infinity;
  for (;;) {
    const t = m >> shift(low);
    const e = Number(t);
    if (e !== 0 && e !== Infinity) return doubleLength(t, e, low);
    if (e === 0) long = low;
    else short = low;
    low = long === Infinity ? 2 * low : (short + long) >> 1;
  }
}

function doubleLength(n: bigint, d: number, low: number): number {
  view[0] = d;
  const high = words[HIGH]!;
  let e = ((high >>> 20) & 2047) - 1022;
  // Only a power of two can be the result of rounding up past one; then look at the bits.
  if ((high & 0xfffff) === 0 && words[1 - HIGH] === 0 && e > 53 && !(absBig(n) >> shift(e - 1))) e--;
  // Number() rounds to nearest, and a shift cuts less than one unit: under 2^-50 of the leading part if that has 52 bits, else up to all of it.
  lead = low > 0 && e < 52 ? 1 : Math.min(1, Math.abs(d) * pow2(-e) * (1 + 2 ** -50));
  return low + e;
}

/** n·2^k, rounded down for negative k. */
export function scaled(n: bigint, k: number): bigint {
  return k >= 0 ? n << shift(k) : n >> shift(-k);
}

export function absBig(n: bigint): bigint {
  return n < 0n ? -n : n;
}

/** Number of zero bits at the low end of n, n not 0. */
export function trailingZeros(n: bigint): number {
  let count = 0;
  for (let step = 64; ; step *= 2) {
    const low = BigInt.asUintN(step, n);
    if (low !== 0n) {
      count = bitLength(low & -low) - 1;
      return count;
    }
  }
}
