// The operations that values of this folder record: each works on enclosures at any precision.

import type { Ball } from "./ball.ts";
import * as ball from "./ball.ts";
import type { Disc } from "./disc.ts";
import * as disc from "./disc.ts";
import { asBall, asDisc, type Enclosure, isDisc, type Operation } from "./origin.ts";
import {
  type GrowthRule,
  growthOfJoin,
  growthOfPower,
  growthOfProduct,
  growthOfQuotient,
  growthOfRoot,
  growthOfSign,
  growthOfSum,
} from "./separation.ts";

type RealFunction = (x: Ball, prec: number) => Ball;
type ComplexFunction = (x: Disc, prec: number) => Disc;
/** The derivative of a function of one number, at the same argument. */
type Slope = (x: Enclosure, prec: number) => Enclosure;

/** An operation of one number: the real function for a real operand, the complex one else. */
export function unary(name: string, real: RealFunction, complex: ComplexFunction, slope?: Slope): Operation {
  const evaluate: Operation["evaluate"] = ([x], at, prec) => {
    const value = at(x);
    return isDisc(value) ? complex(value, prec) : real(value, prec);
  };
  if (!slope) return { name, evaluate };
  return { name, evaluate, differential: ([x], at, d, prec) => value(TIMES, prec, slope(at(x), prec), d(x)) };
}

/** The value of an operation at enclosures. */
export function value(operation: Operation, prec: number, ...operands: readonly unknown[]): Enclosure {
  return operation.evaluate(operands, (x) => (typeof x === "number" ? ball.fromInt(x) : (x as Enclosure)), prec);
}

/** An operation of one complex number (a real one is taken as complex) with a real result. */
export function shadow(name: string, f: (x: Disc, prec: number) => Ball): Operation {
  return { name, evaluate: ([x], at, prec) => f(asDisc(at(x)), prec) };
}

/** An operation of two numbers: the real function for two real operands, the complex one else. */
export function binary(
  name: string,
  real: (x: Ball, y: Ball, prec: number) => Ball,
  complex: (x: Disc, y: Disc, prec: number) => Disc,
  differential?: Operation["differential"],
): Operation {
  return {
    name,
    evaluate: ([x, y], at, prec) => {
      const a = at(x);
      const b = at(y);
      return isDisc(a) || isDisc(b) ? complex(asDisc(a), asDisc(b), prec) : real(a, b, prec);
    },
    ...(differential && { differential }),
  };
}

/** The differential of an operation that is linear over the real numbers: itself, at the differentials. */
function linear(operation: Operation): Operation {
  return { ...operation, differential: (operands, _at, d, prec) => operation.evaluate(operands, d, prec) };
}

/** The operation on algebraic numbers, with how its results grow. */
export function algebraic(growth: GrowthRule, operation: Operation): Operation {
  return { ...operation, growth };
}

/** The circle number. */
export const PI: Operation = { name: "π", evaluate: (_none, _at, prec) => ball.pi(prec) };
export const PLUS: Operation = algebraic(growthOfSum, linear(binary("plus", ball.add, disc.add)));
export const MINUS: Operation = algebraic(growthOfSum, linear(binary("minus", ball.sub, disc.sub)));
export const TIMES: Operation = algebraic(
  growthOfProduct,
  binary("times", ball.mul, disc.mul, ([x, y], at, d, prec) =>
    value(PLUS, prec, value(TIMES, prec, d(x), at(y)), value(TIMES, prec, at(x), d(y))),
  ),
);
// d(x/y) = (dx − (x/y)·dy)/y
export const DIV: Operation = algebraic(
  growthOfQuotient,
  binary("div", ball.div, disc.div, ([x, y], at, d, prec) => {
    const quotient = value(DIV, prec, at(x), at(y));
    return value(DIV, prec, value(MINUS, prec, d(x), value(TIMES, prec, quotient, d(y))), at(y));
  }),
);
export const NEG: Operation = algebraic(growthOfSign, linear(unary("neg", ball.neg, disc.neg)));
export const CONJ: Operation = linear(unary("conj", (x) => x, disc.conj));
export const SQRT: Operation = algebraic(
  growthOfRoot,
  unary(
    "sqrt",
    ball.sqrt,
    (x, prec) => disc.sqrt(x, prec),
    (x, prec) => value(DIV, prec, ball.fromDouble(0.5), value(SQRT, prec, x)),
  ),
);
export const ABS: Operation = {
  name: "abs",
  evaluate: ([x], at, prec) => {
    const value = at(x);
    return isDisc(value) ? disc.abs(value, prec) : ball.abs(value);
  },
};
export const ARG: Operation = shadow("arg", (x, prec) => disc.arg(x, prec));
export const RE: Operation = linear(shadow("re", disc.real));
export const IM: Operation = linear(shadow("im", disc.imag));
/** re + i·im of two real numbers. */
export const JOIN: Operation = algebraic(
  growthOfJoin,
  linear({
    name: "complex",
    evaluate: ([x, y], at, prec) => disc.fromBalls(asBall(at(x)), asBall(at(y)), prec),
  }),
);
/** x^n for an integer n, which stands as a plain operand. */
export const POWER: Operation = {
  name: "pow",
  growth: growthOfPower,
  evaluate: ([x, n], at, prec) => {
    return powerAt(at(x), n as number, prec);
  },
  differential: ([x, n], at, d, prec) => {
    const slope = value(TIMES, prec, ball.fromInt(n as number), powerAt(at(x), (n as number) - 1, prec));
    return value(TIMES, prec, slope, d(x));
  },
};

function powerAt(x: Enclosure, n: number, prec: number): Enclosure {
  return isDisc(x) ? disc.pow(x, n, prec) : ball.pow(x, n, prec);
}
