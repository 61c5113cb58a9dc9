// The intersection of two quadrics in space, and a curve of bidegree (2, 2), as a user holds them.

import { divide, type Field, scale } from "../algebra/field.ts";
import { coefficient, mapCoefficients, type Polynomial } from "../algebra/multivariate.ts";
import type { Residue } from "../algebra/primefield.ts";
import { plainPolynomial } from "../curve/equation/print.ts";
import { discriminantTimes1728, modelOfInvariants, quarticInvariants } from "../curve/map/invariants.ts";
import type { Coordinates, Model } from "../curve/map/model.ts";
import { bidegreeModel, pencilQuartic, quadricsModel, quadricsThrough } from "../curve/map/quadrics.ts";
import type { Coefficients } from "../curve/weierstrass.ts";
import type { Rational } from "../number/rational.ts";
import { DomainError } from "../proof/errors.ts";
import type { ThroughPoint } from "./cubic.ts";
import type { Curve } from "./curve.ts";
import { type FieldInput, type InField, largerField, primeFieldOf, reducedTo } from "./extended.ts";
import { carry } from "./fields.ts";
import type { ExactInput } from "./input.ts";
import { jacobianCurve } from "./jacobian.ts";
import { joinedCurve } from "./joined.ts";
import { PlaneCurve, PlanePoint, type PointInput } from "./variety.ts";

type Pair<T> = readonly [Polynomial<T>, Polynomial<T>];

/** What both sorts have in common: the way to Weierstrass form by projection from a point, and the Jacobian by the pencil. */
abstract class OnQuadrics<T> extends PlaneCurve<T> {
  /**
   * The curve as an elliptic curve with the given point as O, with the maps there and back: over Q its reduced global minimal model.
   *
   * Method   projection from the point to a plane cubic, which is brought to Weierstrass form by the image of the point.
   * Throws   DomainError with the residual for a point that is not on the curve.
   */
  through(P: PointInput<T>): ThroughPoint<this, T> {
    const point = P instanceof PlanePoint ? new PlanePoint(this, this.checked(P.coordinates)) : this.point(P);
    const made = quadricsThrough(this.model, point.coordinates);
    const parts = { to: made.to, from: made.from, rawModel: made.a, basePoint: point.coordinates };
    const { raw, change, ...maps } = joinedCurve<T, this>(this, parts);
    return { ...maps, steps: { point, projected: made.cubic, raw, ...(change ? { change } : {}) } };
  }

  /** The Jacobian, from the invariants of det(xA + B) for the matrices of the two forms; it says that it is no more (`notice`). */
  jacobian(): Curve<T> {
    return jacobianCurve(this, pencilModel(this.field, this.model.equations as unknown as Pair<T>));
  }
}

/** Two quadrics in space that meet in a smooth curve of genus 1, over Q, a quadratic field, F_p, R or C. Made by `quadrics`. */
export class QuadricPair<T = Rational> extends OnQuadrics<T> {
  /** Both equations in the letters they were written with. */
  get polynomials(): Pair<T> {
    return this.model.equations.map((f) => this.dehomogenise(f)) as unknown as Pair<T>;
  }

  /** The same equations over a larger field. */
  over<K extends FieldInput>(field: K): QuadricPair<InField<K>> {
    const F = largerField(field);
    return this.#carried(F, (c) => carry(c, F));
  }

  /** The pair modulo a prime above 3 at which the curve stays smooth. */
  mod(p: bigint | number): QuadricPair<Residue> {
    const F = primeFieldOf(BigInt(p), this);
    return this.#carried(F, (c) => reducedTo(F, c, this));
  }

  #carried<U>(F: Field<U>, to: (c: T) => U): QuadricPair<U> {
    const forms = this.model.equations.map((f) => mapCoefficients(F, f, to)) as unknown as Pair<U>;
    requireSmoothPair(F, forms, "quadrics", this);
    return new QuadricPair<U>(quadricsModel(F, forms), this.letters);
  }

  /** "x^2 + y^2 - z^2 = 0, x^2 + 6*y^2 - w^2 = 0 over Q". */
  override toString(): string {
    const both = this.polynomials.map((f) => `${plainPolynomial(this.field, f)} = 0`);
    return `${both.join(", ")} over ${this.field.name}`;
  }
}

/**
 * A(x)y² + B(x)y + C(x) = 0 with coefficients of degree at most 2, such as x² + y² = 1 + d x²y²: smooth in P¹ × P¹, over Q, a quadratic field,
 * F_p, R or C. Made by `biquadratic`.
 */
export class Biquadratic<T = Rational> extends OnQuadrics<T> {
  readonly #affine: Polynomial<T>;

  constructor(model: Model<T>, affine: Polynomial<T>) {
    super(model, affine.variables);
    this.#affine = affine;
  }

  override get polynomial(): Polynomial<T> {
    return this.#affine;
  }

  /** The points where x or y is infinite, as far as they lie over the field. */
  get pointsAtInfinity(): PlanePoint<T>[] {
    const F = this.field;
    const at = (i: number, j: number) => coefficient(F, this.#affine, [i, j]);
    // (x : y : xy : 1) is (1 : 0 : y : 0) for x = ∞, (0 : 1 : x : 0) for y = ∞, and (0 : 0 : 1 : 0) for both.
    const alongY = quadraticRoots(F, at(2, 2), at(2, 1), at(2, 0)).map((y) => [F.one, F.zero, y, F.zero]);
    const alongX = quadraticRoots(F, at(2, 2), at(1, 2), at(0, 2)).map((x) => [F.zero, F.one, x, F.zero]);
    const corner = F.isZero(at(2, 2)) ? [[F.zero, F.zero, F.one, F.zero]] : [];
    return [...alongY, ...alongX, ...corner].map((P) => new PlanePoint(this, P));
  }

  protected override valuesOf(coordinates: Readonly<Record<string, ExactInput | T>>): Coordinates<T> {
    const F = this.field;
    const [x, y] = this.letters.map((name) => this.coordinate(coordinates, name)) as [T, T];
    return [x, y, F.mul(x, y), F.one];
  }

  /** "(0, 1)", "(∞, 2)". */
  override pointText([x, y, s, t]: Coordinates<T>): string | undefined {
    const F = this.field;
    const show = (above: T, below: T) => (F.isZero(below) ? "∞" : F.format(F.mul(above, F.inv(below))));
    if (!F.isZero(t!)) return `(${show(x!, t!)}, ${show(y!, t!)})`;
    if (!F.isZero(x!)) return `(∞, ${show(s!, x!)})`;
    if (!F.isZero(y!)) return `(${show(s!, y!)}, ∞)`;
    return "(∞, ∞)";
  }

  /** The same equation over a larger field. */
  over<K extends FieldInput>(field: K): Biquadratic<InField<K>> {
    const F = largerField(field);
    return biquadraticOf(
      F,
      mapCoefficients(F, this.#affine, (c) => carry<InField<K>>(c, F)),
    );
  }

  /** The curve modulo a prime above 3 at which it stays smooth. */
  mod(p: bigint | number): Biquadratic<Residue> {
    const F = primeFieldOf(BigInt(p), this);
    return biquadraticOf(
      F,
      mapCoefficients(F, this.#affine, (c) => reducedTo(F, c, this)),
    );
  }
}

/** The roots in the field of ax² + bx + c, which is not the zero polynomial. */
function quadraticRoots<T>(F: Field<T>, a: T, b: T, c: T): T[] {
  if (F.isZero(a)) return F.isZero(b) ? [] : [F.neg(divide(F, c, b))];
  const root = F.sqrt(F.sub(F.mul(b, b), scale(F, 4, F.mul(a, c))));
  if (root === undefined) return [];
  const signs = F.isZero(root) ? [root] : [root, F.neg(root)];
  return signs.map((r) => divide(F, F.sub(r, b), scale(F, 2, a)));
}

/** The curve of a polynomial of bidegree (2, 2), refused if it is singular in P¹ × P¹. */
export function biquadraticOf<T>(F: Field<T>, f: Polynomial<T>): Biquadratic<T> {
  const model = bidegreeModel(F, f);
  requireSmoothPair(
    F,
    model.equations as unknown as Pair<T>,
    "biquadratic",
    `${plainPolynomial(F, f)} = 0 over ${F.name}`,
  );
  return new Biquadratic(model, f);
}

/** Throws DomainError if the pencil of the two quadrics has a double member, as it has exactly if they meet in a singular curve. */
export function requireSmoothPair<T>(F: Field<T>, forms: Pair<T>, subject: string, shown: unknown): void {
  const { I, J } = quarticInvariants(F, pencilQuartic(F, forms));
  if (!F.isZero(discriminantTimes1728(F, scale(F, 16, I), scale(F, 32, J)))) return;
  throw new DomainError({
    subject,
    given: `${shown}, which is singular or reducible: the determinant of its pencil has a double root`,
    expected: "a smooth curve of genus 1",
    argument: "equation",
  });
}

/** c4 = 16I, c6 = 32J of the quartic det(xA + B), doubled matrices: it is scaled by a square. */
function pencilModel<T>(F: Field<T>, forms: Pair<T>): Coefficients<T> {
  const { I, J } = quarticInvariants(F, pencilQuartic(F, forms));
  return modelOfInvariants(F, scale(F, 16, I), scale(F, 32, J));
}
