// Invariants of ternary cubics and binary quartics, and the Jacobians they give.

import { cube, type Field, fraction, scale, square, sum } from "../../algebra/field.ts";
import { solve } from "../../algebra/linear.ts";
import { add, derivative, multiply, type Polynomial, scaleBy, subtract } from "../../algebra/multivariate.ts";
import type { Coefficients } from "../weierstrass.ts";

/** The determinant of second derivatives over 216: x³ + y³ + z³ + 6mxyz goes to −m²(x³ + y³ + z³) + (1 + 2m³)xyz. */
export function hessian<T>(F: Field<T>, f: Polynomial<T>): Polynomial<T> {
  const second = f.variables.map((p) => f.variables.map((q) => derivative(F, derivative(F, f, p), q)));
  const at = (i: number, j: number) => second[i]![j]!;
  const mul = (g: Polynomial<T>, h: Polynomial<T>) => multiply(F, g, h);
  const minor = (i: number, j: number) => subtract(F, mul(at(1, i), at(2, j)), mul(at(1, j), at(2, i)));
  const determinant = add(
    F,
    subtract(F, mul(at(0, 0), minor(1, 2)), mul(at(0, 1), minor(0, 2))),
    mul(at(0, 2), minor(0, 1)),
  );
  return scaleBy(F, fraction(F, 1n, 216n), determinant);
}

/** Aronhold's invariants of degree 4 and 6; x³ + y³ + z³ + 6mxyz has S = m − m⁴ and T = 1 − 20m³ − 8m⁶. */
export interface CubicInvariants<T> {
  readonly S: T;
  readonly T: T;
}

/**
 * S and T from the pencil of a cubic F and its Hessian H: the Hessian of F + qH is (−S/3·q + S²/27·q³) F + (1 + ... + T/108·q³) H,
 * as the Hesse form shows, into which every smooth cubic can be brought.
 * Undefined if the Hessian is a multiple of the cubic: then it is three lines.
 */
export function cubicInvariants<T>(F: Field<T>, f: Polynomial<T>): CubicInvariants<T> | undefined {
  const h = hessian(F, f);
  const ofSum = inPencil(F, f, h, hessian(F, add(F, f, h)));
  const ofDifference = inPencil(F, f, h, hessian(F, subtract(F, f, h)));
  if (!ofSum || !ofDifference) return undefined;
  const half = fraction(F, 1n, 2n);
  const odd = F.mul(half, F.sub(ofSum[0], ofDifference[0]));
  const cubic = inPencil(F, f, h, hessian(F, h))!;
  return { S: scale(F, -3, F.sub(odd, cubic[0])), T: scale(F, 108, cubic[1]) };
}

/** g = p·f + q·h, or undefined if f and h are dependent. */
function inPencil<T>(F: Field<T>, f: Polynomial<T>, h: Polynomial<T>, g: Polynomial<T>): readonly [T, T] | undefined {
  const keys = [...new Set([...f.terms.keys(), ...h.terms.keys(), ...g.terms.keys()])];
  const column = (p: Polynomial<T>) => keys.map((key) => p.terms.get(key) ?? F.zero);
  const [a, b, c] = [column(f), column(h), column(g)];
  const dependent = a.every((x, k) => a.every((y, l) => F.isZero(F.sub(F.mul(x, b[l]!), F.mul(y, b[k]!)))));
  if (dependent) return undefined;
  const solution = solve(
    F,
    keys.map((_, k) => [a[k]!, b[k]!]),
    c,
  );
  return solution as [T, T] | undefined;
}

/** c4 and c6 of the Jacobian of a ternary cubic: −6⁴ S and 2³·3⁶ T. */
export function cubicC4C6<T>(F: Field<T>, { S, T }: CubicInvariants<T>): readonly [T, T] {
  return [scale(F, -1296, S), scale(F, 5832, T)];
}

/** y² = x³ − 27 c4 x − 54 c6, which has the invariants 6⁴ c4 and 6⁶ c6. */
export function modelOfInvariants<T>(F: Field<T>, c4: T, c6: T): Coefficients<T> {
  return [F.zero, F.zero, F.zero, scale(F, -27, c4), scale(F, -54, c6)];
}

/** 1728 Δ = c4³ − c6²; zero exactly for a singular curve. */
export function discriminantTimes1728<T>(F: Field<T>, c4: T, c6: T): T {
  return F.sub(cube(F, c4), square(F, c6));
}

/** I and J of a x⁴ + b x³ + c x² + d x + e; the Jacobian of y² = quartic has c4 = 2⁴ I, c6 = 2⁵ J. Source: Cremona, 3.6. */
export function quarticInvariants<T>(F: Field<T>, [a, b, c, d, e]: readonly [T, T, T, T, T]) {
  const mul = (...factors: T[]) => factors.reduce((p, q) => F.mul(p, q));
  const I = sum(F, scale(F, 12, mul(a, e)), scale(F, -3, mul(b, d)), mul(c, c));
  const J = sum(
    F,
    scale(F, 72, mul(a, c, e)),
    scale(F, 9, mul(b, c, d)),
    scale(F, -27, mul(a, d, d)),
    scale(F, -27, mul(e, b, b)),
    scale(F, -2, mul(c, c, c)),
  );
  return { I, J };
}
