import type { Standing } from "../proof/standing.ts";

/** What a claim may say of its two sides. */
export type Relation = "=" | "≠" | "<" | "≤" | "on" | "in" | "homothetic";

/** A statement about two values with its standing. */
export class Claim {
  readonly name: string;
  readonly lhs: unknown;
  /** "and": the left side is a list of claims, stated together. */
  readonly relation: Relation | "and";
  readonly rhs: unknown;
  readonly standing: Standing;

  constructor(name: string, lhs: unknown, relation: Claim["relation"], rhs: unknown, standing: Standing) {
    this.name = name;
    this.lhs = lhs;
    this.relation = relation;
    this.rhs = rhs;
    this.standing = standing;
  }

  /** True for what is proved or certified: a conjecture does not hold yet. */
  get holds(): boolean {
    return this.standing.kind === "proved" || this.standing.kind === "certified";
  }

  toString(): string {
    return `${this.name}: ${this.standing.kind}`;
  }
}
