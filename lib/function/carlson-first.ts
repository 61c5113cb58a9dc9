// Carlson's integrals of the first kind: RF and RC.
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import {
  closedUnderConjugation,
  duplicated,
  halved,
  refuseZeros,
  rootsOf,
  type Triple,
} from "./carlson-duplication.ts";
import { isSpread, rcByLogarithm, rfByMean } from "./carlson-mean.ts";
import { ontoReal } from "./enclosure.ts";

const THREE: { man: bigint; exp: number; rad: number } = { man: 3n, exp: 0, rad: 0 };

/**
 * RF(x, y, z) = ½ ∫_0^∞ dt / √((t+x)(t+y)(t+z)).
 *
 * Domain   x, y, z off the negative real axis, at most one of them 0.
 * Branch   roots with positive real part along the path; analytic in the cut planes.
 * Error    enclosure, relative, about 2^−prec for exact arguments.
 * Cost     real arguments: log2(prec) steps of two roots, and a logarithm. Complex ones, and such that are near each other: about √prec/4
 *          duplications of three roots, √(3 prec) terms; log of the spread of the arguments besides.
 * Throws   DomainError for a negative argument, PoleError for two zeros, BranchError for a disc that meets the cut.
 * Source   DLMF 19.16.1, 19.36.1, 19.36(ii); B. C. Carlson, Numer. Algorithms 10 (1995), 13-26, section 2.
 */
export function carlsonRF(x: Disc, y: Disc, z: Disc, prec: number, real = false): Disc {
  refuseZeros("RF", [x, y, z], 1);
  return rfBy(rfOfRoots, [x, y, z], prec, real);
}

/** RF by Carlson's duplication alone, the second route of real arguments. */
export function rfByDuplication(x: Disc, y: Disc, z: Disc, prec: number, real = false): Disc {
  return rfBy(duplicatedRF, [x, y, z], prec, real);
}

function rfBy(method: typeof rfOfRoots, squares: Triple, prec: number, real: boolean): Disc {
  const roots = rootsOf("RF", squares, prec + 24) as unknown as Triple;
  const value = method(roots, prec, squares);
  return closedUnderConjugation(squares, real) ? ontoReal(value) : value;
}

/**
 * RF(a², b², c²) for a, b, c with positive real part (one of them may be 0), from their squares too.
 * Positive roots go by the mean where their squares are apart.
 */
export function rfOfRoots(roots: Triple, prec: number, squares: Triple): Disc {
  const positive = roots.every((a) => a.axis === "real" && a.re >= 0n && (disc.isZero(a) || !disc.containsZero(a)));
  return positive && isSpread(squares) ? rfByMean(...squares, prec) : duplicatedRF(roots, prec, squares);
}

/** RF by Carlson's duplication, as rfOfRoots. */
export function duplicatedRF(roots: Triple, prec: number, [x, y, z]: Triple): Disc {
  const wp = prec + 24;
  const [xy, yz, zx] = [disc.sub(x, y, wp), disc.sub(y, z, wp), disc.sub(z, x, wp)];
  // 3(A − x) = (y − x) + (z − x), and so on; the sum of the three is 0.
  const gaps = [disc.sub(zx, xy, wp), disc.sub(xy, yz, wp), disc.sub(yz, zx, wp)];
  const next = (r: Triple) => halved(r, wp);
  const { roots: last, total, series } = duplicated(1, { name: "RF", start: roots, gaps, total: tripleSum, next }, wp);
  return disc.div(series, rootOfMean(last[2], disc.divBall(total, THREE, wp), wp), prec + 2);
}

/** a² + b² + c². */
function tripleSum([a, b, c]: Triple, wp: number): Disc {
  return disc.add(disc.add(disc.sqr(a, wp), disc.sqr(b, wp), wp), disc.sqr(c, wp), wp);
}

/** √A as a·√(A/a²), which stays off the cut whatever the direction of A is, for A near a². */
export function rootOfMean(a: Disc, mean: Disc, wp: number): Disc {
  if (mean.axis === "real") return disc.sqrt(mean, wp);
  return disc.mul(a, disc.sqrt(disc.div(mean, disc.sqr(a, wp), wp), wp), wp);
}

/**
 * RC(x, y) = RF(x, y, y) = ½ ∫_0^∞ dt / (√(t+x) (t+y)).
 *
 * Domain   x off the negative real axis, 0 allowed; y ≠ 0. For y < 0 the value is Cauchy's principal value.
 * Branch   as RF; the principal value is √(x/(x − y)) RC(x − y, −y)   (DLMF 19.2.20).
 * Error    enclosure, relative, about 2^−prec for exact arguments.
 * Cost     as RF, with two roots a step.
 * Throws   as RF.
 * Source   DLMF 19.2.17, 19.2.20, 19.36(i).
 */
export function carlsonRC(x: Disc, y: Disc, prec: number): Disc {
  refuseZeros("RC", [y], 0);
  if (isOnCut(y)) return principalRC(x, disc.neg(y), prec, carlsonRC);
  return isSpread([x, y]) ? rcByLogarithm(x, y, prec) : duplicatedRC(x, y, prec);
}

/** RC by Carlson's duplication; for y < 0 the principal value by its reflection. */
export function duplicatedRC(x: Disc, y: Disc, prec: number): Disc {
  if (isOnCut(y)) return principalRC(x, disc.neg(y), prec, duplicatedRC);
  const [a, b] = rootsOf("RC", [x, y], prec + 24) as [Disc, Disc];
  return rcOfRoots(a, b, prec, x, y);
}

function isOnCut(y: Disc): boolean {
  return y.axis === "real" && y.re < 0n && !disc.containsZero(y);
}

function principalRC(x: Disc, y: Disc, prec: number, method: typeof carlsonRC): Disc {
  if (disc.isZero(x)) return disc.zero;
  const wp = prec + 8;
  const sum = disc.add(x, y, wp);
  const factor = disc.div(rootsOf("RC", [x], wp)[0]!, disc.sqrt(sum, wp), wp);
  return disc.mul(factor, method(sum, y, wp), prec + 2);
}

/** RC(a², b²) for roots a, b with positive real part, a = 0 allowed. */
export function rcOfRoots(a: Disc, b: Disc, prec: number, x?: Disc, y?: Disc): Disc {
  const wp = prec + 24;
  const gap = disc.sub(x ?? disc.sqr(a, wp), y ?? disc.sqr(b, wp), wp);
  // A = (x + 2y)/3: 3(A − x) = −2(x − y), 3(A − y) = x − y.
  const gaps = [disc.ldexp(disc.neg(gap), 1), gap, gap];
  // √((x + λ)/4) = (a + b)/2 and √((y + λ)/4) = √b √((a + b)/2).
  const next = ([p, q]: Triple): Triple => {
    const mean = disc.ldexp(disc.add(p, q, wp), -1);
    const other = disc.mul(disc.sqrt(q, wp), disc.sqrt(mean, wp), wp);
    return [mean, other, other];
  };
  const { roots, total, series } = duplicated(1, { name: "RC", start: [a, b, b], gaps, total: tripleSum, next }, wp);
  return disc.div(series, rootOfMean(roots[1], disc.divBall(total, THREE, wp), wp), prec + 2);
}

/**
 * RC(1, 1 + e) = Σ (−e)^k/(2k + 1) = atan(√e)/√e.
 *
 * Domain   1 + e off the negative real axis; `loose` takes some branch on and across it.
 * Error    for |e| < 2^−k, k >= 1, the terms from N on are together at most 2^(1−kN).
 */
export function rcNearOne(e: Disc, prec: number, loose = false): Disc {
  if (disc.isZero(e)) return disc.one;
  const wp = prec + 12;
  const fall = -disc.magnitude(e);
  const terms = Math.ceil((wp + 2) / Math.max(fall, 1));
  if (fall < 1 || terms > 4 * Math.sqrt(wp)) {
    const y = disc.add(disc.one, e, wp);
    if (!loose) return carlsonRC(disc.one, y, prec);
    return rcOfRoots(disc.one, disc.sqrt(y, wp, { cut: "continuous" }), prec, disc.one, y);
  }
  let sum: Disc = disc.zero;
  for (let k = terms - 1; k >= 0; k--) {
    const bits = Math.max(16, wp - fall * k);
    const term = disc.divBall(disc.one, { man: BigInt(2 * k + 1), exp: 0, rad: 0 }, bits);
    sum = disc.sub(term, disc.mul(e, sum, bits), bits);
  }
  return disc.widenBy(sum, { man: 2n, exp: -fall * terms, rad: 0 }, wp, e.axis === "real");
}
