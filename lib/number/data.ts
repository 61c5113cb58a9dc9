// Values as data: every number a string, radius rounded up, so that a stored value can be compared with a new one.
import type { Ball } from "./ball.ts";
import * as ball from "./ball.ts";
import { bitsOf, provedDigits } from "./context.ts";
import * as disc from "./disc.ts";
import { type Exact, isDisc, type Node, type NumberStanding, refinable, refineEnclosure } from "./origin.ts";
import { beyond, decimalBounds } from "./print.ts";
import { Quadratic } from "./quadratic.ts";
import { Rational } from "./rational.ts";

export type ValueData =
  | { readonly kind: "rational"; readonly value: string }
  | { readonly kind: "quadratic"; readonly a: string; readonly b: string; readonly d: string }
  | { readonly kind: "real"; readonly standing: NumberStanding; readonly middle: string; readonly radius: string }
  | {
      readonly kind: "complex";
      readonly standing: NumberStanding;
      readonly re: string;
      readonly im: string;
      readonly radius: string;
      readonly axis: disc.Axis;
    };

/** The JSON form of a number. A defined value is given to the digits of the display; the decimal middle's own error is in the radius. */
export function valueData(x: Rational | Quadratic | (Node & { readonly asked?: number | undefined })): ValueData {
  if (x instanceof Rational || x instanceof Quadratic) return exactData(x);
  if (x.exact) return exactData(x.exact);
  const digits = x.asked ?? provedDigits();
  const e = sharp(x, digits);
  const { standing } = x;
  if (!isDisc(e)) {
    const part = scientific(e);
    return { kind: "real", standing, middle: part.middle, radius: radiusText(part) };
  }
  const re = scientific(disc.real(e));
  const im = scientific(disc.imag(e));
  return { kind: "complex", standing, re: re.middle, im: im.middle, radius: cornerOf(re, im, e.axis), axis: e.axis };
}

function sharp(x: Node, digits: number): Ball | disc.Disc {
  if (!refinable(x)) return x.enclosure;
  try {
    return refineEnclosure(x, bitsOf(digits) + 8);
  } catch {
    return x.enclosure;
  }
}

function exactData(x: Exact): ValueData {
  return x.toJSON();
}

interface Scientific {
  readonly middle: string;
  /** In units of 10^place. */
  readonly radius: bigint;
  readonly place: number;
}

/** With four digits of radius. */
function scientific(x: Ball): Scientific {
  if (ball.isZero(x) || (x.rad === 0 && !beyond(x))) return exactDecimal(x);
  const { middle, radius, place } = decimalBounds(x, 4);
  return { middle: `${middle}e${place}`, radius, place };
}

function exactDecimal(x: Ball): Scientific {
  // A dyadic number ends in decimals after -exp places.
  const middle =
    x.man === 0n ? "0" : x.exp >= 0 ? `${x.man << BigInt(x.exp)}` : `${x.man * 5n ** BigInt(-x.exp)}e${x.exp}`;
  return { middle, radius: 0n, place: 0 };
}

function radiusText({ radius, place }: Scientific): string {
  return radius === 0n ? "0" : `${radius}e${place}`;
}

/** A radius that holds the disc around the two decimal middles: the one of the shadows plus what the other middle is off. */
function cornerOf(re: Scientific, im: Scientific, axis: disc.Axis): string {
  if (axis === "real") return radiusText(re);
  if (axis === "imaginary") return radiusText(im);
  // The shadows' radii are the disc's plus at most one unit of the place each: the corner is under larger·1.02 + two units; 5/4 covers it.
  const larger = im.radius === 0n || (re.radius > 0n && size(re) >= size(im)) ? re : im;
  return radiusText({ ...larger, radius: (larger.radius * 5n + 3n) / 4n });
}

/** A measure that grows with the radius: the sum of place and digits, then the radius itself among equal places. */
function size({ radius, place }: Scientific): number {
  const digits = `${radius}`;
  return place + digits.length + Number(`0.${digits}`);
}
