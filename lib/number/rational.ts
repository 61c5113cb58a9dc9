import { DomainError, PoleError } from "../proof/errors.ts";
import { absBig } from "./fixed/bits.ts";

/** An exact rational number in lowest terms; `den` is positive. Immutable. */
export class Rational {
  readonly num: bigint;
  readonly den: bigint;

  private constructor(num: bigint, den: bigint) {
    this.num = num;
    this.den = den;
  }

  static readonly zero: Rational = new Rational(0n, 1n);
  static readonly one: Rational = new Rational(1n, 1n);

  /**
   * num/den in lowest terms, from bigints or safe integers.
   * Throws PoleError for a zero denominator; DomainError for a number that is no safe integer.
   */
  static of(num: bigint | number, den: bigint | number = 1n): Rational {
    let n = integer(num);
    let d = integer(den);
    if (d === 1n) return new Rational(n, 1n);
    if (d === 0n) {
      throw new PoleError({
        subject: "rational",
        given: `the fraction ${n}/0`,
        expected: "a denominator that is not 0",
      });
    }
    if (d < 0n) {
      n = -n;
      d = -d;
    }
    const g = gcd(n, d);
    return g === 1n ? new Rational(n, d) : new Rational(n / g, d / g);
  }

  /** num/den for coprime numbers with den > 0, which is not checked: for long results whose lowest terms are known. */
  static coprime(num: bigint, den: bigint): Rational {
    return new Rational(num, den);
  }

  plus(other: Rational | bigint | number): Rational {
    const q = rational(other);
    if (this.den === q.den) return Rational.of(this.num + q.num, this.den);
    return Rational.of(this.num * q.den + q.num * this.den, this.den * q.den);
  }

  minus(other: Rational | bigint | number): Rational {
    return this.plus(rational(other).neg());
  }

  times(other: Rational | bigint | number): Rational {
    const q = rational(other);
    return Rational.of(this.num * q.num, this.den * q.den);
  }

  /** Throws PoleError for a zero divisor. */
  div(other: Rational | bigint | number): Rational {
    const q = rational(other);
    if (q.num === 0n) throw zeroDivisor();
    return Rational.of(this.num * q.den, this.den * q.num);
  }

  neg(): Rational {
    return new Rational(-this.num, this.den);
  }

  /** Throws PoleError for 0. */
  inv(): Rational {
    if (this.num === 0n) throw zeroDivisor();
    return Rational.of(this.den, this.num);
  }

  /** An integer power; 0 to a negative power throws PoleError. */
  pow(n: number): Rational {
    if (!Number.isSafeInteger(n)) {
      throw new DomainError({ subject: "pow", given: `the exponent ${n}`, expected: "an integer", argument: "n" });
    }
    const k = BigInt(Math.abs(n));
    if (n < 0) return Rational.of(this.den ** k, this.num ** k);
    return new Rational(this.num ** k, this.den ** k);
  }

  abs(): Rational {
    return this.num < 0n ? this.neg() : this;
  }

  sign(): -1 | 0 | 1 {
    return this.num > 0n ? 1 : this.num < 0n ? -1 : 0;
  }

  compare(other: Rational | bigint | number): -1 | 0 | 1 {
    const q = rational(other);
    const left = this.num * q.den;
    const right = q.num * this.den;
    return left < right ? -1 : left > right ? 1 : 0;
  }

  equals(other: Rational | bigint | number): boolean {
    const q = rational(other);
    return this.num === q.num && this.den === q.den;
  }

  isInteger(): boolean {
    return this.den === 1n;
  }

  /** The greatest integer that is not above the number. */
  floor(): bigint {
    const q = this.num / this.den;
    return this.num < 0n && q * this.den !== this.num ? q - 1n : q;
  }

  /** The nearest integer, the upper one of two. */
  round(): bigint {
    return Rational.of(2n * this.num + this.den, 2n * this.den).floor();
  }

  /** "3", "-22/7". */
  toString(): string {
    return this.den === 1n ? `${this.num}` : `${this.num}/${this.den}`;
  }

  toJSON(): { readonly kind: "rational"; readonly value: string } {
    return { kind: "rational", value: this.toString() };
  }

  /** The nearest double, for pictures only. */
  toDouble(): number {
    const n = Number(this.num);
    const d = Number(this.den);
    if (Number.isFinite(n) && Number.isFinite(d)) return n / d;
    const digits = absBig(this.num).toString(2).length - this.den.toString(2).length;
    const scaled =
      digits > 64 ? this.num / (this.den << BigInt(digits - 64)) : (this.num << BigInt(64 - digits)) / this.den;
    return Number(scaled) * 2 ** (digits - 64);
  }

  [Symbol.toPrimitive](hint: string): string {
    return primitive(hint, this, "rational number");
  }

  /**
   * Reads "3", "-22/7", "0.125", "1.5e-3", "1.5/2.5", exactly.
   * Throws DomainError with the position of the first character that does not fit.
   */
  static parse(text: string): Rational {
    const match =
      /^\s*([-+−]?)\s*(\d+\.?\d*|\.\d+)(?:[eE]([-+−]?\d+))?\s*(?:\/\s*(\d+\.?\d*|\.\d+)(?:[eE]([-+−]?\d+))?\s*)?$/.exec(
        text,
      );
    if (!match) {
      throw new DomainError({
        subject: "rational",
        given: `${JSON.stringify(text)}, unreadable from position ${badPosition(text)}`,
        expected: 'an integer, a decimal or a fraction such as "22/7"',
        argument: "text",
      });
    }
    const top = decimalValue(match[2]!, match[3]);
    const value = match[4] === undefined ? top : top.div(decimalValue(match[4], match[5]));
    return match[1] === "-" || match[1] === "−" ? value.neg() : value;
  }
}

function zeroDivisor(): PoleError {
  return new PoleError({
    subject: "div",
    given: "the divisor 0",
    expected: "a divisor away from 0",
    argument: "divisor",
  });
}

function badPosition(text: string): number {
  const good = /^\s*[-+−]?\s*\d*\.?\d*(?:[eE][-+−]?\d+)?\s*(?:\/\s*\d*\.?\d*(?:[eE][-+−]?\d+)?\s*)?/.exec(text);
  return (good?.[0].length ?? 0) + 1;
}

const MAX_DECIMAL_EXPONENT = 1_000_000;

function decimalValue(digits: string, exponent: string | undefined): Rational {
  const point = digits.indexOf(".");
  const places = point < 0 ? 0 : digits.length - point - 1;
  const e = Number((exponent ?? "0").replace("−", "-")) - places;
  if (Math.abs(e) > MAX_DECIMAL_EXPONENT) {
    throw new DomainError({
      subject: "rational",
      given: `the decimal exponent ${exponent}`,
      expected: `at most ${MAX_DECIMAL_EXPONENT} in size`,
    });
  }
  const n = BigInt(digits.replace(".", ""));
  return e >= 0 ? Rational.of(n * 10n ** BigInt(e)) : Rational.of(n, 10n ** BigInt(-e));
}

function rational(x: Rational | bigint | number): Rational {
  return x instanceof Rational ? x : Rational.of(x);
}

function integer(n: bigint | number): bigint {
  if (typeof n === "bigint") return n;
  if (Number.isSafeInteger(n)) return BigInt(n);
  throw new DomainError({
    subject: "rational",
    given: `the number ${n}`,
    expected: "a bigint or a safe integer",
    hint: 'A decimal is written as a string: rational("0.1").',
  });
}

/** Greatest common divisor, not negative. */
export function gcd(a: bigint, b: bigint): bigint {
  let x = absBig(a);
  let y = absBig(b);
  while (y) [x, y] = [y, x % y];
  return x;
}

/** The text for the hint "string"; every other conversion is refused, because it would lose digits silently. */
export function primitive(hint: string, value: { toString(): string }, kind: string): string {
  if (hint === "string") return value.toString();
  throw new TypeError(
    `a ${kind} does not turn into a plain number; use its methods (plus, minus, times, div, equals, toDouble), or write the operators in a notebook cell`,
  );
}
