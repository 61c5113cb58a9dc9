// An elliptic curve in the long Weierstrass form, as a user holds it.

import type { Field } from "../algebra/field.ts";
import type { Polynomial } from "../algebra/multivariate.ts";
import { longEquation } from "../curve/equation/equations.ts";
import { type Equation, plainEquation, plainPolynomial } from "../curve/equation/print.ts";
import { pointsOverX } from "../curve/lift.ts";
import { type Coefficients, type Invariants, invariantsOf, jInvariant, residual } from "../curve/weierstrass.ts";
import { primitive, type Rational } from "../number/rational.ts";
import { DomainError } from "../proof/errors.ts";
import { carry } from "./fields.ts";
import { type ExactInput, elementOf } from "./input.ts";
import { Point } from "./point.ts";

/** What a curve was read from, where that is not the long form itself. */
export interface Reading<T> {
  /** The equation as it was given, left side minus right side. */
  readonly polynomial: Polynomial<T>;
  /** Its letters in the roles of x and y. */
  readonly letters: readonly [string, string];
  /** x = scaleX·X, y = scaleY·Y leads from it to the long form in X, Y. */
  readonly scaleX: T;
  readonly scaleY: T;
}

/** A nonsingular curve y² + a1xy + a3y = x³ + a2x² + a4x + a6 over a field. Immutable. Made by `curve`. */
export class Curve<T = Rational> {
  readonly field: Field<T>;
  /** [a1, a2, a3, a4, a6]. */
  readonly a: Coefficients<T>;
  /** The equation the curve was given by, if it had to be rescaled. */
  readonly given: Reading<T> | undefined;
  readonly #invariants: Invariants<T>;

  /** The model must be nonsingular: `curve` checks it and explains a singular one. */
  constructor(field: Field<T>, a: Coefficients<T>, given?: Reading<T>) {
    this.field = field;
    this.a = a;
    this.given = given;
    this.#invariants = invariantsOf(field, a);
  }

  /** [b2, b4, b6, b8]. */
  get b(): readonly [T, T, T, T] {
    const { b2, b4, b6, b8 } = this.#invariants;
    return [b2, b4, b6, b8];
  }

  get c4(): T {
    return this.#invariants.c4;
  }

  get c6(): T {
    return this.#invariants.c6;
  }

  /** Δ of this model; a change of model with u divides it by u¹². */
  get discriminant(): T {
    return this.#invariants.discriminant;
  }

  /** j = c4³/Δ, 1728 for y² = x³ − x. */
  get j(): T {
    return jInvariant(this.field, this.#invariants);
  }

  /** Both sides of the equation as data, for typesetting. */
  get equation(): Equation<T> {
    return longEquation(this.field, this.a);
  }

  /** The neutral element O, the point at infinity. */
  get origin(): Point<T> {
    return new Point(this, undefined);
  }

  /**
   * The point (x, y), exactly.
   * Throws   DomainError with the residual if it is not on the curve, and the points that have this x.
   */
  point(x: ExactInput | T, y: ExactInput | T): Point<T> {
    const P = [this.#element("x", x), this.#element("y", y)] as const;
    const value = residual(this.field, this.a, ...P);
    if (!this.field.isZero(value)) throw this.#offCurve(P, value);
    return new Point(this, P);
  }

  /** The points with the given x over the field of the curve: none, one of order two, or two, P and −P. */
  pointsWith({ x }: { readonly x: ExactInput | T }): Point<T>[] {
    return pointsOverX(this.field, this.a, this.#element("x", x)).map((P) => new Point(this, P));
  }

  /** The same equation over a larger field. */
  carriedTo<U>(field: Field<U>): Curve<U> {
    if (field.name === this.field.name) return this as unknown as Curve<U>;
    return new Curve(field, this.a.map((c) => carry(c, field)) as unknown as Coefficients<U>);
  }

  /** True if the two are the same equation over the same field. */
  equals(other: Curve<T>): boolean {
    const F = this.field;
    return F.name === other.field.name && this.a.every((c, k) => F.isZero(F.sub(c, other.a[k]!)));
  }

  /** "y^2 + y = x^3 - x over Q". */
  toString(): string {
    return `${plainEquation(this.field, this.equation)} over ${this.field.name}`;
  }

  toJSON(): { readonly kind: "curve"; readonly field: string; readonly a: readonly string[] } {
    return { kind: "curve", field: this.field.name, a: this.a.map((c) => this.field.format(c)) };
  }

  #element(argument: string, value: ExactInput | T): T {
    return elementOf(this.field, "point", argument, value);
  }

  #offCurve([x, y]: readonly [T, T], value: T): DomainError {
    const F = this.field;
    const { left, right } = this.equation;
    const near = pointsOverX(F, this.a, x).map((P) => `(${P.map((c) => F.format(c)).join(", ")})`);
    const over =
      near.length > 0
        ? `with x = ${F.format(x)} there is ${near.join(" and ")}`
        : `no point over ${F.name} has x = ${F.format(x)}`;
    return new DomainError({
      subject: "point",
      given: `(${F.format(x)}, ${F.format(y)}) is not on ${plainEquation(F, this.equation)}: there ${plainPolynomial(F, left)} − (${plainPolynomial(F, right)}) is ${F.format(value)}`,
      expected: "0",
      hint: `On this curve ${over}.`,
      argument: "y",
    });
  }

  [Symbol.toPrimitive](hint: string): string {
    return primitive(hint, this, "curve");
  }
}
