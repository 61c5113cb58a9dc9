// The intersection of two quadrics in space, and a curve of bidegree (2, 2) as one: to Weierstrass form through a point.

import type { Field } from "../../algebra/field.ts";
import { determinant, inverse } from "../../algebra/linear.ts";
import {
  add,
  coefficient,
  fromTerms,
  multiply,
  negate,
  type Polynomial,
  scaleBy,
  substitute,
  subtract,
  unpack,
  variable,
} from "../../algebra/multivariate.ts";
import type { Coefficients } from "../weierstrass.ts";
import { crossProduct, cubicThrough, linearForms } from "./cubic.ts";
import { composeMaps, type FormMap } from "./map.ts";
import type { Coordinates, Model } from "./model.ts";

/** Two quadratic forms in four letters; `affine` gives the letters in those in use, where they are fewer. */
export function quadricsModel<T>(
  F: Field<T>,
  equations: readonly [Polynomial<T>, Polynomial<T>],
  affine?: readonly Polynomial<T>[],
): Model<T> {
  const { variables } = equations[0];
  const model: Model<T> = { kind: "quadrics", field: F, variables, weights: [1, 1, 1, 1], equations };
  return affine ? { ...model, affine } : model;
}

/**
 * A(x)y² + B(x)y + C(x) = 0 with A, B, C of degree at most 2 as two quadrics in (x : y : xy : 1): the closure in P¹ × P¹, smooth also at
 * infinity where the plane curve has two double points.
 */
export function bidegreeModel<T>(F: Field<T>, f: Polynomial<T>): Model<T> {
  const [x, y] = f.variables as [string, string];
  const spare = ["s", "t", "u", "v", "w", "z"].filter((name) => name !== x && name !== y);
  const variables = [x, y, spare[0]!, spare[1]!];
  // x^i y^j as a product of two of the four letters.
  const terms = [...f.terms].map(([key, c]) => {
    const [i, j] = unpack(key, 2) as [number, number];
    const both = Math.min(i, j);
    return [c, [i - both, j - both, both, 2 - Math.max(i, j)]] as const;
  });
  const surface = fromTerms(F, variables, [
    [F.one, [1, 1, 0, 0]],
    [F.neg(F.one), [0, 0, 1, 1]],
  ]);
  const letter = (name: string) => variable(F, f.variables, name);
  const one = fromTerms(F, f.variables, [[F.one, [0, 0]]]);
  const affine = [letter(x), letter(y), multiply(F, letter(x), letter(y)), one];
  return quadricsModel(F, [surface, fromTerms(F, variables, terms)], affine);
}

/** [a, b, c, d, e] of det(x·A + B) for the symmetric matrices of the doubled forms; its invariants are those of the Jacobian. */
export function pencilQuartic<T>(F: Field<T>, [f, g]: readonly [Polynomial<T>, Polynomial<T>]): [T, T, T, T, T] {
  const [A, B] = [symmetricMatrix(F, f), symmetricMatrix(F, g)];
  const rows = A.map((row, i) =>
    row.map((c, j) =>
      fromTerms(
        F,
        ["x"],
        [
          [c, [1]],
          [B[i]![j]!, [0]],
        ],
      ),
    ),
  );
  const det = expanded(F, rows);
  return [4, 3, 2, 1, 0].map((k) => coefficient(F, det, [k])) as [T, T, T, T, T];
}

/** Second derivatives: twice the matrix of the form. */
function symmetricMatrix<T>(F: Field<T>, f: Polynomial<T>): T[][] {
  const n = f.variables.length;
  const unit = (i: number, j: number) => Array.from({ length: n }, (_, k) => (k === i ? 1 : 0) + (k === j ? 1 : 0));
  return Array.from({ length: n }, (_, i) =>
    Array.from({ length: n }, (_, j) => {
      const c = coefficient(F, f, unit(i, j));
      return i === j ? F.add(c, c) : c;
    }),
  );
}

function expanded<T>(F: Field<T>, rows: readonly (readonly Polynomial<T>[])[]): Polynomial<T> {
  const [first, ...rest] = rows;
  if (rest.length === 0) return first![0]!;
  const parts = first!.map((entry, k) => {
    const minor = expanded(
      F,
      rest.map((row) => row.filter((_, l) => l !== k)),
    );
    const term = multiply(F, entry, minor);
    return k % 2 === 0 ? term : negate(F, term);
  });
  return parts.reduce((total, term) => add(F, total, term));
}

export interface QuadricsTransformation<T> {
  readonly a: Coefficients<T>;
  readonly to: FormMap<T>;
  readonly from: FormMap<T>;
  /** The plane cubic that the curve is projected to, in the letters a, b, c, and the point of it that comes from the given one. */
  readonly cubic: Polynomial<T>;
  readonly point: Coordinates<T>;
}

/**
 * The long Weierstrass model of a smooth intersection of two quadrics with the point P taken to O.
 *
 * With P = (0 : 0 : 0 : 1) the forms are dL1 + q1 and dL2 + q2 in (a, b, c, d). The projection from P is an isomorphism onto the plane cubic
 * L1q2 − L2q1 = 0, back by d = −q1/L1 = −q2/L2; P itself goes to the tangent direction L1 = L2 = 0. The cubic is brought to Weierstrass form
 * by that point.
 *
 * Domain   characteristic not 2; the intersection smooth.
 * Source   Cassels, Lectures on Elliptic Curves, chapter 8.
 */
export function quadricsThrough<T>(given: Model<T>, P: Coordinates<T>): QuadricsTransformation<T> {
  const { field: F } = given;
  const model: Model<T> = { ...given, base: P };
  const matrix = basisWith(F, P);
  const letters = ["a", "b", "c", "d"];
  const columns = linearForms(F, matrix, letters);
  const [first, second] = given.equations.map((f) => substitute(F, f, columns)) as [Polynomial<T>, Polynomial<T>];
  const [L1, q1] = splitLast(F, first);
  const [L2, q2] = splitLast(F, second);
  const cubic = subtract(F, multiply(F, L1, q2), multiply(F, L2, q1));
  const plane: Model<T> = {
    kind: "cubic",
    field: F,
    variables: ["a", "b", "c"],
    weights: [1, 1, 1],
    equations: [cubic],
  };
  const line = (f: Polynomial<T>) =>
    [0, 1, 2].map((k) =>
      coefficient(
        F,
        f,
        [0, 1, 2].map((l) => (k === l ? 1 : 0)),
      ),
    );
  const point = crossProduct(F, line(L1), line(L2));
  const through = cubicThrough(plane, point);
  const rows = linearForms(F, inverse(F, matrix)!.slice(0, 3), given.variables);
  const project: FormMap<T> = { from: model, to: plane, forms: rows };
  const [L, q] = L1.terms.size > 0 ? [L1, q1] : [L2, q2];
  const plain = ["a", "b", "c"].map((name) => multiply(F, variable(F, plane.variables, name), L));
  const lifted = [...plain, negate(F, q)];
  const zero = scaleBy(F, F.zero, L);
  const back = matrix.map((row) => row.reduce((total, c, k) => add(F, total, scaleBy(F, c, lifted[k]!)), zero));
  return {
    a: through.a,
    to: composeMaps(project, through.to),
    from: composeMaps(through.from, { from: plane, to: model, forms: back }),
    cubic,
    point,
  };
}

/** A matrix with the last column P, the others unit vectors. */
function basisWith<T>(F: Field<T>, P: Coordinates<T>): T[][] {
  const k = P.findLastIndex((c) => !F.isZero(c));
  const units = [0, 1, 2, 3].filter((l) => l !== k);
  const matrix = P.map((c, row) => [...units.map((l) => (l === row ? F.one : F.zero)), c]);
  if (F.isZero(determinant(F, matrix))) throw new Error("unit vectors and a point outside their span are a basis");
  return matrix;
}

/** d·L + q as [L, q] in (a, b, c); the form has no d² since it vanishes at (0 : 0 : 0 : 1). */
function splitLast<T>(F: Field<T>, f: Polynomial<T>): [Polynomial<T>, Polynomial<T>] {
  const parts: [T, number[]][][] = [[], []];
  for (const [key, c] of f.terms) {
    const exponents = unpack(key, 4);
    parts[exponents[3]!]!.push([c, exponents.slice(0, 3)]);
  }
  const [q, L] = parts.map((list) => fromTerms(F, ["a", "b", "c"], list)) as [Polynomial<T>, Polynomial<T>];
  return [L, q];
}
