// The multipliers of Dedekind's η and of the theta functions under a matrix of determinant 1, with the principal root (cτ + d)^(1/2).
import * as ball from "../number/ball.ts";
import * as disc from "../number/disc.ts";
import { DomainError } from "../proof/errors.ts";
import { determinant, type Matrix } from "./matrix.ts";
import { along, type Letter, wordOf } from "./modular-action.ts";
import { etaTwentyFourths, type ThetaIndex, thetaMultiplier } from "./theta-multiplier.ts";

/** θ_index(v/(cτ+d) | Mτ) = exp(2πi eighths/8) (cτ+d)^(1/2) exp(πi c v²/(cτ+d)) θ_of(v|τ). */
export interface ThetaAction {
  readonly index: ThetaIndex;
  readonly of: ThetaIndex;
  /** 0 .. 7. */
  readonly eighths: number;
}

/** What modular forms of half weight take up under one matrix. */
export interface Multipliers {
  /** The e in 0 .. 23 with η(Mτ) = exp(2πi e/24) (cτ + d)^(1/2) η(τ). */
  readonly eta: number;
  /** Those of θ1 .. θ4, in this order. */
  readonly theta: readonly ThetaAction[];
}

/**
 * The multipliers of η and θ1 .. θ4 under a matrix.
 *
 * Domain   integer matrices of determinant 1; M and −M act alike and may have different multipliers, since (cτ + d)^(1/2) differs.
 * Error    none: the word of M gives a multiplier times a product of roots over (cτ + d)^(1/2), an eighth root of unity that 64 bits tell.
 * Throws   DomainError for another determinant.
 * Source   DLMF 23.18.5 and 20.7.26–33 for the letters; the closed form for η by Dedekind sums is DLMF 23.18.6.
 */
export function multipliers(matrix: Matrix): Multipliers {
  if (determinant(matrix) !== 1n) {
    throw new DomainError({
      subject: "multiplier",
      given: `a matrix of determinant ${determinant(matrix)}`,
      expected: "determinant 1",
      argument: "matrix",
    });
  }
  const word = wordOf(matrix);
  const { eighths, negative } = rootOf(word, matrix);
  // η(τ) = e^(2πi·w/24) η(Mτ)/root, so the multiplier is root/(cτ+d)^(1/2) · e^(−2πi·w/24); for θ likewise, and θ1 is odd in v.
  const theta = ([1, 2, 3, 4] as const).map((of): ThetaAction => {
    const back = thetaMultiplier(word, of);
    const odd = negative && back.index === 1 ? 4 : 0;
    return { index: back.index, of, eighths: modulo(eighths - back.eighths + odd, 8) };
  });
  return {
    eta: modulo(3 * eighths - etaTwentyFourths(word), 24),
    theta: theta.sort((x, y) => x.index - y.index),
  };
}

/** The k with root = exp(2πi k/8) (cτ + d)^(1/2), seen at τ = i, and whether the word multiplies to −M. */
function rootOf(word: readonly Letter[], matrix: Matrix): { readonly eighths: number; readonly negative: boolean } {
  const bits = [matrix.a, matrix.b, matrix.c, matrix.d].reduce((n, x) => Math.max(n, x.toString(2).length), 0);
  const wp = 64 + 4 * bits;
  const { root, matrix: product } = along(word, disc.i, wp);
  // cτ + d of the matrix itself and not of its negative.
  const factor = disc.add(disc.mulI(disc.fromBall(ball.fromInt(matrix.c))), disc.fromBall(ball.fromInt(matrix.d)), wp);
  const [re, im] = disc.toDouble(disc.div(root, disc.sqrt(factor, wp), wp));
  const negative = product.c === -matrix.c && product.d === -matrix.d;
  return { eighths: Math.round((Math.atan2(im, re) * 4) / Math.PI), negative };
}

function modulo(n: number, m: number): number {
  return ((n % m) + m) % m;
}
