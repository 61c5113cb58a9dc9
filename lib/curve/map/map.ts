// Rational maps between models, given by forms; verified by exact substitution; taken at every point.

import type { Field } from "../../algebra/field.ts";
import { lowestTerms } from "../../algebra/multigcd.ts";
import {
  constant,
  degree,
  divideBy,
  evaluate,
  evaluateIn,
  homogenise,
  isZero,
  multiply,
  type Polynomial,
  substitute,
  subtract,
  variable,
} from "../../algebra/multivariate.ts";
import { constantSeries, orderOf, type Series, seriesRing } from "../../algebra/series.ts";
import { branchAt, type Coordinates, type Model, normalise } from "./model.ts";

/** P ↦ (forms at P): one form a letter of the target, of weighted degree proportional to that letter's weight. */
export interface FormMap<T> {
  readonly from: Model<T>;
  readonly to: Model<T>;
  readonly forms: readonly Polynomial<T>[];
}

/**
 * The image of a point. Where all forms vanish the image is read from the curve's series at the point: a rational map
 * from a smooth curve extends to it.
 */
export function applyMap<T>(map: FormMap<T>, P: Coordinates<T>): Coordinates<T> {
  const F = map.from.field;
  const direct = map.forms.map((f) => evaluate(F, f, P));
  const vanishing = direct.every((c, k) => F.isZero(c) || map.to.weights[k] !== 1);
  return vanishing ? imageBySeries(map, P) : normalise(map.to, direct);
}

/** True if the formula itself cannot take the point. */
export function isExceptional<T>(map: FormMap<T>, P: Coordinates<T>): boolean {
  const F = map.from.field;
  return map.forms.every((f, k) => map.to.weights[k] !== 1 || F.isZero(evaluate(F, f, P)));
}

function imageBySeries<T>(map: FormMap<T>, P: Coordinates<T>): Coordinates<T> {
  const { to } = map;
  const F = to.field;
  for (let length = 6; length <= seriesLimit(map); length *= 2) {
    const image = formsOnBranch(map, P, length);
    // Among the letters of weight one some form is not identically zero, and y of weight two vanishes twice as fast.
    const order = Math.min(...image.map((s, k) => (to.weights[k] === 1 ? orderOf(F, s) : Infinity)));
    const known = to.weights.every((weight) => weight * order < length);
    if (known)
      return normalise(
        to,
        image.map((s, k) => s[order * to.weights[k]!]!),
      );
  }
  throw new Error("a map of curves has forms that all vanish on the curve");
}

/** A form of degree d meets a curve of degree n in dn points, so a longer zero means it vanishes on the curve. */
function seriesLimit<T>({ from, forms }: FormMap<T>): number {
  return 4 * Math.max(...forms.map(degree)) * curveDegree(from) + 24;
}

function curveDegree<T>({ equations }: Model<T>): number {
  return equations.reduce((product, f) => product * degree(f), 1);
}

function formsOnBranch<T>({ from, forms }: FormMap<T>, P: Coordinates<T>, length: number): Series<T>[] {
  const F = from.field;
  const branch = branchAt(from, P, length);
  if (!branch) throw new Error("the curve is smooth, so every point has a branch");
  const ring = seriesRing(F, length);
  return forms.map((f) => evaluateIn(f, branch.coordinates, ring, (c) => constantSeries(F, c, length)));
}

/** True if a form in the letters of the model vanishes on the whole curve. */
export function vanishesOn<T>(model: Model<T>, f: Polynomial<T>): boolean {
  if (model.kind !== "quadrics") return isZero(divideBy(model.field, f, model.equations[0]!).remainder);
  const letters = model.variables.map((name) => variable(model.field, model.variables, name));
  return vanishesAfter(model, letters, f);
}

/**
 * True if g(forms) vanishes on the curve, exactly. With one equation by division; on the intersection of two quadrics by Bézout's theorem: a
 * form of degree d that is not zero on this smooth curve of degree 4 has 4d zeros on it, so its series at one point cannot begin later.
 */
function vanishesAfter<T>(model: Model<T>, forms: readonly Polynomial<T>[], g: Polynomial<T>): boolean {
  const F = model.field;
  if (model.kind !== "quadrics") return vanishesOn(model, substitute(F, g, forms));
  if (isZero(g)) return true;
  if (!model.base) throw new Error("an intersection of quadrics is verified at a point of it");
  const length = 4 * Math.max(0, ...forms.map(degree)) * degree(g) + 1;
  const ring = seriesRing(F, length);
  const image = formsOnBranch({ from: model, to: model, forms }, model.base, length);
  return evaluateIn(g, image, ring, (c) => constantSeries(F, c, length)).every((c) => F.isZero(c));
}

/** Exact substitution: the image of the general point satisfies every equation of the target. */
export function landsOnTarget<T>({ from, to, forms }: FormMap<T>): boolean {
  return to.equations.every((g) => vanishesAfter(from, forms, g));
}

/** The map that first does one, then another; forms of higher degree in lowest terms on the curve it starts from. */
export function composeMaps<T>(first: FormMap<T>, second: FormMap<T>): FormMap<T> {
  const { from } = first;
  const { to } = second;
  const forms = second.forms.map((f) => substitute(from.field, f, first.forms));
  const linear = Math.max(...second.forms.map(degree)) <= 1;
  return { from, to, forms: linear ? forms : simplified(from, to, forms) };
}

/**
 * On a long Weierstrass form: y² replaced by the cubic, and common factors divided out. On other models the remainders modulo the
 * equation.
 */
function simplified<T>(from: Model<T>, to: Model<T>, forms: readonly Polynomial<T>[]): Polynomial<T>[] {
  const F = from.field;
  if (to.weights.some((weight) => weight !== 1)) return [...forms];
  if (from.kind !== "weierstrass") return forms.map((f) => divideBy(F, f, from.equations[0]!).remainder);
  // With z = 1 and y before x the equation's first term is y².
  const values = [variable(F, ["y", "x"], "x"), variable(F, ["y", "x"], "y"), constant(F, ["y", "x"], F.one)];
  const equation = substitute(F, from.equations[0]!, values);
  const affine = forms.map((f) => divideBy(F, substitute(F, f, values), equation).remainder);
  const simple = lowestTerms(F, affine);
  const d = Math.max(...simple.map(degree));
  const [x, y, z] = from.variables.map((name) => variable(F, from.variables, name)) as Polynomial<T>[];
  return simple.map((f) => substitute(F, homogenise(f, "z", d), [y!, x!, z!]));
}

/** True if the map is the identity of its curve: the forms are proportional to the letters, as functions on it. */
export function isIdentity<T>({ from, forms }: FormMap<T>): boolean {
  const F = from.field;
  const letters = from.variables.map((name) => variable(F, from.variables, name));
  const k = from.weights.lastIndexOf(1);
  const cross = letters.map((letter, l) => {
    const weight = from.weights[l]!;
    const left = multiply(F, letter, powerOf(F, forms[k]!, weight));
    return subtract(F, left, multiply(F, powerOf(F, letters[k]!, weight), forms[l]!));
  });
  return cross.every((f) => vanishesOn(from, f)) && !vanishesOn(from, forms[k]!);
}

function powerOf<T>(F: Field<T>, f: Polynomial<T>, n: number): Polynomial<T> {
  return n === 1 ? f : multiply(F, f, f);
}
