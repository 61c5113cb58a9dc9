// The zeros of the four sigma functions of a modulus by name: 0, K, K + iK′, iK′ modulo 2K and 2iK′.
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import type { JacobiLetter } from "./jacobi-values.ts";

/** Which of the quarter periods K and iK′ the zero of a letter has. */
const QUARTERS: Readonly<Record<JacobiLetter, readonly [number, number]>> = {
  s: [0, 0],
  c: [1, 0],
  d: [1, 1],
  n: [0, 1],
};

/**
 * The zero of σ_letter that is nearest to u in coordinates, as "2K − 3iK′"; for pictures and messages, by doubles.
 * K may be infinite, for m = 1.
 */
export function nearestZero(letter: JacobiLetter, u: Disc, K: Disc | undefined, K1: Disc | undefined): string {
  const [x, y] = disc.toDouble(u);
  const [a, b] = K ? disc.toDouble(K) : [Number.POSITIVE_INFINITY, 0];
  const [c, d] = K1 ? disc.toDouble(disc.mulI(K1)) : [0, Number.POSITIVE_INFINITY];
  const [r, s] = K && K1 ? solve(x, y, [a, b], [c, d]) : [K ? x / a : 0, K1 ? y / d : 0];
  const [p, q] = QUARTERS[letter];
  const near = (value: number, odd: number) => 2 * Math.round((value - odd) / 2) + odd;
  return pointText(near(r, p), near(s, q));
}

function solve(x: number, y: number, [a, b]: readonly number[], [c, d]: readonly number[]): [number, number] {
  const area = a! * d! - b! * c!;
  return [(x * d! - y * c!) / area, (a! * y - b! * x) / area];
}

function pointText(r: number, s: number): string {
  const times = (n: number, name: string) => `${Math.abs(n) === 1 ? "" : Math.abs(n)}${name}`;
  if (r === 0 && s === 0) return "0";
  if (r === 0) return `${s < 0 ? "−" : ""}${times(s, "iK′")}`;
  const first = `${r < 0 ? "−" : ""}${times(r, "K")}`;
  return s === 0 ? first : `${first} ${s < 0 ? "−" : "+"} ${times(s, "iK′")}`;
}
