// What a curve over F_p delegates to: reduction, order, structure, points.

import { isPrime } from "../algebra/factor.ts";
import { primeField, type Residue } from "../algebra/primefield.ts";
import { type ModCurve, type ModPoint, reduceModel } from "../arithmetic/group-fp.ts";
import { globalMinimalModel, type IntegerModel } from "../arithmetic/minimal.ts";
import { countPoints, orderDividing } from "../arithmetic/order-fp.ts";
import { singularityOf } from "../curve/singular.ts";
import { type Coefficients, invariantsOf } from "../curve/weierstrass.ts";
import type { Rational } from "../number/rational.ts";
import { DomainError } from "../proof/errors.ts";
import { Curve } from "./curve.ts";
import type { Point } from "./point.ts";

/**
 * The reduction modulo p of the given model, or where that has no good reduction of the minimal model.
 * Throws   DomainError if p is not prime, or with the kind of bad reduction.
 */
export function reductionOf(E: Curve<Rational>, p: bigint): Curve<Residue> {
  if (p < 2n || !isPrime(p)) {
    throw new DomainError({ subject: "mod", given: `${p}`, expected: "a prime", argument: "p" });
  }
  const F = primeField(p);
  const own = reduced(E.a, p);
  if (own && !F.isZero(invariantsOf(F, own).discriminant)) return new Curve(F, own);
  const minimal = reduced(
    globalMinimalModel(E.a).a.map((c) => ({ num: c, den: 1n })),
    p,
  )!;
  if (!F.isZero(invariantsOf(F, minimal).discriminant)) return new Curve(F, minimal);
  const { kind, point } = singularityOf(F, minimal);
  throw new DomainError({
    subject: "mod",
    given: `${E} has bad reduction at ${p}: its minimal model gets a ${kind} at (${point.join(", ")}) over F_${p}`,
    expected: "a prime of good reduction",
    argument: "p",
  });
}

function reduced(
  a: readonly { readonly num: bigint; readonly den: bigint }[],
  p: bigint,
): Coefficients<Residue> | undefined {
  if (a.some((c) => c.den % p === 0n)) return undefined;
  const F = primeField(p);
  return a.map((c) => F.mul(F.fromInt(c.num), F.inv(F.fromInt(c.den)))) as unknown as Coefficients<Residue>;
}

/** The plain data of a curve over F_p. Throws DomainError for a curve over another field. */
export function modCurve<T>(E: Curve<T>, subject: string): ModCurve {
  if (E.field.characteristic === 0n) {
    throw new DomainError({
      subject,
      given: `${E}`,
      expected: "a curve over a finite field",
      hint: "Reduce it first: E.mod(p).",
    });
  }
  const a = (E as unknown as Curve<Residue>).a.map((c) => c.value) as unknown as IntegerModel;
  return reduceModel(a, E.field.characteristic);
}

export function countOf<T>(E: Curve<T>): bigint {
  const { a, p } = modCurve(E, "count");
  return countPoints(a, p);
}

/** #E(F_q) for q = p^n: q + 1 − s_n with s_0 = 2, s_1 = t, s_n = t s_(n−1) − p s_(n−2). Source: Silverman AEC V.2.3.1. */
export function countOverExtension(p: bigint, trace: bigint, n: number): bigint {
  if (!(Number.isSafeInteger(n) && n >= 1 && n <= 1000)) {
    throw new DomainError({
      subject: "countOver",
      given: `n = ${n}`,
      expected: "an integer from 1 to 1000",
      argument: "n",
    });
  }
  let [before, s] = [2n, trace];
  for (let k = 1; k < n; k++) [before, s] = [s, trace * s - p * before];
  return p ** BigInt(n) + 1n - s;
}

/** Coordinates of a point over F_p as bigints. */
export function modPoint<T>(P: Point<T>): ModPoint {
  const affine = P.coordinates as readonly [Residue, Residue] | undefined;
  return affine && [affine[0].value, affine[1].value];
}

/** The order of a point over F_p, from the order of the group. */
export function orderOverPrimeField<T>(P: Point<T>): bigint {
  const curve = modCurve(P.curve, "order");
  return orderDividing(curve, modPoint(P), P.curve.count);
}
