// RJ for arguments all round the origin, where no half plane decides the branches of the elementary terms.
//
// Each duplication holds up to an integer multiple of 3π/√δ, δ = (p−x)(p−y)(p−z): crossing the cut of p changes RJ by the residue
// 2πi · (3/2)/√((x−p)(y−p)(z−p)), and the arctangent in RC(1, 1+e) 6/d, e = δ/d², changes by π, that is, by 6π/√δ. So the duplicated value with
// any branches is RJ + k·3π/√δ with an integer k, and an enclosure of the integral to a fraction of 3π/|√δ| shows k.

import type { Ball } from "../number/ball.ts";
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { BranchError, PoleError, PrecisionError } from "../proof/errors.ts";
import { eighthRoot } from "./theta-multiplier.ts";

type Four = readonly [Disc, Disc, Disc, Disc];

const BITS = 64;
const MOST_PIECES = 5_000;

/**
 * The value among `value` + k·3π/√δ that is RJ of the arguments.
 *
 * Domain   arguments off the negative real axis, one of the first three may be exactly 0.
 * `far`    RJ of arguments with positive real part.
 * Throws   PrecisionError if the enclosures leave more than one k, or none.
 */
export function settledBranch(
  value: Disc,
  squares: Four,
  far: (squares: Four, prec: number) => Disc,
  prec: number,
): Disc {
  const wp = prec + 16;
  const [x, y, z, p] = squares;
  const delta = [x, y, z].map((w) => disc.sub(p, w, wp)).reduce((a, b) => disc.mul(a, b, wp));
  const jump = disc.div(
    disc.fromBall(ball.mulInt(ball.pi(wp), 3, wp)),
    disc.sqrt(delta, wp, { cut: "continuous" }),
    wp,
  );
  const size = disc.abs(jump, 32);
  const rough = roughRJ(squares, ball.ldexp(ball.lower(size), -3), far);
  const turns = disc.div(disc.sub(rough, value, BITS), disc.round(jump, BITS), BITS);
  const k = Math.round(disc.toDouble(turns)[0]);
  const eighth: Ball = { man: 1n, exp: -2, rad: 0 };
  const whole = disc.fromBall(ball.fromInt(k));
  const off = disc.abs(disc.sub(turns, whole, BITS), 32);
  if (ball.compare(ball.upper(off), ball.ldexp(eighth, 1)) !== -1) throw undecided();
  return k === 0 ? value : disc.add(value, disc.mulInt(jump, k, wp), prec + 2);
}

function undecided(): PrecisionError {
  return new PrecisionError({
    subject: "RJ",
    given:
      "arguments all round the origin that are too coarse, or of too different sizes, to tell the branch of the value",
    expected: "arguments in one half plane, or sharp ones of like sizes",
  });
}

/**
 * RJ to about `tolerance`: with t = s², 3∫_0^S s ds/(√(s²+x) √(s²+y) √(s²+z) (s²+p)) in pieces, and RJ of the arguments moved by T = S² beyond.
 *
 * Error    a piece of half width h by Gauss's rule with four nodes: at most h·(64/15) B r^−8/(1 − r^−2) < h·B·2^−29, where |f| <= B in the disc of radius 8h
 *          around the centre, which holds the ellipse with r = 8 + √63 > 15.9 (L. N. Trefethen, SIAM Review 50 (2008), theorem 4.5). Pieces are halved until
 *          the disc is clear of the singularities and the bound below 2^−10 of the tolerance.
 */
function roughRJ(squares: Four, tolerance: Ball, far: (squares: Four, prec: number) => Disc): Disc {
  const top = Math.max(...squares.map((w) => disc.magnitude(w))) + 1;
  const reach = Math.ceil(top / 2);
  const move: Disc = { re: 1n, im: 0n, exp: 2 * reach, rad: 0, axis: "real" };
  let sum = far(squares.map((w) => disc.add(w, move, BITS)) as unknown as Four, BITS);
  const share = ball.ldexp(tolerance, -10);
  let left = MOST_PIECES;
  // A piece has the centre odd·2^exp and the half width 2^exp.
  const open: [bigint, number][] = [[1n, reach - 1]];
  while (open.length > 0) {
    const [odd, exp] = open.pop()!;
    if (left-- === 0) throw undecided();
    const piece = pieceOf(squares, odd, exp, share);
    if (piece) sum = disc.add(sum, piece, BITS);
    else open.push([2n * odd - 1n, exp - 1], [2n * odd + 1n, exp - 1]);
  }
  return sum;
}

/** The integral over a piece, if its bound is good enough. */
function pieceOf(squares: Four, odd: bigint, exp: number, share: Ball): Disc | undefined {
  const wide: Disc = { re: odd, im: 0n, exp, rad: 8, axis: "plane" };
  const bound = attempt(() => disc.abs(integrand(squares, wide), 32));
  if (!bound) return undefined;
  const error = ball.ldexp(ball.upper(bound), exp - 29);
  if (ball.compare(error, share) !== -1) return undefined;
  return attempt(() => {
    let sum: Disc = disc.zero;
    for (const [node, weight] of gauss()) {
      for (const x of [node, ball.neg(node)]) {
        const s = disc.fromBall(ball.ldexp(ball.add(ball.fromInt(odd), x, BITS), exp));
        sum = disc.add(sum, disc.mulBall(integrand(squares, s), weight, BITS), BITS);
      }
    }
    return disc.widenBy(disc.ldexp(sum, exp), error, BITS, false);
  });
}

let rule: readonly (readonly [Ball, Ball])[] | undefined;

/** Positive nodes √(3/7 ∓ (2/7)√(6/5)) with their weights (18 ± √30)/36. Source DLMF 3.5.21 for n = 4. */
function gauss(): readonly (readonly [Ball, Ball])[] {
  if (rule) return rule;
  const root30 = ball.sqrt(ball.fromInt(30), BITS);
  const node = (sign: Ball) =>
    ball.sqrt(ball.div(ball.add(ball.fromInt(15), ball.mulInt(sign, 2, BITS), BITS), ball.fromInt(35), BITS), BITS);
  const weight = (sign: Ball) => ball.div(ball.sub(ball.fromInt(18), sign, BITS), ball.fromInt(36), BITS);
  rule = [ball.neg(root30), root30].map((sign) => [node(sign), weight(sign)] as const);
  return rule;
}

function integrand([x, y, z, p]: Four, s: Disc): Disc {
  const square = disc.sqr(s, BITS);
  let top: Disc = disc.mulInt(s, 3, BITS);
  let bottom = disc.add(square, p, BITS);
  for (const w of [x, y, z]) {
    // s/√(s²) is 1 on the way.
    if (disc.isZero(w)) top = disc.fromBall(ball.fromInt(3));
    else bottom = disc.mul(bottom, rootAlong(disc.add(square, w, BITS), w), BITS);
  }
  return disc.div(top, bottom, BITS);
}

/** √x for x = s² + w: it moves parallel to the real axis, so the cut of the root is turned to the side of the axis where w is not. */
function rootAlong(x: Disc, w: Disc): Disc {
  const low = w.im < 0n;
  const turned = low ? disc.mulI(x) : disc.neg(disc.mulI(x));
  return disc.mul(disc.sqrt(turned, BITS), eighthRoot(low ? 7 : 1, BITS), BITS);
}

function attempt<T>(f: () => T): T | undefined {
  try {
    return f();
  } catch (error) {
    if (error instanceof BranchError || error instanceof PoleError) return undefined;
    throw error;
  }
}
