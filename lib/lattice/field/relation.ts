// The irreducible polynomial F(X, Y) with F(f, g) = 0 for two elliptic functions of one lattice.
//
// C(Λ) has degree ord f over C(f), so g satisfies an equation of degree at most ord f over C(f), and F has degree ord g/d in X and ord f/d in Y
// with d = [C(Λ) : C(f, g)]. F is the one relation in that box, up to a factor, so the largest d with a relation gives it, by linear algebra with
// exact coefficients: an identity Σ c_ij f^i g^j = 0 of normal forms, proved as it is found.

import { rowReduce } from "../../algebra/linear.ts";
import { mulUni } from "../../algebra/univariate.ts";
import { gcd as integerGcd, Rational } from "../../number/rational.ts";
import { constantElement, type Element, mulElements, type ScalarPolynomial } from "./element.ts";
import { exactOf, exactScalar, type Scalar } from "./scalar.ts";
import { degreeOfElement } from "./valuation.ts";

type Ring = Element["field"]["ring"];

/** Coefficients c[i][j] of X^i Y^j. */
export type Relation = readonly (readonly Scalar[])[];

/**
 * The relation of two functions with exact coefficients.
 * Cost     linear algebra with (ord f + 1)(ord g + 1) unknowns.
 */
export function relationOf(f: Element, g: Element): Relation {
  const [m, n] = [degreeOfElement(f), degreeOfElement(g)];
  if (m === 0 || n === 0) return constantRelation(f, g, m);
  for (let d = gcd(m, n); d >= 1; d--) {
    if (m % d !== 0 || n % d !== 0) continue;
    const found = relationIn(f, g, n / d, m / d);
    if (found) return found;
  }
  throw new Error("two functions of one lattice have a relation of these degrees");
}

function gcd(a: number, b: number): number {
  return b === 0 ? a : gcd(b, a % b);
}

/** X − c or Y − c for a constant. */
function constantRelation(f: Element, g: Element, m: number): Relation {
  const { ring } = f.field;
  const value = ring.neg((m === 0 ? f : g).A[0] ?? ring.zero);
  return m === 0 ? [[value], [ring.one]] : [[value, ring.one]];
}

function relationIn(f: Element, g: Element, p: number, q: number): Relation | undefined {
  const { field } = f;
  const { ring } = field;
  const one = constantElement(field, ring.one);
  const powers = (h: Element, count: number) => {
    const list = [one];
    for (let k = 1; k <= count; k++) list.push(mulElements(list[k - 1]!, h));
    return list;
  };
  const [F, G] = [powers(f, p), powers(g, q)];
  const monomials = F.flatMap((x) => G.map((y) => mulElements(x, y)));
  const columns = overOneDenominator(monomials);
  const height = Math.max(...columns.map((c) => c.length));
  const rows = Array.from({ length: height }, (_, r) => columns.map((c) => c[r] ?? ring.zero));
  const { rows: reduced, pivots } = rowReduce(ring, rows);
  const free = columns.findIndex((_, k) => !pivots.includes(k));
  if (free < 0) return undefined;
  const solution = columns.map((_, k) => (k === free ? ring.one : ring.zero));
  pivots.forEach((column, r) => {
    solution[column] = ring.neg(reduced[r]![free]!);
  });
  const scaled = normalised(ring, solution, p, q);
  return Array.from({ length: p + 1 }, (_, i) => scaled.slice(i * (q + 1), (i + 1) * (q + 1)));
}

/** Integers without a common factor where all coefficients are rational; the first one by the power of Y, then of X, positive or 1. */
function normalised(ring: Ring, c: readonly Scalar[], p: number, q: number): Scalar[] {
  let lead: Scalar | undefined;
  for (let j = q; j >= 0 && !lead; j--) {
    for (let i = p; i >= 0 && !lead; i--) if (!ring.isZero(c[i * (q + 1) + j]!)) lead = c[i * (q + 1) + j]!;
  }
  const by = ring.inv(lead!);
  const monic = c.map((x) => ring.mul(x, by));
  const values = monic.map((x) => exactOf(x)!);
  if (!values.every((x) => x instanceof Rational)) return monic;
  const den = values.reduce((d, x) => (d / integerGcd(d, x.den)) * x.den, 1n);
  const num = values.reduce((g, x) => integerGcd(g, (x.num * den) / x.den), 0n);
  const factor = exactScalar(Rational.of(den, num < 0n ? -num : num));
  return monic.map((x) => ring.mul(x, factor));
}

/** Numerators A and B over a common denominator, A before B, as one vector each. */
function overOneDenominator(list: readonly Element[]): Scalar[][] {
  const { ring } = list[0]!.field;
  const all = distinct(list.map(({ D }) => D));
  const parts = list.map(({ A, B, D }) => {
    const own = all.findIndex((E) => same(E, D));
    const factor = all.reduce<ScalarPolynomial>((p, E, k) => (k === own ? p : mulUni(ring, p, E)), [ring.one]);
    return { A: mulUni(ring, A, factor), B: mulUni(ring, B, factor) };
  });
  const width = Math.max(...parts.map(({ A }) => A.length));
  return parts.map(({ A, B }) => [...A, ...new Array<Scalar>(width - A.length).fill(ring.zero), ...B]);

  function same(P: ScalarPolynomial, Q: ScalarPolynomial): boolean {
    return P.length === Q.length && P.every((c, k) => ring.isZero(ring.sub(c, Q[k]!)));
  }
  function distinct(polynomials: readonly ScalarPolynomial[]): ScalarPolynomial[] {
    const out: ScalarPolynomial[] = [];
    for (const P of polynomials) if (!out.some((Q) => same(P, Q))) out.push(P);
    return out;
  }
}
