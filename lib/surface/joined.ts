// The maps between a curve as written and its minimal model, put together from a construction and a change of model.

import type { Field } from "../algebra/field.ts";
import { globalMinimalModel, toRationals } from "../arithmetic/minimal.ts";
import { changeOfAbscissa } from "../curve/abscissamap.ts";
import { composeMaps, type FormMap } from "../curve/map/map.ts";
import { changeMap } from "../curve/map/weierstrassmodel.ts";
import { type Coefficients, invertChange, type ModelChange } from "../curve/weierstrass.ts";
import type { Rational } from "../number/rational.ts";
import { Curve } from "./curve.ts";
import { Morphism, type MorphismData } from "./morphism.ts";
import type { PlaneCurve } from "./variety.ts";

export interface Construction<T> {
  readonly to: FormMap<T>;
  readonly from: FormMap<T>;
  readonly rawModel: Coefficients<T>;
  readonly basePoint: readonly T[];
}

/** A curve as an elliptic curve: over Q its reduced global minimal model, over other fields the model that the construction gives. */
export function joinedCurve<T, C extends PlaneCurve<T>>(source: C, { to, from, rawModel, basePoint }: Construction<T>) {
  const { field: F } = source;
  const { a, change } = simplestModel(F, rawModel);
  const curve = new Curve(F, a);
  const there = change ? composeMaps(to, changeMap(F, rawModel, change)) : to;
  const back = change ? composeMaps(changeMap(F, a, invertChange(F, change)), from) : from;
  const forward: MorphismData<T> = {
    map: there,
    degree: 1,
    title: "birational map",
    basePoint,
    inverse: () => backward,
  };
  const backward: MorphismData<T> = { map: back, degree: 1, title: "birational map", inverse: () => forward };
  return {
    curve,
    to: new Morphism<C, Curve<T>>(source, curve, forward as MorphismData<unknown>),
    from: new Morphism<Curve<T>, C>(curve, source, backward as MorphismData<unknown>),
    raw: new Curve(F, rawModel),
    change,
  };
}

/** The reduced global minimal model over Q with the change to it; over other fields the model itself. */
export function simplestModel<T>(
  F: Field<T>,
  a: Coefficients<T>,
): { readonly a: Coefficients<T>; readonly change?: ModelChange<T> } {
  if (F.name !== "Q") return { a };
  const minimal = globalMinimalModel(a as unknown as Coefficients<Rational>);
  return {
    a: toRationals(minimal.a) as unknown as Coefficients<T>,
    change: minimal.change as unknown as ModelChange<T>,
  };
}

/** The change of model as a map of curves with its inverse. */
export function changeMorphism<T>(from: Curve<T>, to: Curve<T>, change: ModelChange<T>): Morphism<Curve<T>, Curve<T>> {
  const F = from.field;
  const data = (a: Coefficients<T>, by: ModelChange<T>, back: () => MorphismData<T>): MorphismData<T> => {
    let map: FormMap<T> | undefined;
    return {
      degree: 1,
      title: "change of model",
      change: by,
      abscissa: changeOfAbscissa(F, a, by),
      inverse: back,
      // Most changes of model are only read as (u, r, s, t).
      get map() {
        map ??= changeMap(F, a, by);
        return map;
      },
    };
  };
  const forward = data(from.a, change, () => backward);
  const backward = data(to.a, invertChange(F, change), () => forward);
  return new Morphism<Curve<T>, Curve<T>>(from, to, forward as MorphismData<unknown>);
}
