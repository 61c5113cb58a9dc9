// Roots of 4x³ − g2 x − g3 that are rational, for rational invariants.
import { nearestInteger } from "../function/enclosure.ts";
import * as ball from "../number/ball.ts";
import * as disc from "../number/disc.ts";
import { Rational } from "../number/rational.ts";
import { roots } from "./context.ts";
import type { PeriodLattice } from "./period-lattice.ts";
import { exactRational } from "./quantity.ts";

/**
 * The exact value of e_index (1, 2, 3) if it is rational, decided exactly: with k a common denominator of g2 and g3, Y = 4k²x is an
 * algebraic integer, and a rational one is an integer, found by rounding and tested in the equation.
 */
export function rationalRoot(lattice: PeriodLattice, index: 1 | 2 | 3): Rational | undefined {
  const { given } = lattice;
  if (given.kind !== "invariants") return undefined;
  const [g2, g3] = [exactRational(given.g2), exactRational(given.g3)];
  if (!g2 || !g3) return undefined;
  const scale = 4n * (g2.den * g3.den) ** 2n;
  for (let prec = 64; ; prec *= 2) {
    const root = roots(lattice, prec)[index - 1]!;
    if (!ball.containsZero(disc.imag(root))) return undefined;
    const Y = ball.mulInt(disc.real(root), scale, prec + 64);
    // Within an eighth of an integer or not at all.
    if (ball.magnitude({ man: 1n, exp: Y.exp, rad: Math.max(Y.rad, 1) }) > -3 && prec < 1 << 20) continue;
    const x = Rational.of(nearestInteger(Y), scale);
    const value = x.pow(3).times(4).minus(g2.times(x)).minus(g3);
    return value.sign() === 0 ? x : undefined;
  }
}
