// Exact numbers as they come into curves and equations.

import type { Field } from "../algebra/field.ts";
import { rationals as Q } from "../algebra/rationals.ts";
import type { Slots } from "../curve/equation/read.ts";
import { Rational } from "../number/rational.ts";
import { DomainError } from "../proof/errors.ts";

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
  if (!exact) return value as T;
  const q = toRational(subject, argument, value as ExactInput);
  return F.mul(F.fromInt(q.num), F.inv(F.fromInt(q.den)));
}

/** The slots of an equation template, read as rational numbers. */
export function rationalSlots(subject: string, slots: readonly ExactInput[]): Slots<Rational> {
  const values = slots.map((slot, k) => toRational(subject, `slot ${k + 1}`, slot));
  return {
    printed: values.map(String),
    reading: {
      field: Q,
      number: (text) => Rational.parse(text),
      slot: (index) => values[index]!,
      exponent: (index) => exponent(values[index]!),
      root: Q.sqrt,
    },
  };
}

function exponent(value: Rational): number | undefined {
  return value.isInteger() && value.sign() >= 0 && value.compare(60) <= 0 ? Number(value.num) : undefined;
}
