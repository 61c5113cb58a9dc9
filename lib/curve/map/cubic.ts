// A smooth plane cubic with a rational point as a long Weierstrass model, by the chord and tangent at that point.

import type { Field } from "../../algebra/field.ts";
import { determinant, inverse, type Matrix } from "../../algebra/linear.ts";
import {
  add,
  coefficient,
  constant,
  derivative,
  evaluate,
  fromTerms,
  multiply,
  negate,
  type Polynomial,
  scaleBy,
  substitute,
  subtract,
  variable,
} from "../../algebra/multivariate.ts";
import { type LongForm, longForm } from "../equation/longform.ts";
import type { Coefficients } from "../weierstrass.ts";
import type { FormMap } from "./map.ts";
import type { Coordinates, Model } from "./model.ts";
import { weierstrassModel } from "./weierstrassmodel.ts";

/** A birational map there and back, and what the construction went through. */
export interface Transformation<T> {
  readonly a: Coefficients<T>;
  readonly to: FormMap<T>;
  readonly from: FormMap<T>;
  readonly steps: CubicSteps<T>;
}

export interface CubicSteps<T> {
  /** The line au + bv + cw = 0 that touches the cubic at the given point. */
  readonly tangent: readonly [T, T, T];
  /** Where the tangent meets the cubic again; the point itself if it is a flex. */
  readonly third: Coordinates<T>;
  readonly flex: boolean;
}

/** Coefficients of the tangent at P; all zero exactly if P is singular. */
export function tangentAt<T>({ field: F, equations, variables }: Model<T>, P: Coordinates<T>): [T, T, T] {
  const f = equations[0]!;
  return variables.map((name) => evaluate(F, derivative(F, f, name), P)) as [T, T, T];
}

/**
 * The third point of the cubic on the line through P and Q (two different points of it), or on the tangent if P = Q.
 *
 * On the line sP + tR with R = Q, the form is s t (A s + B t); on the tangent with R any other point of it, t²(A s + B t).
 */
export function thirdPoint<T>(model: Model<T>, P: Coordinates<T>, Q: Coordinates<T>): Coordinates<T> {
  const { field: F } = model;
  const samePoint = crossProduct(F, P, Q).every((c) => F.isZero(c));
  const R = samePoint ? otherPointOnLine(F, tangentAt(model, P), P) : Q;
  const line = P.map((p, k) =>
    fromTerms(
      F,
      ["s", "t"],
      [
        [p, [1, 0]],
        [R[k]!, [0, 1]],
      ],
    ),
  );
  const f = substitute(F, model.equations[0]!, line);
  const [A, B] = samePoint
    ? [coefficient(F, f, [1, 2]), coefficient(F, f, [0, 3])]
    : [coefficient(F, f, [2, 1]), coefficient(F, f, [1, 2])];
  // (s : t) = (B : −A)
  return P.map((p, k) => F.sub(F.mul(B, p), F.mul(A, R[k]!)));
}

export function crossProduct<T>(F: Field<T>, a: Coordinates<T>, b: Coordinates<T>): [T, T, T] {
  const minor = (i: number, j: number) => F.sub(F.mul(a[i]!, b[j]!), F.mul(a[j]!, b[i]!));
  return [minor(1, 2), minor(2, 0), minor(0, 1)];
}

function otherPointOnLine<T>(F: Field<T>, line: Coordinates<T>, P: Coordinates<T>): Coordinates<T> {
  const units = [
    [F.one, F.zero, F.zero],
    [F.zero, F.one, F.zero],
    [F.zero, F.zero, F.one],
  ];
  // The line meets two different coordinate lines away from P, unless it is one of them: some unit line works.
  const candidates = units.map((unit) => crossProduct(F, line, unit));
  return candidates.find((R) => crossProduct(F, P, R).some((c) => !F.isZero(c)))!;
}

/**
 * The long Weierstrass model of a smooth cubic with the point P taken to O, with the maps there and back.
 *
 * A flex: a change of coordinates takes the tangent to the line at infinity. Otherwise the tangent at P meets the cubic
 * again at Q; on the lines through Q the cubic is c²L1 + cL2 + L3 = 0 with forms L_k of degree k in (a, b), b = 0 the tangent,
 * so (2cL1 + L2)² = L2² − 4L1L3 = b·(cubic in a, b), which is y² = cubic in x = a/b with P at infinity.
 *
 * Domain   characteristic not 2 unless P is a flex; P smooth on the cubic, the cubic smooth.
 */
export function cubicThrough<T>(model: Model<T>, P: Coordinates<T>): Transformation<T> {
  const tangent = tangentAt(model, P);
  const third = thirdPoint(model, P, P);
  const { field: F } = model;
  const flex = crossProduct(F, P, third).every((c) => F.isZero(c));
  const maps = flex ? fromFlex(model, P, tangent) : fromChord(model, P, third);
  return { ...maps, steps: { tangent, third, flex } };
}

type Maps<T> = Omit<Transformation<T>, "steps">;

/** New coordinates with P = (0 : 1 : 0) and its tangent c = 0 make the cubic κa³ + c·(quadratic form): the long form. */
function fromFlex<T>(model: Model<T>, P: Coordinates<T>, tangent: Coordinates<T>): Maps<T> {
  const { field: F } = model;
  const onTangent = otherPointOnLine(F, tangent, P);
  const matrix = completeBasis(F, [onTangent, P, undefined]);
  const G = substitute(F, model.equations[0]!, linearForms(F, matrix, ["a", "b", "c"]));
  const affine = dehomogenise(F, G);
  const form = longForm(F, affine) as LongForm<T>;
  // a = scaleX·x, b = scaleY·y, c = z.
  const back = inverse(F, matrix)!;
  const rows = [scaleRow(F, back[0]!, F.inv(form.scaleX)), scaleRow(F, back[1]!, F.inv(form.scaleY)), back[2]!];
  const columns = matrix.map((row) => [F.mul(row[0]!, form.scaleX), F.mul(row[1]!, form.scaleY), row[2]!]);
  const target = weierstrassModel(F, form.a);
  return {
    a: form.a,
    to: { from: model, to: target, forms: linearForms(F, rows, model.variables) },
    from: { from: target, to: model, forms: linearForms(F, columns, target.variables) },
  };
}

function fromChord<T>(model: Model<T>, P: Coordinates<T>, Q: Coordinates<T>): Maps<T> {
  const { field: F } = model;
  const matrix = completeBasis(F, [P, undefined, Q]);
  const G = substitute(F, model.equations[0]!, linearForms(F, matrix, ["a", "b", "c"]));
  const [L3, L2, L1] = [0, 1, 2].map((n) => partInC(F, G, n)) as [Polynomial<T>, Polynomial<T>, Polynomial<T>];
  const four = F.fromInt(4n);
  const delta = subtract(F, multiply(F, L2, L2), scaleBy(F, four, multiply(F, L1, L3)));
  // δ = b·(c3 a³ + c2 a²b + c1 ab² + c0 b³); x = c3 a/b and y = c3(2cL1 + L2)/b².
  const [c0, c1, c2, c3] = [0, 1, 2, 3].map((n) => coefficient(F, delta, [n, 4 - n, 0])) as [T, T, T, T];
  const a: Coefficients<T> = [F.zero, c2, F.zero, F.mul(c1, c3), F.mul(c0, F.mul(c3, c3))];
  const target = weierstrassModel(F, a);
  const abc = (name: string) => variable(F, ["a", "b", "c"], name);
  const eta = add(F, scaleBy(F, F.fromInt(2n), multiply(F, abc("c"), L1)), L2);
  const inNew = [scaleBy(F, c3, multiply(F, abc("a"), abc("b"))), scaleBy(F, c3, eta), multiply(F, abc("b"), abc("b"))];
  const rows = linearForms(F, inverse(F, matrix)!, model.variables);
  return {
    a,
    to: { from: model, to: target, forms: inNew.map((f) => substitute(F, f, rows)) },
    from: { from: target, to: model, forms: chordInverse(F, matrix, L1, L2, c3) },
  };
}

/** a = x, b = c3 z, c = (y c3 z − L2(a, b)) / (2L1(a, b)), cleared of its denominator. */
function chordInverse<T>(F: Field<T>, matrix: Matrix<T>, L1: Polynomial<T>, L2: Polynomial<T>, c3: T): Polynomial<T>[] {
  const letters = ["x", "y", "z"];
  const x = variable(F, letters, "x");
  const b = scaleBy(F, c3, variable(F, letters, "z"));
  const y = variable(F, letters, "y");
  const zero = constant(F, letters, F.zero);
  const l1 = substitute(F, L1, [x, b, zero]);
  const l2 = substitute(F, L2, [x, b, zero]);
  const denominator = scaleBy(F, F.fromInt(2n), l1);
  // y/z = c3·η/b² and b = c3 z give η = y·b²/(c3 z) = y·c3·z = y·b.
  const abc = [multiply(F, denominator, x), multiply(F, denominator, b), add(F, multiply(F, y, b), negate(F, l2))];
  return matrix.map((row) => row.reduce((total, c, k) => add(F, total, scaleBy(F, c, abc[k]!)), zero));
}

/** The coefficient of c^n, still written in (a, b, c). */
function partInC<T>(F: Field<T>, G: Polynomial<T>, n: number): Polynomial<T> {
  const list = Array.from({ length: 4 - n }, (_, i) => {
    const exponents = [i, 3 - n - i];
    return [coefficient(F, G, [...exponents, n]), [...exponents, 0]] as const;
  });
  return fromTerms(F, ["a", "b", "c"], list);
}

function dehomogenise<T>(F: Field<T>, G: Polynomial<T>): Polynomial<T> {
  const a = variable(F, ["a", "b"], "a");
  const b = variable(F, ["a", "b"], "b");
  return substitute(F, G, [a, b, constant(F, ["a", "b"], F.one)]);
}

/** Rows of a matrix as linear forms. */
export function linearForms<T>(F: Field<T>, rows: Matrix<T>, variables: readonly string[]): Polynomial<T>[] {
  return rows.map((row) =>
    fromTerms(
      F,
      variables,
      row.map((c, k) => [c, variables.map((_, l) => (k === l ? 1 : 0))] as const),
    ),
  );
}

function scaleRow<T>(F: Field<T>, row: readonly T[], factor: T): T[] {
  return row.map((c) => F.mul(c, factor));
}

/**
 * The matrix with the given columns, the missing one filled with a unit vector: the last one that gives determinant ±1,
 * or else the last that gives a basis, so that integer points lead to small integer maps.
 */
function completeBasis<T>(F: Field<T>, columns: readonly (Coordinates<T> | undefined)[]): T[][] {
  const units = [2, 1, 0].map((k) => [0, 1, 2].map((l) => (k === l ? F.one : F.zero)));
  const matrices = units.map((unit) => {
    const filled = columns.map((column) => column ?? unit);
    return [0, 1, 2].map((row) => filled.map((column) => column[row]!));
  });
  const bases = matrices.filter((matrix) => !F.isZero(determinant(F, matrix)));
  const unimodular = bases.find((matrix) => {
    const d = determinant(F, matrix);
    return F.isZero(F.sub(F.mul(d, d), F.one));
  });
  return unimodular ?? bases[0]!;
}
