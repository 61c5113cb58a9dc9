// The elementary functions as operations that a value records, with their differentials.

import { growthOfCosine, growthOfSine, growthOfUnit } from "./angles.ts";
import * as ball from "./ball.ts";
import * as disc from "./disc.ts";
import { algebraic, binary, DIV, MINUS, NEG, PLUS, SQRT, TIMES, unary, value } from "./operations.ts";
import { asBall, type Enclosure, isDisc, type Operation } from "./origin.ts";
import type { Rational } from "./rational.ts";
import { growthOfRoot } from "./separation.ts";

const plus = (x: Enclosure | number, y: Enclosure | number, prec: number) => value(PLUS, prec, x, y);
const minus = (x: Enclosure | number, y: Enclosure | number, prec: number) => value(MINUS, prec, x, y);
const times = (x: Enclosure | number, y: Enclosure | number, prec: number) => value(TIMES, prec, x, y);
const over = (x: Enclosure | number, y: Enclosure | number, prec: number) => value(DIV, prec, x, y);
const neg = (x: Enclosure, prec: number) => value(NEG, prec, x);
const root = (x: Enclosure, prec: number) => value(SQRT, prec, x);
const square = (x: Enclosure, prec: number) => times(x, x, prec);

export const EXP: Operation = algebraic(
  growthOfUnit,
  unary("exp", ball.exp, disc.exp, (x, prec) => value(EXP, prec, x)),
);
export const LN: Operation = unary(
  "ln",
  ball.ln,
  (x, prec) => disc.ln(x, prec),
  (x, prec) => over(1, x, prec),
);
export const SIN: Operation = algebraic(
  growthOfSine,
  unary(
    "sin",
    ball.sin,
    (x, prec) => disc.sinCos(x, prec).sin,
    (x, prec) => value(COS, prec, x),
  ),
);
export const COS: Operation = algebraic(
  growthOfCosine,
  unary(
    "cos",
    ball.cos,
    (x, prec) => disc.sinCos(x, prec).cos,
    (x, prec) => neg(value(SIN, prec, x), prec),
  ),
);
export const TAN: Operation = unary("tan", ball.tan, disc.tan, (x, prec) =>
  plus(1, square(value(TAN, prec, x), prec), prec),
);
export const SINH: Operation = unary(
  "sinh",
  ball.sinh,
  (x, prec) => disc.sinhCosh(x, prec).sinh,
  (x, prec) => value(COSH, prec, x),
);
export const COSH: Operation = unary(
  "cosh",
  ball.cosh,
  (x, prec) => disc.sinhCosh(x, prec).cosh,
  (x, prec) => value(SINH, prec, x),
);
export const TANH: Operation = unary(
  "tanh",
  ball.tanh,
  (x, prec) => {
    const { sinh: s, cosh: c } = disc.sinhCosh(x, prec + 6);
    return disc.div(s, c, prec);
  },
  (x, prec) => minus(1, square(value(TANH, prec, x), prec), prec),
);
export const ASIN: Operation = unary("asin", ball.asin, disc.asin, (x, prec) =>
  over(1, root(minus(1, square(x, prec), prec), prec), prec),
);
export const ACOS: Operation = unary("acos", ball.acos, disc.acos, (x, prec) =>
  over(-1, root(minus(1, square(x, prec), prec), prec), prec),
);
export const ATAN: Operation = unary("atan", ball.atan, disc.atan, (x, prec) =>
  over(1, plus(1, square(x, prec), prec), prec),
);
export const ASINH: Operation = unary("asinh", ball.asinh, disc.asinh, (x, prec) =>
  over(1, root(plus(1, square(x, prec), prec), prec), prec),
);
export const ACOSH: Operation = unary("acosh", ball.acosh, disc.acosh, (x, prec) =>
  over(1, times(root(plus(x, 1, prec), prec), root(minus(x, 1, prec), prec), prec), prec),
);
export const ATANH: Operation = unary("atanh", ball.atanh, disc.atanh, (x, prec) =>
  over(1, minus(1, square(x, prec), prec), prec),
);
export const AGM: Operation = binary("agm", ball.agm, disc.agm);
// d(x^y) = x^y (ln x · dy + y·dx/x)
export const POW: Operation = binary(
  "pow",
  ball.power,
  (x, y, prec) => disc.power(x, y, prec),
  ([x, y], at, d, prec) => {
    const power = value(POW, prec, at(x), at(y));
    const base = over(times(at(y), d(x), prec), at(x), prec);
    return times(power, plus(times(value(LN, prec, at(x)), d(y), prec), base, prec), prec);
  },
);
export const ATAN2: Operation = {
  name: "atan2",
  evaluate: ([y, x], at, prec) => ball.atan2(asBall(at(y)), asBall(at(x)), prec),
  differential: ([y, x], at, d, prec) => {
    const turn = minus(times(at(x), d(y), prec), times(at(y), d(x), prec), prec);
    return over(turn, plus(square(at(x), prec), square(at(y), prec), prec), prec);
  },
};
export const ROOT: Operation = {
  name: "nthRoot",
  growth: growthOfRoot,
  evaluate: ([x, n], at, prec) => {
    const z = at(x);
    return isDisc(z) ? disc.nthRoot(z, n as number, prec) : ball.nthRoot(z, n as number, prec);
  },
  differential: ([x, n], at, d, prec) =>
    over(times(value(ROOT, prec, at(x), n), d(x), prec), times(n as number, at(x), prec), prec),
};
export const GAMMA: Operation = {
  name: "gamma",
  evaluate: ([q], _at, prec) => ball.gammaRational(q as Rational, prec),
};
