// Values in a line of text: long numbers cut to a dozen digits, long formulas left out.

import { Rational } from "../number/rational.ts";
import { Real } from "../number/values.ts";
import { type Decimal, plainDecimal, shortened, texDecimalLine } from "./digits.ts";
import type { Cell, Show } from "./kind.ts";
import { texWords } from "./tex.ts";

const DIGITS = 12;
const LONGEST_TEXT = 100;
const LONGEST_TEX = 300;

export function shortText(value: unknown, show: Show): string {
  if (isList(value)) return `(${value.map((part) => shortText(part, show)).join(", ")})`;
  const number = numberOf(value, show);
  if (number) return join(number, plainDecimal, " i");
  const text = show.text(value).replace(/\s*\n\s*/g, " ");
  return text.length <= LONGEST_TEXT ? text : `${text.slice(0, LONGEST_TEXT)} ...`;
}

export function shortTex(value: unknown, show: Show): string {
  if (isList(value)) return `\\left( ${value.map((part) => shortTex(part, show)).join(",\\; ")} \\right)`;
  const number = numberOf(value, show);
  if (number) return join(number, texDecimalLine, "\\,i");
  const tex = show.tex(value);
  return tex.length <= LONGEST_TEX ? tex : texWords("(too long for a line)");
}

type NumberCell = Cell & { readonly kind: "number" };

/** The parts of a decimal number, cut; undefined for other values and for long integers, which stay as they are. */
function numberOf(value: unknown, show: Show): NumberCell | undefined {
  const cell = show.cell(isLongFraction(value) ? Real.from(value).digits(DIGITS) : value);
  if (cell.kind !== "number") return undefined;
  const cut = (decimal: Decimal | undefined): Decimal | undefined => decimal && shortened(decimal, DIGITS);
  const [re, im] = [cut(cell.re), cut(cell.im)];
  return { kind: "number", ...(re ? { re } : {}), ...(im ? { im } : {}) };
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

function isList(value: unknown): value is readonly unknown[] {
  return Array.isArray(value) && value.length <= 8;
}
