// K, E, D and B at once, by one arithmetic-geometric mean.
//
// With a_0 = 1, b_0 = k′ = √m1, c_0² = m and c_(n+1) = (a_n − b_n)/2, M the mean and S = Σ 2^(n−1) c_n² over n >= 1:
//     K = π/2M,   E = K (1 − m/2 − S),   D = (K − E)/m = K (1/2 + S/m),   B = (E − m1 K)/m = K (1/2 − S/m)          (DLMF 19.8.5, 19.8.6)
// Nothing cancels but the logarithm ln(16/m1) or ln|16 m| that K is larger than E or B near m = 1 and m = ∞.
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { PrecisionError } from "../proof/errors.ts";
import { lowMagnitude } from "./enclosure.ts";

/** The parameter m = k² and its complement, both enclosures of one pair. */
export interface Modulus {
  readonly m: Disc;
  readonly m1: Disc;
  /** For a real m > 1, which lies on the cut: 1 for the limit from Im m > 0, −1 for that from Im m < 0. */
  readonly side?: Side;
}

export type Side = 1 | -1;

/**
 * k′ = √m1 with Re k′ >= 0; on the cut m1 < 0 by the side.
 * Throws BranchError for a disc that meets the cut.
 */
export function complementaryModulus({ m1, side }: Modulus, wp: number): Disc {
  return sidedRoot(m1, side === 1 ? -1 : 1, wp);
}

/** √x, principal; for a negative number x the limit from Im x > 0 for side 1, its conjugate for side −1. */
export function sidedRoot(x: Disc, side: Side, wp: number): Disc {
  if (x.axis !== "real" || x.re >= 0n || disc.containsZero(x)) return disc.sqrt(x, wp);
  const root = disc.mulI(disc.sqrt(disc.neg(x), wp));
  return side === 1 ? root : disc.neg(root);
}

export interface LegendreMean {
  readonly K: Disc;
  /** S/m of the header. */
  readonly ratio: Disc;
}

/** Twenty steps do for exponents within reach and any precision. */
const MAX_STEPS = 100;

function tooCoarse(): PrecisionError {
  return new PrecisionError({
    subject: "complete integral",
    given: "a modulus known too coarsely for the means to come together",
    expected: "m known to a digit or more",
    argument: "m",
  });
}

/**
 * K and the sum that the others are made of.
 *
 * Error    enclosures. The products a_n b_n of numbers in the right half plane stay off the cut of the root. The terms of S left out are below
 *          2^(N+1) |c_N|²/(1 − 1/4) once |c_N| < |a_N|/4, since then |c_(n+1)| = |c_n²/4a_(n+1)| < |c_n|/8.
 * Cost     one mean, with a square a step more than K alone.
 */
export function legendreMean(k: Modulus, prec: number): LegendreMean {
  // For small m the sum is divided by m; where it is below the last place the bound says so.
  const spare = Math.min(prec, Math.max(0, -disc.magnitude(k.m)));
  const wp = prec + 24 + spare;
  let a: Disc = disc.one;
  let b = complementaryModulus(k, wp);
  let sum: Disc = disc.zero;
  for (let n = 0; ; n++) {
    const c = disc.ldexp(disc.sub(a, b, wp), -1);
    const term = disc.sqr(c, wp);
    sum = disc.add(sum, disc.ldexp(term, n), wp);
    const fall = lowMagnitude(a) - disc.magnitude(c);
    const enough = Math.min((wp + n) / 4, disc.bits(a) - 6, disc.bits(b) - 6);
    if (disc.isZero(c) || (fall > 2 && fall > enough)) {
      const K = disc.div(disc.fromBall(ball.ldexp(ball.pi(wp), -1)), disc.agm(a, b, wp), wp);
      return { K, ratio: disc.div(withRest(sum, c, fall, n, wp), k.m, wp) };
    }
    if (n === MAX_STEPS) throw tooCoarse();
    const mean = disc.ldexp(disc.add(a, b, wp), -1);
    b = disc.sqrt(disc.mul(a, b, wp), wp);
    a = mean;
  }
}

/** The next term is 2^(n+1) c_(n+2)² with |c_(n+2)| = |c²/4a_(n+2)| < |c|·2^(−fall), a_(n+2) near a; the sum of all is below twice that. */
function withRest(sum: Disc, c: Disc, fall: number, n: number, wp: number): Disc {
  if (disc.isZero(c)) return sum;
  const size = 2 * (disc.magnitude(c) - fall) + n + 2;
  return disc.widenBy(sum, { man: 1n, exp: size, rad: 0 }, wp);
}
