// The Weierstrass functions where the cubic has a multiple root: 4x³ − g2 x − g3 = 4(x − d)²(x + 2d), g2 = 12d², g3 = −8d³.
//
// With κ² = −3d:  ℘ = d + κ²/sin² κz,  ℘′ = −2κ³ cos κz/sin³ κz,  ζ = −dz + κ cot κz,  σ = e^(−dz²/2) sin κz/κ, and for d = 0
// ℘ = 1/z², ζ = 1/z, σ = z   (limits of DLMF 23.6(ii); Abramowitz and Stegun 18.12). One period π/κ is left, or none.

import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { PoleError } from "../proof/errors.ts";
import type { Wanted } from "./weierstrass.ts";

/**
 * One function at z for the double root d.
 *
 * Domain   z away from the poles kπ/κ, for ℘, ℘′, ζ.
 * Branch   none: every function is even in κ.
 * Error    enclosures; real where d and z are.
 * Throws   PoleError if the enclosure of z holds a pole.
 */
export function degenerateValue(name: Wanted, d: Disc, z: Disc, prec: number): Disc {
  const wp = prec + 24 + Math.max(0, disc.isZero(z) ? 0 : 2 * Math.abs(disc.magnitude(z)));
  if (disc.isZero(d)) return rational(name, z, wp);
  const square = disc.neg(disc.mulInt(d, 3n, wp));
  const kappa = square.axis === "plane" && square.re < 0n ? turnedRoot(square, wp) : disc.sqrt(square, wp);
  const { sin, cos } = disc.sinCos(disc.mul(kappa, z, wp), wp);
  if (name === "sigma") {
    const half = disc.ldexp(disc.mul(d, disc.sqr(z, wp), wp), -1);
    return disc.mul(disc.exp(disc.neg(half), wp), disc.div(sin, kappa, wp), prec);
  }
  if (disc.containsZero(sin)) throw atPole(name);
  if (name === "wp") return disc.add(d, disc.div(square, disc.sqr(sin, wp), wp), prec);
  const cotangent = disc.mul(kappa, disc.div(cos, sin, wp), wp);
  if (name === "zeta") return disc.sub(cotangent, disc.mul(d, z, wp), prec);
  return disc.round(disc.ldexp(disc.neg(disc.mul(cotangent, disc.div(square, disc.sqr(sin, wp), wp), wp)), 1), prec);
}

/** A root taken off the cut. */
function turnedRoot(x: Disc, prec: number): Disc {
  return disc.mulI(disc.sqrt(disc.neg(x), prec));
}

function rational(name: Wanted, z: Disc, prec: number): Disc {
  if (name === "sigma") return z;
  if (disc.containsZero(z)) throw atPole(name);
  if (name === "zeta") return disc.inv(z, prec);
  if (name === "wp") return disc.inv(disc.sqr(z, prec), prec);
  return disc.ldexp(disc.neg(disc.inv(disc.mul(disc.sqr(z, prec), z, prec), prec)), 1);
}

function atPole(name: string): PoleError {
  return new PoleError({
    subject: name,
    given: "an argument that is, or cannot be told from, a pole",
    expected: "an argument away from the multiples of the period",
    argument: "z",
  });
}
