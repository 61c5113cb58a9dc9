// Values in a line of text: long numbers cut to a few digits, long formulas left out.

import * as ball from "../number/ball.ts";
import * as disc from "../number/disc.ts";
import { isDisc } from "../number/origin.ts";
import { Rational } from "../number/rational.ts";
import { Complex, Real } from "../number/values.ts";
import { Point } from "../surface/point.ts";
import { type Decimal, plainDecimal, shortened, texDecimalLine } from "./digits.ts";
import type { NumberCell, ShortPart, Show } from "./kind.ts";
import { texWords } from "./tex.ts";

export const LINE_DIGITS = 12;
const LONGEST_TEXT = 100;
const LONGEST_TEX = 300;

export function shortText(value: unknown, show: Show, digits = LINE_DIGITS): string {
  const list = listOf(value);
  if (list) return `(${list.map((part) => shortText(part, show, digits)).join(", ")})`;
  const hidden = hiddenZero(value);
  if (hidden !== undefined) return `0 ± 1e${hidden}`;
  const number = numberOf(value, show, digits);
  if (number) return join(number, plainDecimal, " i");
  const short = show.short(value, partsWith(show, digits))?.text;
  if (short !== undefined) return short;
  const text = show.text(value).replace(/\s*\n\s*/g, " ");
  return text.length <= LONGEST_TEXT ? text : `${text.slice(0, LONGEST_TEXT)} ...`;
}

export function shortTex(value: unknown, show: Show, digits = LINE_DIGITS): string {
  const list = listOf(value);
  if (list) return `\\left( ${list.map((part) => shortTex(part, show, digits)).join(",\\; ")} \\right)`;
  const hidden = hiddenZero(value);
  if (hidden !== undefined) return `0 \\pm 10^{${hidden}}`;
  const number = numberOf(value, show, digits);
  if (number) return join(number, texDecimalLine, "\\,i");
  const short = show.short(value, partsWith(show, digits))?.tex;
  if (short !== undefined) return short;
  const tex = show.tex(value);
  return tex.length <= LONGEST_TEX ? tex : texWords("(too long for a line)");
}

function partsWith(show: Show, digits: number): ShortPart {
  return { text: (x) => shortText(x, show, digits), tex: (x) => shortTex(x, show, digits) };
}

/** The parts of a decimal number, cut to the same place; undefined for other values. */
function numberOf(value: unknown, show: Show, digits: number): NumberCell | undefined {
  const cell = show.cell(isLongFraction(value) ? Real.from(value).digits(digits) : value);
  if (cell.kind !== "number") return undefined;
  const parts = [cell.re, cell.im].filter((part) => part !== undefined).map((part) => shortened(part, digits));
  const places = Math.min(...parts.map(({ fraction }) => fraction.length));
  const cut = (decimal: Decimal | undefined): Decimal | undefined =>
    decimal && (parts.length === 2 ? toPlaces(decimal, places) : shortened(decimal, digits));
  const [re, im] = [cut(cell.re), cut(cell.im)];
  return { kind: "number", ...(re ? { re } : {}), ...(im ? { im } : {}) };
}

/** Cut so many places behind the point; what ends before stays. */
function toPlaces(decimal: Decimal, places: number): Decimal {
  if (decimal.fraction.length <= places) return decimal;
  return { ...decimal, fraction: decimal.fraction.slice(0, places), continues: true };
}

/** For a number that its enclosure cannot tell from 0: n with |x| < 10^n. */
function hiddenZero(value: unknown): number | undefined {
  if (!(value instanceof Real || value instanceof Complex) || value.exact) return undefined;
  const { enclosure } = value;
  if (!(isDisc(enclosure) ? disc.containsZero(enclosure) : ball.containsZero(enclosure))) return undefined;
  const size = isDisc(enclosure) ? disc.magnitude(enclosure) : ball.magnitude(enclosure);
  return value.standing === "measured" || !Number.isFinite(size) ? undefined : Math.ceil(size * 0.30103);
}

/** An exact fraction that would fill the line: its first digits say more. */
function isLongFraction(value: unknown): value is Rational | Real {
  const exact = value instanceof Real ? value.exact : value;
  return exact instanceof Rational && exact.den !== 1n && String(exact).length > 20;
}

function join({ re, im }: NumberCell, write: (decimal: Decimal) => string, unit: string): string {
  if (!im) return re ? write(re) : "0";
  if (!re) return `${write(im)}${unit}`;
  return `${write(re)} ${im.negative ? "-" : "+"} ${write({ ...im, negative: false })}${unit}`;
}

/** The parts of a short list, and the coordinates of a point. */
function listOf(value: unknown): readonly unknown[] | undefined {
  const list: unknown = value instanceof Point ? value.coordinates : value;
  return Array.isArray(list) && list.length <= 8 ? list : undefined;
}
