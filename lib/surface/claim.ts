// Claims: a statement about two values, and how it is known.

import { type Standing, weakest } from "../proof/standing.ts";
import { recordClaim } from "./claim-list.ts";
import { type Claimed, numberOf, standingOf } from "./claim-parts.ts";
import { Claim, type Relation } from "./claim-value.ts";

/**
 * States that two values are related, and finds out how that is known: *proved* by an exact argument, *certified* to as many
 * digits as are asked for (never "equal": two enclosures can only agree), *undecided*, or *refuted* with what shows it. Lists, points
 * and records are compared part by part; the whole is known as well as its weakest part.
 *
 * Domain   = and ≠ for numbers, points, curves, lattices, maps, polynomials and lists of them; a torsion subgroup = its order, its
 *          structure as a list or its name; complex multiplication = its discriminant or "none"; what `recognise` found = a number
 *          (then *conjectured*). < and ≤ for real numbers; "on" for a point, or a list of its two coordinates, and a curve; "in" for
 *          a number and a lattice, a lattice in another, a point and a torsion subgroup; "homothetic" for two lattices or curves over Q.
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

/** Numbers given as text are kept as the numbers that they stand for; other words, such as "Z/7", as they are. */
function side(value: Claimed): unknown {
  return typeof value === "string" && /^[\s−+-]*[\d.]/.test(value) ? numberOf(value) : value;
}

/**
 * Several claims as one: known as well as its weakest part, and refuted if one of them is.
 *
 * @example conjunction("both maps", claim("to", ...), claim("from", ...))
 */
export function conjunction(name: string, ...claims: readonly Claim[]): Claim {
  if (claims.length === 0) throw new TypeError("conjunction: expected one claim or more, got none");
  const made = new Claim(name, claims, "and", undefined, together(claims));
  recordClaim(made);
  return made;
}

/** The weakest standing, with the name of the part that it is of. */
function together(claims: readonly Claim[]): Standing {
  const standing = weakest(claims.map((part) => part.standing));
  const { name } = claims.find((part) => part.standing === standing) ?? claims[0]!;
  switch (standing.kind) {
    case "proved":
      return { kind: "proved", argument: `each of the ${claims.length} is proved` };
    case "refuted":
    case "conjectured":
      return { ...standing, evidence: `${name}: ${standing.evidence}` };
    case "undecided":
      return { kind: "undecided", tried: `${name}: ${standing.tried}` };
    default:
      return standing;
  }
}
