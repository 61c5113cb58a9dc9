// Recognition of exact numbers from their digits: conjectures with their evidence.
import { remember } from "../proof/behind.ts";
import { DomainError } from "../proof/errors.ts";
import type { Standing } from "../proof/standing.ts";
import * as ball from "./ball.ts";
import { bitsOf } from "./context.ts";
import * as disc from "./disc.ts";
import { absBig } from "./fixed/bits.ts";
import { asBall, type Enclosure, type Exact, isDisc, refinable, refineEnclosure, vanishes } from "./origin.ts";
import { heightOf, quadraticRelation, rootInside, simplestRational } from "./recognise/candidates.ts";
import { type Complex, type ComplexNumeric, type Real, scalar } from "./values.ts";

export interface RecogniseOptions {
  /** Bound on numerator and denominator, or on the coefficients of the integer polynomial. 10^6 if left out. */
  readonly height?: number | bigint;
  /** Digits by which the agreement has to exceed what chance explains. 8 if left out. */
  readonly spare?: number;
}

/** An exact number that agrees with the digits of a value. */
export interface Recognition {
  readonly value: Exact;
  /** Decimal places to which both agree. */
  readonly digits: number;
  /** Digits of agreement beyond what chance explains; Infinity if proved. */
  readonly spare: number;
  /** proved if the value was exact all along or is built from exact numbers by radicals, else conjectured with the evidence in words. */
  readonly standing: Standing;
}

/**
 * The rational number, or else the number of a quadratic field (Gaussian ones included), that a value agrees with.
 *
 * Domain   real or complex values; `height` >= 1. Defined values are refined until the digits suffice for the height.
 * Error    proved for values built by radicals alone (separation.ts); for others the answer is a conjecture. A random number would agree with some candidate with probability at most (number of
 *          candidates in reach)·(width of the enclosure); the spare digits are minus its logarithm.
 * Returns  undefined if no candidate of that height has the spare digits.
 * Throws   DomainError for a height below 1.
 * @example recognise(sqrt(2).plus(1).pow(2), { height: 100 })   // 3 + 2 √2
 */
export function recognise(x: ComplexNumeric, options: RecogniseOptions = {}): Recognition | undefined {
  const value = scalar(x, "recognise");
  const height = BigInt(options.height ?? 1_000_000);
  const spare = options.spare ?? 8;
  if (height < 1n)
    throw new DomainError({
      subject: "recognise",
      given: `the height ${height}`,
      expected: "at least 1",
      argument: "height",
    });
  if (value.exact)
    return {
      value: value.exact,
      digits: Infinity,
      spare: Infinity,
      standing: { kind: "proved", argument: "the value is exact" },
    };
  const enclosure = sharpened(value, height, spare);
  const found = asRational(enclosure, height, spare) ?? asQuadratic(enclosure, height, spare);
  return remember(found && vanishes(value, scalar(found.value, "recognise")) ? proved(found) : found, {
    argument: value,
  });
}

function proved({ value }: Recognition): Recognition {
  const argument = "built by radicals: a difference that is so small can only be 0";
  return { value, digits: Infinity, spare: Infinity, standing: { kind: "proved", argument } };
}

/** An enclosure with the digits that quadratic candidates of the height take, and the spare ones twice. */
function sharpened(x: Real | Complex, height: bigint, spare: number): Enclosure {
  if (!refinable(x)) return x.enclosure;
  const digits = Math.ceil(3.1 * height.toString().length) + 2 * spare + 10;
  return refineEnclosure(x, bitsOf(digits));
}

function asRational(e: Enclosure, height: bigint, spare: number): Recognition | undefined {
  if (isDisc(e) && e.axis !== "real") return undefined;
  const x = asBall(e);
  const q = simplestRational(x, height);
  if (!q) return undefined;
  // Rationals of height up to H near x: at most H² in an interval of length 1 about it, 3H² to be safe.
  return judged(q, 3n * heightOf(q) ** 2n, places(e), 1, spare, `height ${heightOf(q)}`);
}

function asQuadratic(e: Enclosure, height: bigint, spare: number): Recognition | undefined {
  const polynomial = quadraticRelation(e, height);
  const root = polynomial && rootInside(polynomial, e);
  if (!polynomial || !root) return undefined;
  const largest = polynomial.map(absBig).reduce(larger);
  // Polynomials with coefficients up to the largest met: (2H + 1)³, with two roots each; a complex root is met in two dimensions.
  const plane = isDisc(e) && e.axis !== "real";
  return judged(
    root,
    2n * (2n * largest + 1n) ** 3n,
    places(e),
    plane ? 2 : 1,
    spare,
    `polynomial ${polynomial.join(", ")}`,
  );
}

/** Decimal places to which the enclosure is known. */
function places(e: Enclosure): number {
  const radius = isDisc(e)
    ? disc.magnitude(disc.widenBy(disc.zero, { man: BigInt(Math.ceil(e.rad)), exp: e.exp, rad: 0 }, 30))
    : ball.magnitude(ball.radius(e));
  return Number.isFinite(radius) ? Math.floor(-radius * 0.30103) : Infinity;
}

function judged(
  value: Exact,
  candidates: bigint,
  digits: number,
  dimension: number,
  spare: number,
  how: string,
): Recognition | undefined {
  const left = dimension * digits - candidates.toString().length;
  if (!(left >= spare)) return undefined;
  const evidence = `agrees to ${digits} decimal places (${how}); chance about 1e-${left}`;
  return { value, digits, spare: left, standing: { kind: "conjectured", evidence } };
}

function larger(a: bigint, b: bigint): bigint {
  if (a > b) return a;
  return b;
}
