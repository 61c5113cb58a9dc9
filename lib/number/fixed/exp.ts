// exp in fixed point: arguments in [0, 1), results with an error under one unit.
import { bitLength, shift } from "./bits.ts";
import { boundedCache } from "./cache.ts";
import { sqrtNear } from "./isqrt.ts";
import { EXP_FACTOR, factorialSum, SIN_FACTOR } from "./series.ts";

/**
 * exp(x/2^prec)·2^prec for 0 <= x < 2^prec.
 *
 * Method   up to 40,000 bits: leading bits of x by table, six at a time, then the series. Beyond: the leading 24 bits by binary splitting, the rest
 *          halved k times, series, k squarings.
 * Error    under 1 unit; see the two routines.
 * Source   D. M. Smith, Efficient multiple-precision evaluation of elementary functions, Math. Comp. 52 (1989), 131-134.
 */
export function expFixed(x: bigint, prec: number): bigint {
  return prec <= TABLES_UP_TO ? byTables(x, prec) : bySquarings(x, prec);
}

/** The entries that an argument uses cost as much as one or two evaluations to fill; above this their memory does not pay. */
const TABLES_UP_TO = 40_000;

/** Bits a level. */
const STEP = 6;

/** Levels that balance a product each against the terms they save (measured). */
function levelsFor(prec: number): number {
  return prec < 100 ? 2 : prec < 800 ? 3 : prec < 2000 ? 4 : prec < 8000 ? 5 : 7;
}

/**
 * With tables of exp(j/64^l): at most 7 factors.
 * Error    a table value errs by under 128 units relatively (see `entry`), a product by one more, the series by under 16 + 16√N < 500 units;
 *          12 guard bits hold 7·130 + 500 and the factor e of the result.
 */
function byTables(x: bigint, prec: number): bigint {
  const work = (prec + 12 + 63) & ~63;
  const w = shift(work);
  const levels = levelsFor(prec);
  const tables = tablesFor(work);
  const full = x << shift(work - prec);
  let y = 0n;
  let used = 0;
  const lead = Number(full >> shift(work - STEP * levels));
  for (let level = 1; level <= levels; level++) {
    const j = Math.floor(lead / 2 ** (STEP * (levels - level))) % 64;
    if (j === 0) continue;
    const e = entry(tables, level, j);
    y = used === 0 ? e : (y * e) >> w;
    used++;
  }
  const t = BigInt.asUintN(work - STEP * levels, full);
  const sum = prec < ROOT_FROM ? factorialSum(t, work, STEP * levels, EXP_FACTOR) : byRoot(t, work, STEP * levels);
  return (used === 0 ? sum : (y * sum) >> w) >> shift(work - prec);
}

/** From here on a root costs less than half of the series (measured). */
const ROOT_FROM = 8000;

/** exp t = s + √(1 + s²) for s = sinh t, whose series has half of the terms; for 0 <= t < 2^(work−r) the error of the root is a fraction of that of s. */
function byRoot(t: bigint, work: number, r: number): bigint {
  const w = shift(work);
  const s = (t * factorialSum((t * t) >> w, work, 2 * r, SIN_FACTOR)) >> w;
  return s + sqrtNear((1n << shift(2 * work)) + s * s);
}

/** exp(j/64^level) for one working precision, filled as asked for. */
interface Tables {
  readonly work: number;
  readonly values: readonly (bigint | undefined)[][];
}

const tablesFor = boundedCache(8, (work): Tables => ({ work, values: Array.from({ length: 8 }, () => []) }));

/** By halves from exp(1/64^level): the relative errors of the factors add, so that of entry j is under 2j units. */
function entry(tables: Tables, level: number, j: number): bigint {
  const row = tables.values[level]!;
  const known = row[j];
  if (known !== undefined) return known;
  const w = shift(tables.work);
  let value: bigint;
  if (j === 1) value = expOfPower(STEP * level, tables.work);
  else {
    const half = entry(tables, level, j >> 1);
    const other = entry(tables, level, j - (j >> 1));
    value = (half * other) >> w;
  }
  row[j] = value;
  return value;
}

/** exp(2^-k) by shifts and short divisions, with 16 bits to spare: error under 1 unit. */
function expOfPower(k: number, work: number): bigint {
  let term = 1n << shift(work + 16);
  let sum = 0n;
  const s = shift(k);
  for (let n = 1; term > 0n; n++) {
    sum += term;
    term = (term >> s) / shift(n);
  }
  return sum >> 16n;
}

/**
 * With k halvings of what is left below the leading 24 bits, and k squarings.
 * Error    the series errs by under 16 + 16√N units, each squaring doubles the relative error and adds a unit; the leading factor and the last
 *          product add 4: with g = k + log2(N) + 12 guard bits under 1 unit of the result, which is below e.
 */
function bySquarings(x: bigint, prec: number): bigint {
  const k = Math.max(4, Math.round(1.6 * Math.cbrt(prec)) - LEAD);
  const guard = k + bitLength(BigInt(prec)) + 12;
  const work = prec + guard;
  const w = shift(work);
  const lead = x >> shift(prec - LEAD);
  const rest = BigInt.asUintN(prec - LEAD, x) << shift(guard);
  let y = factorialSum(rest >> shift(k), work, LEAD + k, EXP_FACTOR);
  for (let j = 0; j < k; j++) y = (y * y) >> w;
  return ((y * expOfShort(lead, LEAD, work)) >> w) >> shift(guard);
}

const LEAD = 24;

/** exp(a/2^b) for 0 <= a < 2^b by binary splitting: N terms with (a/2^b)^N/N! < 2^-work; error under 3 units. */
function expOfShort(a: bigint, b: number, work: number): bigint {
  if (a === 0n) return 1n << shift(work);
  const size = b - bitLength(a);
  let count = 2;
  for (let reached = size; reached < work + 4; count++) reached += size + bitLength(BigInt(count)) - 1;
  const { t, q } = split(a, b, 0, count);
  return (1n << shift(work)) + (((t << shift(work)) / q) >> shift(b * count));
}

interface Split {
  /** a^(high − low) */
  readonly p: bigint;
  /** (low + 1)...high */
  readonly q: bigint;
  /** Σ over the terms, times q·2^(b·(high − low)). */
  readonly t: bigint;
}

function split(a: bigint, b: number, low: number, high: number): Split {
  if (high - low === 1) return { p: a, q: BigInt(high), t: a };
  const middle = (low + high) >> 1;
  const left = split(a, b, low, middle);
  const right = split(a, b, middle, high);
  return {
    p: left.p * right.p,
    q: left.q * right.q,
    t: ((left.t * right.q) << shift(b * (high - middle))) + left.p * right.t,
  };
}
