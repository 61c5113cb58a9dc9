import { DomainError, PoleError } from "../proof/errors.ts";
import type { Ball } from "./ball.ts";
import * as ball from "./ball.ts";
import type { Disc } from "./disc.ts";
import * as disc from "./disc.ts";
import { isqrt } from "./fixed/isqrt.ts";
import { primitive, Rational } from "./rational.ts";

type Operand = Quadratic | Rational | bigint | number;

/**
 * An exact number a + b√d of a quadratic field, d a squarefree integer other than 0 and 1; d = −1 gives the Gaussian rationals.
 * The embedding is the one with √d > 0, or √d = i√|d|; `conjugate()` is the value under the other. Immutable.
 */
export class Quadratic {
  readonly a: Rational;
  readonly b: Rational;
  readonly d: bigint;

  private constructor(a: Rational, b: Rational, d: bigint) {
    this.a = a;
    this.b = b;
    this.d = d;
  }

  /** a + b√d for any integer d; square factors of d go into b. Throws DomainError if d is a square (the number is rational). */
  static of(a: Rational | bigint | number, b: Rational | bigint | number, d: bigint | number): Quadratic {
    const { root, free } = squarefree(BigInt(d));
    if (free === 1n || free === 0n) {
      throw new DomainError({
        subject: "quadratic",
        given: `√${d}, which is rational`,
        expected: "an integer that is not a square",
        argument: "d",
      });
    }
    return new Quadratic(rational(a), rational(b).times(root), free);
  }

  /** Whether b = 0. */
  isRational(): boolean {
    return this.b.num === 0n;
  }

  plus(other: Operand): Quadratic {
    const y = this.lift(other);
    return new Quadratic(this.a.plus(y.a), this.b.plus(y.b), this.d);
  }

  minus(other: Operand): Quadratic {
    return this.plus(this.lift(other).neg());
  }

  times(other: Operand): Quadratic {
    const y = this.lift(other);
    const a = this.a.times(y.a).plus(this.b.times(y.b).times(this.d));
    return new Quadratic(a, this.a.times(y.b).plus(this.b.times(y.a)), this.d);
  }

  /** Throws PoleError for a zero divisor. */
  div(other: Operand): Quadratic {
    return this.times(this.lift(other).inv());
  }

  neg(): Quadratic {
    return new Quadratic(this.a.neg(), this.b.neg(), this.d);
  }

  /** Throws PoleError for 0. */
  inv(): Quadratic {
    const n = this.norm();
    if (n.num === 0n)
      throw new PoleError({ subject: "div", given: "the divisor 0", expected: "a divisor that is not 0" });
    return new Quadratic(this.a.div(n), this.b.neg().div(n), this.d);
  }

  pow(n: number): Quadratic {
    if (!Number.isSafeInteger(n))
      throw new DomainError({ subject: "pow", given: `the exponent ${n}`, expected: "an integer" });
    let base = n < 0 ? this.inv() : this;
    let result = new Quadratic(Rational.one, Rational.zero, this.d);
    for (let k = Math.abs(n); k > 0; k = Math.floor(k / 2)) {
      if (k % 2 === 1) result = result.times(base);
      if (k > 1) base = base.times(base);
    }
    return result;
  }

  /** a − b√d. */
  conjugate(): Quadratic {
    return new Quadratic(this.a, this.b.neg(), this.d);
  }

  /** a² − d·b². */
  norm(): Rational {
    return this.a.times(this.a).minus(this.b.times(this.b).times(this.d));
  }

  /** 2a. */
  trace(): Rational {
    return this.a.times(2);
  }

  equals(other: Operand): boolean {
    if (other instanceof Quadratic && other.d !== this.d) {
      return this.isRational() && other.isRational() && this.a.equals(other.a);
    }
    const y = this.lift(other);
    return this.a.equals(y.a) && this.b.equals(y.b);
  }

  /** The sign of a real quadratic number, decided exactly; undefined for a number that is not real. */
  sign(): -1 | 0 | 1 | undefined {
    if (this.b.num === 0n) return this.a.sign();
    if (this.d < 0n) return undefined;
    const s = this.a.sign();
    const t = this.b.sign();
    if (s === 0 || s === t) return t;
    if (t === 0) return s;
    // Opposite signs: the larger of a² and d·b² decides.
    const n = this.norm().sign();
    return n > 0 ? s : t;
  }

  /** An enclosure to about prec bits, relative to the larger of its two terms. */
  enclosure(prec: number): Ball | Disc {
    const a = ball.fromRational(this.a, prec + 4);
    const root = ball.sqrt(ball.fromInt(this.d < 0n ? -this.d : this.d), prec + 4);
    const b = ball.mul(ball.fromRational(this.b, prec + 4), root, prec + 4);
    return this.d > 0n ? ball.add(a, b, prec) : disc.fromBalls(a, b, prec);
  }

  /** "1/2 + 1/2 √5", "3/4 i". */
  toString(): string {
    const unit = this.d === -1n ? "i" : this.d < 0n ? `√(${this.d})` : `√${this.d}`;
    if (this.b.num === 0n) return this.a.toString();
    const size = this.b.abs();
    const term = size.equals(1) ? unit : `${size} ${unit}`;
    if (this.a.num === 0n) return this.b.num < 0n ? `-${term}` : term;
    return `${this.a} ${this.b.num < 0n ? "-" : "+"} ${term}`;
  }

  toJSON(): { readonly kind: "quadratic"; readonly a: string; readonly b: string; readonly d: string } {
    return { kind: "quadratic", a: this.a.toString(), b: this.b.toString(), d: this.d.toString() };
  }

  [Symbol.toPrimitive](hint: string): string {
    return primitive(hint, this, "quadratic number");
  }

  private lift(other: Operand): Quadratic {
    if (!(other instanceof Quadratic)) return new Quadratic(rational(other), Rational.zero, this.d);
    if (other.d === this.d) return other;
    if (other.isRational()) return new Quadratic(other.a, Rational.zero, this.d);
    if (this.isRational()) return other;
    throw new DomainError({
      subject: "quadratic",
      given: `numbers of Q(√${this.d}) and Q(√${other.d})`,
      expected: "numbers of one field",
      hint: "real(x) or complex(x) leaves the field and keeps proved digits.",
    });
  }
}

function rational(x: Rational | bigint | number): Rational {
  return x instanceof Rational ? x : Rational.of(x);
}

/** √d as an exact number. */
export function quadratic(d: bigint | number): Quadratic {
  return Quadratic.of(0, 1, d);
}

/** d = root²·free, up to squares of primes above 10^6 that do not make d a square times small primes. */
export function squarefree(d: bigint): { root: bigint; free: bigint } {
  if (d === 0n) return { root: 0n, free: 0n };
  let rest = d < 0n ? -d : d;
  let free = d < 0n ? -1n : 1n;
  let root = 1n;
  // Once p³ exceeds the rest, it is 1, a prime, two primes or the square of one.
  for (let p = 2n; p <= 1_000_000n && p * p * p <= rest; p += p === 2n ? 1n : 2n) {
    for (; rest % (p * p) === 0n; rest /= p * p) root *= p;
    if (rest % p === 0n) {
      rest /= p;
      free *= p;
    }
  }
  const s = isqrt(rest);
  if (s * s === rest) return { root: root * s, free };
  for (const p of [2n, 3n]) {
    if (rest % (p * p) === 0n) return { root: root * p, free: free * (rest / (p * p)) };
  }
  return { root, free: free * rest };
}
