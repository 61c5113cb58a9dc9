// A curve of genus one as it is written: homogeneous equations in a projective space, with weights for y² = quartic.

import type { Field } from "../../algebra/field.ts";
import { solve } from "../../algebra/linear.ts";
import { derivative, evaluate, evaluateIn, type Polynomial } from "../../algebra/multivariate.ts";
import { constantSeries, type Series, seriesRing } from "../../algebra/series.ts";

export type ModelKind = "weierstrass" | "cubic" | "quartic" | "quadrics";

/** Equations, each homogeneous for the weights, of a smooth curve of genus one. */
export interface Model<T> {
  readonly kind: ModelKind;
  readonly field: Field<T>;
  readonly variables: readonly string[];
  /** 1 for each letter, except 2 for y of y² = quartic(x, z). */
  readonly weights: readonly number[];
  readonly equations: readonly Polynomial<T>[];
  /** The letters as polynomials in those the equation was written with, where that is not leaving one out by 1. */
  readonly affine?: readonly Polynomial<T>[];
  /** A point of a curve with two equations, at whose branch it is read whether a form vanishes on the curve. */
  readonly base?: Coordinates<T>;
}

/** Projective coordinates, one a letter, not all zero. */
export type Coordinates<T> = readonly T[];

export function onModel<T>(model: Model<T>, P: Coordinates<T>): boolean {
  return model.equations.every((f) => model.field.isZero(evaluate(model.field, f, P)));
}

/** The same point with its last nonzero coordinate of weight one equal to 1. */
export function normalise<T>(model: Model<T>, P: Coordinates<T>): Coordinates<T> {
  const k = chartOf(model, P);
  return rescale(model, P, model.field.inv(P[k]!));
}

function rescale<T>({ field, weights }: Model<T>, P: Coordinates<T>, factor: T): Coordinates<T> {
  return P.map((c, l) => (weights[l] === 1 ? field.mul(c, factor) : field.mul(c, field.mul(factor, factor))));
}

/** Index of the last nonzero coordinate of weight one: no point of our models has none. */
export function chartOf<T>({ field, weights }: Model<T>, P: Coordinates<T>): number {
  return P.findLastIndex((c, l) => weights[l] === 1 && !field.isZero(c));
}

export function samePlace<T>(model: Model<T>, P: Coordinates<T>, Q: Coordinates<T>): boolean {
  const { field } = model;
  const p = normalise(model, P);
  const q = normalise(model, Q);
  return p.every((c, k) => field.isZero(field.sub(c, q[k]!)));
}

/** Partial derivatives of each equation at a point. */
export function jacobianAt<T>({ field, equations, variables }: Model<T>, P: Coordinates<T>): T[][] {
  return equations.map((f) => variables.map((name) => evaluate(field, derivative(field, f, name), P)));
}

/** A curve near a smooth point: every coordinate as a series in ε, of which one is its value plus ε. */
export interface Branch<T> {
  readonly coordinates: readonly Series<T>[];
  /** The coordinate that is 1, and the one that is its value plus ε. */
  readonly chart: number;
  readonly parameter: number;
}

/**
 * The curve near P to `length` coefficients, or undefined if P is singular.
 *
 * The chart puts one coordinate to 1; another is the parameter, such that the equations can be solved for the rest; each
 * coefficient then solves a linear system with the same Jacobian matrix.
 */
export function branchAt<T>(model: Model<T>, P: Coordinates<T>, length: number): Branch<T> | undefined {
  const { field: F, variables } = model;
  const point = normalise(model, P);
  const chart = chartOf(model, point);
  const jacobian = jacobianAt(model, point);
  const others = variables.map((_, k) => k).filter((k) => k !== chart);
  for (const parameter of others) {
    const unknowns = others.filter((k) => k !== parameter);
    const minor = jacobian.map((row) => unknowns.map((k) => row[k]!));
    const regular = unknowns.every((_, k) =>
      solve(
        F,
        minor,
        unknowns.map((_, l) => (k === l ? F.one : F.zero)),
      ),
    );
    if (regular) return { coordinates: lift(model, point, parameter, unknowns, minor, length), chart, parameter };
  }
  return undefined;
}

function lift<T>(
  { field: F, equations }: Model<T>,
  point: Coordinates<T>,
  parameter: number,
  unknowns: readonly number[],
  minor: readonly (readonly T[])[],
  length: number,
): Series<T>[] {
  const ring = seriesRing(F, length);
  const constant = (c: T) => constantSeries(F, c, length);
  const coordinates = point.map((c) => [...constant(c)]);
  if (length > 1) coordinates[parameter]![1] = F.one;
  for (let order = 1; order < length; order++) {
    const defects = equations.map((f) => F.neg(evaluateIn(f, coordinates, ring, constant)[order]!));
    const step = solve(F, minor, defects)!;
    unknowns.forEach((k, l) => {
      coordinates[k]![order] = step[l]!;
    });
  }
  return coordinates;
}
