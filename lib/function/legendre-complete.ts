// Legendre's complete integrals. A modulus is given as the pair m, m1 = 1 − m, so that no digit is lost at either end.
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { BranchError, DomainError, PoleError } from "../proof/errors.ts";
import { carlsonRJ } from "./carlson-third.ts";
import { complementaryModulus, legendreMean, type Modulus } from "./legendre-mean.ts";

export type { Modulus } from "./legendre-mean.ts";

const THREE = { man: 3n, exp: 0, rad: 0 };
const HALF: Disc = { re: 1n, im: 0n, exp: -1, rad: 0, axis: "real" };

/**
 * K(m) = ∫_0^(π/2) dθ / √(1 − m sin²θ).
 *
 * Domain   m off [1, ∞), or real m > 1 with its side.
 * Branch   principal: analytic in the plane cut along [1, ∞); on the cut the limit from the side that is named.
 * Error    enclosure, relative.
 * Cost     one arithmetic-geometric mean.
 * Throws   PoleError for m = 1, DomainError for real m > 1 without a side, BranchError for a disc that meets the cut.
 * Source   DLMF 19.2.8, 19.8.5: K = π/(2 agm(1, √m1)).
 */
export function completeK(k: Modulus, prec: number): Disc {
  refuseModulus("K", k, true);
  const wp = prec + 8;
  const mean = disc.agm(disc.one, complementaryModulus(k, wp), wp);
  return disc.div(disc.fromBall(ball.ldexp(ball.pi(wp), -1)), mean, prec + 2);
}

/**
 * E(m) = ∫_0^(π/2) √(1 − m sin²θ) dθ; E(1) = 1.
 *
 * Domain   as K, and m = 1.
 * Branch, Error, Throws   as K.
 * Cost     one arithmetic-geometric mean.
 * Source   DLMF 19.8.6, legendre-mean.ts.
 */
export function completeE(k: Modulus, prec: number): Disc {
  refuseModulus("E", k, false);
  if (disc.isZero(k.m1)) return disc.one;
  return overEnds(k, prec, (at) => {
    const wp = prec + 8;
    const { K, ratio } = meanOf(at, wp);
    const rest = disc.mul(at.m, disc.add(HALF, ratio, wp), wp);
    return disc.mul(K, disc.sub(disc.one, rest, wp), prec + 2);
  });
}

/** D(m) = ∫_0^(π/2) sin²θ dθ / √(1 − m sin²θ) = (K − E)/m without the cancellation; conditions as K. */
export function completeD(k: Modulus, prec: number): Disc {
  refuseModulus("D", k, true);
  return overEnds(k, prec, (at) => {
    const { K, ratio } = meanOf(at, prec + 8);
    return disc.mul(K, disc.add(HALF, ratio, prec + 8), prec + 2);
  });
}

/** B(m) = ∫_0^(π/2) cos²θ dθ / √(1 − m sin²θ) = (E − m1 K)/m without the cancellation; conditions as E, B(1) = 1. */
export function completeB(k: Modulus, prec: number): Disc {
  refuseModulus("B", k, false);
  if (disc.isZero(k.m1)) return disc.one;
  return overEnds(k, prec, (at) => {
    const { K, ratio } = meanOf(at, prec + 8);
    return disc.mul(K, disc.sub(HALF, ratio, prec + 8), prec + 2);
  });
}

/** Real enclosures with fewer bits are taken at their ends. */
const COARSE = 24;

/** f over a coarse real enclosure of m < 1 by its ends: E falls with m, K, D and B rise, as their integrands show. */
function overEnds(k: Modulus, prec: number, f: (k: Modulus) => Disc): Disc {
  const { m1 } = k;
  if (m1.axis !== "real" || disc.bits(m1) > COARSE || disc.containsZero(m1) || isOnCut(k)) return f(k);
  const [low, high] = [ball.lowerPositive, ball.upper].map((end) => {
    const x = disc.fromBall(end(disc.along(m1)));
    return disc.along(f({ m: disc.sub(disc.one, x, 2 * prec), m1: x }));
  }) as [ball.Ball, ball.Ball];
  return disc.fromBall(ball.hull(low, high, prec));
}

/** The mean with the bits that the logarithm of the header takes. */
function meanOf(k: Modulus, prec: number) {
  if (disc.isZero(k.m)) return { K: disc.fromBall(ball.ldexp(ball.pi(prec), -1)), ratio: disc.zero };
  const sizes = [disc.magnitude(k.m), disc.magnitude(k.m1)].map(Math.abs);
  return legendreMean(k, prec + Math.ceil(Math.log2(Math.max(...sizes) + 8)));
}

/** The characteristic n of an integral of the third kind, with n1 = 1 − n. */
export interface Characteristic {
  readonly n: Disc;
  readonly n1: Disc;
}

/**
 * Π(n | m) = ∫_0^(π/2) dθ / ((1 − n sin²θ) √(1 − m sin²θ)); for real n > 1 Cauchy's principal value.
 *
 * Domain   m as K, n ≠ 1; for complex pairs see RJ. On the cut n is real.
 * Error    enclosure; relative to K where n < 0 is large.
 * Throws   as K and RJ; PoleError for n = 1.
 * Source   DLMF 19.25.2: Π = K + (n/3) RJ(0, m1, 1, 1 − n); on the cut `onCut`.
 */
export function completePi(characteristic: Characteristic, k: Modulus, prec: number): Disc {
  const { n, n1 } = characteristic;
  const wp = prec + 8;
  refuseModulus("Π", k, true);
  if (disc.isZero(n)) return completeK(k, prec);
  if (disc.isZero(n1)) {
    throw new PoleError({ subject: "Π", given: "the characteristic n = 1", expected: "n other than 1", argument: "n" });
  }
  if (isOnCut(k)) return onCut(characteristic, k, prec);
  const third = disc.mul(n, carlsonRJ(disc.zero, k.m1, disc.one, n1, wp), wp);
  return disc.add(completeK(k, wp), disc.divBall(third, THREE, wp), prec + 2);
}

/**
 * Π(n | m ± i0) = (Π(n/m | 1/m) ± i Π(N | 1 − 1/m)/(1 − n))/√m for m > 1, N = n(m − 1)/(m(n − 1)): the integral up to sin θ = 1/√m and, by
 * sin²θ = 1 − (1 − 1/m) sin²ψ, the rest. Then 1 − N = (n − m)/(m(n − 1)).
 */
function onCut({ n, n1 }: Characteristic, k: Modulus, prec: number): Disc {
  const wp = prec + 16;
  const { inner, outer, innerN, outerN } = reciprocal(k, { n, n1 }, wp);
  const tail = disc.mulI(disc.div(completePi(outerN, outer, wp), n1, wp));
  const sum = disc.add(completePi(innerN, inner, wp), k.side === 1 ? tail : disc.neg(tail), wp);
  return disc.div(sum, disc.sqrt(k.m, wp), prec + 2);
}

/** The moduli 1/m and 1 − 1/m with the characteristics of the two parts. */
export function reciprocal({ m, m1 }: Modulus, { n, n1 }: Characteristic, wp: number) {
  const over = disc.inv(m, wp);
  const rest = disc.neg(disc.mul(m1, over, wp));
  const quotient = (x: Disc, y: Disc) => disc.div(x, disc.mul(m, y, wp), wp);
  const apart = disc.sub(m, n, wp);
  return {
    inner: { m: over, m1: rest },
    outer: { m: rest, m1: over },
    innerN: { n: disc.mul(n, over, wp), n1: disc.mul(apart, over, wp) },
    outerN: { n: quotient(disc.mul(n, m1, wp), n1), n1: quotient(apart, n1) },
  };
}

/** Whether m is a real number > 1 whose side is named. */
export function isOnCut({ m1, side }: Modulus): boolean {
  return side !== undefined && m1.axis === "real" && m1.re < 0n && !disc.containsZero(m1);
}

/** Refuses m on the cut without a side; `open` also refuses its end m = 1. */
export function refuseModulus(subject: string, k: Modulus, open: boolean): void {
  const { m1 } = k;
  if (open && disc.isZero(m1)) {
    throw new PoleError({
      subject,
      given: "m = 1",
      expected: "m other than 1, where the integral is infinite",
      argument: "m",
    });
  }
  if (disc.containsZero(m1) && !disc.isZero(m1)) {
    throw new BranchError({
      subject,
      given: "an enclosure of m that holds 1, where the cut [1, ∞) begins",
      expected: "m known to be off 1",
      hint: "Give m, or m1 = 1 − m, with more digits.",
      argument: "m",
    });
  }
  if (m1.axis !== "real" || !(m1.re < 0n) || isOnCut(k)) return;
  throw new DomainError({
    subject,
    given: "a real m > 1, which lies on the cut [1, ∞)",
    expected: "m off the cut, or the side of it",
    hint: 'Say { m, side: "above" } for the limit from Im m > 0 or { m, side: "below" } for its conjugate: K(m ± i0) = (K(1/m) ± i K(1 − 1/m))/√m.',
    argument: "m",
  });
}
