// Numbers of the library as doubles, for drawing.

import * as ball from "../number/ball.ts";
import * as disc from "../number/disc.ts";
import { asDisc, isDisc, isNode } from "../number/origin.ts";
import { Quadratic } from "../number/quadratic.ts";
import { Rational } from "../number/rational.ts";
import type { ComplexNumeric, Numeric } from "../number/values.ts";
import { DomainError } from "../proof/errors.ts";
import type { Window } from "./frame.ts";

/** A real number that can be drawn. */
export type RealInput = Numeric | Quadratic;
export type ComplexInput = ComplexNumeric;

/** Throws DomainError for what is no real number, or too large for a drawing. */
export function realDouble(subject: string, value: unknown): number {
  const [re, im] = complexDouble(subject, value);
  if (im !== 0) throw refusal(subject, value, "a real number");
  return re;
}

export function complexDouble(subject: string, value: unknown): [number, number] {
  const [re, im] = rawDouble(subject, value);
  if (!Number.isFinite(re) || !Number.isFinite(im))
    throw refusal(subject, value, "a number within the range of a drawing");
  return [re, im];
}

/** The ends of a window, each lower end first. */
export function realWindow(
  subject: string,
  window: { readonly x: readonly [RealInput, RealInput]; readonly y: readonly [RealInput, RealInput] },
): Window {
  const side = ([low, high]: readonly [RealInput, RealInput]): [number, number] => {
    const [a, b] = [realDouble(subject, low), realDouble(subject, high)];
    if (!(a < b)) throw new RangeError(`${subject}: window from ${a} to ${b}; expected the lower end first`);
    return [a, b];
  };
  return { x: side(window.x), y: side(window.y) };
}

function rawDouble(subject: string, value: unknown): readonly [number, number] {
  if (typeof value === "number") return [value, 0];
  if (typeof value === "bigint") return [Number(value), 0];
  if (typeof value === "string") return rawDouble(subject, Rational.parse(value));
  if (value instanceof Rational) return [ball.toDouble(ball.fromRational(value, 64)), 0];
  const enclosure = value instanceof Quadratic ? value.enclosure(64) : isNode(value) ? value.enclosure : undefined;
  if (!enclosure) throw refusal(subject, value, "a number");
  return isDisc(enclosure) ? disc.toDouble(asDisc(enclosure)) : [ball.toDouble(enclosure), 0];
}

function refusal(subject: string, value: unknown, expected: string): DomainError {
  return new DomainError({ subject, given: String(value).slice(0, 60), expected });
}
