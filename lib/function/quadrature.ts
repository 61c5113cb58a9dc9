// Gauss's quadrature in pieces, with a proved error: a route to integrals that shares nothing with means and duplications.
//
// Piece of centre c and half width h, n nodes: |error| <= h (64/15) B r^(−2n)/(1 − r^(−2)), where |f| <= B in the ellipse with foci c ± h and half axes
// (r ± 1/r)h/2 (L. N. Trefethen, SIAM Review 50 (2008), theorem 4.5). The disc of radius Rh around c holds the one with r = R + √(R² − 1): for R = 8
// r^2 > 2^7.98, for R = 3 r^2 > 2^5.08, and (64/15)/(1 − r^(−2)) < 2^2.14 for both.

import type { Ball } from "../number/ball.ts";
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { BranchError, DomainError, PoleError } from "../proof/errors.ts";

/** An analytic function by enclosures; it may throw BranchError or PoleError for a disc that meets what it is not analytic at. */
export type Integrand = (s: Disc, bits: number) => Disc;

export interface Quadrature {
  /** The way is [0, 2^reach]. */
  readonly reach: number;
  /** An even number. */
  readonly nodes: number;
  /** R of the header: a wide disc takes fewer nodes and, near singularities, more pieces. */
  readonly around: 3 | 8;
  readonly bits: number;
  /** Pieces whose error is not below it are halved. */
  readonly share?: Ball | undefined;
  readonly mostPieces: number;
}

const COARSE = 64;

/** Bits that a node is worth. */
export const BITS_A_NODE = { 3: 5.08, 8: 7.98 } as const;

/**
 * The integral of f along the way; undefined where that takes too many pieces.
 *
 * Error    the enclosure holds the rounding and the bound of the header.
 * Cost     `nodes` values a piece; pieces shrink towards singularities, so that one at the distance d costs some log2(1/d) of them.
 */
export function integral(f: Integrand, options: Quadrature): Disc | undefined {
  const { reach, bits } = options;
  let sum: Disc = disc.zero;
  let left = options.mostPieces;
  // A piece has the centre odd·2^exp and the half width 2^exp.
  const open: [bigint, number][] = [[1n, reach - 1]];
  while (open.length > 0) {
    const [odd, exp] = open.pop()!;
    if (left-- === 0) return undefined;
    const piece = pieceOf(f, odd, exp, options);
    if (piece) sum = disc.add(sum, piece, bits);
    else open.push([2n * odd - 1n, exp - 1], [2n * odd + 1n, exp - 1]);
  }
  return sum;
}

/** The integral over a piece, if f is analytic around it and the bound good enough. */
function pieceOf(f: Integrand, odd: bigint, exp: number, { nodes, around, bits, share }: Quadrature): Disc | undefined {
  const wide: Disc = { re: odd, im: 0n, exp, rad: around, axis: "plane" };
  const bound = attempt(() => disc.abs(f(wide, COARSE), 32));
  if (!bound) return undefined;
  const error = ball.ldexp(ball.upper(bound), exp + 3 - Math.floor(BITS_A_NODE[around] * nodes));
  if (share && ball.compare(error, share) !== -1) return undefined;
  return attempt(() => {
    let sum: Disc = disc.zero;
    for (const { node, weight } of gaussRule(nodes, bits)) {
      for (const x of [node, ball.neg(node)]) {
        const s = disc.fromBall(ball.ldexp(ball.add(ball.fromInt(odd), x, bits), exp));
        sum = disc.add(sum, disc.mulBall(f(s, bits), weight, bits), bits);
      }
    }
    return disc.widenBy(disc.ldexp(sum, exp), error, bits, sum.axis === "real");
  });
}

export function attempt<T>(f: () => T): T | undefined {
  try {
    return f();
  } catch (error) {
    if (error instanceof BranchError || error instanceof PoleError) return undefined;
    throw error;
  }
}

interface Node {
  readonly node: Ball;
  readonly weight: Ball;
}

const KEPT = 6;
const rules = new Map<string, readonly Node[]>();

/**
 * The positive nodes of Gauss's rule with an even number n of nodes, and their weights.
 *
 * Error    each node is a root of the Legendre polynomial by a change of sign on an interval, and n/2 disjoint intervals hold all the positive ones.
 *          The weight 2/((1 − x²) P_n′(x)²) with (1 − x²) P_n′ = n (P_(n−1) − x P_n) is taken over the whole interval.
 * Cost     n/2 roots of some n·log(bits) products.
 * Source   DLMF 3.5.19, 18.9.1, 18.9.17; first values cos(π(4k − 1)/(4n + 2)).
 */
export function gaussRule(n: number, bits: number): readonly Node[] {
  const key = `${n} ${bits}`;
  const known = rules.get(key);
  if (known) return known;
  const list = Array.from({ length: n / 2 }, (_, k) =>
    nodeNear(n, Math.cos((Math.PI * (4 * k + 3)) / (4 * n + 2)), bits),
  );
  for (let k = 1; k < list.length; k++) {
    if (ball.compare(list[k]!.node, list[k - 1]!.node) !== -1) throw unproved(n);
  }
  if (rules.size >= KEPT) rules.delete(rules.keys().next().value!);
  rules.set(key, list);
  return list;
}

function nodeNear(n: number, guess: number, bits: number): Node {
  // Values of P_n by its recurrence lose at most log2(1 + √2) bits a step in enclosures.
  const wp = bits + 32 + 2 * n;
  let x = ball.fromDouble(guess);
  for (let good = 4; good < wp; good *= 2) x = ball.midpoint(newton(n, x, wp));
  const delta: Ball = { man: 1n, exp: -(bits + 16), rad: 0 };
  const [low, high] = [ball.sub(x, delta, 2 * wp), ball.add(x, delta, 2 * wp)];
  const [left, right] = [low, high].map((end) => ball.sign(legendreAt(n, end, wp).value));
  if (!left || !right || left === right || ball.sign(low) !== 1) throw unproved(n);
  const node = ball.widen(ball.round(x, wp), delta);
  const { value, before } = legendreAt(n, node, wp);
  const top = ball.mulInt(ball.sub(before, ball.mul(node, value, wp), wp), n, wp);
  const less = ball.sub(ball.one, ball.mul(node, node, wp), wp);
  // 2/((1 − x²) P′²) = 2 (1 − x²)/((1 − x²)P′)²
  return { node, weight: ball.div(ball.ldexp(less, 1), ball.mul(top, top, wp), bits + 8) };
}

function newton(n: number, x: Ball, wp: number): Ball {
  const { value, before } = legendreAt(n, x, wp);
  const less = ball.sub(ball.one, ball.mul(x, x, wp), wp);
  const slope = ball.mulInt(ball.sub(before, ball.mul(x, value, wp), wp), n, wp);
  return ball.sub(x, ball.div(ball.mul(value, less, wp), slope, wp), wp);
}

/** P_n(x) and P_(n−1)(x): (k + 1) P_(k+1) = (2k + 1) x P_k − k P_(k−1). */
function legendreAt(n: number, x: Ball, wp: number): { readonly value: Ball; readonly before: Ball } {
  let [before, value]: [Ball, Ball] = [ball.one, x];
  for (let k = 1; k < n; k++) {
    const next = ball.sub(ball.mulInt(ball.mul(x, value, wp), 2 * k + 1, wp), ball.mulInt(before, k, wp), wp);
    [before, value] = [value, ball.div(next, ball.fromInt(k + 1), wp)];
  }
  return { value, before };
}

function unproved(n: number): DomainError {
  return new DomainError({
    subject: "quadrature",
    given: `a rule of ${n} nodes whose nodes could not be told apart`,
    expected: "fewer digits",
  });
}
