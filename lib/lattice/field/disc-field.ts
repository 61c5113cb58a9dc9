import type { Field } from "../../algebra/field.ts";
import * as ball from "../../number/ball.ts";
import type { Disc } from "../../number/disc.ts";
import * as disc from "../../number/disc.ts";

/** Enclosures at one precision as a field for power series; only exact 0 counts as zero. */
export function discField(prec: number): Field<Disc> {
  return {
    name: "C",
    characteristic: 0n,
    zero: disc.zero,
    one: disc.one,
    fromInt: (n) => disc.fromBall(ball.fromInt(n)),
    add: (a, b) => disc.add(a, b, prec),
    sub: (a, b) => disc.sub(a, b, prec),
    mul: (a, b) => disc.mul(a, b, prec),
    neg: disc.neg,
    inv: (a) => disc.inv(a, prec),
    isZero: disc.isZero,
    sqrt: () => undefined,
    format: (a) => disc.toDouble(a).join(" + i "),
  };
}
