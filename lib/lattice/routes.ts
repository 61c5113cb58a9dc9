// Other ways to the values of operations.ts, for those who want a second opinion: none shares its series or its iteration with the first one.

import { carlsonRF } from "../function/carlson-first.ts";
import { nearestInteger } from "../function/enclosure.ts";
import { byLatticeSum } from "../function/lattice-sum.ts";
import { reducedRoots } from "../function/reduced.ts";
import { byRows, invariantsByRows, quasiPeriodsByRows } from "../function/row-sums.ts";
import { combination, type Wanted } from "../function/weierstrass.ts";
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { type At, asDisc, type Operation } from "../number/origin.ts";
import { Rational } from "../number/rational.ts";
import { BranchError, DomainError } from "../proof/errors.ts";
import { matrixBits } from "./canonical.ts";
import { invariants, periods, reduced, roots } from "./context.ts";
import type { PeriodLattice } from "./period-lattice.ts";
import { logarithm } from "./real-logarithm.ts";
import { pointAt } from "./torus.ts";

type Evaluation = (lattice: PeriodLattice, rest: readonly unknown[], at: At, prec: number) => Disc;

function route(name: string, evaluate: Evaluation): Operation {
  return { name, evaluate: ([lattice, ...rest], at, prec) => evaluate(lattice as PeriodLattice, rest, at, prec) };
}

/** Sums over the rows of the lattice, and for ℘ a sum over lattice points with a bounded rest; z as a number or by coordinates. */
export function functionRoutes(wanted: Wanted, place: "number" | "point"): readonly Operation[] {
  const argument = (lattice: PeriodLattice, rest: readonly unknown[], at: At, prec: number): Disc => {
    if (place === "number") return asDisc(at(rest[0]));
    const [r, s, number] = rest as [Rational, Rational, unknown];
    const point = pointAt(lattice, [r, s], prec);
    return number === undefined ? point : disc.add(point, asDisc(at(number)), prec);
  };
  const rows = route("sum over rows", (lattice, rest, at, prec) =>
    byRows(reduced(lattice, prec + 32), argument(lattice, rest, at, prec + 32), prec, wanted),
  );
  if (wanted !== "wp") return [rows];
  const points = route("lattice sum", (lattice, rest, at, prec) =>
    byLatticeSum(
      reduced(lattice, prec + 32),
      invariants(lattice, prec + 32),
      argument(lattice, rest, at, prec + 32),
      prec,
    ),
  );
  return [rows, points];
}

/** g2 and g3 by Lambert series. */
export const INVARIANT_ROUTES: readonly Operation[] = [
  route("Lambert series", (lattice, [index], _at, prec) => {
    const { g2, g3 } = invariantsByRows(reduced(lattice, prec), prec);
    return index === 2 ? g2 : g3;
  }),
];

export const DISCRIMINANT_ROUTES: readonly Operation[] = [
  route("product of η", (lattice, _rest, _at, prec) => invariantsByRows(reduced(lattice, prec), prec).discriminant),
];

export const J_ROUTES: readonly Operation[] = [
  route("Lambert series", (lattice, _rest, _at, prec) => {
    const { g2, discriminant } = invariantsByRows(reduced(lattice, prec), prec);
    return disc.mulInt(disc.div(disc.pow(g2, 3, prec + 8), discriminant, prec + 8), 1728, prec);
  }),
];

export const QUASI_PERIOD_ROUTES: readonly Operation[] = [
  route("Lambert series", (lattice, [index], _at, prec) => {
    const wp = prec + matrixBits(lattice.toReduced) + 8;
    const { a, b, c, d } = lattice.toReduced;
    const { eta1, eta2 } = quasiPeriodsByRows(reduced(lattice, wp), wp);
    return index === 1 ? combination(eta1, eta2, a, -c, prec) : combination(eta1, eta2, -b, d, prec);
  }),
];

/** A root as ℘ at its half-period by theta constants, where the first route solves the cubic. */
export const ROOT_ROUTES: readonly Operation[] = [
  route("sum over rows", (lattice, [index], _at, prec) => {
    const half = Rational.of(1, 2);
    const at = pointAt(lattice, [index === 3 ? Rational.zero : half, index === 1 ? Rational.zero : half], prec + 32);
    return byRows(reduced(lattice, prec + 32), at, prec, "wp");
  }),
  route("theta constants", (lattice, [index], _at, prec) => {
    if (lattice.given.kind !== "invariants" || !lattice.components)
      throw onlyRoute("a root that comes from theta constants");
    const at = reducedRoots(reduced(lattice, prec));
    const { a, b, c, d } = lattice.toReduced;
    const [x, y] = index === 1 ? [a, c] : index === 2 ? [a + b, c + d] : [b, d];
    return x & 1n ? (y & 1n ? at[1] : at[0]) : at[2];
  }),
];

/** ω1 and ω2 of given invariants as 2 RF(0, e_k − e_i, e_k − e_j), up to sign the same full period   (DLMF 19.25.38). */
export const POINT_ROUTES: readonly Operation[] = [
  route("Carlson RF", (lattice, [r, s, rest], _at, prec) => {
    const unit = (q: unknown, n: number) => q instanceof Rational && q.equals(n);
    const index = unit(r, 1) && unit(s, 0) ? 1 : unit(r, 0) && unit(s, 1) ? 3 : undefined;
    if (rest !== undefined || !index || lattice.given.kind !== "invariants")
      throw onlyRoute("a point that is no period of given invariants");
    const wp = prec + 16;
    const e = roots(lattice, wp);
    const [here, ...others] = [e[index - 1]!, ...e.filter((_, k) => k !== index - 1)] as [Disc, Disc, Disc];
    const [x, y] = others.map((other) => disc.sub(here, other, wp)) as [Disc, Disc];
    const value = disc.ldexp(integral(disc.zero, x, y, wp), 1);
    const first = index === 1 ? periods(lattice, 64).w1 : periods(lattice, 64).w2;
    return towards(lattice, value, first, 2, wp);
  }),
];

/** z as RF(x − e1, x − e2, x − e3) with the sign and the representative of the first route   (DLMF 19.25.35). */
export const LOGARITHM_ROUTES: readonly Operation[] = [
  route("Carlson RF", (lattice, [x, y], at, prec) => {
    const wp = prec + 32;
    const point = { x: asDisc(at(x)), y: asDisc(at(y)) };
    const value = byIntegral(lattice, point.x, wp);
    return towards(lattice, value, logarithm(lattice, point, 64), 1, wp);
  }),
];

/** The integral from x, or from x moved by the half-period of e3 and back where the way from x meets a cut. */
function byIntegral(lattice: PeriodLattice, x: Disc, wp: number): Disc {
  const e = roots(lattice, wp);
  const from = (at: Disc) => integral(...(e.map((root) => disc.sub(at, root, wp)) as [Disc, Disc, Disc]), wp);
  try {
    return from(x);
  } catch (error) {
    if (!(error instanceof BranchError || error instanceof DomainError)) throw error;
    const [e1, e2, e3] = e;
    const product = disc.mul(disc.sub(e3, e1, wp), disc.sub(e3, e2, wp), wp);
    const moved = disc.add(e3, disc.div(product, disc.sub(x, e3, wp), wp), wp);
    return disc.sub(from(moved), disc.ldexp(periods(lattice, wp).w2, -1), wp);
  }
}

/** RF with its arguments turned off the cut: RF(λx, λy, λz) = RF(x, y, z)/√λ with λ = −1 or ±i where that is needed. */
function integral(x: Disc, y: Disc, z: Disc, wp: number): Disc {
  const turns: readonly (readonly [(d: Disc) => Disc, Disc])[] = [
    [(d) => d, disc.one],
    [disc.mulI, disc.i],
    [(d) => disc.neg(disc.mulI(d)), disc.neg(disc.i)],
    [disc.neg, disc.neg(disc.one)],
  ];
  let last: unknown;
  for (const [turn, factor] of turns) {
    try {
      return disc.mul(carlsonRF(turn(x), turn(y), turn(z), wp), disc.sqrt(factor, wp), wp);
    } catch (error) {
      if (!(error instanceof BranchError || error instanceof DomainError)) throw error;
      last = error;
    }
  }
  throw last;
}

/** ±value plus a multiple of `step` periods: the one nearest to a first value, which has to be near. */
function towards(lattice: PeriodLattice, value: Disc, first: Disc, step: 1 | 2, wp: number): Disc {
  const { w1, w2 } = periods(lattice, wp);
  const area = disc.imag(disc.mul(w2, disc.conj(w1), 64));
  const candidates = [value, disc.neg(value)].map((z) => {
    const gap = disc.sub(first, z, 64);
    const coordinate = (x: Disc, y: Disc) => {
      const r = ball.div(disc.imag(disc.mul(x, disc.conj(y), 64)), area, 64);
      return BigInt(step) * nearestInteger(ball.div(r, ball.fromInt(step), 64));
    };
    const shift = combination(w1, w2, coordinate(w2, gap), coordinate(gap, w1), wp);
    return disc.isZero(shift) ? z : disc.add(z, shift, wp);
  });
  const [plus, minus] = candidates as [Disc, Disc];
  const distance = (z: Disc) => disc.abs(disc.sub(first, z, 64), 64);
  return ball.compare(distance(plus), distance(minus)) === 1 ? minus : plus;
}

function onlyRoute(given: string): DomainError {
  return new DomainError({
    subject: "secondRoute",
    given,
    expected: "a value that this route leads to",
    argument: "x",
  });
}
