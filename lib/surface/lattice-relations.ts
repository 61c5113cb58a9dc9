// How lattices lie to each other and to points: what the methods of Lattice delegate to.

import { determinant, type Rows } from "../lattice/related.ts";
import type { Coordinates } from "../lattice/torus.ts";
import { Rational } from "../number/rational.ts";
import { Complex, Real, scalar } from "../number/values.ts";
import { DomainError } from "../proof/errors.ts";
import type { Lattice } from "./lattice.ts";
import { TorusPoint } from "./torus-point.ts";

export function exactCoordinates(lattice: Lattice, p: TorusPoint): Coordinates {
  if (p instanceof TorusPoint && p.lattice === lattice.data && !p.remainder) return p.coordinates;
  const near = nearestTorsion(lattice, scalar(p, "overlattice"));
  throw new DomainError({
    subject: "overlattice",
    given: near ?? `the number ${p}`,
    expected: "a point of finite order, by exact coordinates such as L.at(1/3, 0)",
    hint: near ? "A number is not taken to the torsion point beside it." : "",
    argument: "points",
  });
}

/** "3p differs from the lattice point ω1 by 3e-9: not torsion", for the best n <= 60. */
function nearestTorsion(lattice: Lattice, p: Real | Complex): string | undefined {
  const { r, s } = lattice.locate(p);
  const [x, y] = [r.toDouble(), s.toDouble()];
  const gap = (n: number) => Math.max(Math.abs(n * x - Math.round(n * x)), Math.abs(n * y - Math.round(n * y)));
  let best = 1;
  for (let n = 2; n <= 60; n++) if (gap(n) < gap(best) / n) best = n;
  if (gap(best) > 0.01) return undefined;
  const near = lattice.at(Math.round(best * x), Math.round(best * y));
  const distance = Complex.from(p).times(best).minus(Complex.from(near)).abs().toDouble();
  const [multiple, shown] = [best === 1 ? "p" : `${best}p`, distance.toExponential(1)];
  return `the number p = ${p}, where ${multiple} differs from the lattice point ${near.name} by ${shown}: not torsion`;
}

/** Coordinates of the periods of L in M, as exact numbers where both come from one lattice. */
export function coordinatesIn(L: Lattice, M: Lattice): readonly (readonly [Real, Real])[] {
  const base = M.within?.lattice ?? M;
  const rows = rowsOver(L, base);
  if (rows) {
    const own = rowsOver(M, base)!;
    return rows.map((row) => solvedIn(own, row).map((q) => Real.from(q)) as unknown as [Real, Real]);
  }
  return L.periods.map((w) => {
    const { r, s } = M.locate(Complex.from(w).plus(0));
    return [r, s] as const;
  });
}

/** The basis of L in coordinates of the base, if L was made from it. */
function rowsOver(L: Lattice, base: Lattice): Rows | undefined {
  const [one, zero] = [Rational.one, Rational.zero];
  if (L.data === base.data) {
    return [
      [one, zero],
      [zero, one],
    ];
  }
  return L.within?.lattice.data === base.data ? L.within.rows : undefined;
}

/** The row vector in coordinates of the rows. */
function solvedIn(rows: Rows, [u, v]: readonly [Rational, Rational]): [Rational, Rational] {
  const [[a, b], [c, d]] = rows;
  const det = determinant(rows);
  return [u.times(d).minus(v.times(c)).div(det), v.times(a).minus(u.times(b)).div(det)];
}

export function overlapsInteger(x: Real): boolean {
  if (x.exact instanceof Rational) return x.exact.isInteger();
  return x.overlaps(Real.from(x.plus(Rational.of(1, 2)).midpoint.floor()!));
}

/** Hermite forms [[a, b], [0, d]], ad = n, 0 <= b < d: one for each sublattice of index n. */
export function indexMatrices(n: number, subject: string): [[bigint, bigint], [bigint, bigint]][] {
  if (!(Number.isSafeInteger(n) && n >= 1 && n <= 1000)) {
    throw new DomainError({ subject, given: `the index ${n}`, expected: "an integer from 1 to 1000", argument: "n" });
  }
  const list: [[bigint, bigint], [bigint, bigint]][] = [];
  for (let a = 1; a <= n; a++) {
    if (n % a !== 0) continue;
    for (let b = 0; b < n / a; b++)
      list.push([
        [BigInt(a), BigInt(b)],
        [0n, BigInt(n / a)],
      ]);
  }
  return list;
}
