// The way from a cubic or a quartic with a point to its Weierstrass model, as a derivation.

import type { ThroughPoint } from "../../surface/cubic.ts";
import { Curve } from "../../surface/curve.ts";
import { Morphism } from "../../surface/morphism.ts";
import type { PlaneCurve } from "../../surface/variety.ts";
import { Derivation } from "../derivation.ts";

export function isThroughPoint(value: unknown): value is ThroughPoint<PlaneCurve> {
  if (typeof value !== "object" || value === null) return false;
  const { curve, to, from, steps } = value as Partial<ThroughPoint<PlaneCurve>>;
  return curve instanceof Curve && to instanceof Morphism && from instanceof Morphism && steps !== undefined;
}

export function throughWorking({ curve, to, from, steps }: ThroughPoint<PlaneCurve>): Derivation {
  const { point, tangent, third, flex, raw, change } = steps;
  let working = new Derivation("From the curve and its point to a Weierstrass model").step(
    "the point that becomes $O$",
    {
      value: point,
      check: { kind: "proved", argument: "exact substitution into the equation" },
    },
  );
  if (tangent) working = working.step("the tangent there, where this form vanishes", { value: tangent });
  if (third) {
    working = flex
      ? working.step("the point is a flex: the tangent meets the cubic only there")
      : working.step("the tangent meets the cubic again in", { value: third });
  }
  return working
    .step("the model that lines through this point give", { value: raw })
    .step("the change to the reduced global minimal model, $x = u^2x' + r$, $y = u^3y' + su^2x' + t$", {
      value: change,
    })
    .step("the reduced global minimal model", { value: curve })
    .step("the map to it", { value: to, check: to.verify() })
    .step("the map back", { value: from, check: from.verify() });
}
