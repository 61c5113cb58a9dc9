// The maps between a curve as written and its minimal model, put together from a construction and a change of model.

import { rationals as Q } from "../algebra/rationals.ts";
import { changeOfAbscissa } from "../curve/abscissamap.ts";
import { composeMaps, type FormMap } from "../curve/map/map.ts";
import { changeMap } from "../curve/map/weierstrassmodel.ts";
import { type Coefficients, changeModel, invertChange, type ModelChange } from "../curve/weierstrass.ts";
import type { Rational } from "../number/rational.ts";
import type { Curve } from "./curve.ts";
import { Morphism, type MorphismData } from "./morphism.ts";
import type { PlaneCurve } from "./variety.ts";

export interface Construction {
  readonly to: FormMap<Rational>;
  readonly from: FormMap<Rational>;
  readonly rawModel: Coefficients<Rational>;
  readonly change: ModelChange<Rational>;
  readonly basePoint: readonly Rational[];
}

/** The maps between a curve and the minimal model of its raw Weierstrass form, each the other's inverse. */
export function joinedMorphism<C extends PlaneCurve>(
  source: C,
  target: Curve,
  { to, from, rawModel, change, basePoint }: Construction,
): { readonly to: Morphism<C, Curve>; readonly from: Morphism<Curve, C> } {
  const minimal = changeModel(Q, rawModel, change);
  const there = composeMaps(to, changeMap(Q, rawModel, change));
  const back = composeMaps(changeMap(Q, minimal, invertChange(Q, change)), from);
  const forward: MorphismData<Rational> = {
    map: there,
    degree: 1,
    title: "birational map",
    basePoint,
    inverse: () => backward,
  };
  const backward: MorphismData<Rational> = { map: back, degree: 1, title: "birational map", inverse: () => forward };
  return {
    to: new Morphism<C, Curve>(source, target, forward as MorphismData<unknown>),
    from: new Morphism<Curve, C>(target, source, backward as MorphismData<unknown>),
  };
}

/** The change of model as a map of curves with its inverse. */
export function changeMorphism<T>(from: Curve<T>, to: Curve<T>, change: ModelChange<T>): Morphism<Curve<T>, Curve<T>> {
  const F = from.field;
  const data = (a: Coefficients<T>, by: ModelChange<T>, back: () => MorphismData<T>): MorphismData<T> => ({
    map: changeMap(F, a, by),
    degree: 1,
    title: "change of model",
    change: by,
    abscissa: changeOfAbscissa(F, a, by),
    inverse: back,
  });
  const forward = data(from.a, change, () => backward);
  const backward = data(to.a, invertChange(F, change), () => forward);
  return new Morphism<Curve<T>, Curve<T>>(from, to, forward as MorphismData<unknown>);
}
