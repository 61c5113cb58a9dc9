// Laurent series of an elliptic function at a point, over any field of coefficients.
//
// At a lattice point ℘ = t^−2 + Σ c_k t^(2k−2), c_2 = g2/20, c_3 = g3/28, c_k = 3/((2k+1)(k−3)) Σ c_m c_(k−m)   (DLMF 23.9.1, 23.9.7).
// Elsewhere ℘ = Σ a_n t^n from a_0 = x, a_1 = y by ℘″ = 6℘² − g2/2.

import type { Field } from "../../algebra/field.ts";

/** Σ c_k t^(order + k). */
export interface LaurentSeries<T> {
  readonly order: number;
  readonly coefficients: readonly T[];
}

/** t²℘(t) at a lattice point to n coefficients. */
export function wpAtOrigin<T>(F: Field<T>, g2: T, g3: T, n: number): T[] {
  const c: T[] = [F.zero, F.zero, divided(F, g2, 20n), divided(F, g3, 28n)];
  for (let k = 4; 2 * k < n; k++) {
    let sum = F.zero;
    for (let m = 2; m <= k - 2; m++) sum = F.add(sum, F.mul(c[m]!, c[k - m]!));
    c[k] = divided(F, F.mul(F.fromInt(3n), sum), BigInt((2 * k + 1) * (k - 3)));
  }
  return Array.from({ length: n }, (_, i) => (i === 0 ? F.one : i % 2 === 0 ? (c[i / 2] ?? F.zero) : F.zero));
}

/** ℘(P + t) to n coefficients at a point with ℘ = x, ℘′ = y. */
export function wpAtPoint<T>(F: Field<T>, g2: T, x: T, y: T, n: number): T[] {
  const a: T[] = [x, y];
  for (let k = 0; k + 2 < n; k++) {
    let sum = F.zero;
    for (let i = 0; i <= k; i++) sum = F.add(sum, F.mul(a[i]!, a[k - i]!));
    let value = F.mul(F.fromInt(6n), sum);
    if (k === 0) value = F.sub(value, divided(F, g2, 2n));
    a[k + 2] = divided(F, value, BigInt((k + 1) * (k + 2)));
  }
  return a.slice(0, n);
}

function divided<T>(F: Field<T>, a: T, n: bigint): T {
  return F.mul(a, F.inv(F.fromInt(n)));
}

/** Product of power series to n coefficients. */
export function mulSeries<T>(F: Field<T>, a: readonly T[], b: readonly T[], n: number): T[] {
  const out: T[] = new Array(n).fill(F.zero);
  for (let i = 0; i < Math.min(n, a.length); i++) {
    for (let j = 0; j < Math.min(n - i, b.length); j++) out[i + j] = F.add(out[i + j]!, F.mul(a[i]!, b[j]!));
  }
  return out;
}

/** a/b to n coefficients; b[0] is not zero. */
export function divSeries<T>(F: Field<T>, a: readonly T[], b: readonly T[], n: number): T[] {
  const lead = F.inv(b[0]!);
  const out: T[] = [];
  for (let k = 0; k < n; k++) {
    let value = a[k] ?? F.zero;
    for (let j = 1; j <= k; j++) value = F.sub(value, F.mul(b[j] ?? F.zero, out[k - j]!));
    out.push(F.mul(value, lead));
  }
  return out;
}

/** t^(w·deg) p(X t^−w) as a series, for X = t^w ℘(t). */
function homogeneous<T>(F: Field<T>, p: readonly T[], X: readonly T[], w: number, n: number): T[] {
  const d = p.length - 1;
  let sum: T[] = new Array(n).fill(F.zero);
  let power: T[] = [F.one];
  p.forEach((c, k) => {
    const shift = w * (d - k);
    sum = sum.map((s, i) => (i >= shift ? F.add(s, F.mul(c, power[i - shift] ?? F.zero)) : s));
    power = mulSeries(F, power, X, n);
  });
  return sum;
}

/** The parts of (A + By)/D over the field of coefficients. */
export interface Parts<T> {
  readonly A: readonly T[];
  readonly B: readonly T[];
  readonly D: readonly T[];
  readonly g2: T;
  readonly g3: T;
}

/** The series at a lattice point with n coefficients, whose order is exact by degrees. */
export function seriesAtOrigin<T>(F: Field<T>, { A, B, D, g2, g3 }: Parts<T>, n: number): LaurentSeries<T> {
  const m = n + 4;
  const X = wpAtOrigin(F, g2, g3, m);
  // t³℘′ = Σ (i − 2) X_i t^i
  const Y = X.map((c, i) => F.mul(F.fromInt(BigInt(i - 2)), c));
  const [a, b, d] = [2 * (A.length - 1), 2 * (B.length - 1) + 3, 2 * (D.length - 1)];
  const top = Math.max(A.length > 0 ? a : -1, B.length > 0 ? b : -1);
  let numerator: T[] = new Array(m).fill(F.zero);
  const join = (part: readonly T[], shift: number) => {
    numerator = numerator.map((s, i) => (i >= shift ? F.add(s, part[i - shift] ?? F.zero) : s));
  };
  if (A.length > 0) join(homogeneous(F, A, X, 2, m), top - a);
  if (B.length > 0) join(mulSeries(F, homogeneous(F, B, X, 2, m), Y, m), top - b);
  return { order: d - top, coefficients: divSeries(F, numerator, homogeneous(F, D, X, 2, m), n) };
}

/**
 * The series at a point with ℘ = x, ℘′ = y with n coefficients; `zeros` of the numerator and `poles` of 1/D there are known
 * exactly, so that enclosures of coefficients that are 0 are left out.
 */
export function seriesAtPoint<T>(
  F: Field<T>,
  { A, B, D, g2 }: Parts<T>,
  x: T,
  y: T,
  zeros: number,
  poles: number,
  n: number,
): LaurentSeries<T> {
  const m = n + Math.max(zeros, poles) + 1;
  const X = wpAtPoint(F, g2, x, y, m + 1);
  const Y = X.slice(1).map((c, i) => F.mul(F.fromInt(BigInt(i + 1)), c));
  const at = (p: readonly T[]) =>
    p.reduceRight<T[]>((sum, c) => {
      const product = mulSeries(F, sum, X, m);
      return product.map((s, i) => (i === 0 ? F.add(s, c) : s));
    }, new Array(m).fill(F.zero));
  const odd = B.length > 0 ? mulSeries(F, at(B), Y, m) : [];
  const numerator = at(A).map((s, i) => F.add(s, odd[i] ?? F.zero));
  return { order: zeros - poles, coefficients: divSeries(F, numerator.slice(zeros), at(D).slice(poles), n) };
}
