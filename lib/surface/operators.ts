// + - * / ** and order on library values, for code in which the language's own operators mean these functions.
//
// The types say what a pair of operands gives; an impossible pair gives NoOp, which the cell checker words as an error.
// At run time plain values keep the language's meaning, numbers meet in the smallest kind that holds both, and every
// other value answers by its methods plus, minus, times, div, neg, pow, compare.
import { toNumber } from "../number/convert.ts";
import { pow as power } from "../number/functions.ts";
import { Quadratic } from "../number/quadratic.ts";
import { Rational } from "../number/rational.ts";
import { Complex, type ComplexNumeric, Real } from "../number/values.ts";
import { UndecidedError } from "../proof/errors.ts";
import type { Difference, Negative, Order, Power, Product, Quotient, Sum } from "./operator-types.ts";

export type { Difference, Negative, NoOp, Order, Power, Product, Quotient, Sum } from "./operator-types.ts";

type Scalar = Rational | Quadratic | Real | Complex;
type Arithmetic = "plus" | "minus" | "times" | "div";

/** A value that answers some of the operators by methods. */
interface Operand {
  plus?(other: unknown): unknown;
  minus?(other: unknown): unknown;
  times?(other: unknown): unknown;
  div?(other: unknown): unknown;
  neg?(): unknown;
  inv?(): unknown;
  pow?(exponent: unknown): unknown;
  compare?(other: unknown): number | undefined;
}

const SCALARS: ReadonlySet<unknown> = new Set([Real, Complex, Rational, Quadratic]);

const WORDS: Readonly<Record<Arithmetic | "pow" | "neg", string>> = {
  plus: "sum",
  minus: "difference",
  times: "product",
  div: "quotient",
  pow: "power",
  neg: "negative",
};

/** `a + b`. */
export function add<A, B>(a: A, b: B): Sum<A, B>;
export function add(a: unknown, b: unknown): unknown {
  if (typeof a === "string" || typeof b === "string") return text(a) + text(b);
  if (!isOperand(a) && !isOperand(b)) return (a as number) + (b as number);
  return arithmetic("plus", a, b);
}

/** `a - b`. */
export function sub<A, B>(a: A, b: B): Difference<A, B>;
export function sub(a: unknown, b: unknown): unknown {
  if (!isOperand(a) && !isOperand(b)) return (a as number) - (b as number);
  return arithmetic("minus", a, b);
}

/** `a * b`. */
export function mul<A, B>(a: A, b: B): Product<A, B>;
export function mul(a: unknown, b: unknown): unknown {
  if (!isOperand(a) && !isOperand(b)) return (a as number) * (b as number);
  return arithmetic("times", a, b);
}

/** `a / b`. */
export function div<A, B>(a: A, b: B): Quotient<A, B>;
export function div(a: unknown, b: unknown): unknown {
  if (!isOperand(a) && !isOperand(b)) return (a as number) / (b as number);
  return arithmetic("div", a, b);
}

/** `a ** b`. */
export function pow<A, B>(a: A, b: B): Power<A, B>;
export function pow(a: unknown, b: unknown): unknown {
  if (!isOperand(a) && !isOperand(b)) return (a as number) ** (b as number);
  const base = isScalar(a) || !isOperand(a) ? scalarOf(a) : a;
  const exponent = wholeExponent(b);
  if (exponent !== undefined && base.pow) return base.pow(exponent);
  if (isNumeric(a) && isNumeric(b)) return power(a, b);
  throw refusal("pow", a, b);
}

/** `-a`. */
export function neg<A>(a: A): Negative<A>;
export function neg(a: unknown): unknown {
  if (!isOperand(a)) return -(a as number);
  if (a.neg) return a.neg();
  throw refusal("neg", a, undefined);
}

/** `a < b`. */
export function lt<A, B>(a: A, b: B): Order<A, B>;
export function lt(a: unknown, b: unknown): unknown {
  return isOperand(a) || isOperand(b) ? compared("<", a, b) < 0 : (a as number) < (b as number);
}

/** `a <= b`. */
export function le<A, B>(a: A, b: B): Order<A, B>;
export function le(a: unknown, b: unknown): unknown {
  return isOperand(a) || isOperand(b) ? compared("<=", a, b) <= 0 : (a as number) <= (b as number);
}

/** `a > b`. */
export function gt<A, B>(a: A, b: B): Order<A, B>;
export function gt(a: unknown, b: unknown): unknown {
  return isOperand(a) || isOperand(b) ? compared(">", a, b) > 0 : (a as number) > (b as number);
}

/** `a >= b`. */
export function ge<A, B>(a: A, b: B): Order<A, B>;
export function ge(a: unknown, b: unknown): unknown {
  return isOperand(a) || isOperand(b) ? compared(">=", a, b) >= 0 : (a as number) >= (b as number);
}

function arithmetic(name: Arithmetic, a: unknown, b: unknown): unknown {
  if (isPlainNumeric(a) && isPlainNumeric(b)) return scalarArithmetic(name, a, b);
  // A number meets a point or a function: the other one knows what to do with it.
  if (isOperand(a) && !isScalar(a) && a[name]) return a[name](b);
  if (isOperand(b) && !isScalar(b)) return reflected(name, a, b);
  throw refusal(name, a, b);
}

function isPlainNumeric(x: unknown): x is Scalar | bigint | number {
  return isNumeric(x) && (!isNumber(x) || isScalar(x));
}

/** a op b by the methods of b. */
function reflected(name: Arithmetic, a: unknown, b: Operand): unknown {
  if (name === "plus" && b.plus) return b.plus(a);
  if (name === "times" && b.times) return b.times(a);
  if (name === "minus" && b.neg) return reflected("plus", a, b.neg() as Operand);
  if (name === "div" && isNumeric(a) && isNumber(b)) return toNumber(a).div(b);
  if (name === "div" && b.inv) return reflected("times", a, b.inv() as Operand);
  throw refusal(name, a, b);
}

/** Numbers meet in the smallest kind that holds both: exact kinds stay exact. */
function scalarArithmetic(name: Arithmetic, a: Scalar | bigint | number, b: Scalar | bigint | number): unknown {
  if (isInexact(a) || isInexact(b)) return toNumber(a)[name](b as ComplexNumeric);
  const right = b instanceof Quadratic ? b : exactOf(b as Rational | bigint | number);
  const left = a instanceof Quadratic ? a : exactOf(a as Rational | bigint | number);
  if (right instanceof Quadratic && left instanceof Rational) return Quadratic.of(left, 0n, right.d)[name](right);
  return (left as Rational)[name](right as Rational);
}

function isInexact(x: unknown): boolean {
  return x instanceof Real || x instanceof Complex;
}

function exactOf(x: Rational | bigint | number): Rational {
  return x instanceof Rational ? x : Rational.of(x);
}

function scalarOf(x: unknown): Operand {
  if (isScalar(x)) return x as Operand;
  return (
    typeof x === "bigint" || Number.isSafeInteger(x) ? Rational.of(x as bigint | number) : toNumber(x as number)
  ) as Operand;
}

function compared(sign: string, a: unknown, b: unknown): number {
  const answer = comparison(a, b);
  if (answer === undefined) {
    throw new UndecidedError({
      subject: sign,
      given: `${text(a)} and ${text(b)}, whose enclosures overlap`,
      expected: "two numbers that can be told apart",
      hint: "Ask for more digits, or compare with a.overlaps(b).",
    });
  }
  return answer;
}

function comparison(a: unknown, b: unknown): number | undefined {
  if (isNumeric(a) && isNumeric(b)) {
    if (!isInexact(a) && !isInexact(b) && !(a instanceof Quadratic) && !(b instanceof Quadratic)) {
      return exactOf(a as Rational | bigint | number).compare(exactOf(b as Rational | bigint | number));
    }
    return Real.from(toNumber(a) as Real).compare(toNumber(b) as Real);
  }
  if (isOperand(a) && a.compare) return a.compare(b);
  const other = b as Operand;
  const answer = isOperand(b) && other.compare ? other.compare(a) : undefined;
  return answer === undefined ? undefined : -answer;
}

function wholeExponent(x: unknown): number | undefined {
  if (typeof x === "number") return Number.isSafeInteger(x) ? x : undefined;
  if (typeof x === "bigint") return Number(x);
  return x instanceof Rational && x.isInteger() ? Number(x.num) : undefined;
}

/** A number of the library; a class that extends one, such as a point of a torus, has its own arithmetic. */
function isScalar(x: unknown): x is Scalar {
  return isNumber(x) && SCALARS.has(x.constructor);
}

function isNumber(x: unknown): x is Scalar {
  return x instanceof Real || x instanceof Complex || x instanceof Rational || x instanceof Quadratic;
}

function isNumeric(x: unknown): x is Scalar | bigint | number {
  return typeof x === "number" || typeof x === "bigint" || isNumber(x);
}

/** A value of the library: one that answers an operator by a method. */
function isOperand(x: unknown): x is Operand {
  if (x === null || (typeof x !== "object" && typeof x !== "function")) return false;
  const { plus, times, neg } = x as Operand;
  return typeof plus === "function" || typeof times === "function" || typeof neg === "function";
}

/** The language turns an operand of a text sum into text; a library value gives the text that it prints as. */
function text(x: unknown): string {
  return isOperand(x) ? String(x) : `${x as string}`;
}

function refusal(name: Arithmetic | "pow" | "neg", a: unknown, b: unknown): TypeError {
  const pair = b === undefined ? text(a) : `${text(a)} and ${text(b)}`;
  return new TypeError(`${name}: got ${pair}, which have no ${WORDS[name]}; expected operands of kinds that do`);
}

/** The operators as one object, for code that is made from a cell. A mark `_` names the same function in `a += b`. */
export const operators = {
  add,
  sub,
  mul,
  div,
  pow,
  neg,
  lt,
  le,
  gt,
  ge,
  add_: add,
  sub_: sub,
  mul_: mul,
  div_: div,
  pow_: pow,
};
