import { LatticePointError } from "../function/weierstrass.ts";
import { WEIERSTRASS } from "../lattice/operations.ts";
import type { PeriodLattice } from "../lattice/period-lattice.ts";
import { Rational } from "../number/rational.ts";
import { apply, type Complex, type ComplexNumeric, type Real, scalar } from "../number/values.ts";
import { TorusPoint } from "./torus-point.ts";

/** ζ or σ at a number or a point of the torus; σ is exactly 0 at lattice points. */
export function quasiValue(lattice: PeriodLattice, kind: "zeta" | "sigma", z: ComplexNumeric): Real | Complex {
  if (!(z instanceof TorusPoint && z.lattice === lattice)) {
    return apply(WEIERSTRASS[kind].number, [lattice, scalar(z, kind)]);
  }
  const [m, n] = z.coordinates;
  if (z.isLatticePoint && kind === "zeta") throw new LatticePointError(m.num, n.num, z.name, kind);
  const rest = z.remainder ? [z.remainder] : [];
  return apply(WEIERSTRASS[kind].point, [lattice, m, n, ...rest], z.isLatticePoint ? Rational.zero : undefined);
}
