// The zero of a function between two numbers, with the proof that there is one and only one.
import { DomainError, type LibraryError, UndecidedError } from "../proof/errors.ts";
import type { Ball } from "./ball.ts";
import * as ball from "./ball.ts";
import { workingPrecision } from "./context.ts";
import { LADDER } from "./ladder.ts";
import { type Exact, mayPass, type Operation } from "./origin.ts";
import { Rational } from "./rational.ts";
import { fixedInputs, type Recorded, recordOn, slopeOn, valueOn } from "./recorded.ts";
import { apply, type ComplexNumeric, type Numeric, Real, scalar } from "./values.ts";

type RealFunction = (x: Real) => ComplexNumeric;

interface Interval {
  readonly low: Rational;
  readonly high: Rational;
}

/** An interval on which the function is monotonic and changes its sign. */
interface Bracket extends Interval {
  readonly recorded: Recorded;
}

type Found = Bracket | Rational;

const MOST_INTERVALS = 20_000;
/** A part of the search narrower than 2^-NARROWEST of the whole decides nothing more. */
const NARROWEST = 50;

/**
 * The zero of f between a and b: one that exists and is the only one, both proved.
 *
 * f is called with numbers that stand for whole intervals, and what it records is evaluated and differentiated on them. Parts where f is away
 * from 0 are left out; where f′ is, the signs at the ends tell. `.digits(n)` of the result is found by Newton's method with enclosures.
 *
 * Domain   f built from the operations and functions of numbers (and ℘, ℘′, ζ, σ), real on [a, b], with a simple zero.
 * Error    rigorous; exact, as Real of a rational number, where the zero is a short one at which f is exactly 0.
 * Cost     some dozens of evaluations at about 100 bits, then one evaluation of f and f′ a doubling of the digits.
 * Throws   DomainError for no zero or several (each is named), and for a function without a known derivative; UndecidedError for a double zero
 *          or a value at an end that cannot be told from 0.
 * Source   interval Newton method: R. E. Moore, Interval Analysis, 1966.
 * @example zero((x) => cos(x) - x, { between: [0, 1] })   // 0.7390851332151606416...
 */
export function zero(f: RealFunction, { between: [a, b] }: { readonly between: readonly [Numeric, Numeric] }): Real {
  const [low, high] = [Real.from(a), Real.from(b)];
  if (!low.lessThan(high)) {
    throw new DomainError({
      subject: "zero",
      given: `between ${low} and ${high}`,
      expected: "the smaller number first",
      argument: "between",
    });
  }
  const whole = { low: end(low, ball.lower), high: end(high, ball.upper) };
  const found = isolate(f, whole);
  if (found.length !== 1) throw notOne(found, low, high, f);
  const root = rootOf(f, found[0]!);
  if (root.lessThan(low) || root.greaterThan(high)) throw notOne([], low, high, f);
  return root;
}

function end(x: Real, side: (x: Ball) => Ball): Rational {
  return x.exact instanceof Rational ? x.exact : dyadic(side(x.ball));
}

function dyadic({ man, exp }: Ball): Rational {
  return exp >= 0 ? Rational.of(man << BigInt(exp)) : Rational.of(man, 1n << BigInt(-exp));
}

/** The zeros in order, each isolated: by an interval, or exactly where it is the end of one. */
function isolate(f: RealFunction, whole: Interval): readonly Found[] {
  const found: Found[] = [];
  const open: Interval[] = [whole];
  const least = whole.high.minus(whole.low).div(Rational.of(1n << BigInt(NARROWEST)));
  for (let count = 0; ; count++) {
    const part = open.pop();
    if (!part) return found;
    const seen = look(f, part, whole);
    if (seen.answer) found.push(...seen.answer);
    else {
      if (part.high.minus(part.low).compare(least) < 0 || count > MOST_INTERVALS) throw stuck(part, seen.failure);
      // Off the middle, where zeros seldom are.
      const cut = part.low.plus(part.high.minus(part.low).times(Rational.of(61, 128)));
      open.push({ low: cut, high: part.high }, { low: part.low, high: cut });
    }
  }
}

interface Look {
  /** The zeros in the interval, its upper end left out unless it is that of the whole; missing if it stays open. */
  readonly answer?: readonly Found[];
  readonly failure?: LibraryError;
}

function look(f: RealFunction, part: Interval, whole: Interval): Look {
  try {
    return { answer: zerosIn(f, part, whole) } as Look;
  } catch (error) {
    if (!mayPass(error)) throw error;
    return { failure: error };
  }
}

function zerosIn(f: RealFunction, part: Interval, whole: Interval): readonly Found[] | undefined {
  const prec = workingPrecision();
  const range = rangeOf(part, prec);
  const recorded = recordOn(f, range);
  if (recorded.node.exact) return constant(recorded.node.exact);
  if (isNonzero(valueOn(recorded, range, prec))) return [];
  const slope = slopeOn(recorded, range, prec);
  if (!isNonzero(slope)) return isNonzero(meanValue(recorded, range, slope, prec)) ? [] : undefined;
  const atLow = signAt(f, recorded, part.low);
  const atHigh = signAt(f, recorded, part.high);
  if (atLow === 0) return [part.low];
  if (atHigh === 0) return part.high.equals(whole.high) ? [part.high] : [];
  return atLow === atHigh ? [] : [{ ...part, recorded }];
}

function constant(value: Exact): readonly Found[] {
  if (!(value instanceof Rational && value.sign() === 0)) return [];
  throw new DomainError({ subject: "zero", given: "a function that is 0 throughout", expected: "a single zero" });
}

function rangeOf({ low, high }: Interval, prec: number): Ball {
  return ball.hull(ball.fromRational(low, prec), ball.fromRational(high, prec), prec);
}

function isNonzero(x: Ball): boolean {
  return !ball.containsZero(x);
}

/** f(m) + f′(X)(X − m), which holds f(X). */
function meanValue(recorded: Recorded, range: Ball, slope: Ball, prec: number): Ball {
  const middle = ball.midpoint(range);
  const across = ball.mul(slope, ball.sub(range, middle, prec), prec);
  return ball.add(valueOn(recorded, middle, prec), across, prec);
}

function signAt(f: RealFunction, recorded: Recorded, q: Rational): -1 | 0 | 1 {
  const exact = scalar(f(Real.from(q)), "zero").exact;
  if (exact instanceof Rational) return exact.sign();
  for (const prec of LADDER.slice(0, 7)) {
    const sign = ball.sign(valueOn(recorded, ball.fromRational(q, prec), prec));
    if (sign !== undefined) return sign;
  }
  throw new UndecidedError({
    subject: "zero",
    given: `f(${Real.from(q)}) cannot be told from 0 with ${LADDER[6]} bits`,
    expected: "a sign at the end of an interval",
    hint: "Move the ends of `between` a little.",
  });
}

/** [bracket, and the inputs that bound its accuracy]: the zero in it. */
const ZERO: Operation = {
  name: "zero",
  evaluate: ([bracket], _at, prec) => sharpened(bracket as Bracket, prec),
};

function rootOf(f: RealFunction, found: Found): Real {
  if (found instanceof Rational) return Real.from(found);
  const root = apply(ZERO, [found, ...fixedInputs(found.recorded)]) as Real;
  const candidate = simplest(root.ball);
  const exact = candidate && scalar(f(Real.from(candidate)), "zero").exact;
  return exact instanceof Rational && exact.sign() === 0 ? Real.from(candidate!) : root;
}

/** The zero with about `prec` bits, or as many as the inputs allow. */
function sharpened({ recorded, ...interval }: Bracket, prec: number): Ball {
  let x = rangeOf(interval, 64);
  for (let bits = 64; ; ) {
    const next = newton(recorded, x, bits);
    const gained = ball.radius(next).man === 0n ? Infinity : narrowing(x, next);
    x = next;
    if (ball.bits(x) >= prec) return x;
    if (gained >= 1) continue;
    if (bits > 2 * prec + 64) return x;
    bits *= 2;
  }
}

/** Bits by which the radius shrank. */
function narrowing(x: Ball, next: Ball): number {
  return ball.magnitude(ball.radius(x)) - ball.magnitude(ball.radius(next));
}

/** One step: m − f(m)/f′(X) within X, or the half of X where the sign changes, if that is less. */
function newton(recorded: Recorded, x: Ball, bits: number): Ball {
  const prec = bits + 32;
  const middle = ball.midpoint(x);
  const value = valueOn(recorded, middle, prec);
  const slope = slopeOn(recorded, x, prec);
  if (!isNonzero(slope)) return x;
  const next = common(x, ball.sub(middle, ball.div(value, slope, prec), prec), prec);
  const side = ball.sign(value);
  if (narrowing(x, next) > 1 || side === undefined) return next;
  const isBelow = side === ball.sign(slope);
  return isBelow ? ball.hull(ball.lower(x), middle, prec) : ball.hull(middle, ball.upper(x), prec);
}

/** The intersection of two balls that are known to share a number. */
function common(x: Ball, y: Ball, prec: number): Ball {
  const greater = (a: Ball, b: Ball) => ball.compare(a, b) === 1;
  const [lowX, lowY, highX, highY] = [ball.lower(x), ball.lower(y), ball.upper(x), ball.upper(y)];
  const low = greater(lowX, lowY) ? lowX : lowY;
  const high = greater(highX, highY) ? highY : highX;
  return ball.hull(low, high, prec + 64);
}

/** The rational number of least denominator in the ball, if it is a short one for the ball's width: by continued fractions. */
function simplest(x: Ball): Rational | undefined {
  const q = between(dyadic(ball.lower(x)), dyadic(ball.upper(x)), 64);
  const room = -ball.magnitude(ball.radius(x));
  return q && 3 * q.den.toString(2).length < room ? q : undefined;
}

function between(low: Rational, high: Rational, depth: number): Rational | undefined {
  if (depth === 0) return undefined;
  const whole = low.floor();
  if (low.equals(whole) || high.compare(whole + 1n) >= 0) return Rational.of(low.equals(whole) ? whole : whole + 1n);
  const rest = between(high.minus(whole).inv(), low.minus(whole).inv(), depth - 1);
  return rest?.inv().plus(whole);
}

function notOne(found: readonly Found[], low: Real, high: Real, f: RealFunction): DomainError {
  const places = found.map((one) => shown(rootOf(f, one)));
  return new DomainError({
    subject: "zero",
    given: found.length
      ? `${found.length} zeros between ${shown(low)} and ${shown(high)}, at ${places.join(", ")}`
      : `no zero between ${shown(low)} and ${shown(high)}, as proved by enclosures`,
    expected: "exactly one",
    hint: found.length ? "Narrow `between` to one of them." : "Look where f changes its sign.",
    argument: "between",
  });
}

function shown(x: Real): string {
  return x.exact ? String(x) : String(ball.toDouble(x.ball).toPrecision(6));
}

function stuck({ low, high }: Interval, failure: LibraryError | undefined): UndecidedError {
  const place = ball.toDouble(ball.fromRational(low.plus(high).div(2), 64)).toPrecision(6);
  return new UndecidedError({
    subject: "zero",
    given: failure
      ? `near ${place} the function stays open (${failure.subject}: ${failure.given})`
      : `near ${place} neither f nor f′ is away from 0`,
    expected: "a simple zero, or none",
    hint: failure
      ? "Keep poles and cuts out of `between`."
      : "It may be a double zero: look for a zero of the derivative there.",
  });
}
