// Carlson's integrals of the third kind and its degenerate case: RJ and RD.
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { DomainError } from "../proof/errors.ts";
import { settledBranch } from "./carlson-branch.ts";
import {
  closedUnderConjugation,
  duplicated,
  type Ended,
  halved,
  refuseZeros,
  rootsOf,
  type Triple,
} from "./carlson-duplication.ts";
import { carlsonRC, carlsonRF, rcNearOne, rootOfMean } from "./carlson-first.ts";
import { midpoint, ontoReal } from "./enclosure.ts";

const FIVE = { man: 5n, exp: 0, rad: 0 };

/**
 * RD(x, y, z) = (3/2) ∫_0^∞ dt / (√((t+x)(t+y)) (t+z)^(3/2)).
 *
 * Domain   x, y, z off the negative real axis, z ≠ 0, at most one of x and y 0.
 * Branch   as RF.
 * Error    enclosure, relative, about 2^−prec for exact arguments.
 * Cost     as RF and a quotient a step.
 * Throws   as RF.
 * Source   DLMF 19.16.5, 19.36.2 and the algorithm below it; Carlson 1995, section 4.
 */
export function carlsonRD(x: Disc, y: Disc, z: Disc, prec: number, real = false): Disc {
  refuseZeros("RD", [z], 0);
  refuseZeros("RD", [x, y], 1);
  const roots = rootsOf("RD", [x, y, z], prec + 24) as unknown as Triple;
  const value = rdOfRoots(roots, prec, [x, y, z]);
  return closedUnderConjugation([x, y], real) && z.axis === "real" ? ontoReal(value) : value;
}

/** RD(a², b², c²) for roots with positive real part; a or b may be 0. */
export function rdOfRoots(roots: Triple, prec: number, squares?: Triple): Disc {
  const wp = prec + 24;
  const [x, y, z] = squares ?? (roots.map((a) => disc.sqr(a, wp)) as unknown as Triple);
  const zx = disc.sub(z, x, wp);
  const zy = disc.sub(z, y, wp);
  // A = (x + y + 3z)/5: 5(A − z) = −(zx + zy), A − x = (A − z) + zx.
  const last = disc.neg(disc.add(zx, zy, wp));
  const gaps = [
    disc.add(last, disc.mulInt(zx, 5, wp), wp),
    disc.add(last, disc.mulInt(zy, 5, wp), wp),
    last,
    last,
    last,
  ];
  let sum: Disc = disc.zero;
  const next = (r: Triple, step: number): Triple => {
    const [a, b, c] = r;
    // √z (z + λ) = c (c + a)(c + b)
    const bottom = disc.mul(disc.mul(disc.add(c, a, wp), disc.add(c, b, wp), wp), c, wp);
    sum = disc.add(sum, disc.ldexp(disc.inv(bottom, wp), -2 * step), wp);
    return halved(r, wp);
  };
  const total = (r: Triple, bits: number) => weighted(r, r[2], 3, bits);
  const end = duplicated(3, { name: "RD", start: roots, gaps, total, next }, wp);
  return disc.add(disc.mulInt(sum, 3, wp), lastTerm(end, end.roots[2], wp), prec + 2);
}

/** a² + b² + (weight)·p² with p the root that counts more; RJ adds c² in the caller. */
function weighted([a, b]: readonly [Disc, Disc, ...Disc[]], p: Disc, weight: number, wp: number): Disc {
  const two = disc.add(disc.sqr(a, wp), disc.sqr(b, wp), wp);
  return disc.add(two, disc.mulInt(disc.sqr(p, wp), weight, wp), wp);
}

/** 4^−n A^(−3/2) times the series, with `total` = 5 A and A near root². */
function lastTerm({ total, steps, series }: Ended<unknown>, root: Disc, wp: number): Disc {
  const mean = disc.divBall(total, FIVE, wp);
  return disc.ldexp(disc.div(series, disc.mul(mean, rootOfMean(root, mean, wp), wp), wp), -2 * steps);
}

/**
 * RJ(x, y, z, p) = (3/2) ∫_0^∞ dt / (√((t+x)(t+y)(t+z)) (t+p)).
 *
 * Domain   x, y, z, p off the negative real axis, at most one of x, y, z is 0, p ≠ 0. For p < 0 and real x, y, z >= 0 the value is Cauchy's
 *          principal value.
 * Branch   as RF.
 * Error    enclosure, relative, about 2^−prec for exact arguments; a principal value near its zero has an absolute error of that size.
 * Cost     as RF, with four roots and an RC of falling cost a step; arguments that no half plane holds cost some hundred short terms besides.
 * Throws   as RF; PrecisionError where coarse arguments leave the branch open.
 * Source   DLMF 19.16.2, 19.36(i), 19.20.14; Carlson 1995, section 3 with its conditions on the arguments; carlson-branch.ts elsewhere.
 */
export function carlsonRJ(x: Disc, y: Disc, z: Disc, p: Disc, prec: number, real = false): Disc {
  refuseZeros("RJ", [p], 0);
  refuseZeros("RJ", [x, y, z], 1);
  const others = [x, y, z] as const;
  const twin = others.findIndex((w) => disc.isZero(disc.sub(w, p, prec)));
  if (twin >= 0) {
    const rest = others.filter((_, k) => k !== twin);
    return carlsonRD(rest[0]!, rest[1]!, p, prec, real);
  }
  if (p.axis === "real" && p.re < 0n && !disc.containsZero(p)) return principalRJ(x, y, z, disc.neg(p), prec);
  const roots = rootsOf("RJ", [x, y, z, p], prec + 32) as unknown as Four;
  return rjOfRoots(roots, [x, y, z, p], prec, closedUnderConjugation(others, real));
}

export type Four = readonly [Disc, Disc, Disc, Disc];

/**
 * RJ of the squares of four roots with positive real part; one of the first three may be 0, or cross 0 together with its disc.
 * `closed`: the first three squares are closed under conjugation.
 */
export function rjOfRoots(roots: Four, squares: Four, prec: number, closed: boolean): Disc {
  const sure = closed && squares.slice(0, 3).every((w) => w.axis !== "real" || w.re >= 0n);
  if (!sure && !inRightHalf(squares)) return rotatedRJ(roots, squares, prec);
  const value = duplicatedRJ(roots, squares, prec);
  return sure && squares[3].axis === "real" ? ontoReal(value) : value;
}

function inRightHalf(arguments_: readonly Disc[]): boolean {
  return arguments_.every((w) => disc.isZero(w) || w.re >= BigInt(Math.ceil(w.rad)));
}

/** The duplication; `loose` takes any branch of the elementary terms and of √p, for a caller that settles it afterwards. */
function duplicatedRJ([a, b, c, s]: Four, [x, y, z, p]: Four, prec: number, loose = false): Disc {
  const wp = prec + 32;
  const [px, py, pz] = [disc.sub(p, x, wp), disc.sub(p, y, wp), disc.sub(p, z, wp)];
  // A = (x + y + z + 2p)/5: 5(A − p) = −(px + py + pz).
  const last = disc.neg(disc.add(disc.add(px, py, wp), pz, wp));
  const gap = (d: Disc) => disc.add(last, disc.mulInt(d, 5, wp), wp);
  const gaps = [gap(px), gap(py), gap(pz), last, last];
  const delta = disc.mul(disc.mul(px, py, wp), pz, wp);
  let sum: Disc = disc.zero;
  const next = ({ r, root }: WithLast, step: number): WithLast => {
    // Term m is 6·4^−m/d RC(1, 1 + 4^−3m δ/d²).
    const d = disc.mul(disc.mul(disc.add(root, r[0], wp), disc.add(root, r[1], wp), wp), disc.add(root, r[2], wp), wp);
    const e = disc.ldexp(disc.div(delta, disc.sqr(d, wp), wp), -6 * step);
    sum = disc.add(sum, disc.ldexp(disc.div(rcNearOne(e, wp, loose), d, wp), -2 * step), wp);
    return { r: halved(r, wp), root: halvedLast(r, root, wp, loose) };
  };
  const total = ({ r, root }: WithLast, bits: number) =>
    disc.add(weighted(r, root, 2, bits), disc.sqr(r[2], bits), bits);
  const end = duplicated(3, { name: "RJ", start: { r: [a, b, c], root: s }, gaps, total, next }, wp);
  return disc.add(disc.mulInt(sum, 6, wp), lastTerm(end, end.roots.root, wp), prec + 2);
}

/** Roots of x, y, z and of p. */
interface WithLast {
  readonly r: Triple;
  readonly root: Disc;
}

/** √((p + λ)/4) from the roots. */
function halvedLast([a, b, c]: Triple, s: Disc, wp: number, loose: boolean): Disc {
  const lambda = disc.add(disc.mul(a, disc.add(b, c, wp), wp), disc.mul(b, c, wp), wp);
  return disc.sqrt(disc.ldexp(disc.add(disc.sqr(s, wp), lambda, wp), -2), wp, loose ? { cut: "continuous" } : {});
}

/**
 * All four arguments turned into the right half plane by a factor k: RJ is homogeneous of degree −3/2, and the value goes along
 * as long as no argument crosses the cut on the way, that is, arg w + arg k ∈ (−π/2, π/2) as real numbers.
 */
function rotatedRJ(roots: Four, squares: Four, prec: number): Disc {
  const wp = prec + 16;
  const root = towardsAxis(roots, wp);
  const factor = disc.sqr(root, wp);
  const turned = squares.map((w) => disc.mul(w, factor, wp)) as unknown as Four;
  if (!inRightHalf(turned) || spreadOf(roots) > 3.2) return settledRJ(roots, squares, prec);
  const value = duplicatedRJ(roots.map((a) => disc.mul(a, root, wp)) as unknown as Four, turned, wp);
  return disc.mul(value, disc.mul(factor, root, wp), prec + 2);
}

/** Twice the angle between the outermost roots, read in doubles: that of the squares, which the half plane then bounds exactly. */
function spreadOf(roots: readonly Disc[]): number {
  const [low, high] = outermost(roots);
  return 2 * (angleOf(high) - angleOf(low));
}

/** The number of size about 1 that turns the middle of the outermost roots onto the positive real axis. */
function towardsAxis(roots: readonly Disc[], wp: number): Disc {
  const [low, high] = outermost(roots).map((a) => disc.div(a, disc.fromBall(disc.abs(a, wp)), wp)) as [Disc, Disc];
  return midpoint(disc.conj(disc.sqrt(disc.mul(low, high, wp), wp)));
}

function outermost(roots: readonly Disc[]): [Disc, Disc] {
  const some = roots.filter((a) => !disc.containsZero(a)).sort((a, b) => angleOf(a) - angleOf(b));
  return [some[0]!, some.at(-1)!];
}

function angleOf(root: Disc): number {
  const [re, im] = disc.toDouble(root);
  return Math.atan2(im, re);
}

/** Arguments all round the origin: any branch first, then the right one by a rough enclosure of the integral. */
function settledRJ(roots: Four, squares: Four, prec: number): Disc {
  const value = duplicatedRJ(roots, squares, prec + 8, true);
  const far = (moved: Four, bits: number) => duplicatedRJ(rootsOf("RJ", moved, bits) as unknown as Four, moved, bits);
  return settledBranch(value, squares, far, prec);
}

/**
 * Cauchy's principal value of RJ(x, y, z, −q), q > 0, for real x, y, z >= 0: with x <= y <= z and p = (z(x + y + q) − xy)/(z + q),
 * (q + z) RJ(x, y, z, −q) = (p − z) RJ(x, y, z, p) − 3 RF(x, y, z) + 3 √(xyz/(xy + pq)) RC(xy + pq, pq)   (DLMF 19.20.14).
 */
function principalRJ(x: Disc, y: Disc, z: Disc, q: Disc, prec: number): Disc {
  if ([x, y, z].some((w) => w.axis !== "real")) {
    throw new DomainError({
      subject: "RJ",
      given: "a negative last argument with others that are not real",
      expected: "x, y, z real and not negative for a principal value",
      argument: "p",
    });
  }
  const wp = prec + 16;
  const [low, mid, top] = [x, y, z].sort((a, b) => order(a, b, wp)) as [Disc, Disc, Disc];
  const xy = disc.mul(low, mid, wp);
  const qz = disc.add(q, top, wp);
  const p = disc.div(
    disc.add(disc.mul(top, disc.add(mid, q, wp), wp), disc.mul(low, disc.sub(top, mid, wp), wp), wp),
    qz,
    wp,
  );
  // p − z = (z(x + y + q) − xy − z(z + q))/(z + q) = −(z − x)(z − y)/(z + q)
  const away = disc.neg(disc.div(disc.mul(disc.sub(top, low, wp), disc.sub(top, mid, wp), wp), qz, wp));
  const pq = disc.mul(p, q, wp);
  const sum = disc.add(xy, pq, wp);
  const first = disc.mul(away, carlsonRJ(low, mid, top, p, wp), wp);
  const second = disc.mulInt(carlsonRF(low, mid, top, wp), 3, wp);
  const root = disc.sqrt(disc.div(disc.mul(xy, top, wp), sum, wp), wp);
  const third = disc.mulInt(disc.mul(root, carlsonRC(sum, pq, wp), wp), 3, wp);
  return disc.div(disc.add(disc.sub(first, second, wp), third, wp), qz, prec + 2);
}

function order(a: Disc, b: Disc, wp: number): number {
  const d = disc.sub(a, b, wp);
  return d.re > 0n ? 1 : d.re < 0n ? -1 : 0;
}
