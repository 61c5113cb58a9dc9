// Theta series in fixed point, with every rounding and the tail counted.
//
// With q = exp(πiτ), u = exp(2πiv), t = q²/u and n = 0, 1, 2, ...
//     A_n = q^(n(n−1)) t^n,   B_n = q^(n(n+1)) u^(n+1),
//     θ1(v) = i q^(1/4) u^(−1/2) S_0,   (d/(πi dv))^k θ1 = i q^(1/4) u^(−1/2) S_k,
//     S_k = Σ (−1)^n (2n+1)^k ((−1)^k A_n − B_n)
// (DLMF 20.2.1 with z = πv and the terms n and −n−1 paired). On a reduced lattice with 0 <= Im v <= Im τ / 2 we have
// |q| < 0.073, |t| <= |q|, |u| <= 1: both sequences fall like |q|^(n²) and nothing overflows whatever Im τ is.
//
// Errors are counted as in fixed-complex.ts.
// Tail. From the first omitted index N on the terms fall at least by (1 + 2/(2N+1))^k |q²|^N max(|t|, |u||q²|), which for k < 10 N is at most
// (5/3)^10 · 0.01 · 0.2 for N = 1, e^10 · 0.01² · 0.2 above: under 1/2, so the tail of S_k is at most twice its first term.

import type { Disc } from "../number/disc/data.ts";
import { shift as shiftBy } from "../number/fixed/bits.ts";
import { absUpper, type Fixed, product, sumDisc, toFixed, tooCoarse, UP } from "./fixed-complex.ts";

/**
 * The sums S_0 .. S_order of the header.
 *
 * Domain   |q²| < 0.01, |t| < 0.2, |u| < 4 over the whole discs (holds on a reduced lattice with slack for wide discs).
 * Error    counted as in the header; absolute, about ten units of 2^−wp for exact input.
 * Cost     about √(wp/(2 log2 1/|q|)) steps of four complex products, whose sizes shrink with the terms.
 * Throws   PrecisionError if the discs leave the domain, as wide ones can.
 */
export function thetaSums(u: Disc, t: Disc, q2: Disc, order: number, wp: number): Disc[] {
  const Q = toFixed(q2, wp);
  const T = toFixed(t, wp);
  const U = toFixed(u, wp);
  const [bq, bt, bu] = [absUpper(Q, wp), absUpper(T, wp), absUpper(U, wp)];
  if (!(bq < 0.01 && bt < 0.2 && bu < 4)) {
    throw tooCoarse(
      "an argument or a period ratio known too coarsely to be brought into one period cell",
      "an enclosure that is small beside the cell",
    );
  }
  let A: Term = { re: 1n << shiftBy(wp), im: 0n, err: 0, size: 1 };
  let B: Term = { ...U, size: bu };
  const Qs: Term = { ...Q, size: bq };
  let X: Term = { ...T, size: bt };
  let Y = times(Qs, B, wp);
  const sums = new PairSums(order);
  for (let n = 0; 10 * n <= order || !(isUnit(A) && isUnit(B)); n++) {
    sums.add(n, A, B);
    [A, B] = [times(A, X, wp), times(B, Y, wp)];
    [X, Y] = [times(X, Qs, wp), times(Y, Qs, wp)];
  }
  return sums.finish(2 * (A.err + B.err + 4), wp);
}

/** A fixed-point number with a bound of its size. */
interface Term extends Fixed {
  readonly size: number;
}

function times(x: Term, y: Term, wp: number): Term {
  return { ...product(x, y, x.size, y.size, wp), size: x.size * y.size * UP };
}

function isUnit({ re, im }: Fixed): boolean {
  return within(re) && within(im);
}

function within(x: bigint): boolean {
  return x <= 1n && x >= -1n;
}

/** Σ (−1)^n (2n+1)^k ((−1)^k A_n − B_n). */
class PairSums {
  private readonly re: bigint[];
  private readonly im: bigint[];
  private readonly err: number[];
  private count = 0;

  constructor(order: number) {
    this.re = new Array<bigint>(order + 1).fill(0n);
    this.im = new Array<bigint>(order + 1).fill(0n);
    this.err = new Array<number>(order + 1).fill(0);
  }

  add(n: number, A: Fixed, B: Fixed): void {
    const sign = n & 1 ? -1n : 1n;
    const odd = BigInt(2 * n + 1);
    let power = sign;
    let weight = A.err + B.err;
    for (let k = 0; k < this.re.length; k++) {
      // Even k takes A − B, odd k takes −(A + B).
      const [re, im] = k & 1 ? [-A.re - B.re, -A.im - B.im] : [A.re - B.re, A.im - B.im];
      this.re[k]! += power * re;
      this.im[k]! += power * im;
      this.err[k] = (this.err[k]! + weight) * UP;
      power *= odd;
      weight *= 2 * n + 1;
    }
    this.count = n + 1;
  }

  /** With a tail of at most `rest`·(2n+1)^k. */
  finish(rest: number, wp: number): Disc[] {
    let weight = rest;
    return this.re.map((re, k) => {
      const err = (this.err[k]! + weight) * UP;
      weight *= 2 * this.count + 1;
      return sumDisc(re, this.im[k]!, err, wp);
    });
  }
}

/** Theta series at v = 0 and the two weighted sums of θ1, each as a disc. */
export interface ThetaConstants {
  /** Σ q^(n(n+1)), n >= 0: θ2 = 2 q^(1/4) times this. */
  readonly half2: Disc;
  /** θ3 = 1 + 2 Σ q^(n²), n >= 1. */
  readonly theta3: Disc;
  /** θ4 = 1 + 2 Σ (−q)^(n²), n >= 1. */
  readonly theta4: Disc;
  /** Σ (−1)^n (2n+1) q^(n(n+1)): θ1′(0) = 2π q^(1/4) times this. */
  readonly first: Disc;
  /** Σ (−1)^n (2n+1)³ q^(n(n+1)): θ1‴(0) = −2π³ q^(1/4) times this. */
  readonly third: Disc;
}

/**
 * The theta constants of one nome q = exp(πiτ).
 *
 * Domain   |q| < 0.1 over the whole disc.
 * Error    as in the header: products q^(n²) = q^(n(n−1)) q^n and q^(n(n+1)) = q^(n²) q^n, tail at most twice its first term
 *          (the ratio of terms from n = 1 on is at most (5/3)³ · 0.1³ < 1/2).
 * Cost     about √(wp / log2 1/|q|) steps of three complex products.
 */
export function thetaConstants(q: Disc, wp: number): ThetaConstants {
  const Q = toFixed(q, wp);
  const bq = absUpper(Q, wp);
  if (!(bq < 0.1)) {
    throw tooCoarse(
      "a period ratio known too coarsely to be reduced",
      "a nome with |q| < 0.1 over its whole enclosure",
    );
  }
  const one = 1n << shiftBy(wp);
  const base: Term = { ...Q, size: bq };
  // P = q^n, M = q^(n(n+1)), R = q^(n²)
  let P = base;
  let M: Term = { re: one, im: 0n, err: 0, size: 1 };
  const [half2, first, third] = [new WeightedSum(one), new WeightedSum(one), new WeightedSum(one)];
  const [plus, minus] = [new WeightedSum(0n), new WeightedSum(0n)];
  for (let n = 1; ; n++) {
    const R = times(M, P, wp);
    M = times(R, P, wp);
    const odd = 2 * n + 1;
    if (isUnit(R) && isUnit(M)) {
      const [r, m] = [2 * (R.err + 2), 2 * (M.err + 2)];
      return {
        half2: half2.finish(m, 1n, wp),
        theta3: plus.finish(r, 2n, wp, one),
        theta4: minus.finish(r, 2n, wp, one),
        first: first.finish(odd * m, 1n, wp),
        third: third.finish(odd * odd * odd * m, 1n, wp),
      };
    }
    const sign = n & 1 ? -1 : 1;
    plus.add(R, 1);
    minus.add(R, sign);
    half2.add(M, 1);
    first.add(M, sign * odd);
    third.add(M, sign * odd * odd * odd);
    P = times(P, base, wp);
  }
}

/** A sum of weighted terms with its error. */
class WeightedSum {
  private re: bigint;
  private im = 0n;
  private err = 0;

  constructor(start: bigint) {
    this.re = start;
  }

  add(x: Fixed, weight: number): void {
    const w = BigInt(weight);
    this.re += w * x.re;
    this.im += w * x.im;
    this.err = (this.err + Math.abs(weight) * x.err) * UP;
  }

  /** start + factor·(the sum, with a tail of at most `rest`). */
  finish(rest: number, factor: bigint, wp: number, start = 0n): Disc {
    return sumDisc(start + factor * this.re, factor * this.im, Number(factor) * (this.err + rest) * UP, wp);
  }
}
