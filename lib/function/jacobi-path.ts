// The amplitude along a segment of the complex plane: am(u) = ∫_0^u dn, which winds about the poles of dn.
//
// e^(i am) = cn + i sn is single-valued, so am(u) is known up to multiples of 2π, and a walk in pieces on which |∫ dn| < 3 < π counts them.
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { BranchError, DomainError, PoleError, PrecisionError } from "../proof/errors.ts";
import { midpoint } from "./enclosure.ts";
import { nearestZero } from "./jacobi-poles.ts";
import { type JacobiContext, jacobiContext, jacobiValues } from "./jacobi-values.ts";
import type { Modulus } from "./legendre-mean.ts";

const BITS = 64;
const MOST_PIECES = 4_000;
/** Pieces shorter than this part of the way mean a pole on it. */
const SHORTEST = 2 ** -40;

/**
 * A rough am(u): within 2^−20 of the value at the midpoint of u, along the segment from 0.
 *
 * Error    each step is ln of a quotient whose argument is that of ∫ dn, |∫ dn| <= |piece|·max |dn| < 3 by an enclosure of dn over a disc that
 *          holds the piece.
 * Cost     some dozen values of 64 bits; more near a pole.
 * Throws   DomainError where a pole of dn lies on the segment, or so near that 4000 pieces do not pass it.
 */
export function roughAmplitude(u: Disc, modulus: Modulus): Disc {
  const context = disc.isZero(modulus.m1) ? undefined : jacobiContext(modulus, BITS + 32);
  const walk: Walk = { modulus, end: midpoint(u), context };
  let sum: Disc = disc.zero;
  let left = MOST_PIECES;
  // Pieces [from, to] of the way from 0 to 1, in order.
  const open: [number, number][] = [[0, 1]];
  let last = phaseAt(walk, 0);
  while (open.length > 0) {
    const [from, to] = open.pop()!;
    if (isShort(walk, from, to)) {
      const next = phaseAt(walk, to);
      sum = disc.add(sum, changeOf(walk, last, next, to), BITS);
      last = next;
    } else {
      const half = (from + to) / 2;
      if (to - from < SHORTEST || left-- === 0) throw onThePole(walk, half);
      open.push([half, to], [from, half]);
    }
  }
  return disc.neg(disc.mulI(sum));
}

interface Walk {
  readonly modulus: Modulus;
  readonly end: Disc;
  /** None for m = 1, where the functions are hyperbolic. */
  readonly context: JacobiContext | undefined;
}

/** ln(next/last). Beside a pole the phase loses its digits, as one of cn ± i sn is small there. */
function changeOf(walk: Walk, last: Disc, next: Disc, t: number): Disc {
  try {
    return disc.ln(disc.div(next, last, BITS), BITS);
  } catch (error) {
    if (error instanceof PoleError || error instanceof BranchError) throw onThePole(walk, t);
    throw error;
  }
}

function at({ end }: Walk, t: number): Disc {
  return disc.mulBall(end, ball.fromDouble(t), BITS + 32);
}

function values(walk: Walk, names: readonly ("sn" | "cn" | "dn")[], u: Disc): Disc[] {
  return jacobiValues(names, u, walk.modulus, BITS, () => walk.context!);
}

/** cn + i sn. */
function phaseAt(walk: Walk, t: number): Disc {
  if (t === 0) return disc.one;
  const [sn, cn] = values(walk, ["sn", "cn"], at(walk, t)) as [Disc, Disc];
  return disc.add(cn, disc.mulI(sn), BITS);
}

/** Whether |piece|·|dn| < 3 over a disc that holds the piece. */
function isShort(walk: Walk, from: number, to: number): boolean {
  const length = disc.abs(disc.mulBall(walk.end, ball.fromDouble(to - from), BITS), 53);
  const around = disc.widenBy(at(walk, (from + to) / 2), ball.ldexp(length, -1), BITS, false);
  try {
    const [dn] = values(walk, ["dn"], around) as [Disc];
    return ball.compare(ball.mul(ball.upper(disc.abs(dn, 53)), ball.upper(length), 53), ball.fromInt(3)) === -1;
  } catch (error) {
    if (error instanceof PoleError || error instanceof PrecisionError) return false;
    throw error;
  }
}

function onThePole(walk: Walk, t: number): DomainError {
  return new DomainError({
    subject: "am",
    given: `a segment from 0 to u that meets, or all but meets, the pole ${poleNear(walk, t)} of dn`,
    expected: "a segment that passes the poles at a distance: am is the integral of dn along it",
    hint: "An argument beside u says on which side the pole is passed; sn, cn and dn do not depend on it.",
    argument: "u",
  });
}

function poleNear(walk: Walk, t: number): string {
  const half: Disc = disc.fromBall(ball.ldexp(ball.pi(53), -1));
  return nearestZero("n", at(walk, t), walk.context?.quarter, walk.context?.coQuarter ?? half);
}
