import { sameExact } from "../number/exactness.ts";
import { Complex, type Real } from "../number/values.ts";
import { DomainError, UndecidedError } from "../proof/errors.ts";
import type { Standing } from "../proof/standing.ts";
import { numberStanding } from "./claim-number.ts";
import type { Lattice } from "./lattice.ts";

/** M = αL: multiplication by α takes the first lattice onto the second. */
export class Homothety {
  readonly from: Lattice;
  readonly to: Lattice;
  /** The factor; with it −α, and for square and hexagonal lattices i or a sixth root of unity times α. */
  readonly factor: Complex;
  /** Proved if both j, or both reduced τ, are exact and equal; else the j agree within their enclosures. */
  readonly standing: Standing;

  constructor(from: Lattice, to: Lattice, factor: Complex, standing: Standing) {
    this.from = from;
    this.to = to;
    this.factor = factor;
    this.standing = standing;
  }

  toString(): string {
    return `Λ2 = αΛ1 with α = ${this.factor}`;
  }
}

/**
 * The homothety from L onto M.
 *
 * Branch   α takes the reduced basis of L to that of M.
 * Throws   DomainError with both j if they differ: lattices are homothetic if and only if their j is the same.
 *          UndecidedError if the j cannot be told apart and are not exact.
 */
export function homothety(L: Lattice, M: Lattice): Homothety {
  const [j, k] = [L.j, M.j];
  const same = sameInvariant(j, k);
  if (same === false) {
    throw new DomainError({
      subject: "homothety",
      given: `lattices with j = ${j} and j = ${k}`,
      expected: "lattices with the same j",
      hint: "Lattices are homothetic if and only if their j agree.",
    });
  }
  const [r, s] = [L.reduced, M.reduced];
  if (!r.tau.overlaps(s.tau)) {
    throw new UndecidedError({
      subject: "homothety",
      given: "reduced bases on the boundary of the fundamental domain that enclosures do not settle",
      expected: "lattices given exactly",
    });
  }
  const factor = Complex.from(s.periods[0].div(r.periods[0]));
  return new Homothety(L, M, factor, ground(L, M, same === true));
}

/** Why two lattices are homothetic: one j, one exact τ, or j that agree. */
function ground(L: Lattice, M: Lattice, same: boolean): Standing {
  if (same) return { kind: "proved", argument: `both lattices have j = ${L.j}` };
  const [tau, sigma] = [L.reduced.tau.exact, M.reduced.tau.exact];
  if (tau && sigma && sameExact(tau, sigma))
    return { kind: "proved", argument: `both reduced bases have τ = ${L.reduced.tau}` };
  return numberStanding(L.j, "=", M.j);
}

/** Equal or different by exact values, different by enclosures, or undefined. */
function sameInvariant(j: Real | Complex, k: Real | Complex): boolean | undefined {
  try {
    return j.equals(k);
  } catch (error) {
    if (error instanceof UndecidedError) return undefined;
    throw error;
  }
}
