// Inverse trigonometric functions of balls.
import { BranchError, DomainError } from "../../proof/errors.ts";
import { atanFixed } from "../fixed/atan.ts";
import { scaled, scaledRadius, UP } from "../fixed/bits.ts";
import { abs, add, div, hull, inv, ldexp, mul, neg, round, sqrt, sub, widenBy } from "./arithmetic.ts";
import { pi } from "./constants.ts";
import {
  type Ball,
  containsZero,
  finish,
  fromInt,
  isZero,
  lower,
  lowMagnitude,
  magnitude,
  midpoint,
  one,
  radius,
  sign,
  upper,
  zero,
} from "./data.ts";
import { radiusExponent, usefulBits } from "./exp.ts";

/**
 * atan x in (−π/2, π/2).
 * Error    kernel and cut under 3 units; the radius divided by 1 + (|x| − r)². A ball wider than 1/4 takes its ends.
 */
export function atan(x: Ball, prec: number): Ball {
  if (isZero(x)) return zero;
  if (x.rad > 0 && lowMagnitude(x) >= 0) {
    // For |x| >= 1 through 1/x, whose radius is what it should be.
    if (x.man < 0n) return neg(atan(neg(x), prec));
    return sub(ldexp(pi(prec + 8), -1), atan(inv(x, prec + 8), prec + 8), prec);
  }
  if (radiusExponent(x) > -2) return hull(atan(lower(x), 32), atan(upper(x), 32), Math.min(prec, 32));
  if (x.man < 0n) return neg(atan(neg(x), prec));
  const size = magnitude(midpoint(x));
  if (size > 0 && sub(midpoint(x), one, 8).man > 0n)
    return sub(ldexp(pi(prec + 8), -1), atan(inv(x, prec + 8), prec + 8), prec);
  if (-size > 16 && -size > prec / 8) return small(x, prec);
  const work = usefulBits(x, prec + Math.max(0, -size)) + 6;
  const value = atanFixed(scaled(x.man, x.exp + work), work);
  return finish(value, -work, (3 + scaledRadius(x.rad, x.exp + work)) * UP, prec);
}

/** atan x = x·Σ (−1)^n x^(2n)/(2n+1) for |x| < 2^-16: the rest after N terms is under |x|^(2N). */
function small(x: Ball, prec: number): Ball {
  const work = prec + 8;
  const u = mul(x, x, work);
  const perTerm = -magnitude(u);
  const count = Math.ceil(work / perTerm) + 1;
  let sum: Ball = zero;
  for (let n = count - 1; n >= 0; n--) {
    sum = sub(div(one, fromInt(2 * n + 1), work), mul(u, sum, work), work);
  }
  const tail: Ball = { man: 1n, exp: -perTerm * count, rad: 0 };
  return round(mul(x, widenBy(sum, tail, work), work), prec);
}

/**
 * The angle of the point (x, y) in (−π, π], for exact 0 = y > x also π.
 * Error    quotients of the midpoints, then asin(ρ) for the distance ρ that the radii allow relative to |(x, y)|.
 * Throws   DomainError for the exact origin, BranchError for enclosures that meet the half-line y = 0 >= x without lying exactly on it.
 */
export function atan2(y: Ball, x: Ball, prec: number, continuous = false): Ball {
  if (isZero(y)) return onAxis(x, prec);
  if (!continuous && containsZero(y) && sign(x) !== 1) throw cut();
  if (containsZero(y) && containsZero(x)) throw cut();
  const angle = angleOf(midpoint(y), midpoint(x), prec);
  if (x.rad === 0 && y.rad === 0) return angle;
  const reach = sqrt(add(mul(radius(x), radius(x), 40), mul(radius(y), radius(y), 40), 40), 40);
  const size = sqrt(add(mul(midpoint(x), midpoint(x), 40), mul(midpoint(y), midpoint(y), 40), 40), 40);
  return widenBy(angle, turn(div(reach, size, 40)), prec);
}

/** An upper bound of asin ρ: ρ·π/2, or 1.16 ρ for ρ <= 1/2, or (1 + ρ²)ρ for ρ <= 1/8. */
export function turn(rho: Ball): Ball {
  const size = magnitude(rho);
  if (size > 0) throw cut();
  if (size <= -3) return mul(rho, add(one, mul(rho, rho, 40), 40), 40);
  return mul(rho, { man: size <= -1 ? 1190n : 1609n, exp: -10, rad: 0 }, 40);
}

function onAxis(x: Ball, prec: number): Ball {
  const s = sign(x);
  if (s === 1) return zero;
  if (s === -1) return pi(prec);
  if (s === 0)
    throw new DomainError({ subject: "arg", given: "0, which has no angle", expected: "a number other than 0" });
  throw cut();
}

function cut(): BranchError {
  return new BranchError({
    subject: "arg",
    given: "an enclosure that meets the negative real axis or 0",
    expected: "one that is away from the cut",
    hint: "A sharper argument may do.",
  });
}

/** The angle of an exact point off the x-axis. */
function angleOf(y: Ball, x: Ball, prec: number): Ball {
  const work = prec + 8;
  const upperHalf = y.man > 0n;
  const v = abs(y);
  const u = abs(x);
  let angle: Ball;
  if (isZero(u)) angle = ldexp(pi(work), -1);
  else if (sub(u, v, 8).man >= 0n) angle = atan(div(v, u, work), work);
  else angle = sub(ldexp(pi(work), -1), atan(div(u, v, work), work), work);
  if (x.man < 0n) angle = sub(pi(work), angle, work);
  return round(upperHalf ? angle : neg(angle), prec);
}

/**
 * asin x in [−π/2, π/2] for |x| <= 1.
 * Throws DomainError if |x| > 1, BranchError for an enclosure that holds such numbers and others.
 */
export function asin(x: Ball, prec: number): Ball {
  if (isZero(x)) return zero;
  const side = complement(x, "asin", prec);
  if (isZero(side)) return x.man > 0n ? ldexp(pi(prec), -1) : neg(ldexp(pi(prec), -1));
  return atan(div(x, side, prec + 8), prec);
}

/** acos x in [0, π] for |x| <= 1; errors as for `asin`. */
export function acos(x: Ball, prec: number): Ball {
  if (isZero(x)) return ldexp(pi(prec), -1);
  const side = complement(x, "acos", prec);
  if (isZero(side)) return x.man > 0n ? zero : pi(prec);
  return atan2(side, x, prec);
}

/** √(1 − x²), by the factors that keep its accuracy near ±1. */
function complement(x: Ball, subject: string, prec: number): Ball {
  const product = mul(sub(one, x, prec + 8), add(one, x, prec + 8), prec + 8);
  const s = sign(product);
  if (s === 1) return sqrt(product, prec + 8);
  if (s === 0) return zero;
  const given = s === -1 ? "a number of size above 1" : "an enclosure that holds 1 or −1";
  const complaint = { subject, given, expected: "a number from −1 to 1" };
  throw s === -1 ? new DomainError(complaint) : new BranchError(complaint);
}
