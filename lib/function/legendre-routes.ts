// Second routes to Legendre's integrals: the same algebraic integrals by quadrature, and theta functions.
//
// F = s RF(c², Δ², 1),   D = s³/3 RD(c², Δ², 1),   E = F − m D,   B = F − D,   Π = F + n s³/3 RJ(c², Δ², 1, 1 − n s²)      (DLMF 19.25(i)),
// at c = 0 for the complete ones; and E(φ) = ε(F(φ)) by the logarithmic derivative of a theta function (DLMF 22.16.31).

import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { DomainError } from "../proof/errors.ts";
import type { Triple } from "./carlson-duplication.ts";
import { rdByQuadrature, rfByQuadrature, rjByQuadrature } from "./carlson-quadrature.ts";
import { jacobiEpsilon } from "./jacobi-second.ts";
import type { Characteristic, Modulus } from "./legendre-complete.ts";
import { type Amplitude, amplitude, incompleteF } from "./legendre-incomplete.ts";
import { eighthRoot } from "./theta-multiplier.ts";

const THREE = { man: 3n, exp: 0, rad: 0 };

export type LegendreName = "F" | "E" | "D" | "B";

/** A point of the way: sin², its root, and the squares of the three roots of the integrand there. */
interface Place {
  readonly s: Disc;
  readonly squares: Triple;
}

const atQuarter = ({ m1 }: Modulus): Place => ({ s: disc.one, squares: [disc.zero, m1, disc.one] });

const atAmplitude = ({ s, c2, delta2 }: Amplitude): Place => ({ s, squares: [c2, delta2, disc.one] });

/**
 * The complete integral (F for K) by quadrature.
 *
 * Domain, Branch, Throws   as the first route; on the cut m > 1 by the side. PrecisionError where m1 is so small that it takes too many pieces.
 * Error    enclosure; E and B lose the bits of the logarithm by which K is larger than they are.
 */
export function completeByQuadrature(name: LegendreName, k: Modulus, prec: number): Disc {
  return disc.round(integralTo(atQuarter(k), name, k, prec + 16), prec);
}

/** The incomplete integral by quadrature; as the complete one, and f(φ + kπ) = f(φ) + 2k f(π/2). */
export function incompleteByQuadrature(name: LegendreName, phi: Disc, k: Modulus, prec: number): Disc {
  if (disc.isZero(phi)) return disc.zero;
  const wp = prec + 16;
  const at = amplitude(phi, k, wp);
  const whole = () => integralTo(atQuarter(k), name, k, wp);
  return plusTurns(at, integralTo(atAmplitude(at), name, k, wp), whole, prec);
}

/** Π(n | m) by quadrature. */
export function completePiByQuadrature(n: Characteristic, k: Modulus, prec: number): Disc {
  return disc.round(piTo(atQuarter(k), n.n1, n, k, prec + 16), prec);
}

/** Π(n; φ | m) by quadrature. */
export function incompletePiByQuadrature({ n, n1 }: Characteristic, phi: Disc, k: Modulus, prec: number): Disc {
  if (disc.isZero(phi)) return disc.zero;
  const wp = prec + 16;
  const at = amplitude(phi, k, wp);
  const last = disc.add(at.c2, disc.mul(n1, at.s2, wp), wp);
  const whole = () => piTo(atQuarter(k), n1, { n, n1 }, k, wp);
  return plusTurns(at, piTo(atAmplitude(at), last, { n, n1 }, k, wp), whole, prec);
}

/**
 * E(φ | m) = ε(F(φ | m)): both are integrals along one way, and ε has no branches.
 * Domain   as F, m other than 0 and 1 not needed.
 */
export function incompleteEByTheta(phi: Disc, k: Modulus, prec: number): Disc {
  return jacobiEpsilon(incompleteF(phi, k, prec + 16), k, prec);
}

function plusTurns({ halfTurns }: Amplitude, rest: Disc, whole: () => Disc, prec: number): Disc {
  if (halfTurns === 0n) return disc.round(rest, prec);
  return disc.add(rest, disc.mulInt(whole(), 2n * halfTurns, prec + 16), prec);
}

function integralTo(place: Place, name: LegendreName, k: Modulus, wp: number): Disc {
  const first = () =>
    disc.mul(
      place.s,
      onSide(place.squares, k, 1, (x, y, z) => rfByQuadrature(x!, y!, z!, wp), wp),
      wp,
    );
  const second = () => {
    const rd = onSide(place.squares, k, 3, (x, y, z) => rdByQuadrature(x!, y!, z!, wp), wp);
    return disc.divBall(disc.mul(disc.pow(place.s, 3, wp), rd, wp), THREE, wp);
  };
  if (name === "F") return first();
  if (name === "D") return second();
  return disc.sub(first(), name === "B" ? second() : disc.mul(k.m, second(), wp), wp);
}

function piTo(place: Place, last: Disc, { n }: Characteristic, k: Modulus, wp: number): Disc {
  const first = integralTo(place, "F", k, wp);
  if (disc.isZero(n)) return first;
  const rj = onSide([...place.squares, last], k, 3, (x, y, z, p) => rjByQuadrature(x!, y!, z!, p!, wp), wp);
  const third = disc.mul(n, disc.mul(disc.pow(place.s, 3, wp), rj, wp), wp);
  return disc.add(first, disc.divBall(third, THREE, wp), wp);
}

/**
 * An integral of degree −degree/2 at arguments of which one is negative where m is on the cut: from m + i0 it lies below the axis, and a turn of all
 * arguments by i, which none of them crosses the cut by, takes it off the cut.
 */
export function onSide(
  squares: readonly Disc[],
  { side }: Modulus,
  degree: -1 | 1 | 3,
  f: (...squares: readonly Disc[]) => Disc,
  wp: number,
): Disc {
  const crossed = squares.slice(0, 3).some((w) => w.axis === "real" && w.re < 0n);
  if (!crossed || side === undefined) return f(...squares);
  if (squares[3]?.axis === "real" && squares[3].re < 0n) {
    throw new DomainError({
      subject: "Π by quadrature",
      given: "a principal value on the cut m > 1",
      expected: "n sin²φ < 1 there",
      argument: "n",
    });
  }
  const turn = (w: Disc) => (side === 1 ? disc.mulI(w) : disc.neg(disc.mulI(w)));
  return disc.mul(f(...squares.map(turn)), eighthRoot(((side === 1 ? degree : -degree) + 8) % 8, wp), wp);
}
