// Legendre's complete integrals. A modulus is given as the pair m, m1 = 1 − m, so that no digit is lost at either end.
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { DomainError, PoleError } from "../proof/errors.ts";
import { carlsonRD, carlsonRJ } from "./carlson-third.ts";

/** The parameter m = k² and its complement, both enclosures of one pair. */
export interface Modulus {
  readonly m: Disc;
  readonly m1: Disc;
}

const THREE = { man: 3n, exp: 0, rad: 0 };

/**
 * K(m) = ∫_0^(π/2) dθ / √(1 − m sin²θ).
 *
 * Domain   m off [1, ∞).
 * Branch   principal: analytic in the plane cut along [1, ∞).
 * Error    enclosure, relative.
 * Cost     one arithmetic-geometric mean.
 * Throws   PoleError for m = 1, DomainError for real m > 1, BranchError for a disc that meets the cut.
 * Source   DLMF 19.2.8, 19.8.5: K = π/(2 agm(1, √m1)).
 */
export function completeK({ m1 }: Modulus, prec: number): Disc {
  refuseModulus("K", m1, true);
  const wp = prec + 8;
  const mean = disc.agm(disc.one, disc.sqrt(m1, wp), wp);
  return disc.div(disc.fromBall(ball.ldexp(ball.pi(wp), -1)), mean, prec + 2);
}

/**
 * E(m) = ∫_0^(π/2) √(1 − m sin²θ) dθ; E(1) = 1.
 *
 * Domain   as K, and m = 1.
 * Branch, Error, Throws   as K.
 * Cost     two RD, nothing cancels for m <= 1.
 * Source   DLMF 19.25.1: 3E = m1 (RD(0, m1, 1) + RD(0, 1, m1)).
 */
export function completeE(k: Modulus, prec: number): Disc {
  const wp = prec + 8;
  const b = completeB(k, wp);
  if (disc.isZero(k.m1)) return b;
  return disc.add(b, disc.mul(k.m1, completeD(k, wp), wp), prec + 2);
}

/** D(m) = ∫_0^(π/2) sin²θ dθ / √(1 − m sin²θ) = (K − E)/m without the cancellation; conditions as K. Source DLMF 19.25.1. */
export function completeD({ m1 }: Modulus, prec: number): Disc {
  refuseModulus("D", m1, true);
  return disc.divBall(carlsonRD(disc.zero, m1, disc.one, prec + 8), THREE, prec + 2);
}

/** B(m) = ∫_0^(π/2) cos²θ dθ / √(1 − m sin²θ) = (E − m1 K)/m without the cancellation; conditions as E, B(1) = 1. Source DLMF 19.25.1. */
export function completeB({ m1 }: Modulus, prec: number): Disc {
  refuseModulus("E", m1, false);
  if (disc.isZero(m1)) return disc.one;
  return disc.divBall(disc.mul(m1, carlsonRD(disc.zero, disc.one, m1, prec + 8), prec + 8), THREE, prec + 2);
}

/** The characteristic n of an integral of the third kind, with n1 = 1 − n. */
export interface Characteristic {
  readonly n: Disc;
  readonly n1: Disc;
}

/**
 * Π(n | m) = ∫_0^(π/2) dθ / ((1 − n sin²θ) √(1 − m sin²θ)); for real n > 1 (and m < 1) Cauchy's principal value.
 *
 * Domain   m as K, n ≠ 1; for complex pairs see RJ.
 * Error    enclosure; relative to K where n < 0 is large.
 * Throws   as K and RJ; PoleError for n = 1.
 * Source   DLMF 19.25.2: Π = K + (n/3) RJ(0, m1, 1, 1 − n).
 */
export function completePi({ n, n1 }: Characteristic, k: Modulus, prec: number): Disc {
  const wp = prec + 8;
  const first = completeK(k, wp);
  if (disc.isZero(n)) return disc.round(first, prec + 2);
  if (disc.isZero(n1)) {
    throw new PoleError({ subject: "Π", given: "the characteristic n = 1", expected: "n other than 1", argument: "n" });
  }
  const third = disc.mul(n, carlsonRJ(disc.zero, k.m1, disc.one, n1, wp), wp);
  return disc.add(first, disc.divBall(third, THREE, wp), prec + 2);
}

/** Refuses m on the cut; `open` also refuses its end m = 1. */
export function refuseModulus(subject: string, m1: Disc, open: boolean): void {
  if (open && disc.isZero(m1)) {
    throw new PoleError({
      subject,
      given: "m = 1",
      expected: "m other than 1, where the integral is infinite",
      argument: "m",
    });
  }
  if (m1.axis !== "real" || !(m1.re < 0n) || disc.containsZero(m1)) return;
  throw new DomainError({
    subject,
    given: "a real m > 1, which lies on the cut [1, ∞)",
    expected: "m off the cut",
    hint: "Say the side with a complex m, or use the reciprocal modulus: K(m) for m > 1 is (K(1/m) ± i K(1 − 1/m))/√m.",
    argument: "m",
  });
}
