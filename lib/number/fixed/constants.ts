// Constants in fixed point, kept at the highest precision met. A cache is one object that is assigned when complete.
import { shift } from "./bits.ts";
import { boundedCache } from "./cache.ts";
import { sqrtNear } from "./isqrt.ts";

interface Kept {
  readonly prec: number;
  readonly value: bigint;
}

/** value(prec) = c·2^prec with an error under 2 units, from a routine with an error under 1 unit. */
export function keptConstant(compute: (prec: number) => bigint): (prec: number) => bigint {
  let kept: Kept = { prec: -1, value: 0n };
  return (prec) => {
    if (kept.prec < prec) {
      const enough = prec + 64 + (prec >> 4);
      kept = { prec: enough, value: compute(enough) };
    }
    return kept.value >> shift(kept.prec - prec);
  };
}

/** The same for several constants that share their series; the lists for a few precisions are kept, since cutting them costs as much as a product. */
export function keptConstants(compute: (prec: number) => readonly bigint[]): (prec: number) => readonly bigint[] {
  let kept: { readonly prec: number; readonly values: readonly bigint[] } = { prec: -1, values: [] };
  return boundedCache(8, (prec) => {
    if (kept.prec < prec) {
      const enough = prec + 64 + (prec >> 4);
      kept = { prec: enough, values: compute(enough) };
    }
    return kept.values.map((value) => value >> shift(kept.prec - prec));
  });
}

/** π·2^prec within 2 units. */
export const piFixed = keptConstant(computePi);
/** ln 2·2^prec within 2 units. */
export const ln2Fixed = keptConstant((prec) => machin(prec, LN2));

/**
 * π by the Chudnovsky series with binary splitting.
 *
 * Error    a term is under 2^-47 of the one before, so N = p/47 + 2 terms leave a tail under 2^-p-47; root and quotient
 *          each err by under 2 units of 2^-p-16 relatively. Together under one unit of 2^-p.
 * Source   D. and G. Chudnovsky (1988): 1/π = 12 Σ (−1)^k (6k)! (13591409 + 545140134 k) / ((3k)! k!³ 640320^(3k+3/2)).
 */
export function computePi(prec: number): bigint {
  const work = prec + 16;
  const { q, t } = chudnovsky(0, Math.floor(work / 47) + 2);
  const root = sqrtNear(10005n << shift(2 * work));
  return ((426880n * root * q) / t) >> 16n;
}

interface Split {
  readonly p: bigint;
  readonly q: bigint;
  readonly t: bigint;
}

function chudnovsky(a: number, b: number): Split {
  if (b - a === 1) {
    if (a === 0) return { p: 1n, q: 1n, t: 13591409n };
    const k = BigInt(a);
    const p = -(6n * k - 5n) * (2n * k - 1n) * (6n * k - 1n);
    return { p, q: 10939058860032000n * k * k * k, t: p * (13591409n + 545140134n * k) };
  }
  const middle = (a + b) >> 1;
  const left = chudnovsky(a, middle);
  const right = chudnovsky(middle, b);
  return { p: left.p * right.p, q: left.q * right.q, t: left.t * right.q + left.p * right.t };
}

/** ln 2 = 18 artanh(1/26) − 2 artanh(1/4801) + 8 artanh(1/8749). */
const LN2: readonly (readonly [bigint, bigint])[] = [
  [18n, 26n],
  [-2n, 4801n],
  [8n, 8749n],
];

/** Σ c·artanh(1/x)·2^prec over pairs [c, x], error under one unit. */
export function machin(prec: number, terms: readonly (readonly [bigint, bigint])[]): bigint {
  let sum = 0n;
  for (const [c, x] of terms) sum += c * oddInverse(x, prec + 24, 1n);
  return sum >> 24n;
}

/**
 * Σ s^k/((2k+1) x^(2k+1))·2^prec for x >= 2: artanh(1/x) for s = 1, atan(1/x) for s = −1; error under 2 units.
 * The tail after N terms is under x^(−2N)/3, with N = prec/(2 log2 x) + 1; one division by binary splitting.
 */
export function oddInverse(x: bigint, prec: number, s: 1n | -1n): bigint {
  const perTerm = 2 * (x.toString(2).length - 1);
  const { q, t } = oddSplit(s * x * x, 0, Math.floor(prec / perTerm) + 2);
  return (t << shift(prec)) / (q * x);
}

// Σ_{a<=k<b} 1/((2k+1) y^(k−a)) = t/q.
function oddSplit(y: bigint, a: number, b: number): { q: bigint; t: bigint; power: bigint } {
  if (b - a === 1) return { q: BigInt(2 * a + 1), t: 1n, power: y };
  const middle = (a + b) >> 1;
  const left = oddSplit(y, a, middle);
  const right = oddSplit(y, middle, b);
  // t/q = left + right/y^(middle−a)
  return {
    q: left.q * right.q * left.power,
    t: left.t * right.q * left.power + left.q * right.t,
    power: left.power * right.power,
  };
}
