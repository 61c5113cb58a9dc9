import { DomainError } from "../../proof/errors.ts";
import { bitLength } from "./bits.ts";

/** Field operations of a kind of enclosure. */
export interface PowerField<T> {
  readonly one: T;
  square(x: T, prec: number): T;
  mul(x: T, y: T, prec: number): T;
  inv(x: T, prec: number): T;
  round(x: T, prec: number): T;
}

/** x^n for an integer n; x^0 is exactly 1. Each of the at most 2 log2 n products errs by an ulp, which the bits beyond prec hold. Throws as `inv` for n < 0. */
export function integerPower<T>(x: T, n: number, prec: number, field: PowerField<T>): T {
  if (!Number.isSafeInteger(n)) {
    throw new DomainError({ subject: "pow", given: `the exponent ${n}`, expected: "a safe integer" });
  }
  if (n < 0) return field.inv(integerPower(x, -n, prec + 8, field), prec);
  if (n === 0) return field.one;
  const work = prec + 4 + 2 * bitLength(BigInt(n));
  const power = binaryPower(
    x,
    n,
    (y) => field.square(y, work),
    (y, z) => field.mul(y, z, work),
  );
  return field.round(power, prec);
}

/** x^n for n >= 1 by squarings and products, leading bit first. */
export function binaryPower<T>(x: T, n: number, square: (x: T) => T, times: (x: T, y: T) => T): T {
  let y = x;
  for (const bit of n.toString(2).slice(1)) {
    y = square(y);
    if (bit === "1") y = times(y, x);
  }
  return y;
}
