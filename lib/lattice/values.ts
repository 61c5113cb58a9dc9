// Values of the Weierstrass functions of a lattice at enclosures, and the way back from (℘, ℘′) to z.

import { ontoImaginary, ontoReal } from "../function/enclosure.ts";
import { ellipticLogarithm } from "../function/inverse.ts";
import { type Wanted, type WeierstrassValues, weierstrass } from "../function/weierstrass.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { invariants, reduced } from "./context.ts";
import type { PeriodLattice } from "./period-lattice.ts";

/**
 * ℘, ℘′, ζ, σ (those wanted) at z, together.
 *
 * Domain   z ∉ Λ for ℘, ℘′, ζ.
 * Error    enclosures. On the real and the imaginary axis of a lattice that is its own conjugate the values are on an axis too: ℘ is real,
 *          and ℘′, ζ, σ are real or imaginary as z is.
 * Cost     one exponential and O(√prec) theta terms once the lattice's context exists.
 * Throws   PoleError if the disc of z meets Λ.
 */
export function weierstrassValues(
  lattice: PeriodLattice,
  z: Disc,
  prec: number,
  wanted: readonly Wanted[],
): WeierstrassValues {
  const far = Math.max(0, disc.magnitude(z) - disc.magnitude(reduced(lattice, 64).r1));
  const wp = prec + Math.min(far, 64 * prec + 4096);
  const values = weierstrass(reduced(lattice, wp), z, wp, wanted);
  if (!lattice.conjugation || z.axis === "plane") return values;
  const onto = z.axis === "real" ? ontoReal : ontoImaginary;
  const out: { [K in Wanted]?: Disc } = {};
  for (const [name, value] of Object.entries(values) as [Wanted, Disc][]) {
    out[name] = name === "wp" ? ontoReal(value) : onto(value);
  }
  return out;
}

/**
 * The point (℘(z), ℘′(z)).
 * Throws   PoleError if the disc of z meets Λ.
 */
export function exponential(lattice: PeriodLattice, z: Disc, prec: number): { readonly x: Disc; readonly y: Disc } {
  const { wp, prime } = weierstrassValues(lattice, z, prec, ["wp", "prime"]);
  return { x: wp!, y: prime! };
}

/**
 * z modulo Λ with ℘(z) = x and ℘′(z) = y, as an enclosure near the cell around 0 of the reduced basis; see `logarithm` for real points.
 *
 * Domain   points of ℘′² = 4℘³ − g2 ℘ − g3, as enclosures that hold one.
 * Branch   the sign of y decides between z and −z.
 * Error    certified by the group law; see function/inverse.ts.
 * Throws   PrecisionError where x and y are too coarse or belong to no point.
 */
export function planeLogarithm(
  lattice: PeriodLattice,
  point: { readonly x: Disc; readonly y: Disc },
  prec: number,
): Disc {
  const context = (bits: number) => ({ l: reduced(lattice, bits), g2: invariants(lattice, bits).g2 });
  return ellipticLogarithm(context, point, prec);
}
