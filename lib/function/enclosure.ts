// Small readings of discs that the functions share.
import type { Ball } from "../number/ball.ts";
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { roundedQuotient } from "./matrix.ts";

/** The centre as an exact disc on the same axis. */
export function midpoint(d: Disc): Disc {
  if (d.re === 0n && d.im === 0n) return disc.zero;
  if (d.axis !== "plane") return { ...d, rad: 0 };
  if (d.im === 0n) return { ...d, rad: 0, axis: "real" };
  return { ...d, rad: 0, axis: d.re === 0n ? "imaginary" : "plane" };
}

/** Largest e (down to one) with |z| >= 2^e for every z of the disc; -Infinity if it holds 0. */
export function lowMagnitude(d: Disc): number {
  return ball.lowMagnitude(disc.abs(d, 53));
}

/** The smallest e with radius < 2^e; -Infinity for an exact disc. */
export function radiusMagnitude(d: Disc): number {
  return d.rad === 0 ? -Infinity : ball.magnitude({ man: BigInt(Math.ceil(d.rad)), exp: d.exp, rad: 0 });
}

/** The disc on the real axis of a value that is known to be real: the real part of the disc holds it. */
export function ontoReal(d: Disc): Disc {
  return disc.fromBall(disc.real(d));
}

/** The same on the imaginary axis. */
export function ontoImaginary(d: Disc): Disc {
  return disc.imaginary(disc.imag(d));
}

/** Nearest integer to the midpoint of x; a half goes up. */
export function nearestInteger(x: Ball): bigint {
  return x.exp >= 0 ? x.man << BigInt(x.exp) : roundedQuotient(x.man, 1n << BigInt(-x.exp));
}
