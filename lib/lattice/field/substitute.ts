// Elliptic functions at other arguments: f(nz), f(z − p), by the addition theorem in the function field.

import { Rational } from "../../number/rational.ts";
import { multipleAsElements } from "./division.ts";
import {
  addElements,
  constantElement,
  type Element,
  type FunctionField,
  invElement,
  isZeroElement,
  mulElements,
  negElement,
  type ScalarPolynomial,
  sameElement,
  wpElement,
} from "./element.ts";
import { exactScalar, type Scalar } from "./scalar.ts";

/** A point of the curve with coordinates in the function field; undefined is the origin. */
export type GenericPoint = { readonly x: Element; readonly y: Element } | undefined;

/**
 * The sum of two points on y² = 4x³ − g2 x − g3: with the slope λ of the chord or tangent, x = λ²/4 − x1 − x2 and
 * y = −(y1 + λ(x − x1))   (DLMF 23.10.1).
 */
export function addPoints(P: GenericPoint, Q: GenericPoint): GenericPoint {
  if (!P) return Q;
  if (!Q) return P;
  const { field } = P.x;
  const dx = difference(Q.x, P.x);
  const same = isZeroElement(dx);
  if (same && isZeroElement(addElements(P.y, Q.y))) return undefined;
  const slope = same ? quotient(tangent(field, P.x), P.y) : quotient(difference(Q.y, P.y), dx);
  const quarter = constantElement(field, exactScalar(Rational.of(1, 4)));
  const x = difference(mulElements(quarter, mulElements(slope, slope)), addElements(P.x, Q.x));
  const y = negElement(addElements(P.y, mulElements(slope, difference(x, P.x))));
  return { x, y };
}

/** dy/dx·y = 6x² − g2/2. */
function tangent(field: FunctionField, x: Element): Element {
  const { ring, cubic } = field;
  const g2 = ring.neg(cubic[1] ?? ring.zero);
  const six = constantElement(field, exactScalar(Rational.of(6)));
  const half = constantElement(field, ring.mul(g2, exactScalar(Rational.of(1, 2))));
  return difference(mulElements(six, mulElements(x, x)), half);
}

export function difference(f: Element, g: Element): Element {
  return addElements(f, negElement(g));
}

export function quotient(f: Element, g: Element): Element {
  return mulElements(f, invElement(g));
}

/** f(nz) for n >= 1. */
export function multipleElement(f: Element, n: number): Element {
  const point = multipleAsElements(f.field, n);
  return sameElement(f, wpElement(f.field)) ? point.x : substituted(f, point);
}

/** f with ℘ and ℘′ replaced by the coordinates of a generic point. */
export function substituted(f: Element, at: { readonly x: Element; readonly y: Element }): Element {
  const { field } = f;
  const value = (p: ScalarPolynomial) =>
    p.reduceRight<Element>(
      (sum, c: Scalar) => addElements(mulElements(sum, at.x), constantElement(field, c, f.constants)),
      constantElement(field, field.ring.zero),
    );
  const top = addElements(value(f.A), mulElements(value(f.B), at.y));
  return quotient(top, value(f.D));
}
