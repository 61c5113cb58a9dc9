// Jacobi's amplitude.
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { rcOfRoots } from "./carlson-first.ts";
import { nearestInteger } from "./enclosure.ts";
import { roughAmplitude } from "./jacobi-path.ts";
import { jacobiValues } from "./jacobi-values.ts";
import { completeK, type Modulus } from "./legendre-complete.ts";

/**
 * am(u | m) = ∫_0^u dn(t) dt along the segment from 0 to u, with sin am = sn and cos am = cn; odd. For real m < 1 and real u it is the
 * continuous function with am(u + 2K) = am(u) + π, for real m > 1 it swings between ± arcsin(1/√m).
 *
 * Domain   any u and m for which no pole of dn lies on the segment. The poles are logarithmic branch points of am.
 * Branch   cut from every pole outward along the ray from 0; beside a cut two values differ by 2π.
 * Error    enclosure. Far real arguments lose no bits but those of u itself.
 * Cost     sn, cn, K and an RC; off the real axis and the strip |Im u| < K′ some dozen values of 64 bits more.
 * Throws   DomainError where the segment meets a pole; where cn is near 0 the formula is analytic in it.
 * Source   DLMF 22.16.1, 22.16.2; am = nπ ± sn·RC(cn², 1) (DLMF 19.25(vi), arcsin by RC).
 */
export function jacobiAmplitude(u: Disc, modulus: Modulus, prec: number): Disc {
  if (disc.isZero(u)) return disc.zero;
  if (!isDirect(u, modulus, prec)) return amplitudeAlong(u, modulus, prec);
  const size = Math.max(0, disc.magnitude(u));
  const wp = prec + 24 + 2 * size;
  const turns = halfTurns(u, modulus, size);
  const period = turns === 0n ? disc.zero : disc.mulInt(completeK(modulus, wp), 2n * turns, wp);
  const rest = turns === 0n ? u : disc.sub(u, period, wp);
  const [sn, cn] = jacobiValues(["sn", "cn"], rest, modulus, wp) as [Disc, Disc];
  return turned(disc.mul(sn, rcOfRoots(cn, disc.one, wp), wp), turns, wp, prec);
}

/** angle + turns·π. */
function turned(angle: Disc, turns: bigint, wp: number, prec: number): Disc {
  if (turns === 0n) return disc.round(angle, prec + 2);
  return disc.add(angle, disc.fromBall(ball.mulInt(ball.pi(wp), turns, wp)), prec + 2);
}

/** By the walk: arcsin sn, or π − arcsin sn where Re cn < 0, and as many turns as the rough value asks for. */
function amplitudeAlong(u: Disc, modulus: Modulus, prec: number): Disc {
  const wp = prec + 24;
  const rough = roughAmplitude(u, modulus);
  const [sn, cn] = jacobiValues(["sn", "cn"], u, modulus, wp) as [Disc, Disc];
  const left = disc.real(cn).man < 0n;
  const arc = disc.mul(sn, rcOfRoots(left ? disc.neg(cn) : cn, disc.one, wp), wp);
  const angle = left ? disc.neg(arc) : arc;
  const off = disc.real(disc.sub(rough, angle, 64));
  const pi = ball.pi(64);
  const odd = left ? 1n : 0n;
  const pairs = nearestInteger(ball.div(ball.sub(off, ball.mulInt(pi, odd, 64), 64), ball.ldexp(pi, 1), 64));
  return turned(angle, 2n * pairs + odd, wp, prec);
}

/** The n with Re u nearest to 2nK; none for m >= 1, where 2K is no real period of the angle. */
function halfTurns(u: Disc, modulus: Modulus, size: number): bigint {
  if (modulus.m1.re <= 0n) return 0n;
  const quarter = disc.real(completeK(modulus, 64 + size));
  return nearestInteger(ball.ldexp(ball.div(disc.real(u), quarter, 64 + size), -1));
}

/** Whether u and m are real, or u lies in the strip |Im u| < K′ of 0 <= m <= 1, where dn has no poles. */
function isDirect(u: Disc, { m, m1 }: Modulus, prec: number): boolean {
  if (m.axis !== "real") return false;
  if (u.axis === "real") return true;
  if (m.re < 0n || m1.re < 0n) return false;
  // K′ is infinite for m = 0, and am u = u.
  if (disc.isZero(m)) return true;
  const height = ball.abs(disc.imag(u));
  return ball.compare(height, disc.real(completeK({ m: m1, m1: m }, prec))) === -1;
}
