// Claims: a statement about two values, and how it is known.

import { recordClaim } from "./claim-list.ts";
import { type Claimed, numberOf, standingOf } from "./claim-parts.ts";
import { Claim, type Relation } from "./claim-value.ts";

/**
 * States that two values are related, and finds out how that is known: *proved* by an exact argument, *certified* to as many
 * digits as are asked for (never "equal": two enclosures can only agree), *undecided*, or *refuted* with what shows it. Lists, points
 * and records are compared part by part; the whole is known as well as its weakest part.
 *
 * Domain   = and ≠ for numbers, points, curves, lattices and lists of them; < and ≤ for real numbers; "on" for a point, or a
 *          list of its two coordinates, and a curve; "in" for a number and a lattice; "homothetic" for two lattices.
 * Error    enclosures that are apart prove ≠ and <, and refute =. Agreement is computed at two precisions, each through
 *          the origin of the values.
 * Throws   TypeError for values that the relation is not made for. A claim that fails does not throw: it is refuted.
 * @example claim("Legendre", eta1*ω2 - eta2*ω1, "=", 2*π*i)   // certified to 50 digits
 */
export function claim(name: string, lhs: Claimed, relation: Relation, rhs: Claimed): Claim {
  const made = new Claim(name, side(lhs), relation, side(rhs), standingOf(lhs, relation, rhs));
  recordClaim(made);
  return made;
}

/** Numbers given as text are kept as the numbers that they stand for. */
function side(value: Claimed): unknown {
  return typeof value === "string" ? numberOf(value) : value;
}
