// Relations between rational points, as a user holds them.

import { rationals as Q } from "../algebra/rationals.ts";
import { globalMinimalModel, toRationals } from "../arithmetic/minimal.ts";
import { type Relations, relationsBetween } from "../arithmetic/relations.ts";
import { changePoint, invertChange } from "../curve/weierstrass.ts";
import type { Standing } from "../proof/standing.ts";
import { Curve } from "./curve.ts";
import { Point } from "./point.ts";

/** Points by their names, or a list, which gets the names P1, P2, ... */
export type NamedPoints = readonly Point[] | Readonly<Record<string, Point>>;

/** All relations n1P1 + n2P2 + ... = T with T of finite order, between given points. Immutable. */
export class PointRelations {
  readonly names: readonly string[];
  readonly points: readonly Point[];
  /** A basis of the coefficient vectors, in the order of the points. */
  readonly basis: readonly (readonly bigint[])[];
  /** The torsion point that each of them gives. */
  readonly values: readonly Point[];
  /** The rank of the subgroup that the points generate. */
  readonly rank: number;
  /** Names of points that are independent and generate a subgroup of finite index, torsion aside. */
  readonly independent: readonly string[];
  readonly standing: Standing;

  constructor(names: readonly string[], points: readonly Point[], values: readonly Point[], found: Relations) {
    this.names = names;
    this.points = points;
    this.values = values;
    this.basis = found.basis;
    this.rank = found.independent.length;
    this.independent = found.independent.map((k) => names[k]!);
    this.standing = { kind: "proved", argument: argumentOf(found, this.independent) };
  }

  /** "2*P - Q = O; rank 1, generated up to finite index by P". */
  toString(): string {
    const lines = this.basis.map((n, k) => `${sumText(n, this.names)} = ${this.values[k]}`);
    const rank =
      this.rank === 0
        ? "all of finite order"
        : `rank ${this.rank}: ${this.independent.join(", ")} ${this.rank === 1 ? "has infinite order" : "are independent"}`;
    return [lines.length > 0 ? lines.join(", ") : "no relation", rank].join("; ");
  }

  toJSON() {
    return { kind: "relations", basis: this.basis.map((n) => n.map(String)), rank: String(this.rank) };
  }
}

function argumentOf({ basis, proof }: Relations, independent: readonly string[]): string {
  const exact = basis.length > 0 ? "the relations by exact arithmetic" : "";
  const primes = proof ? `p = ${proof.primes.join(", ")}` : "";
  const other = proof
    ? `${independent.join(", ")} independent, torsion aside, in the groups E(F_p)/${proof.l} for ${primes}, so there is no further relation`
    : "";
  return [exact, other].filter((part) => part !== "").join("; ");
}

/** "2*P - Q". */
function sumText(n: readonly bigint[], names: readonly string[]): string {
  const terms = n.flatMap((c, k) => {
    if (c === 0n) return [];
    const size = c < 0n ? -c : c;
    return [{ sign: c < 0n ? "-" : "+", text: size === 1n ? names[k]! : `${size}*${names[k]}` }];
  });
  return terms.map(({ sign, text }, k) => (k === 0 ? (sign === "-" ? `-${text}` : text) : ` ${sign} ${text}`)).join("");
}

export function relationsOf(E: Curve, given: NamedPoints): PointRelations {
  const entries = Array.isArray(given)
    ? (given as readonly Point[]).map((P, k) => [`P${k + 1}`, P] as const)
    : Object.entries(given as Readonly<Record<string, Point>>);
  const points = entries.map(([, P]) => P.minus(E.origin)); // checks that the curve is the same
  const { a, change } = globalMinimalModel(E.a);
  const finite = points.flatMap((P, k) => (P.coordinates ? [k] : []));
  const moved = finite.map((k) => changePoint(Q, change, points[k]!.coordinates!));
  const minimal = new Curve(Q, toRationals(a));
  const found = relationsBetween(a, moved, minimal.lattice().data);
  const back = invertChange(Q, change);
  // A given O has the relation O = O.
  const spread = (n: readonly bigint[]) => points.map((_, k) => (finite.includes(k) ? n[finite.indexOf(k)]! : 0n));
  const trivial = points.flatMap((P, k) => (P.coordinates ? [] : [points.map((_, l) => (k === l ? 1n : 0n))]));
  const values = found.values.map((T) => new Point(E, T && changePoint(Q, back, T)));
  const whole: Relations = {
    ...found,
    basis: [...trivial, ...found.basis.map(spread)],
    independent: found.independent.map((k) => finite[k]!),
  };
  const names = entries.map(([name]) => name);
  return new PointRelations(names, points, [...trivial.map(() => E.origin), ...values], whole);
}
