// The answer of C.through(P), known by its shape.

import type { ThroughPoint } from "../surface/cubic.ts";
import { Curve } from "../surface/curve.ts";
import { Morphism } from "../surface/morphism.ts";
import type { PlaneCurve } from "../surface/variety.ts";

export function isThroughPoint(value: unknown): value is ThroughPoint<PlaneCurve> {
  if (typeof value !== "object" || value === null) return false;
  const { curve, to, from, steps } = value as Partial<ThroughPoint<PlaneCurve>>;
  const isOne = curve instanceof Curve && to instanceof Morphism && from instanceof Morphism && steps !== undefined;
  return isOne && curve.field.name === "Q"; // the steps lead to a minimal model
}
