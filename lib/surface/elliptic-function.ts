import { LatticePointError, type Wanted } from "../function/weierstrass.ts";
import { rationalRoot } from "../lattice/exact-roots.ts";
import { WEIERSTRASS } from "../lattice/operations.ts";
import type { PeriodLattice } from "../lattice/period-lattice.ts";
import { Rational } from "../number/rational.ts";
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
  if (!(z instanceof TorusPoint && z.lattice === lattice)) {
    return apply(WEIERSTRASS[kind].number, [lattice, scalar(z, kind)]);
  }
  if (z.isLatticePoint && kind !== "sigma") throw poleAt(z, kind);
  const rest = z.remainder ? [z.remainder] : [];
  return apply(WEIERSTRASS[kind].point, [lattice, ...z.coordinates, ...rest], exactValue(z, kind));
}

/** Values that symmetry alone settles: ℘′ at the half-periods (and ℘ there, if it is rational), σ at lattice points. */
function exactValue(z: TorusPoint, kind: Wanted): Rational | undefined {
  if (kind === "sigma") return z.isLatticePoint ? Rational.zero : undefined;
  if (z.order !== 2n || kind === "zeta") return undefined;
  if (kind === "prime") return Rational.zero;
  const [first, second] = z.coordinates.map((q) => !q.isInteger());
  return rationalRoot(z.lattice, first ? (second ? 2 : 1) : 3);
}

function poleAt(z: TorusPoint, kind: string): LatticePointError {
  const [m, n] = z.coordinates;
  return new LatticePointError(m.num, n.num, z.name, kind);
}
