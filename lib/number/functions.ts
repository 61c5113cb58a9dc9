// The functions of numbers that a user calls. Each reads the precision of the context once and is the origin of its result.
import { DomainError, PrecisionError } from "../proof/errors.ts";
import { bitsOf, checkedDigits, mostBits, within } from "./context.ts";
import {
  ARG_ACROSS,
  type Continued,
  continuedFrom,
  LN_ACROSS,
  POW_ACROSS,
  ROOT_ACROSS,
  SQRT_ACROSS,
} from "./continued.ts";
import { AGM, ATAN2, GAMMA, POW, ROOT } from "./elementary.ts";
import { power as exactPower, rationalRootOf, root } from "./exactness.ts";
import { ARG, SQRT } from "./operations.ts";
import { accuracy, type Exact, mayPass } from "./origin.ts";
import { Rational } from "./rational.ts";
import { apply, birthOf, Complex, type ComplexNumeric, type Numeric, Real, scalar } from "./values.ts";

/**
 * The square root >= 0 of a real number >= 0; the principal root, real part >= 0, of a complex one.
 *
 * Branch   cut along the negative real axis, which belongs to the upper side. A complex enclosure that meets it is refused, unless { cut: "continuous" }
 *          asks to go on across the cut from its midpoint.
 * Throws   DomainError for a negative real number (complex(x) has a root), BranchError for an enclosure that holds both signs or meets the cut.
 * @example sqrt(2)   // 1.4142135623730950488...
 */
export function sqrt(x: Numeric): Real;
export function sqrt(x: ComplexNumeric, options?: Continued): Real | Complex;
export function sqrt(x: ComplexNumeric, options: Continued = {}): Real | Complex {
  const value = scalar(x, "sqrt");
  if (value instanceof Real) return value.sqrt();
  const side = continuedFrom(value, options);
  return side ? apply(SQRT_ACROSS, [value, side]) : apply(SQRT, [value], root(value.exact));
}

/** e^x; exactly 1 for x = 0. */
export function exp(x: Numeric): Real;
export function exp(x: ComplexNumeric): Real | Complex;
export function exp(x: ComplexNumeric): Real | Complex {
  return scalar(x, "exp").exp();
}

/**
 * The natural logarithm of a positive number, or the principal one of a complex number: imaginary part in (−π, π].
 *
 * Branch   cut along the negative real axis, which belongs to the upper side; { cut: "continuous" } as for `sqrt`.
 * Throws   DomainError for 0 and for a negative real number, BranchError for an enclosure that meets the cut.
 */
export function ln(x: Numeric): Real;
export function ln(x: ComplexNumeric, options?: Continued): Real | Complex;
export function ln(x: ComplexNumeric, options: Continued = {}): Real | Complex {
  const value = scalar(x, "ln");
  const side = value instanceof Complex ? continuedFrom(value, options) : undefined;
  return side ? apply(LN_ACROSS, [value, side]) : value.ln();
}

/** sin x, x in radians. */
export function sin(x: Numeric): Real;
export function sin(x: ComplexNumeric): Real | Complex;
export function sin(x: ComplexNumeric): Real | Complex {
  return scalar(x, "sin").sin();
}

/** cos x, x in radians. */
export function cos(x: Numeric): Real;
export function cos(x: ComplexNumeric): Real | Complex;
export function cos(x: ComplexNumeric): Real | Complex {
  return scalar(x, "cos").cos();
}

/** tan x, x in radians. Throws PoleError where the cosine cannot be told from 0. */
export function tan(x: Numeric): Real;
export function tan(x: ComplexNumeric): Real | Complex;
export function tan(x: ComplexNumeric): Real | Complex {
  return scalar(x, "tan").tan();
}

/** Hyperbolic sine, entire; exactly real on a real argument. */
export function sinh(x: Numeric): Real;
export function sinh(x: ComplexNumeric): Real | Complex;
export function sinh(x: ComplexNumeric): Real | Complex {
  return scalar(x, "sinh").sinh();
}

/** Hyperbolic cosine, entire; exactly real on a real argument. */
export function cosh(x: Numeric): Real;
export function cosh(x: ComplexNumeric): Real | Complex;
export function cosh(x: ComplexNumeric): Real | Complex {
  return scalar(x, "cosh").cosh();
}

/** Hyperbolic tangent. Throws PoleError where the enclosure holds a pole iπ/2 + kiπ. */
export function tanh(x: Numeric): Real;
export function tanh(x: ComplexNumeric): Real | Complex;
export function tanh(x: ComplexNumeric): Real | Complex {
  return scalar(x, "tanh").tanh();
}

/** asin x in [−π/2, π/2] for a real x of [−1, 1]; of a complex one with cuts along the real axis beyond ±1. */
export function asin(x: Numeric): Real;
export function asin(x: ComplexNumeric): Real | Complex;
export function asin(x: ComplexNumeric): Real | Complex {
  return scalar(x, "asin").asin();
}

/** acos x in [0, π] for a real x of [−1, 1]; of a complex one with cuts along the real axis beyond ±1. */
export function acos(x: Numeric): Real;
export function acos(x: ComplexNumeric): Real | Complex;
export function acos(x: ComplexNumeric): Real | Complex {
  return scalar(x, "acos").acos();
}

/** atan x in (−π/2, π/2) for a real x; of a complex one with cuts along the imaginary axis beyond ±i. */
export function atan(x: Numeric): Real;
export function atan(x: ComplexNumeric): Real | Complex;
export function atan(x: ComplexNumeric): Real | Complex {
  return scalar(x, "atan").atan();
}

/**
 * Inverse hyperbolic sine: ln(x + √(x² + 1)), the principal values of both.
 * Branch   cuts along the imaginary axis beyond ±i.
 */
export function asinh(x: Numeric): Real;
export function asinh(x: ComplexNumeric): Real | Complex;
export function asinh(x: ComplexNumeric): Real | Complex {
  return scalar(x, "asinh").asinh();
}

/**
 * Inverse hyperbolic cosine: >= 0 for a real x >= 1; of a complex one ln(x + √(x + 1)√(x − 1)).
 * Branch   cut along the real axis below 1, which belongs to the upper side.
 * Throws   DomainError for a real x < 1 (complex(x) has a value), BranchError for a disc that meets the cut.
 */
export function acosh(x: Numeric): Real;
export function acosh(x: ComplexNumeric): Real | Complex;
export function acosh(x: ComplexNumeric): Real | Complex {
  return scalar(x, "acosh").acosh();
}

/**
 * Inverse hyperbolic tangent, for a real |x| < 1 or a complex x.
 * Branch   cuts along the real axis beyond ±1. Throws PoleError at ±1, DomainError for a real |x| > 1.
 */
export function atanh(x: Numeric): Real;
export function atanh(x: ComplexNumeric): Real | Complex;
export function atanh(x: ComplexNumeric): Real | Complex {
  return scalar(x, "atanh").atanh();
}

/** The angle of the point (x, y), in (−π, π]; of a negative x with exact y = 0 it is π. Throws BranchError where the enclosures meet the cut. */
export function atan2(y: Numeric, x: Numeric): Real {
  return apply(ATAN2, [Real.from(y), Real.from(x)]) as Real;
}

/**
 * The argument in (−π, π], the negative real axis belonging to the upper side; { cut: "continuous" } as for `sqrt`.
 * Throws DomainError for 0, BranchError for an enclosure that meets the cut.
 */
export function arg(x: ComplexNumeric, options: Continued = {}): Real {
  const value = scalar(x, "arg");
  const side = value instanceof Complex ? continuedFrom(value, options) : undefined;
  if (side) return apply(ARG_ACROSS, [value, side]) as Real;
  const positive = value.exact instanceof Rational && value.exact.num > 0n;
  return apply(ARG, [value], positive ? Rational.zero : undefined) as Real;
}

/** |x|. */
export function abs(x: ComplexNumeric): Real {
  return scalar(x, "abs").abs();
}

/** The complex conjugate. */
export function conj(x: ComplexNumeric): Complex {
  return Complex.from(x).conj();
}

/** x^y: an integer power by products, any other by exp(y·ln x), principal; branch and { cut: "continuous" } as for `ln`. */
export function pow(x: Numeric, y: Numeric): Real;
export function pow(x: ComplexNumeric, y: ComplexNumeric, options?: Continued): Real | Complex;
export function pow(x: ComplexNumeric, y: ComplexNumeric, options: Continued = {}): Real | Complex {
  const base = scalar(x, "pow");
  const exponent = scalar(y, "pow");
  if (exponent.exact instanceof Rational && exponent.exact.den === 1n) {
    const n = Number(exponent.exact.num);
    // A longer one leaves the range of exponents, and the exponential says so.
    if (Number.isSafeInteger(n)) return base.pow(n);
  }
  const side = base instanceof Complex ? continuedFrom(base, options) : undefined;
  if (side) return apply(POW_ACROSS, [base, exponent, side]);
  return apply(POW, [base, exponent], fractionalPower(base.exact, exponent.exact));
}

/** x^(m/n) for a rational x >= 0 whose n-th root is exact; square roots also where they are quadratic. */
function fractionalPower(x: Exact | undefined, y: Exact | undefined): Exact | undefined {
  if (!(x instanceof Rational && y instanceof Rational)) return undefined;
  const base = y.den === 2n ? root(x) : x.num >= 0n && y.den < 1000n ? rationalRootOf(x, Number(y.den)) : undefined;
  return base && exactPower(base, Number(y.num));
}

/**
 * The n-th root of a real number: >= 0 of one >= 0, of a negative one for odd n only. Of a complex number the principal one, exp((ln x)/n).
 * Branch   as for `ln`, with { cut: "continuous" } too. The real root of −8 is −2, the principal one of complex(-8) is 1 + √3 i.
 */
export function nthRoot(x: Numeric, n: number): Real;
export function nthRoot(x: ComplexNumeric, n: number, options?: Continued): Real | Complex;
export function nthRoot(x: ComplexNumeric, n: number, options: Continued = {}): Real | Complex {
  const value = scalar(x, "nthRoot");
  const side = value instanceof Complex ? continuedFrom(value, options) : undefined;
  if (side) return apply(ROOT_ACROSS, [value, n, side]);
  const principal = value instanceof Real || (value.exact?.sign() ?? -1) >= 0;
  return apply(ROOT, [value, n], principal ? rationalRootOf(value.exact, n) : undefined);
}

/**
 * Arithmetic-geometric mean: of two positive numbers, or of complex ones with the right choice of every root (|a' − b'| <= |a' + b'|).
 * Throws DomainError for a negative real number, BranchError where the choice stays open.
 */
export function agm(a: Numeric, b: Numeric): Real;
export function agm(a: ComplexNumeric, b: ComplexNumeric): Real | Complex;
export function agm(a: ComplexNumeric, b: ComplexNumeric): Real | Complex {
  return apply(AGM, [scalar(a, "agm"), scalar(b, "agm")]);
}

/** Γ(x) for an exact rational x that is not 0, −1, −2, ... Throws PoleError there, DomainError for other arguments. */
export function gamma(x: Numeric): Real {
  const q = Real.from(x).exact;
  if (!(q instanceof Rational)) {
    throw new DomainError({
      subject: "gamma",
      given: `${x}`,
      expected: "an exact rational number",
      hint: 'Write gamma("1/4").',
    });
  }
  return apply(GAMMA, [q], factorial(q)) as Real;
}

function factorial(q: Rational): Rational | undefined {
  if (q.den !== 1n || q.num <= 0n || q.num > 500n) return undefined;
  let product = 1n;
  for (let k = 2n; k < q.num; k++) product *= k;
  return Rational.of(product);
}

/**
 * The result of f, run again at rising precision until it has n proved digits.
 * Error    a result that rests on measured input comes back as sharp as that allows.
 * Throws   PrecisionError when 64n + 4096 bits did not do; what f itself throws at the last attempt.
 * @example atDigits(50, () => sqrt(2).minus("1.414"))
 */
export function atDigits<T>(n: number, f: () => T): T {
  checkedDigits("atDigits", n);
  const limit = mostBits(n);
  let best = -1;
  for (let bits = bitsOf(n) + 32; ; bits = Math.min(2 * bits, limit)) {
    const result = attempt(n, bits, f, bits >= limit);
    if (result) {
      const reached = leastAccuracy(result.value);
      if (reached >= bitsOf(n) + 1 || resting(result.value)) return shownTo(result.value, n);
      best = Math.max(best, reached);
    }
    if (bits >= limit) break;
  }
  throw new PrecisionError({
    subject: "atDigits",
    given: `${Math.max(0, Math.floor(best * 0.30103))} proved digits after working with ${limit} bits`,
    expected: `${n} proved digits`,
    hint: "A result that is exactly 0 needs an exact argument.",
  });
}

function attempt<T>(digits: number, bits: number, f: () => T, last: boolean): { readonly value: T } | undefined {
  try {
    return { value: within({ digits, bits }, f) };
  } catch (error) {
    if (last || !mayPass(error)) throw error;
    return undefined;
  }
}

/** The least relative accuracy of the numbers in a result: a value, or an array of them; other things count as exact. */
function leastAccuracy(x: unknown): number {
  if (x instanceof Real || x instanceof Complex) return x.exact ? Infinity : accuracy(x.enclosure);
  if (Array.isArray(x)) return Math.min(Infinity, ...x.map(leastAccuracy));
  return Infinity;
}

/** Whether a result rests on measured input, so that more bits do not help. */
function resting(x: unknown): boolean {
  if (x instanceof Real || x instanceof Complex) return x.standing === "measured" || x.standing === "double";
  return Array.isArray(x) && x.some(resting);
}

function shownTo<T>(x: T, digits: number): T {
  if (x instanceof Real) return new Real(x.ball, { ...birthOf(x), asked: digits }) as T;
  if (x instanceof Complex) return new Complex(x.disc, { ...birthOf(x), asked: digits }) as T;
  return Array.isArray(x) ? (x.map((y: unknown) => shownTo(y, digits)) as T) : x;
}
