// y² = quartic(x), as a user holds it.

import type { Field } from "../algebra/field.ts";
import { scale } from "../algebra/field.ts";
import { fromTerms } from "../algebra/multivariate.ts";
import type { Residue } from "../algebra/primefield.ts";
import { searchQuartic } from "../arithmetic/search.ts";
import type { Equation } from "../curve/equation/print.ts";
import { discriminantTimes1728, modelOfInvariants, quarticInvariants } from "../curve/map/invariants.ts";
import type { Coordinates, Model } from "../curve/map/model.ts";
import { type QuarticCoefficients, quarticModel, quarticThrough } from "../curve/map/quartic.ts";
import type { Rational } from "../number/rational.ts";
import { DomainError } from "../proof/errors.ts";
import type { ThroughPoint } from "./cubic.ts";
import type { Curve } from "./curve.ts";
import { type FieldInput, type InField, largerField, primeFieldOf, reducedTo } from "./extended.ts";
import { carry } from "./fields.ts";
import { jacobianCurve } from "./jacobian.ts";
import { joinedCurve } from "./joined.ts";
import { PlaneCurve, PlanePoint, type PointInput } from "./variety.ts";

/** The curve y² = a x⁴ + b x³ + c x² + d x + e without double roots, over Q, a quadratic field, F_p, R or C. Made by `quartic`. */
export class Quartic<T = Rational> extends PlaneCurve<T> {
  /** [a, b, c, d, e]. */
  readonly coefficients: QuarticCoefficients<T>;

  constructor(model: Model<T>, letters: readonly string[], coefficients: QuarticCoefficients<T>) {
    super(model, letters);
    this.coefficients = coefficients;
  }

  /** y² on the left, the quartic on the right. */
  override get equation(): Equation<T> {
    const F = this.field;
    const left = fromTerms(F, this.letters, [[F.one, [0, 2]]]);
    const right = fromTerms(
      F,
      this.letters,
      this.coefficients.map((c, k) => [c, [4 - k, 0]] as const),
    );
    return { left, right };
  }

  /**
   * The points at infinity, (1 : ±√a : 0), if a is a square in the field; one point if a = 0.
   */
  get pointsAtInfinity(): PlanePoint<T>[] {
    const F = this.field;
    const root = F.sqrt(this.coefficients[0]);
    if (root === undefined) return [];
    const signs = F.isZero(root) ? [root] : [root, F.neg(root)];
    return signs.map((y) => new PlanePoint(this, [F.one, y, F.zero]));
  }

  /**
   * The quartic as an elliptic curve with the given point as O, with the maps there and back: over Q its reduced global minimal model.
   * The point may be at infinity (see `pointsAtInfinity`) or a root of the quartic.
   * Throws   DomainError with the residual for a point that is not on the curve.
   */
  through(P: PointInput<T>): ThroughPoint<this, T> {
    const point = P instanceof PlanePoint ? new PlanePoint(this, this.checked(P.coordinates)) : this.point(P);
    const made = quarticThrough(this.model, this.coefficients, point.coordinates);
    const parts = { to: made.to, from: made.from, rawModel: made.a, basePoint: point.coordinates };
    const { raw, change, ...maps } = joinedCurve<T, this>(this, parts);
    return { ...maps, steps: { point, raw, ...(change ? { change } : {}) } };
  }

  /** All rational points with x = m/n, |m| and n at most `height`, those at infinity included, smallest first. */
  points({ height }: { readonly height: number }): PlanePoint<T>[] {
    if (this.field.name !== "Q") {
      throw new DomainError({ subject: "points", given: `${this}`, expected: "a curve over Q" });
    }
    if (!Number.isSafeInteger(height) || height < 1 || height > 10_000) {
      throw new DomainError({
        subject: "points",
        given: `height ${height}`,
        expected: "an integer from 1 to 10000",
        argument: "height",
      });
    }
    const found = searchQuartic(this.coefficients as unknown as Rational[], height);
    return found.map((P) => new PlanePoint(this, P as unknown as Coordinates<T>));
  }

  /**
   * The Jacobian, from the invariants I and J: isomorphic to this curve exactly if that has a point over its field, and it says so (`notice`).
   */
  jacobian(): Curve<T> {
    const F = this.field;
    const { I, J } = quarticInvariants(F, this.coefficients);
    return jacobianCurve(this, modelOfInvariants(F, scale(F, 16, I), scale(F, 32, J)));
  }

  /** The same equation over a larger field: C.over("R"), C.over(quadratic(5)). */
  over<K extends FieldInput>(field: K): Quartic<InField<K>> {
    const F = largerField(field);
    return this.#carried(F, (c) => carry(c, F));
  }

  /** The curve modulo a prime above 3 at which its quartic keeps distinct roots. */
  mod(p: bigint | number): Quartic<Residue> {
    const F = primeFieldOf(BigInt(p), this);
    return this.#carried(F, (c) => reducedTo(F, c, this));
  }

  #carried<U>(F: Field<U>, to: (c: T) => U): Quartic<U> {
    const coefficients = this.coefficients.map(to) as unknown as QuarticCoefficients<U>;
    requireDistinctRoots(F, coefficients, this);
    const letters = this.letters as readonly [string, string];
    return new Quartic<U>(quarticModel(F, coefficients, letters), letters, coefficients);
  }
}

/** Throws DomainError for a quartic with a double root (at infinity too): then the curve has genus 0. */
export function requireDistinctRoots<T>(F: Field<T>, coefficients: QuarticCoefficients<T>, shown: unknown): void {
  const { I, J } = quarticInvariants(F, coefficients);
  if (!F.isZero(discriminantTimes1728(F, scale(F, 16, I), scale(F, 32, J)))) return;
  throw new DomainError({
    subject: "quartic",
    given: `${shown}, whose quartic has a double root${F.characteristic > 0n ? ` over ${F.name}` : ""}`,
    expected: "a quartic (or cubic) without double roots",
    hint: "With a double root the curve has genus 0.",
    argument: "equation",
  });
}
