// Numbers that a lattice may be given by, and what can be read off them exactly.

import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { Rational } from "../number/rational.ts";

export type Quantity = Rational | ExactComplex | Disc;

/** real + imag·√(−root), root a positive integer (1 for Gaussian numbers). */
export interface ExactComplex {
  readonly real: Rational;
  readonly imag: Rational;
  readonly root: bigint;
}

/** An enclosure with about prec bits, if the number has them. */
export function discOf(q: Quantity, prec: number): Disc {
  if (q instanceof Rational) return disc.fromRational(q, prec);
  if (!("root" in q)) return q;
  if (q.root === 1n) return disc.fromRational(q.real, prec, q.imag);
  const height = ball.mul(ball.fromRational(q.imag, prec + 8), ball.sqrt(ball.fromInt(q.root), prec + 8), prec + 8);
  return disc.fromBalls(ball.fromRational(q.real, prec + 8), height, prec);
}

/** The exact rational value, if it is known. */
export function exactRational(q: Quantity): Rational | undefined {
  if (q instanceof Rational) return q;
  return "root" in q && q.imag.sign() === 0 ? q.real : undefined;
}

export function exactComplex(q: Quantity): ExactComplex | undefined {
  if (q instanceof Rational) return { real: q, imag: Rational.zero, root: 1n };
  return "root" in q ? q : undefined;
}

export function isReal(q: Quantity): boolean {
  if (q instanceof Rational) return true;
  return "root" in q ? q.imag.sign() === 0 : q.axis === "real";
}

/** Whether more digits can be had by asking for them. */
export function isRefinable(q: Quantity): boolean {
  return q instanceof Rational || "root" in q || q.rad === 0;
}
