import { DomainError, PoleError } from "../../proof/errors.ts";
import { bitLength, shift } from "../fixed/bits.ts";
import { keptConstant } from "../fixed/constants.ts";
import { eulerFixed, lowerGammaSum } from "../fixed/gamma.ts";
import { Rational } from "../rational.ts";
import { div, ldexp, mul, round, sqrt, sub, widenBy } from "./arithmetic.ts";
import { pi } from "./constants.ts";
import { type Ball, finish, fromInt, fromRational } from "./data.ts";
import { exp, ln } from "./exp.ts";

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

const LARGEST = 100_000n;

/**
 * Γ(q) for a rational q that is not 0, −1, −2, ...
 *
 * Domain   |q| <= 100,000.
 * Error    Γ(s) = N^s e^(−N) Σ N^k/(s...(s+k)) + Γ(s, N) for s in (0, 1], with 0 < Γ(s, N) <= e^(−N) for N >= 1; the argument is brought there
 *          by the exact product of the recurrence. Integers come from factorials, halves from √π.
 * Cost     about 2.5·prec terms with short factors.
 * Throws   PoleError at 0, −1, −2, ...; DomainError for a larger |q|.
 * Source   DLMF 8.7.1 (the series), 8.10.1 (the bound), 5.5.1 (the recurrence).
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
  if (q.abs().compare(LARGEST) > 0) {
    throw new DomainError({ subject: "gamma", given: `${q}`, expected: `a size of at most ${LARGEST}`, argument: "x" });
  }
  // q = s + m with s in (0, 1].
  const m = -q.neg().floor() - 1n;
  const s = q.minus(m);
  const factor = risingProduct(m >= 0n ? s : q, m >= 0n ? m : -m);
  const work = prec + 16;
  const base = baseGamma(s, work);
  const scale = fromRational(factor, work);
  return m >= 0n ? mul(base, scale, prec) : div(base, scale, prec);
}

/** x(x+1)...(x+n−1), by halves. */
function risingProduct(x: Rational, n: bigint): Rational {
  const { num, den } = x;
  const product = (low: bigint, high: bigint): bigint => {
    if (high - low === 0n) return 1n;
    if (high - low === 1n) return num + low * den;
    const middle = (low + high) >> 1n;
    return product(low, middle) * product(middle, high);
  };
  return Rational.of(product(0n, n), den ** n);
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
