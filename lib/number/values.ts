// The numbers a user holds: Real and Complex, immutable enclosures that know how they were built.
// The data is in `ball` and `disc` (a Complex has `re` and `im` as values, so it cannot itself be a Disc).
import { DomainError } from "../proof/errors.ts";
import type { ExactOn } from "./angles.ts";
import type { Ball } from "./ball.ts";
import * as ball from "./ball.ts";
import { BIRTHS, type Birth, both, DROPPED } from "./birth.ts";
import { bitsOf, checkedDigits, provedDigits, workingPrecision } from "./context.ts";
import { type ValueData, valueData } from "./data.ts";
import { compareNodes, equalNodes, undecided } from "./decisions.ts";
import type { Disc } from "./disc.ts";
import * as disc from "./disc.ts";
import { combine, exactPart, type Field, isRealExact, power, root } from "./exactness.ts";
import { firstEvaluation } from "./first.ts";
import { type ForeignComplex, type ForeignReal, leafOf } from "./leaf.ts";
import { Elementary, type ExactAt } from "./methods.ts";
import { ABS, ARG, CONJ, DIV, IM, JOIN, MINUS, NEG, PLUS, POWER, RE, SQRT, TIMES } from "./operations.ts";
import {
  asDisc,
  DEEPEST,
  depthOver,
  type Enclosure,
  type Exact,
  enclosureOf,
  isDisc,
  jointStanding,
  type Operation,
  type Origin,
  refineEnclosure,
} from "./origin.ts";
import { Quadratic } from "./quadratic.ts";
import { primitive, Rational } from "./rational.ts";
import { complexText, realText } from "./text.ts";
import { bornOf, DEFINED, type Value } from "./value.ts";

/** Everything that stands for a real number. */
export type Numeric = Real | Rational | ForeignReal;
/** Everything that stands for a complex number. */
export type ComplexNumeric = Numeric | Complex | Quadratic | ForeignComplex;

/** A real number: exact, or an enclosure that more digits can be asked of. */
export class Real extends Elementary<Real> {
  declare readonly kept: Ball;

  constructor(
    enclosure: Ball,
    birth: Birth,
    made: Origin | Operation | undefined = birth.origin,
    depth = made === undefined ? 0 : (made as Origin).depth,
    left?: Value,
    right?: Value,
  ) {
    super(birth, made, depth, left, right);
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
    if (joinable(this, other)) {
      return joined(ball.add(this.ball, other.ball, workingPrecision()), PLUS, this, other);
    }
    return arithmetic(PLUS, "plus", this, other);
  }

  minus(other: Numeric): Real;
  minus(other: ComplexNumeric): Real | Complex;
  minus(other: ComplexNumeric): Real | Complex {
    if (joinable(this, other)) {
      return joined(ball.sub(this.ball, other.ball, workingPrecision()), MINUS, this, other);
    }
    return arithmetic(MINUS, "minus", this, other);
  }

  times(other: Numeric): Real;
  times(other: ComplexNumeric): Real | Complex;
  times(other: ComplexNumeric): Real | Complex {
    if (joinable(this, other)) {
      return joined(ball.mul(this.ball, other.ball, workingPrecision()), TIMES, this, other);
    }
    return arithmetic(TIMES, "times", this, other);
  }

  /** Throws PoleError if the divisor is 0 or cannot be told from 0. */
  div(other: Numeric): Real;
  div(other: ComplexNumeric): Real | Complex;
  div(other: ComplexNumeric): Real | Complex {
    return arithmetic(DIV, "div", this, other);
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

  protected override mapped(operation: Operation, exact: ExactAt, multiple?: ExactOn): Real {
    return realOf(apply(operation, [this], this.exact instanceof Rational ? exact(this.exact) : multiple?.(this)));
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

  toJSON(): ValueData {
    return valueData(this);
  }

  [Symbol.toPrimitive](hint: string): string {
    return primitive(hint, this, "real number");
  }
}

/** A complex number: exact, or an enclosure that more digits can be asked of. */
export class Complex extends Elementary<Complex> {
  declare readonly disc: Disc;

  constructor(enclosure: Disc, birth: Birth, origin: Origin | undefined = birth.origin) {
    super(birth, origin, origin === undefined ? 0 : origin.depth);
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
    return realOf(apply(RE, [this], this.disc.axis === "imaginary" ? Rational.zero : exactPart(this.exact, "re")));
  }

  get im(): Real {
    return realOf(apply(IM, [this], this.disc.axis === "real" ? Rational.zero : exactPart(this.exact, "im")));
  }

  plus(other: ComplexNumeric): Complex {
    return complexOf(arithmetic(PLUS, "plus", this, other));
  }

  minus(other: ComplexNumeric): Complex {
    return complexOf(arithmetic(MINUS, "minus", this, other));
  }

  times(other: ComplexNumeric): Complex {
    return complexOf(arithmetic(TIMES, "times", this, other));
  }

  /** Throws PoleError if the divisor is 0 or cannot be told from 0. */
  div(other: ComplexNumeric): Complex {
    return complexOf(arithmetic(DIV, "div", this, other));
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

  protected override mapped(operation: Operation, exact: ExactAt, multiple?: ExactOn): Complex {
    return complexOf(apply(operation, [this], this.exact instanceof Rational ? exact(this.exact) : multiple?.(this)));
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

  toJSON(): ValueData {
    return valueData(this);
  }

  [Symbol.toPrimitive](hint: string): string {
    return primitive(hint, this, "complex number");
  }
}

/** All that a value keeps besides its enclosure. */
export function birthOf(x: Real | Complex): Birth {
  return { exact: x.exact, origin: x.origin, standing: x.standing, source: x.source, dropped: x.dropped };
}

function fromForeign(x: unknown, subject: string): Real | Complex {
  const leaf = leafOf(x, subject);
  const enclosure = leaf.enclosure ?? enclosureOf(leaf.exact!, workingPrecision());
  const birth: Birth = { exact: leaf.exact, standing: leaf.standing, source: leaf.source };
  return isDisc(enclosure) ? new Complex(enclosure, birth) : new Real(enclosure, birth);
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
  return depth > DEEPEST ? newValue(enclosure, DROPPED[standing]) : newValue(enclosure, BIRTHS[standing], origin);
}

function newValue(enclosure: Enclosure, birth: Birth, origin = birth.origin): Real | Complex {
  return isDisc(enclosure) ? new Complex(enclosure, birth, origin) : new Real(enclosure, birth, origin);
}

function realOf(x: Real | Complex): Real {
  if (x instanceof Real) return x;
  throw new TypeError(`expected a real result, got ${x}`);
}

function complexOf(x: Real | Complex): Complex {
  return x instanceof Complex ? x : toComplexValue(x);
}

function arithmetic(operation: Operation, field: Field, x: Real | Complex, other: ComplexNumeric): Real | Complex {
  const y = scalar(other, field);
  return apply(operation, [x, y], combine(field, x.exact, y.exact));
}

// What follows is for sums and products of real numbers, of which a loop makes many: no detour, few objects.

function joinable(x: Real, y: ComplexNumeric): y is Real {
  // Two defined values are told by their fields, which costs less than asking for their class.
  if (x.born === DEFINED && (y as Real)?.born === DEFINED && (y as Real).kept !== undefined) return true;
  return y instanceof Real && (x.exact === undefined || y.exact === undefined);
}

function joined(enclosure: Ball, operation: Operation, x: Real, y: Real): Real {
  const depth = Math.max(x.depth, y.depth) + 1;
  if (depth > DEEPEST) return new Real(enclosure, DROPPED[both(x.standing, y.standing)]);
  const born = x.born === DEFINED && y.born === DEFINED ? DEFINED : bornOf(x, y);
  return new Real(enclosure, born, operation, depth, x, y);
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
