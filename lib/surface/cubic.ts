// A nonsingular plane cubic, as a user holds it: tangents, chords, and the way to Weierstrass form.

import type { Field } from "../algebra/field.ts";
import { clearingFactor } from "../algebra/integral.ts";
import { fromTerms, mapCoefficients, type Polynomial } from "../algebra/multivariate.ts";
import type { Residue } from "../algebra/primefield.ts";
import { searchCubic } from "../arithmetic/search.ts";
import { type CubicSteps, crossProduct, cubicThrough, tangentAt, thirdPoint } from "../curve/map/cubic.ts";
import { cubicC4C6, cubicInvariants, modelOfInvariants } from "../curve/map/invariants.ts";
import { type Coordinates, type Model, samePlace } from "../curve/map/model.ts";
import type { ModelChange } from "../curve/weierstrass.ts";
import type { Rational } from "../number/rational.ts";
import { DomainError } from "../proof/errors.ts";
import type { Curve } from "./curve.ts";
import { type FieldInput, type InField, largerField, primeFieldOf, reducedTo } from "./extended.ts";
import { carry } from "./fields.ts";
import { jacobianCurve } from "./jacobian.ts";
import { joinedCurve } from "./joined.ts";
import type { Morphism } from "./morphism.ts";
import { requireSmooth } from "./smooth.ts";
import { PlaneCurve, PlanePoint, type PointInput } from "./variety.ts";

/** A curve of genus one with a point as an elliptic curve. */
export interface ThroughPoint<C extends PlaneCurve<T>, T = Rational> {
  /** Over Q the reduced global minimal model. */
  readonly curve: Curve<T>;
  readonly to: Morphism<C, Curve<T>>;
  readonly from: Morphism<Curve<T>, C>;
  /** What the construction went through, for a derivation. */
  readonly steps: ThroughSteps<T>;
}

export interface ThroughSteps<T = Rational> {
  readonly point: PlanePoint<T>;
  /** The tangent at the point as a form, where it meets the cubic again, and whether the point is a flex. */
  readonly tangent?: Polynomial<T>;
  readonly third?: PlanePoint<T>;
  readonly flex?: boolean;
  /** For two quadrics: the plane cubic that they are projected to from the point. */
  readonly projected?: Polynomial<T>;
  /** The model that the construction gives, and over Q the change that makes it minimal. */
  readonly raw: Curve<T>;
  readonly change?: ModelChange<T>;
}

/** A line in the plane of a cubic. */
export interface Line<T = Rational> {
  /** The linear form that vanishes on it. */
  readonly form: Polynomial<T>;
  /** The third point of the cubic on it. */
  readonly meets: PlanePoint<T>;
}

/** A nonsingular plane cubic over Q, a quadratic field, F_p, R or C. Made by `cubic`. */
export class PlaneCubic<T = Rational> extends PlaneCurve<T> {
  /** The tangent at a point and where it meets the cubic again (at the point itself for a flex). */
  tangent(P: PointInput<T>): Line<T> {
    const point = this.#read(P);
    return this.#line(
      tangentAt(this.model, point.coordinates),
      thirdPoint(this.model, point.coordinates, point.coordinates),
    );
  }

  /** The line through two points and the third point of the cubic on it; the tangent if they are the same. */
  chord(P: PointInput<T>, R: PointInput<T>): Line<T> {
    const [p, r] = [this.#read(P), this.#read(R)];
    if (samePlace(this.model, p.coordinates, r.coordinates)) return this.tangent(p);
    const line = crossProduct(this.field, p.coordinates, r.coordinates);
    return this.#line(line, thirdPoint(this.model, p.coordinates, r.coordinates));
  }

  /**
   * The cubic as an elliptic curve with the given point as O, with the maps there and back: over Q its reduced global minimal model.
   *
   * Method   a flex: a change of coordinates that takes its tangent to infinity; else lines through the third point of the tangent.
   * Throws   DomainError with the residual for a point that is not on the cubic.
   */
  through(P: PointInput<T>): ThroughPoint<this, T> {
    const point = this.#read(P);
    const made = cubicThrough(this.model, point.coordinates);
    const { raw, change, ...maps } = joinedCurve<T, this>(this, {
      to: made.to,
      from: made.from,
      rawModel: made.a,
      basePoint: point.coordinates,
    });
    const steps = { point, ...this.#steps(made.steps), raw, ...(change ? { change } : {}) };
    return { ...maps, steps };
  }

  #steps({ tangent, third, flex }: CubicSteps<T>) {
    return { tangent: this.#form(tangent), third: new PlanePoint(this, third), flex };
  }

  /**
   * All rational points whose coprime whole coordinates are at most `height` in size, sorted by size.
   * Cost     height² steps, each a few small residues.
   */
  points({ height }: { readonly height: number }): PlanePoint<T>[] {
    if (this.field.name !== "Q") {
      throw new DomainError({ subject: "points", given: `${this}`, expected: "a cubic over Q" });
    }
    const form = this.model.equations[0] as unknown as Polynomial<Rational>;
    return searchCubic(form, checkedHeight(height)).map((P) => new PlanePoint(this, P as unknown as Coordinates<T>));
  }

  /**
   * The Jacobian, from Aronhold's invariants: isomorphic to the cubic over its field exactly if the cubic has a point there; without one
   * there is no map, so none is given, and the curve says so (`notice`).
   */
  jacobian(): Curve<T> {
    const F = this.field;
    const [c4, c6] = cubicC4C6(F, cubicInvariants(F, this.model.equations[0]!)!);
    return jacobianCurve(this, modelOfInvariants(F, c4, c6));
  }

  /** The same equation over a larger field: C.over("R"), C.over(quadratic(5)). */
  over<K extends FieldInput>(field: K): PlaneCubic<InField<K>> {
    return this.#carried(largerField(field), (c) => carry(c, largerField(field)));
  }

  /** The cubic modulo a prime above 3 at which it stays nonsingular. */
  mod(p: bigint | number): PlaneCubic<Residue> {
    const F = primeFieldOf(BigInt(p), this);
    return this.#carried(F, (c) => reducedTo(F, c, this));
  }

  #carried<U>(F: Field<U>, to: (c: T) => U): PlaneCubic<U> {
    const form = mapCoefficients(F, this.model.equations[0]!, to);
    requireSmooth(F, form);
    const model: Model<U> = { ...(this.model as unknown as Model<U>), field: F, equations: [form] };
    return new PlaneCubic<U>(model, this.letters);
  }

  #read(P: PointInput<T>): PlanePoint<T> {
    if (!(P instanceof PlanePoint)) return this.point(P);
    return P.curve === this ? P : new PlanePoint(this, this.checked(P.coordinates));
  }

  #line(line: Coordinates<T>, meets: Coordinates<T>): Line<T> {
    return { form: this.#form(line), meets: new PlanePoint(this, meets) };
  }

  /** The linear form, over Q with coprime whole coefficients, in the letters of the cubic. */
  #form(line: Coordinates<T>): Polynomial<T> {
    const F = this.field;
    const { variables } = this.model;
    const unit = (k: number) => variables.map((_, l) => (k === l ? 1 : 0));
    const factor: T = carry(clearingFactor(line), F);
    return this.dehomogenise(
      fromTerms(
        F,
        variables,
        line.map((c, k) => [F.mul(c, factor), unit(k)] as const),
      ),
    );
  }
}

function checkedHeight(height: number): number {
  if (Number.isSafeInteger(height) && height >= 1 && height <= 3000) return height;
  throw new DomainError({
    subject: "points",
    given: `height ${height}`,
    expected: "an integer from 1 to 3000",
    hint: "The search takes height² steps.",
    argument: "height",
  });
}
