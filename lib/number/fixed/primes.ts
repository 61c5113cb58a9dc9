// Reduction of an argument by logarithms of primes (exp) and by angles of Gaussian primes (sin and cos): instead of tables, short integers take the leading
// 50 to 90 bits away, and they are put back by one short product and one short quotient.
// Source   F. Johansson, Computing elementary functions using multi-prime argument reduction (2022).
import { shift } from "./bits.ts";
import { keptConstants, oddInverse, piFixed } from "./constants.ts";
import {
  ANGLE_ARGUMENTS,
  ANGLE_DENOMINATOR,
  ANGLE_ROWS,
  GAUSSIAN_PRIMES,
  LOG_ARGUMENTS,
  LOG_ROWS,
  PRIMES,
} from "./machin.ts";
import { ANGLE_LEVELS, type Level, LOG_LEVELS } from "./relations.ts";

/** The coefficients of a row have a sum of sizes below 2^33, and each series errs by under 2 units: 2^34 units of 2^-40 are under 1/32. */
const GUARD = 40;

const combined = (row: readonly number[], series: readonly bigint[]): bigint =>
  series.reduce((sum, value, i) => sum + BigInt(row[i]!) * value, 0n);

/** ln p·2^work for the 13 primes, each within 2 units. */
const logs = keptConstants((prec) => {
  const series = LOG_ARGUMENTS.map((x) => oddInverse(BigInt(x), prec + GUARD, 1n));
  return LOG_ROWS.map((row) => combined(row, series) >> BigInt(GUARD));
});

/** The angle of (a + bi)/(a − bi) times 2^work for the 13 Gaussian primes, each within 2 units; the first is π/2. */
const angles = keptConstants((prec) => {
  const right = piFixed(prec + GUARD) >> 1n;
  const series = [...ANGLE_ARGUMENTS.map((x) => oddInverse(BigInt(x), prec + GUARD, -1n)), right];
  const others = ANGLE_ROWS.map((row) => combined(row, series) / (ANGLE_DENOMINATOR << BigInt(GUARD)));
  return [right >> BigInt(GUARD), ...others];
});

/** A number as Σ m_j·c_j + rest, in units of 2^-work. */
interface Reduced {
  readonly exponents: readonly number[];
  /** Right to 2·Σ|m_j| units. */
  readonly rest: bigint;
}

/** Bits in which the exponents are sought. */
const SEARCH = 192;

type Constants = (work: number) => readonly bigint[];

/**
 * Takes Σ m_j·c_j away from 0 <= x < 2^work: level by level the nearest integer vector, by rounding in the basis of the level.
 * Error    any integers m_j would do: only the size of the rest depends on them, and that is looked at. The constants err by 2 units each. A level rounds each
 *          coordinate by at most 1/2, so it adds to Σ|m_j| at most half of the sum of all its |entries|, and the shortest vector with the value x: over all
 *          levels under 2^15 (a test adds the tables up), so the rest is right to 2^16 units.
 */
function reduced(x: bigint, work: number, constants: Constants, levels: readonly Level[], used: number): Reduced {
  const exponents = new Array<number>(PRIMES.length).fill(0);
  const short = constants(SEARCH);
  const lead = x >> shift(work - SEARCH);
  let left = lead;
  for (let level = 0; level < used; level++) {
    addNearest(exponents, Number(left) * 2 ** -SEARCH, levels[level]!);
    if (level + 1 < used) left = without(lead, exponents, short);
  }
  return { exponents, rest: without(x, exponents, constants(work)) };
}

function addNearest(exponents: number[], x: number, { pull, rows }: Level): void {
  const n = exponents.length;
  for (let k = 0; k < n; k++) {
    const times = Math.round(x * pull[k]!);
    if (times !== 0) for (let j = 0; j < n; j++) exponents[j]! += times * rows[k * n + j]!;
  }
}

function without(x: bigint, exponents: readonly number[], constants: readonly bigint[]): bigint {
  let sum = x;
  for (let j = 0; j < exponents.length; j++) sum -= BigInt(exponents[j]!) * constants[j]!;
  return sum;
}

/** e^x = e^rest·2^power·above/below. */
export interface ByPrimes {
  readonly rest: bigint;
  readonly power: number;
  readonly above: bigint;
  readonly below: bigint;
}

/** Reduces 0 <= x < 2^work, an angle in units of 2^-work, to |rest| < 2^(work−15) or less; the rest errs by under 2^16 units. */
export function byPrimes(x: bigint, work: number, used: number): ByPrimes {
  const { exponents, rest } = reduced(x, work, logs, LOG_LEVELS, used);
  let above = 1n;
  let below = 1n;
  for (let j = 1; j < exponents.length; j++) {
    const m = exponents[j]!;
    if (m > 0) above *= BigInt(PRIMES[j]!) ** BigInt(m);
    else if (m < 0) below *= BigInt(PRIMES[j]!) ** BigInt(-m);
  }
  return { rest, power: exponents[0]!, above, below };
}

/** e^ix = e^(i·rest)·i^quadrant·(re + i·im)/norm. */
export interface ByAngles {
  readonly rest: bigint;
  readonly quadrant: number;
  readonly re: bigint;
  readonly im: bigint;
  readonly norm: bigint;
}

/** As `byPrimes`, for angles: with w the product of the Gaussian primes (conjugate ones for negative exponents), w/w̄ = w²/|w|². */
export function byAngles(x: bigint, work: number, used: number): ByAngles {
  const { exponents, rest } = reduced(x, work, angles, ANGLE_LEVELS, used);
  let re = 1n;
  let im = 0n;
  for (let j = 1; j < exponents.length; j++) {
    const m = exponents[j]!;
    if (m === 0) continue;
    const [c, d] = gaussianPower(j, Math.abs(m));
    const b = m < 0 ? -d : d;
    [re, im] = [re * c - im * b, re * b + im * c];
  }
  const norm = re * re + im * im;
  return { rest, quadrant: ((exponents[0]! % 4) + 4) % 4, re: (re - im) * (re + im), im: 2n * re * im, norm };
}

const gaussianPowers: (readonly [bigint, bigint])[][] = GAUSSIAN_PRIMES.map(() => []);

/** (a + bi)^m; the first ones are kept. */
function gaussianPower(j: number, m: number): readonly [bigint, bigint] {
  const known = gaussianPowers[j]![m];
  if (known) return known;
  const [a, b] = GAUSSIAN_PRIMES[j]!;
  let power: readonly [bigint, bigint];
  if (m === 1) power = [BigInt(a), BigInt(b)];
  else {
    const [c, d] = gaussianPower(j, m >> 1);
    const [e, f] = gaussianPower(j, m - (m >> 1));
    power = [c * e - d * f, c * f + d * e];
  }
  if (m <= KEPT_POWERS) gaussianPowers[j]![m] = power;
  return power;
}

const KEPT_POWERS = 128;
