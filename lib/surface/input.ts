// Exact numbers as they come into curves and equations.

import type { Field } from "../algebra/field.ts";
import { rationals } from "../algebra/rationals.ts";
import type { Slots } from "../curve/equation/read.ts";
import { Quadratic } from "../number/quadratic.ts";
import { Rational } from "../number/rational.ts";
import { Complex, Real } from "../number/values.ts";
import { DomainError } from "../proof/errors.ts";
import { type Coordinate, carry, fieldOf, joinFields } from "./fields.ts";

/** What is read exactly: a bigint, a safe integer, a decimal or fraction string, a rational. */
export type ExactInput = Rational | bigint | number | string;

/** The rational number that was meant. A `number` that is not a safe integer is refused, since its digits are a double's. */
export function toRational(subject: string, argument: string, value: ExactInput): Rational {
  if (value instanceof Rational) return value;
  if (typeof value === "bigint" || Number.isSafeInteger(value)) return Rational.of(value as bigint | number);
  if (typeof value === "string") return Rational.parse(value);
  throw new DomainError({
    subject,
    given: `${argument} = ${String(value)}`,
    expected: "an exact number",
    hint: 'Write it as a fraction or a decimal string, such as "1/3" or "0.1".',
    argument,
  });
}

/** A number or an element of the field as an element of the field. */
export function elementOf<T>(F: Field<T>, subject: string, argument: string, value: ExactInput | T): T {
  const exact = value instanceof Rational || !["object", "function"].includes(typeof value);
  if (!exact) return inField(F, subject, argument, value as T);
  const q = toRational(subject, argument, value as ExactInput);
  return F.mul(F.fromInt(q.num), F.inv(F.fromInt(q.den)));
}

/** An element as it is, if it is of the field's kind: a number of another field is refused with the way to it. */
function inField<T>(F: Field<T>, subject: string, argument: string, value: T): T {
  const isNumber = value instanceof Quadratic || value instanceof Real || value instanceof Complex;
  if (!isNumber || joinFields(F, fieldOf(value as Coordinate) as unknown as Field<T>)?.name === F.name) {
    return isNumber ? carry(value, F) : value;
  }
  const own = fieldOf(value as Coordinate).name;
  throw new DomainError({
    subject,
    given: `${argument} = ${value}, a number of ${own}, on a curve over ${F.name}`,
    expected: `a number of ${F.name}`,
    hint: F.characteristic === 0n ? "Take the curve to a larger field first: E.over(...)." : "",
    argument,
  });
}

/** What a template or a list of coefficients takes: exact numbers, and real or complex values that put the curve over R or C. */
export type NumberInput = ExactInput | Quadratic | Real | Complex;

/** The field that inserted numbers lead to: Q for exact input, Q(√d) for quadratic numbers, R or C for enclosures. */
export type FieldOfInput<S> =
  Extract<S, Complex> extends never
    ? Extract<S, Real> extends never
      ? Extract<S, Quadratic> extends never
        ? Rational
        : Quadratic
      : Real
    : Complex;

/** The smallest field that holds all the numbers, and the numbers in it. A Real stays over R, also where it is exact. */
export function inOneField(subject: string, values: readonly NumberInput[]) {
  const read = values.map((value, k) =>
    isFieldNumber(value) ? value : toRational(subject, `slot ${k + 1}`, value as ExactInput),
  );
  requireOneQuadraticField(subject, read);
  let field = rationals as unknown as Field<Coordinate>;
  for (const value of read) field = joinFields(field, fieldOf(value))!;
  return { field, values: read.map((value) => carry(value, field)) };
}

/** Numbers of two quadratic fields have no common one among ours but R and C, where they would stop being exact. */
function requireOneQuadraticField(subject: string, values: readonly unknown[]): void {
  const irrational = values.filter((value): value is Quadratic => value instanceof Quadratic && !value.isRational());
  const [first] = irrational;
  const other = irrational.find(({ d }) => d !== first!.d);
  if (!first || !other) return;
  throw new DomainError({
    subject,
    given: `${first} of Q(√${first.d}) and ${other} of Q(√${other.d})`,
    expected: "numbers of one quadratic field",
    hint: "Write real(x) or complex(x) around them for a curve over R or C, with enclosures.",
  });
}

function isFieldNumber(value: NumberInput): value is Quadratic | Real | Complex {
  return value instanceof Quadratic || value instanceof Real || value instanceof Complex;
}

/** The slots of an equation template, in the smallest field that holds them all. */
export function readSlots(subject: string, slots: readonly NumberInput[]): Slots<Coordinate> {
  const { field, values } = inOneField(subject, slots);
  return {
    printed: values.map((value) => field.format(value)),
    reading: {
      field,
      number: (text) => carry(Rational.parse(text), field),
      slot: (index) => values[index]!,
      exponent: (index) => exponent(slots[index]!),
      root: field.sqrt,
    },
  };
}

/** The slots of a template that stays over Q. */
export function rationalSlots(subject: string, slots: readonly ExactInput[]): Slots<Rational> {
  const exact = slots.map((slot, k) => toRational(subject, `slot ${k + 1}`, slot));
  return readSlots(subject, exact) as unknown as Slots<Rational>;
}

function exponent(slot: NumberInput): number | undefined {
  if (isFieldNumber(slot)) return undefined;
  const value = toRational("curve", "exponent", slot);
  return value.isInteger() && value.sign() >= 0 && value.compare(60) <= 0 ? Number(value.num) : undefined;
}
