// y² = quartic(x) over Q, as a user holds it.

import { fromTerms } from "../algebra/multivariate.ts";
import { rationals as Q } from "../algebra/rationals.ts";
import { globalMinimalModel, toRationals } from "../arithmetic/minimal.ts";
import { searchQuartic } from "../arithmetic/search.ts";
import type { Equation } from "../curve/equation/print.ts";
import { modelOfInvariants, quarticInvariants } from "../curve/map/invariants.ts";
import type { Model } from "../curve/map/model.ts";
import { type QuarticCoefficients, quarticThrough } from "../curve/map/quartic.ts";
import { Rational } from "../number/rational.ts";
import { DomainError } from "../proof/errors.ts";
import type { PointInput, ThroughPoint } from "./cubic.ts";
import { Curve } from "./curve.ts";
import { joinedMorphism } from "./joined.ts";
import { PlaneCurve, PlanePoint } from "./variety.ts";

/** The curve y² = a x⁴ + b x³ + c x² + d x + e over Q without double roots. Made by `quartic`. */
export class Quartic extends PlaneCurve {
  /** [a, b, c, d, e]. */
  readonly coefficients: QuarticCoefficients<Rational>;

  constructor(model: Model<Rational>, letters: readonly string[], coefficients: QuarticCoefficients<Rational>) {
    super(model, letters);
    this.coefficients = coefficients;
  }

  /** y² on the left, the quartic on the right. */
  override get equation(): Equation<Rational> {
    const left = fromTerms(Q, this.letters, [[Q.one, [0, 2]]]);
    const right = fromTerms(
      Q,
      this.letters,
      this.coefficients.map((c, k) => [c, [4 - k, 0]] as const),
    );
    return { left, right };
  }

  /**
   * The points at infinity, (1 : ±√a : 0), if a is a square in Q; one point if a = 0.
   */
  get pointsAtInfinity(): PlanePoint[] {
    const root = Q.sqrt(this.coefficients[0]);
    if (!root) return [];
    const signs = root.num === 0n ? [root] : [root, root.neg()];
    return signs.map((y) => new PlanePoint(this, [Rational.one, y, Rational.zero]));
  }

  /**
   * The quartic as an elliptic curve with the given point as O: its reduced global minimal model with the maps there and back.
   * The point may be at infinity (see `pointsAtInfinity`) or a root of the quartic.
   * Throws   DomainError with the residual for a point that is not on the curve.
   */
  through(P: PointInput): ThroughPoint<this> {
    const point = P instanceof PlanePoint ? new PlanePoint(this, this.checked(P.coordinates)) : this.point(P);
    const raw = quarticThrough(this.model, this.coefficients, point.coordinates);
    const { a, change } = globalMinimalModel(raw.a);
    const curve = new Curve(Q, toRationals(a));
    const parts = { to: raw.to, from: raw.from, change, rawModel: raw.a, basePoint: point.coordinates };
    return { curve, ...joinedMorphism(this, curve, parts), steps: { point, raw: new Curve(Q, raw.a), change } };
  }

  /** All rational points with x = m/n, |m| and n at most `height`, those at infinity included, smallest first. */
  points({ height }: { readonly height: number }): PlanePoint[] {
    if (!Number.isSafeInteger(height) || height < 1 || height > 10_000) {
      throw new DomainError({
        subject: "points",
        given: `height ${height}`,
        expected: "an integer from 1 to 10000",
        argument: "height",
      });
    }
    return searchQuartic(this.coefficients, height).map((P) => new PlanePoint(this, P));
  }

  /** The Jacobian, from the invariants I and J: isomorphic to this curve over Q exactly if it has a rational point. */
  jacobian(): Curve {
    const { I, J } = quarticInvariants(Q, this.coefficients);
    const model = modelOfInvariants(Q, I.times(16), J.times(32));
    return new Curve(Q, toRationals(globalMinimalModel(model).a));
  }
}
