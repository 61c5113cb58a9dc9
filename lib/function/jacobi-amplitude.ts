// Jacobi's amplitude.
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { DomainError } from "../proof/errors.ts";
import { rcOfRoots } from "./carlson-first.ts";
import { nearestInteger } from "./enclosure.ts";
import { jacobiValues } from "./jacobi-values.ts";
import { completeK, type Modulus } from "./legendre-complete.ts";

/**
 * am(u | m) = ∫_0^u dn(t) dt, with sin am = sn and cos am = cn; odd, and am(u + 2K) = am(u) + π.
 *
 * Domain   real u and real m; for 0 <= m <= 1 also complex u with |Im u| < K′, where dn has no pole on the way.
 * Branch   the continuous one from am(0) = 0; for m > 1 it swings between ± arcsin(1/√m).
 * Error    enclosure. Far arguments lose no bits but those of u itself.
 * Cost     sn, cn, K and an RC.
 * Throws   DomainError outside, UndecidedError never: where cn is near 0 the formula is analytic in it.
 * Source   DLMF 22.16.1, 22.16.2; am = nπ + sn·RC(cn², 1) for |Re u − 2nK| <= K (DLMF 19.25(vi), arcsin by RC).
 */
export function jacobiAmplitude(u: Disc, modulus: Modulus, prec: number): Disc {
  if (disc.isZero(u)) return disc.zero;
  refuse(u, modulus, prec);
  const size = Math.max(0, disc.magnitude(u));
  const wp = prec + 24 + 2 * size;
  const turns = halfTurns(u, modulus, size);
  const period = turns === 0n ? disc.zero : disc.mulInt(completeK(modulus, wp), 2n * turns, wp);
  const rest = turns === 0n ? u : disc.sub(u, period, wp);
  const [sn, cn] = jacobiValues(["sn", "cn"], rest, modulus, wp) as [Disc, Disc];
  const angle = disc.mul(sn, rcOfRoots(cn, disc.one, wp), wp);
  if (turns === 0n) return disc.round(angle, prec + 2);
  return disc.add(angle, disc.fromBall(ball.mulInt(ball.pi(wp), turns, wp)), prec + 2);
}

/** The n with Re u nearest to 2nK; none for m >= 1, where 2K is no real period of the angle. */
function halfTurns(u: Disc, modulus: Modulus, size: number): bigint {
  if (modulus.m1.axis !== "real" || modulus.m1.re <= 0n) return 0n;
  const quarter = disc.real(completeK(modulus, 64 + size));
  return nearestInteger(ball.ldexp(ball.div(disc.real(u), quarter, 64 + size), -1));
}

function refuse(u: Disc, { m, m1 }: Modulus, prec: number): void {
  const fit = m.axis === "real" && (u.axis === "real" || inStrip(u, { m, m1 }, prec));
  if (fit) return;
  throw new DomainError({
    subject: "am",
    given: m.axis === "real" ? "u outside the strip |Im u| < K′" : "a complex m",
    expected: "real u and m, or 0 <= m <= 1 and |Im u| < K′",
    hint: "Elsewhere the amplitude has many values, while sn, cn and dn have one.",
    argument: m.axis === "real" ? "u" : "m",
  });
}

function inStrip(u: Disc, { m, m1 }: Modulus, prec: number): boolean {
  if (m.re < 0n || m1.re < 0n) return false;
  const height = ball.abs(disc.imag(u));
  // K′ is infinite for m = 0, and am u = u.
  if (disc.isZero(m)) return true;
  return ball.compare(height, disc.real(completeK({ m: m1, m1: m }, prec))) === -1;
}
