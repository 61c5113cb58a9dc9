// Reading of the reference values beside these tests, and the one way they are compared.
import { readFileSync } from "node:fs";
import { expect } from "vitest";
import * as ball from "../../../lib/number/ball.ts";
import type { Disc } from "../../../lib/number/disc.ts";
import * as disc from "../../../lib/number/disc.ts";
import { Rational } from "../../../lib/number/rational.ts";

export type Text = string | { readonly re: string; readonly im: string };

export interface Entry {
  readonly id: string;
  readonly quantity: string;
  // The shape of input and expected value belongs to the quantity, and each test reads its own.
  // biome-ignore lint/suspicious/noExplicitAny: data of many shapes
  readonly input: any;
  // biome-ignore lint/suspicious/noExplicitAny: data of many shapes
  readonly expected: any;
  readonly digits: number;
}

export function entries(file: "integrals" | "modular", quantity: string): Entry[] {
  const text = readFileSync(new URL(`./fixtures/${file}.json`, import.meta.url), "utf8");
  const found = (JSON.parse(text).entries as Entry[]).filter((entry) => entry.quantity === quantity);
  if (found.length === 0) throw new Error(`no entries for ${quantity}`);
  return found;
}

/** A decimal, or a pair of them, as a disc of at least prec bits. */
export function read(text: Text, prec: number): Disc {
  if (typeof text === "string") return disc.fromRational(Rational.parse(text), prec);
  return disc.fromRational(Rational.parse(text.re), prec, Rational.parse(text.im));
}

/**
 * The enclosure meets the printed value within one unit of its last digit, and is itself narrower than that; digits count from the
 * larger part of the value, as the tables do.
 */
export function expectDigits(value: Disc, expected: Text, digits: number): void {
  const printed = read(expected, 4 * digits + 64);
  const size = disc.isZero(printed) ? 0 : Math.floor(disc.magnitude(printed) * Math.LOG10E * Math.LN2);
  const unit = ball.fromRational(Rational.parse(`1e${size + 1 - digits}`), 64);
  const difference = disc.sub(value, printed, 4 * digits);
  const radius: ball.Ball = { man: BigInt(Math.ceil(value.rad)), exp: value.exp, rad: 0 };
  expect(ball.compare(radius, unit), `radius of ${show(value)}`).toBe(-1);
  const distance = ball.lower(disc.abs(difference, 64));
  expect(ball.compare(distance, unit), `${show(value)} against ${JSON.stringify(expected)}`).not.toBe(1);
}

function show(value: Disc): string {
  const [re, im] = disc.toDouble(value);
  return `${re} + ${im}i ± ${value.rad}·2^${value.exp}`;
}

/** x and 1 − x of a decimal or a pair of them, both at prec bits from the exact numbers. */
export function readWithComplement(text: Text, prec: number): { readonly x: Disc; readonly x1: Disc } {
  const re = Rational.parse(typeof text === "string" ? text : text.re);
  const im = typeof text === "string" ? Rational.zero : Rational.parse(text.im);
  return {
    x: disc.fromRational(re, prec, im),
    x1: disc.fromRational(Rational.one.minus(re), prec, im.neg()),
  };
}
