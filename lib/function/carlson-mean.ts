// RF and RC of real arguments by elementary functions and a mean: fast from some dozen digits on, where the arguments are not near each other.
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { lowMagnitude } from "./enclosure.ts";

/** Whether the least and the greatest differ by a good part of the greatest, as the formulas of this file want it for their digits. */
export function isSpread(all: readonly Disc[]): boolean {
  if (all.some((x) => disc.bits(x) < LEAST_BITS)) return false;
  if (!all.every((x) => x.axis === "real" && (disc.isZero(x) || (x.re > 0n && !disc.containsZero(x))))) return false;
  const [low, mid, top] = inOrder(all, 64);
  const apart = (x: Disc, y: Disc) => lowMagnitude(disc.sub(x, y, 64)) > disc.magnitude(x) - LEAST_SPREAD;
  // The difference of the two greater ones is exact, or large enough to be good.
  return apart(top!, low!) && ((top!.rad === 0 && mid!.rad === 0) || apart(top!, mid!));
}

const LEAST_SPREAD = 12;
/** Coarser enclosures stay narrower by duplication, which takes differences once. */
const LEAST_BITS = 40;

/** The numbers by size, the middle one twice if there are two. */
function inOrder(all: readonly Disc[], wp: number): readonly Disc[] {
  const sorted = [...all].sort((p, q) => (disc.sub(p, q, wp).re < 0n ? -1 : 1));
  return sorted.length === 2 ? [sorted[0]!, sorted[1]!, sorted[1]!] : sorted;
}

/**
 * RF of three numbers 0 <= x <= y <= z by a mean, for spread arguments: with a² = z − x, g² = z − y, c² = y − x, t² = x the values of RF(t², t² + c², t² + a²) are
 * the same for (a + g)/2, √(ag), (a − g)/2, (t + √(t² + c²))/2, and in the limit RC(T² + M², T²) = ln((M + √(M² + T²))/T)/M.
 *
 * Error    enclosure; what the steps left out would move is below c²/t and c²/a.
 * Cost     log2(prec) steps of two roots and two products, and a logarithm.
 * Source   DLMF 19.36(ii), 19.22.18, with θ = 1.
 */
export function rfByMean(x: Disc, y: Disc, z: Disc, prec: number): Disc {
  const wp = prec + 24 + 2 * LEAST_SPREAD;
  const [low, mid, top] = inOrder([x, y, z], wp) as [Disc, Disc, Disc];
  if (disc.isZero(disc.sub(top, mid, wp))) return rcByLogarithm(low, top, prec);
  let [a, g] = [low, mid].map((w) => disc.sqrt(disc.sub(top, w, wp), wp)) as [Disc, Disc];
  let t = disc.sqrt(low, wp);
  let square = disc.sub(mid, low, wp);
  while (!disc.isZero(square)) {
    t = disc.ldexp(disc.add(t, disc.sqrt(disc.add(disc.sqr(t, wp), square, wp), wp), wp), -1);
    [a, g] = [disc.ldexp(disc.add(a, g, wp), -1), disc.sqrt(disc.mul(a, g, wp), wp)];
    // (a − g)/2 from c² = a² − g², without the cancellation.
    square = disc.sqr(disc.ldexp(disc.div(square, a, wp), -2), wp);
    // What is left moves T and M by less than c²/t and c²/a.
    const rest = disc.magnitude(square) - 2 * Math.min(disc.magnitude(t), disc.magnitude(a)) + 4;
    if (rest < -wp) return limit(a, t, -wp, wp, prec);
  }
  return limit(a, t, -Infinity, wp, prec);
}

/** ln((M + √(M² + T²))/T)/M with M and T known to 2^rest of themselves. */
function limit(a: Disc, t: Disc, rest: number, wp: number, prec: number): Disc {
  const near = (x: Disc) =>
    rest === -Infinity ? x : disc.widenBy(x, { man: 1n, exp: disc.magnitude(x) + rest, rad: 0 }, wp);
  const [m, n] = [near(a), near(t)];
  const root = disc.sqrt(disc.add(disc.sqr(m, wp), disc.sqr(n, wp), wp), wp);
  return disc.div(disc.ln(disc.div(disc.add(m, root, wp), n, wp), wp), m, prec);
}

/** For spread arguments x >= 0 and y > 0: RC(x, y) = arctan(√((y − x)/x))/√(y − x) for x < y, artanh likewise for x > y. Source DLMF 19.2.18, 19.2.19. */
export function rcByLogarithm(x: Disc, y: Disc, prec: number): Disc {
  const wp = prec + 24 + LEAST_SPREAD;
  const gap = disc.sub(y, x, wp);
  const root = disc.sqrt(gap.re > 0n ? gap : disc.neg(gap), wp);
  const front = disc.sqrt(x, wp);
  if (gap.re > 0n) {
    const angle = ball.atan2(disc.along(root), disc.along(front), wp);
    return disc.div(disc.fromBall(angle), root, prec);
  }
  const log = disc.ln(disc.div(disc.add(front, root, wp), disc.sqrt(y, wp), wp), wp);
  return disc.div(log, root, prec);
}
