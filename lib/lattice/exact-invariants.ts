// g2 and g3 where they are known exactly: as given, 0 by symmetry, or those of an overlattice by its points of finite order.

import type { Exact } from "../number/origin.ts";
import { Rational } from "../number/rational.ts";
import { exactFormOf } from "./exact-form.ts";
import { rationalPoint } from "./exact-torsion.ts";
import { exactComplexOf } from "./field/exact-value.ts";
import type { Given, PeriodLattice } from "./period-lattice.ts";
import { exactRational } from "./quantity.ts";
import { shapeOf } from "./shape.ts";
import { type Coordinates, nearestRepresentative } from "./torus.ts";

/**
 * The exact value of an invariant, if it is known.
 *
 * Method   a lattice with a rotation of order four has g3 = 0, one of order three g2 = 0 (DLMF 23.5(iii), 23.5(v)). For an overlattice with the
 *          new points p, ℘ of it is ℘(z) + Σ (℘(z+p) − ℘(p)), whose coefficients of z² and z⁴ are g2/20 and g3/28.
 */
export function exactInvariant(lattice: PeriodLattice, index: "g2" | "g3"): Exact | undefined {
  const { given } = lattice;
  if (given.kind === "invariants") return exactComplexOf(given[index]);
  if (given.kind === "points") {
    const both = overlatticeInvariants(given);
    if (both) return both[index];
  }
  if (!exactFormOf(given)) return undefined;
  return shapeOf(lattice) === (index === "g3" ? "square" : "hexagonal") ? Rational.zero : undefined;
}

function overlatticeInvariants(given: Extract<Given, { kind: "points" }>): { g2: Rational; g3: Rational } | undefined {
  const base = given.base.given;
  if (base.kind !== "invariants") return undefined;
  const [g2, g3] = [exactRational(base.g2), exactRational(base.g3)];
  const points = newPoints(given.rows);
  if (!g2 || !g3 || !points) return undefined;
  let [two, three] = [g2, g3];
  for (const p of points) {
    const x = rationalPoint(given.base, p)?.x;
    if (!x) return undefined;
    // ℘″ = 6℘² − g2/2 and ℘⁗ = 120℘³ − 18 g2 ℘ − 12 g3.
    two = two.plus(x.pow(2).times(60).minus(g2.times(5)));
    three = three.plus(x.pow(3).times(140).minus(g2.times(x).times(21)).minus(g3.times(14)));
  }
  return { g2: two, g3: three };
}

/** Most points that are added up. */
const MOST_INDEX = 24n;

/** Representatives of the nonzero classes of an overlattice; undefined if the rows do not hold the base, or too many classes. */
function newPoints([[a, b], [c, d]]: Extract<Given, { kind: "points" }>["rows"]): Coordinates[] | undefined {
  const det = a.times(d).minus(b.times(c));
  const inverse = [d.div(det), b.div(det), c.div(det), a.div(det)];
  const index = det.inv().abs();
  if (!inverse.every((q) => q.isInteger()) || index.num > MOST_INDEX) return undefined;
  const found = new Map<string, Coordinates>();
  const n = Number(index.num);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      const p = nearestRepresentative([a.times(i).plus(c.times(j)), b.times(i).plus(d.times(j))]);
      found.set(`${p}`, p);
    }
  }
  return [...found.values()].filter((p) => p.some((q) => q.sign() !== 0));
}
