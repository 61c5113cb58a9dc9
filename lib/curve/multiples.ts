// Large multiples of a rational point through the values of its division polynomials: whole numbers, no fraction to cancel on the way.

import { exactSqrt, lcm } from "../algebra/integer.ts";
import { rationals as Q } from "../algebra/rationals.ts";
import { gcd, Rational } from "../number/rational.ts";
import { type Affine, multiplyPoint } from "./group.ts";
import { type Coefficients, changeModel, invariantsOf } from "./weierstrass.ts";

/** From this factor on the whole-number route is the faster one. */
const WORTHWHILE = 20n;

/**
 * n·P over Q.
 *
 * Domain   right for every point, but meant for one of infinite order: ψ_n of a torsion point grows although nP does not.
 * Method   on an integral model on which P is integral, ψ_k = ψ_k(P) is whole, eight neighbours at a time by doubling; then
 *          x(nP) = x − ψ_(n−1)ψ_(n+1)/ψ_n² and 2y + a1x + a3 = ψ_(2n)/ψ_n⁴. Numerator and denominator share primes of bad
 *          reduction only, so a gcd with powers of Δ puts them into lowest terms.
 * Cost     log n products of numbers of n² ĥ(P) digits.
 * Source   Silverman AEC, exercise 3.7; the gcd: Ayad 1992; the doubling: Shipsey 2000.
 */
export function rationalMultiple(a: Coefficients<Rational>, n: bigint, P: Affine<Rational>): Affine<Rational> {
  const size = n < 0n ? -n : n;
  if (!P || size < WORTHWHILE) return multiplyPoint(Q, a, n, P);
  const d = integralScale(a, P);
  const u = Rational.of(1n, d);
  const model = changeModel(Q, a, { u, r: Q.zero, s: Q.zero, t: Q.zero });
  const x = P[0].times(d * d).num;
  const y = P[1].times(d ** 3n).num;
  const [a1, , a3] = model.map((c) => c.num) as [bigint, bigint, bigint, bigint, bigint];
  if (2n * y + a1 * x + a3 === 0n) return size % 2n === 0n ? undefined : P;
  const block = blockAt(startOf(model, x, y), size);
  const psi = block[CENTRE]!;
  if (psi === 0n) return undefined;
  const numerator = x * psi * psi - block[CENTRE - 1]! * block[CENTRE + 1]!;
  const twice = evenTerm(block, CENTRE, 2n * y + a1 * x + a3) / psi; // ψ_(2n)/ψ_n
  const ordinate = (twice - a1 * numerator * psi - a3 * psi ** 3n) / 2n; // y·ψ_n³
  const discriminant = invariantsOf(Q, model).discriminant.num;
  const common = commonPart(numerator, psi, discriminant);
  const denominator = absolute(psi / common);
  const sign = psi < 0n ? -1n : 1n;
  const X = overSmall(numerator / common ** 2n, denominator ** 2n, d * d);
  const Y = overSmall((sign * ordinate) / common ** 3n, denominator ** 3n, d ** 3n);
  return n < 0n ? [X, Y.plus(a[0].times(X)).plus(a[2]).neg()] : [X, Y];
}

/** d with a_k d^k, x d² and y d³ whole. */
function integralScale(a: Coefficients<Rational>, [x]: readonly [Rational, Rational]): bigint {
  const d = a.reduce((total, c) => lcm(total, c.den), 1n);
  // On an integral model the denominator of x is a square.
  return d * exactSqrt(x.times(d * d).den)!;
}

/** ψ_(k−3), ..., ψ_(k+4); the middle is at CENTRE. */
type Block = readonly bigint[];
const CENTRE = 3;

interface Start {
  readonly block: Block;
  readonly psi2: bigint;
}

/** The block around ψ_1. */
function startOf(model: Coefficients<Rational>, x: bigint, y: bigint): Start {
  const inv = invariantsOf(Q, model);
  const [b2, b4, b6, b8] = [inv.b2.num, inv.b4.num, inv.b6.num, inv.b8.num];
  const psi2 = 2n * y + model[0].num * x + model[2].num;
  const psi3 = 3n * x ** 4n + b2 * x ** 3n + 3n * b4 * x * x + 3n * b6 * x + b8;
  const half4 =
    2n * x ** 6n +
    b2 * x ** 5n +
    5n * b4 * x ** 4n +
    10n * b6 * x ** 3n +
    10n * b8 * x * x +
    (b2 * b8 - b4 * b6) * x +
    (b4 * b8 - b6 * b6);
  const psi4 = psi2 * half4;
  const psi5 = psi4 * psi2 ** 3n - psi3 ** 3n;
  return { block: [-psi2, -1n, 0n, 1n, psi2, psi3, psi4, psi5], psi2 };
}

/** The block around ψ_n, by the binary digits of n. */
function blockAt({ block, psi2 }: Start, n: bigint): Block {
  let current = block;
  for (const digit of n.toString(2).slice(1)) current = doubled(current, digit === "1" ? 1 : 0, psi2);
  return current;
}

function doubled(block: Block, extra: 0 | 1, psi2: bigint): Block {
  return Array.from({ length: 8 }, (_, k) => {
    const index = k - CENTRE + extra; // offset from 2·centre
    const i = CENTRE + Math.floor(index / 2);
    return index % 2 === 0 ? evenTerm(block, i, psi2) : oddTerm(block, i);
  });
}

/** ψ_(2i+1) = ψ_(i+2) ψ_i³ − ψ_(i−1) ψ_(i+1)³. */
function oddTerm(block: Block, i: number): bigint {
  return block[i + 2]! * block[i]! ** 3n - block[i - 1]! * block[i + 1]! ** 3n;
}

/** ψ_(2i) = ψ_i (ψ_(i+2) ψ_(i−1)² − ψ_(i−2) ψ_(i+1)²)/ψ_2. */
function evenTerm(block: Block, i: number, psi2: bigint): bigint {
  return (block[i]! * (block[i + 2]! * block[i - 1]! ** 2n - block[i - 2]! * block[i + 1]! ** 2n)) / psi2;
}

/** The positive g with g² = gcd(numerator, ψ²); its primes divide Δ. */
function commonPart(numerator: bigint, psi: bigint, discriminant: bigint): bigint {
  let power = absolute(discriminant);
  let shared = 1n;
  for (;;) {
    const next = gcd(gcd(numerator, power), psi * psi);
    if (next === shared) break;
    shared = next;
    power *= power;
  }
  return exactSqrt(shared)!;
}

/** numerator/(denominator·extra) for coprime numerator and denominator and a small extra factor. */
function overSmall(numerator: bigint, denominator: bigint, extra: bigint): Rational {
  const g = gcd(numerator % extra, extra);
  return Rational.coprime(numerator / g, (denominator * extra) / g);
}

function absolute(n: bigint): bigint {
  return n < 0n ? -n : n;
}
