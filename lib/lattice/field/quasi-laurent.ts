// Series of ζ and σ from those of ℘, over any field of coefficients.
//
// At a lattice point ζ = 1/t − Σ c_k t^(2k−1)/(2k−1), and tσ′ = (tζ)σ gives (n−1) s_n = Σ z_j s_(n−j) for σ = Σ s_n t^n, tζ = 1 + Σ z_j t^j
// (DLMF 23.9.3; the recurrence is σ′/σ = ζ). Elsewhere ζ′ = −℘ and σ′ = ζσ from the values at the point.

import type { Field } from "../../algebra/field.ts";
import { wpAtOrigin, wpAtPoint } from "./laurent.ts";

function over<T>(F: Field<T>, a: T, n: number): T {
  return F.mul(a, F.inv(F.fromInt(BigInt(n))));
}

/** tζ(t) to n coefficients. */
export function zetaAtOrigin<T>(F: Field<T>, g2: T, g3: T, n: number): T[] {
  // t²℘ = 1 + Σ X_i t^i, so that tζ = 1 − Σ X_i t^i/(i − 1).
  return wpAtOrigin(F, g2, g3, n).map((c, i) => (i === 0 ? F.one : F.isZero(c) ? F.zero : F.neg(over(F, c, i - 1))));
}

/** σ(t)/t to n coefficients. */
export function sigmaAtOrigin<T>(F: Field<T>, g2: T, g3: T, n: number): T[] {
  const z = zetaAtOrigin(F, g2, g3, n);
  const s: T[] = [F.one];
  // With s_k the coefficient of t^(k+1): k s_k = Σ_{j>=1} z_j s_(k−j).
  for (let k = 1; k < n; k++) {
    let sum = F.zero;
    for (let j = 1; j <= k; j++) if (!F.isZero(z[j]!)) sum = F.add(sum, F.mul(z[j]!, s[k - j]!));
    s.push(F.isZero(sum) ? F.zero : over(F, sum, k));
  }
  return s;
}

/** The values at a point that is not a lattice point. */
export interface PointValues<T> {
  readonly wp: T;
  readonly prime: T;
  readonly zeta: T;
  readonly sigma: T;
}

/** ζ(p + t) to n coefficients. */
export function zetaAtPoint<T>(F: Field<T>, g2: T, at: Omit<PointValues<T>, "sigma">, n: number): T[] {
  const a = wpAtPoint(F, g2, at.wp, at.prime, Math.max(2, n - 1));
  return [at.zeta, ...a.map((c, i) => F.neg(over(F, c, i + 1)))].slice(0, n);
}

/** σ(p + t) to n coefficients. */
export function sigmaAtPoint<T>(F: Field<T>, g2: T, at: PointValues<T>, n: number): T[] {
  return growth(F, zetaAtPoint(F, g2, at, Math.max(1, n - 1)), at.sigma, n);
}

/** The solution of s′ = f s with s(0) = start. */
export function growth<T>(F: Field<T>, f: readonly T[], start: T, n: number): T[] {
  const s: T[] = [start];
  for (let k = 1; k < n; k++) {
    let sum = F.zero;
    for (let j = 0; j < k && j < f.length; j++) sum = F.add(sum, F.mul(f[j]!, s[k - 1 - j]!));
    s.push(over(F, sum, k));
  }
  return s;
}
