// A period lattice as data: what was given, and the discrete choices made once for it. No numbers of limited precision are stored,
// except an anchor that recognises the chosen basis of a complex lattice again.

import type { Matrix } from "../function/matrix.ts";
import type { NumberStanding } from "../number/origin.ts";
import type { Rational } from "../number/rational.ts";
import type { PeriodPair } from "./agm-periods.ts";
import type { Quantity } from "./quantity.ts";

/** What a lattice was given by. Periods are positively oriented here. */
export type Given =
  | { readonly kind: "periods"; readonly w1: Quantity; readonly w2: Quantity }
  | { readonly kind: "invariants"; readonly g2: Quantity; readonly g3: Quantity }
  | { readonly kind: "points"; readonly base: PeriodLattice; readonly rows: RationalRows };

/** Periods as rational combinations of those of another lattice: ω1′ = rows[0]·(ω1, ω2), ω2′ = rows[1]·(ω1, ω2). */
export type RationalRows = readonly [readonly [Rational, Rational], readonly [Rational, Rational]];

/**
 * Integer action of complex conjugation on a basis: the conjugates of ω1 and ω2 are a11 ω1 + a12 ω2 and a21 ω1 + a22 ω2.
 */
export interface Conjugation {
  readonly a11: bigint;
  readonly a12: bigint;
  readonly a21: bigint;
  readonly a22: bigint;
}

export interface PeriodLattice {
  readonly given: Given;
  /** How the given numbers are known; results inherit it. */
  readonly standing: NumberStanding;
  /** From the lattice's own basis to the reduced one; acts on τ. */
  readonly toReduced: Matrix;
  /**
   * Where the reduced τ lies: strictly inside the fundamental domain, exactly on its boundary (the tie is decided exactly), or so near
   * to it that the enclosures allow both and the matrix may be one of two.
   */
  readonly boundary: "inside" | "on" | "undecided";
  /** Present if the lattice is known to be its own conjugate. */
  readonly conjugation?: Conjugation;
  /** Number of components of the real curve, for a real lattice. */
  readonly components?: 1 | 2;
  /** The own basis to a few digits, for lattices whose periods come from complex means. */
  readonly anchor?: PeriodPair;
}
