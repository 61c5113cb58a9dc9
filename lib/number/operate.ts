// Arithmetic on scalars of any kind, exact as long as it can be: what an operator between two numbers in a cell means.
import { combine, type Field, power } from "./exactness.ts";
import { pow as generalPower } from "./functions.ts";
import type { Exact } from "./origin.ts";
import { Quadratic } from "./quadratic.ts";
import { Rational } from "./rational.ts";
import { Complex, type ComplexNumeric, Real, scalar } from "./values.ts";

/** A number of this library. */
export type Scalar = Rational | Quadratic | Real | Complex;

/** Whether x is a number of this library. */
export function isScalar(x: unknown): x is Scalar {
  return x instanceof Rational || x instanceof Quadratic || x instanceof Real || x instanceof Complex;
}

/**
 * x + y, x − y, x·y or x/y. Two exact numbers of one field give an exact one (a Rational or Quadratic, if both were such); a Real or Complex makes
 * the result one. Plain numbers and text are read as `scalar` says.
 */
export function operate(field: Field, x: Scalar | ComplexNumeric, y: Scalar | ComplexNumeric): Scalar {
  const a = plainExact(x);
  const b = plainExact(y);
  const exact = combine(field, a, b);
  if (exact) return exact;
  const left = scalar(x as ComplexNumeric, field);
  return (left as Complex)[field](y as ComplexNumeric);
}

/** x^y. */
export function operatePower(x: Scalar | ComplexNumeric, y: Scalar | ComplexNumeric): Scalar {
  const base = plainExact(x);
  const exponent = plainExact(y);
  if (base && exponent instanceof Rational && exponent.den === 1n) {
    const exact = power(base, Number(exponent.num));
    if (exact) return exact;
  }
  return generalPower(x as ComplexNumeric, y as ComplexNumeric);
}

/** −x. */
export function operateNeg(x: Scalar): Scalar {
  return x.neg();
}

function plainExact(x: unknown): Exact | undefined {
  if (x instanceof Rational || x instanceof Quadratic) return x;
  if (typeof x === "bigint") return Rational.of(x);
  return typeof x === "number" && Number.isSafeInteger(x) ? Rational.of(x) : undefined;
}

/** -1, 0, 1 for <, =, > of two real scalars; undefined if it stays open. */
export function order(x: Scalar | ComplexNumeric, y: Scalar | ComplexNumeric): -1 | 0 | 1 | undefined {
  return Real.from(x as Real).compare(Real.from(y as Real));
}
