import type { ComplexNumeric } from "../number/values.ts";
import type { Lattice } from "../surface/lattice.ts";
import { TorusPoint } from "../surface/torus-point.ts";
import { complexDouble, type RealInput, realWindow } from "./doubles.ts";
import { fact } from "./facts.ts";
import type { Figure } from "./figure.ts";
import { drawLattice } from "./lattice-picture.ts";
import { type Named, namedEntries } from "./named.ts";

export interface LatticeFigureOptions {
  /** Points to be marked, by their names: { c: ω1/3 }. Those of a list are named by their coordinates or z1, z2, ... */
  readonly points?: Named<ComplexNumeric>;
  /** A second lattice, such as a sublattice or an overlattice: its points are rings, the outline of its cell is dashed. */
  readonly overlay?: Lattice;
  /** The part of the plane to be shown at least; else the cell with the lattice points around it. */
  readonly window?: { readonly x: readonly [RealInput, RealInput]; readonly y: readonly [RealInput, RealInput] };
}

/**
 * A lattice in the plane of z: lattice points, the cell of its own basis shaded, ω1 and ω2 as arrows, and marked points.
 *
 * Error    drawn in double precision: a picture proves nothing.
 * @example figure.lattice(L, { points: { c: L.at(1/3, 0) } })
 */
export function lattice(L: Lattice, options: LatticeFigureOptions = {}): Figure {
  const { overlay } = options;
  const named = namedEntries(options.points, nameOf);
  return drawLattice({
    title: "Period lattice",
    periods: plainPeriods(L),
    ...(overlay ? { overlay: plainPeriods(overlay) } : {}),
    periodNames: ["ω1", "ω2"],
    marks: named.map(([label, z]) => ({ at: complexDouble("figure.lattice", z), label })),
    ...(options.window ? { window: realWindow("figure.lattice", options.window) } : {}),
    remarks: [],
    data: {
      figure: "lattice",
      periods: L.periods.map((w) => fact(w.digits(12))),
      ...(overlay ? { overlay: overlay.periods.map((w) => fact(w.digits(12))) } : {}),
      points: Object.fromEntries(named.map(([name, z]) => [name, fact(z)])),
    },
  });
}

function plainPeriods(L: Lattice): readonly [readonly [number, number], readonly [number, number]] {
  const [w1, w2] = L.periods;
  return [complexDouble("figure.lattice", w1), complexDouble("figure.lattice", w2)];
}

function nameOf(z: ComplexNumeric, index: number): string {
  return z instanceof TorusPoint && !z.remainder ? z.name : `z${index + 1}`;
}
