// Numbers that a lattice may be given by, and what can be read off them exactly.

import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { JOIN } from "../number/operations.ts";
import { asDisc, evaluate, type Node, type NumberStanding, refinable, refineEnclosure } from "../number/origin.ts";
import { Quadratic } from "../number/quadratic.ts";
import { Rational } from "../number/rational.ts";
import { PrecisionError } from "../proof/errors.ts";

export type Quantity = Rational | ExactComplex | Node;

/** real + imag·√(−root), root a positive integer (1 for Gaussian numbers). */
export interface ExactComplex {
  readonly real: Rational;
  readonly imag: Rational;
  readonly root: bigint;
}

function isExactComplex(q: Quantity): q is ExactComplex {
  return "root" in q;
}

/** An enclosure with about prec bits, if the number has them. */
export function discOf(q: Quantity, prec: number): Disc {
  if (q instanceof Rational) return disc.fromRational(q, prec);
  if (!isExactComplex(q)) {
    const exact = exactComplex(q);
    return exact ? discOf(exact, prec) : refined(q, prec);
  }
  if (q.root === 1n) return disc.fromRational(q.real, prec, q.imag);
  const height = ball.mul(ball.fromRational(q.imag, prec + 8), ball.sqrt(ball.fromInt(q.root), prec + 8), prec + 8);
  return disc.fromBalls(ball.fromRational(q.real, prec + 8), height, prec);
}

/** To prec relative bits; a number that cannot be told from 0 as it comes out with prec bits throughout. */
function refined(q: Node, prec: number): Disc {
  try {
    return asDisc(refineEnclosure(q, prec));
  } catch (error) {
    if (error instanceof PrecisionError) return asDisc(evaluate(q, prec + 32));
    throw error;
  }
}

/** The exact rational value, if it is known. */
export function exactRational(q: Quantity): Rational | undefined {
  const exact = exactComplex(q);
  return exact && exact.imag.sign() === 0 ? exact.real : undefined;
}

/** The exact value in an imaginary quadratic field, if it is known. */
export function exactComplex(q: Quantity): ExactComplex | undefined {
  if (q instanceof Rational) return { real: q, imag: Rational.zero, root: 1n };
  if (isExactComplex(q)) return q;
  const { exact } = q;
  if (!exact) return joined(q);
  if (exact instanceof Rational) return { real: exact, imag: Rational.zero, root: 1n };
  if (!(exact instanceof Quadratic)) return undefined;
  if (exact.isRational()) return { real: exact.a, imag: Rational.zero, root: 1n };
  return exact.d < 0n ? { real: exact.a, imag: exact.b, root: -exact.d } : undefined;
}

/** a + i·b√d of exact parts, which no quadratic number of one record is. */
function joined({ origin }: Node): ExactComplex | undefined {
  if (origin?.operation !== JOIN) return undefined;
  const [re, im] = origin.operands.map((part) => (part as Node).exact);
  if (!(re instanceof Rational && im instanceof Quadratic && im.d > 0n && im.a.sign() === 0)) return undefined;
  return { real: re, imag: im.b, root: im.d };
}

export function isReal(q: Quantity): boolean {
  const exact = exactComplex(q);
  if (exact) return exact.imag.sign() === 0;
  return asDisc((q as Node).enclosure).axis === "real";
}

/** Whether more digits can be had by asking for them. */
export function isRefinable(q: Quantity): boolean {
  return q instanceof Rational || isExactComplex(q) || refinable(q);
}

/** How the number is known. */
export function standingOf(q: Quantity): NumberStanding {
  return q instanceof Rational || isExactComplex(q) ? "exact" : q.standing;
}

/** A short text of the number, for messages. */
export function textOf(q: Quantity): string {
  if (!(q instanceof Rational) && isExactComplex(q)) {
    return q.imag.sign() === 0 ? `${q.real}` : `${q.real} + ${q.imag}√−${q.root}`;
  }
  return `${q}`;
}
