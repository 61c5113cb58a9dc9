// Integral and global minimal models over Q.

import { primeDivisors } from "../algebra/factor.ts";
import { lcm, modulo, valuation } from "../algebra/integer.ts";
import { rationals as Q } from "../algebra/rationals.ts";
import { type Coefficients, invariantsOf, type ModelChange } from "../curve/weierstrass.ts";
import { gcd, Rational } from "../number/rational.ts";

/** [a1, a2, a3, a4, a6] with integers. */
export type IntegerModel = readonly [bigint, bigint, bigint, bigint, bigint];

export interface MinimalModel {
  readonly a: IntegerModel;
  /** From the given model to the minimal one; u > 0. */
  readonly change: ModelChange<Rational>;
}

/**
 * The reduced global minimal model (a1, a3 in {0, 1}, a2 in {−1, 0, 1}) of a nonsingular model over Q, which is unique,
 * with the change of variables that leads to it.
 *
 * Source   Laska, Kraus and Connell; Cremona, Algorithms for Modular Elliptic Curves, 3.2.
 */
export function globalMinimalModel(a: Coefficients<Rational>): MinimalModel {
  const denominator = a.reduce((d, c) => lcm(d, c.den), 1n);
  const { c4, c6 } = invariantsOf(Q, a);
  // With u = 1/denominator the model is integral and its c4, c6 are integers.
  const d = Rational.of(denominator);
  const bigC4 = c4.times(d.pow(4)).num;
  const bigC6 = c6.times(d.pow(6)).num;
  const scale = minimalScale(bigC4, bigC6, denominator);
  const model = reducedModel(bigC4 / scale ** 4n, bigC6 / scale ** 6n);
  return { a: model, change: changeBetween(a, model, Rational.of(scale, denominator)) };
}

/** The largest u such that c4/u⁴, c6/u⁶ belong to an integral model (Kraus's conditions at 2 and 3). */
function minimalScale(c4: bigint, c6: bigint, known: bigint): bigint {
  const discriminant = (c4 ** 3n - c6 * c6) / 1728n;
  const g = c6 === 0n ? absolute(discriminant) : gcd(c6 * c6, discriminant);
  return twelfthPowerPrimes(g, known).reduce((scale, p) => scale * p ** BigInt(exponentAt(p, c4, c6, g)), 1n);
}

function exponentAt(p: bigint, c4: bigint, c6: bigint, g: bigint): number {
  const d = Math.floor(valuation(g, p) / 12);
  if (d === 0) return 0;
  if (p === 2n) {
    const a = modulo(c4 / 2n ** BigInt(4 * d), 16n);
    const b = modulo(c6 / 2n ** BigInt(6 * d), 32n);
    const fits = modulo(b, 4n) === 3n || (a === 0n && (b === 0n || b === 8n));
    return fits ? d : d - 1;
  }
  return p === 3n && c6 !== 0n && valuation(c6, 3n) === 6 * d + 2 ? d - 1 : d;
}

/** Primes p with p^12 dividing g, found without factoring g where its large part cannot hold a twelfth power. */
function twelfthPowerPrimes(g: bigint, known: bigint): bigint[] {
  const primes = new Set(known === 1n ? [] : primeDivisors(known));
  let rest = g;
  for (const p of primes) while (rest % p === 0n) rest /= p;
  for (let p = 2n; p ** 12n <= rest; p += p === 2n ? 1n : 2n) {
    if (p > TRIAL_LIMIT) {
      for (const q of primeDivisors(rest)) primes.add(q);
      break;
    }
    if (rest % p !== 0n) continue;
    primes.add(p);
    while (rest % p === 0n) rest /= p;
  }
  return [...primes];
}

const TRIAL_LIMIT = 2000n;

/** The reduced integral model with given c4 and c6 (which satisfy Kraus's conditions). */
function reducedModel(c4: bigint, c6: bigint): IntegerModel {
  let b2 = modulo(-c6, 12n);
  if (b2 > 6n) b2 -= 12n;
  const b4 = (b2 * b2 - c4) / 24n;
  const b6 = (-(b2 ** 3n) + 36n * b2 * b4 - c6) / 216n;
  const a1 = b2 & 1n;
  const a3 = b6 & 1n;
  const a2 = (b2 - a1) / 4n;
  return [a1, a2, a3, (b4 - a1 * a3) / 2n, (b6 - a3) / 4n];
}

/** r, s, t of the change with given u between two models of one curve. */
function changeBetween(a: Coefficients<Rational>, model: IntegerModel, u: Rational): ModelChange<Rational> {
  const [a1, a2, a3] = a;
  const [n1, n2, n3] = model;
  const half = Rational.of(1, 2);
  const s = u.times(n1).minus(a1).times(half);
  const u2 = u.times(u);
  const r = u2.times(n2).minus(a2).plus(s.times(a1)).plus(s.times(s)).div(3);
  const t = u2.times(u).times(n3).minus(a3).minus(r.times(a1)).times(half);
  return { u, r, s, t };
}

export function toRationals(a: IntegerModel): Coefficients<Rational> {
  return a.map((c) => Rational.of(c)) as unknown as Coefficients<Rational>;
}

/** The model with integers, or undefined if a coefficient is not one. */
export function toIntegers(a: Coefficients<Rational>): IntegerModel | undefined {
  return a.every((c) => c.den === 1n) ? (a.map((c) => c.num) as unknown as IntegerModel) : undefined;
}

function absolute(n: bigint): bigint {
  return n < 0n ? -n : n;
}
