// All complex roots of a squarefree polynomial as disjoint discs.
//
// Approximations by Weierstrass–Durand–Kerner. Inclusion: for n different points z_i the discs around z_i of radius
// n |p(z_i)/(a_n Π_{j≠i}(z_i − z_j))| hold all roots of p, and one that meets no other holds exactly one (B. T. Smith, Error bounds for
// zeros of a polynomial based upon Gerschgorin's theorems, J. ACM 17 (1970)). It holds for every polynomial within the coefficients.

import { midpoint } from "../../function/enclosure.ts";
import * as ball from "../../number/ball.ts";
import type { Disc } from "../../number/disc.ts";
import * as disc from "../../number/disc.ts";

/** Value of Σ c_k x^k. */
export function hornerDisc(c: readonly Disc[], x: Disc, prec: number): Disc {
  return c.reduceRight((sum, a) => disc.add(disc.mul(sum, x, prec), a, prec), disc.zero);
}

/**
 * The roots of Σ c_k x^k, or undefined where the discs still meet at this precision.
 *
 * Domain   degree >= 1, leading coefficient away from 0; multiple roots never separate.
 * Cost     degree² products a step; steps double the accuracy once the roots are apart.
 */
export function isolatedRoots(c: readonly Disc[], prec: number): Disc[] | undefined {
  const n = c.length - 1;
  const wp = prec + 16 + 4 * n;
  const lead = c[n]!;
  if (n === 1) return [disc.neg(disc.div(c[0]!, lead, prec))];
  const points = approximations(c, n, wp);
  const corrections = points.map((z, k) => {
    const gaps = points.reduce((p, w, l) => (l === k ? p : disc.mul(p, disc.sub(z, w, wp), wp)), lead);
    return disc.containsZero(gaps) ? undefined : disc.div(hornerDisc(c, z, wp), gaps, wp);
  });
  const discs: Disc[] = [];
  for (const [k, z] of points.entries()) {
    const correction = corrections[k];
    if (!correction) return undefined;
    const radius = ball.mulInt(ball.upper(disc.abs(correction, 53)), BigInt(n), 53);
    discs.push(disc.widenBy(z, radius, wp, false));
  }
  const apart = discs.every((d, k) => discs.every((e, l) => l <= k || !disc.overlaps(d, e)));
  return apart ? discs.map((d) => disc.round(d, prec)) : undefined;
}

function approximations(c: readonly Disc[], n: number, wp: number): Disc[] {
  const lead = midpoint(c[n]!);
  const monic = c.map((a) => disc.div(midpoint(a), lead, wp));
  // Fujiwara: |root| <= 2 max |a_k/a_n|^(1/(n−k)).
  const size = Math.max(...monic.slice(0, n).map((a, k) => (disc.isZero(a) ? -1e9 : disc.magnitude(a) / (n - k)))) + 1;
  const radius = ball.fromDouble(1);
  const spread = Math.ceil(Math.max(size, -1e6));
  let points = Array.from({ length: n }, (_, k) => {
    const { sin, cos } = ball.sinCos(ball.fromDouble(0.4 + (2 * Math.PI * k) / n), 60);
    return midpoint(disc.ldexp(disc.mulBall(disc.fromBalls(cos, sin), radius, 60), spread));
  });
  let bits = 64;
  for (let step = 0; step < 60 + 8 * n + 2 * wp.toString(2).length; step++) {
    let largest = Number.NEGATIVE_INFINITY;
    points = points.map((z, k) => {
      const gaps = points.reduce((p, w, l) => (l === k ? p : disc.mul(p, disc.sub(z, w, bits), bits)), disc.one);
      if (disc.containsZero(gaps)) return z;
      const move = disc.div(hornerDisc(monic, z, bits), gaps, bits);
      if (!disc.isZero(move)) largest = Math.max(largest, disc.magnitude(move) - disc.magnitude(z));
      return midpoint(disc.round(disc.sub(z, move, bits), bits));
    });
    if (largest < 8 - bits && bits >= wp) break;
    if (largest < 8 - bits / 2) bits = Math.min(wp, 2 * bits);
  }
  return points;
}
