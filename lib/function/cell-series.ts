// The part of ln θ1 beside ln sin, as a series in y = 4 sin²(πv) whose coefficients depend on the nome alone.
//
// sin((2m+1)x)/sin x = Σ_n (−1)^n c(m, n) y^n with c(m, n) = C(m+n, 2n) (2m+1)/(2n+1), so with q = exp(πiτ), x = πv   (DLMF 20.2.1)
//     θ1(v) = 2 q^(1/4) sin x · P(y),   P(y) = Σ b_n y^n,   b_n = (−1)^n Σ_{m>=n} (−1)^m q^(m(m+1)) c(m, n).
// In the cell |y| grows to about 1/|q|, so the sums are taken in Y = 2^−k y with 1 <= 2^k |q| < 2 and B_n = 2^(kn) b_n:
//     E_j = Σ n^j B_n Y^n = (y d/dy)^j P.
// One evaluation costs two products a term, and the coefficients are made once for a lattice and a precision.
//
// Sizes, for Q = |q| <= 0.1: the quotient of the terms m+1 and m of b_n is at most
// Q^(2m+2) (m+n+1)/(m+1−n) (2m+3)/(2m+1) <= Q^(2n+2) (2n+3) <= 0.03, so what is left out of b_n is at most 1.04 times its first term, and
// |B_n| <= 1.04 Q^(n(n+1)) 2^(kn) <= 1.04 (2Q^n)^n. For |Y| <= 1.5 the bounds of the terms n^j B_n Y^n, j <= 3, n >= 1, fall at least by
// 8 · 2Q³ · 1.5 < 0.03: the tail is at most 1.1 times the bound of its first term.

import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { pow2, shift } from "../number/fixed/bits.ts";
import { radiusMagnitude } from "./enclosure.ts";
import { absUpper, type Fixed, product, ROOT2, square, sumDisc, toFixed, tooCoarse, UP } from "./fixed-complex.ts";

/** B_0, B_1, ... of a nome, with `places` binary places. */
export interface CellSeries {
  readonly places: number;
  readonly k: number;
  readonly coefficients: readonly Fixed[];
  /** 1.1 · 1.04 Q^(n(n+1)) 2^(kn) < 2^−falls[n], for one n more than there are coefficients. */
  readonly falls: readonly number[];
  /** Whether all coefficients are real: τ on the imaginary axis, or beside it by a half. */
  readonly real: boolean;
}

/** Most of |Y|; in the cell it is at most 1 + 2Q + Q². */
export const LARGEST = 1.5;
/** Bits that the terms from n = 1 on get beyond those of P: they are of size Q² in a tall cell, where values differ by them only. */
const MOST_SPARE = 512;

/**
 * The coefficients for the nome q.
 *
 * Domain   |q| <= 0.1 over the whole disc, as on a reduced lattice.
 * Error    enclosures, 2^−places absolute as far as q is known.
 * Cost     N²/2 products by small integers for N = √(wp / log2 1/Q).
 */
export function cellSeries(q: Disc, q2: Disc, wp: number): CellSeries {
  const size = ball.upper(disc.abs(q, 53));
  if (!(ball.compare(size, TENTH) === -1)) {
    throw tooCoarse("a period ratio known too coarsely to be reduced", "a nome with |q| <= 0.1");
  }
  const k = 1 - ball.magnitude(size);
  const places = wp + Math.min(k, MOST_SPARE) + 8;
  const falls = fallsOf(size, k, places);
  const count = falls.length - 1;
  const work = Math.max(64, Math.min(wp + 24, 64 - radiusMagnitude(q)));
  const powers = pronicPowers(q2, count + 1, work);
  const table = binomialTable(count);
  const rest = ball.upper(disc.abs(powers[count]!, 53));
  const coefficients = Array.from({ length: count }, (_, n) => {
    let sum = powers[n]!;
    if (n > 0) sum = disc.mulInt(sum, table[n]![n]!, work);
    for (let m = n + 1; m < count; m++) {
      const term = disc.mulInt(powers[m]!, table[m]![n]!, work);
      sum = (m - n) & 1 ? disc.sub(sum, term, work) : disc.add(sum, term, work);
    }
    const left = ball.mul(rest, ball.fromInt(2n * table[count]![n]!), 53);
    return toFixed(disc.ldexp(disc.widenBy(sum, left, work), k * n), places);
  });
  return { places, k, coefficients, falls, real: q2.axis === "real" };
}

const TENTH = { man: 1638n, exp: -14, rad: 0 };

/** Bounds of the coefficients, up to the first n whose term is under 2^−24 ulps whatever Y is. */
function fallsOf(size: ball.Ball, k: number, places: number): number[] {
  const falls: number[] = [];
  for (let n = 0; ; n++) {
    const power = ball.mulInt(ball.pow(size, n * (n + 1), 53), 5n, 53);
    falls.push(2 - ball.magnitude(power) - k * n);
    if (n > 0 && falls[n]! > places + 24 + n) return falls;
  }
}

/** q^(m(m+1)), m < count. */
function pronicPowers(square: Disc, count: number, work: number): Disc[] {
  const powers: Disc[] = [disc.one];
  let step = disc.one;
  for (let m = 1; m < count; m++) {
    step = disc.mul(step, square, work);
    powers.push(disc.mul(powers[m - 1]!, step, work));
  }
  return powers;
}

const binomials: bigint[][] = [[1n]];

/** c(m, n) for n <= m <= last, by sin((2m+1)x) = (2 − y) sin((2m−1)x) − sin((2m−3)x). */
function binomialTable(last: number): readonly (readonly bigint[])[] {
  for (let m = binomials.length; m <= last; m++) {
    const [one, two] = [binomials[m - 1]!, binomials[m - 2] ?? [-1n]];
    binomials.push(Array.from({ length: m + 1 }, (_, n) => 2n * (one[n] ?? 0n) - (two[n] ?? 0n) + (one[n - 1] ?? 0n)));
  }
  return binomials;
}

/**
 * E_0 .. E_order at y = 4 sin²(πv).
 *
 * Domain   |2^−k y| <= 1.5 over the whole disc, as in the cell.
 * Error    counted; absolute, some units of 2^−places for a sharp y.
 * Cost     √(wp / log2 1/Q) terms of two complex products, of sizes that shrink with the terms; half of that and less where the
 *          coefficients or y are real.
 * Throws   PrecisionError for a disc that leaves the domain.
 */
export function cellSums(series: CellSeries, y: Disc, order: number): Disc[] {
  const Y = disc.ldexp(y, -series.k);
  const places = Math.max(64, Math.min(series.places, 64 - radiusMagnitude(Y)));
  const point = toFixed(Y, places);
  const size = absUpper(point, places);
  if (!(size <= LARGEST)) {
    throw tooCoarse(
      "an argument or a period ratio known too coarsely to be brought into one period cell",
      "an enclosure that is small beside the cell",
    );
  }
  const real = series.real && y.axis === "real";
  return pointSums(withPlaces(series, places), point, size, order, real).map((sum) => {
    const whole = sumDisc(sum.re, sum.im, sum.err, places);
    return real ? disc.fromBall(disc.real(whole)) : whole;
  });
}

/** The series with fewer places. */
export function withPlaces(series: CellSeries, places: number): CellSeries {
  const cut = series.places - places;
  if (cut === 0) return series;
  return { ...series, places, coefficients: series.coefficients.map((c) => trimmed(c, cut)) };
}

/**
 * The same at Y = 2^−k y with as many places as the series has. A long series is taken as A(Y²) + Y B(Y²), which spares half of the powers and costs a
 * product for each sum.
 * @param size at least |Y|, at most 1.5
 * @param real whether coefficients and Y are real
 */
export function pointSums(series: CellSeries, point: Fixed, size: number, order: number, real: boolean): Fixed[] {
  if (series.coefficients.length < LONG) return weighted(termsOf(series, point, size), order, real);
  const { places } = series;
  const { terms, bound } = termsOf(series, point, size, true);
  const half = (parity: number) => terms.map((term, n) => (n % 2 === parity ? term : NOTHING));
  const even = weighted({ terms: half(0), bound }, order, real);
  const odd = weighted({ terms: half(1), bound: 0 }, order, real);
  return even.map((sum, j) => {
    const rest = product(odd[j]!, point, absUpper(odd[j]!, places), size, places);
    return { re: sum.re + rest.re, im: sum.im + rest.im, err: (sum.err + rest.err) * UP };
  });
}

/** From here on the split pays (measured). */
const LONG = 40;
const NOTHING: Fixed = { re: 0n, im: 0n, err: 0 };

interface Terms {
  readonly terms: readonly Fixed[];
  /** In units, of the first term left out; those after it are counted too, as in the header. */
  readonly bound: number;
}

/** B_n Y^n, or B_n Y^(n−1) for odd n of a split series. */
function termsOf(series: CellSeries, point: Fixed, size: number, split = false): Terms {
  const { places } = series;
  const terms = [series.coefficients[0]!];
  const step = split ? 2 : 1;
  const powers = split
    ? new Powers(square(point, size, places), size * size * UP, places)
    : new Powers(point, size, places);
  let reach = 1;
  for (let n = 1; ; n++) {
    reach *= size * UP;
    const fall = series.falls[n]!;
    const bound = reach * pow2(places - fall);
    if (n === series.coefficients.length || bound < 2 ** -24) return { terms, bound: bound * UP };
    const B = series.coefficients[n]!;
    const k = Math.floor(n / step);
    if (k === 0) {
      terms.push(B);
      continue;
    }
    // The product with B_n needs no more places of the power than this.
    const power = n % step === 0 ? powers.next(k, Math.max(16, places - fall)) : powers.last(k);
    terms.push(product(B, power, pow2(places - powers.places - fall), powers.bound(k), powers.places));
  }
}

/** Y, Y², Y³, ... with fewer and fewer places. */
class Powers {
  private readonly list: Fixed[];
  private readonly all: number[];
  private readonly bounds: number[];

  constructor(Y: Fixed, size: number, places: number) {
    this.list = [Y];
    this.all = [places];
    this.bounds = [1, size];
  }

  /** At least |Y|^n, for n up to one more than the last power. */
  bound(n: number): number {
    this.bounds[n] ??= this.bounds[n - 1]! * this.bounds[1]! * UP;
    return this.bounds[n]!;
  }

  /** Places of the last power. */
  get places(): number {
    return this.all.at(-1)!;
  }

  /** Y^n as the n-th call; even powers are squares, which cost half. */
  next(n: number, wanted: number): Fixed {
    const places = Math.min(this.places, wanted);
    const at = (k: number) => trimmed(this.list[k - 1]!, this.all[k - 1]! - places);
    let power = at(1);
    if (n > 1)
      power = n % 2 === 0 ? square(at(n / 2), this.bound(n / 2), places) : this.times(at(n - 1), power, n, places);
    this.list[n - 1] = power;
    this.all[n - 1] = places;
    return power;
  }

  /** Y^n again. */
  last(n: number): Fixed {
    return this.list[n - 1]!;
  }

  private times(x: Fixed, y: Fixed, n: number, places: number): Fixed {
    return product(x, y, this.bound(n - 1), this.bound(1), places);
  }
}

/** x with `cut` places fewer. */
function trimmed(x: Fixed, cut: number): Fixed {
  if (cut === 0) return x;
  const by = shift(cut);
  return { re: x.re >> by, im: x.im >> by, err: (x.err * pow2(-cut) + ROOT2) * UP };
}

/**
 * Σ n^j T_n, n = 0, 1, ..., for j = 0 .. order <= 3, with a tail of at most `bound`·n^j.
 *
 * From the last term on each running sum is added into the next one, which takes no product: R_0 = Σ T_n, R_1 = Σ n T_n,
 * R_2 = Σ n(n+1)/2 T_n, R_3 = Σ n(n+1)(n+2)/6 T_n.
 */
function weighted({ terms, bound }: Terms, order: number, real: boolean): Fixed[] {
  const err = errors(terms, order, bound);
  const re = running(
    terms.map((t) => t.re),
    order,
  );
  const im = real
    ? []
    : running(
        terms.map((t) => t.im),
        order,
      );
  return re.map((x, j) => ({ re: x, im: real ? 0n : im[j]!, err: err[j]! }));
}

function running(terms: readonly bigint[], order: number): bigint[] {
  const R = new Array<bigint>(order + 1).fill(0n);
  for (let n = terms.length - 1; n > 0; n--) {
    R[0]! += terms[n]!;
    for (let j = 1; j <= order; j++) R[j]! += R[j - 1]!;
  }
  const [r0, r1, r2, r3] = R as [bigint, bigint?, bigint?, bigint?];
  const sums = [r0 + terms[0]!];
  if (r1 !== undefined) sums.push(r1);
  if (r2 !== undefined) sums.push(2n * r2 - r1!);
  if (r3 !== undefined) sums.push(6n * (r3 - r2!) + r1!);
  return sums;
}

function errors(terms: readonly Fixed[], order: number, bound: number): number[] {
  const sums = new Array<number>(order + 1).fill(0);
  for (let n = terms.length; n >= 0; n--) {
    let err = n === terms.length ? bound : terms[n]!.err;
    for (let j = 0; j <= order; j++) {
      sums[j] = (sums[j]! + err) * UP;
      err *= n;
    }
  }
  return sums;
}
