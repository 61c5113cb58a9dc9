// Enclosures in the words of an error: a few digits, enough to see what is wrong.
import { PoleError } from "../../proof/errors.ts";
import { type Ball, containsZero, magnitude, toDouble } from "./data.ts";

/** "0 ± 0.001", or "0 ± 2^-99999" and "about −2^-99999" for what no double is. */
export function shown(x: Ball): string {
  const middle = toDouble(x);
  if (!Number.isFinite(middle) || (middle === 0 && x.man !== 0n)) {
    if (containsZero(x)) return `0 ± 2^${magnitude(x)}`;
    return `about ${x.man < 0n ? "−" : ""}2^${magnitude(x)}`;
  }
  const radius = radiusOf(x);
  return radius === 0 ? short(middle) : `${short(middle)} ± ${short(radius)}`;
}

/** "2 + 0 i ± 0.001" */
export function shownPair(re: Ball, im: Ball): string {
  const [a, b] = [toDouble(re), toDouble(im)];
  const sign = b < 0 ? "−" : "+";
  const radius = Math.max(radiusOf(re), radiusOf(im));
  return `${short(a)} ${sign} ${short(Math.abs(b))} i${radius === 0 ? "" : ` ± ${short(radius)}`}`;
}

function radiusOf(x: Ball): number {
  return toDouble({ man: BigInt(Math.ceil(x.rad * 2 ** 20)), exp: x.exp - 20, rad: 0 });
}

function short(x: number): string {
  return `${Number(x.toPrecision(6))}`;
}

/** The refusal of a quotient; `divisor` is shown. */
export function divisorZero(divisor: string, exact: boolean, words = "which holds 0"): PoleError {
  return new PoleError({
    subject: "div",
    given: exact ? "the divisor 0" : `the divisor ${divisor}, ${words}`,
    expected: "a divisor away from 0",
    hint: exact ? "" : "A sharper divisor may do.",
    argument: "divisor",
  });
}
