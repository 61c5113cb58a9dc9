// RJ for arguments all round the origin, where no half plane decides the branches of the elementary terms.
//
// Each duplication holds up to an integer multiple of 3π/√δ, δ = (p−x)(p−y)(p−z): crossing the cut of p changes RJ by the residue
// 2πi · (3/2)/√((x−p)(y−p)(z−p)), and the arctangent in RC(1, 1+e) 6/d, e = δ/d², changes by π, that is, by 6π/√δ. So the duplicated value with
// any branches is RJ + k·3π/√δ with an integer k, and an enclosure of the integral to a fraction of 3π/|√δ| shows k.

import type { Ball } from "../number/ball.ts";
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { PrecisionError } from "../proof/errors.ts";
import { thirdKind } from "./carlson-quadrature.ts";
import { integral } from "./quadrature.ts";

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
 * Pieces are halved until the disc around is clear of the singularities and the bound below 2^−10 of the tolerance.
 */
function roughRJ(squares: Four, tolerance: Ball, far: (squares: Four, prec: number) => Disc): Disc {
  const top = Math.max(...squares.map((w) => disc.magnitude(w))) + 1;
  const reach = Math.ceil(top / 2);
  const move: Disc = { re: 1n, im: 0n, exp: 2 * reach, rad: 0, axis: "real" };
  const beyond = far(squares.map((w) => disc.add(w, move, BITS)) as unknown as Four, BITS);
  const [x, y, z, p] = squares;
  const { near } = thirdKind([x, y, z], p);
  const share = ball.ldexp(tolerance, -10);
  const until = integral(near, { reach, nodes: 4, around: 8, bits: BITS, share, mostPieces: MOST_PIECES });
  if (!until) throw undecided();
  return disc.add(beyond, disc.mulInt(until, 3, BITS), BITS);
}
