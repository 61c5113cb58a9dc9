// Plain text of values: exact, with digits that go on, or with a radius.

import * as ball from "./ball.ts";
import { bitsOf } from "./context.ts";
import type { Disc } from "./disc.ts";
import * as disc from "./disc.ts";
import {
  asBall,
  asDisc,
  displayLimit,
  type Enclosure,
  evaluate,
  mayPass,
  type Node,
  refinable,
  vanishes,
} from "./origin.ts";
import {
  aroundZero,
  atPlaces,
  type DecimalParts,
  plainParts,
  rationalParts,
  significant,
  withRadius,
} from "./print.ts";
import { Quadratic } from "./quadratic.ts";
import { Rational } from "./rational.ts";

/** How a real value is shown: an exact fraction, or a decimal. */
export type RealShown =
  | { readonly kind: "exact"; readonly value: Rational | Quadratic }
  | { readonly kind: "decimal"; readonly parts: DecimalParts };

/** Whether a value is shown by its radius: measured and double ones. */
function byRadius(x: Node): boolean {
  return x.standing === "measured" || x.standing === "double";
}

/**
 * The decimal of a real value with so many significant digits, found by rising precision; a value that cannot be told from 0,
 * and a measured one, comes with its radius.
 */
export function decimal(x: Node, digits: number): DecimalParts {
  if (x.exact instanceof Rational) return rationalParts(x.exact, digits);
  if (byRadius(x)) return withRadius(asBall(x.enclosure));
  if (isZero(x)) return NOTHING;
  const { shown, best } = risen(x, digits, (e) => significant(asBall(e), digits));
  if (shown) return shown;
  const last = asBall(best);
  return ball.containsZero(last) ? aroundZero(last) : withRadius(last);
}

const NOTHING: DecimalParts = { sign: "", digits: "0", exponent: 0, ellipsis: false };

/** Whether a value that may be 0 is known to be. */
function isZero(x: Node): boolean {
  return disc.containsZero(asDisc(x.enclosure)) && vanishes(x, undefined) === true;
}

interface Risen<T> {
  readonly shown: T | undefined;
  /** The sharpest enclosure met. */
  readonly best: Enclosure;
}

/** What `show` makes of the value at the first precision where it can, and the last enclosure that was computed on the way. */
function risen<T>(x: Node, digits: number, show: (e: Enclosure) => T | undefined): Risen<T> {
  const first = show(x.enclosure);
  if (first !== undefined || !refinable(x)) return { shown: first, best: x.enclosure };
  let best = x.enclosure;
  for (const bits of rungs(digits)) {
    const e = attempt(x, bits);
    if (e === undefined) continue;
    best = e;
    const shown = show(e);
    if (shown !== undefined) return { shown, best };
  }
  return { shown: undefined, best };
}

function attempt(x: Node, bits: number): Enclosure | undefined {
  try {
    return evaluate(x, bits);
  } catch (error) {
    if (!mayPass(error)) throw error;
    return undefined;
  }
}

function rungs(digits: number): number[] {
  const list: number[] = [];
  const limit = displayLimit(digits);
  for (let bits = bitsOf(digits) + 32; bits < limit; bits *= 2) list.push(bits);
  list.push(limit);
  return list;
}

/** Text of a real value, which `real` reads back. `asked` digits of an exact fraction only if they were asked of it. */
export function realText(x: Node & { readonly asked?: number | undefined }, digits: number): string {
  if (x.exact instanceof Rational && x.asked === undefined) return x.exact.toString();
  if (x.source?.includes("±")) return x.source;
  return plainParts(decimal(x, digits));
}

/** Real and imaginary part of a complex value, to the same decimal place, and the radius if it is shown by one. */
export interface ComplexParts {
  readonly re: DecimalParts;
  readonly im: DecimalParts;
  /** A part that is exactly 0 is left out of the text. */
  readonly axis: "real" | "imaginary" | "plane";
  readonly radius?: NonNullable<DecimalParts["radius"]>;
}

/** The decimals of a complex value: `digits` significant digits of |z|, both parts to the same place. */
export function complexDecimal(x: Node, digits: number): ComplexParts {
  if (byRadius(x)) return measuredParts(asDisc(x.enclosure));
  if (isZero(x)) return { re: NOTHING, im: NOTHING, axis: "real" };
  const { shown, best } = risen(x, digits, (e) => complexParts(asDisc(e), digits));
  return shown ?? measuredParts(asDisc(best));
}

function complexParts(d: Disc, digits: number): ComplexParts | undefined {
  if (d.axis !== "plane") {
    const one = significant(disc.along(d), digits);
    if (!one) return undefined;
    return d.axis === "real" ? { re: one, im: NOTHING, axis: "real" } : { re: NOTHING, im: one, axis: "imaginary" };
  }
  const size = significant(disc.abs(d, 64), 3);
  if (!size) return undefined;
  const places = digits - 1 - size.exponent;
  const re = atPlaces(disc.real(d), places);
  const im = atPlaces(disc.imag(d), places);
  return re && im ? { re, im, axis: "plane" } : undefined;
}

function measuredParts(d: Disc): ComplexParts {
  const re = withRadius(disc.real(d));
  const im = withRadius(disc.imag(d));
  if (d.axis !== "plane") return { re, im, axis: d.axis };
  // Each shadow is shown with the full radius; a disc around the shown centre has to reach over the corner of the two cuts: one more unit of each.
  const { radius } = withRadius(
    ball.add(
      { man: 0n, exp: d.exp, rad: Math.max(d.rad, 1) },
      ball.ldexp({ man: 0n, exp: d.exp, rad: Math.max(d.rad, 1) }, -3),
      64,
    ),
  );
  const bare = (p: DecimalParts): DecimalParts => ({
    sign: p.sign,
    digits: p.digits,
    exponent: p.exponent,
    ellipsis: false,
  });
  return radius && d.rad > 0 ? { re: bare(re), im: bare(im), axis: "plane", radius } : { re, im, axis: "plane" };
}

/** Text of a complex value, which `complex` reads back. */
export function complexText(x: Node & { readonly asked?: number | undefined }, digits: number): string {
  if (x.exact && x.asked === undefined && (x.exact instanceof Rational || x.exact instanceof Quadratic))
    return x.exact.toString();
  if (x.source?.includes("±")) return x.source;
  const { re, im, axis, radius } = complexDecimal(x, digits);
  if (axis === "real") return plainParts(re);
  const turned = `${plainParts({ ...im, sign: "" })} i`;
  if (axis === "imaginary")
    return im.radius
      ? `(${im.sign}${plainParts({ ...im, sign: "", radius: { digits: "0", exponent: 0 } }).split(" ±")[0]} i) ± ${plainParts(im).split("± ")[1]}`
      : im.sign + turned;
  const sum = `${plainParts(re)} ${im.sign === "-" ? "-" : "+"} ${turned}`;
  return radius ? `(${sum}) ± ${plainParts({ sign: "", ...radius, ellipsis: false })}` : sum;
}
