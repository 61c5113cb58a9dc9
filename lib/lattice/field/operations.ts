// Values of elliptic functions, their zeros and their series, as operations that a value records.

import type { Disc } from "../../number/disc.ts";
import * as disc from "../../number/disc.ts";
import { type At, asDisc, type Enclosure, type NumberStanding, type Operation } from "../../number/origin.ts";
import type { Rational } from "../../number/rational.ts";
import { PoleError } from "../../proof/errors.ts";
import { invariants } from "../context.ts";
import { moving, persistent } from "../operations.ts";
import type { PeriodLattice } from "../period-lattice.ts";
import { standingOf } from "../quantity.ts";
import { functionRoutes } from "../routes.ts";
import { type Coordinates, valuesAtPoint } from "../torus.ts";
import { weierstrassValues } from "../values.ts";
import { discField } from "./disc-field.ts";
import { coordinatesOf, type DivisorPoint, placeOf } from "./divisor.ts";
import { deriveElement, type Element } from "./element.ts";
import { polynomialDisc, scalarDisc, valueAt } from "./evaluate.ts";
import { type Condition, discSize, numerator, productOfLinear } from "./interpolation.ts";
import { type Parts, seriesAtOrigin, seriesAtPoint } from "./laurent.ts";
import { hornerDisc } from "./polynomial-roots.ts";
import type { Constants, Scalar } from "./scalar.ts";

/** An element with its standing, as an operand. */
export interface Expression {
  readonly element: Element;
  readonly standing: NumberStanding;
}

export function expressionOf(element: Element): Expression {
  const all = [element.field.lattice.standing, ...[...element.constants.values()].map(standingOf)];
  const standing = all.includes("double") ? "double" : all.includes("measured") ? "measured" : "defined";
  return { element, standing };
}

function real(d: Disc): Enclosure {
  return d.axis === "real" ? disc.along(d) : d;
}

function operation(
  name: string,
  evaluate: (element: Element, rest: readonly unknown[], at: At, prec: number) => Disc,
  routes: readonly Operation[] = [],
): Operation {
  return {
    name,
    evaluate: ([e, ...rest], at, prec) => real(evaluate((e as Expression).element, rest, at, prec)),
    routes,
  };
}

const PAIR = ["wp", "prime"] as const;

/** The function of ℘ and ℘′ by sums over rows. */
function byRows(place: "number" | "point"): readonly Operation[] {
  const [first, second] = PAIR.map((wanted) => functionRoutes(wanted, place)[0]!) as [Operation, Operation];
  return [
    operation("℘ and ℘′ by sums over rows", (f, rest, at, prec) => {
      const value = (by: Operation) => asDisc(by.evaluate([f.field.lattice, ...rest], at, prec + 16));
      return valueAt(f, value(first), value(second), prec);
    }),
  ];
}

/** [expression, z]. */
export const VALUE: Operation = moving(
  operation(
    "elliptic function",
    (f, [z], at, prec) =>
      persistent(f.field.lattice, "elliptic function", z, at, prec, (x, bits) => {
        const { wp, prime } = weierstrassValues(f.field.lattice, x, bits + 16, PAIR);
        return valueAt(f, wp!, prime!, bits);
      }),
    byRows("number"),
  ),
  1,
  ([f, ...place], at, prec) => VALUE.evaluate([derived(f), ...place], at, prec),
);

const derivatives = new WeakMap<object, Expression>();

function derived(f: unknown): Expression {
  const expression = f as Expression;
  const known = derivatives.get(expression) ?? expressionOf(deriveElement(expression.element));
  derivatives.set(expression, known);
  return known;
}

/** [expression, r, s] or [expression, r, s, number]. */
export const VALUE_AT_POINT: Operation = moving(
  operation(
    "elliptic function",
    (f, [r, s, rest], at, prec) => {
      const where = [r as Rational, s as Rational] as const;
      const evaluate = (x: Disc | undefined, bits: number) => {
        const { wp, prime } = valuesAtPoint(f.field.lattice, where, x, bits + 16, PAIR);
        return valueAt(f, wp!, prime!, bits);
      };
      if (rest === undefined) return evaluate(undefined, prec);
      return persistent(f.field.lattice, "elliptic function", rest, at, prec, evaluate);
    },
    byRows("point"),
  ),
  3,
  ([f, ...place], at, prec) => VALUE_AT_POINT.evaluate([derived(f), ...place], at, prec),
);

/** [expression, divisor point]: its place in the plane. */
export const PLACE = operation("zero or pole", (_f, [point], _at, prec) => placeOf(point as DivisorPoint, prec));

/** [expression, scalar]: a named constant. */
export const CONSTANT = operation("constant", (f, [s], _at, prec) =>
  scalarDisc(f.field.lattice, f.constants as Constants, s as Scalar, prec),
);

/** Where a series is taken: at the lattice points, at a known zero or pole, at a half-period or at a number. */
export type Centre =
  | { readonly kind: "origin" }
  | { readonly kind: "divisor"; readonly point: DivisorPoint; readonly zeros: number; readonly poles: number }
  | {
      readonly kind: "point";
      readonly r: Rational;
      readonly s: Rational;
      readonly zeros: number;
      readonly poles: number;
    }
  | { readonly kind: "number"; readonly zeros: number; readonly poles: number };

/** [expression, centre, k] or [expression, centre, k, number]: coefficient number k from the leading one. */
export const COEFFICIENT = operation("series coefficient", (f, [centre, k, number], at, prec) => {
  const index = k as number;
  const wp = prec + 32 + 4 * index;
  const F = discField(wp);
  const { g2, g3 } = invariants(f.field.lattice, wp);
  const poly = (p: Element["A"]) => polynomialDisc(f, p, wp);
  const parts: Parts<Disc> = { A: poly(f.A), B: poly(f.B), D: poly(f.D), g2, g3 };
  const c = centre as Centre;
  if (c.kind === "origin") return disc.round(seriesAtOrigin(F, parts, index + 1).coefficients[index]!, prec);
  const { x, y } = centreValues(f, c, number === undefined ? undefined : asDisc(at(number)), wp);
  const { zeros, poles } = c;
  if (poles === 0 && disc.containsZero(hornerDisc(parts.D, x, wp))) {
    throw new PoleError({
      subject: "laurent",
      given: "a point that is, or cannot be told from, a pole",
      expected: "a point from f.poles, whose multiplicity is known, or one away from the poles",
      argument: "p",
    });
  }
  return disc.round(seriesAtPoint(F, parts, x, y, zeros, poles, index + 1).coefficients[index]!, prec);
});

function centreValues(f: Element, c: Centre, number: Disc | undefined, wp: number): { x: Disc; y: Disc } {
  if (c.kind === "divisor") return coordinatesOf(c.point, wp);
  const values =
    c.kind === "point"
      ? valuesAtPoint(f.field.lattice, [c.r, c.s], number, wp, PAIR)
      : weierstrassValues(f.field.lattice, number!, wp, PAIR);
  return { x: values.wp!, y: values.prime! };
}

/** Zeros and poles by coordinates, as operands of the operations below; a remainder is an operand of its own, by index. */
export interface DivisorData {
  readonly lattice: PeriodLattice;
  readonly standing: NumberStanding;
  readonly points: readonly {
    readonly at: Coordinates;
    /** Index of the remainder among the operands that follow, if there is one. */
    readonly rest?: number;
    readonly multiplicity: number;
  }[];
}

function pointsOf(data: DivisorData, rest: readonly unknown[], at: At, wp: number): Condition<Disc>[] {
  return data.points.map((p) => {
    const number = p.rest === undefined ? undefined : asDisc(at(rest[p.rest]));
    const { wp: x, prime: y } = valuesAtPoint(data.lattice, p.at, number, wp, PAIR);
    return { x: x!, y: y!, multiplicity: p.multiplicity };
  });
}

function divisorOperation(
  name: string,
  evaluate: (data: DivisorData, index: number, points: readonly Condition<Disc>[], wp: number) => Disc,
): Operation {
  return {
    name,
    evaluate: ([data, index, ...rest], at, prec) => {
      const wp = prec + 64;
      const points = pointsOf(data as DivisorData, rest, at, wp);
      return real(disc.round(evaluate(data as DivisorData, index as number, points, wp), prec));
    },
  };
}

/** [divisor data, k, numbers...]: coefficient k of A, or of B for k < 0 (index −1 − k), of the numerator with these zeros. */
export const NUMERATOR = divisorOperation("numerator", (data, index, points, wp) => {
  const n = points.reduce((sum, { multiplicity }) => sum + multiplicity, 0);
  const { g2 } = invariants(data.lattice, wp);
  const { A, B } = numerator(discField(wp), g2, n, points, discSize);
  return index >= 0 ? A[index]! : B[-1 - index]!;
});

/** [divisor data, k, numbers...]: coefficient k of Π (X − ℘(p)). */
export const DENOMINATOR = divisorOperation("denominator", (_data, index, points, wp) => {
  const roots = points.flatMap(({ x, multiplicity }) => new Array<Disc>(multiplicity).fill(x));
  return productOfLinear(discField(wp), roots)[index]!;
});
