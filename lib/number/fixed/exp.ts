// exp in fixed point: arguments in [0, 1), results with an error under one unit.
import { bitLength, shift } from "./bits.ts";

/**
 * exp(x/2^prec)·2^prec for 0 <= x < 2^prec.
 *
 * Method   x/2^k, Taylor series in √N columns, k squarings.
 * Error    under 1 unit: with g = k + 2·log2(N) + 6 guard bits the series errs by at most 4N + 2m + 4 guard units (see
 *          `taylor`), each squaring doubles the relative error and adds a unit, so at most 2^k·(4N + 2m + 6)·e <= 2^g.
 * Source   D. M. Smith, Efficient multiple-precision evaluation of elementary functions, Math. Comp. 52 (1989), 131-134.
 */
export function expFixed(x: bigint, prec: number): bigint {
  const k = halvings(prec);
  const guard = k + 2 * bitLength(BigInt(prec)) + 8;
  const work = prec + guard;
  let y = expTaylor((x << shift(guard)) >> shift(k), work, k);
  for (let j = 0; j < k; j++) y = (y * y) >> shift(work);
  return y >> shift(guard);
}

/** Halvings that balance squarings and terms; measured: 1.1·p^(1/3)·... grows as the square root for short numbers. */
function halvings(prec: number): number {
  return Math.max(4, Math.round(1.1 * Math.sqrt(prec) * 0.5));
}

/** Terms that are needed for |t| < 2^-k: the first N with N·k + log2 N! > prec. */
function terms(prec: number, k: number): number {
  let n = 1;
  for (let reached = k; reached < prec + 2; n++) reached += k + bitLength(BigInt(n)) - 1;
  return n;
}

/**
 * Σ t^n/n! for 0 <= t < 2^(work−k), k >= 2.
 * Error    below 4N + 2m + 4 units: each running term is cut by under a unit and then divided, so it errs by under 2; there are
 *          N of them, weighted by t^i with Σ t^i < 4/3; each power errs by under 2 and meets a factor below 2; the tail of
 *          terms that came out as 0 is under 4 units.
 */
function expTaylor(t: bigint, work: number, k: number): bigint {
  const columns = Math.max(1, Math.round(Math.sqrt(terms(work, k))));
  const w = shift(work);
  const powers = powersOf(t, columns, w);
  const sums: bigint[] = new Array(columns).fill(0n);
  const step = powers[columns]!;
  let a = 1n << w;
  for (let n = 0; a > 0n; ) {
    for (let i = 0; i < columns; i++) {
      sums[i] = sums[i]! + a;
      n++;
      a /= BigInt(n);
    }
    a = (a * step) >> w;
  }
  let y = 0n;
  for (let i = columns - 1; i > 0; i--) y += sums[i]! * powers[i]!;
  return (y >> w) + sums[0]!;
}

/** t^0 (unused), t, t², ... t^m in fixed point, each cut down; the error of each stays under 2 units for t < 1/2. */
export function powersOf(t: bigint, m: number, w: bigint): bigint[] {
  const powers = [1n, t];
  for (let i = 2; i <= m; i++) powers[i] = (powers[i - 1]! * t) >> w;
  return powers;
}
