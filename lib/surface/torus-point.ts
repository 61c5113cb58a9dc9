import { pointText } from "../lattice/coordinates-text.ts";
import { exactComplexOf } from "../lattice/field/exact-value.ts";
import { POINT } from "../lattice/operations.ts";
import type { PeriodLattice } from "../lattice/period-lattice.ts";
import type { Quantity } from "../lattice/quantity.ts";
import { type Coordinates, nearestRepresentative } from "../lattice/torus.ts";
import { combine } from "../number/exactness.ts";
import type { Exact } from "../number/origin.ts";
import { gcd, Rational } from "../number/rational.ts";
import { apply, Complex, type ComplexNumeric, Real, scalar } from "../number/values.ts";

/**
 * A point r·ω1 + s·ω2 of a lattice's plane with exact rational coordinates, such as ω1/3 or (ω1+ω2)/2; a number that was added is kept
 * as a remainder. It is a complex number, and it stays exact under + and − with points of its lattice, and under rational factors.
 */
export class TorusPoint extends Complex {
  readonly lattice: PeriodLattice;
  readonly coordinates: Coordinates;
  /** A number added to the exact part. */
  readonly remainder: Real | Complex | undefined;

  constructor(lattice: PeriodLattice, coordinates: Coordinates, remainder?: Real | Complex) {
    const operands = [lattice, ...coordinates, ...(remainder ? [remainder] : [])];
    const value = Complex.from(apply(POINT, operands, remainder ? undefined : exactPoint(lattice, coordinates)));
    super(value.disc, { exact: value.exact, origin: value.origin, standing: value.standing });
    this.lattice = lattice;
    this.coordinates = coordinates;
    this.remainder = remainder;
  }

  /** Whether the point is a lattice point, by its exact coordinates. */
  get isLatticePoint(): boolean {
    return !this.remainder && this.coordinates.every((q) => q.isInteger());
  }

  /** The least n >= 1 with n times the point in the lattice; undefined if a remainder is there. */
  get order(): bigint | undefined {
    if (this.remainder) return undefined;
    const [r, s] = this.coordinates;
    return (r.den * s.den) / gcd(r.den, s.den);
  }

  /** The same point of the torus with coordinates in (−1/2, 1/2]. */
  get reduced(): TorusPoint {
    return new TorusPoint(this.lattice, nearestRepresentative(this.coordinates), this.remainder);
  }

  override plus(other: ComplexNumeric): TorusPoint {
    if (other instanceof TorusPoint && other.lattice === this.lattice) {
      const [r, s] = this.coordinates;
      const [t, u] = other.coordinates;
      const rest = this.remainder && other.remainder ? sum(this.remainder, other.remainder) : undefined;
      return new TorusPoint(this.lattice, [r.plus(t), s.plus(u)], rest ?? this.remainder ?? other.remainder);
    }
    const number = scalar(other, "plus");
    return new TorusPoint(this.lattice, this.coordinates, this.remainder ? sum(this.remainder, number) : number);
  }

  override minus(other: ComplexNumeric): TorusPoint {
    return this.plus(other instanceof TorusPoint ? other.neg() : scalar(other, "minus").neg());
  }

  override neg(): TorusPoint {
    const [r, s] = this.coordinates;
    return new TorusPoint(this.lattice, [r.neg(), s.neg()], this.remainder?.neg());
  }

  override times(factor: ComplexNumeric): Complex {
    const q = rationalOf(factor);
    return q ? this.scaled(q) : super.times(factor);
  }

  override div(divisor: ComplexNumeric): Complex {
    const q = rationalOf(divisor);
    return q && q.sign() !== 0 ? this.scaled(q.inv()) : super.div(divisor);
  }

  private scaled(q: Rational): TorusPoint {
    const [r, s] = this.coordinates;
    const rest = this.remainder?.times(q);
    return new TorusPoint(this.lattice, [r.times(q), s.times(q)], rest);
  }

  /** Yes or no for points of one lattice without remainders; else as for numbers. */
  override equals(other: ComplexNumeric): boolean {
    if (other instanceof TorusPoint && other.lattice === this.lattice && !this.remainder && !other.remainder) {
      return this.coordinates.every((q, k) => q.equals(other.coordinates[k]!));
    }
    return super.equals(other);
  }

  /** "ω1/3", "(ω1 + ω2)/2", "ω2/2 + 0.25". */
  get name(): string {
    const exact = pointText(this.coordinates);
    if (!this.remainder) return exact;
    return exact === "0" ? `${this.remainder}` : `${exact} + ${this.remainder}`.replace("+ -", "- ");
  }

  override toString(): string {
    return `${this.name} = ${super.toString()}`;
  }
}

/** r ω1 + s ω2 exactly, where the periods were given exactly. */
function exactPoint({ given }: PeriodLattice, [r, s]: Coordinates): Exact | undefined {
  const part = (q: Rational, w: Quantity): Exact | undefined => {
    const exact = exactComplexOf(w);
    return q.sign() === 0 ? Rational.zero : exact && combine("times", exact, q);
  };
  if (r.sign() === 0 && s.sign() === 0) return Rational.zero;
  if (given.kind !== "periods") return undefined;
  const [x, y] = [part(r, given.w1), part(s, given.w2)];
  return x && y && combine("plus", x, y);
}

function sum(x: Real | Complex, y: Real | Complex): Real | Complex {
  return x instanceof Real ? x.plus(y) : x.plus(y);
}

function rationalOf(x: ComplexNumeric): Rational | undefined {
  if (x instanceof Rational) return x;
  if (x instanceof TorusPoint) return undefined;
  const { exact } = scalar(x, "times");
  return exact instanceof Rational ? exact : undefined;
}
