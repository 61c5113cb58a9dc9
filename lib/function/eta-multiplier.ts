// The multiplier of Dedekind's η: η(Mτ) = ε(M) (cτ + d)^(1/2) η(τ), the principal root, ε a 24th root of unity.
import * as ball from "../number/ball.ts";
import * as disc from "../number/disc.ts";
import { DomainError } from "../proof/errors.ts";
import { determinant, type Matrix } from "./matrix.ts";
import { along, wordOf } from "./modular-action.ts";
import { etaTwentyFourths } from "./theta-multiplier.ts";

/**
 * The e in 0 .. 23 with ε(M) = exp(2πi e/24).
 *
 * Domain   integer matrices of determinant 1; M and −M act alike and may have different e, since (cτ + d)^(1/2) differs.
 * Error    none: the word of M gives ε times a product of roots over (cτ + d)^(1/2), a 24th root of unity that 64 bits tell.
 * Source   DLMF 23.18.5 for the letters; the closed form by Dedekind sums is DLMF 23.18.6.
 */
export function etaMultiplier(matrix: Matrix): number {
  if (determinant(matrix) !== 1n) {
    throw new DomainError({
      subject: "multiplier",
      given: `a matrix of determinant ${determinant(matrix)}`,
      expected: "determinant 1",
      argument: "matrix",
    });
  }
  const word = wordOf(matrix);
  const bits = [matrix.a, matrix.b, matrix.c, matrix.d].reduce((n, x) => Math.max(n, x.toString(2).length), 0);
  const wp = 64 + 4 * bits;
  const { root } = along(word, disc.i, wp);
  // cτ + d at τ = i, of the matrix itself and not of its negative.
  const factor = disc.add(disc.mulI(disc.fromBall(ball.fromInt(matrix.c))), disc.fromBall(ball.fromInt(matrix.d)), wp);
  const ratio = disc.div(root, disc.sqrt(factor, wp), wp);
  const [re, im] = disc.toDouble(ratio);
  const turns = Math.round((Math.atan2(im, re) * 12) / Math.PI);
  // η(τ) = e^(2πi·w/24) η(Mτ)/root, so ε = root/(cτ+d)^(1/2) · e^(−2πi·w/24).
  return (((turns - etaTwentyFourths(word)) % 24) + 24) % 24;
}
