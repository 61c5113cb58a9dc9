// Simple numbers inside an enclosure: at most one is looked for in each class, the simplest.
import type { Ball } from "../ball.ts";
import * as ball from "../ball.ts";
import type { Disc } from "../disc.ts";
import * as disc from "../disc.ts";
import { absBig, scaled } from "../fixed/bits.ts";
import { isqrt } from "../fixed/isqrt.ts";
import { asDisc, type Enclosure, type Exact, isDisc } from "../origin.ts";
import { Quadratic } from "../quadratic.ts";
import { gcd, Rational } from "../rational.ts";
import { reducedBasis } from "./reduction.ts";

/** The rational number of least denominator in the ball (two continued fractions in step); undefined if its height is above the bound. */
export function simplestRational(x: Ball, height: bigint): Rational | undefined {
  const low = dyadic(ball.lower(x));
  const high = dyadic(ball.upper(x));
  const q = between(low, high);
  return heightOf(q) <= height ? q : undefined;
}

function dyadic(x: Ball): Rational {
  return x.exp >= 0 ? Rational.of(x.man << BigInt(x.exp)) : Rational.of(x.man, 1n << BigInt(-x.exp));
}

function between(low: Rational, high: Rational): Rational {
  if (low.sign() <= 0 && high.sign() >= 0) return Rational.zero;
  if (high.sign() < 0) return between(high.neg(), low.neg()).neg();
  const whole = low.floor();
  if (low.den === 1n) return low;
  if (high.compare(whole + 1n) >= 0) return Rational.of(whole + 1n);
  return between(high.minus(whole).inv(), low.minus(whole).inv()).inv().plus(whole);
}

/** max(|num|, den). */
export function heightOf(q: Rational): bigint {
  const n = absBig(q.num);
  if (n > q.den) return n;
  return q.den;
}

/** A primitive quadratic polynomial a x² + b x + c, a > 0. */
export type QuadraticPolynomial = readonly [a: bigint, b: bigint, c: bigint];

/** An integer polynomial of degree 2 with coefficients within the bound whose value at the enclosure may be 0, by lattice reduction; the smallest found. */
export function quadraticRelation(x: Enclosure, height: bigint): QuadraticPolynomial | undefined {
  const bits = Math.max(4, absoluteBits(x));
  const z = asDisc(x);
  const square = disc.sqr(z, bits + 64);
  const entry = (part: Ball): bigint => scaled(part.man, part.exp + bits);
  const columns = isDisc(x) && x.axis !== "real" ? [disc.real, disc.imag] : [disc.real];
  const rows = [square, z, disc.one].map((power, k) => [
    ...[0, 1, 2].map((c) => (c === k ? 1n : 0n)),
    ...columns.map((f) => entry(f(power))),
  ]);
  for (const [a, b, c] of reducedBasis(rows) as [bigint, bigint, bigint][]) {
    const polynomial = normal(a, b, c);
    if (polynomial?.every((n) => absBig(n) <= height) && mayVanish(polynomial, z)) return polynomial;
  }
  return undefined;
}

/** Bits after the binary point that are known. */
function absoluteBits(x: Enclosure): number {
  return x.rad === 0 ? 64 : -x.exp - Math.ceil(Math.log2(x.rad));
}

function normal(a: bigint, b: bigint, c: bigint): QuadraticPolynomial | undefined {
  if (a === 0n) return undefined;
  const g = gcd(gcd(a, b), c) * (a < 0n ? -1n : 1n);
  return [a / g, b / g, c / g];
}

function mayVanish([a, b, c]: QuadraticPolynomial, z: Disc): boolean {
  const prec = Math.max(64, disc.bits(z) + 64);
  const value = disc.add(
    disc.mul(disc.add(disc.mulInt(z, a, prec), disc.fromBall(ball.fromInt(b)), prec), z, prec),
    disc.fromBall(ball.fromInt(c)),
    prec,
  );
  return disc.containsZero(value);
}

/** The root of the polynomial that the enclosure meets. */
export function rootInside([a, b, c]: QuadraticPolynomial, x: Enclosure): Exact | undefined {
  const discriminant = b * b - 4n * a * c;
  const middle = Rational.of(-b, 2n * a);
  if (discriminant >= 0n && isqrt(discriminant) ** 2n === discriminant) return undefined;
  const prec = Math.max(64, (isDisc(x) ? disc.bits(x) : ball.bits(x)) + 64);
  const roots = [1n, -1n].map((sign) => Quadratic.of(middle, Rational.of(sign, 2n * a), discriminant));
  return roots.find((root) => disc.overlaps(asDisc(root.enclosure(prec)), asDisc(x)));
}
