// Two pairs of periods: another basis of the same lattice is named as such.
import type { Rational } from "../../../lib/number/rational.ts";
import { type Enclosed, enclosedTogether, type NumberData, overlaps } from "./number-data.ts";

/** Coefficients that are tried: bases that programs choose between differ by small ones. */
const REACH = 3;

type Row = readonly [number, number];

/**
 * How the fresh pair follows from the stored one by whole numbers, in words; undefined if it does not, or if the two
 * span different lattices.
 */
export function basisChange(stored: readonly NumberData[], fresh: readonly NumberData[]): string | undefined {
  const [a, b, c, d] = enclosedTogether([...stored, ...fresh]);
  if (stored.length !== 2 || fresh.length !== 2 || !a || !b || !c || !d) return undefined;
  const [first, second] = [rowOf(c, a, b), rowOf(d, a, b)];
  if (!first || !second || Math.abs(first[0] * second[1] - first[1] * second[0]) !== 1) return undefined;
  return `the same lattice in another basis, first = ${words(first)}, second = ${words(second)} of the stored periods`;
}

/** Small whole m and n with target = m·a + n·b, as far as the enclosures tell. */
function rowOf(target: Enclosed, a: Enclosed, b: Enclosed): Row | undefined {
  for (let m = -REACH; m <= REACH; m++) {
    for (let n = -REACH; n <= REACH; n++) if (overlaps(combined(a, m, b, n), target)) return [m, n];
  }
  return undefined;
}

function combined(a: Enclosed, m: number, b: Enclosed, n: number): Enclosed {
  const sum = (x: Rational, y: Rational, p: number, q: number) => x.times(p).plus(y.times(q));
  return {
    re: sum(a.re, b.re, m, n),
    im: sum(a.im, b.im, m, n),
    radius: sum(a.radius, b.radius, Math.abs(m), Math.abs(n)),
  };
}

function words([m, n]: Row): string {
  return `${m}·ω1 ${n < 0 ? "−" : "+"} ${Math.abs(n)}·ω2`;
}
