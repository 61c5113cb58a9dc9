// Zeros and poles of an elliptic function as points of the torus with multiplicities.

import { mulUni } from "../../algebra/univariate.ts";
import { ontoReal } from "../../function/enclosure.ts";
import * as ball from "../../number/ball.ts";
import type { Disc } from "../../number/disc.ts";
import * as disc from "../../number/disc.ts";
import { PrecisionError, UndecidedError } from "../../proof/errors.ts";
import { LADDER } from "../build.ts";
import { roots } from "../context.ts";
import { rootOffCut } from "../cubic.ts";
import { logarithm } from "../real-logarithm.ts";
import { type Element, normOf, type ScalarPolynomial } from "./element.ts";
import { polynomialDisc } from "./evaluate.ts";
import { hornerDisc, isolatedRoots } from "./polynomial-roots.ts";
import { factored, isExactElement, orderAtOrigin, ordersOver, type Place, places } from "./valuation.ts";

/** A zero (order > 0) or pole (order < 0) that is not a lattice point. */
export interface DivisorPoint {
  readonly element: Element;
  readonly place: Place;
  /** The abscissa ℘ at low precision: the root of place.q in this disc. */
  readonly anchor: Disc;
  /** The point with ℘′ = −A/B (or the chosen root of the cubic), or its mirror image. */
  readonly side: 1 | -1;
  readonly order: number;
  /** 1, 2, 3 for the half-period where ℘ is e1, e2, e3. */
  readonly halfPeriod?: 1 | 2 | 3;
}

export interface Divisor {
  /** Order at the lattice points; 0 if neither zero nor pole. */
  readonly atOrigin: number;
  readonly points: readonly DivisorPoint[];
}

/**
 * The divisor of a function that is not 0.
 *
 * Domain   any. With exact coefficients multiplicities are settled by exact division; otherwise all zeros and poles have to be simple
 *          apart from the lattice points, which separate enclosures of the abscissas prove.
 * Throws   UndecidedError where enclosures of abscissas stay together.
 */
export function divisorOf(f: Element): Divisor {
  const list = isExactElement(f) ? places(f) : placesByEnclosure(f);
  return { atOrigin: orderAtOrigin(f), points: list.flatMap((place) => pointsOver(f, place)) };
}

function placesByEnclosure(f: Element): Place[] {
  const { ring, cubic } = f.field;
  const none = { inG: 0, inD: 0, inN: 0, twoTorsion: false };
  const parts: Place[] = [{ ...none, q: f.D, inD: 1 }];
  if (f.B.length === 0) parts.push({ ...none, q: f.A, inG: 1 });
  else if (f.A.length === 0) {
    parts.push({ ...none, q: f.B, inG: 1 }, { ...none, q: cubic, inN: 1, twoTorsion: true });
  } else parts.push({ ...none, q: normOf(f), inN: 1 });
  const used = parts.filter(({ q }) => q.length > 1);
  let product = used.reduce<ScalarPolynomial>((p, { q }) => mulUni(ring, p, q), [ring.one]);
  if (f.A.length > 0) product = mulUni(ring, product, cubic);
  separated(f, product);
  return used;
}

function separated(f: Element, q: ScalarPolynomial): Disc[] {
  if (q.length < 2) return [];
  for (const prec of LADDER.slice(0, 6)) {
    const found = tryRoots(f, q, prec);
    if (found) return found;
  }
  throw new UndecidedError({
    subject: "zeros and poles",
    given: "abscissas that enclosures do not separate",
    expected: "simple zeros and poles, or a function and a lattice with exact coefficients",
    hint: "Multiplicities are decided exactly where g2, g3 and all coefficients are exact.",
  });
}

function tryRoots(f: Element, q: ScalarPolynomial, prec: number): Disc[] | undefined {
  const coefficients = polynomialDisc(f, q, prec + 32);
  return disc.containsZero(coefficients.at(-1)!) ? undefined : isolatedRoots(coefficients, prec);
}

function pointsOver(f: Element, place: Place): DivisorPoint[] {
  const { there, mirror } = ordersOver(place);
  return separated(f, place.q).flatMap((anchor): DivisorPoint[] => {
    const point = { element: f, place, anchor };
    if (place.twoTorsion) {
      return there === 0 ? [] : [{ ...point, side: 1, order: there, halfPeriod: halfPeriodAt(f, anchor) }];
    }
    const both: DivisorPoint[] = [
      { ...point, side: 1, order: there },
      { ...point, side: -1, order: mirror },
    ];
    return both.filter(({ order }) => order !== 0);
  });
}

function halfPeriodAt(f: Element, x: Disc): 1 | 2 | 3 {
  for (const prec of LADDER) {
    const near = roots(f.field.lattice, prec).map((e) => disc.overlaps(e, x));
    if (near.filter(Boolean).length === 1) return (near.indexOf(true) + 1) as 1 | 2 | 3;
  }
  return 1;
}

/** ℘ and ℘′ at a point of a divisor. */
export function coordinatesOf(point: DivisorPoint, prec: number): { readonly x: Disc; readonly y: Disc } {
  const { element: f, place, anchor, side } = point;
  const wp = prec + 32;
  for (let bits = wp; bits <= 64 * prec + 4096; bits *= 2) {
    const found = tryRoots(f, place.q, bits)?.find((root) => disc.overlaps(root, anchor));
    if (!found) continue;
    const x = onRealLine(f, place, found, bits);
    if (place.twoTorsion) return { x, y: disc.zero };
    const y = ordinate(f, place, x, bits);
    return { x, y: side === 1 ? y : disc.neg(y) };
  }
  throw new PrecisionError({
    subject: "zeros and poles",
    given: "an abscissa that its enclosures do not isolate",
    expected: "more exact coefficients",
  });
}

/** A root of a real polynomial that shares its isolating disc with its conjugate is real. */
function onRealLine(f: Element, place: Place, x: Disc, prec: number): Disc {
  const real = polynomialDisc(f, place.q, prec).every((c) => c.axis === "real");
  return real && ball.containsZero(disc.imag(x)) ? ontoReal(x) : x;
}

function ordinate(f: Element, place: Place, x: Disc, prec: number): Disc {
  if (place.inN === 0) return rootOffCut(hornerDisc(polynomialDisc(f, f.field.cubic, prec), x, prec), prec);
  const { A, B } = isExactElement(f) ? factored(f) : f;
  const value = (p: ScalarPolynomial) => hornerDisc(polynomialDisc(f, p, prec), x, prec);
  return disc.neg(disc.div(value(A), value(B), prec));
}

/** z of a point of a divisor, near the cell around 0. */
export function placeOf(point: DivisorPoint, prec: number): Disc {
  return logarithm(point.element.field.lattice, coordinatesOf(point, prec + 32), prec);
}
