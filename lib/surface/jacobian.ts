// The Jacobian of a curve as written, which says that it is no more than that.

import type { Coefficients } from "../curve/weierstrass.ts";
import { Curve } from "./curve.ts";
import { simplestModel } from "./joined.ts";
import type { PlaneCurve } from "./variety.ts";

/** The simplest model of the Jacobian, with its notice. */
export function jacobianCurve<T>(C: PlaneCurve<T>, a: Coefficients<T>): Curve<T> {
  const F = C.field;
  const notice =
    F.characteristic === 0n
      ? `only the Jacobian: isomorphic to the given curve if and only if that has a point over ${F.name}; through(P) gives the maps for a point P`
      : "the Jacobian; the given curve has a point, as every curve of genus 1 over a finite field, and through(P) gives the maps";
  return new Curve(F, simplestModel(F, a).a, undefined, notice);
}
