import { DomainError, PoleError } from "../proof/errors.ts";
import type { Ball } from "./ball.ts";
import * as ball from "./ball.ts";
import type { Disc } from "./disc.ts";
import * as disc from "./disc.ts";
import { absBig } from "./fixed/bits.ts";
import { isqrt } from "./fixed/isqrt.ts";
import { primitive, Rational } from "./rational.ts";
import { squarefree } from "./squarefree.ts";

type Operand = Quadratic | Rational | bigint | number;

/**
 * An exact number a + b√d of a quadratic field, d an integer that is no square; d = −1 gives the Gaussian rationals. d is squarefree as far as
 * `squarefree` finds its factors; fields that are equal in spite of different d are known as one, since the product of the two is a square.
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
    const [x, y] = this.pair(other);
    return new Quadratic(x.a.plus(y.a), x.b.plus(y.b), x.d);
  }

  minus(other: Operand): Quadratic {
    const [x, y] = this.pair(other);
    return new Quadratic(x.a.minus(y.a), x.b.minus(y.b), x.d);
  }

  times(other: Operand): Quadratic {
    const [x, y] = this.pair(other);
    const a = x.a.times(y.a).plus(x.b.times(y.b).times(x.d));
    return new Quadratic(a, x.a.times(y.b).plus(x.b.times(y.a)), x.d);
  }

  /** Throws PoleError for a zero divisor. */
  div(other: Operand): Quadratic {
    const [x, y] = this.pair(other);
    return x.times(y.inv());
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

  /** The values under the two embeddings √d > 0 (or √d = i√|d|) and √d < 0 (or −i√|d|). */
  get embeddings(): readonly [Quadratic, Quadratic] {
    return [this, this.conjugate()];
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
    const y = other instanceof Quadratic ? other.over(this.d) : this.withRational(rational(other));
    if (!y) return false;
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

  /** The same number with another d of the same field (that of any field, if it is rational); undefined if it is not in that field. */
  over(d: bigint): Quadratic | undefined {
    if (d === this.d) return this;
    if (this.isRational()) return new Quadratic(this.a, Rational.zero, d);
    if (d < 0n !== this.d < 0n) return undefined;
    // √d' = √(d·d')/|d| · √d.
    const product = d * this.d;
    const root = isqrt(product);
    if (root * root !== product) return undefined;
    return new Quadratic(this.a, this.b.times(Rational.of(root, absBig(d))), d);
  }

  /** A rational number as one of the field of √d, with a d that another number of it has. */
  withRational(a: Rational): Quadratic {
    return new Quadratic(a, Rational.zero, this.d);
  }

  /** Both in one field. Throws DomainError if there is none. */
  private pair(other: Operand): readonly [Quadratic, Quadratic] {
    if (!(other instanceof Quadratic)) return [this, this.withRational(rational(other))];
    if (other.d === this.d) return [this, other];
    const y = other.over(this.d);
    if (y) return [this, y];
    if (this.isRational()) return [other.withRational(this.a), other];
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
