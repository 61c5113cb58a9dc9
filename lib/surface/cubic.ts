// A nonsingular plane cubic over Q, as a user holds it: tangents, chords, and the way to Weierstrass form.

import { clearingFactor } from "../algebra/integral.ts";
import { fromTerms, type Polynomial } from "../algebra/multivariate.ts";
import { rationals as Q } from "../algebra/rationals.ts";
import { globalMinimalModel, toRationals } from "../arithmetic/minimal.ts";
import { searchCubic } from "../arithmetic/search.ts";
import { type CubicSteps, crossProduct, cubicThrough, tangentAt, thirdPoint } from "../curve/map/cubic.ts";
import { cubicC4C6, cubicInvariants, modelOfInvariants } from "../curve/map/invariants.ts";
import { type Coordinates, samePlace } from "../curve/map/model.ts";
import type { Coefficients, ModelChange } from "../curve/weierstrass.ts";
import type { Rational } from "../number/rational.ts";
import { DomainError } from "../proof/errors.ts";
import { Curve } from "./curve.ts";
import type { ExactInput } from "./input.ts";
import { joinedMorphism } from "./joined.ts";
import type { Morphism } from "./morphism.ts";
import { PlaneCurve, PlanePoint } from "./variety.ts";

/** A rational point of the cubic, or its coordinates by letter. */
export type PointInput = PlanePoint | Readonly<Record<string, ExactInput>>;

/** A cubic with a rational point as an elliptic curve. */
export interface ThroughPoint<C extends PlaneCurve> {
  /** The reduced global minimal model. */
  readonly curve: Curve;
  readonly to: Morphism<C, Curve>;
  readonly from: Morphism<Curve, C>;
  /** What the construction went through, for a derivation. */
  readonly steps: ThroughSteps;
}

export interface ThroughSteps {
  readonly point: PlanePoint;
  /** The tangent at the point as a form, where it meets the cubic again, and whether the point is a flex. */
  readonly tangent?: Polynomial<Rational>;
  readonly third?: PlanePoint;
  readonly flex?: boolean;
  /** The model that the construction gives, and the change that makes it minimal. */
  readonly raw: Curve;
  readonly change: ModelChange<Rational>;
}

/** A line in the plane of a cubic. */
export interface Line {
  /** The linear form that vanishes on it. */
  readonly form: Polynomial<Rational>;
  /** The third point of the cubic on it. */
  readonly meets: PlanePoint;
}

/** A nonsingular plane cubic over Q. Made by `cubic`. */
export class PlaneCubic extends PlaneCurve {
  /** The tangent at a point and where it meets the cubic again (at the point itself for a flex). */
  tangent(P: PointInput): Line {
    const point = this.#read(P);
    return this.#line(
      tangentAt(this.model, point.coordinates),
      thirdPoint(this.model, point.coordinates, point.coordinates),
    );
  }

  /** The line through two points and the third point of the cubic on it; the tangent if they are the same. */
  chord(P: PointInput, R: PointInput): Line {
    const [p, r] = [this.#read(P), this.#read(R)];
    if (samePlace(this.model, p.coordinates, r.coordinates)) return this.tangent(p);
    const line = crossProduct(Q, p.coordinates, r.coordinates);
    return this.#line(line, thirdPoint(this.model, p.coordinates, r.coordinates));
  }

  /**
   * The cubic as an elliptic curve with the given point as O: its reduced global minimal model with the maps there and back.
   *
   * Method   a flex: a change of coordinates that takes its tangent to infinity; else lines through the third point of the tangent.
   * Throws   DomainError with the residual for a point that is not on the cubic.
   */
  through(P: PointInput): ThroughPoint<this> {
    const point = this.#read(P);
    const raw = cubicThrough(this.model, point.coordinates);
    const { a, change } = globalMinimalModel(raw.a);
    const curve = new Curve(Q, toRationals(a));
    const maps = joinedMorphism(this, curve, {
      to: raw.to,
      from: raw.from,
      change,
      rawModel: raw.a,
      basePoint: point.coordinates,
    });
    return { curve, ...maps, steps: this.#steps(point, raw.steps, raw.a, change) };
  }

  #steps(
    point: PlanePoint,
    steps: CubicSteps<Rational>,
    raw: Coefficients<Rational>,
    change: ModelChange<Rational>,
  ): ThroughSteps {
    return {
      point,
      tangent: this.#form(steps.tangent),
      third: new PlanePoint(this, steps.third),
      flex: steps.flex,
      raw: new Curve(Q, raw),
      change,
    };
  }

  /**
   * All rational points whose coprime whole coordinates are at most `height` in size, sorted by size.
   * Cost     height² steps, each a few small residues.
   */
  points({ height }: { readonly height: number }): PlanePoint[] {
    return searchCubic(this.model.equations[0]!, checkedHeight(height)).map((P) => new PlanePoint(this, P));
  }

  /**
   * The Jacobian, from Aronhold's invariants: isomorphic to the cubic over Q exactly if the cubic has a rational point; without
   * one there is no map over Q, so none is given.
   */
  jacobian(): Curve {
    const invariants = cubicInvariants(Q, this.model.equations[0]!)!;
    const [c4, c6] = cubicC4C6(Q, invariants);
    return new Curve(Q, toRationals(globalMinimalModel(modelOfInvariants(Q, c4, c6)).a));
  }

  #read(P: PointInput): PlanePoint {
    if (!(P instanceof PlanePoint)) return this.point(P);
    return P.curve === this ? P : new PlanePoint(this, this.checked(P.coordinates));
  }

  #line(line: Coordinates<Rational>, meets: Coordinates<Rational>): Line {
    return { form: this.#form(line), meets: new PlanePoint(this, meets) };
  }

  /** The linear form with coprime whole coefficients, in the letters of the cubic. */
  #form(line: Coordinates<Rational>): Polynomial<Rational> {
    const { variables } = this.model;
    const unit = (k: number) => variables.map((_, l) => (k === l ? 1 : 0));
    const factor = clearingFactor(line);
    const whole = line.map((c) => c.times(factor));
    return this.dehomogenise(
      fromTerms(
        Q,
        variables,
        whole.map((c, k) => [c, unit(k)] as const),
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
