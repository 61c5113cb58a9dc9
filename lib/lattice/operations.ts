// What can be computed of a lattice, as operations that a value records: operands first the lattice, then indices, coordinates or numbers.
// Results that symmetry makes real come as balls.

import { ontoReal } from "../function/enclosure.ts";
import { reducedDiscriminant, reducedJ } from "../function/reduced.ts";
import { LatticePointError, type Wanted } from "../function/weierstrass.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { DIV, MINUS, NEG, TIMES, value } from "../number/operations.ts";
import {
  type At,
  asDisc,
  type Enclosure,
  isNode,
  type Operation,
  refinable,
  refineEnclosure,
} from "../number/origin.ts";
import type { Rational } from "../number/rational.ts";
import { discriminant } from "./build.ts";
import { invariants, periods, quasiPeriods, reduced, roots } from "./context.ts";
import { latticePointText } from "./coordinates-text.ts";
import type { PeriodLattice } from "./period-lattice.ts";
import { exactRational } from "./quantity.ts";
import { logarithm } from "./real-logarithm.ts";
import {
  DISCRIMINANT_ROUTES,
  functionRoutes,
  INVARIANT_ROUTES,
  J_ROUTES,
  LOGARITHM_ROUTES,
  POINT_ROUTES,
  QUASI_PERIOD_ROUTES,
  ROOT_ROUTES,
} from "./routes.ts";
import { pointAt, valuesAtPoint } from "./torus.ts";
import { weierstrassValues } from "./values.ts";

function real(d: Disc): Enclosure {
  return d.axis === "real" ? disc.along(d) : d;
}

/** An operation on a lattice and plain operands. */
function operation(
  name: string,
  evaluate: (lattice: PeriodLattice, rest: readonly unknown[], at: At, prec: number) => Disc,
  routes: readonly Operation[] = [],
): Operation {
  return {
    name,
    evaluate: ([lattice, ...rest], at, prec) => real(evaluate(lattice as PeriodLattice, rest, at, prec)),
    routes,
  };
}

/** [lattice, r, s] or [lattice, r, s, number]: r ω1 + s ω2 (+ number). */
export const POINT = operation(
  "point",
  (lattice, [r, s, rest], at, prec) => {
    const point = pointAt(lattice, [r as Rational, s as Rational], prec + 8);
    return rest === undefined ? point : disc.add(point, asDisc(at(rest)), prec);
  },
  POINT_ROUTES,
);

/** [lattice]: ω2/ω1. */
export const TAU = operation("period ratio", (lattice, _rest, _at, prec) => {
  const { w1, w2 } = periods(lattice, prec + 8);
  return disc.div(w2, w1, prec);
});

/** [lattice]: the reduced ratio. */
export const REDUCED_TAU = operation("reduced period ratio", (lattice, _rest, _at, prec) => reduced(lattice, prec).tau);

/** [lattice, 2 or 3]: g2, g3. */
export const INVARIANT = operation(
  "invariant",
  (lattice, [index], _at, prec) => {
    const { g2, g3 } = invariants(lattice, prec);
    return index === 2 ? g2 : g3;
  },
  INVARIANT_ROUTES,
);

/** [lattice, 1, 2 or 3]: a root of the cubic by its half-period. */
export const ROOT = operation(
  "root",
  (lattice, [index], _at, prec) => {
    const root = roots(lattice, prec)[(index as number) - 1]!;
    return isRealRoot(lattice, index as 1 | 2 | 3) ? ontoReal(root) : root;
  },
  ROOT_ROUTES,
);

/** Whether conjugation fixes the half-period of the root modulo the lattice. */
export function isRealRoot(lattice: PeriodLattice, index: 1 | 2 | 3): boolean {
  const k = lattice.conjugation;
  if (!k) return false;
  const [x, y] = index === 1 ? [1n, 0n] : index === 2 ? [1n, 1n] : [0n, 1n];
  const moved = [x * k.a11 + y * k.a21 - x, x * k.a12 + y * k.a22 - y];
  return moved.every((n) => (n & 1n) === 0n);
}

/** [lattice, 1 or 2]: η1, η2. */
export const QUASI_PERIOD = operation(
  "quasi-period",
  (lattice, [index], _at, prec) => {
    const eta = quasiPeriods(lattice, prec)[(index as number) - 1]!;
    const w = index === 1 ? periods(lattice, 64).w1 : periods(lattice, 64).w2;
    if (!lattice.conjugation || w.axis === "plane") return eta;
    return w.axis === "real" ? ontoReal(eta) : disc.imaginary(disc.imag(eta));
  },
  QUASI_PERIOD_ROUTES,
);

/** [lattice]: Δ = g2³ − 27 g3². */
export const DISCRIMINANT = operation(
  "discriminant",
  (lattice, _rest, _at, prec) => {
    const { given } = lattice;
    if (given.kind === "invariants" && exactRational(given.g2) && exactRational(given.g3)) {
      return discriminant(given.g2, given.g3, prec);
    }
    const value = reducedDiscriminant(reduced(lattice, prec));
    return lattice.conjugation ? ontoReal(value) : value;
  },
  DISCRIMINANT_ROUTES,
);

/** [lattice]: j. */
export const J = operation(
  "j",
  (lattice, _rest, _at, prec) => {
    const value = reducedJ(reduced(lattice, prec));
    return lattice.conjugation ? ontoReal(value) : value;
  },
  J_ROUTES,
);

/** [lattice]: Im(ω2 conj ω1). */
export const AREA = operation("area", (lattice, _rest, _at, prec) => {
  const { w1, w2 } = periods(lattice, prec + 8);
  return disc.fromBall(disc.imag(disc.mul(w2, disc.conj(w1), prec)));
});

/** [lattice, z, 1 or 2]: a real coordinate of z in the basis. */
export const COORDINATE = operation("coordinate", (lattice, [z, index], at, prec) => {
  const { w1, w2 } = periods(lattice, prec + 8);
  const x = asDisc(at(z));
  const area = disc.imag(disc.mul(w2, disc.conj(w1), prec + 8));
  const part = index === 1 ? disc.mul(w2, disc.conj(x), prec + 8) : disc.mul(x, disc.conj(w1), prec + 8);
  return disc.divBall(disc.fromBall(disc.imag(part)), area, prec);
});

/** [lattice, z]: a Weierstrass function at a number. */
function atNumber(name: string, wanted: Wanted): Operation {
  const evaluate = operation(
    name,
    (lattice, [z], at, prec) =>
      persistent(lattice, name, z, at, prec, (x, bits) => weierstrassValues(lattice, x, bits, [wanted])[wanted]!),
    functionRoutes(wanted, "number"),
  );
  return moving(evaluate, 1, (operands, at, prec) => derivativeOf(wanted, "number", operands, at, prec));
}

/** The operation with its differential, where only the operand of this index moves. */
export function moving(operation: Operation, index: number, slope: Operation["evaluate"]): Operation {
  return {
    ...operation,
    differential: (operands, at, d, prec) => value(TIMES, prec, slope(operands, at, prec), d(operands[index])),
  };
}

/** ℘′, ℘″ = 6℘² − g2/2, −℘ or σζ: the derivative of a Weierstrass function. */
function derivativeOf(
  wanted: Wanted,
  place: "number" | "point",
  operands: readonly unknown[],
  at: At,
  prec: number,
): Enclosure {
  const one = (name: Wanted) => WEIERSTRASS[name][place].evaluate(operands, at, prec);
  if (wanted === "wp") return one("prime");
  if (wanted === "zeta") return value(NEG, prec, one("wp"));
  if (wanted === "sigma") return value(TIMES, prec, one("sigma"), one("zeta"));
  const x = one("wp");
  const halfG2 = value(DIV, prec, real(invariants(operands[0] as PeriodLattice, prec).g2), 2);
  return value(MINUS, prec, value(TIMES, prec, value(TIMES, prec, x, x), 6), halfG2);
}

/** [lattice, r, s] or [lattice, r, s, number]: the same at r ω1 + s ω2 (+ number). */
function atPoint(name: string, wanted: Wanted): Operation {
  const evaluate = operation(
    name,
    (lattice, [r, s, rest], at, prec) => {
      const where = [r as Rational, s as Rational] as const;
      if (rest === undefined) return valuesAtPoint(lattice, where, undefined, prec, [wanted])[wanted]!;
      return persistent(
        lattice,
        name,
        rest,
        at,
        prec,
        (x, bits) => valuesAtPoint(lattice, where, x, bits, [wanted])[wanted]!,
      );
    },
    functionRoutes(wanted, "point"),
  );
  return moving(evaluate, 3, (operands, at, prec) => derivativeOf(wanted, "point", operands, at, prec));
}

/** Tries again with more bits of the argument where a pole cannot be told from it. */
export function persistent(
  lattice: PeriodLattice,
  name: string,
  z: unknown,
  at: At,
  prec: number,
  evaluate: (z: Disc, bits: number) => Disc,
): Disc {
  let x = asDisc(at(z));
  for (let bits = prec; ; bits *= 2) {
    try {
      return evaluate(x, bits);
    } catch (error) {
      if (!(error instanceof LatticePointError)) throw error;
      if (!isNode(z) || !refinable(z) || bits > 8 * prec + 4096) throw named(lattice, error, name);
      x = asDisc(refineEnclosure(z, 2 * bits));
    }
  }
}

/** The pole in coordinates of the own basis. */
function named(lattice: PeriodLattice, { m1, m2 }: LatticePointError, name: string): LatticePointError {
  const { a, b, c, d } = lattice.toReduced;
  const [m, n] = [m1 * d + m2 * b, m1 * c + m2 * a];
  return new LatticePointError(m, n, latticePointText(m, n), name);
}

/** The operations of each Weierstrass function: at a number, and at a point with exact coordinates. */
export const WEIERSTRASS: Readonly<Record<Wanted, { readonly number: Operation; readonly point: Operation }>> = {
  wp: { number: atNumber("wp", "wp"), point: atPoint("wp", "wp") },
  prime: { number: atNumber("wp.prime", "prime"), point: atPoint("wp.prime", "prime") },
  zeta: { number: atNumber("zeta", "zeta"), point: atPoint("zeta", "zeta") },
  sigma: { number: atNumber("sigma", "sigma"), point: atPoint("sigma", "sigma") },
};

/** [lattice, x, y]: z with ℘(z) = x, ℘′(z) = y. */
export const LOGARITHM = operation(
  "elliptic logarithm",
  (lattice, [x, y], at, prec) => logarithm(lattice, { x: asDisc(at(x)), y: asDisc(at(y)) }, prec),
  LOGARITHM_ROUTES,
);
