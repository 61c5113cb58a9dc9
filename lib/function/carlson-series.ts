// The homogeneous series that ends every duplication of Carlson's integrals, with a proved tail.
//
// R_{−a}(b; z) = A^{−a} Σ_n (a)_n/(c)_n T_n, c = Σ b_j, Z_j = 1 − z_j/A, Σ_n T_n t^n = Π (1 − Z_j t)^{−b_j}   (DLMF 19.19.1–19.19.3)
// For A = Σ b_j z_j / c the sum Σ b_j Z_j is 0. With 2 b_j integers and P(t) = Π (1 − Z_j t)^{2 b_j} = 1 + p_2 t² + p_3 t³ + ...,
// F = P^{−1/2} satisfies P F′ = −P′ F/2, which gives  2n T_n = −Σ_k p_k (2n − k) T_{n−k}.
// Tail. The coefficients of F are dominated by those of (1 − M t)^{−c}, M = max |Z_j|: |T_n| <= (c)_n/n! M^n, so term n is at most
// (a)_n/n! M^n. For a = 1/2 that is at most M^n/2, for a = 3/2 at most (n + 1) M^n; for M <= 1/2 the terms from N on are
// together at most M^N, and 4(N + 1) M^N.

import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";

/** Twice the exponent a, which is also what separates the kinds: 1 for RF and RC, 3 for RD and RJ. */
export type Kind = 1 | 3;

/** Terms for which one more duplication (about a dozen products) costs as much as the terms it saves. */
export function termCount(prec: number): number {
  return Math.ceil(Math.sqrt(3 * prec)) + 2;
}

/** Whether `terms` terms reach 2^−prec when every |Z_j| < 2^−fall. */
export function farEnough(fall: number, terms: number, prec: number): boolean {
  return fall >= 1 && fall * terms >= prec + 2 * Math.ceil(Math.log2(terms + 2)) + 2;
}

/** Π (1 − Z_j t)^(multiplicity) from the Z_j, with the linear coefficient set to the 0 that it is. */
function product(z: readonly Disc[], wp: number): Disc[] {
  let p: Disc[] = [disc.one];
  for (const x of z) {
    const next = [...p, disc.zero];
    for (let k = 1; k < next.length; k++) next[k] = disc.sub(next[k]!, disc.mul(x, p[k - 1]!, wp), wp);
    p = next;
  }
  p[1] = disc.zero;
  return p;
}

/**
 * Σ (a)_n/(c)_n T_n for a = kind/2, c = a + 1, from the Z_j repeated 2 b_j times.
 *
 * Domain   |Z_j| < 2^−fall with fall >= 1; 3 of them for kind 1 and 5 for kind 3.
 * Error    rounding of the discs and the tail of the header.
 * Cost     `terms` times two (kind 1) or four products, of falling length.
 */
export function carlsonSeries(kind: Kind, z: readonly Disc[], fall: number, terms: number, wp: number): Disc {
  const p = product(z, wp);
  const t: Disc[] = [disc.one];
  let sum: Disc = disc.one;
  for (let n = 1; n < terms; n++) {
    // T_n < 2^(n − fall·n) or so: the digits below 2^−wp are not carried.
    const bits = Math.max(16, wp - (fall - 2) * n);
    let next: Disc = disc.zero;
    for (let k = 2; k < p.length && k <= n; k++) {
      next = disc.add(next, disc.mulInt(disc.mul(p[k]!, t[n - k]!, bits), 2 * n - k, bits), bits);
    }
    t[n] = disc.neg(disc.divBall(next, { man: BigInt(2 * n), exp: 0, rad: 0 }, bits));
    const weighted = disc.mulInt(t[n]!, kind, bits);
    sum = disc.add(sum, disc.divBall(weighted, { man: BigInt(2 * n + kind), exp: 0, rad: 0 }, bits), wp);
  }
  if (z.every((x) => disc.isZero(x))) return disc.one;
  const weight = kind === 1 ? 1n : 4n * BigInt(terms + 1);
  const axial = z.every((x) => x.axis === "real");
  return disc.widenBy(sum, { man: weight, exp: -fall * terms, rad: 0 }, wp, axial);
}
