// An isogeny as forms, for maps that are applied, composed and printed.

import type { Field } from "../../algebra/field.ts";
import { fromTerms, type Polynomial } from "../../algebra/multivariate.ts";
import { mulUni, type Univariate } from "../../algebra/univariate.ts";
import type { AbscissaMap } from "../abscissamap.ts";
import { ordinateOf } from "../isogeny.ts";
import type { FormMap } from "./map.ts";
import { weierstrassModel } from "./weierstrassmodel.ts";

/** (X : Y : 1) over the common denominator two²·rest³, made homogeneous by z. */
export function isogenyMap<T>(F: Field<T>, isogeny: AbscissaMap<T>): FormMap<T> {
  const a = isogeny.source;
  const { two, rest } = isogeny.kernel;
  const mul = (...factors: Univariate<T>[]) => factors.reduce((f, g) => mulUni(F, f, g));
  const X = mul(isogeny.numerator, two, rest);
  const [free, linear] = ordinateOf(F, a, isogeny, isogeny.factor);
  const Z = mul(two, two, rest, rest, rest);
  const degree = Math.max(X.length, free.length, linear.length + 1, Z.length) - 1;
  const form = (f: Univariate<T>, y: number) => f.map((c, k) => [c, [k, y, degree - k - y]] as const);
  const forms: Polynomial<T>[] = [
    fromTerms(F, ["x", "y", "z"], form(X, 0)),
    fromTerms(F, ["x", "y", "z"], [...form(free, 0), ...form(linear, 1)]),
    fromTerms(F, ["x", "y", "z"], form(Z, 0)),
  ];
  return { from: weierstrassModel(F, a), to: weierstrassModel(F, isogeny.target), forms };
}
