// sin and cos in fixed point.
import { bitLength, pow2, shift } from "./bits.ts";
import { boundedCache } from "./cache.ts";
import { sqrtNear } from "./isqrt.ts";
import { byAngles } from "./primes.ts";
import { COS_FACTOR, factorialSum, SIN_FACTOR } from "./series.ts";

export interface SinCosFixed {
  readonly sin: bigint;
  readonly cos: bigint;
}

/**
 * sin and cos of x/2^prec, times 2^prec, for 0 <= x < 2^prec; error of each under 2 units: one of the last cut, and less than one of the two routines.
 *
 * Method   short: leading bits by tables, six at a time, the rest by series. Long: reduction by angles of Gaussian primes, the series of the sine, a root.
 */
export function sinCosFixed(x: bigint, prec: number): SinCosFixed {
  return prec < PRIMES_FROM ? byTables(x, prec) : reducedByAngles(x, prec);
}

/** From here on short integers cost less than tables (measured). */
const PRIMES_FROM = 800;

/** Levels of the reduction, as for exp. */
function angleLevels(prec: number): number {
  return prec < 1200 ? 1 : prec < 3000 ? 2 : prec < 12_000 ? 3 : prec < 25_000 ? 4 : 5;
}

/**
 * sin and cos of the rest, turned by w²/|w|² and a quadrant.
 * Error    the rest errs by under 2^16 units and moves both by no more; the series and the root add under 20 + 16√N < 2^14 for N < 2^18; a turn
 *          multiplies the larger error by at most √2: under 2^17 in all, and 20 guard bits hold it.
 */
function reducedByAngles(x: bigint, prec: number): SinCosFixed {
  const work = (prec + 20 + 63) & ~63;
  const { rest, quadrant, re, im, norm } = byAngles(x << shift(work - prec), work, angleLevels(prec));
  const { sin: s, cos: c } = series(rest, work, work - bitLength(rest, work));
  const down = shift(work - prec);
  const sin = ((s * re + c * im) >> down) / norm;
  const cos = ((c * re - s * im) >> down) / norm;
  if (quadrant === 0) return { sin, cos };
  if (quadrant === 1) return { sin: cos, cos: -sin };
  return quadrant === 2 ? { sin: -sin, cos: -cos } : { sin: -cos, cos: sin };
}

const STEP = 6;

function levelsFor(prec: number): number {
  return prec < 400 ? 2 : 3;
}

/** From here on the root costs less than a second series (measured). */
const ROOT_FROM = 900;

/** sin t and cos t for |t| < 2^(work−r), r >= 2: error under 20 + 16√N units each. */
function series(t: bigint, work: number, r: number): SinCosFixed {
  const w = shift(work);
  const z = -((t * t) >> w);
  const sin = (t * factorialSum(z, work, 2 * r, SIN_FACTOR)) >> w;
  if (work < ROOT_FROM) return { sin, cos: factorialSum(z, work, 2 * r, COS_FACTOR) };
  // cos >= 0.96, so an error of the sine, itself below 1/4, reaches it by less than a third.
  return { sin, cos: sqrtNear((1n << shift(2 * work)) - sin * sin) };
}

/**
 * Error    a table pair errs by under 256 units (see `entry`); a rotation by a pair adds the errors of both and 2 units: with 3 levels and the series
 *          under 3·260 + 500 units, which 12 guard bits hold.
 */
function byTables(x: bigint, prec: number): SinCosFixed {
  const work = (prec + 12 + 63) & ~63;
  const levels = levelsFor(prec);
  const tables = tablesFor(work);
  const full = x << shift(work - prec);
  const lead = Number(full >> shift(work - STEP * levels));
  let y = series(BigInt.asUintN(work - STEP * levels, full), work, STEP * levels);
  for (let level = levels; level > 0; level--) {
    const j = Math.floor(lead / pow2(STEP * (levels - level))) % 64;
    if (j > 0) y = rotated(y, entry(tables, level, j), work);
  }
  const down = shift(work - prec);
  return { sin: y.sin >> down, cos: y.cos >> down };
}

function rotated(x: SinCosFixed, y: SinCosFixed, work: number): SinCosFixed {
  const w = shift(work);
  return { sin: (x.sin * y.cos + x.cos * y.sin) >> w, cos: (x.cos * y.cos - x.sin * y.sin) >> w };
}

interface Tables {
  readonly work: number;
  readonly values: readonly (SinCosFixed | undefined)[][];
}

const tablesFor = boundedCache(8, (work): Tables => ({ work, values: Array.from({ length: 8 }, () => []) }));

/** The angle j/64^level by halves: errors add, so that of entry j is under 4j units. */
function entry(tables: Tables, level: number, j: number): SinCosFixed {
  const row = tables.values[level]!;
  const known = row[j];
  if (known) return known;
  const value =
    j === 1
      ? ofPower(STEP * level, tables.work)
      : rotated(entry(tables, level, j >> 1), entry(tables, level, j - (j >> 1)), tables.work);
  row[j] = value;
  return value;
}

/** sin and cos of 2^-k by shifts and short divisions, with 16 bits to spare: error under 1 unit. */
function ofPower(k: number, work: number): SinCosFixed {
  let term = 1n << shift(work + 16);
  let even = 0n;
  let odd = 0n;
  const s = shift(k);
  for (let n = 0; term > 0n; n++) {
    const signed = n % 4 < 2 ? term : -term;
    if (n % 2 === 0) even += signed;
    else odd += signed;
    term = (term >> s) / shift(n + 1);
  }
  return { sin: odd >> 16n, cos: even >> 16n };
}
