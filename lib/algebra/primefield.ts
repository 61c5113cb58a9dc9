// The prime fields F_p, with residues as values.

import { primitive } from "../number/rational.ts";
import { PoleError } from "../proof/errors.ts";
import type { Field } from "./field.ts";
import { modularInverse, modularPower, modulo } from "./integer.ts";

/** A residue class modulo a prime, by its representative in [0, p). Immutable. */
export class Residue {
  readonly value: bigint;
  readonly modulus: bigint;

  constructor(value: bigint, modulus: bigint) {
    this.value = modulo(value, modulus);
    this.modulus = modulus;
  }

  plus(other: Residue): Residue {
    return new Residue(this.value + other.value, this.modulus);
  }

  minus(other: Residue): Residue {
    return new Residue(this.value - other.value, this.modulus);
  }

  times(other: Residue): Residue {
    return new Residue(this.value * other.value, this.modulus);
  }

  neg(): Residue {
    return new Residue(-this.value, this.modulus);
  }

  /** Throws PoleError for 0. */
  inv(): Residue {
    const inverse = modularInverse(this.value, this.modulus);
    if (inverse !== undefined) return new Residue(inverse, this.modulus);
    throw new PoleError({ subject: "div", given: "the divisor 0", expected: "a residue that is not 0" });
  }

  /** Throws PoleError for 0. */
  div(other: Residue): Residue {
    return this.times(other.inv());
  }

  equals(other: Residue): boolean {
    return this.value === other.value && this.modulus === other.modulus;
  }

  /** The representative in [0, p). */
  toString(): string {
    return this.value.toString();
  }

  toJSON(): { readonly kind: "residue"; readonly value: string; readonly modulus: string } {
    return { kind: "residue", value: `${this.value}`, modulus: `${this.modulus}` };
  }

  [Symbol.toPrimitive](hint: string): string {
    return primitive(hint, this, "residue");
  }
}

/** F_p for a prime p. The square root returned is the one at most p/2. */
export function primeField(p: bigint): Field<Residue> {
  const of = (n: bigint) => new Residue(n, p);
  return {
    name: `F_${p}`,
    characteristic: p,
    zero: of(0n),
    one: of(1n),
    fromInt: of,
    add: (a, b) => a.plus(b),
    sub: (a, b) => a.minus(b),
    mul: (a, b) => a.times(b),
    neg: (a) => a.neg(),
    inv: (a) => a.inv(),
    isZero: (a) => a.value === 0n,
    sqrt: (a) => {
      const root = modularSqrt(a.value, p);
      return root === undefined ? undefined : of(root);
    },
    format: (a) => a.toString(),
  };
}

/** Whether a is a nonzero square modulo an odd prime p, by Euler's criterion: 1, −1, or 0 for a = 0. */
export function quadraticCharacter(a: bigint, p: bigint): -1 | 0 | 1 {
  const value = modularPower(a, (p - 1n) / 2n, p);
  return value === 0n ? 0 : value === 1n ? 1 : -1;
}

/** The root of a modulo the prime p that is at most p/2, if there is one. Source: Tonelli and Shanks (Cohen 1.5.1). */
export function modularSqrt(a: bigint, p: bigint): bigint | undefined {
  const value = modulo(a, p);
  if (p === 2n || value === 0n) return value;
  if (quadraticCharacter(value, p) !== 1) return undefined;
  const root = p % 4n === 3n ? modularPower(value, (p + 1n) / 4n, p) : tonelli(value, p);
  return 2n * root > p ? p - root : root;
}

function tonelli(a: bigint, p: bigint): bigint {
  let odd = p - 1n;
  let twos = 0;
  for (; (odd & 1n) === 0n; odd >>= 1n) twos++;
  let nonresidue = 2n;
  while (quadraticCharacter(nonresidue, p) !== -1) nonresidue++;
  let generator = modularPower(nonresidue, odd, p);
  let root = modularPower(a, (odd + 1n) / 2n, p);
  let defect = modularPower(a, odd, p);
  let order = twos;
  while (defect !== 1n) {
    let least = 0;
    for (let square = defect; square !== 1n; square = (square * square) % p) least++;
    const factor = modularPower(generator, 1n << BigInt(order - least - 1), p);
    generator = (factor * factor) % p;
    root = (root * factor) % p;
    defect = (defect * generator) % p;
    order = least;
  }
  return root;
}
