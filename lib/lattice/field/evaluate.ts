// Values of an elliptic function: its exact form, with enclosures of its constants and of ℘ and ℘′.

import { divideUni, gcdUni } from "../../algebra/univariate.ts";
import type { Disc } from "../../number/disc.ts";
import * as disc from "../../number/disc.ts";
import { asDisc } from "../../number/origin.ts";
import { Rational } from "../../number/rational.ts";
import { PoleError } from "../../proof/errors.ts";
import { invariants, roots } from "../context.ts";
import type { PeriodLattice } from "../period-lattice.ts";
import { discOf } from "../quantity.ts";
import { type Element, normOf, type ScalarPolynomial } from "./element.ts";
import { hornerDisc } from "./polynomial-roots.ts";
import type { Constants, Scalar } from "./scalar.ts";
import { isExactElement } from "./valuation.ts";

/** An enclosure of a scalar. */
export function scalarDisc(lattice: PeriodLattice, constants: Constants, s: Scalar, prec: number): Disc {
  let sum: Disc = disc.zero;
  for (const { coefficient, powers } of s.values()) {
    const factor =
      coefficient instanceof Rational ? disc.fromRational(coefficient, prec) : asDisc(coefficient.enclosure(prec));
    const term = powers.reduce(
      (product, [name, e]) => disc.mul(product, disc.pow(constantDisc(lattice, constants, name, prec), e, prec), prec),
      factor,
    );
    sum = disc.add(sum, term, prec);
  }
  return sum;
}

function constantDisc(lattice: PeriodLattice, constants: Constants, name: string, prec: number): Disc {
  if (name === "g2" || name === "g3") return invariants(lattice, prec)[name];
  if (name === "e1" || name === "e2") return roots(lattice, prec)[name === "e1" ? 0 : 1];
  return discOf(constants.get(name)!, prec);
}

export function polynomialDisc(f: Element, p: ScalarPolynomial, prec: number): Disc[] {
  return p.map((c) => scalarDisc(f.field.lattice, f.constants, c, prec));
}

/**
 * The value where ℘ = x and ℘′ = y.
 *
 * Error    enclosures; as it stands, or with A² − B²y² over A − By where that avoids a common zero with D.
 * Throws   PoleError if the denominator's enclosure holds 0 in both forms.
 */
export function valueAt(f: Element, x: Disc, y: Disc, prec: number): Disc {
  const wp = prec + 16;
  const value = (p: ScalarPolynomial) => hornerDisc(polynomialDisc(f, p, wp), x, wp);
  const [A, By, D] = [value(f.A), disc.mul(value(f.B), y, wp), value(f.D)];
  if (!disc.containsZero(D)) return disc.div(disc.add(A, By, wp), D, prec);
  const conjugate = disc.sub(A, By, wp);
  if (isExactElement(f) && !disc.containsZero(conjugate)) {
    const { ring } = f.field;
    const N = normOf(f);
    const common = gcdUni(ring, N, f.D);
    const bottom = disc.mul(value(divideUni(ring, f.D, common).quotient), conjugate, wp);
    if (!disc.containsZero(bottom)) return disc.div(value(divideUni(ring, N, common).quotient), bottom, prec);
  }
  throw new PoleError({
    subject: "elliptic function",
    given: "an argument that is, or cannot be told from, a pole",
    expected: "an argument away from the poles",
    hint: "f.poles lists them, f.laurent(p, n) describes the function there.",
    argument: "z",
  });
}
