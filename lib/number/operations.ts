// The operations that values of this folder record: each works on enclosures at any precision.

import type { Ball } from "./ball.ts";
import * as ball from "./ball.ts";
import type { Disc } from "./disc.ts";
import * as disc from "./disc.ts";
import { asBall, asDisc, isDisc, type Operation } from "./origin.ts";

type RealFunction = (x: Ball, prec: number) => Ball;
type ComplexFunction = (x: Disc, prec: number) => Disc;

/** An operation of one number: the real function for a real operand, the complex one else. */
export function unary(name: string, real: RealFunction, complex: ComplexFunction): Operation {
  return {
    name,
    evaluate: ([x], at, prec) => {
      const value = at(x);
      return isDisc(value) ? complex(value, prec) : real(value, prec);
    },
  };
}

/** An operation of one complex number (a real one is taken as complex) with a real result. */
export function shadow(name: string, f: (x: Disc, prec: number) => Ball): Operation {
  return { name, evaluate: ([x], at, prec) => f(asDisc(at(x)), prec) };
}

/** An operation of one real number. */
export function realOnly(name: string, f: RealFunction): Operation {
  return { name, evaluate: ([x], at, prec) => f(asBall(at(x)), prec) };
}

/** An operation of two numbers: the real function for two real operands, the complex one else. */
export function binary(
  name: string,
  real: (x: Ball, y: Ball, prec: number) => Ball,
  complex: (x: Disc, y: Disc, prec: number) => Disc,
): Operation {
  return {
    name,
    evaluate: ([x, y], at, prec) => {
      const a = at(x);
      const b = at(y);
      return isDisc(a) || isDisc(b) ? complex(asDisc(a), asDisc(b), prec) : real(a, b, prec);
    },
  };
}

export const PLUS: Operation = binary("plus", ball.add, disc.add);
export const MINUS: Operation = binary("minus", ball.sub, disc.sub);
export const TIMES: Operation = binary("times", ball.mul, disc.mul);
export const DIV: Operation = binary("div", ball.div, disc.div);
export const NEG: Operation = unary("neg", ball.neg, disc.neg);
export const CONJ: Operation = unary("conj", (x) => x, disc.conj);
export const SQRT: Operation = unary("sqrt", ball.sqrt, (x, prec) => disc.sqrt(x, prec));
export const ABS: Operation = {
  name: "abs",
  evaluate: ([x], at, prec) => {
    const value = at(x);
    return isDisc(value) ? disc.abs(value, prec) : ball.abs(value);
  },
};
export const ARG: Operation = shadow("arg", (x, prec) => disc.arg(x, prec));
export const RE: Operation = shadow("re", disc.real);
export const IM: Operation = shadow("im", disc.imag);
/** re + i·im of two real numbers. */
export const JOIN: Operation = {
  name: "complex",
  evaluate: ([x, y], at, prec) => disc.fromBalls(asBall(at(x)), asBall(at(y)), prec),
};
/** x^n for an integer n, which stands as a plain operand. */
export const POWER: Operation = {
  name: "pow",
  evaluate: ([x, n], at, prec) => {
    const value = at(x);
    return isDisc(value) ? disc.pow(value, n as number, prec) : ball.pow(value, n as number, prec);
  },
};
