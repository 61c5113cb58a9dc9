// The symmetry of a lattice, decided exactly or not at all.

import { reduceForm } from "../function/matrix.ts";
import * as ball from "../number/ball.ts";
import * as disc from "../number/disc.ts";
import { LADDER } from "./build.ts";
import { reduced } from "./context.ts";
import { exactFormOf } from "./exact-form.ts";
import type { PeriodLattice } from "./period-lattice.ts";
import { discOf, exactRational, type Quantity } from "./quantity.ts";

export type Shape = "square" | "hexagonal" | "rectangular" | "rhombic" | "general";

/**
 * The shape of the cell: square and hexagonal lattices have extra rotations, rectangular and rhombic ones a reflection.
 * Undefined where enclosures allow more than one answer.
 */
export function shapeOf(lattice: PeriodLattice): Shape | undefined {
  const { given } = lattice;
  if (given.kind === "invariants") return shapeByInvariants(lattice, given.g2, given.g3);
  const form = exactFormOf(given);
  if (form) {
    const m = reduceForm(form);
    const value = (x: bigint, y: bigint, u: bigint, v: bigint) =>
      form.A * x * u + form.B * (x * v + y * u) + form.C * y * v;
    return byForm(value(m.d, m.c, m.d, m.c), value(m.d, m.c, m.b, m.a), value(m.b, m.a, m.b, m.a));
  }
  return byEnclosure(lattice);
}

function byForm(A: bigint, B: bigint, C: bigint): Shape {
  if (A === C) return B === 0n ? "square" : -2n * B === A ? "hexagonal" : "rhombic";
  return B === 0n ? "rectangular" : -2n * B === A ? "rhombic" : "general";
}

function shapeByInvariants(lattice: PeriodLattice, g2: Quantity, g3: Quantity): Shape | undefined {
  if (exactRational(g3)?.sign() === 0) return "square";
  if (exactRational(g2)?.sign() === 0) return "hexagonal";
  if (!lattice.components) return byEnclosure(lattice);
  // A real lattice is square or hexagonal only for g3 = 0 or g2 = 0.
  if (!nonzero(g3) || (lattice.components === 1 && !nonzero(g2))) return undefined;
  return lattice.components === 2 ? "rectangular" : "rhombic";
}

function nonzero(q: Quantity): boolean {
  return LADDER.slice(0, 6).some((prec) => !disc.containsZero(discOf(q, prec)));
}

/** General if the reduced τ is off Re τ = 0, Re τ = ±1/2 and |τ| = 1; the axes of the basis can show a rectangle. */
function byEnclosure(lattice: PeriodLattice): Shape | undefined {
  for (const prec of LADDER.slice(0, 6)) {
    const { tau } = reduced(lattice, prec);
    const x = ball.abs(disc.real(tau));
    const norm = disc.real(disc.mul(tau, disc.conj(tau), prec));
    const above = ball.compare(norm, ball.one) === 1;
    const inside = ball.compare(ball.ldexp(x, 1), ball.one) === -1;
    // A tie that was decided exactly is one of a lattice with a reflection; one strict inequality rules out a corner or i.
    const leaning = ball.sign(disc.real(tau)) !== undefined;
    if (lattice.boundary === "on" && (above || (inside && leaning))) return "rhombic";
    if (!above || !inside) continue;
    if (tau.axis === "imaginary") return "rectangular";
    if (ball.sign(disc.real(tau)) !== undefined) return "general";
  }
  return undefined;
}
