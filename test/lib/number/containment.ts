// The standing randomized test of enclosures: a point of each input, edges included, goes through the operation in exact arithmetic or at three
// times the precision, and the result for the enclosures must hold it.
import fc from "fast-check";
import type { Ball } from "../../../lib/number/ball.ts";
import * as ball from "../../../lib/number/ball.ts";
import { LibraryError } from "../../../lib/proof/errors.ts";
import { anyExponent, exact, type Pointed, pointed, precision, resized } from "./cases.ts";

/** Runs an operation; undefined if it refuses the argument with one of the library's own errors. */
export function attempt<T>(f: () => T): T | undefined {
  try {
    return f();
  } catch (error) {
    if (error instanceof LibraryError) return undefined;
    throw error;
  }
}

export interface Property {
  readonly name: string;
  readonly property: fc.IProperty<unknown>;
}

type Unary = (x: Ball, prec: number) => Ball;
type Binary = (x: Ball, y: Ball, prec: number) => Ball;

/** Sizes at which a function of one argument is interesting. */
const moderate = fc.integer({ min: -60, max: 12 });

function holds(result: Ball, truth: Ball): boolean {
  wellFormed(result);
  // The true value lies in `truth`, which is narrow; a result that holds it cannot be apart from `truth`.
  return ball.overlaps(result, truth);
}

function wellFormed(x: Ball): void {
  const good = (x.rad === 0 || (x.rad >= 1 && x.rad <= 2 ** 31)) && Number.isSafeInteger(x.exp);
  if (!good) throw new Error(`ill-formed ball: radius ${x.rad}, exponent ${x.exp}`);
}

function unary(name: string, f: Unary, sizes: fc.Arbitrary<number>): Property {
  const property = fc.property(pointed(anyExponent), sizes, precision, (p, size, prec) => {
    const x = resized(p, size);
    const result = attempt(() => f(x.ball, prec));
    const truth = attempt(() => f(x.point, 3 * prec + 300));
    if (result === undefined || truth === undefined) return true;
    return holds(result, truth);
  });
  return { name, property };
}

function binary(name: string, f: Binary, adjust: (p: Pointed) => Pointed = (p) => p): Property {
  const property = fc.property(pointed(anyExponent), pointed(anyExponent), precision, (p, q, prec) => {
    const x = adjust(p);
    const y = adjust(q);
    const result = attempt(() => f(x.ball, y.ball, prec));
    const truth = attempt(() => f(x.point, y.point, 3 * prec + 300));
    if (result === undefined || truth === undefined) return true;
    return holds(result, truth);
  });
  return { name, property };
}

type Exact = "plus" | "minus" | "times" | "div";

/** Field operations against exact rational arithmetic. */
function field(name: string, f: Binary, method: Exact): Property {
  const near = fc.integer({ min: -900, max: 900 });
  const property = fc.property(pointed(near), pointed(near), precision, (x, y, prec) => {
    const result = attempt(() => f(x.ball, y.ball, prec));
    if (result === undefined) return true;
    wellFormed(result);
    return ball.contains(result, exact(x.point)[method](exact(y.point)));
  });
  return { name: `${name}, exactly`, property };
}

export const properties: readonly Property[] = [
  field("add", ball.add, "plus"),
  field("sub", ball.sub, "minus"),
  field("mul", ball.mul, "times"),
  field("div", ball.div, "div"),
  binary("add", ball.add),
  binary("mul", ball.mul),
  binary("div", ball.div),
  {
    name: "hull",
    property: fc.property(pointed(anyExponent), pointed(anyExponent), precision, (x, y, prec) => {
      const result = ball.hull(x.ball, y.ball, prec);
      return holds(result, x.point) && holds(result, y.point);
    }),
  },
  binary("agm", ball.agm, (p) => (p.ball.man < 0n ? { ball: ball.neg(p.ball), point: ball.neg(p.point) } : p)),
  unary("sqrt", ball.sqrt, fc.integer({ min: -33000, max: 33000 })),
  unary("abs", (x) => ball.abs(x), moderate),
  unary("square", ball.square, moderate),
  unary("pow 7", (x, prec) => ball.pow(x, 7, prec), moderate),
  unary("pow -3", (x, prec) => ball.pow(x, -3, prec), moderate),
  unary("exp", ball.exp, moderate),
  unary("exp of tiny and huge", ball.exp, fc.integer({ min: -33000, max: 30 })),
  unary("ln", ball.ln, moderate),
  unary("ln near 1", (x, prec) => ball.ln(ball.add(ball.one, x, 3000), prec), fc.integer({ min: -500, max: -1 })),
  unary("ln of tiny and huge", ball.ln, fc.integer({ min: -33000, max: 33000 })),
  unary("sin", ball.sin, moderate),
  unary("cos", ball.cos, moderate),
  unary(
    "sin near a multiple of pi",
    (x, prec) => ball.sin(ball.add(x, ball.mulInt(ball.pi(prec), 3, prec), prec), prec),
    fc.integer({ min: -200, max: -1 }),
  ),
  unary("sin of tiny and huge", ball.sin, fc.integer({ min: -3000, max: 300 })),
  unary("tan", ball.tan, moderate),
  unary("atan", ball.atan, fc.integer({ min: -60, max: 60 })),
  unary("atan of tiny and huge", ball.atan, fc.integer({ min: -3000, max: 3000 })),
  unary("asin", ball.asin, fc.integer({ min: -200, max: 1 })),
  unary("acos", ball.acos, fc.integer({ min: -200, max: 1 })),
  unary("acos near 1", (x, prec) => ball.acos(ball.sub(ball.one, x, 3000), prec), fc.integer({ min: -500, max: -1 })),
  unary("asinh", ball.asinh, fc.integer({ min: -200, max: 60 })),
  unary("acosh", ball.acosh, fc.integer({ min: 1, max: 60 })),
  unary("atanh", ball.atanh, fc.integer({ min: -200, max: 0 })),
  unary("cube root", (x, prec) => ball.nthRoot(x, 3, prec), fc.integer({ min: -3000, max: 3000 })),
  unary("sixth root", (x, prec) => ball.nthRoot(x, 6, prec), moderate),
  binary("atan2", ball.atan2),
  binary("power", ball.power, (p) => resized(p, 4)),
  unary("sinh", ball.sinh, fc.integer({ min: -500, max: 8 })),
  unary("cosh", ball.cosh, fc.integer({ min: -500, max: 8 })),
  unary("tanh", ball.tanh, fc.integer({ min: -500, max: 8 })),
];
