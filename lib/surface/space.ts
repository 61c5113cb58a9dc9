// What a map needs of the curves at its ends: a model, and points as projective coordinates and back.

import type { Coordinates } from "../curve/map/model.ts";
import { toAffine, toCoordinates } from "../curve/map/weierstrassmodel.ts";
import { DomainError } from "../proof/errors.ts";
import { Curve } from "./curve.ts";
import { Point } from "./point.ts";
import { type PlaneCurve, PlanePoint, type PointInput } from "./variety.ts";

/** A curve at the end of a map. */
export type Variety<T> = Curve<T> | PlaneCurve<T>;
// biome-ignore lint/suspicious/noExplicitAny: points of a curve name its field in both directions, so no other argument fits all curves
export type AnyVariety = Variety<any>;
export type PointOf<V> = V extends Curve<infer T> ? Point<T> : V extends PlaneCurve<infer T> ? PlanePoint<T> : never;

/** What a map on V takes: a point, on a plane curve also by its coordinates. */
export type PlaceOn<V> = V extends Curve<infer T> ? Point<T> : V extends PlaneCurve<infer T> ? PointInput<T> : never;

/** Projective coordinates of a point of the curve. Throws DomainError for a point of another one. */
export function coordinatesOn<T>(variety: Variety<T>, P: Point<T> | PointInput<T>, subject: string): Coordinates<T> {
  if (variety instanceof Curve) {
    if (P instanceof Point && (P.curve === variety || P.curve.equals(variety))) {
      return toCoordinates(variety.field, P.coordinates);
    }
  } else if (P instanceof PlanePoint && (P.curve === variety || `${P.curve}` === `${variety}`)) {
    return P.coordinates;
  } else if (isCoordinates(P)) return variety.point(P).coordinates;
  throw new DomainError({
    subject,
    given: P instanceof Point || P instanceof PlanePoint ? `a point of ${P.curve}` : `${String(P)}`,
    expected: `a point of ${variety}`,
    argument: "P",
  });
}

function isCoordinates<T>(P: Point<T> | PointInput<T>): P is Exclude<PointInput<T>, PlanePoint<T>> {
  return typeof P === "object" && P !== null && Object.getPrototypeOf(P) === Object.prototype;
}

export function pointOn<T>(variety: Variety<T>, coordinates: Coordinates<T>): Point<T> | PlanePoint<T> {
  if (variety instanceof Curve) return new Point(variety, toAffine(variety.field, coordinates));
  return new PlanePoint(variety, coordinates);
}
