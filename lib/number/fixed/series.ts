// The power series of exp, sin and cos in fixed point.
import { shift } from "./bits.ts";
import { boundedCache } from "./cache.ts";

/** The factors of the denominators: term n is term n − 1 times z/factor(n). */
export type Factor = (n: number) => number;

/** exp: n. */
export const EXP_FACTOR: Factor = (n) => n;
/** sin t / t in z = −t²: 2n(2n + 1). */
export const SIN_FACTOR: Factor = (n) => 2 * n * (2 * n + 1);
/** cos t in z = −t²: 2n(2n − 1). */
export const COS_FACTOR: Factor = (n) => 2 * n * (2 * n - 1);

/** Terms that are needed for |z| < 2^-r, r >= 2: the next one is under 2^-prec, and the rest under twice that. */
export function termsFor(prec: number, r: number, factor: Factor): number {
  let n = 1;
  for (let reached = r; reached < prec; n++) reached += r + bitsBelow(factor(n + 1));
  return n + 1;
}

/** floor(log2 n) for 0 < n < 2^31, and 31 above: a lower bound. */
function bitsBelow(n: number): number {
  return n >= 2 ** 31 ? 31 : 31 - Math.clz32(n);
}

/** Sums of at most so many terms go term by term. */
const SHORT = 16;

/**
 * Σ_{n>=0} z^n/(factor(1)...factor(n)) in units of 2^-work, for |z| < 2^(work−r), r >= 2.
 * Error    under 16 + 16·√N units for N terms; see the two routines.
 */
export function factorialSum(z: bigint, work: number, r: number, factor: Factor): bigint {
  const count = termsFor(work, r, factor);
  return count <= SHORT ? shortSum(z, work, count, factor) : columnSum(z, work, r, count, factor);
}

/**
 * By Horner's rule with kept coefficients; each is cut by under a unit, each step by one more, and the error of the sum so far
 * meets |z| <= 1/4: under 3 units, and 2 for the tail.
 */
function shortSum(z: bigint, work: number, count: number, factor: Factor): bigint {
  const w = shift(work);
  const c = coefficients(work, factor);
  let sum = c[count]!;
  for (let n = count - 1; n >= 0; n--) sum = c[n]! + ((z * sum) >> w);
  return sum;
}

const COEFFICIENTS = new Map<Factor, (work: number) => readonly bigint[]>();

/** 2^work/(factor(1)...factor(n)) for n = 0 .. SHORT. */
function coefficients(work: number, factor: Factor): readonly bigint[] {
  let kept = COEFFICIENTS.get(factor);
  if (!kept) {
    kept = boundedCache(16, (bits) => made(bits, factor));
    COEFFICIENTS.set(factor, kept);
  }
  return kept(work);
}

function made(work: number, factor: Factor): readonly bigint[] {
  const list = [1n << shift(work)];
  for (let n = 1; n <= SHORT; n++) list.push(list[n - 1]! / shift(factor(n)));
  return list;
}

/**
 * In √N columns (Smith), every row with the bits that still count and the factors of a row multiplied together as far as they stay short.
 *
 * Error    row j is a number A_j of size about 1 with weight z^(mj)/(factors up to mj), and is kept in units of 2^-(work − loss_j), where 2^-loss_j is
 *          at least that weight, so an error of e units of a row is at most e units of the result. In a row each power is cut by under 1 unit and errs
 *          by under 2 before; these meet coefficients that sum to under e after the division; cutting z^m and its product add 3 and each of
 *          the divisions under 1.2: under 16 units a row.
 */
function columnSum(z: bigint, work: number, r: number, count: number, factor: Factor): bigint {
  const m = Math.max(2, Math.round(0.85 * Math.sqrt(count)));
  const rows = Math.ceil(count / m);
  const powers = powersOf(z, m, work);
  const loss = rowLosses(rows, m, r, work, factor);
  let sum = 0n;
  for (let j = rows - 1; j >= 0; j--) {
    const bits = work - loss[j]!;
    if (j < rows - 1) {
      const next = work - loss[j + 1]!;
      // z^m with the bits of this row, times the row below.
      sum = ((powers[m]! >> shift(work - bits)) * sum) >> shift(next);
    }
    sum = row(sum, powers, j * m, m, work - bits, bits, factor);
  }
  return sum;
}

/** loss_j: bits by which the weight of row j is at least below 1; never so many that under 16 stay. */
function rowLosses(rows: number, m: number, r: number, work: number, factor: Factor): number[] {
  const loss = [0];
  let bits = 0;
  for (let j = 1; j < rows; j++) {
    bits += r * m;
    for (let n = (j - 1) * m + 1; n <= j * m; n++) bits += bitsBelow(factor(n));
    loss.push(Math.min(bits, work - 16));
  }
  return loss;
}

/** Σ_{i<m} z^i/(factors d+1 .. d+i) + tail/(factors d+1 .. d+m), with the powers cut by `cut` bits. */
function row(
  tail: bigint,
  powers: readonly bigint[],
  d: number,
  m: number,
  cut: number,
  bits: number,
  factor: Factor,
): bigint {
  const c = shift(cut);
  let sum = tail;
  for (let high = m; high > 0; ) {
    // A group low < i <= high whose factors have a product below 2^52.
    let product = 1;
    let low = high;
    let group = 0n;
    while (low > 0 && product * factor(d + low) < 2 ** 52) {
      product *= factor(d + low);
      low--;
      const power = low === 0 ? 1n << shift(bits) : powers[low]! >> c;
      group += power * BigInt(product);
    }
    sum = (sum + group) / BigInt(product);
    high = low;
  }
  return sum;
}

/** z^0 (unused), z, z², ... z^m, each cut down; for |z| < 1/4 the error of each stays under 2 units. */
function powersOf(z: bigint, m: number, work: number): bigint[] {
  const w = shift(work);
  const powers = [1n, z];
  for (let i = 2; i <= m; i++) powers[i] = (powers[i >> 1]! * powers[i - (i >> 1)]!) >> w;
  return powers;
}

/**
 * z + s·z³/3 + z⁵/5 + s·z⁷/7 + ... for a small signed z in units of 2^-w: artanh z for s = 1, atan z for s = −1. Each term errs by under 2 units;
 * it stops at the first power that comes out as 0 or as a lone rounding.
 */
export function oddSeries(z: bigint, w: bigint, s: 1n | -1n): bigint {
  const u = s * ((z * z) >> w);
  let power = z;
  let sum = z;
  for (let n = 3n; ; n += 2n) {
    power = (power * u) >> w;
    if (power === 0n || power === -1n) return sum;
    sum += power / n;
  }
}
