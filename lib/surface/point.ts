// A point of an elliptic curve, as a user holds it.

import { rationalOrder } from "../arithmetic/order.ts";
import { type Affine, addPoints, multiplyPoint, negatePoint, orderUpTo, samePoint } from "../curve/group.ts";
import { rationalMultiple } from "../curve/multiples.ts";
import { valueData } from "../number/json.ts";
import { primitive, type Rational } from "../number/rational.ts";
import { Complex, Real } from "../number/values.ts";
import { DomainError } from "../proof/errors.ts";
import type { Curve } from "./curve.ts";
import { carry, type Join, joinFields } from "./fields.ts";
import { orderOverPrimeField } from "./finite.ts";
import { quotients } from "./quotients.ts";

/** An exact coordinate as text, an enclosure as its data. */
export type CoordinateData = string | ReturnType<typeof valueData>;

// biome-ignore lint/suspicious/noExplicitAny: a point names its field in both directions, so no other argument fits points over all fields
export type AnyPoint = Point<any>;

/** A point (x, y) of a curve, or its origin O. Immutable. Made by `E.point(x, y)`, `E.origin` and the group law. */
export class Point<T = Rational> {
  /** The curve over the field of the coordinates. */
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

  /**
   * P + Q: the chord (or tangent) meets the curve in a third point, whose negative is the sum. Points over Q and over R or C of one
   * curve add over the larger field.
   *
   * Throws   DomainError for points of two curves; UndecidedError if enclosures do not tell whether Q is P or −P.
   * Source   Silverman AEC III.2.3.
   */
  plus<U>(other: Point<U> & Addable<T, U>): Point<Join<T, U>> {
    const { curve, P, Q } = this.#joined(other, "plus");
    return new Point(curve, addPoints(curve.field, curve.a, P, Q));
  }

  minus<U>(other: Point<U> & Addable<T, U>): Point<Join<T, U>> {
    const { curve, P, Q } = this.#joined(other, "minus");
    return new Point(curve, addPoints(curve.field, curve.a, P, negatePoint(curve.field, curve.a, Q)));
  }

  neg(): Point<T> {
    const { field, a } = this.curve;
    return new Point(this.curve, negatePoint(field, a, this.#affine));
  }

  /** n·P for any integer n; the digits of a multiple of a point of infinite order grow as n². */
  times(n: bigint | number): Point<T> {
    const { field, a } = this.curve;
    const factor = integer("times", n);
    if (field.name === "Q" && !this.#isTorsion()) {
      return new Point(this.curve, rationalMultiple(a as never, factor, this.#affine as never) as Affine<T>);
    }
    return new Point(this.curve, multiplyPoint(field, a, factor, this.#affine));
  }

  /** Multiples of a torsion point stay small, and are best found by the group law. */
  #isTorsion(): boolean {
    return rationalOrder(this.curve.a as never, this.#affine as never) !== Infinity;
  }

  /**
   * All points R over Q with nR = P, n >= 2: P.divide(2) halves it. Complete, by the rational roots of φ_n − x(P)ψ_n²; empty if there is none.
   * Throws   DomainError for a point over another field.
   */
  divide(n: number): Point<T>[] {
    return quotients(this as unknown as Point, n) as unknown as Point<T>[];
  }

  /**
   * The least n >= 1 with n·P = O, or Infinity, proved: over Q no torsion point has an order above 12, over a quadratic field
   * none above 18; over F_p a bigint, from the order of the group.
   * Throws   DomainError for enclosure coordinates, which cannot show an order.
   * Source   Mazur 1977 (Silverman AEC VIII.7.5); Kamienny 1992.
   */
  order(): number | bigint {
    const { field, a } = this.curve;
    if (field.characteristic > 0n) return orderOverPrimeField(this);
    if (!this.#affine) return 1;
    if (field.name === "Q") {
      return rationalOrder(a as never, this.#affine as never);
    }
    if (field.name.startsWith("Q(")) return orderUpTo(field, a, this.#affine, 18) ?? Infinity;
    throw new DomainError({
      subject: "order",
      given: `the point ${this} over ${field.name}`,
      expected: "exact coordinates",
      hint: "An enclosure of a torsion point also holds points of infinite order.",
    });
  }

  /** Throws DomainError for points of two curves, UndecidedError if enclosures leave it open. */
  equals<U>(other: Point<U>): boolean {
    const { curve, P, Q } = this.#joined(other, "equals");
    return samePoint(curve.field, P, Q);
  }

  /** "(0, -1)" or "O". */
  toString(): string {
    return this.#affine ? `(${this.#affine.map((c) => this.curve.field.format(c)).join(", ")})` : "O";
  }

  toJSON(): {
    readonly kind: "point";
    readonly curve: unknown;
    readonly coordinates: readonly CoordinateData[] | null;
  } {
    const { field } = this.curve;
    const data = (c: T) => (c instanceof Real || c instanceof Complex ? valueData(c) : field.format(c));
    return { kind: "point", curve: this.curve.toJSON(), coordinates: this.#affine?.map(data) ?? null };
  }

  [Symbol.toPrimitive](hint: string): string {
    return primitive(hint, this, "point");
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

  /** Both points over one field, on one curve. */
  #joined<U>(other: Point<U>, subject: string) {
    type V = Join<T, U>;
    const mine = this.curve as unknown as Curve<V>;
    const theirs = other.curve as unknown as Curve<V>;
    if (mine === theirs || (mine.field.name === theirs.field.name && mine.equals(theirs))) {
      return { curve: mine, P: this.#affine as unknown as Affine<V>, Q: other.coordinates as unknown as Affine<V> };
    }
    const field = joinFields(mine.field, theirs.field);
    const curve = field && mine.carriedTo(field);
    if (!curve || !sameModel(mine, theirs)) throw twoCurves(subject, mine, theirs);
    const lift = (P: Affine<unknown>): Affine<V> => P && [carry(P[0], field), carry(P[1], field)];
    return { curve, P: lift(this.#affine), Q: lift(other.coordinates) };
  }
}

/** What a second point must fulfil: a field that has a common larger one with the first point's. */
export type Addable<T, U> = [Join<T, U>] extends [never]
  ? { readonly fieldsHaveNothingInCommon: "points of curves over different fields do not add" }
  : unknown;

/** Equal coefficients as numbers, whatever fields the curves are written over. */
function sameModel<V>(mine: Curve<V>, theirs: Curve<V>): boolean {
  return mine.a.every((c, k) => mine.field.format(c) === theirs.field.format(theirs.a[k]!));
}

function twoCurves(subject: string, mine: unknown, theirs: unknown): DomainError {
  return new DomainError({
    subject,
    given: `a point of ${mine} and a point of ${theirs}`,
    expected: "two points of one curve",
    hint: "Carry one of them over by a map first.",
  });
}

function integer(subject: string, n: bigint | number): bigint {
  if (typeof n === "bigint") return n;
  if (Number.isSafeInteger(n)) return BigInt(n);
  throw new DomainError({ subject, given: `the factor ${n}`, expected: "an integer", argument: "n" });
}
