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
 * Method   f is made squarefree; with leading coefficient a, every root r gives an integer root a·r of the monic
 *          polynomial a^(n−1) f(x/a); those are found modulo a prime where the polynomial stays squarefree and lifted
 *          past twice Fujiwara's bound on the roots.
 * Domain   f ≠ 0.
 */
export function rationalRoots(f: Univariate<Rational>): Rational[] {
  if (f.length <= 1) return [];
  const common = gcdUni(Q, f, deriveUni(Q, f));
  const squarefree = primitivePart(common.length > 1 ? divideUni(Q, f, common).quotient : f);
  const lead = squarefree.at(-1)!;
  const degree = squarefree.length - 1;
  const monic = squarefree.map((c, k) => (k === degree ? 1n : c * lead ** BigInt(degree - 1 - k)));
  const roots = integerRootsOfMonic(monic).map((root) => Rational.of(root, lead));
  return roots.sort((a, b) => a.compare(b));
}

/** Integer roots of a monic squarefree integer polynomial. */
function integerRootsOfMonic(f: IntegerPolynomial): bigint[] {
  const bound = rootBound(f);
  for (const p of primesUpTo(1000)) {
    const prime = BigInt(p);
    const roots = simpleRootsModulo(f, prime);
    if (!roots) continue;
    return roots.map((root) => liftRoot(f, root, prime, 2n * bound)).filter((root) => valueAt(f, root) === 0n);
  }
  throw new Error("some prime below 1000 keeps a squarefree polynomial of a curve without double roots");
}

/** All roots of f modulo p, or undefined if one of them is double. */
function simpleRootsModulo(f: IntegerPolynomial, p: bigint): bigint[] | undefined {
  const reduced = f.map((c) => modulo(c, p));
  const roots: bigint[] = [];
  for (let x = 0n; x < p; x++) {
    if (reduced.reduceRight((total, c) => (total * x + c) % p, 0n) !== 0n) continue;
    if (derivativeAt(reduced, x) % p === 0n) return undefined;
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
