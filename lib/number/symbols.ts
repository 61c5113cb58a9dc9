// Constants as values. They follow the precision of the context, so that no digits are lost when it is raised later.

import type { Ball } from "./ball.ts";
import * as ball from "./ball.ts";
import { workingPrecision } from "./context.ts";
import { PI } from "./operations.ts";
import type { Operation } from "./origin.ts";
import { Quadratic } from "./quadratic.ts";
import { Complex, Real } from "./values.ts";

/** A number that is defined by a symbol: its enclosure is always as sharp as the context asks. */
class Constant extends Real {
  constructor(operation: Operation) {
    super(ball.zero, { origin: { operation, operands: [], depth: 0 }, standing: "defined" });
  }

  override get ball(): Ball {
    return this.origin!.operation.evaluate([], noOperand, workingPrecision()) as Ball;
  }
}

function noOperand(): never {
  throw new TypeError("a constant has no operands");
}

/** The circle number 3.14159... */
export const π: Real = new Constant(PI);

/** Euler's constant 0.57721... */
export const eulerGamma: Real = new Constant({ name: "γ", evaluate: (_none, _at, prec) => ball.eulerGamma(prec) });

/** The imaginary unit, exact. */
export const i: Complex = new Complex(
  { re: 0n, im: 1n, exp: 0, rad: 0, axis: "imaginary" },
  { exact: Quadratic.of(0, 1, -1), standing: "exact" },
);
