// An elliptic curve in the long Weierstrass form, as a user holds it.

import type { Field } from "../algebra/field.ts";
import type { Polynomial } from "../algebra/multivariate.ts";
import { longEquation } from "../curve/equation/equations.ts";
import { type Equation, plainEquation, plainPolynomial } from "../curve/equation/print.ts";
import { pointsOverX } from "../curve/lift.ts";
import { type Coefficients, type Invariants, invariantsOf, jInvariant, residual } from "../curve/weierstrass.ts";
import { primitive, type Rational } from "../number/rational.ts";
import type { Complex, ComplexNumeric, Numeric, Real } from "../number/values.ts";
import { DomainError } from "../proof/errors.ts";
import { type Coordinate, carry } from "./fields.ts";
import { type ExactInput, elementOf } from "./input.ts";
import type { Lattice } from "./lattice.ts";
import { type AnyPoint, Point } from "./point.ts";
import type { TorusPoint } from "./torus-point.ts";
import { exponentialOf, latticeOf, logarithmOf, noTorus } from "./uniformise.ts";

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
  #lattice: Lattice | undefined; // made on first use, and only ever set complete

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

  /**
   * The period lattice Λ of dx/(2y + a1x + a3): C/Λ is the curve by x = ℘(z) − b2/12, 2y + a1x + a3 = ℘′(z), with g2 = c4/12 and
   * g3 = c6/216. In the real basis (ω1 > 0 the least real period) for a curve over Q or R.
   *
   * Domain   curves over Q, a quadratic field in its embedding, R or C.
   * Error    each digit shown is proved; more come on request, since the curve is exact.
   */
  lattice(): Lattice {
    this.#lattice ??= latticeOf(this.#analytic("lattice"));
    return this.#lattice;
  }

  /** Number of components of the real curve: 2 if Δ > 0, 1 if Δ < 0; undefined for a curve that is not real. */
  get components(): 1 | 2 | undefined {
    return this.lattice().realComponents;
  }

  /**
   * z modulo Λ with exponential(z) = P.
   *
   * Branch   z = r·ω1 + s·ω2 with r and s in (−1/2, 1/2]: a real point has a real z on the component of O and z = ω2/2 + t on the
   *          bounded one; points with 2y + a1x + a3 < 0 near O have small positive z. A torsion point over Q gives an exact point of
   *          the torus, such as 3ω1/7.
   * Throws   DomainError for a point of another curve, PrecisionError if its coordinates are too coarse.
   */
  logarithm(P: AnyPoint): Real | Complex | TorusPoint {
    const E = this.#analytic("logarithm");
    const Q = P.minus(this.origin) as Point<Coordinate>; // checks that the curve is the same
    return logarithmOf(E, this.lattice(), Q);
  }

  /**
   * The point at z: real coordinates for real z, and for the exact points of the real torus; O for an exact lattice point.
   * Throws   PoleError for a number that cannot be told from a lattice point.
   */
  exponential(z: Numeric): Point<Real>;
  exponential(z: ComplexNumeric): Point<Real> | Point<Complex>;
  exponential(z: ComplexNumeric): Point<Real> | Point<Complex> {
    return exponentialOf(this.#analytic("exponential"), this.lattice(), z) as Point<Real>;
  }

  #analytic(subject: string): Curve<Coordinate> {
    if (this.field.characteristic !== 0n) throw noTorus(subject, this);
    return this as unknown as Curve<Coordinate>;
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
