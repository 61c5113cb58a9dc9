// All rational roots of a polynomial with rational coefficients: roots modulo a prime, lifted, tried exactly.

import { gcd, Rational } from "../number/rational.ts";
import { lcm, modularInverse, modulo } from "./integer.ts";
import { primesUpTo } from "./primes.ts";
import { rationals as Q } from "./rationals.ts";
import { deriveUni, divideUni, gcdUni, type Univariate } from "./univariate.ts";

/** Coefficients from the constant term up. */
export type IntegerPolynomial = readonly bigint[];

/** The primitive integer polynomial that is a rational multiple of f, with positive leading coefficient. */
export function primitivePart(f: Univariate<Rational>): IntegerPolynomial {
  if (f.length === 0) return [];
  const denominator = f.reduce((d, c) => lcm(d, c.den), 1n);
  const cleared = f.map((c) => (c.num * denominator) / c.den);
  const content = cleared.reduce((g, c) => gcd(g, c), 0n);
  const sign = cleared.at(-1)! < 0n ? -content : content;
  return cleared.map((c) => c / sign);
}

/**
 * The rational roots of f, ascending and without repetition, complete.
 *
 * Method   with leading coefficient a, every root r gives an integer root a·r of the monic polynomial a^(n−1) f(x/a); those
 *          are found modulo a prime where all roots are simple and lifted past twice Fujiwara's bound on the roots. Where
 *          no small prime has only simple roots, the repeated factors of f are taken out first.
 * Domain   f ≠ 0.
 */
export function rationalRoots(f: Univariate<Rational>): Rational[] {
  if (f.length <= 1) return [];
  return rootsIfSimple(f, PATIENCE) ?? rootsIfSimple(squarefreeFactor(f), Infinity) ?? failed();
}

function squarefreeFactor(f: Univariate<Rational>): Univariate<Rational> {
  return divideUni(Q, f, gcdUni(Q, f, deriveUni(Q, f))).quotient;
}

function failed(): never {
  throw new Error("some prime below 1000 keeps the roots of a squarefree polynomial of a curve simple");
}

/** So many primes with a multiple root suggest a repeated factor, as where a point of order two is halved. */
const PATIENCE = 4;

function rootsIfSimple(f: Univariate<Rational>, patience: number): Rational[] | undefined {
  const integral = primitivePart(f);
  const lead = integral.at(-1)!;
  const degree = integral.length - 1;
  const monic = integral.map((c, k) => (k === degree ? 1n : c * lead ** BigInt(degree - 1 - k)));
  const roots = integerRootsOfMonic(monic, patience)?.map((root) => Rational.of(root, lead));
  return roots?.sort((a, b) => a.compare(b));
}

/** Integer roots of a monic integer polynomial, or undefined if the primes tried have multiple roots. */
function integerRootsOfMonic(f: IntegerPolynomial, patience: number): bigint[] | undefined {
  let best: { readonly prime: bigint; readonly roots: readonly number[] } | undefined;
  let found = 0;
  let failures = 0;
  for (const p of primesUpTo(1000)) {
    if (p < f.length) continue;
    const roots = simpleRootsModulo(f, p);
    if (!roots && !best && ++failures >= patience) return undefined;
    if (!roots) continue;
    if (!best || roots.length < best.roots.length) best = { prime: BigInt(p), roots };
    if (roots.length === 0) return [];
    if (++found >= PRIMES_COMPARED) break;
  }
  if (!best) return undefined;
  const { prime, roots } = best;
  const bound = 2n * rootBound(f);
  return roots.map((root) => liftRoot(f, BigInt(root), prime, bound)).filter((root) => valueAt(f, root) === 0n);
}

/** Of so many primes the one with the fewest roots is lifted: most polynomials have none modulo one of them. */
const PRIMES_COMPARED = 5;

/** All roots of f modulo p, or undefined if one of them is double. */
function simpleRootsModulo(f: IntegerPolynomial, p: number): number[] | undefined {
  const P = BigInt(p);
  const reduced = f.map((c) => Number(modulo(c, P)));
  const roots: number[] = [];
  for (let x = 0; x < p; x++) {
    let [value, slope] = [0, 0];
    for (let k = reduced.length - 1; k >= 0; k--) {
      slope = (slope * x + value) % p;
      value = (value * x + reduced[k]!) % p;
    }
    if (value !== 0) continue;
    if (slope === 0) return undefined;
    roots.push(x);
  }
  return roots;
}

/** Newton modulo p, p², p⁴, ... until the modulus exceeds the bound; the representative nearest 0. */
function liftRoot(f: IntegerPolynomial, start: bigint, p: bigint, bound: bigint): bigint {
  let modulus = p;
  let root = start;
  while (modulus <= bound) {
    modulus *= modulus;
    const slope = modularInverse(derivativeAt(f, root), modulus)!;
    root = modulo(root - valueAt(f, root) * slope, modulus);
  }
  return 2n * root > modulus ? root - modulus : root;
}

function valueAt(f: IntegerPolynomial, x: bigint): bigint {
  return f.reduceRight((total, c) => total * x + c, 0n);
}

function derivativeAt(f: IntegerPolynomial, x: bigint): bigint {
  return f.reduceRight((total, c, k) => (k === 0 ? total : total * x + BigInt(k) * c), 0n);
}

/** 2 max |c_k|^(1/(n−k)) rounded up to powers of two: at least the size of every root. */
function rootBound(f: IntegerPolynomial): bigint {
  const degree = f.length - 1;
  let exponent = 0;
  for (let k = 0; k < degree; k++) {
    const size = f[k]! < 0n ? -f[k]! : f[k]!;
    if (size > 0n) exponent = Math.max(exponent, Math.ceil(size.toString(2).length / (degree - k)));
  }
  return 1n << BigInt(exponent + 1);
}
