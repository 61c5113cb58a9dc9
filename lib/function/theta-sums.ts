// Theta series in fixed point, with every rounding and the tail counted.
//
// With q = exp(πiτ), u = exp(2πiv), t = q²/u and n = 0, 1, 2, ...
//     A_n = q^(n(n−1)) t^n,   B_n = q^(n(n+1)) u^(n+1),
//     θ1(v) = i q^(1/4) u^(−1/2) S_0,   (d/(πi dv))^k θ1 = i q^(1/4) u^(−1/2) S_k,
//     S_k = Σ (−1)^n (2n+1)^k ((−1)^k A_n − B_n)
// (DLMF 20.2.1 with z = πv and the terms n and −n−1 paired). On a reduced lattice with 0 <= Im v <= Im τ / 2 we have
// |q| < 0.073, |t| <= |q|, |u| <= 1: both sequences fall like |q|^(n²) and nothing overflows whatever Im τ is.
//
// Errors. A fixed-point number is (re + i im) 2^−wp with |true − stored| <= e ulps, e a double. The product of x and y, each
// part floored, has error at most |x| e_y + |y| e_x + e_x e_y 2^−wp + √2. Doubles here are sums and products of
// nonnegative numbers, each rounded by at most 2^−53 relative; `UP` covers all of one update.
// Tail. From the first omitted index N on the terms fall at least by (1 + 2/(2N+1))^k |q²|^N max(|t|, |u||q²|), which for k < 10 N is at most
// (5/3)^10 · 0.01 · 0.2 for N = 1, e^10 · 0.01² · 0.2 above: under 1/2, so the tail of S_k is at most twice its first term.

import { type Disc, finish } from "../number/disc/data.ts";
import { pow2, shift as shiftBy } from "../number/fixed/bits.ts";
import { PrecisionError } from "../proof/errors.ts";

/** Covers the roundings of one update of an error counter. */
const UP = 1 + 2 ** -40;
/** √2, rounded up. */
const ROOT2 = 1.4143;

/** A complex number (re + i im) 2^−wp, off by at most `err` ulps. */
export interface Fixed {
  readonly re: bigint;
  readonly im: bigint;
  readonly err: number;
}

/** d as a fixed-point number with wp bits after the point; exact where that is possible. */
export function toFixed(d: Disc, wp: number): Fixed {
  const shift = d.exp + wp;
  if (shift >= 0) {
    const by = shiftBy(shift);
    return { re: d.re << by, im: d.im << by, err: d.rad === 0 ? 0 : d.rad * pow2(shift) };
  }
  const by = shiftBy(-shift);
  return { re: d.re >> by, im: d.im >> by, err: (d.rad * pow2(shift) + ROOT2) * UP };
}

/** Upper bound of |x| as a double. */
export function absUpper(x: Fixed, wp: number): number {
  const scale = pow2(-Math.min(wp, 900));
  const down = shiftBy(Math.max(wp - 900, 0));
  const part = (n: bigint) => (Number((n < 0n ? -n : n) >> down) + 1) * scale * UP;
  const [a, b] = [part(x.re), part(x.im)];
  return (Math.sqrt(a * a + b * b) + x.err * pow2(-wp)) * UP;
}

/** A sum as a disc; a wide one loses the bits under its radius. */
function disc(re: bigint, im: bigint, err: number, wp: number): Disc {
  if (!(err < 2 ** 900)) throw tooCoarse("an argument or a period ratio known too coarsely", "narrower enclosures");
  return finish(re, im, -wp, Math.max(1, err), wp + 64);
}

function tooCoarse(given: string, expected: string): PrecisionError {
  return new PrecisionError({
    subject: "theta series",
    given,
    expected,
    hint: "Give the argument or the periods with more digits.",
  });
}

/**
 * The sums S_0 .. S_order of the header.
 *
 * Domain   |q²| < 0.01, |t| < 0.2, |u| < 4 over the whole discs (holds on a reduced lattice with slack for wide discs).
 * Error    counted as in the header; absolute, about ten units of 2^−wp for exact input.
 * Cost     about √(wp/(2 log2 1/|q|)) steps of four complex products, whose sizes shrink with the terms.
 * Throws   PrecisionError if the discs leave the domain, as wide ones can.
 */
export function thetaSums(u: Disc, t: Disc, q2: Disc, order: number, wp: number): Disc[] {
  const shift = shiftBy(wp);
  const ulp = pow2(-wp);
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
  let ar = 1n << shift;
  let ai = 0n;
  let { re: br, im: bi } = U;
  let { re: xr, im: xi } = T;
  let yr = (Q.re * U.re - Q.im * U.im) >> shift;
  let yi = (Q.re * U.im + Q.im * U.re) >> shift;
  // Error counters and magnitude bounds of A, B, X = q^(2n) t, Y = q^(2n+2) u.
  let [ea, eb, ex] = [0, U.err, T.err];
  let ey = (bq * U.err + bu * Q.err + Q.err * U.err * ulp + ROOT2) * UP;
  let [ma, mb, mx, my] = [1, bu, bt, bq * bu * UP];
  const re: bigint[] = new Array(order + 1).fill(0n);
  const im: bigint[] = new Array(order + 1).fill(0n);
  const err: number[] = new Array(order + 1).fill(0);
  for (let n = 0; ; n++) {
    const odd = BigInt(2 * n + 1);
    const small = 1n;
    if (10 * n > order && within(ar, small) && within(ai, small) && within(br, small) && within(bi, small)) {
      let weight = 2 * (ea + eb + 4);
      for (let k = 0; k <= order; k++) {
        err[k] = (err[k]! + weight) * UP;
        weight *= 2 * n + 1;
      }
      break;
    }
    // (−1)^n ((−1)^k A − B): even k takes A − B, odd k takes −(A + B).
    let [er, ei] = [ar - br, ai - bi];
    let [or, oi] = [-ar - br, -ai - bi];
    if (n & 1) {
      [er, ei, or, oi] = [-er, -ei, -or, -oi];
    }
    re[0]! += er;
    im[0]! += ei;
    let weight = ea + eb;
    err[0] = (err[0]! + weight) * UP;
    let power = odd;
    for (let k = 1; k <= order; k++) {
      weight *= 2 * n + 1;
      err[k] = (err[k]! + weight) * UP;
      if (k & 1) {
        re[k]! += power * or;
        im[k]! += power * oi;
      } else {
        re[k]! += power * er;
        im[k]! += power * ei;
      }
      power *= odd;
    }
    const nextA = (ar * xr - ai * xi) >> shift;
    ai = (ar * xi + ai * xr) >> shift;
    ar = nextA;
    ea = (ma * ex + mx * ea + ea * ex * ulp + ROOT2) * UP;
    ma *= mx;
    const nextB = (br * yr - bi * yi) >> shift;
    bi = (br * yi + bi * yr) >> shift;
    br = nextB;
    eb = (mb * ey + my * eb + eb * ey * ulp + ROOT2) * UP;
    mb *= my;
    const nextX = (xr * Q.re - xi * Q.im) >> shift;
    xi = (xr * Q.im + xi * Q.re) >> shift;
    xr = nextX;
    ex = (mx * Q.err + bq * ex + ex * Q.err * ulp + ROOT2) * UP;
    mx *= bq;
    const nextY = (yr * Q.re - yi * Q.im) >> shift;
    yi = (yr * Q.im + yi * Q.re) >> shift;
    yr = nextY;
    ey = (my * Q.err + bq * ey + ey * Q.err * ulp + ROOT2) * UP;
    my *= bq;
  }
  return Array.from({ length: order + 1 }, (_, k) => disc(re[k]!, im[k]!, err[k]!, wp));
}

function within(x: bigint, limit: bigint): boolean {
  return x <= limit && x >= -limit;
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
  const shift = shiftBy(wp);
  const ulp = pow2(-wp);
  const Q = toFixed(q, wp);
  const bq = absUpper(Q, wp);
  if (!(bq < 0.1)) {
    throw tooCoarse(
      "a period ratio known too coarsely to be reduced",
      "a nome with |q| < 0.1 over its whole enclosure",
    );
  }
  const one = 1n << shift;
  // P = q^n, M = q^(n(n+1)), R = q^(n²)
  let [pr, pi, ep, mp] = [Q.re, Q.im, Q.err, bq];
  let [mr, mi, em, mm] = [one, 0n, 0, 1];
  let [hr, hi, eh] = [one, 0n, 0];
  let [fr, fi, ef] = [one, 0n, 0];
  let [tr, ti, et] = [one, 0n, 0];
  let [sr, si, es] = [0n, 0n, 0];
  let [dr, di] = [0n, 0n];
  for (let n = 1; ; n++) {
    const [rr, ri] = [(mr * pr - mi * pi) >> shift, (mr * pi + mi * pr) >> shift];
    const er = (mm * ep + mp * em + em * ep * ulp + ROOT2) * UP;
    const rm = mm * mp;
    const nextM = (rr * pr - ri * pi) >> shift;
    mi = (rr * pi + ri * pr) >> shift;
    mr = nextM;
    em = (rm * ep + mp * er + er * ep * ulp + ROOT2) * UP;
    mm = rm * mp;
    const odd = 2 * n + 1;
    if (within(rr, 1n) && within(ri, 1n) && within(mr, 1n) && within(mi, 1n)) {
      es = (es + 2 * (er + 2)) * UP;
      eh = (eh + 2 * (em + 2)) * UP;
      ef = (ef + 2 * odd * (em + 2)) * UP;
      et = (et + 2 * odd * odd * odd * (em + 2)) * UP;
      break;
    }
    const weight = BigInt(odd);
    const cube = weight * weight * weight;
    sr += rr;
    si += ri;
    es = (es + er) * UP;
    hr += mr;
    hi += mi;
    eh = (eh + em) * UP;
    ef = (ef + odd * em) * UP;
    et = (et + odd * odd * odd * em) * UP;
    if (n & 1) {
      [dr, di, fr, fi, tr, ti] = [dr - rr, di - ri, fr - weight * mr, fi - weight * mi, tr - cube * mr, ti - cube * mi];
    } else {
      [dr, di, fr, fi, tr, ti] = [dr + rr, di + ri, fr + weight * mr, fi + weight * mi, tr + cube * mr, ti + cube * mi];
    }
    const nextP = (pr * Q.re - pi * Q.im) >> shift;
    pi = (pr * Q.im + pi * Q.re) >> shift;
    pr = nextP;
    ep = (mp * Q.err + bq * ep + ep * Q.err * ulp + ROOT2) * UP;
    mp *= bq;
  }
  return {
    half2: disc(hr, hi, eh, wp),
    theta3: disc(one + 2n * sr, 2n * si, 2 * es, wp),
    theta4: disc(one + 2n * dr, 2n * di, 2 * es, wp),
    first: disc(fr, fi, ef, wp),
    third: disc(tr, ti, et, wp),
  };
}
