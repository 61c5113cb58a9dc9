// Exact coordinates of a number in the basis of a lattice, where the periods and the number lie in one imaginary quadratic field.

import type { Rational } from "../number/rational.ts";
import type { Given } from "./period-lattice.ts";
import { type ExactComplex, exactComplex, type Quantity } from "./quantity.ts";

type Pair = readonly [Rational, Rational];

/** (r, s) with z = r·ω1 + s·ω2, if they are rational by exact arithmetic. */
export function exactCoordinatesOf(given: Given, z: Quantity): Pair | undefined {
  if (given.kind === "invariants") return undefined;
  if (given.kind === "points") {
    const inBase = exactCoordinatesOf(given.base.given, z);
    return inBase && solve(given.rows, inBase);
  }
  const [w1, w2, x] = [given.w1, given.w2, z].map(exactComplex);
  if (!w1 || !w2 || !x || !oneField(w1, w2, x)) return undefined;
  return solve([parts(w1), parts(w2)], parts(x));
}

/** The square roots cancel from the coordinates if there is one only. */
function oneField(...numbers: readonly ExactComplex[]): boolean {
  return new Set(numbers.filter((n) => n.imag.sign() !== 0).map((n) => n.root)).size <= 1;
}

function parts({ real, imag }: ExactComplex): Pair {
  return [real, imag];
}

/** (r, s) with r·rows[0] + s·rows[1] = target: Cramer's rule. */
function solve([[a, b], [c, d]]: readonly [Pair, Pair], [x, y]: Pair): Pair {
  const determinant = cross(a, b, c, d);
  return [cross(x, y, c, d).div(determinant), cross(a, b, x, y).div(determinant)];
}

function cross(a: Rational, b: Rational, c: Rational, d: Rational): Rational {
  return a.times(d).minus(b.times(c));
}
