// The fields that a curve as written is taken to: larger ones, and residue fields.

import { complexes, reals } from "../algebra/enclosures.ts";
import { isPrime } from "../algebra/factor.ts";
import type { Field } from "../algebra/field.ts";
import { primeField, type Residue } from "../algebra/primefield.ts";
import { quadraticField } from "../algebra/quadraticfield.ts";
import type { Quadratic } from "../number/quadratic.ts";
import { Rational } from "../number/rational.ts";
import type { Complex, Real } from "../number/values.ts";
import { DomainError } from "../proof/errors.ts";

/** "R", "C", or a number of the quadratic field. */
export type FieldInput = "R" | "C" | Quadratic;

/** The numbers of that field. */
export type InField<K extends FieldInput> = K extends "R" ? Real : K extends "C" ? Complex : Quadratic;

export function largerField<K extends FieldInput>(field: K): Field<InField<K>> {
  const F = field === "R" ? reals : field === "C" ? complexes : quadraticField((field as Quadratic).d);
  return F as unknown as Field<InField<K>>;
}

/** F_p for a prime above 3: the formulas of maps divide by 2 and 3. */
export function primeFieldOf(p: bigint, curve: unknown): Field<Residue> {
  if (p > 3n && isPrime(p)) return primeField(p);
  throw new DomainError({
    subject: "mod",
    given: `${p} for ${curve}`,
    expected: "a prime above 3",
    hint: "Invariants and maps of curves as written divide by 2 and 3.",
    argument: "p",
  });
}

/** A rational coefficient modulo p. Throws DomainError for another field, and where p divides a denominator. */
export function reducedTo(F: Field<Residue>, c: unknown, curve: unknown): Residue {
  if (c instanceof Rational && c.den % F.characteristic !== 0n) {
    return F.mul(F.fromInt(c.num), F.inv(F.fromInt(c.den)));
  }
  throw new DomainError({
    subject: "mod",
    given: c instanceof Rational ? `the coefficient ${c} of ${curve}` : `${curve}`,
    expected:
      c instanceof Rational ? `coefficients whose denominators ${F.characteristic} does not divide` : "a curve over Q",
    argument: "p",
  });
}
