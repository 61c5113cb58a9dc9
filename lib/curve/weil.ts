// The Weil pairing by Miller's algorithm, over any field.

import { type Field, sum } from "../algebra/field.ts";
import { type Affine, addPoints, multiplyPoint, slopeOf } from "./group.ts";
import type { Coefficients } from "./weierstrass.ts";

/**
 * The Weil pairing e_n(P, Q) of points that n kills, normalised so that e_n(ω1/n, ω2/n) = exp(2πi/n).
 *
 * Method   (−1)^n f_P(Q)/f_Q(P) with Miller functions of leading coefficient 1 at O. A line of the ladder of P meets Q only if Q is a
 *          multiple of P, and then the pairing is 1.
 * Domain   nP = nQ = O; n prime to the characteristic.
 * Source   Miller 2004; Silverman AEC III.8, XI.8.1.
 */
export function weilPairing<T>(F: Field<T>, a: Coefficients<T>, n: number, P: Affine<T>, Q: Affine<T>): T {
  const [above, below] = [miller(F, a, n, P, Q), miller(F, a, n, Q, P)];
  if (above === undefined || below === undefined || F.isZero(above) || F.isZero(below)) return F.one;
  const ratio = F.mul(above, F.inv(below));
  return n % 2 === 0 ? ratio : F.neg(ratio);
}

/** f_(n,P)(R), where div f = n(P) − n(O); undefined if a line of the ladder meets R. */
function miller<T>(F: Field<T>, a: Coefficients<T>, n: number, P: Affine<T>, R: Affine<T>): T | undefined {
  if (!R || !P) return undefined;
  let [above, below] = [F.one, F.one];
  let T: Affine<T> = P;
  const step = (U: Affine<T>) => {
    const [line, vertical] = lineValues(F, a, T, U, R);
    above = F.mul(above, line);
    below = F.mul(below, vertical);
    T = addPoints(F, a, T, U);
  };
  for (const digit of n.toString(2).slice(1)) {
    above = F.mul(above, above);
    below = F.mul(below, below);
    step(T);
    if (digit === "1") step(P);
  }
  return F.isZero(below) ? undefined : F.mul(above, F.inv(below));
}

/** The line through T and U, and the vertical line through T + U, at R. */
function lineValues<T>(F: Field<T>, a: Coefficients<T>, A: Affine<T>, B: Affine<T>, [x, y]: readonly [T, T]): [T, T] {
  if (!A || !B) {
    const known = A ?? B;
    const value = known ? F.sub(x, known[0]) : F.one;
    return [value, value];
  }
  const slope = slopeOf(F, a, A, B);
  if (slope === undefined) return [F.sub(x, A[0]), F.one];
  const line = sum(F, y, F.neg(A[1]), F.neg(F.mul(slope, F.sub(x, A[0]))));
  return [line, F.sub(x, addPoints(F, a, A, B)![0])];
}

/** True if n kills the point. */
export function isKilledBy<T>(F: Field<T>, a: Coefficients<T>, n: number, P: Affine<T>): boolean {
  return multiplyPoint(F, a, BigInt(n), P) === undefined;
}
