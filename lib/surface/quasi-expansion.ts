// The series of ζ and σ at a point.

import { fieldOf } from "../lattice/field/element.ts";
import { sigmaAtOrigin, zetaAtOrigin } from "../lattice/field/quasi-laurent.ts";
import { QUASI_COEFFICIENT } from "../lattice/field/quasi-operations.ts";
import { exactOf, type Scalar } from "../lattice/field/scalar.ts";
import type { PeriodLattice } from "../lattice/period-lattice.ts";
import { Rational } from "../number/rational.ts";
import { apply, Complex, type ComplexNumeric, scalar } from "../number/values.ts";
import { checkCount, LaurentExpansion } from "./laurent-expansion.ts";
import { TorusPoint } from "./torus-point.ts";

/** See `QuasiPeriodicFunction.laurent`. */
export function quasiExpansion(
  lattice: PeriodLattice,
  kind: "zeta" | "sigma",
  p: ComplexNumeric,
  n: number,
): LaurentExpansion {
  checkCount(n);
  const point = placeOf(lattice, p);
  const start = point.isLatticePoint ? (kind === "zeta" ? -1 : 1) : 0;
  const rest = point.remainder ? [point.remainder] : [];
  const exact = exactSeries(lattice, kind, point, n);
  const coefficient = (k: number, known: readonly (Scalar | undefined)[]) => {
    const s = known[k];
    return apply(QUASI_COEFFICIENT, [lattice, kind, k, ...point.coordinates, ...rest], s && exactOf(s));
  };
  const list = Array.from({ length: n }, (_, k) => coefficient(k, exact));
  const shown = p instanceof TorusPoint || point.isLatticePoint ? point : Complex.from(scalar(p, "laurent"));
  return new LaurentExpansion(shown, start, list, (k) => coefficient(k, exactSeries(lattice, kind, point, k + 1)));
}

function placeOf(lattice: PeriodLattice, p: ComplexNumeric): TorusPoint {
  if (p instanceof TorusPoint && p.lattice === lattice) return p;
  const number = scalar(p, "laurent");
  const zero = number.exact instanceof Rational && number.exact.sign() === 0;
  return new TorusPoint(lattice, [Rational.zero, Rational.zero], zero ? undefined : number);
}

/** At 0 the coefficients are polynomials in g2 and g3 over Q; at another lattice point those of ζ but for the constant term are, too. */
function exactSeries(
  lattice: PeriodLattice,
  kind: "zeta" | "sigma",
  point: TorusPoint,
  n: number,
): readonly (Scalar | undefined)[] {
  if (!point.isLatticePoint) return [];
  const origin = point.coordinates.every((q) => q.sign() === 0);
  if (!origin && kind === "sigma") return [];
  const { ring, cubic } = fieldOf(lattice);
  const [g3, g2] = [0, 1].map((k) => ring.neg(cubic[k] ?? ring.zero)) as [Scalar, Scalar];
  const series = (kind === "zeta" ? zetaAtOrigin : sigmaAtOrigin)(ring, g2, g3, n);
  return origin ? series : series.map((c, k) => (k === 1 ? undefined : c));
}
