// Search for rational points of bounded height on plane cubics and on y² = quartic.

import { exactSqrt, modulo } from "../algebra/integer.ts";
import { type Polynomial, sortedTerms } from "../algebra/multivariate.ts";
import { primitivePart } from "../algebra/rationalroots.ts";
import { gcd, Rational } from "../number/rational.ts";
import type { IntegerModel } from "./minimal.ts";

interface IntegerForm {
  /** Coefficients with the exponents of the three letters. */
  readonly terms: readonly { readonly c: bigint; readonly e: readonly number[] }[];
}

/** Moduli whose product sieves all but about one candidate in a thousand. */
const SIEVE = [16, 9, 5, 7, 11, 13];

/**
 * All primitive integer zeros of a ternary cubic form with |coordinates| <= height, one of ±P each (last nonzero positive),
 * smallest first.
 *
 * Method   for each pair of the first two letters, the values of the third allowed modulo each of a few small numbers; what
 *          passes all is tried exactly.
 */
export function searchCubic(f: Polynomial<Rational>, height: number): Rational[][] {
  const form = integerForm(f);
  const tables = SIEVE.map((m) => zerosModulo(form, m));
  const found: bigint[][] = [];
  for (let u = -height; u <= height; u++) {
    for (let v = -height; v <= height; v++) {
      for (const w of candidates(tables, u, v, height)) {
        const P = [u, v, w].map(BigInt);
        if (isNormalised(P) && valueAt(form, P) === 0n) found.push(P);
      }
    }
  }
  return found.sort(bySize).map((P) => P.map((c) => Rational.of(c)));
}

function integerForm(f: Polynomial<Rational>): IntegerForm {
  const terms = sortedTerms(f);
  const whole = primitivePart(terms.map(({ coefficient }) => coefficient));
  return { terms: terms.map(({ exponents }, k) => ({ c: whole[k]!, e: exponents })) };
}

function valueAt({ terms }: IntegerForm, P: readonly bigint[]): bigint {
  return terms.reduce(
    (total, { c, e }) => total + c * e.reduce((product, n, k) => product * P[k]! ** BigInt(n), 1n),
    0n,
  );
}

interface ZeroTable {
  readonly m: number;
  /** allowed[(u·m + v)·m + w] = 1 where the form vanishes modulo m. */
  readonly allowed: Uint8Array;
}

function zerosModulo({ terms }: IntegerForm, m: number): ZeroTable {
  const allowed = new Uint8Array(m ** 3);
  const reduced = terms.map(({ c, e }) => ({ c: Number(modulo(c, BigInt(m))), e }));
  for (let u = 0; u < m; u++) {
    for (let v = 0; v < m; v++) {
      for (let w = 0; w < m; w++) {
        const value = reduced.reduce((total, { c, e }) => total + c * u ** e[0]! * v ** e[1]! * w ** e[2]!, 0);
        if (value % m === 0) allowed[(u * m + v) * m + w] = 1;
      }
    }
  }
  return { m, allowed };
}

function candidates(tables: readonly ZeroTable[], u: number, v: number, height: number): number[] {
  const rows = tables.map(({ m, allowed }) => {
    const start = (residue(u, m) * m + residue(v, m)) * m;
    return { m, row: allowed.subarray(start, start + m) };
  });
  const list: number[] = [];
  for (let w = 0; w <= height; w++) if (rows.every(({ m, row }) => row[w % m])) list.push(w);
  return list;
}

function residue(a: number, m: number): number {
  return ((a % m) + m) % m;
}

/** Coprime, with the last nonzero coordinate positive. */
function isNormalised(P: readonly bigint[]): boolean {
  const last = P.findLast((c) => c !== 0n);
  return last !== undefined && last > 0n && P.reduce((g, c) => gcd(g, c), 0n) === 1n;
}

function bySize(P: readonly bigint[], R: readonly bigint[]): number {
  const size = (A: readonly bigint[]) => Math.max(...A.map((c) => Math.abs(Number(c))));
  const [p, r] = [size(P), size(R)];
  if (p !== r) return p < r ? -1 : 1;
  const k = P.findIndex((c, l) => c !== R[l]);
  return k < 0 ? 0 : P[k]! > R[k]! ? -1 : 1;
}

/** All (x, y) on y² = quartic with x = m/n, |m|, n <= height, and the points at infinity, smallest first; y >= 0 first. */
export function searchQuartic(q: readonly Rational[], height: number): Rational[][] {
  const whole = clearSquare(q);
  const found: Rational[][] = [];
  const add = (m: bigint, n: bigint) => {
    const value = whole.coefficients.reduce((total, c, k) => total + c * m ** BigInt(4 - k) * n ** BigInt(k), 0n);
    const root = exactSqrt(value);
    if (root === undefined) return;
    const y = Rational.of(root, whole.root);
    const [X, Y] = n === 0n ? [Rational.one, y] : [Rational.of(m, n), y.div(n * n)];
    for (const s of root === 0n ? [Y] : [Y, Y.neg()]) found.push([X, s, n === 0n ? Rational.zero : Rational.one]);
  };
  add(1n, 0n);
  for (let size = 0; size <= height; size++) {
    for (const [m, n] of ofHeight(size)) if (gcd(BigInt(m), BigInt(n)) === 1n) add(BigInt(m), BigInt(n));
  }
  return found;
}

/** d²·q with whole coefficients, and d. */
function clearSquare(q: readonly Rational[]): { readonly coefficients: bigint[]; readonly root: bigint } {
  const d = q.reduce((total, c) => (total * c.den) / gcd(total, c.den), 1n);
  return { coefficients: q.map((c) => (c.num * d * d) / c.den), root: d };
}

/** Fractions m/n with max(|m|, n) = size. */
function ofHeight(size: number): [number, number][] {
  if (size === 0) return [[0, 1]];
  const list: [number, number][] = [];
  for (let n = 1; n < size; n++) list.push([size, n], [-size, n]);
  for (let m = 1; m <= size; m++) list.push([m, size], [-m, size]);
  return list;
}

/**
 * The points of an integral model with x = m/e², |m| and e² at most `height`, smallest first, one of ±P each.
 * Cost     height^(3/2) square tests.
 * Source   the denominator of x on an integral model is a square (Silverman AEC VII.3.4).
 */
export function searchWeierstrass(
  [a1, a2, a3, a4, a6]: IntegerModel,
  height: number,
): (readonly [Rational, Rational])[] {
  const b2 = a1 * a1 + 4n * a2;
  const b4 = a1 * a3 + 2n * a4;
  const b6 = a3 * a3 + 4n * a6;
  const found: { readonly size: number; readonly P: readonly [Rational, Rational] }[] = [];
  for (let e = 1n; e * e <= height; e++) {
    const [e2, e3] = [e * e, e ** 3n];
    const [p, q, r] = [b2 * e2, 2n * b4 * e2 * e2, b6 * e3 * e3];
    for (let m = -BigInt(height); m <= height; m++) {
      const root = exactSqrt(((4n * m + p) * m + q) * m + r);
      if (root === undefined || gcd(m, e) !== 1n) continue;
      // 2y + a1x + a3 = root/e³
      const y = Rational.of(root - a1 * m * e - a3 * e3, 2n * e3);
      found.push({ size: Math.max(Math.abs(Number(m)), Number(e2)), P: [Rational.of(m, e2), y] });
    }
  }
  return found.sort((s, t) => s.size - t.size || t.P[0].compare(s.P[0])).map(({ P }) => P);
}
