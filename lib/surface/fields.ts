// The fields that coordinates live in, and how a number of one is taken to a larger one.

import { complexes, reals } from "../algebra/enclosures.ts";
import type { Field } from "../algebra/field.ts";
import { quadraticField } from "../algebra/quadraticfield.ts";
import { rationals } from "../algebra/rationals.ts";
import { Quadratic } from "../number/quadratic.ts";
import { Rational } from "../number/rational.ts";
import { Complex, type ComplexNumeric, Real, scalar } from "../number/values.ts";

/** A coordinate in characteristic 0. */
export type Coordinate = Rational | Quadratic | Real | Complex;

/** The coordinates of a sum of points: the larger of the two fields; never for fields that have nothing in common. */
export type Join<A, B> = [A] extends [B] ? ([B] extends [A] ? A : Larger<A, B>) : Larger<A, B>;
type Larger<A, B> = [A | B] extends [Coordinate]
  ? [Complex] extends [A | B]
    ? Complex
    : [Real] extends [A | B]
      ? Real
      : Quadratic
  : never;

/** The field a number belongs to: Q or Q(√d) for exact ones, else R or C. */
export function fieldOf(value: Coordinate): Field<Coordinate> {
  const field =
    value instanceof Rational
      ? rationals
      : value instanceof Quadratic
        ? quadraticField(value.d)
        : value instanceof Real
          ? reals
          : complexes;
  return field as unknown as Field<Coordinate>;
}

/** A number as the simplest exact kind it is known to be, or the enclosure it is. */
export function coordinateOf(value: ComplexNumeric, subject: string): Coordinate {
  if (value instanceof Rational) return value;
  if (value instanceof Quadratic) return value.isRational() ? value.a : value;
  const number = scalar(value, subject);
  const { exact } = number;
  if (exact instanceof Rational) return exact;
  if (exact instanceof Quadratic) return exact.isRational() ? exact.a : exact;
  return number instanceof Complex && number.isReal ? number.re : number;
}

const RANK = ["Q", "Q(", "R", "C"];

function rank({ name }: { readonly name: string }): number {
  return name.startsWith("Q(") ? 1 : RANK.indexOf(name);
}

/** The smallest of our fields that holds both, or undefined if there is none (F_p beside anything else). */
export function joinFields<T>(F: Field<T>, G: Field<T>): Field<T> | undefined {
  if (F.name === G.name) return F;
  const [a, b] = [rank(F), rank(G)];
  if (a < 0 || b < 0) return undefined;
  if (a === 1 && b === 1) return bothReal(F, G) ? (reals as unknown as Field<T>) : (complexes as unknown as Field<T>);
  const [small, large] = a < b ? [F, G] : [G, F];
  // An imaginary quadratic field does not go into R.
  if (large.name === "R" && small.name.startsWith("Q(") && !isRealQuadratic(small))
    return complexes as unknown as Field<T>;
  return large;
}

function isRealQuadratic({ name }: { readonly name: string }): boolean {
  return /^Q\(√\d/.test(name);
}

function bothReal(F: { readonly name: string }, G: { readonly name: string }): boolean {
  return isRealQuadratic(F) && isRealQuadratic(G);
}

/** The same number in a larger field. */
export function carry<T>(value: unknown, F: Field<T>): T {
  if (F.name === "R") return Real.from(real(value)) as T;
  if (F.name === "C") return Complex.from(value as ComplexNumeric) as T;
  if (value instanceof Rational && F.name !== "Q") return F.mul(F.fromInt(value.num), F.inv(F.fromInt(value.den)));
  return value as T;
}

function real(value: unknown): Real {
  const number = scalar(value as ComplexNumeric, "real");
  return number instanceof Complex ? number.re : number;
}
