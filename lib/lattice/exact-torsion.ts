// ℘ and ℘′ at points of finite order where they are rational, for rational invariants.

import { rationalRoots } from "../algebra/rationalroots.ts";
import type { Univariate } from "../algebra/univariate.ts";
import * as ball from "../number/ball.ts";
import * as disc from "../number/disc.ts";
import { isqrt } from "../number/fixed/isqrt.ts";
import { Rational } from "../number/rational.ts";
import { rationalRoot } from "./exact-roots.ts";
import { divisionPolynomial } from "./field/division.ts";
import { fieldOf } from "./field/element.ts";
import { exactOf } from "./field/scalar.ts";
import type { PeriodLattice } from "./period-lattice.ts";
import { exactRational } from "./quantity.ts";
import { type Coordinates, nearestRepresentative, valuesAtPoint } from "./torus.ts";

/** Mazur's bound: a point with rational coordinates, on this curve or a twist of it, has an order up to this. */
const MOST_ORDER = 12;

export interface RationalPoint {
  readonly x: Rational;
  /** Missing where ℘ is rational and ℘′ is not. */
  readonly y?: Rational;
}

const abscissas = new WeakMap<PeriodLattice, Map<bigint, readonly Rational[]>>();

/**
 * ℘ at r ω1 + s ω2 if it is rational, and ℘′ if that is, too.
 *
 * Method   ℘ of a point of order n is a root of the n-th division polynomial ψ; a rational root r with an enclosure of ℘ around it is
 *          ℘ itself if no other root is as near: |w − r| Σ_{k>=2} |ψ_k| |w − r|^(k−2) < |ψ_1| for the Taylor coefficients ψ_k at r.
 * Domain   rational g2 and g3, points of order 2 to 12; undefined for all others.
 */
export function rationalPoint(lattice: PeriodLattice, at: Coordinates): RationalPoint | undefined {
  const { given } = lattice;
  if (given.kind !== "invariants" || !exactRational(given.g2) || !exactRational(given.g3)) return undefined;
  const where = nearestRepresentative(at);
  const order = orderOf(where);
  if (order < 2n || order > MOST_ORDER) return undefined;
  if (order === 2n) {
    const [first, second] = where.map((q) => !q.isInteger());
    const x = rationalRoot(lattice, first ? (second ? 2 : 1) : 3);
    return x && { x, y: Rational.zero };
  }
  const candidates = rationalAbscissas(lattice, order);
  if (candidates.length === 0) return undefined;
  const f = rationalPolynomial(lattice, order);
  for (let prec = 64; prec <= 4096; prec *= 2) {
    const { wp, prime } = valuesAtPoint(lattice, where, undefined, prec, ["wp", "prime"]);
    const near = candidates.filter((r) => disc.overlaps(wp!, disc.fromRational(r, prec)));
    if (near.length === 0) return undefined;
    const [x] = near;
    if (near.length === 1 && isOnlyRoot(f, x!, wp!)) return withOrdinate(lattice, x!, prime!);
  }
  return undefined;
}

function orderOf([r, s]: Coordinates): bigint {
  let n = r.den;
  while (n % s.den !== 0n) n += r.den;
  return n;
}

function rationalAbscissas(lattice: PeriodLattice, order: bigint): readonly Rational[] {
  let known = abscissas.get(lattice);
  if (!known) {
    known = new Map();
    abscissas.set(lattice, known);
  }
  let list = known.get(order);
  if (!list) {
    list = rationalRoots(rationalPolynomial(lattice, order));
    known.set(order, list);
  }
  return list;
}

/** f_n of division.ts, whose roots are ℘ at the points with nP = 0 but those of order two. */
function rationalPolynomial(lattice: PeriodLattice, order: bigint): Univariate<Rational> {
  return divisionPolynomial(fieldOf(lattice), Number(order)).map((c) => exactOf(c) as Rational);
}

/** Whether the disc, which holds a root of f and r, holds no root but r. */
function isOnlyRoot(f: Univariate<Rational>, r: Rational, where: disc.Disc): boolean {
  const prec = 64;
  const distance = ball.upper(disc.abs(disc.sub(where, disc.fromRational(r, 4096), 4096), prec));
  const size = (q: Rational) => ball.upper(ball.abs(ball.fromRational(q, prec)));
  const [, slope, ...rest] = taylor(f, r);
  const bend = rest.reduceRight((sum, c) => ball.add(ball.mul(sum, distance, prec), size(c), prec), ball.zero);
  return ball.compare(ball.mul(bend, distance, prec), ball.abs(ball.fromRational(slope!, prec))) === -1;
}

/** Coefficients in powers of X − r, by repeated division. */
function taylor(f: Univariate<Rational>, r: Rational): Rational[] {
  const c = [...f];
  for (let start = 0; start < c.length - 1; start++) {
    for (let k = c.length - 2; k >= start; k--) c[k] = c[k]!.plus(c[k + 1]!.times(r));
  }
  return c;
}

/** y = ±√(4x³ − g2 x − g3) if that is rational, with the sign of the enclosure. */
function withOrdinate(lattice: PeriodLattice, x: Rational, prime: disc.Disc): RationalPoint {
  const square = fieldOf(lattice).cubic.reduceRight(
    (sum, c) => sum.times(x).plus(exactOf(c) as Rational),
    Rational.zero,
  );
  const sign = ball.sign(disc.real(prime));
  if (square.sign() < 0 || !sign) return { x };
  const [num, den] = [isqrt(square.num), isqrt(square.den)];
  if (num * num !== square.num || den * den !== square.den) return { x };
  return { x, y: Rational.of(sign === 1 ? num : -num, den) };
}
