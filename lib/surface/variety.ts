// Plane cubics, quartics and their points, as a user holds them.

import type { Field } from "../algebra/field.ts";
import { clearingFactor } from "../algebra/integral.ts";
import { constant, type Polynomial, substitute, variable } from "../algebra/multivariate.ts";
import type { Equation } from "../curve/equation/print.ts";
import { plainPolynomial } from "../curve/equation/print.ts";
import { type Coordinates, chartOf, type Model, normalise, onModel, samePlace } from "../curve/map/model.ts";
import { primitive, Rational } from "../number/rational.ts";
import { DomainError } from "../proof/errors.ts";
import { type ExactInput, elementOf } from "./input.ts";

/** A point of a plane curve, or its coordinates by letter. */
export type PointInput<T = Rational> = PlanePoint<T> | Readonly<Record<string, ExactInput | T>>;

/** A curve of genus one as it is written: in a plane, or as two quadrics in space. */
export abstract class PlaneCurve<T = Rational> {
  readonly model: Model<T>;
  /** The letters that the equation was written with: three for a homogeneous cubic, else two. */
  readonly letters: readonly string[];

  constructor(model: Model<T>, letters: readonly string[]) {
    this.model = model;
    this.letters = letters;
  }

  get field(): Field<T> {
    return this.model.field;
  }

  /** True if it was written homogeneously. */
  get homogeneous(): boolean {
    return this.letters.length === this.model.variables.length;
  }

  /** The equation in the letters it was written with, left side minus right side. */
  get polynomial(): Polynomial<T> {
    const [f] = this.model.equations;
    return this.homogeneous ? f! : this.dehomogenise(f!);
  }

  /** Both sides as data, for typesetting: everything on the left, except where the class says otherwise. */
  get equation(): Equation<T> {
    return { left: this.polynomial, right: constant(this.field, this.letters, this.field.zero) };
  }

  /** The same form with the extra letter put to 1, if there is one. */
  dehomogenise(f: Polynomial<T>): Polynomial<T> {
    if (this.homogeneous) return f;
    const F = this.field;
    const values = this.model.variables.map((name) =>
      this.letters.includes(name) ? variable(F, this.letters, name) : constant(F, this.letters, F.one),
    );
    return substitute(F, f, values);
  }

  /**
   * The point with the given coordinates by letter, as in { u: 1, v: 1, w: 1 } or { x: 3, y: 11 }; a point at infinity of an affine
   * equation takes the third letter 0.
   * Throws   DomainError with the residual if it is not on the curve.
   */
  point(coordinates: Readonly<Record<string, ExactInput | T>>): PlanePoint<T> {
    const { variables } = this.model;
    const unknown = Object.keys(coordinates).find((name) => !variables.includes(name));
    if (unknown !== undefined) throw this.#wrongLetter(unknown);
    return new PlanePoint(this, this.checked(this.valuesOf(coordinates)));
  }

  /** Coordinates in the order of the letters; a letter that was put to 1 may be left out. */
  protected valuesOf(coordinates: Readonly<Record<string, ExactInput | T>>): Coordinates<T> {
    return this.model.variables.map((name) => this.coordinate(coordinates, name));
  }

  /** How a point is written, where it is not by its projective or affine coordinates. */
  pointText(_coordinates: Coordinates<T>): string | undefined {
    return undefined;
  }

  /** The coordinates, if they are a point of the curve. */
  checked(values: Coordinates<T>): Coordinates<T> {
    const F = this.field;
    if (chartOf(this.model, values) < 0) {
      throw new DomainError({
        subject: "point",
        given: `coordinates that are all 0`,
        expected: "a point of the projective plane",
      });
    }
    if (onModel(this.model, values)) return values;
    const f = this.model.equations.find((g) => !F.isZero(this.#valueAt(g, values)))!;
    const at = this.pointText(values) ?? `(${values.map((c) => F.format(c)).join(" : ")})`;
    const value = this.#valueAt(f, values);
    throw new DomainError({
      subject: "point",
      given: `${at} is not on ${this}: ${plainPolynomial(F, f)} is ${F.format(value)} there`,
      expected: "0",
      argument: "coordinates",
    });
  }

  #valueAt(f: Polynomial<T>, values: Coordinates<T>): T {
    const F = this.field;
    const fixed = substitute(
      F,
      f,
      values.map((c) => constant(F, ["_"], c)),
    );
    return fixed.terms.get(0) ?? F.zero;
  }

  protected coordinate(given: Readonly<Record<string, ExactInput | T>>, name: string): T {
    if (Object.hasOwn(given, name)) return elementOf(this.field, "point", name, given[name]!);
    if (this.letters.includes(name)) {
      throw new DomainError({
        subject: "point",
        given: `no coordinate ${name}`,
        expected: `coordinates ${this.letters.join(", ")}`,
        argument: name,
      });
    }
    return this.field.one;
  }

  #wrongLetter(name: string): DomainError {
    return new DomainError({
      subject: "point",
      given: `a coordinate ${name}`,
      expected: `the letters of the equation, ${this.letters.join(", ")}`,
      argument: name,
    });
  }

  /** "u^3 + 2*v^3 + 3*w^3 - 6*u*v*w = 0 over Q". */
  toString(): string {
    const { left, right } = this.equation;
    return `${plainPolynomial(this.field, left)} = ${plainPolynomial(this.field, right)} over ${this.field.name}`;
  }

  [Symbol.toPrimitive](hint: string): string {
    return primitive(hint, this, "curve");
  }
}

/** A point of a plane cubic or of y² = quartic. Immutable. */
export class PlanePoint<T = Rational> {
  readonly curve: PlaneCurve<T>;
  /** Projective coordinates in the order of the letters; coprime integers over Q, the last nonzero one positive. */
  readonly coordinates: Coordinates<T>;

  constructor(curve: PlaneCurve<T>, coordinates: Coordinates<T>) {
    this.curve = curve;
    this.coordinates = simplest(curve.model, coordinates);
  }

  /** Affine coordinates by letter, or undefined at infinity (and for a homogeneous equation). */
  get affine(): Readonly<Record<string, T>> | undefined {
    const { curve } = this;
    const { variables, field } = curve.model;
    const extra = variables.findLastIndex((name) => !curve.letters.includes(name));
    if (extra < 0 || field.isZero(this.coordinates[extra]!)) return undefined;
    const values = normalise(curve.model, this.coordinates);
    const named = variables.map((name, k) => [name, values[k]!] as const);
    return Object.fromEntries(named.filter(([name]) => curve.letters.includes(name)));
  }

  equals(other: PlanePoint<T>): boolean {
    return samePlace(this.curve.model, this.coordinates, other.coordinates);
  }

  /** "(1 : -2 : 1)", or "(3, 11)" for a finite point of an affine equation. */
  toString(): string {
    const F = this.curve.field;
    const { affine } = this;
    const own = this.curve.pointText(this.coordinates);
    if (own !== undefined) return own;
    if (affine) return `(${this.curve.letters.map((name) => F.format(affine[name]!)).join(", ")})`;
    return `(${this.coordinates.map((c) => F.format(c)).join(" : ")})`;
  }

  toJSON(): { readonly kind: "plane point"; readonly curve: string; readonly coordinates: readonly string[] } {
    const coordinates = this.coordinates.map((c) => this.curve.field.format(c));
    return { kind: "plane point", curve: `${this.curve}`, coordinates };
  }

  [Symbol.toPrimitive](hint: string): string {
    return primitive(hint, this, "point");
  }
}

/** Over Q coprime integers with the last nonzero one positive; with a letter of weight two, or over other fields, chart 1. */
function simplest<T>(model: Model<T>, coordinates: Coordinates<T>): Coordinates<T> {
  const normal = normalise(model, coordinates);
  if (model.weights.some((weight) => weight !== 1)) return normal;
  const factor = clearingFactor(normal);
  return normal.map((c) => (c instanceof Rational ? (c.times(factor) as T) : c));
}
