// What a figure needs of a curve, whatever form it is written in.

import type { PlaneEquation } from "./fibre.ts";
import type { Mark } from "./marks.ts";
import { derivative, evaluate } from "./polynomial.ts";

export type Plain = readonly [number, number];

/** Marks and lines that a figure gets beside the curve. */
export interface Extras {
  readonly marks: readonly Mark[];
  /** Full lines through two points, and dashed segments between two. */
  readonly lines: readonly (readonly [Plain, Plain])[];
  readonly segments: readonly (readonly [Plain, Plain])[];
  readonly remarks: readonly string[];
}

export const NOTHING: Extras = { marks: [], lines: [], segments: [], remarks: [] };

/** A curve in the plane of a figure; P is the class of its points. */
export interface Subject<P> {
  readonly title: string;
  readonly equation: PlaneEquation;
  readonly axisNames: { readonly x: string; readonly y: string };
  isPoint(value: unknown): value is P;
  same(p: P, q: P): boolean;
  /** Where a point lies in the plane; undefined at infinity. */
  place(point: P): Plain | undefined;
  /** The line through two points of the curve (the tangent if they are the same) and what follows from it. */
  chord(p: P, q: P, name: (point: P, otherwise: string) => string): Extras;
}

/** A second point on the tangent at a point of the curve: along the gradient turned by a right angle. */
export function along(equation: PlaneEquation, [x, y]: Plain): Plain {
  const fx = equation.rows.reduce((sum, row, k) => sum + evaluate(derivative(row), x) * y ** k, 0);
  const fy = equation.rows.reduce((sum, row, k) => sum + (k === 0 ? 0 : k * evaluate(row, x) * y ** (k - 1)), 0);
  const size = Math.hypot(fx, fy) || 1;
  return [x - fy / size, y + fx / size];
}
