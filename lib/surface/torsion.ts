// The torsion subgroup of a curve over Q with its proof, as a user holds it.

import { rationals as Q } from "../algebra/rationals.ts";
import { globalMinimalModel } from "../arithmetic/minimal.ts";
import { searchWeierstrass } from "../arithmetic/search.ts";
import { type ReductionCount, type TorsionGroup, torsionSubgroup } from "../arithmetic/torsion.ts";
import { changePoint, invertChange } from "../curve/weierstrass.ts";
import type { Curve } from "./curve.ts";
import { Point } from "./point.ts";

/** E(Q)tors: structure, generators and why it is no larger. Immutable. */
export class TorsionSubgroup {
  /** [] trivial, [n] cyclic of order n, [2, m] for Z/2 × Z/m. */
  readonly structure: readonly number[];
  readonly order: number;
  /** One generator for each factor of `structure`, on the curve that was asked. */
  readonly generators: readonly Point[];
  /** All points but O: for a cyclic group P, 2P, 3P, ... */
  readonly points: readonly Point[];
  /** #E(F_p) for the odd primes of good reduction that were used; the order divides each. */
  readonly counts: readonly ReductionCount[];
  /** Primes left by the counts that a division polynomial without rational points excludes. */
  readonly settledByDivision: readonly number[];

  constructor(group: TorsionGroup, generators: readonly Point[], points: readonly Point[]) {
    this.structure = group.structure;
    this.order = group.order;
    this.counts = group.counts;
    this.settledByDivision = group.settledByDivision;
    this.generators = generators;
    this.points = points;
  }

  /** The proof in words, one sentence a step. */
  get proof(): readonly string[] {
    const counts = this.counts.map(({ p, count }) => `#E(F_${p}) = ${count}`).join(", ");
    const steps = [`Torsion maps injectively to E(F_p) for odd p of good reduction: ${counts}.`];
    for (const l of this.settledByDivision) {
      steps.push(
        `The ${l}-division polynomial has no rational root that belongs to a rational point, so no point has order ${l}.`,
      );
    }
    if (this.order > 1) {
      const named = this.generators.map((P, k) => `${P} of order ${this.structure[k]}`).join(" and ");
      steps.push(
        `The group contains ${named}; all points of order a power of 2, 3, 5, 7 were found by division polynomials.`,
      );
    }
    return steps;
  }

  /** "Z/7", "Z/2 × Z/6", "0". */
  toString(): string {
    return this.structure.length === 0 ? "0" : this.structure.map((n) => `Z/${n}`).join(" × ");
  }

  toJSON() {
    return { kind: "torsion", structure: this.structure, generators: this.generators.map(String) };
  }
}

/** Computed on the minimal model, and carried back to the model of E. */
export function torsionOf(E: Curve): TorsionSubgroup {
  const { a, change } = globalMinimalModel(E.a);
  const group = torsionSubgroup(a);
  const back = invertChange(Q, change);
  const carried = (points: TorsionGroup["points"]) => points.map((P) => new Point(E, changePoint(Q, back, P)));
  return new TorsionSubgroup(group, carried(group.generators), carried(group.points));
}

/** The points of small height on the minimal model, carried back to the model of E. */
export function rationalPoints(E: Curve, height: number): Point[] {
  const { a, change } = globalMinimalModel(E.a);
  const back = invertChange(Q, change);
  return searchWeierstrass(a, height).map((P) => new Point(E, changePoint(Q, back, P)));
}
