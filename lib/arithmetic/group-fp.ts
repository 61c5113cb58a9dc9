// Points of y² + a1xy + a3y = x³ + a2x² + a4x + a6 over F_p with plain bigints: the fast path under counting and logarithms.

import { modularInverse, modulo } from "../algebra/integer.ts";
import { modularSqrt } from "../algebra/primefield.ts";
import { nonAdjacentForm } from "../curve/group.ts";
import type { IntegerModel } from "./minimal.ts";

/** Coordinates in [0, p), or undefined for O. */
export type ModPoint = readonly [bigint, bigint] | undefined;

/** A model modulo a prime. */
export interface ModCurve {
  readonly a: IntegerModel;
  readonly p: bigint;
}

export function reduceModel(a: IntegerModel, p: bigint): ModCurve {
  return { a: a.map((c) => modulo(c, p)) as unknown as IntegerModel, p };
}

export function negateMod({ a: [a1, , a3], p }: ModCurve, P: ModPoint): ModPoint {
  return P && [P[0], modulo(-P[1] - a1 * P[0] - a3, p)];
}

/** The denominator of the slope, 0 for a vertical line. */
export function slopeDenominator({ a: [a1, , a3], p }: ModCurve, P: ModPoint, Q: ModPoint): bigint {
  const dx = modulo(Q![0] - P![0], p);
  return dx !== 0n ? dx : modulo(P![1] + Q![1] + a1 * P![0] + a3, p);
}

/** P + Q with the inverse of `slopeDenominator` given, so that many can be inverted together. */
export function addWithInverse(
  { a: [a1, a2, a3, a4], p }: ModCurve,
  P: ModPoint,
  Q: ModPoint,
  inverse: bigint,
): ModPoint {
  const [x1, y1] = P!;
  const [x2, y2] = Q!;
  const numerator = x1 !== x2 ? y2 - y1 : 3n * x1 * x1 + 2n * a2 * x1 + a4 - a1 * y1;
  const slope = modulo(numerator * inverse, p);
  const x = modulo(slope * (slope + a1) - a2 - x1 - x2, p);
  return [x, modulo(-y1 - slope * (x - x1) - a1 * x - a3, p)];
}

export function addMod(curve: ModCurve, P: ModPoint, Q: ModPoint): ModPoint {
  if (!P) return Q;
  if (!Q) return P;
  const denominator = slopeDenominator(curve, P, Q);
  if (denominator === 0n) return undefined;
  return addWithInverse(curve, P, Q, modularInverse(denominator, curve.p)!);
}

export function multiplyMod(curve: ModCurve, n: bigint, P: ModPoint): ModPoint {
  const base = n < 0n ? negateMod(curve, P) : P;
  const opposite = negateMod(curve, base);
  let result: ModPoint;
  for (const digit of nonAdjacentForm(n < 0n ? -n : n)) {
    result = addMod(curve, result, result);
    if (digit !== 0) result = addMod(curve, result, digit > 0 ? base : opposite);
  }
  return result;
}

/** The first point with abscissa start, start + 1, ...; p odd. */
export function pointFrom({ a: [a1, a2, a3, a4, a6], p }: ModCurve, start: bigint): readonly [bigint, bigint] {
  for (let x = modulo(start, p); ; x = (x + 1n) % p) {
    const linear = a1 * x + a3;
    const root = modularSqrt(linear * linear + 4n * (((x + a2) * x + a4) * x + a6), p);
    if (root !== undefined) return [x, modulo((root - linear) * ((p + 1n) / 2n), p)];
  }
}

/** P + D for every P of a list, with one inversion for all of them. */
export function addToAll(curve: ModCurve, points: readonly ModPoint[], D: ModPoint): ModPoint[] {
  if (!D) return [...points];
  const denominators = points.map((P) => (P ? slopeDenominator(curve, P, D) : 0n));
  const inverses = invertAll(denominators, curve.p);
  return points.map((P, k) => {
    if (!P) return D;
    return denominators[k] === 0n ? undefined : addWithInverse(curve, P, D, inverses[k]!);
  });
}

/** Inverses of the nonzero ones of many residues, by one inversion of their product. */
function invertAll(values: readonly bigint[], p: bigint): bigint[] {
  const prefix: bigint[] = [];
  let product = 1n;
  for (const value of values) {
    prefix.push(product);
    if (value !== 0n) product = (product * value) % p;
  }
  let inverse = modularInverse(product, p)!;
  const result: bigint[] = new Array(values.length).fill(0n);
  for (let k = values.length - 1; k >= 0; k--) {
    const value = values[k]!;
    if (value === 0n) continue;
    result[k] = (inverse * prefix[k]!) % p;
    inverse = (inverse * value) % p;
  }
  return result;
}
