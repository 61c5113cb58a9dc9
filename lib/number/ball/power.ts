// Roots and powers of balls beyond squares, tangent, inverse hyperbolic functions.
import { DomainError, PoleError } from "../../proof/errors.ts";
import { bitLength } from "../fixed/bits.ts";
import { add, div, ldexp, mul, neg, pow, round, sqrt, sub } from "./arithmetic.ts";
import { type Ball, finish, fromInt, isZero, magnitude, one, sign, zero } from "./data.ts";
import { exp, ln } from "./exp.ts";
import { sinCos } from "./trig.ts";

/**
 * The n-th root, n >= 1: of a number >= 0, or for odd n of any sign. Exact where the result is exact and short.
 * Throws DomainError for an even root of a negative number; BranchError for an enclosure that holds 0.
 */
export function nthRoot(x: Ball, n: number, prec: number): Ball {
  if (!Number.isSafeInteger(n) || n < 1) {
    throw new DomainError({
      subject: "nthRoot",
      given: `the degree ${n}`,
      expected: "a positive integer",
      argument: "n",
    });
  }
  if (n === 1) return round(x, prec);
  if (n === 2) return sqrt(x, prec);
  if (isZero(x)) return zero;
  if (sign(x) === -1) {
    if (n % 2 === 1) return neg(nthRoot(neg(x), n, prec));
    throw new DomainError({
      subject: "nthRoot",
      given: "a negative number",
      expected: `a number >= 0 for the degree ${n}`,
    });
  }
  const root = exp(div(ln(x, prec + 16), fromInt(n), prec + 16), prec + 4);
  return x.rad === 0 ? exactRoot(x, n, root, prec) : round(root, prec);
}

// If the root is a short dyadic number, it is the one in the enclosure.
function exactRoot(x: Ball, n: number, root: Ball, prec: number): Ball {
  const spare = Math.max(0, bitLength(root.man) - Math.ceil(prec / 2));
  const short = finish(((root.man >> BigInt(spare)) + 1n) << BigInt(spare), root.exp, 0, prec + 8);
  for (const candidate of [short, finish((root.man >> BigInt(spare)) << BigInt(spare), root.exp, 0, prec + 8)]) {
    const back = pow(candidate, n, bitLength(x.man) + n * bitLength(candidate.man) + 8);
    if (back.rad === 0 && isZero(sub(back, x, bitLength(x.man) + bitLength(back.man) + 8))) return candidate;
  }
  return round(root, prec);
}

/** x^y = exp(y·ln x) for x > 0. Errors as for `ln`. */
export function power(x: Ball, y: Ball, prec: number): Ball {
  if (isZero(y)) return one;
  if (isZero(x)) return exp(ln(x, prec), prec);
  const more = Math.max(0, magnitude(y)) + bitLength(BigInt(Math.abs(magnitude(x)) + 2));
  return exp(mul(y, ln(x, prec + more + 8), prec + more + 8), prec);
}

/** tan x. Throws PoleError if the cosine may vanish. */
export function tan(x: Ball, prec: number): Ball {
  const { sin, cos } = sinCos(x, prec + 6);
  return div(sin, cos, prec);
}

/** asinh x = ln(x + √(x² + 1)), for small x through artanh, which keeps the relative accuracy. */
export function asinh(x: Ball, prec: number): Ball {
  if (isZero(x)) return zero;
  const work = prec + 12 + Math.max(0, -magnitude(x));
  const root = sqrt(add(mul(x, x, work), one, work), work);
  if (magnitude(x) < 0) return atanh(div(x, root, work), prec);
  if (x.man < 0n) return neg(asinh(neg(x), prec));
  return ln(add(x, root, work), prec);
}

/** acosh x >= 0 for x >= 1. Throws DomainError for a number below 1, BranchError for an enclosure that holds 1 and smaller numbers. */
export function acosh(x: Ball, prec: number): Ball {
  const work = prec + 12;
  const off = sub(x, one, work);
  if (sign(off) === -1) throw outside("acosh", "a number below 1", "a number >= 1");
  const root = sqrt(mul(off, add(x, one, work), work), work);
  return magnitude(root) < 0 ? asinh(root, prec) : ln(add(x, root, work), prec);
}

/** atanh x = ½ ln((1 + x)/(1 − x)) for |x| < 1. Throws PoleError at ±1 or for an enclosure that holds 1, DomainError beyond. */
export function atanh(x: Ball, prec: number): Ball {
  if (isZero(x)) return zero;
  const work = prec + 12 + Math.max(0, -magnitude(x));
  const above = add(one, x, work);
  const below = sub(one, x, work);
  if (isZero(above) || isZero(below)) {
    throw new PoleError({
      subject: "atanh",
      given: isZero(below) ? "1" : "−1",
      expected: "a number between −1 and 1",
      argument: "x",
    });
  }
  if (sign(above) === -1 || sign(below) === -1)
    throw outside("atanh", "a number beyond ±1", "a number between −1 and 1");
  return ldexp(ln(div(above, below, work), prec), -1);
}

function outside(name: string, given: string, expected: string): DomainError {
  const hint = `${name}(complex(x)) takes others.`;
  return new DomainError({ subject: name, given, expected, hint, argument: "x" });
}
