// Lattices beside a lattice: with rational coordinates in its basis, so inside, around or across it.

import { Rational } from "../number/rational.ts";
import { DomainError } from "../proof/errors.ts";
import { canonicalOnLadder } from "./build.ts";
import { periods } from "./context.ts";
import { exactFormOf } from "./exact-form.ts";
import type { Conjugation, PeriodLattice, RationalRows } from "./period-lattice.ts";

export type Rows = RationalRows;

/**
 * The lattice with the basis rows·(ω1, ω2), turned to positive orientation by exchanging the rows if necessary.
 * Throws   DomainError for dependent rows.
 */
export function latticeInCoordinates(base: PeriodLattice, rows: Rows): PeriodLattice {
  const det = determinant(rows);
  if (det.sign() === 0) {
    throw new DomainError({
      subject: "lattice",
      given: "two points whose coordinates are proportional",
      expected: "two independent points",
    });
  }
  const positive: Rows = det.sign() > 0 ? rows : [rows[1], rows[0]];
  const given = { kind: "points", base, rows: positive } as const;
  const conjugation = carried(base.conjugation, positive);
  const lattice: PeriodLattice = {
    given,
    standing: base.standing,
    toReduced: { a: 1n, b: 0n, c: 0n, d: 1n },
    boundary: "inside",
  };
  const canonical = canonicalOnLadder((prec) => periods(lattice, prec), conjugation !== undefined, exactFormOf(given));
  const components = conjugation && (isIdentityModulo2(conjugation) ? 2 : 1);
  return { ...lattice, ...canonical, ...(conjugation && components ? { conjugation, components } : {}) };
}

export function determinant([[a, b], [c, d]]: Rows): Rational {
  return a.times(d).minus(b.times(c));
}

/** R K R^−1 for the action K of conjugation on the base, if it is integral. */
function carried(k: Conjugation | undefined, rows: Rows): Conjugation | undefined {
  if (!k) return undefined;
  const [[a, b], [c, d]] = rows;
  const det = determinant(rows);
  const moved = ([x, y]: readonly [Rational, Rational]) =>
    [x.times(k.a11).plus(y.times(k.a21)), x.times(k.a12).plus(y.times(k.a22))] as const;
  // Coordinates of a vector (u, v) of the base's plane in the new basis.
  const inNew = ([u, v]: readonly [Rational, Rational]) =>
    [u.times(d).minus(v.times(c)).div(det), v.times(a).minus(u.times(b)).div(det)] as const;
  const [[p, q], [r, s]] = [inNew(moved([a, b])), inNew(moved([c, d]))];
  if (![p, q, r, s].every((x) => x.isInteger())) return undefined;
  return { a11: p.num, a12: q.num, a21: r.num, a22: s.num };
}

function isIdentityModulo2({ a11, a12, a21, a22 }: Conjugation): boolean {
  return Boolean(a11 & 1n && a22 & 1n && !(a12 & 1n) && !(a21 & 1n));
}

/**
 * A basis of the lattice that Z² and the given rational vectors generate: Hermite form of the rows over a common denominator.
 */
export function generatedRows(vectors: readonly (readonly [Rational, Rational])[]): Rows {
  const one = Rational.one;
  const zero = Rational.zero;
  const all = [[one, zero] as const, [zero, one] as const, ...vectors];
  const den = all.reduce((d, [x, y]) => lcm(lcm(d, x.den), y.den), 1n);
  let rows = all.map(([x, y]) => [(x.num * den) / x.den, (y.num * den) / y.den] as [bigint, bigint]);
  const first = pivot(rows, 0);
  rows = rows.filter((row) => row !== first && (row[0] !== 0n || row[1] !== 0n));
  const second = pivot(rows, 1);
  const [m, n] = [first, second];
  const factor = n[1] === 0n ? 0n : floorDiv(m[1], n[1]);
  const reduced: [bigint, bigint] = [m[0], m[1] - factor * n[1]];
  const rational = ([x, y]: readonly [bigint, bigint]) => [Rational.of(x, den), Rational.of(y, den)] as const;
  return [rational(reduced), rational(n)];
}

/** Clears column k of all rows but one by Euclid's algorithm on rows; that row is returned. */
function pivot(rows: [bigint, bigint][], k: 0 | 1): [bigint, bigint] {
  for (;;) {
    const live = rows.filter((row) => row[k] !== 0n);
    live.sort((x, y) => (abs(x[k]) < abs(y[k]) ? -1 : 1));
    const [least, ...others] = live;
    if (!least) return [0n, 0n];
    if (others.length === 0) {
      if (least[k] < 0n) [least[0], least[1]] = [-least[0], -least[1]];
      return least;
    }
    for (const row of others) {
      const q = floorDiv(row[k], least[k]);
      [row[0], row[1]] = [row[0] - q * least[0], row[1] - q * least[1]];
    }
  }
}

function abs(n: bigint): bigint {
  return n < 0n ? -n : n;
}

function floorDiv(a: bigint, b: bigint): bigint {
  const q = a / b;
  return a < 0n !== b < 0n && q * b !== a ? q - 1n : q;
}

function lcm(a: bigint, b: bigint): bigint {
  let [x, y] = [a, b];
  while (y !== 0n) [x, y] = [y, x % y];
  return (a / x) * b;
}
