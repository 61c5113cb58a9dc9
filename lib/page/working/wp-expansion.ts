// ℘ by its expansions, and the place of a value on its lattice: what several workings use.

import { WP_SERIES } from "../../function/wp-series.ts";
import type { PeriodLattice } from "../../lattice/period-lattice.ts";
import type { Operation } from "../../number/origin.ts";
import { i, π } from "../../number/symbols.ts";
import { apply, Complex, type ComplexNumeric, type Real } from "../../number/values.ts";
import { Lattice } from "../../surface/lattice.ts";
import { TorusPoint } from "../../surface/torus-point.ts";
import { plainNumber } from "./parts.ts";

/** The lattice and the argument of a number that is a value of the operation on a lattice, read from its record. */
export function placeOf(
  x: Real | Complex,
  operation: string,
): { readonly L: Lattice; readonly z: Complex } | undefined {
  if (x.origin?.operation.name !== operation) return undefined;
  const [data, ...rest] = x.origin.operands;
  const L = new Lattice(data as PeriodLattice);
  if (rest.length === 1) return { L, z: Complex.from(rest[0] as ComplexNumeric) };
  const [r, s, more] = rest as [never, never, Real | Complex | undefined];
  const exact = L.at(r, s);
  return { L, z: more ? exact.plus(more) : exact };
}

/** ℘(z) by one of its expansions, its tail enclosed: no theta function is used. */
export function wpByExpansion(L: Lattice, z: Complex, expansion: Operation = WP_SERIES): Complex {
  const { rest } = near(L, z);
  const v1 = plainNumber(L.reduced.periods[0]);
  const v = plainNumber(rest).div(v1);
  return scaleOf(v1).times(apply(expansion, [v, L.reduced.tau]));
}

/** (2πi/ω1)² */
export function scaleOf(w1: Complex): Complex {
  return Complex.from(π).times(2).times(i).div(w1).pow(2);
}

/** z by a nearest lattice point. */
export function near(L: Lattice, z: Complex) {
  if (z instanceof TorusPoint && !z.remainder) {
    const nearest = L.locate(plainNumber(z)).nearest;
    return { nearest, rest: z.minus(nearest) as Complex };
  }
  return L.locate(z);
}
