import type { Exact } from "../../number/origin.ts";
import { Quadratic } from "../../number/quadratic.ts";
import { Rational } from "../../number/rational.ts";
import type { Quantity } from "../quantity.ts";

/** The exact value of a quantity: rational or quadratic, real or not. */
export function exactComplexOf(q: Quantity): Exact | undefined {
  if (q instanceof Rational) return q;
  if ("root" in q) return q.imag.sign() === 0 ? q.real : Quadratic.of(q.real, q.imag, -q.root);
  return q.exact;
}
