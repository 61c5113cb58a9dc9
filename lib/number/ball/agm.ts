import { BranchError, DomainError } from "../../proof/errors.ts";
import { add, div, hull, ldexp, mul, round, sqrt, sub, widenBy } from "./arithmetic.ts";
import { type Ball, bits, fromInt, isZero, lowerPositive, magnitude, one, sign, upper, zero } from "./data.ts";

/** agm(1+x, 1−x) = 1 − Σ b_n x^(2n): numerators over 2^14 of b_1 .. b_4. */
const TAIL: readonly number[] = [4096, 1280, 704, 469];

/**
 * Arithmetic-geometric mean of two numbers >= 0; agm(x, 0) = 0.
 *
 * Error    each step is a sum and a root of balls, and relative errors do not grow (both means are monotone and homogeneous);
 *          the tail by the bound below.
 * Cost     log2(prec) + log2|ln(a/b)| roots; stops at |a − b| < 2^(−prec/10) with five terms.
 * Throws   DomainError for a negative number, BranchError for an enclosure that holds 0.
 * Source   1/agm(1+x, 1−x) = (2/π)K(x) = Σ (C(2n,n)/4^n)² x^(2n), whose coefficients are log-convex, so that the reciprocal is
 *          1 − Σ b_n x^(2n) with b_n >= 0 (Kaluza 1928) and Σ b_n = 1: the terms from n = 5 on are under x^10 for |x| < 1.
 */
export function agm(a: Ball, b: Ball, prec: number): Ball {
  if (isZero(a) || isZero(b)) return zero;
  for (const x of [a, b]) {
    if (sign(x) === -1) {
      throw new DomainError({
        subject: "agm",
        given: "a negative number",
        expected: "two numbers that are not negative",
      });
    }
  }
  if (Math.min(bits(a), bits(b)) < 8) return agmWide(a, b);
  const work = prec + 16;
  let x = round(a, work);
  let y = round(b, work);
  for (;;) {
    const sum = add(x, y, work);
    const difference = sub(x, y, work);
    if (isZero(difference)) return round(x, prec);
    const near = magnitude(sum) - 1 - magnitude(difference);
    if (10 * near > work || near > Math.min(bits(x), bits(y)) - 4) return closed(sum, difference, work, prec);
    y = sqrt(mul(x, y, work), work);
    x = ldexp(sum, -1);
  }
}

/** (a + b)/2 · agm(1 + z, 1 − z) with z = (a − b)/(a + b). */
function closed(sum: Ball, difference: Ball, work: number, prec: number): Ball {
  const z = div(difference, sum, work);
  const u = mul(z, z, work);
  let series: Ball = zero;
  for (let n = TAIL.length - 1; n >= 0; n--) {
    series = mul(u, add(ldexp(fromInt(TAIL[n]!), -14), series, work), work);
  }
  const rest: Ball = { man: 1n, exp: 10 * magnitude(z), rad: 0 };
  return round(mul(ldexp(sum, -1), widenBy(sub(one, series, work), rest, work), work), prec);
}

/** The mean grows with both arguments, so its values at the ends enclose it. */
function agmWide(a: Ball, b: Ball): Ball {
  if (sign(a) !== 1 || sign(b) !== 1) {
    throw new BranchError({ subject: "agm", given: "an enclosure that holds 0", expected: "positive numbers" });
  }
  return hull(agm(lowerPositive(a), lowerPositive(b), 40), agm(upper(a), upper(b), 40), 40);
}
