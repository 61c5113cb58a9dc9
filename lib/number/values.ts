// The numbers a user holds: Real and Complex, immutable enclosures that know how they were built.
// The data is in `ball` and `disc` (a Complex has `re` and `im` as values, so it cannot itself be a Disc).
import { DomainError } from "../proof/errors.ts";
import type { Ball } from "./ball.ts";
import * as ball from "./ball.ts";
import { bitsOf, checkedDigits, provedDigits, workingPrecision } from "./context.ts";
import { compareNodes, equalNodes, undecided } from "./decisions.ts";
import type { Disc } from "./disc.ts";
import * as disc from "./disc.ts";
import { combine, type Field, isRealExact, power, root } from "./exactness.ts";
import { type ForeignComplex, type ForeignReal, leafOf } from "./leaf.ts";
import { ABS, ARG, CONJ, DIV, IM, JOIN, MINUS, NEG, PLUS, POWER, RE, SQRT, TIMES } from "./operations.ts";
import {
  accuracy,
  asDisc,
  DEEPEST,
  depthOver,
  type Enclosure,
  type Exact,
  evaluate,
  isDisc,
  jointStanding,
  mayPass,
  measuredInputs,
  type Node,
  type NumberStanding,
  type Operation,
  type Origin,
  refinable,
  refineEnclosure,
} from "./origin.ts";
import { Quadratic } from "./quadratic.ts";
import { primitive, Rational } from "./rational.ts";
import { complexText, realText } from "./text.ts";

/** Everything that stands for a real number. */
export type Numeric = Real | Rational | ForeignReal;
/** Everything that stands for a complex number. */
export type ComplexNumeric = Numeric | Complex | Quadratic | ForeignComplex;

interface Birth {
  readonly exact?: Exact | undefined;
  readonly origin?: Origin | undefined;
  readonly standing: NumberStanding;
  readonly source?: string | undefined;
  /** Digits that a display shows, if not those of the context. */
  readonly asked?: number | undefined;
}

abstract class Value implements Node {
  abstract readonly enclosure: Enclosure;
  readonly exact: Exact | undefined;
  readonly origin: Origin | undefined;
  readonly standing: NumberStanding;
  readonly source: string | undefined;
  readonly asked: number | undefined;

  protected constructor(birth: Birth) {
    this.exact = birth.exact;
    this.origin = birth.origin;
    this.standing = birth.standing;
    this.source = birth.source;
    this.asked = birth.asked;
  }

  /** The measured inputs behind the value, as they were written. */
  get inputs(): readonly string[] {
    return measuredInputs(this);
  }
}

/** A real number: exact, or an enclosure that more digits can be asked of. */
export class Real extends Value {
  protected readonly kept: Ball;

  constructor(enclosure: Ball, birth: Birth) {
    super(birth);
    this.kept = enclosure;
  }

  /** The enclosure as data. */
  get ball(): Ball {
    return this.kept;
  }

  /** Reads anything that stands for a real number; see `leafOf`. Throws TypeError for a complex one. */
  static from(x: Numeric): Real {
    if (x instanceof Real) return x;
    const value = fromForeign(x, "real");
    if (value instanceof Real) return value;
    throw new TypeError(`real: got the complex number ${value}; expected a real one`);
  }

  override get enclosure(): Ball {
    return this.ball;
  }

  plus(other: Numeric): Real;
  plus(other: ComplexNumeric): Real | Complex;
  plus(other: ComplexNumeric): Real | Complex {
    return arithmetic(PLUS, "plus", ball.add, this, other);
  }

  minus(other: Numeric): Real;
  minus(other: ComplexNumeric): Real | Complex;
  minus(other: ComplexNumeric): Real | Complex {
    return arithmetic(MINUS, "minus", ball.sub, this, other);
  }

  times(other: Numeric): Real;
  times(other: ComplexNumeric): Real | Complex;
  times(other: ComplexNumeric): Real | Complex {
    return arithmetic(TIMES, "times", ball.mul, this, other);
  }

  /** Throws PoleError if the divisor is 0 or cannot be told from 0. */
  div(other: Numeric): Real;
  div(other: ComplexNumeric): Real | Complex;
  div(other: ComplexNumeric): Real | Complex {
    return arithmetic(DIV, "div", ball.div, this, other);
  }

  neg(): Real {
    return realOf(apply(NEG, [this], this.exact?.neg()));
  }

  abs(): Real {
    if (this.exact) return this.sign() === -1 ? this.neg() : this;
    return realOf(apply(ABS, [this]));
  }

  /** An integer power; for other exponents see the function `pow`. */
  pow(n: number): Real {
    return realOf(apply(POWER, [this, checkedExponent(n)], power(this.exact, n)));
  }

  /** Throws DomainError for a negative number; complex(x).sqrt() takes its root. */
  sqrt(): Real {
    const exact = root(this.exact);
    return realOf(apply(SQRT, [this], exact && isRealExact(exact) ? exact : undefined));
  }

  /** -1, 0, 1, or undefined if the enclosure, refined as far as a display would be, allows more than one. */
  sign(): -1 | 0 | 1 | undefined {
    return compareNodes(this, undefined);
  }

  /** -1, 0, 1 for <, =, >; undefined if refined enclosures still overlap. */
  compare(other: Numeric): -1 | 0 | 1 | undefined {
    return compareNodes(this, Real.from(other));
  }

  /** Throws UndecidedError if neither < nor >= can be shown. */
  lessThan(other: Numeric): boolean {
    return ordered(this, Real.from(other), "<", -1);
  }

  /** Throws UndecidedError if neither > nor <= can be shown. */
  greaterThan(other: Numeric): boolean {
    return ordered(this, Real.from(other), ">", 1);
  }

  /** Throws UndecidedError if neither <= nor > can be shown. */
  atMost(other: Numeric): boolean {
    return !this.greaterThan(other);
  }

  /** Throws UndecidedError if neither >= nor < can be shown. */
  atLeast(other: Numeric): boolean {
    return !this.lessThan(other);
  }

  /**
   * Yes by an exact argument (equal exact values, or the same construction), no by disjoint enclosures.
   * Throws UndecidedError if neither can be shown.
   */
  equals(other: ComplexNumeric): boolean {
    return equalNodes(this, scalar(other, "equals"));
  }

  /** Whether every number that `other` can be lies in this enclosure. */
  contains(other: Numeric): boolean {
    const y = Real.from(other);
    return ball.contains(this.ball, y.exact instanceof Rational ? y.exact : y.ball);
  }

  overlaps(other: ComplexNumeric): boolean {
    const y = scalar(other, "overlaps");
    return y instanceof Real ? ball.overlaps(this.ball, y.ball) : disc.overlaps(asDisc(this.ball), y.disc);
  }

  /** The greatest integer that is not above the number, or undefined if the enclosure holds more than one answer. */
  floor(): bigint | undefined {
    if (this.exact instanceof Rational) return this.exact.floor();
    return ball.floor(this.ball);
  }

  /** The centre of the enclosure, as an exact value. */
  get midpoint(): Real {
    return exactBall(this.ball);
  }

  /** The radius of the enclosure, rounded up, as an exact value. */
  get radius(): Real {
    return exactBall(ball.radius(this.ball));
  }

  /**
   * The same number with n proved digits, computed through its origin.
   * Error    a measured value comes back as sharp as its input allows; it is shown with its radius.
   * Throws   PrecisionError if the digits are not reached with 64n + 4096 bits, as for a hidden 0.
   */
  digits(n: number): Real {
    checkedDigits("digits", n);
    return new Real(refine(this, bitsOf(n) + 4) as Ball, { ...birthOf(this), asked: n });
  }

  /** The midpoint as a double, for pictures and plain code: not proved. */
  toDouble(): number {
    return this.exact instanceof Rational ? this.exact.toDouble() : ball.toDouble(this.ball);
  }

  override toString(): string {
    return realText(this, this.asked ?? provedDigits());
  }

  [Symbol.toPrimitive](hint: string): string {
    return primitive(hint, this, "real number");
  }
}

/** A complex number: exact, or an enclosure that more digits can be asked of. */
export class Complex extends Value {
  readonly disc: Disc;

  constructor(enclosure: Disc, birth: Birth) {
    super(birth);
    this.disc = enclosure;
  }

  /** Reads anything that stands for a complex number; a real one becomes complex. */
  static from(x: ComplexNumeric): Complex {
    const value = scalar(x, "complex");
    return value instanceof Complex ? value : toComplexValue(value);
  }

  /** re + i·im of two real numbers. */
  static of(re: Numeric, im: Numeric): Complex {
    const x = Real.from(re);
    const y = Real.from(im);
    const exact =
      x.exact instanceof Rational && y.exact instanceof Rational ? Quadratic.of(x.exact, y.exact, -1) : undefined;
    return complexOf(apply(JOIN, [x, y], exact));
  }

  override get enclosure(): Disc {
    return this.disc;
  }

  /** Whether the number is known to be exactly real. */
  get isReal(): boolean {
    return this.disc.axis === "real";
  }

  get re(): Real {
    return realOf(apply(RE, [this], this.disc.axis === "imaginary" ? Rational.zero : part(this.exact, "re")));
  }

  get im(): Real {
    return realOf(apply(IM, [this], this.disc.axis === "real" ? Rational.zero : part(this.exact, "im")));
  }

  plus(other: ComplexNumeric): Complex {
    return complexOf(arithmetic(PLUS, "plus", ball.add, this, other));
  }

  minus(other: ComplexNumeric): Complex {
    return complexOf(arithmetic(MINUS, "minus", ball.sub, this, other));
  }

  times(other: ComplexNumeric): Complex {
    return complexOf(arithmetic(TIMES, "times", ball.mul, this, other));
  }

  /** Throws PoleError if the divisor is 0 or cannot be told from 0. */
  div(other: ComplexNumeric): Complex {
    return complexOf(arithmetic(DIV, "div", ball.div, this, other));
  }

  neg(): Complex {
    return complexOf(apply(NEG, [this], this.exact?.neg()));
  }

  /** The argument in (−π, π]; errors as for the function `arg`. */
  arg(): Real {
    return realOf(apply(ARG, [this]));
  }

  conj(): Complex {
    const exact = this.exact instanceof Quadratic && this.exact.d < 0n ? this.exact.conjugate() : this.exact;
    return complexOf(apply(CONJ, [this], exact));
  }

  abs(): Real {
    const e = this.exact;
    const norm = e instanceof Quadratic ? (e.d < 0n ? e.norm() : undefined) : e?.times(e);
    const exact = root(norm);
    return realOf(apply(ABS, [this], exact && isRealExact(exact) ? exact : undefined));
  }

  /** An integer power; for other exponents see the function `pow`. */
  pow(n: number): Complex {
    return complexOf(apply(POWER, [this, checkedExponent(n)], power(this.exact, n)));
  }

  /** The principal root, real part >= 0; the cut (negative real axis) belongs to the upper side. */
  sqrt(): Complex {
    return complexOf(apply(SQRT, [this], root(this.exact)));
  }

  /** As for Real. */
  equals(other: ComplexNumeric): boolean {
    return equalNodes(this, scalar(other, "equals"));
  }

  contains(other: ComplexNumeric): boolean {
    const y = scalar(other, "contains");
    return disc.contains(this.disc, y.exact instanceof Rational ? y.exact : asDisc(y.enclosure));
  }

  overlaps(other: ComplexNumeric): boolean {
    return disc.overlaps(this.disc, asDisc(scalar(other, "overlaps").enclosure));
  }

  get midpoint(): Complex {
    const d = this.disc;
    return new Complex({ ...d, rad: 0 }, { standing: "exact" });
  }

  get radius(): Real {
    return exactBall(ball.radius({ man: 0n, exp: this.disc.exp, rad: this.disc.rad }));
  }

  /** As for Real, with digits relative to |z|. */
  digits(n: number): Complex {
    checkedDigits("digits", n);
    return new Complex(asDisc(refine(this, bitsOf(n) + 4)), { ...birthOf(this), asked: n });
  }

  /** The midpoint as doubles: not proved. */
  toDouble(): [number, number] {
    return disc.toDouble(this.disc);
  }

  override toString(): string {
    return complexText(this, this.asked ?? provedDigits());
  }

  [Symbol.toPrimitive](hint: string): string {
    return primitive(hint, this, "complex number");
  }
}

function birthOf(x: Value): Birth {
  return { exact: x.exact, origin: x.origin, standing: x.standing, source: x.source };
}

function fromForeign(x: unknown, subject: string): Real | Complex {
  const leaf = leafOf(x, subject);
  const enclosure = leaf.enclosure ?? enclosureOf(leaf.exact!, workingPrecision());
  const birth: Birth = { exact: leaf.exact, standing: leaf.standing, source: leaf.source };
  return isDisc(enclosure) ? new Complex(enclosure, birth) : new Real(enclosure, birth);
}

function enclosureOf(exact: Exact, prec: number): Enclosure {
  return exact instanceof Rational ? ball.fromRational(exact, prec) : exact.enclosure(prec);
}

/** Real or Complex, whichever the input is; what is accepted is said at `leafOf`. */
export function scalar(x: ComplexNumeric, subject: string): Real | Complex {
  return x instanceof Real || x instanceof Complex ? x : fromForeign(x, subject);
}

function toComplexValue(x: Real): Complex {
  return new Complex(disc.fromBall(x.ball), birthOf(x));
}

function exactBall(x: Ball): Real {
  const exact =
    Math.abs(x.exp) > 100_000
      ? undefined
      : x.exp >= 0
        ? Rational.of(x.man << BigInt(x.exp))
        : Rational.of(x.man, 1n << BigInt(-x.exp));
  return new Real(x, { exact, standing: "exact" });
}

/**
 * A new value: the operation at the working precision of the context, with the record of how it was built, unless that would be
 * deeper than 256. Where the enclosures of the operands are too wide (a straddled pole or cut), they are refined.
 *
 * @param exact the exact result, if it is known.
 */
export function apply(operation: Operation, operands: readonly unknown[], exact?: Exact): Real | Complex {
  const prec = workingPrecision();
  if (exact) {
    const enclosure = enclosureOf(exact, prec);
    const standing =
      exact instanceof Rational || jointStanding(operands) === "defined" ? "exact" : jointStanding(operands);
    return newValue(enclosure, { exact, standing });
  }
  const depth = depthOver(operands);
  const origin: Origin = { operation, operands, depth };
  const standing = jointStanding(operands);
  const enclosure = firstEvaluation({ enclosure: ball.zero, origin, standing }, prec);
  return newValue(enclosure, { origin: depth > DEEPEST ? undefined : origin, standing });
}

const FIRST_TRIES = 6;

function firstEvaluation(node: Node, prec: number): Enclosure {
  const { operation, operands } = node.origin!;
  const direct = (operand: unknown): Enclosure => {
    const y = operand as Partial<Node>;
    return y.enclosure ?? evaluate({ ...node, origin: undefined, exact: operand as Exact }, prec);
  };
  try {
    return operation.evaluate(
      operands,
      (x) => (typeof x === "object" && x !== null ? direct(x) : ball.fromInt(x as bigint)),
      prec,
    );
  } catch (error) {
    if (
      !mayPass(error) ||
      !operands.some((x) => x instanceof Value && accuracy(x.enclosure) !== Infinity && refinable(x))
    )
      throw error;
  }
  for (let bits = 2 * prec, k = 0; ; bits *= 2, k++) {
    try {
      return evaluate({ ...node, enclosure: { man: 0n, exp: 0, rad: 1 } }, bits);
    } catch (error) {
      if (!mayPass(error) || k === FIRST_TRIES) throw error;
    }
  }
}

function newValue(enclosure: Enclosure, birth: Birth): Real | Complex {
  return isDisc(enclosure) ? new Complex(enclosure, birth) : new Real(enclosure, birth);
}

function realOf(x: Real | Complex): Real {
  if (x instanceof Real) return x;
  throw new TypeError(`expected a real result, got ${x}`);
}

function complexOf(x: Real | Complex): Complex {
  return x instanceof Complex ? x : toComplexValue(x);
}

function arithmetic(
  operation: Operation,
  field: Field,
  quick: (x: Ball, y: Ball, prec: number) => Ball,
  x: Real | Complex,
  other: ComplexNumeric,
): Real | Complex {
  const y = scalar(other, field);
  const exact = x.exact && y.exact ? combine(field, x.exact, y.exact) : undefined;
  if (exact || operation === DIV || x instanceof Complex || y instanceof Complex)
    return apply(operation, [x, y], exact);
  const depth = Math.max(x.origin?.depth ?? 0, y.origin?.depth ?? 0) + 1;
  const origin: Origin | undefined = depth > DEEPEST ? undefined : { operation, operands: [x, y], depth };
  return new Real(quick(x.ball, y.ball, workingPrecision()), { origin, standing: both(x.standing, y.standing) });
}

function both(a: NumberStanding, b: NumberStanding): NumberStanding {
  if (a === "double" || b === "double") return "double";
  return a === "measured" || b === "measured" ? "measured" : "defined";
}

function part(exact: Exact | undefined, which: "re" | "im"): Exact | undefined {
  if (!exact) return undefined;
  if (exact instanceof Rational || exact.d > 0n) return which === "re" ? exact : Rational.zero;
  if (which === "re") return exact.a;
  return exact.d === -1n ? exact.b : Quadratic.of(0, exact.b, -exact.d);
}

function checkedExponent(n: number): number {
  if (Number.isSafeInteger(n)) return n;
  throw new DomainError({
    subject: "pow",
    given: `the exponent ${n}`,
    expected: "an integer",
    hint: "pow(x, y) takes any exponent.",
  });
}

function ordered(x: Real, y: Real, relation: string, wanted: -1 | 1): boolean {
  const c = compareNodes(x, y);
  if (c !== undefined) return c === wanted;
  throw undecided(x, y, relation);
}

/**
 * An enclosure of x with at least prec relative bits, through its origin if need be; measured input gives what it allows.
 * Throws PrecisionError if 4·prec + 4096 bits do not do.
 */
export function refine(x: Real | Complex, prec: number): Enclosure {
  return refineEnclosure(x, prec);
}

/** x with n proved digits: x.digits(n) as a function. */
export function provedTo<T extends Real | Complex>(x: T, n: number): T {
  return x.digits(n) as T;
}
