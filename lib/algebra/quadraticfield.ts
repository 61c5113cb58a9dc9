// Q(√d) as a field.

import { Quadratic } from "../number/quadratic.ts";
import { Rational } from "../number/rational.ts";
import type { Field } from "./field.ts";
import { rationals } from "./rationals.ts";

/** Q(√d) for squarefree d; elements keep the embedding of `Quadratic`. */
export function quadraticField(d: bigint): Field<Quadratic> {
  const lift = (a: Rational) => Quadratic.of(a, Rational.zero, d);
  return {
    name: d === -1n ? "Q(i)" : `Q(√${d})`,
    characteristic: 0n,
    zero: lift(Rational.zero),
    one: lift(Rational.one),
    fromInt: (n) => lift(Rational.of(n)),
    add: (a, b) => a.plus(b),
    sub: (a, b) => a.minus(b),
    mul: (a, b) => a.times(b),
    neg: (a) => a.neg(),
    inv: (a) => a.inv(),
    isZero: (a) => a.a.num === 0n && a.b.num === 0n,
    sqrt: (a) => quadraticSqrt(a, d),
    format: (a) => a.toString(),
  };
}

/**
 * A root x + y√d of a + b√d: then x² is one of (a ± n)/2 with n² the norm a² − d b². The root with positive rational part
 * (or positive coefficient of √d if that is 0) is returned.
 */
function quadraticSqrt(value: Quadratic, d: bigint): Quadratic | undefined {
  const { a, b } = value;
  if (b.num === 0n) {
    const whole = rationals.sqrt(a);
    if (whole) return Quadratic.of(whole, Rational.zero, d);
    const part = rationals.sqrt(a.div(d));
    return part && Quadratic.of(Rational.zero, part, d);
  }
  const norm = rationals.sqrt(value.norm());
  if (!norm) return undefined;
  for (const n of [norm, norm.neg()]) {
    const x = rationals.sqrt(a.plus(n).div(2));
    if (x && x.num !== 0n) return Quadratic.of(x, b.div(x.times(2)), d);
  }
  return undefined;
}
