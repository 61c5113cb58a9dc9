// A map of elliptic curves on their lattices.

import { Complex, type Real } from "../number/values.ts";
import { DomainError, UndecidedError } from "../proof/errors.ts";
import { Curve } from "./curve.ts";
import type { Coordinate } from "./fields.ts";
import type { IntegerMatrix } from "./lattice.ts";
import { overlapsInteger } from "./lattice-relations.ts";
import type { AnyVariety } from "./space.ts";

/**
 * M with c·(ω1, ω2) = M·(ω1′, ω2′). A homomorphism of curves is one of their tori, so the entries are integers, and an enclosure that holds
 * one integer is that integer.
 */
export function periodMatrixOf(from: AnyVariety, to: AnyVariety, c: Coordinate, degree: number): IntegerMatrix {
  if (!(from instanceof Curve && to instanceof Curve && from.field.characteristic === 0n)) {
    throw new DomainError({
      subject: "periodMatrix",
      given: `a map from ${from} to ${to}`,
      expected: "elliptic curves over Q, a quadratic field, R or C",
    });
  }
  const target = to.lattice();
  const rows = from.lattice().periods.map((w) => {
    const { r, s } = target.locate(Complex.from(w).times(Complex.from(c)));
    return [r, s].map(wholeNumber) as [bigint, bigint];
  }) as [[bigint, bigint], [bigint, bigint]];
  const [[m, n], [k, l]] = rows;
  if (m * l - n * k !== BigInt(degree)) throw new Error("the determinant of a map on the periods is its degree");
  return rows;
}

function wholeNumber(x: Real): bigint {
  const nearest = x.plus("1/2").midpoint.floor();
  if (nearest !== undefined && overlapsInteger(x) && x.radius.lessThan("1/4")) return nearest;
  throw new UndecidedError({ subject: "periodMatrix", given: `the coordinate ${x}`, expected: "an integer" });
}
