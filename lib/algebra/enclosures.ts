// Real and complex numbers as fields: exact where the values are, and undecided questions thrown, never guessed.

import { Complex, Real } from "../number/values.ts";
import type { Field } from "./field.ts";

/** The real numbers. `isZero` throws UndecidedError for an enclosure of 0 that no exact argument settles. */
export const reals: Field<Real> = {
  name: "R",
  characteristic: 0n,
  get zero() {
    return Real.from(0n);
  },
  get one() {
    return Real.from(1n);
  },
  fromInt: (n) => Real.from(n),
  add: (a, b) => a.plus(b),
  sub: (a, b) => a.minus(b),
  mul: (a, b) => a.times(b),
  neg: (a) => a.neg(),
  inv: (a) => Real.from(1n).div(a),
  isZero: (a) => a.equals(0n),
  sqrt: (a) => (a.lessThan(0n) ? undefined : a.sqrt()),
  format: (a) => a.toString(),
};

/** The complex numbers. Square roots are principal. */
export const complexes: Field<Complex> = {
  name: "C",
  characteristic: 0n,
  get zero() {
    return Complex.from(0n);
  },
  get one() {
    return Complex.from(1n);
  },
  fromInt: (n) => Complex.from(n),
  add: (a, b) => a.plus(b),
  sub: (a, b) => a.minus(b),
  mul: (a, b) => a.times(b),
  neg: (a) => a.neg(),
  inv: (a) => Complex.from(1n).div(a),
  isZero: (a) => a.equals(0n),
  sqrt: (a) => a.sqrt(),
  format: (a) => a.toString(),
};
