// The refusal of a singular cubic: where it is singular, of what kind, and what group its smooth part is.

import { squarefreePart } from "../algebra/factor.ts";
import type { Field } from "../algebra/field.ts";
import { longEquation } from "../curve/equation/equations.ts";
import { plainEquation } from "../curve/equation/print.ts";
import { type Singularity, singularityOf } from "../curve/singular.ts";
import type { Coefficients } from "../curve/weierstrass.ts";
import { Rational } from "../number/rational.ts";
import { DomainError } from "../proof/errors.ts";

/** DomainError for a model with Δ = 0, which names the singular point, its kind and the group of the smooth part. */
export function singularCurve<T>(F: Field<T>, a: Coefficients<T>): DomainError {
  const singularity = singularityOf(F, a);
  const [x, y] = singularity.point.map((c) => F.format(c));
  return new DomainError({
    subject: "curve",
    given: `${plainEquation(F, longEquation(F, a))} is singular, ${describe(F, singularity)} at (${x}, ${y})`,
    expected: "discriminant ≠ 0",
    hint: `Its smooth part is ${smoothGroup(F, singularity)}.`,
    argument: "equation",
  });
}

function describe<T>(F: Field<T>, { kind, tangents }: Singularity<T>): string {
  if (kind === "cusp") return "a cusp";
  if (kind === "split node") return `a node with two tangents over ${F.name} (split)`;
  const isolated = tangents instanceof Rational && tangents.sign() < 0;
  const point = isolated ? "an isolated real point, a node with conjugate tangents" : "a node with conjugate tangents";
  return `${point} (nonsplit, slopes in ${quadraticName(F, tangents)})`;
}

function smoothGroup<T>(F: Field<T>, { kind, tangents }: Singularity<T>): string {
  if (kind === "cusp") return `the additive group of ${F.name}`;
  if (kind === "split node") return `the multiplicative group of ${F.name}`;
  return `the group of elements of norm 1 in ${quadraticName(F, tangents)}`;
}

/** "Q(√3)": over Q the root is of a squarefree integer. */
function quadraticName<T>(F: Field<T>, d: T): string {
  return `${F.name}(√${d instanceof Rational ? squarefreePart(d.num * d.den) : F.format(d)})`;
}
