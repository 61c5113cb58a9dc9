// Claims about lattices: membership, equality, homothety.

import { type Complex, Real } from "../number/values.ts";
import { DomainError, UndecidedError } from "../proof/errors.ts";
import { type Standing, weakest } from "../proof/standing.ts";
import { numberStanding } from "./claim-number.ts";
import { homothety } from "./homothety.ts";
import type { Lattice } from "./lattice.ts";
import { TorusPoint } from "./torus-point.ts";

/** Whether a number is a lattice point: by exact coordinates, else by what is left over a nearest lattice point. */
export function inLattice(z: Real | Complex, L: Lattice): Standing {
  if (z instanceof TorusPoint && z.lattice === L.data && !z.remainder) {
    const coordinates = `its coordinates are ${z.coordinates.join(" and ")}`;
    return z.isLatticePoint
      ? { kind: "proved", argument: coordinates }
      : { kind: "refuted", evidence: `${coordinates}, not whole numbers` };
  }
  const { nearest, rest } = L.locate(z);
  const standing = numberStanding(rest, "=", Real.from(0));
  if (standing.kind !== "refuted") return standing;
  return {
    kind: "refuted",
    evidence: `the nearest lattice point is ${nearest.name}, at a distance of ${rest.abs().digits(6)}`,
  };
}

/** Two lattices are the same if the periods of each are points of the other. */
export function sameLattice(L: Lattice, M: Lattice): Standing {
  return weakest([...M.periods.map((w) => inLattice(w, L)), ...L.periods.map((w) => inLattice(w, M))]);
}

/** One lattice in another: by the index, where coordinates are exact, else by its periods as points of the other. */
export function sublattice(L: Lattice, M: Lattice): Standing {
  try {
    return { kind: "proved", argument: `exact coordinates; the index is ${L.indexIn(M)}` };
  } catch (error) {
    if (error instanceof DomainError) return { kind: "refuted", evidence: error.given };
    if (error instanceof UndecidedError) return weakest(L.periods.map((w) => inLattice(w, M)));
    throw error;
  }
}

/** Homothetic lattices have the same j; `homothety` finds the factor or the difference. */
export function homotheticStanding(L: Lattice, M: Lattice): Standing {
  try {
    return homothety(L, M).standing;
  } catch (error) {
    if (error instanceof DomainError) return { kind: "refuted", evidence: error.given };
    if (error instanceof UndecidedError) return { kind: "undecided", tried: error.given };
    throw error;
  }
}
