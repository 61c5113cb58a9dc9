// The endomorphism ring of a curve: Z or an imaginary quadratic order in characteristic 0; ordinary or supersingular over F_p.

import { squarefreePart } from "../algebra/factor.ts";
import type { Standing } from "../proof/standing.ts";
import type { Curve } from "./curve.ts";

/** What is known of the ring of all endomorphisms over the algebraic closure. Immutable. */
export class EndomorphismRing {
  /** Z, an order of an imaginary quadratic field, a maximal order of a quaternion algebra; undefined if enclosures leave it open. */
  readonly kind: "integers" | "quadratic order" | "quaternion order" | undefined;
  /** Discriminant of the quadratic order; over F_p that of Z[π], which the ring contains, for an ordinary curve. */
  readonly discriminant: bigint | undefined;
  readonly reason: string;
  readonly standing: Standing;
  readonly #words: string;

  constructor(
    data: Pick<EndomorphismRing, "kind" | "discriminant" | "reason" | "standing"> & { readonly words: string },
  ) {
    this.kind = data.kind;
    this.discriminant = data.discriminant;
    this.reason = data.reason;
    this.standing = data.standing;
    this.#words = data.words;
  }

  /** The fundamental discriminant of the quadratic field. */
  get fundamental(): bigint | undefined {
    if (this.discriminant === undefined) return undefined;
    const d = squarefreePart(this.discriminant);
    return ((d % 4n) + 4n) % 4n === 1n ? d : 4n * d;
  }

  /** f with discriminant = f²·fundamental. */
  get conductor(): bigint | undefined {
    if (this.discriminant === undefined) return undefined;
    const square = this.discriminant / this.fundamental!;
    for (let f = 1n; ; f++) if (f * f === square) return f;
  }

  /** "Z: ...", "the order of discriminant -28 ...: ...". */
  toString(): string {
    return `${this.#words}: ${this.reason}`;
  }

  toJSON() {
    return { kind: "endomorphism ring", ring: this.kind ?? null, discriminant: this.discriminant?.toString() ?? null };
  }
}

/** By j for an exact curve in characteristic 0, by the trace of Frobenius over F_p. */
export function endomorphismRingOf<T>(E: Curve<T>): EndomorphismRing {
  return E.field.characteristic === 0n ? inCharacteristicZero(E) : overPrimeField(E);
}

function inCharacteristicZero<T>(E: Curve<T>): EndomorphismRing {
  const { outcome, discriminant, reason, standing } = E.lattice().complexMultiplication();
  if (outcome === "yes") {
    const words = `the order of discriminant ${discriminant}`;
    return new EndomorphismRing({ kind: "quadratic order", discriminant, reason, standing, words });
  }
  const kind = outcome === "no" ? ("integers" as const) : undefined;
  const words = kind ? "Z" : "undecided by enclosures";
  return new EndomorphismRing({
    kind,
    discriminant: outcome === "no" ? undefined : discriminant,
    reason,
    standing,
    words,
  });
}

function overPrimeField<T>(E: Curve<T>): EndomorphismRing {
  const p = E.field.characteristic;
  const t = E.trace;
  if (t % p === 0n) {
    const reason = `p = ${p} divides the trace ${t} of Frobenius; over the algebraic closure a maximal order of the quaternion algebra ramified at ${p} and ∞`;
    const standing: Standing = { kind: "proved", argument: reason };
    return new EndomorphismRing({
      kind: "quaternion order",
      discriminant: undefined,
      reason,
      standing,
      words: "supersingular",
    });
  }
  const discriminant = t * t - 4n * p;
  const fundamental = squarefreePart(discriminant);
  const reason = `the trace of Frobenius π is ${t}, prime to p = ${p}; the ring is an order of Q(√${fundamental}) that contains Z[π], of discriminant ${discriminant}`;
  const standing: Standing = { kind: "proved", argument: reason };
  return new EndomorphismRing({ kind: "quadratic order", discriminant, reason, standing, words: "ordinary" });
}
