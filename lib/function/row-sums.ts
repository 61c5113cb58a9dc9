// The Weierstrass functions and the invariants row by row of the lattice: a second route, which shares no theta series with the first one.
//
// The sum over one row nr2 + Zr1 of the lattice is a trigonometric function of v + nτ, v = z/r1. With p = exp(2πiτ), u = exp(2πiv) and
// a = p^n u, b = p^n/u, c = p^n, n >= 1 (DLMF 23.8.1, 23.8.2, 23.8.6; Whittaker and Watson 20.43):
//     ℘(z) = (π/r1)² [S − 1/3 − 4 Σ (a/(1−a)² + b/(1−b)² − 2c/(1−c)²)],     S = −4u/(1−u)²
//     ℘′(z) = (π/r1)³ [−2CS − 8i Σ (a(1+a)/(1−a)³ − b(1+b)/(1−b)³)],        C = −i (1+u)/(1−u)  [cot πv for either sign of Im v]
//     ζ(z) = η1 v + (π/r1) [C − 2i Σ (a/(1−a) − b/(1−b))],                  η1 = (π²/3r1) (1 − 24 Σ c/(1−c)²)
//     σ(z) = (r1/π) exp(η1 r1 v²/2) sin πv Π (1−a)(1−b)/(1−c)²
//     g2 = (4π⁴/3r1⁴) (1 + 240 Σ n³c/(1−c)),   g3 = (8π⁶/27r1⁶) (1 − 504 Σ n⁵c/(1−c)),   Δ = (2π/r1)^12 p Π (1−c)^24
// (DLMF 23.8.5 with Lambert series, 27.14.16). Each row is smaller by |p| < 0.0054 on a reduced lattice, so the rows left out after the n-th are
// at most twice the bound of the next one.

import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import type { ReducedLattice } from "./reduced.ts";
import { atCellPole, combination, toCell, type Wanted } from "./weierstrass.ts";

/**
 * A Weierstrass function at z by rows.
 *
 * Domain   z ∉ Λ for ℘, ℘′, ζ.
 * Error    an enclosure.
 * Cost     wp/(9 Im τ) rows of a few products and a quotient each: a check, not the fast route.
 * Throws   PoleError at a lattice point.
 */
export function byRows(l: ReducedLattice, z: Disc, prec: number, wanted: Wanted): Disc {
  const at = toCell(l, z, prec);
  if (wanted !== "sigma" && disc.containsZero(at.v)) throw atCellPole(at);
  const near = disc.isZero(at.v) ? 0 : Math.max(0, -disc.magnitude(at.v));
  const wp = prec + 24 + 3 * Math.min(near, 8 * prec);
  const pi = ball.pi(wp + 8);
  const { sin, cos } = disc.sinCos(disc.mulBall(at.v, pi, wp), wp);
  const u = disc.exp(disc.mulI(disc.mulBall(at.v, ball.ldexp(pi, 1), wp)), wp);
  const rows = rowSum(l.q2, u, wanted, wp);
  if (wanted === "sigma") return sigmaByRows(l, at, sin, rows, wp, prec);
  const cot = disc.div(cos, sin, wp);
  const square = disc.sqr(disc.inv(sin, wp), wp);
  if (wanted === "wp") {
    const third = disc.divBall(disc.one, ball.fromInt(3), wp);
    return disc.mul(l.scale, disc.sub(disc.sub(square, third, wp), disc.ldexp(rows, 2), wp), prec);
  }
  if (wanted === "prime") {
    const first = disc.ldexp(disc.mul(cot, square, wp), 1);
    return disc.neg(disc.mul(l.cube, disc.add(first, disc.mulI(disc.ldexp(rows, 3)), wp), prec));
  }
  const cell = disc.sub(cot, disc.mulI(disc.ldexp(rows, 1)), wp);
  const { eta1, eta2 } = quasiPeriodsByRows(l, wp);
  const value = disc.add(disc.mul(eta1, at.v, wp), disc.mul(l.unit, cell, wp), wp);
  return disc.add(value, combination(eta1, eta2, at.m1, at.m2, wp), prec);
}

/** The rows n >= 1 of one function: a sum, or for σ a product. */
function rowSum(p: Disc, u: Disc, wanted: Wanted, wp: number): Disc {
  const inverse = disc.inv(u, wp);
  const edge = ball.add(disc.abs(u, 53), disc.abs(inverse, 53), 53);
  return rowsOf(p, wp, wanted === "sigma" ? "product" : "sum", edge, (c) => {
    const [a, b] = [disc.mul(c, u, wp), disc.mul(c, inverse, wp)];
    if (wanted === "zeta") return disc.sub(geometric(a, 1, wp), geometric(b, 1, wp), wp);
    if (wanted === "prime") return disc.sub(cubic(a, wp), cubic(b, wp), wp);
    if (wanted === "wp") {
      const pair = disc.add(geometric(a, 2, wp), geometric(b, 2, wp), wp);
      return disc.sub(pair, disc.ldexp(geometric(c, 2, wp), 1), wp);
    }
    const top = disc.mul(less(a, wp), less(b, wp), wp);
    return disc.div(top, disc.sqr(less(c, wp), wp), wp);
  });
}

/**
 * Σ or Π over n of a row that is a function of p^n; |row| (or |row − 1|) <= 64 n^5 |p^n| (1 + edge), edge·|p| < 0.1.
 * With |p| <= 0.006 the bounds fall at least by 32 · 0.006 < 0.2 a row: four times the first one left out holds all of them.
 */
function rowsOf(
  p: Disc,
  wp: number,
  kind: "sum" | "product",
  edge: ball.Ball,
  row: (c: Disc, n: number) => Disc,
): Disc {
  const product = kind === "product";
  const size = ball.upper(disc.abs(p, 53));
  const wide = ball.upper(ball.add(ball.one, edge, 53));
  let [sum, c] = [product ? disc.one : disc.zero, p];
  let bound = ball.mul(size, ball.mulInt(wide, 64, 53), 53);
  for (let n = 1; ; n++) {
    const first = ball.mulInt(bound, BigInt(n) ** 5n, 53);
    if (ball.magnitude(first) < -wp - 8) {
      const rest = ball.mulInt(ball.upper(first), 4, 53);
      return product
        ? disc.mul(sum, disc.widenBy(disc.one, rest, wp, false), wp)
        : disc.widenBy(sum, rest, wp, sum.axis !== "plane");
    }
    sum = product ? disc.mul(sum, row(c, n), wp) : disc.add(sum, row(c, n), wp);
    c = disc.mul(c, p, wp);
    bound = ball.upper(ball.mul(bound, size, 53));
  }
}

function less(x: Disc, wp: number): Disc {
  return disc.sub(disc.one, x, wp);
}

/** x/(1 − x)^k. */
function geometric(x: Disc, k: 1 | 2, wp: number): Disc {
  const bottom = less(x, wp);
  return disc.div(x, k === 1 ? bottom : disc.sqr(bottom, wp), wp);
}

/** x(1 + x)/(1 − x)³. */
function cubic(x: Disc, wp: number): Disc {
  const bottom = less(x, wp);
  const top = disc.mul(x, disc.add(disc.one, x, wp), wp);
  return disc.div(top, disc.mul(disc.sqr(bottom, wp), bottom, wp), wp);
}

/** η of r1 and r2, the second one by Legendre's relation. */
export function quasiPeriodsByRows(l: ReducedLattice, wp: number): { readonly eta1: Disc; readonly eta2: Disc } {
  const rows = rowsOf(l.q2, wp, "sum", ball.one, (c) => geometric(c, 2, wp));
  const inner = disc.sub(disc.one, disc.mulInt(rows, 24, wp), wp);
  const factor = disc.divBall(disc.mul(l.scale, l.r1, wp), ball.fromInt(3), wp);
  const eta1 = disc.mul(factor, inner, wp);
  const eta2 = disc.sub(disc.mul(eta1, l.tau, wp), disc.ldexp(disc.mulI(l.unit), 1), wp);
  return { eta1, eta2 };
}

type Cell = ReturnType<typeof toCell>;

function sigmaByRows(l: ReducedLattice, at: Cell, sin: Disc, rows: Disc, wp: number, prec: number): Disc {
  const { eta1, eta2 } = quasiPeriodsByRows(l, wp);
  const half = disc.ldexp(disc.mul(disc.mul(eta1, l.r1, wp), disc.sqr(at.v, wp), wp), -1);
  const eta = combination(eta1, eta2, at.m1, at.m2, wp);
  const middle = disc.add(at.rest, disc.ldexp(combination(l.r1, l.r2, at.m1, at.m2, wp), -1), wp);
  const factor = disc.exp(disc.add(half, disc.mul(eta, middle, wp), wp), wp);
  const value = disc.mul(disc.mul(disc.div(sin, l.unit, wp), rows, wp), factor, prec);
  return (at.m1 | at.m2) & 1n ? disc.neg(value) : value;
}

/** g2, g3 and Δ by Lambert series and the product of η. */
export function invariantsByRows(l: ReducedLattice, prec: number): { g2: Disc; g3: Disc; discriminant: Disc } {
  const wp = prec + 16;
  const lambert = (k: 3 | 5) =>
    rowsOf(l.q2, wp, "sum", ball.one, (c, n) => disc.mulInt(geometric(c, 1, wp), BigInt(n) ** BigInt(k), wp));
  const four = disc.sqr(l.scale, wp);
  const six = disc.mul(four, l.scale, wp);
  const e4 = disc.add(disc.one, disc.mulInt(lambert(3), 240, wp), wp);
  const e6 = disc.sub(disc.one, disc.mulInt(lambert(5), 504, wp), wp);
  const product = rowsOf(l.q2, wp, "product", ball.one, (c) => less(c, wp));
  const eta24 = disc.mul(l.q2, disc.pow(product, 24, wp), wp);
  return {
    g2: disc.divBall(disc.ldexp(disc.mul(four, e4, wp), 2), ball.fromInt(3), prec),
    g3: disc.divBall(disc.ldexp(disc.mul(six, e6, wp), 3), ball.fromInt(27), prec),
    discriminant: disc.ldexp(disc.mul(disc.sqr(six, wp), eta24, prec), 12),
  };
}
