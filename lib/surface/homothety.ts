import { workingPrecision } from "../number/context.ts";
import * as disc from "../number/disc.ts";
import { asDisc } from "../number/origin.ts";
import { Complex, type Real } from "../number/values.ts";
import { DomainError, UndecidedError } from "../proof/errors.ts";
import type { Standing } from "../proof/standing.ts";
import type { Lattice } from "./lattice.ts";

/** M = αL: multiplication by α takes the first lattice onto the second. */
export class Homothety {
  readonly from: Lattice;
  readonly to: Lattice;
  /** The factor; with it −α, and for square and hexagonal lattices i or a sixth root of unity times α. */
  readonly factor: Complex;
  /** Proved if both j are exact and equal; else the j agree within their enclosures. */
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
  const standing: Standing = same ? { kind: "proved", argument: `both lattices have j = ${j}` } : agreement(j, k);
  return new Homothety(L, M, factor, standing);
}

/** How near two j that are not known to be equal are: their difference beside their size. */
function agreement(j: Real | Complex, k: Real | Complex): Standing {
  const bits = workingPrecision();
  const difference = disc.sub(asDisc(j.enclosure), asDisc(k.enclosure), bits);
  const size = Math.max(0, disc.magnitude(asDisc(j.enclosure)));
  const digits = Math.max(0, Math.floor((size - disc.magnitude(difference)) * 0.30103));
  return { kind: "certified", digits, bits };
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
