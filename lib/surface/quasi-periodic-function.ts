import { QUASI_PERIOD } from "../lattice/operations.ts";
import type { PeriodLattice } from "../lattice/period-lattice.ts";
import { apply, type Complex, type ComplexNumeric, type Real } from "../number/values.ts";
import type { ConventionKey } from "../proof/conventions.ts";
import { Callable } from "./callable.ts";
import { EllipticFunction } from "./elliptic-function.ts";
import type { LaurentExpansion } from "./laurent-expansion.ts";
import { quasiExpansion } from "./quasi-expansion.ts";
import { quasiValue } from "./quasi-value.ts";

/** Weierstrass ζ or σ: a value that is called as f(z); not elliptic, but with a known change under each period. */
export class QuasiPeriodicFunction extends Callable {
  readonly lattice: PeriodLattice;
  readonly kind: "zeta" | "sigma";

  constructor(lattice: PeriodLattice, kind: "zeta" | "sigma") {
    super((z) => quasiValue(lattice, kind, z));
    this.lattice = lattice;
    this.kind = kind;
  }

  /** η1, η2: ζ(z + ω_k) = ζ(z) + η_k and σ(z + ω_k) = −exp(η_k (z + ω_k/2)) σ(z). */
  get quasiPeriods(): readonly [Real | Complex, Real | Complex] {
    return [apply(QUASI_PERIOD, [this.lattice, 1]), apply(QUASI_PERIOD, [this.lattice, 2])];
  }

  /** ζ′ = −℘ for ζ; the logarithmic derivative ζ for σ. */
  get derivative(): EllipticFunction {
    if (this.kind === "zeta") return EllipticFunction.wp(this.lattice).neg();
    throw new TypeError("sigma.derivative: σ′ = ζσ is not elliptic; L.zeta is the logarithmic derivative of σ");
  }

  /**
   * The Laurent series at p with n coefficients from the leading one: exact at lattice points where the invariants are.
   *
   * Domain   any p. At a lattice point w the series of ζ has the constant term η(w), and that of σ the factor ±exp(η(w)(t + w/2)).
   */
  laurent(p: ComplexNumeric, n = 8): LaurentExpansion {
    return quasiExpansion(this.lattice, this.kind, p, n);
  }

  /** The coefficient of 1/(z − p): 1 for ζ at a lattice point, else 0. */
  residue(p: ComplexNumeric): Real | Complex {
    return this.laurent(p, 1).residue;
  }

  get conventions(): readonly ConventionKey[] {
    return this.kind === "zeta" ? ["quasiPeriods"] : [];
  }

  override toString(): string {
    return this.kind === "zeta" ? "ζ" : "σ";
  }
}
