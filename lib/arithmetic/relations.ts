// Relations between rational points: found by logarithms and lattice reduction, proved by exact arithmetic and by reduction modulo primes.

import { primeDivisors } from "../algebra/factor.ts";
import { modularInverse, modulo } from "../algebra/integer.ts";
import { primesUpTo } from "../algebra/primes.ts";
import { rationals as Q } from "../algebra/rationals.ts";
import { type Affine, addPoints, multiplyPoint } from "../curve/group.ts";
import { rationalMultiple } from "../curve/multiples.ts";
import { realPlace } from "../curve/uniformisation.ts";
import { invariantsOf } from "../curve/weierstrass.ts";
import { periods } from "../lattice/context.ts";
import type { PeriodLattice } from "../lattice/period-lattice.ts";
import * as ball from "../number/ball.ts";
import * as disc from "../number/disc.ts";
import { gcd, type Rational } from "../number/rational.ts";
import { reducedBasis } from "../number/recognise/reduction.ts";
import { UndecidedError } from "../proof/errors.ts";
import type { RationalPoint } from "./division.ts";
import { type ModCurve, type ModPoint, multiplyMod, pointFrom, reduceModel } from "./group-fp.ts";
import { type IntegerModel, toRationals } from "./minimal.ts";
import { rationalOrder } from "./order.ts";
import { countPoints } from "./order-fp.ts";
import { torsionSubgroup } from "./torsion.ts";

export interface Relations {
  /** A basis of all n with Σ n_k P_k of finite order. */
  readonly basis: readonly (readonly bigint[])[];
  /** The torsion points that the relations give, in the same order. */
  readonly values: readonly Affine<Rational>[];
  /** Indices of points that are independent modulo torsion and generate a subgroup of finite index in what all generate. */
  readonly independent: readonly number[];
  /** The prime l and the primes p with which their images in E(F_p)/l show it; undefined if there are none of infinite order. */
  readonly proof: { readonly l: number; readonly primes: readonly bigint[] } | undefined;
}

/**
 * All relations between points of an integral model, proved complete.
 *
 * Method   logarithms of high precision give candidates by lattice reduction, which exact arithmetic accepts or not. A relation
 *          between the other points could be taken primitive, so it would show in E(F_p)/l for every prime l and all p: independence of
 *          the images for one l, torsion counted in, excludes it.
 * Throws   UndecidedError if neither is found (relations with very large coefficients).
 */
export function relationsBetween(a: IntegerModel, points: readonly RationalPoint[], lattice: PeriodLattice): Relations {
  const curve = toRationals(a);
  const isTorsion = points.map((P) => rationalOrder(curve, P) !== Infinity);
  const free = points.flatMap((_, k) => (isTorsion[k] ? [] : [k]));
  const unit = (k: number) => points.map((_, l) => (k === l ? 1n : 0n));
  const trivial = points.flatMap((_, k) => (isTorsion[k] ? [unit(k)] : []));
  const { found, independent } = oneByOne(a, points, free, lattice);
  const basis = [...trivial, ...found.map((n) => (n.find((c) => c !== 0n)! < 0n ? n.map((c) => -c) : n))];
  const proof =
    independent.length > 0
      ? independenceProof(
          a,
          independent.map((k) => points[k]!),
        )
      : undefined;
  return { basis, values: basis.map((n) => combination(a, points, n)), independent, proof };
}

/** Each point in turn: a relation with the independent ones before it, or it is one of them. So few logarithms stand together. */
function oneByOne(a: IntegerModel, points: readonly RationalPoint[], free: readonly number[], lattice: PeriodLattice) {
  const curve = toRationals(a);
  const independent: number[] = [];
  const rows: bigint[][] = [];
  for (const k of free) {
    const row = candidates(lattice, curve, points, [...independent, k]).find((n) => n[k] !== 0n && holds(a, points, n));
    if (row) rows.push(row);
    else independent.push(k);
  }
  return { found: reducedIfSmall(saturated(rows)), independent };
}

/** Short vectors are easier to read; the reduction is for a handful of them. */
function reducedIfSmall(rows: bigint[][]): bigint[][] {
  return rows.length > 1 && rows.length <= 6 ? reducedBasis(rows).map((row) => [...row]) : rows;
}

function combination(a: IntegerModel, points: readonly RationalPoint[], n: readonly bigint[]): Affine<Rational> {
  const curve = toRationals(a);
  return points.reduce<Affine<Rational>>((sum, P, k) => {
    const factor = n[k]!;
    if (factor === 0n) return sum;
    const torsion = rationalOrder(curve, P) !== Infinity;
    const part = torsion ? multiplyPoint(Q, curve, factor, P) : rationalMultiple(curve, factor, P);
    return addPoints(Q, curve, sum, part);
  }, undefined);
}

/** Coefficients above this are not multiplied out: their points have too many digits. */
const LARGEST_COEFFICIENT = 5000n;

function holds(a: IntegerModel, points: readonly RationalPoint[], n: readonly bigint[]): boolean {
  if (n.some((c) => c > LARGEST_COEFFICIENT || c < -LARGEST_COEFFICIENT)) return false;
  if (!holdsModulo(a, points, n)) return false;
  const sum = combination(a, points, n);
  return !sum || rationalOrder(toRationals(a), sum) !== Infinity;
}

/** A quick refusal: 12·... of the sum modulo a few primes (multiples of all torsion orders are 2520·2). */
function holdsModulo(a: IntegerModel, points: readonly RationalPoint[], n: readonly bigint[]): boolean {
  return goodPrimes(a, 1000, 6).every((p) => {
    const E = reduceModel(a, p);
    const sum = points.reduce<ModPoint>(
      (total, P, k) => addModulo(E, total, multiplyMod(E, n[k]!, reducedPoint(P, p))),
      undefined,
    );
    return multiplyMod(E, 5040n, sum) === undefined;
  });
}

function addModulo(E: ModCurve, P: ModPoint, R: ModPoint): ModPoint {
  const affine = addPoints(fieldOf(E.p), E.a, P, R);
  return affine;
}

/** Arithmetic modulo p on plain integers, enough for the group law. */
function fieldOf(p: bigint) {
  return {
    name: `F_${p}`,
    characteristic: p,
    zero: 0n,
    one: 1n,
    fromInt: (n: bigint) => modulo(n, p),
    add: (x: bigint, y: bigint) => modulo(x + y, p),
    sub: (x: bigint, y: bigint) => modulo(x - y, p),
    mul: (x: bigint, y: bigint) => modulo(x * y, p),
    neg: (x: bigint) => modulo(-x, p),
    inv: (x: bigint) => modularInverse(x, p)!,
    isZero: (x: bigint) => x === 0n,
    sqrt: () => undefined,
    format: String,
  };
}

function reducedPoint([x, y]: RationalPoint, p: bigint): ModPoint {
  const reduce = (q: Rational) => {
    const inverse = modularInverse(q.den, p);
    return inverse === undefined ? undefined : modulo(q.num * inverse, p);
  };
  const [X, Y] = [reduce(x), reduce(y)];
  return X === undefined || Y === undefined ? undefined : [X, Y];
}

function goodPrimes(a: IntegerModel, above: number, count: number): bigint[] {
  const discriminant = invariantsOf(Q, toRationals(a)).discriminant.num;
  return primesUpTo(60_000)
    .filter((p) => p > above && p > 3 && discriminant % BigInt(p) !== 0n)
    .slice(0, count)
    .map(BigInt);
}

/** Digits of the logarithms for each point: coefficients of some ten digits are found. */
const DIGITS = 24;

/** Short vectors n with Σ n_k z_k near a multiple of ω1, for z_k the logarithms of 2P_k, which lie on the component of O. */
function candidates(
  lattice: PeriodLattice,
  curve: ReturnType<typeof toRationals>,
  points: readonly RationalPoint[],
  free: readonly number[],
): bigint[][] {
  if (free.length < 2) return [];
  const digits = DIGITS * (free.length + 1);
  const prec = Math.ceil(digits * 3.33) + 64;
  const shift = invariantsOf(Q, curve).b2.div(12);
  const period = disc.real(periods(lattice, prec).w1);
  const scale = 10n ** BigInt(digits);
  const parts = free.map((k) => {
    const [x, y] = multiplyPoint(Q, curve, 2n, points[k])!;
    const prime = y.times(2).plus(curve[0].times(x)).plus(curve[2]);
    const wp = ball.fromRational(x.plus(shift), prec);
    const place = realPlace(lattice, wp, ball.fromRational(prime, prec), prec);
    const ratio = ball.div(place!.t, period, prec);
    return nearestInteger(ball.mulInt(ratio, scale, prec));
  });
  // All torsion is taken along by the multiple 5040 of the period: 5040·Σ n_k z_k is what vanishes.
  const rows = parts.map((c, k) => [...free.map((_, l) => (k === l ? 1n : 0n)), 5040n * c]);
  const all = reducedBasis([...rows, [...free.map(() => 0n), scale]]);
  return all
    .filter((row) => row.slice(0, -1).some((c) => c !== 0n))
    .map((row) => points.map((_, k) => (free.includes(k) ? row[free.indexOf(k)]! : 0n)));
}

function nearestInteger({ man, exp }: ball.Ball): bigint {
  return exp >= 0 ? man << BigInt(exp) : (man + (1n << BigInt(-exp - 1))) >> BigInt(-exp);
}

/**
 * A basis of all integer vectors in the rational span: a combination of the rows that a prime l divides is divided by it, for the primes
 * in the last coefficients, until none is left.
 */
function saturated(given: readonly (readonly bigint[])[]): bigint[][] {
  const rows = given.map((row) => {
    const content = row.reduce((g, c) => gcd(g, c), 0n);
    return row.map((c) => c / content);
  });
  const primes = new Set(rows.flatMap((row) => primeDivisors(row.findLast((c) => c !== 0n)!)));
  for (const l of primes) {
    for (let c = dependency(rows, l); c; c = dependency(rows, l)) {
      const k = c.findIndex((x) => x !== 0n);
      rows[k] = rows[k]!.map((_, j) => rows.reduce((sum, row, i) => sum + c![i]! * row[j]!, 0n) / l);
    }
  }
  return rows;
}

/** Coefficients modulo l, not all 0, of a combination of the rows that is 0 modulo l. */
function dependency(rows: readonly (readonly bigint[])[], l: bigint): bigint[] | undefined {
  // Each row carries how it was made.
  let rest: { readonly row: bigint[]; readonly made: bigint[] }[] = rows.map((row, k) => ({
    row: row.map((c) => modulo(c, l)),
    made: rows.map((_, i) => (i === k ? 1n : 0n)),
  }));
  for (let j = 0; j < (rows[0]?.length ?? 0); j++) {
    const top = rest.find(({ row }) => row[j] !== 0n);
    if (!top) continue;
    const inverse = modularInverse(top.row[j]!, l)!;
    rest = rest
      .filter((other) => other !== top)
      .map(({ row, made }) => {
        const factor = modulo(row[j]! * inverse, l);
        const less = (x: bigint[], y: bigint[]) => x.map((c, i) => modulo(c - factor * y[i]!, l));
        return { row: less(row, top.row), made: less(made, top.made) };
      });
  }
  return rest[0]?.made;
}

/** An l for which the images of the points in some E(F_p)/l are independent of each other modulo those of the torsion. */
function independenceProof(a: IntegerModel, points: readonly RationalPoint[]) {
  const torsion = torsionSubgroup(a).generators;
  for (const l of [3, 2, 5, 7, 11, 13]) {
    const primes: bigint[] = [];
    const columns: bigint[][] = [];
    for (const p of goodPrimes(a, 3, 400)) {
      const column = imagesModulo(a, p, BigInt(l), [...torsion, ...points]);
      if (!column) continue;
      columns.push(column);
      primes.push(p);
      const all = rankModulo(columns, BigInt(l), torsion.length + points.length);
      const own = rankModulo(columns, BigInt(l), torsion.length);
      if (all - own === points.length) return { l, primes };
      if (primes.length > 12 * (points.length + 2)) break;
    }
  }
  throw new UndecidedError({
    subject: "relations",
    given: "points for which neither a relation nor a proof of independence was found",
    expected: "points with relations of moderate size, or none",
  });
}

/** The images of points under E(F_p) → Z/l, for a cyclic l-part that is not trivial; undefined for others. */
function imagesModulo(a: IntegerModel, p: bigint, l: bigint, points: readonly RationalPoint[]): bigint[] | undefined {
  const count = countPoints(a, p);
  if (count % l !== 0n || (count % (l * l) === 0n && (p - 1n) % l === 0n)) return undefined;
  if (points.some(([x, y]) => x.den % p === 0n || y.den % p === 0n)) return undefined;
  const E = reduceModel(a, p);
  const cofactor = count / l;
  let G: ModPoint;
  for (let x = 1n; !G && x < 40n; x++) G = multiplyMod(E, cofactor, pointFrom(E, x));
  if (!G) return undefined;
  const multiples = new Map<string, bigint>([["O", 0n]]);
  let R: ModPoint = G;
  for (let k = 1n; k < l; k++) {
    multiples.set(R ? R.join() : "O", k);
    R = addModulo(E, R, G);
  }
  const images = points.map((P) => multiplyMod(E, cofactor, reducedPoint(P, p)));
  return images.map((S) => multiples.get(S ? S.join() : "O")!);
}

/** Rank modulo l of the first `width` entries of the rows that the columns make up. */
function rankModulo(columns: readonly (readonly bigint[])[], l: bigint, width: number): number {
  let rows = columns.map((column) => column.slice(0, width));
  let rank = 0;
  for (let k = 0; k < width; k++) {
    const top = rows.find((row) => row[k] !== 0n);
    if (!top) continue;
    rank++;
    const inverse = modularInverse(top[k]!, l)!;
    rows = rows
      .filter((row) => row !== top)
      .map((row) => row.map((c, j) => modulo(c - row[k]! * inverse * top[j]!, l)));
  }
  return rank;
}
