// The elliptic logarithm of a real point of a lattice in its real basis, on the circle of its component.

import { nearestInteger } from "../function/enclosure.ts";
import type { Ball } from "../number/ball.ts";
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { PrecisionError } from "../proof/errors.ts";
import { chainOf, periods, roots } from "./context.ts";
import { fixedLogarithm } from "./fixed-logarithm.ts";
import type { PeriodLattice } from "./period-lattice.ts";
import { planeLogarithm } from "./values.ts";

/** z = t on the identity component, z = t + ω2/2 on the bounded one; −ω1/2 <= t <= ω1/2 up to the radius. */
export interface RealLogarithm {
  readonly component: "identity" | "bounded";
  readonly t: Ball;
}

/**
 * z of a real point (x, y), y = ℘′(z), y² = 4x³ − g2 x − g3.
 *
 * Domain   a lattice in its real basis (given by real invariants), x and y real.
 * Branch   the representative nearest to 0 or to ω2/2; y < 0 for small t > 0.
 * Error    an enclosure of t, about 2^−prec relative to it where x and y have the digits.
 * Cost     about log2(prec) square roots and an arc tangent; near points of order two or four that of `planeLogarithm`.
 * Throws   PrecisionError if the enclosures do not tell the component or fit no point.
 */
export function realLogarithm(lattice: PeriodLattice, x: Ball, y: Ball, prec: number): RealLogarithm {
  const chain = chainOf(lattice, prec);
  const fixed = chain && fixedLogarithm(chain, x, y);
  if (fixed && ball.bits(fixed.t) >= prec - 4) return { ...fixed, t: ball.round(fixed.t, prec) };
  const component = componentOf(lattice, x, prec);
  const point = { x: disc.fromBall(x), y: disc.fromBall(y) };
  let wp = prec;
  for (;;) {
    const t = ontoCircle(lattice, planeLogarithm(lattice, point, wp), component, wp);
    // t near 0 on a long cell may have lost bits to the shift; not more than wp again.
    if (ball.bits(t) >= prec - 4 || wp > prec) return { component, t: ball.round(t, prec) };
    wp = prec + Math.max(16, prec - ball.bits(t));
  }
}

function componentOf(lattice: PeriodLattice, x: Ball, prec: number): "identity" | "bounded" {
  if (lattice.components === 1) return "identity";
  // Any point between e2 and e1 tells the components apart.
  const [e1, e2] = roots(lattice, Math.min(prec, 64));
  const middle = ball.ldexp(ball.add(disc.real(e1), disc.real(e2), 80), -1);
  const side = ball.compare(x, middle);
  if (side === undefined || side === 0) {
    throw new PrecisionError({
      subject: "elliptic logarithm",
      given: "an abscissa too coarse to tell the component",
      expected: "a real point of the curve",
      hint: "Give the point with more digits, or exactly.",
    });
  }
  return side > 0 ? "identity" : "bounded";
}

/** Real part of z − [ω2/2] − m ω1 − n ω2, with the integers from midpoints. */
function ontoCircle(lattice: PeriodLattice, z: Disc, component: "identity" | "bounded", prec: number): Ball {
  const { w1, w2 } = periods(lattice, prec + 8);
  const wp = prec + 8;
  const half = component === "bounded" ? disc.ldexp(w2, -1) : disc.zero;
  const rest = disc.sub(z, half, wp);
  const n = nearestInteger(ball.div(disc.imag(rest), disc.imag(w2), 64));
  const lifted = disc.real(disc.sub(rest, disc.mulInt(w2, n, wp), wp));
  const m = nearestInteger(ball.div(lifted, disc.real(w1), 64));
  return ball.sub(lifted, ball.mulInt(disc.real(w1), m, wp), wp);
}

/**
 * z modulo Λ with ℘(z) = x and ℘′(z) = y.
 *
 * Branch   for real x and y and a lattice in its real basis, t or t + ω2/2 with a real t as in `realLogarithm`; with imaginary y a number
 *          whose real part is a multiple of ω1/2; else a representative near the cell around 0 of the reduced basis.
 * Error    and the rest as for `planeLogarithm`.
 */
export function logarithm(lattice: PeriodLattice, point: { readonly x: Disc; readonly y: Disc }, prec: number): Disc {
  const { x, y } = point;
  const symmetric = lattice.given.kind === "invariants" && lattice.components !== undefined && x.axis === "real";
  if (symmetric && y.axis === "real") {
    const { component, t } = realLogarithm(lattice, disc.along(x), disc.along(y), prec + 8);
    if (component === "identity") return disc.fromBall(ball.round(t, prec));
    return disc.add(disc.fromBall(t), disc.ldexp(periods(lattice, prec + 8).w2, -1), prec);
  }
  const z = planeLogarithm(lattice, point, prec + 8);
  if (!symmetric || y.axis !== "imaginary") return disc.round(z, prec);
  const half = ball.ldexp(disc.real(periods(lattice, prec + 8).w1), -1);
  const k = nearestInteger(ball.div(disc.real(z), half, 64));
  const re = ball.mulInt(half, k, prec + 8);
  return disc.round(disc.add(disc.fromBall(re), disc.imaginary(disc.imag(z)), prec + 8), prec);
}
