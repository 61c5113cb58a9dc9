// Carlson's integrals of the first kind: RF and RC.
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import {
  closedUnderConjugation,
  fallOf,
  halved,
  nextStep,
  refuseZeros,
  rootsOf,
  type Triple,
} from "./carlson-duplication.ts";
import { carlsonSeries, farEnough, termCount } from "./carlson-series.ts";
import { ontoReal } from "./enclosure.ts";

const THREE: { man: bigint; exp: number; rad: number } = { man: 3n, exp: 0, rad: 0 };

/**
 * RF(x, y, z) = ½ ∫_0^∞ dt / √((t+x)(t+y)(t+z)).
 *
 * Domain   x, y, z off the negative real axis, at most one of them 0.
 * Branch   roots with positive real part along the path; analytic in the cut planes.
 * Error    enclosure: duplication on discs, the tail of the series by carlson-series.ts. Relative, about 2^−prec for exact arguments.
 * Cost     about √prec/4 duplications of three roots, √(3 prec) terms; log of the spread of the arguments besides.
 * Throws   DomainError for a negative argument, PoleError for two zeros, BranchError for a disc that meets the cut.
 * Source   DLMF 19.16.1, 19.36.1; B. C. Carlson, Numer. Algorithms 10 (1995), 13-26, section 2.
 */
export function carlsonRF(x: Disc, y: Disc, z: Disc, prec: number, real = false): Disc {
  refuseZeros("RF", [x, y, z], 1);
  const wp = prec + 24;
  const [a, b, c] = rootsOf("RF", [x, y, z], wp) as unknown as Triple;
  const value = rfOfRoots([a, b, c], prec, [x, y, z]);
  return closedUnderConjugation([x, y, z], real) ? ontoReal(value) : value;
}

/**
 * RF(a², b², c²) for a, b, c with positive real part (one of them may be 0).
 * `squares` are their squares, if at hand.
 */
export function rfOfRoots(roots: Triple, prec: number, squares?: Triple): Disc {
  const wp = prec + 24;
  const [x, y, z] = squares ?? (roots.map((a) => disc.sqr(a, wp)) as unknown as Triple);
  const [xy, yz, zx] = [disc.sub(x, y, wp), disc.sub(y, z, wp), disc.sub(z, x, wp)];
  // 3(A − x) = (y − x) + (z − x), and so on; the sum of the three is 0.
  const gaps = [disc.sub(zx, xy, wp), disc.sub(xy, yz, wp), disc.sub(yz, zx, wp)];
  const terms = termCount(wp);
  let r = roots;
  let step = 0;
  while (!farEnough(fallOf(gaps, tripleMean(r, 32), step), terms, wp)) {
    r = halved(r, wp);
    step = nextStep("RF", step);
  }
  const total = tripleMean(r, wp);
  const fall = Math.min(fallOf(gaps, total, step), 2 * wp);
  const scaled = gaps.map((g) => disc.ldexp(disc.div(g, total, wp), -2 * step));
  const series = carlsonSeries(1, scaled, fall, terms, wp);
  return disc.div(series, rootOfMean(r[2], disc.divBall(total, THREE, wp), wp), prec + 2);
}

/** a² + b² + c². */
function tripleMean([a, b, c]: Triple, wp: number): Disc {
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
  if (y.axis === "real" && y.re < 0n && !disc.containsZero(y)) return principalRC(x, disc.neg(y), prec);
  const wp = prec + 24;
  const [a, b] = rootsOf("RC", [x, y], wp) as [Disc, Disc];
  return rcOfRoots(a, b, prec, x, y);
}

function principalRC(x: Disc, y: Disc, prec: number): Disc {
  if (disc.isZero(x)) return disc.zero;
  const wp = prec + 8;
  const sum = disc.add(x, y, wp);
  const factor = disc.div(rootsOf("RC", [x], wp)[0]!, disc.sqrt(sum, wp), wp);
  return disc.mul(factor, carlsonRC(sum, y, wp), prec + 2);
}

/** RC(a², b²) for roots a, b with positive real part, a = 0 allowed. */
export function rcOfRoots(a: Disc, b: Disc, prec: number, x?: Disc, y?: Disc): Disc {
  const wp = prec + 24;
  const gap = disc.sub(x ?? disc.sqr(a, wp), y ?? disc.sqr(b, wp), wp);
  // A = (x + 2y)/3: 3(A − x) = −2(x − y), 3(A − y) = x − y.
  const gaps = [disc.ldexp(disc.neg(gap), 1), gap, gap];
  const terms = termCount(wp);
  let step = 0;
  while (!farEnough(fallOf(gaps, tripleMean([a, b, b], 32), step), terms, wp)) {
    // √((x + λ)/4) = (a + b)/2 and √((y + λ)/4) = √b √((a + b)/2).
    const next = disc.ldexp(disc.add(a, b, wp), -1);
    b = disc.mul(disc.sqrt(b, wp), disc.sqrt(next, wp), wp);
    a = next;
    step = nextStep("RC", step);
  }
  const total = tripleMean([a, b, b], wp);
  const fall = Math.min(fallOf(gaps, total, step), 2 * wp);
  const scaled = gaps.map((g) => disc.ldexp(disc.div(g, total, wp), -2 * step));
  const series = carlsonSeries(1, scaled, fall, terms, wp);
  return disc.div(series, rootOfMean(b, disc.divBall(total, THREE, wp), wp), prec + 2);
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
