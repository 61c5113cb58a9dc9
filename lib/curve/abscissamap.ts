// Maps of Weierstrass models that fix O, through their action on x: isogenies, changes of model, and what they compose to.

import { divide, type Field, fraction, scale, sum } from "../algebra/field.ts";
import {
  addUni,
  deriveUni,
  divideUni,
  evaluateUni,
  gcdUni,
  monicUni,
  mulUni,
  scaleUni,
  type Univariate,
} from "../algebra/univariate.ts";
import type { Affine } from "./group.ts";
import { denominatorOf, type Isogeny } from "./isogeny.ts";
import { type Coefficients, changeModel, type ModelChange } from "./weierstrass.ts";

/** X = numerator/(two·rest²) with dz ↦ factor·dz, which settles the sign of Y. */
export interface AbscissaMap<T> extends Isogeny<T> {
  readonly source: Coefficients<T>;
  readonly factor: T;
}

/** The image of a point: X = N/D, and Y from X′(2y + a1x + a3)/c = 2Y + a1′X + a3′; O at the zeros of D. */
export function imageOf<T>(F: Field<T>, map: AbscissaMap<T>, P: Affine<T>): Affine<T> {
  if (!P) return undefined;
  const [x, y] = P;
  const { numerator: N, source, target } = map;
  const D = denominatorOf(F, map);
  const below = evaluateUni(F, D, x);
  if (F.isZero(below)) return undefined;
  const inverse = F.inv(below);
  const X = F.mul(evaluateUni(F, N, x), inverse);
  const slope = F.mul(inverse, F.sub(evaluateUni(F, deriveUni(F, N), x), F.mul(X, evaluateUni(F, deriveUni(F, D), x))));
  const line = sum(F, scale(F, 2, y), F.mul(source[0], x), source[2]);
  const twice = F.sub(divide(F, F.mul(slope, line), map.factor), F.add(F.mul(target[0], X), target[2]));
  return [X, F.mul(fraction(F, 1n, 2n), twice)];
}

/** A normalised isogeny: dz ↦ dz. */
export function ofIsogeny<T>(F: Field<T>, source: Coefficients<T>, isogeny: Isogeny<T>): AbscissaMap<T> {
  return { ...isogeny, source, factor: F.one };
}

/** x′ = (x − r)/u², dz ↦ u dz. */
export function changeOfAbscissa<T>(F: Field<T>, a: Coefficients<T>, change: ModelChange<T>): AbscissaMap<T> {
  const unit = F.inv(F.mul(change.u, change.u));
  return {
    source: a,
    kernel: { two: [F.one], rest: [F.one] },
    degree: 1,
    target: changeModel(F, a, change),
    numerator: [F.neg(F.mul(unit, change.r)), unit],
    factor: change.u,
  };
}

/**
 * The one map after the other. The poles of the composition are those of the first, simple at its points of order two and double else, and
 * the places over the kernel of the second: over a point of order two they may be of either sort.
 */
export function composeAbscissas<T>(F: Field<T>, first: AbscissaMap<T>, second: AbscissaMap<T>): AbscissaMap<T> {
  const through = { numerator: first.numerator, denominator: denominatorOf(F, first) };
  const over = (f: Univariate<T>) => homogeneousAt(F, f, through, f.length - 1);
  const twos = over(second.kernel.two);
  const double = twos.length > 1 ? gcdUni(F, twos, deriveUni(F, twos)) : [F.one];
  const single = divideUni(F, twos, mulUni(F, double, double)).quotient;
  const others = over(second.kernel.rest);
  const two = mulUni(F, first.kernel.two, single);
  const rest = mulUni(F, first.kernel.rest, mulUni(F, double, others));
  const whole = mulUni(F, two, mulUni(F, rest, rest));
  return {
    source: first.source,
    kernel: { two: monicUni(F, two), rest: monicUni(F, rest) },
    degree: first.degree * second.degree,
    target: second.target,
    numerator: scaleUni(
      F,
      F.inv(whole.at(-1)!),
      homogeneousAt(F, second.numerator, through, second.numerator.length - 1),
    ),
    factor: F.mul(first.factor, second.factor),
  };
}

/** x ↦ numerator/denominator. */
export interface Abscissa<T> {
  readonly numerator: Univariate<T>;
  readonly denominator: Univariate<T>;
}

/** D^d f(N/D). */
export function homogeneousAt<T>(
  F: Field<T>,
  f: Univariate<T>,
  { numerator, denominator }: Abscissa<T>,
  d: number,
): Univariate<T> {
  let [result, power]: [Univariate<T>, Univariate<T>] = [[], [F.one]];
  // Horner from the leading coefficient: result·N + c·D^k.
  for (let i = d; i >= 0; i--) {
    result = mulUni(F, result, numerator);
    const c = f[i];
    if (c !== undefined) result = addUni(F, result, scaleUni(F, c, power));
    if (i > 0) power = mulUni(F, power, denominator);
  }
  return result;
}

/** Whether one map after another is x ↦ N/D, as functions: by cross products. */
export function sameAbscissa<T>(F: Field<T>, map: AbscissaMap<T>, { numerator, denominator }: Abscissa<T>): boolean {
  const left = mulUni(F, map.numerator, denominator);
  const right = mulUni(F, denominatorOf(F, map), numerator);
  return left.length === right.length && left.every((c, k) => F.isZero(F.sub(c, right[k]!)));
}
