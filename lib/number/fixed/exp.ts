// exp in fixed point: arguments in [0, 1), results with an error under two units.
import { bitLength, pow2, scaled, shift } from "./bits.ts";
import { boundedCache } from "./cache.ts";
import { sqrtNear } from "./isqrt.ts";
import { byPrimes } from "./primes.ts";
import { EXP_FACTOR, factorialSum, SIN_FACTOR } from "./series.ts";

/**
 * exp(x/2^prec)·2^prec for 0 <= x < 2^prec.
 *
 * Method   short: leading bits of x by table, six at a time, then the series. Long: reduction by logarithms of primes, the series of sinh, and a root.
 * Error    under 2 units: one of the last cut, and less than one of the two routines.
 * Source   D. M. Smith, Efficient multiple-precision evaluation of elementary functions, Math. Comp. 52 (1989), 131-134; primes.ts.
 */
export function expFixed(x: bigint, prec: number): bigint {
  return prec < PRIMES_FROM ? byTables(x, prec) : reducedByPrimes(x, prec);
}

/** From here on short integers cost less than tables (measured). */
const PRIMES_FROM = 1300;

/** Levels of the reduction: each leaves 18 bits less of the argument, and makes the integers 2.9 times as long (measured). */
function primeLevels(prec: number): number {
  return prec < 2500 ? 2 : prec < 5000 ? 3 : prec < 25_000 ? 4 : 5;
}

/**
 * e^rest by the series of sinh, then the primes.
 * Error    the rest errs by under 2^16 units and moves e^rest < 1.01 by as much; the series and the root add under 16 + 16√N + 4 < 2^14 for N < 2^18. The
 *          factor above/below·2^power is under e·1.01: in all under 2^18.5, and 20 guard bits hold it.
 */
function reducedByPrimes(x: bigint, prec: number): bigint {
  const work = (prec + 20 + 63) & ~63;
  const { rest, power, above, below } = byPrimes(x << shift(work - prec), work, primeLevels(prec));
  const y = byRoot(rest, work, work - bitLength(rest, work));
  return scaled(y * above, power + prec - work) / below;
}

/** Bits a level. */
const STEP = 6;

/** Levels that balance a product each against the terms they save (measured). */
function levelsFor(prec: number): number {
  return prec < 100 ? 2 : prec < 800 ? 3 : 4;
}

/**
 * With tables of exp(j/64^l): at most 4 factors.
 * Error    a table value errs by under 128 units relatively (see `entry`), a product by one more, the series by under 16 + 16√N < 500 units;
 *          12 guard bits hold 4·130 + 500 and the factor e of the result.
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
    const j = Math.floor(lead / pow2(STEP * (levels - level))) % 64;
    if (j === 0) continue;
    const e = entry(tables, level, j);
    y = used === 0 ? e : (y * e) >> w;
    used++;
  }
  const t = BigInt.asUintN(work - STEP * levels, full);
  const sum = factorialSum(t, work, STEP * levels, EXP_FACTOR);
  return (used === 0 ? sum : (y * sum) >> w) >> shift(work - prec);
}

/** exp t = s + √(1 + s²) for s = sinh t, whose series has half of the terms; for |t| < 2^(work−r) the error of the root is a fraction of that of s. */
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
