import { DomainError, PoleError } from "../../proof/errors.ts";
import { bernoulliNumerators } from "../fixed/bernoulli.ts";
import { absBig, bitLength, shift } from "../fixed/bits.ts";
import { keptConstant } from "../fixed/constants.ts";
import { eulerFixed, lowerGammaSum } from "../fixed/gamma.ts";
import { Rational } from "../rational.ts";
import { add, div, ldexp, mul, pow, round, sqrt, sub, widenBy } from "./arithmetic.ts";
import { pi } from "./constants.ts";
import { type Ball, finish, fromInt, fromRational, magnitude } from "./data.ts";
import { exp, ln } from "./exp.ts";
import { sinCos } from "./trig.ts";

const euler = keptConstant((prec) => eulerFixed(prec, (n, work) => fixedOf(ln(fromInt(n), work + 16), work)));

function fixedOf(x: Ball, work: number): bigint {
  const up = x.exp + work;
  return up >= 0 ? x.man << shift(up) : x.man >> shift(-up);
}

/** Euler's constant γ = 0.5772... to prec bits. Kept at the highest precision asked so far. */
export function eulerGamma(prec: number): Ball {
  const work = Math.max(prec, 2) + 2;
  return { man: euler(work), exp: -work, rad: 3 };
}

/** From here on the asymptotic series may cost less than the product of the recurrence (measured). */
const STIRLING_FROM = 1_000n;

/**
 * Γ(q) for a rational q that is not 0, −1, −2, ...
 *
 * Domain   |q| < 2^40, where the exponent of the result comes near its limit.
 * Error    small q: Γ(s) = N^s e^(−N) Σ N^k/(s...(s+k)) + Γ(s, N) for s in (0, 1], with 0 < Γ(s, N) <= e^(−N) for N >= 1; the argument is brought there
 *          by the exact product of the recurrence. Integers come from factorials, halves from √π. Large q: `stirling`; −q by reflection.
 * Cost     about 2.5·prec terms with short factors; for large q about prec/(2 log2 q) terms.
 * Throws   PoleError at 0, −1, −2, ...; DomainError for a larger |q|.
 * Source   DLMF 8.7.1 (the series), 8.10.1 (the bound), 5.5.1 (the recurrence), 5.5.3 (the reflection).
 */
export function gammaRational(q: Rational, prec: number): Ball {
  if (q.den === 1n && q.num <= 0n) {
    throw new PoleError({
      subject: "gamma",
      given: `${q}`,
      expected: "an argument that is no integer from 0 down",
      argument: "x",
    });
  }
  if (q.abs().compare(1n << 40n) > 0) {
    throw new DomainError({ subject: "gamma", given: `${q}`, expected: "a size of at most 2^40", argument: "x" });
  }
  if (q.compare(STIRLING_FROM) >= 0 && pays(q, prec + 64)) return stirling(q, prec);
  if (q.neg().compare(STIRLING_FROM) >= 0 && pays(q.neg(), prec + 64)) return reflected(q, prec);
  // q = s + m with s in (0, 1].
  const m = -q.neg().floor() - 1n;
  const s = q.minus(m);
  const work = prec + 16 + 2 * bitLength(m);
  const base = baseGamma(s, work);
  const scale = risingProduct(m >= 0n ? s : q, m >= 0n ? m : -m, work);
  return m >= 0n ? mul(base, scale, prec) : div(base, scale, prec);
}

/** Whether Stirling's series pays: its terms fall below 2^-bits down to about e^(−2πq), and its many exact numbers cost their square (measured). */
function pays(q: Rational, bits: number): boolean {
  if (q.compare(BigInt(8 * bits)) < 0) return false;
  return stirlingTerms(q, bits) < 400 || q.compare(10_000_000n) > 0;
}

/** Γ(q) = π/(sin(πq)·Γ(1 − q)), with the sine from the fraction of q alone. */
function reflected(q: Rational, prec: number): Ball {
  const work = prec + 16;
  const whole = q.floor();
  const part = q.minus(whole);
  const sine = sinCos(mul(pi(work + 8), fromRational(part, work + 8), work + 8), work).sin;
  const product = mul(sine, gammaRational(Rational.one.minus(q), work), work);
  const value = div(pi(work), product, prec);
  return (whole & 1n) === 0n ? value : { ...value, man: -value.man };
}

/**
 * Γ(q) for q >= 1000, at least eight times the bits.
 * Error    ln Γ(q) = (q − ½) ln q − q + ½ ln 2π + Σ B_2k/(2k(2k−1) q^(2k−1)): the terms alternate, and what is left out has less than the size of the first
 *          term left out and its sign. Its exponential is taken with as many more bits as the logarithm has before its point.
 * Source   DLMF 5.11.1, 5.11(ii).
 */
function stirling(q: Rational, prec: number): Ball {
  const size = bitLength(q.floor());
  const work = prec + size + bitLength(BigInt(size)) + 24;
  const x = fromRational(q, work);
  const series = stirlingSum(q, x, work);
  const main = sub(mul(fromRational(q.minus(Rational.of(1n, 2n)), work), ln(x, work), work), x, work);
  const half = ldexp(ln(ldexp(pi(work), 1), work), -1);
  return exp(add(add(main, half, work), series, work), prec);
}

function stirlingSum(q: Rational, x: Ball, work: number): Ball {
  const square = mul(x, x, work);
  let power = div(fromInt(1), x, work);
  let sum: Ball = fromInt(0);
  for (let k = 1; ; k++) {
    // B_2k/(2k(2k−1)) = ± numerator/(4^k(4^k − 1)·2k(2k − 1))
    const bottom = (1n << BigInt(2 * k)) * ((1n << BigInt(2 * k)) - 1n) * BigInt(2 * k) * BigInt(2 * k - 1);
    const top = bernoulliNumerators(Math.max(k, stirlingTerms(q, work)))[k]!;
    // The bits of a term that reach the last place of the sum.
    const short = Math.max(32, work + 2 + magnitude(power) + Math.max(0, bitLength(top) - bitLength(bottom) + 1));
    const term = mul(div(fromInt(top), fromInt(bottom), short), power, short);
    if (magnitude(term) < -work) return widenBy(sum, term, work);
    sum = k % 2 === 1 ? add(sum, term, work) : sub(sum, term, work);
    power = div(power, square, short);
  }
}

/** About the number of terms, so that the Bernoulli numbers come at one go. */
function stirlingTerms(q: Rational, work: number): number {
  const size = bitLength(q.floor());
  const first = Math.ceil(work / (2 * size - 2));
  return Math.ceil(work / (2 * (size + 4 - bitLength(BigInt(2 * first))))) + 8;
}

/** x(x+1)...(x+n−1) by halves: exactly as long as it is short, then as enclosures. */
function risingProduct(x: Rational, n: bigint, prec: number): Ball {
  const { num, den } = x;
  const exact = (low: bigint, high: bigint): bigint => {
    if (high - low <= 8n) {
      let value = 1n;
      for (let k = low; k < high; k++) value *= num + k * den;
      return value;
    }
    const middle = (low + high) >> 1n;
    return exact(low, middle) * exact(middle, high);
  };
  const span = BigInt(Math.max(8, Math.floor(prec / (bitLength(absBig(num) + n * den, 64) + 1))));
  const product = (low: bigint, high: bigint): Ball => {
    if (high - low <= span) return finish(exact(low, high), 0, 0, prec);
    const middle = (low + high) >> 1n;
    return mul(product(low, middle), product(middle, high), prec);
  };
  const top = product(0n, n);
  return den === 1n ? top : div(top, pow(fromInt(den), Number(n), prec), prec);
}

function baseGamma(s: Rational, prec: number): Ball {
  if (s.den === 1n) return fromInt(1);
  if (s.den === 2n) return sqrt(pi(prec + 4), prec);
  const n = Math.ceil((prec + 8) * 0.6931471805599454) + 1;
  const work = prec + 2 * bitLength(BigInt(n)) + 8;
  const { sum, count } = lowerGammaSum(s.num, s.den, n, work);
  // 2N·S + 2K units as a relative error: S >= 2^work.
  const series = finish(sum, -work, 1, work);
  const relative: Ball = { man: BigInt(2 * n + 2 * count), exp: -work, rad: 0 };
  const widened = widenBy(series, mul(series, relative, 40), prec + 8);
  const log = sub(
    mul(fromRational(s, prec + 24), ln(fromInt(n), prec + 24), prec + 24),
    fromInt(n),
    prec + bitLength(BigInt(n)) + 24,
  );
  const value = mul(widened, exp(log, prec + 8), prec + 8);
  // Γ(s, N) <= e^(−N) < 2^(−1.44 N).
  return round(widenBy(value, ldexp(fromInt(1), -Math.floor(n * Math.LOG2E)), prec + 8), prec);
}
