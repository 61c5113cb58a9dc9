// Zeros of a function whose poles are known: the norm of its numerator, with the factors taken out that come from the poles.
//
// Let f = (A + By)/D with D = Π (x − x_i)^(e_i), and let p_i with ℘(p_i) = x_i be its poles of the orders n_i. The norm N(x) = A² − B²(4x³ − g2 x − g3) has
// at x_i the multiplicity 2e_i − n(p_i) − n(−p_i) (2e_i − n_i at a half-period), as f has no zero there; what is left vanishes at the zeros of f alone.

import type { Disc } from "../../number/disc.ts";
import * as disc from "../../number/disc.ts";
import { asDisc, type Enclosure, type Operation } from "../../number/origin.ts";
import { PrecisionError } from "../../proof/errors.ts";
import { rootOffCut } from "../cubic.ts";
import { logarithm } from "../real-logarithm.ts";
import type { Element } from "./element.ts";
import { polynomialDisc } from "./evaluate.ts";
import type { Expression } from "./operations.ts";
import { hornerDisc, isolatedRoots } from "./polynomial-roots.ts";

/** What is known of the function: how often each x_i goes out of the norm, and the number of its zeros off the lattice. */
export interface Beside {
  readonly times: readonly number[];
  readonly zeros: number;
  /** Whether f(−z) = f(z) by an exact argument: then B is 0, and A takes the part of the norm, its square. */
  readonly even: boolean;
}

/** A zero by the disc that its abscissa alone lies in. */
export interface BesideZero extends Beside {
  readonly anchor: Disc;
  /** For an even function which of the two points over it. */
  readonly side: 1 | -1;
}

/** Abscissas of the zeros, or undefined where they do not separate at this precision. */
export function abscissasBeside(f: Element, known: Beside, xs: readonly Disc[], prec: number): Disc[] | undefined {
  const wp = prec + 32;
  const [A, B] = [f.A, f.B].map((p) => polynomialDisc(f, p, wp)) as [Disc[], Disc[]];
  const cubic = polynomialDisc(f, f.field.cubic, wp);
  const half = known.even ? 2 : 1;
  const [zeros, times] = [known.zeros / half, known.times.map((n) => n / half)];
  const norm = known.even ? A : difference(product(A, A, wp), product(product(B, B, wp), cubic, wp), wp);
  // Higher coefficients are 0: the degree is that of the order of the numerator at the lattice points.
  let q = norm.slice(0, zeros + times.reduce((sum, n) => sum + n, 0) + 1);
  for (const [k, x] of xs.entries()) for (let n = 0; n < times[k]!; n++) q = without(q, x, wp);
  if (q.length !== zeros + 1 || disc.containsZero(q[zeros]!)) return undefined;
  return isolatedRoots(q, prec);
}

/** q/(x − root), whose rest is known to be 0. */
function without(q: readonly Disc[], root: Disc, wp: number): Disc[] {
  const out: Disc[] = new Array(q.length - 1);
  let carry: Disc = disc.zero;
  for (let k = q.length - 1; k > 0; k--) {
    carry = disc.add(q[k]!, disc.mul(carry, root, wp), wp);
    out[k - 1] = carry;
  }
  return out;
}

function product(p: readonly Disc[], q: readonly Disc[], wp: number): Disc[] {
  if (p.length === 0 || q.length === 0) return [];
  const out: Disc[] = new Array(p.length + q.length - 1).fill(disc.zero);
  p.forEach((x, i) => {
    q.forEach((y, k) => {
      out[i + k] = disc.add(out[i + k]!, disc.mul(x, y, wp), wp);
    });
  });
  return out;
}

function difference(p: readonly Disc[], q: readonly Disc[], wp: number): Disc[] {
  return Array.from({ length: Math.max(p.length, q.length) }, (_, k) =>
    disc.sub(p[k] ?? disc.zero, q[k] ?? disc.zero, wp),
  );
}

/** [expression, zero, x_1, x_2, ...]: the zero in the plane, with ℘′ = −A/B. */
export const ZERO_BESIDE: Operation = {
  name: "zero",
  evaluate: ([e, place, ...rest], at, prec): Enclosure => {
    const f = (e as Expression).element;
    const { anchor, side, ...known } = place as BesideZero;
    const xs = rest.map((x) => asDisc(at(x)));
    const wp = prec + 64;
    const x = abscissasBeside(f, known, xs, wp)?.find((root) => disc.overlaps(root, anchor));
    if (!x) {
      throw new PrecisionError({
        subject: "zeros",
        given: "an abscissa that its enclosures do not isolate",
        expected: "more exact principal parts",
      });
    }
    const value = (p: Element["A"]) => hornerDisc(polynomialDisc(f, p, wp), x, wp);
    const root = () => rootOffCut(value(f.field.cubic), wp);
    const y = known.even ? root() : disc.neg(disc.div(value(f.A), value(f.B), wp));
    const z = logarithm(f.field.lattice, { x, y: side === 1 ? y : disc.neg(y) }, prec);
    return z.axis === "real" ? disc.along(z) : z;
  },
};
