// Real enclosures: immutable data and functions that take a precision in bits, relative unless said. See ball/*.ts.
export { agm } from "./ball/agm.ts";
export {
  abs,
  add,
  div,
  hull,
  inv,
  ldexp,
  mul,
  mulInt,
  neg,
  pow,
  round,
  spread,
  sqrt,
  square,
  sub,
  widen,
  widenBy,
} from "./ball/arithmetic.ts";
export { acos, asin, atan, atan2 } from "./ball/atan.ts";
export { compare, contains, overlaps } from "./ball/compare.ts";
export { ln2, pi } from "./ball/constants.ts";
export {
  type Ball,
  bits,
  containsZero,
  finish,
  fromDouble,
  fromInt,
  fromRational,
  isZero,
  lower,
  lowerPositive,
  lowMagnitude,
  magnitude,
  midpoint,
  one,
  radius,
  sign,
  toDouble,
  upper,
  zero,
} from "./ball/data.ts";
export { exp, ln } from "./ball/exp.ts";
export { eulerGamma, gammaRational } from "./ball/gamma.ts";
export { cosh, sinh, sinhCosh, tanh } from "./ball/hyperbolic.ts";
export { floor } from "./ball/integer.ts";
export { acosh, asinh, atanh, nthRoot, power, tan } from "./ball/power.ts";
export { type SinCos, sinCos } from "./ball/trig.ts";

import type { Ball } from "./ball/data.ts";
import { sinCos } from "./ball/trig.ts";

/** sin x; see `sinCos`. */
export function sin(x: Ball, prec: number): Ball {
  return sinCos(x, prec).sin;
}

/** cos x; see `sinCos`. */
export function cos(x: Ball, prec: number): Ball {
  return sinCos(x, prec).cos;
}
