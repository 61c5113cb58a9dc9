// The torsion subgroup of E(Q): a bound by reduction, then all points by division polynomials, so the answer is proved.

import { primesUpTo } from "../algebra/primes.ts";
import { rationals as Q } from "../algebra/rationals.ts";
import { divisionPolynomials } from "../curve/division.ts";
import { type Affine, addPoints, orderUpTo, samePoint } from "../curve/group.ts";
import { type Coefficients, invariantsOf } from "../curve/weierstrass.ts";
import { gcd, type Rational } from "../number/rational.ts";
import { countPlainly } from "./count.ts";
import { dividePoint, pointsOfOrder, type RationalPoint } from "./division.ts";
import { type IntegerModel, toRationals } from "./minimal.ts";

/** Reduction modulo p is injective on torsion for odd p of good reduction, so the order divides #E(F_p). */
export interface ReductionCount {
  readonly p: number;
  readonly count: number;
}

export interface TorsionGroup {
  /** [] trivial, [n] cyclic, [2, m] with m even. */
  readonly structure: readonly number[];
  readonly order: number;
  /** One generator for each cyclic factor, in the order of `structure`. */
  readonly generators: readonly RationalPoint[];
  /** All points but O, in the order kP (+ Q). */
  readonly points: readonly RationalPoint[];
  readonly counts: readonly ReductionCount[];
  /** gcd of the counts. */
  readonly bound: number;
  /** Primes that divide the bound but not the order, settled by a division polynomial. */
  readonly settledByDivision: readonly number[];
}

/** No more is gained after this many primes, or once the bound is 1. */
const REDUCTIONS = 6;
const LARGEST_ORDER = 12; // Mazur 1977

/**
 * E(Q)tors of an integral model, with generators and what proves it.
 * Cost     a few counts over small fields; roots of division polynomials only for the primes that divide the bound.
 */
export function torsionSubgroup(a: IntegerModel): TorsionGroup {
  const curve = toRationals(a);
  const counts = reductionCounts(a, curve);
  const bound = counts.reduce((g, { count }) => gcd(g, BigInt(count)), 0n);
  const parts = [2, 3, 5, 7].filter((l) => bound % BigInt(l) === 0n).map((l) => ({ l, points: primaryPart(curve, l) }));
  const points = parts.reduce<Affine<Rational>[]>(
    (all, part) => sums(curve, all, [undefined, ...part.points]),
    [undefined],
  );
  const settledByDivision = parts.filter((part) => part.points.length === 0).map((part) => part.l);
  return { ...arrange(curve, points), counts, bound: Number(bound), settledByDivision };
}

function reductionCounts(a: IntegerModel, curve: Coefficients<Rational>): ReductionCount[] {
  const discriminant = invariantsOf(Q, curve).discriminant.num;
  const counts: ReductionCount[] = [];
  let bound = 0n;
  for (const p of primesUpTo(1000)) {
    if (p === 2 || discriminant % BigInt(p) === 0n) continue;
    const count = countPlainly(a, p);
    counts.push({ p, count });
    bound = gcd(bound, BigInt(count));
    if (bound === 1n || counts.length >= REDUCTIONS) break;
  }
  return counts;
}

/** All points but O of order a power of l: those of order l, then what divides them by l, and again. */
function primaryPart(curve: Coefficients<Rational>, l: number): RationalPoint[] {
  const polynomials = divisionPolynomials(Q, curve);
  let layer = pointsOfOrder(curve, l, polynomials);
  const all = [...layer];
  for (let order = l * l; order <= LARGEST_ORDER && layer.length > 0; order *= l) {
    layer = layer.flatMap((P) => dividePoint(curve, P, l, polynomials));
    all.push(...layer);
  }
  return all;
}

function sums(curve: Coefficients<Rational>, left: readonly Affine<Rational>[], right: readonly Affine<Rational>[]) {
  return left.flatMap((P) => right.map((R) => addPoints(Q, curve, P, R)));
}

/** Structure and generators of a finite subgroup given by its points; the simplest generators are taken. */
function arrange(curve: Coefficients<Rational>, group: readonly Affine<Rational>[]) {
  const order = group.length;
  if (order === 1) return { structure: [], order, generators: [], points: [] };
  const sorted = group.filter((P): P is RationalPoint => P !== undefined).sort(bySize);
  const orders = sorted.map((P) => orderUpTo(Q, curve, P, LARGEST_ORDER)!);
  const exponent = Math.max(...orders);
  const first = sorted[orders.indexOf(exponent)]!;
  const cyclic = multiples(curve, first, exponent);
  const nonzero = (points: readonly Affine<Rational>[]) => points.filter((P): P is RationalPoint => P !== undefined);
  if (exponent === order) return { structure: [order], order, generators: [first], points: nonzero(cyclic) };
  const second = sorted.find((P, k) => orders[k] === 2 && !cyclic.some((R) => samePoint(Q, P, R)))!;
  const coset = cyclic.map((P) => addPoints(Q, curve, P, second));
  return {
    structure: [2, exponent],
    order,
    generators: [second, first],
    points: nonzero([...cyclic, ...coset]),
  };
}

/** P, 2P, ..., nP = O. */
function multiples(curve: Coefficients<Rational>, P: RationalPoint, n: number): Affine<Rational>[] {
  const list: Affine<Rational>[] = [P];
  while (list.length < n) list.push(addPoints(Q, curve, list.at(-1), P));
  return list;
}

/** Small |x| first, then positive x, then the upper y: an order that depends on nothing but the points. */
function bySize(P: RationalPoint, R: RationalPoint): number {
  return P[0].abs().compare(R[0].abs()) || R[0].compare(P[0]) || R[1].compare(P[1]);
}
