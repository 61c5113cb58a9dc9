// A point of an elliptic curve, as a user holds it.

import type { Field } from "../algebra/field.ts";
import { type Affine, addPoints, multiplyPoint, negatePoint, orderUpTo, samePoint } from "../curve/group.ts";
import type { Coefficients } from "../curve/weierstrass.ts";
import { primitive, type Rational } from "../number/rational.ts";
import { DomainError } from "../proof/errors.ts";
import type { Curve } from "./curve.ts";

/** A point (x, y) of a curve, or its origin O. Immutable. Made by `E.point(x, y)`, `E.origin` and the group law. */
export class Point<T = Rational> {
  readonly curve: Curve<T>;
  readonly #affine: Affine<T>;

  /** The coordinates must satisfy the equation: `E.point` checks that. */
  constructor(curve: Curve<T>, affine: Affine<T>) {
    this.curve = curve;
    this.#affine = affine;
  }

  /** [x, y], or undefined for O. */
  get coordinates(): Affine<T> {
    return this.#affine;
  }

  get isOrigin(): boolean {
    return this.#affine === undefined;
  }

  /** Throws DomainError for O, which has no affine coordinates. */
  get x(): T {
    return this.#affinePart("x")[0];
  }

  /** Throws DomainError for O, which has no affine coordinates. */
  get y(): T {
    return this.#affinePart("y")[1];
  }

  /** P + Q: the chord (or tangent) meets the curve in a third point, whose negative is the sum. Source: Silverman AEC III.2. */
  plus(other: Point<T>): Point<T> {
    this.#requireSameCurve(other, "plus");
    return this.#made(addPoints(this.#field, this.#a, this.#affine, other.#affine));
  }

  minus(other: Point<T>): Point<T> {
    this.#requireSameCurve(other, "minus");
    return this.plus(other.neg());
  }

  neg(): Point<T> {
    return this.#made(negatePoint(this.#field, this.#a, this.#affine));
  }

  /** n·P for any integer n; the digits of a multiple of a point of infinite order grow as n². */
  times(n: bigint | number): Point<T> {
    return this.#made(multiplyPoint(this.#field, this.#a, integer("times", n), this.#affine));
  }

  /**
   * The least n >= 1 with n·P = O, or Infinity, proved: over Q no torsion point has an order above 12.
   * Source: Mazur 1977 (Silverman AEC VIII.7.5).
   */
  order(): number {
    return orderUpTo(this.#field, this.#a, this.#affine, LARGEST_RATIONAL_ORDER) ?? Infinity;
  }

  equals(other: Point<T>): boolean {
    this.#requireSameCurve(other, "equals");
    return samePoint(this.#field, this.#affine, other.#affine);
  }

  /** "(0, -1)" or "O". */
  toString(): string {
    return this.#affine ? `(${this.#affine.map((c) => this.#field.format(c)).join(", ")})` : "O";
  }

  toJSON(): { readonly kind: "point"; readonly curve: unknown; readonly coordinates: readonly string[] | null } {
    const coordinates = this.#affine?.map((c) => this.#field.format(c)) ?? null;
    return { kind: "point", curve: this.curve, coordinates };
  }

  [Symbol.toPrimitive](hint: string): string {
    return primitive(hint, this, "point");
  }

  get #field(): Field<T> {
    return this.curve.field;
  }

  get #a(): Coefficients<T> {
    return this.curve.a;
  }

  #made(affine: Affine<T>): Point<T> {
    return new Point(this.curve, affine);
  }

  #affinePart(argument: string): readonly [T, T] {
    if (this.#affine) return this.#affine;
    throw new DomainError({
      subject: argument,
      given: "the point O at infinity",
      expected: "a point with affine coordinates",
      hint: "Ask P.isOrigin first.",
    });
  }

  #requireSameCurve(other: Point<T>, subject: string): void {
    if (this.curve === other.curve || this.curve.equals(other.curve)) return;
    throw new DomainError({
      subject,
      given: `a point of ${this.curve} and a point of ${other.curve}`,
      expected: "two points of one curve",
      hint: "Carry one of them over by a map first.",
    });
  }
}

const LARGEST_RATIONAL_ORDER = 12;

function integer(subject: string, n: bigint | number): bigint {
  if (typeof n === "bigint") return n;
  if (Number.isSafeInteger(n)) return BigInt(n);
  throw new DomainError({ subject, given: `the factor ${n}`, expected: "an integer", argument: "n" });
}
