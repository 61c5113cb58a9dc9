// How near to 0 a number can be that is built from rational numbers by + − × ÷ and roots, without being 0.
//
// Such a number is U/L with algebraic integers U and L of K = Q(r1, ..., rn), where each radical has r^k in the ring of those before it, so
// that [K : Q] <= D, the product of the k; roots of unity of order n count φ(n). If u bounds |U| in every embedding of K and l bounds |L|, then the norm of U, a whole number
// other than 0, gives |U| >= u^−(D−1), and so |U/L| >= 1/(l u^(D−1)).
// For a root of E = U/L: E^(1/k) = (U L^(k−1))^(1/k)/L = U/(U^(k−1) L)^(1/k), one more radical either way, whichever root is taken.
// Burnikel, Fleischer, Mehlhorn, Schirra, A strong and easily computable separation bound for arithmetic expressions involving radicals,
// Algorithmica 27 (2000) 87-99 (cited from memory; the bound is proved above).
import type { Node } from "./origin.ts";
import { Quadratic } from "./quadratic.ts";
import { Rational } from "./rational.ts";

/** log2 of u and of l, rounded up; both at least 0. */
export interface Growth {
  readonly u: number;
  readonly l: number;
}

/** What the field K is told of: a root of this order that was taken, roots of unity of this order. */
export interface Adjoined {
  radical(order: number): void;
  unity(order: number): void;
}

/** The growth of a result from those of its operands. */
export type GrowthRule = (
  operands: readonly unknown[],
  of: (operand: unknown) => Growth | undefined,
  field: Adjoined,
) => Growth | undefined;

// Sums and products of bit counts stay far below 2^53 as long as they are under the limit of callers; a larger one need not be exact.

function rule(combine: (a: Growth, b: Growth) => Growth): GrowthRule {
  return ([x, y], of) => {
    const a = of(x);
    const b = a && of(y);
    return a && b && combine(a, b);
  };
}

export const growthOfSum = rule((a, b) => ({ u: Math.max(a.u + b.l, b.u + a.l) + 1, l: a.l + b.l }));
export const growthOfProduct = rule((a, b) => ({ u: a.u + b.u, l: a.l + b.l }));
export const growthOfQuotient = rule((a, b) => ({ u: a.u + b.l, l: a.l + b.u }));
export const growthOfSign: GrowthRule = ([x], of) => of(x);

/** x^n for an integer n as second operand. */
export const growthOfPower: GrowthRule = ([x, n], of) => {
  const a = of(x);
  const m = Math.abs(n as number);
  if (!a) return undefined;
  return (n as number) < 0 ? { u: a.l * m, l: a.u * m } : { u: a.u * m, l: a.l * m };
};

/** The n-th root, n as second operand, 2 without one. */
export const growthOfRoot: GrowthRule = ([x, n = 2], of, field) => {
  const a = of(x);
  const k = n as number;
  if (!a) return undefined;
  field.radical(k);
  // Divisions of doubles round to nearest: one part in 2^52, which the summand 1 covers below 2^50.
  if (a.u >= a.l) return { u: (a.u + (k - 1) * a.l) / k + 1, l: a.l };
  return { u: a.u, l: ((k - 1) * a.u + a.l) / k + 1 };
};

/** a + i·b. */
export const growthOfJoin: GrowthRule = (operands, of, field) => {
  field.unity(4);
  return growthOfSum(operands, of, field);
};

/**
 * A number B such that x − y (x without y) is 0 or at least 2^−B in size; undefined if another operation or input is behind them, or B is
 * over the limit.
 */
export function separation(x: Node, y: Node | undefined, limit: number): number | undefined {
  const seen = new Map<object, Growth | undefined>();
  const squareRoots = new Set<bigint>();
  let degree = 1;
  let cyclotomic = 1;
  const field: Adjoined = {
    radical: (order) => {
      degree *= order;
    },
    unity: (order) => {
      cyclotomic = commonMultiple(cyclotomic, order);
    },
  };
  const of = (operand: unknown): Growth | undefined => {
    if (typeof operand === "bigint" || typeof operand === "number") return { u: bitLength(BigInt(operand)), l: 0 };
    if (operand instanceof Rational) return { u: bitLength(operand.num), l: bitLength(operand.den) };
    if (operand instanceof Quadratic) {
      if (operand.d === -1n || operand.d === -3n) field.unity(operand.d === -1n ? 4 : 3);
      else if (!squareRoots.has(operand.d)) field.radical(2);
      squareRoots.add(operand.d);
      return growthOfQuadratic(operand);
    }
    const node = operand as Node;
    if (seen.has(node)) return seen.get(node);
    const { exact, origin } = node;
    // A degree over the limit cannot come down again.
    const growth = exact ? of(exact) : degree <= limit && origin?.operation.growth?.(origin.operands, of, field);
    seen.set(node, growth || undefined);
    return growth || undefined;
  };
  const growth = y ? growthOfSum([x, y], of, field) : of(x);
  if (!growth || cyclotomic > limit) return undefined;
  const bits = growth.l + (degree * totient(cyclotomic) - 1) * growth.u;
  return bits <= limit ? Math.ceil(bits) : undefined;
}

/** (A + B√d)/q: |A| + |B|√|d| bounds both conjugates of the numerator. */
function growthOfQuadratic({ a, b, d }: Quadratic): Growth {
  const q = a.den * b.den;
  const [A, B] = [a.num * b.den, b.num * a.den];
  return { u: Math.max(bitLength(A), bitLength(B) + bitLength(d) / 2) + 1, l: bitLength(q) };
}

function commonMultiple(a: number, b: number): number {
  let [x, y] = [a, b];
  while (y !== 0) [x, y] = [y, x % y];
  return (a / x) * b;
}

/** Euler's φ, the degree of the field of the n-th roots of unity. */
function totient(n: number): number {
  let [left, result] = [n, n];
  for (let p = 2; p * p <= left; p++) {
    if (left % p === 0) result -= result / p;
    while (left % p === 0) left /= p;
  }
  return left > 1 ? result - result / left : result;
}

/** n with |x| < 2^n. */
function bitLength(x: bigint): number {
  return (x < 0n ? -x : x).toString(2).length;
}
