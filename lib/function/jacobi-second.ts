// Jacobi's integral ε(u) = ∫_0^u dn² and his zeta function Z(u) = ε(u) − u E/K, by the logarithmic derivative of θ4.
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { PoleError } from "../proof/errors.ts";
import { ontoImaginary, ontoReal } from "./enclosure.ts";
import { nearestZero } from "./jacobi-poles.ts";
import { type JacobiContext, jacobiContext } from "./jacobi-values.ts";
import { completeE, type Modulus } from "./legendre-complete.ts";
import { cellPoint, cellSums } from "./theta-values.ts";

/**
 * ε(u | m) = ∫_0^u dn²(t) dt, which is E(am u | m) for real u and m < 1.
 *
 * Domain   u away from the poles of dn; m other than 0 and 1 is not needed: ε(u|0) = u, ε(u|1) = tanh u.
 * Branch   none: meromorphic, since dn² has no residues.
 * Error    enclosure.
 * Cost     as the Jacobi functions, and E.
 * Throws   PoleError at a pole.
 * Source   DLMF 22.16.14, 22.16.30 and 22.16.32 with 20.5: on the basis r1, r2 the function ζ(u + n-half) of the lattice.
 */
export function jacobiEpsilon(u: Disc, modulus: Modulus, prec: number): Disc {
  if (disc.isZero(u) || disc.isZero(modulus.m)) return u;
  if (disc.isZero(modulus.m1)) return tanh(u, prec);
  const size = disc.magnitude(u);
  const context = jacobiContext(modulus, prec + Math.max(0, 2 * size) + Math.max(0, -size) + 8);
  const { wp } = context;
  // (d/du) ln σ_n − (ln σ_n)″(0) u, and ε′(0) = dn²(0) = 1.
  const slope = disc.sub(logDerivative(context, u), disc.mul(secondAtZero(context), u, wp), wp);
  const value = disc.add(slope, u, prec + 4);
  return axis(u, modulus, value);
}

/**
 * Z(u | m) = ε(u) − u E/K, of period 2K.
 *
 * Domain, Throws   as ε; m off [1, ∞) for E and K.
 * Source   DLMF 22.16.32.
 */
export function jacobiZeta(u: Disc, modulus: Modulus, prec: number): Disc {
  if (disc.isZero(u)) return disc.zero;
  if (disc.isZero(modulus.m)) return disc.zero;
  if (disc.isZero(modulus.m1)) return tanh(u, prec);
  const wp = prec + 16 + Math.max(0, disc.magnitude(u));
  const context = jacobiContext(modulus, wp);
  const mean = disc.div(completeE(modulus, wp), context.quarter, wp);
  return axis(u, modulus, disc.sub(jacobiEpsilon(u, modulus, wp), disc.mul(mean, u, wp), prec + 4));
}

function axis(u: Disc, { m }: Modulus, value: Disc): Disc {
  if (m.axis !== "real" || u.axis === "plane") return value;
  return u.axis === "real" ? ontoReal(value) : ontoImaginary(value);
}

function tanh(u: Disc, prec: number): Disc {
  const { sin, cos } = disc.sinCos(disc.mulI(u), prec + 8);
  return disc.neg(disc.mulI(disc.div(sin, cos, prec + 2)));
}

/** d/du of ln θ_j(u/r1), up to a multiple of u that the caller takes out at 0. */
function logDerivative(context: JacobiContext, u: Disc): Disc {
  const { r1, tau, q, wp, index } = context;
  const at = cellPoint(disc.div(u, r1, wp), tau, wp);
  const [s0, s1] = cellSums(index.n, at, q, disc.sqr(q, wp), 1, wp) as [Disc, Disc];
  if (disc.containsZero(s0)) {
    throw new PoleError({
      subject: "epsilon",
      given: `an argument that is, or cannot be told from, the pole ${nearestZero("n", u, context.quarter, context.coQuarter)}`,
      expected: "an argument away from the poles of dn",
      argument: "u",
    });
  }
  // D/(πi) ln θ(point) is odd; v = ±(point + m + nτ) adds −2n, with the sign.
  const ratio = disc.div(s1, s0, wp);
  const whole = disc.fromBall(ball.fromInt(-2n * at.n));
  const sum = disc.add(ratio, whole, wp);
  const signed = at.flipped ? disc.neg(sum) : sum;
  return disc.div(disc.mulI(disc.mulBall(signed, ball.pi(wp), wp)), r1, wp);
}

/** (d/du)² ln θ_j(u/r1) at 0. */
function secondAtZero(context: JacobiContext): Disc {
  const { r1, tau, q, wp, index } = context;
  const at = cellPoint(disc.zero, tau, wp);
  const [s0, , s2] = cellSums(index.n, at, q, disc.sqr(q, wp), 2, wp) as [Disc, Disc, Disc];
  const square = disc.sqr(disc.div(disc.fromBall(ball.pi(wp)), r1, wp), wp);
  return disc.neg(disc.mul(square, disc.div(s2, s0, wp), wp));
}
