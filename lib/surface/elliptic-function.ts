import type { Wanted } from "../function/weierstrass.ts";
import { WEIERSTRASS } from "../lattice/operations.ts";
import type { PeriodLattice } from "../lattice/period-lattice.ts";
import { apply, type Complex, type ComplexNumeric, type Real, scalar } from "../number/values.ts";
import { Callable } from "./callable.ts";
import { TorusPoint } from "./torus-point.ts";

/** An elliptic function of a lattice: a value that is called as f(z). */
export class EllipticFunction extends Callable {
  readonly lattice: PeriodLattice;
  readonly kind: "wp" | "prime";

  constructor(lattice: PeriodLattice, kind: "wp" | "prime") {
    super((z) => evaluate(lattice, kind, z));
    this.lattice = lattice;
    this.kind = kind;
  }

  /** ℘′ for ℘. */
  get prime(): EllipticFunction {
    return new EllipticFunction(this.lattice, "prime");
  }
}

/** ζ or σ: not elliptic, but with a known change under each period. */
export class QuasiPeriodicFunction extends Callable {
  readonly lattice: PeriodLattice;
  readonly kind: "zeta" | "sigma";

  constructor(lattice: PeriodLattice, kind: "zeta" | "sigma") {
    super((z) => evaluate(lattice, kind, z));
    this.lattice = lattice;
    this.kind = kind;
  }
}

function evaluate(lattice: PeriodLattice, kind: Wanted, z: ComplexNumeric): Real | Complex {
  if (z instanceof TorusPoint && z.lattice === lattice) {
    const rest = z.remainder ? [z.remainder] : [];
    return apply(WEIERSTRASS[kind].point, [lattice, ...z.coordinates, ...rest]);
  }
  return apply(WEIERSTRASS[kind].number, [lattice, scalar(z, kind)]);
}
