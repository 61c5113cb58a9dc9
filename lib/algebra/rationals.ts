// Q as a field.

import { Rational } from "../number/rational.ts";
import type { Field } from "./field.ts";
import { exactRoot, exactSqrt } from "./integer.ts";

/** The field of rational numbers. Its square roots are not negative. */
export const rationals: Field<Rational> = {
  name: "Q",
  characteristic: 0n,
  zero: Rational.zero,
  one: Rational.one,
  fromInt: (n) => Rational.of(n),
  add: (a, b) => a.plus(b),
  sub: (a, b) => a.minus(b),
  mul: (a, b) => a.times(b),
  neg: (a) => a.neg(),
  inv: (a) => a.inv(),
  isZero: (a) => a.num === 0n,
  sqrt: rationalSqrt,
  cbrt: rationalCbrt,
  format: (a) => a.toString(),
};

function rationalSqrt(a: Rational): Rational | undefined {
  const top = exactSqrt(a.num);
  const bottom = top === undefined ? undefined : exactSqrt(a.den);
  return top === undefined || bottom === undefined ? undefined : Rational.of(top, bottom);
}

function rationalCbrt(a: Rational): Rational | undefined {
  const [top, bottom] = [exactRoot(a.num, 3), exactRoot(a.den, 3)];
  return top === undefined || bottom === undefined ? undefined : Rational.of(top, bottom);
}
