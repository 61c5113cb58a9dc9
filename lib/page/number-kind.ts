// Real and complex numbers: exact ones as fractions and roots, others as decimals with dots or with a radius.

import { provedDigits } from "../number/context.ts";
import { valueData } from "../number/json.ts";
import { type DecimalParts, plainParts } from "../number/print.ts";
import { Quadratic } from "../number/quadratic.ts";
import { Rational } from "../number/rational.ts";
import { complexDecimal, decimal } from "../number/text.ts";
import { Complex, type Real } from "../number/values.ts";
import type { ConventionKey } from "../proof/conventions.ts";
import { type Decimal, parseDecimal, texDecimal, texDecimalLine } from "./digits.ts";
import { noteDouble } from "./doubles.ts";
import type { Cell, Kind, Show } from "./kind.ts";
import { numberConventions } from "./number-conventions.ts";
import { array } from "./tex.ts";

type Number = Real | Complex;

export const realKind: Kind<Real> = {
  text: (x) => (root(x) ? `${root(x)} = ${x}` : textOf(x)),
  tex: (x, show) => {
    const digits = () => texDecimal(realDecimal(x));
    const exact = root(x);
    return exactTex(x, show) ?? (exact ? `${show.tex(exact)} = ${digits()}` : digits());
  },
  cell: (x, show) => exactCell(x, show) ?? { kind: "number", re: realDecimal(x) },
  conventions,
  data: (x) => ({ ...valueData(x) }),
};

export const complexKind: Kind<Complex> = {
  text: textOf,
  tex: (z, show) => exactTex(z, show) ?? complexTex(z),
  cell: (z, show) => exactCell(z, show) ?? complexCell(z),
  conventions,
  data: (z) => ({ ...valueData(z) }),
};

function textOf(x: Number): string {
  noteDouble(x);
  return String(x);
}

function digitsOf(x: Number): number {
  return x.asked ?? provedDigits();
}

/** Exact values whose digits were not asked for are shown exactly; a real root is asked for its digits. */
function exactTex(x: Number, show: Show): string | undefined {
  return isShownExactly(x) ? show.tex(x.exact) : undefined;
}

function exactCell(x: Number, show: Show): Cell | undefined {
  return isShownExactly(x) ? show.cell(x.exact) : undefined;
}

function isShownExactly(x: Number): boolean {
  return x.asked === undefined && (x.exact instanceof Rational || (x.exact !== undefined && x instanceof Complex));
}

/** An exact root that is real, such as √30/10: shown with the digits that were asked for. */
function root(x: Real): Quadratic | undefined {
  return x.exact instanceof Quadratic && String(x.exact).length <= 60 ? x.exact : undefined;
}

/** A real number as its text has it, also where that is the text of a measured input; else from its digits. */
function realDecimal(x: Real): Decimal {
  noteDouble(x);
  return parseDecimal(String(x)) ?? read(decimal(x, digitsOf(x)));
}

/** The parts of a printed number as a page sets them: text is where they are put together, so it is read back. */
function read(parts: DecimalParts): Decimal {
  const decimal = parseDecimal(plainParts(parts));
  if (!decimal) throw new TypeError(`a number that prints as ${plainParts(parts)}`);
  return decimal;
}

function complexCell(z: Complex): Cell {
  noteDouble(z);
  const { re, im, axis, radius } = complexDecimal(z, digitsOf(z));
  if (radius) return { kind: "formula", text: String(z), tex: complexTex(z) };
  return {
    kind: "number",
    ...(axis === "imaginary" ? {} : { re: read(re) }),
    ...(axis === "real" ? {} : { im: read(im) }),
  };
}

/** Digits of both parts on one line, or each part on its own where a line would be too long. */
function complexTex(z: Complex): string {
  const { re, im, axis, radius } = complexDecimal(z, digitsOf(z));
  if (axis === "real") return texDecimal(read(re));
  const bracketed = im.radius
    ? `\\left(${texDecimal(read({ ...im, sign: "" }))}\\right)`
    : texDecimal(read({ ...im, sign: "" }));
  if (axis === "imaginary") return `${im.sign}${bracketed === "1" ? "i" : `${bracketed}\\,i`}`;
  const sign = im.sign === "-" ? "-" : "+";
  const long = re.digits.length + im.digits.length > LONGEST_LINE;
  const sum = long
    ? array("l", [[texDecimal(read(re))], [`{}${sign} ${bracketed}\\,i`]])
    : `${texDecimal(read(re))} ${sign} ${bracketed}\\,i`;
  return radius ? `\\left(${sum}\\right) \\pm ${texDecimalLine(read({ sign: "", ...radius, ellipsis: false }))}` : sum;
}

/** Digits that fit on a line of a page. */
const LONGEST_LINE = 56;

function conventions(x: Number): readonly ConventionKey[] {
  return numberConventions(x);
}
