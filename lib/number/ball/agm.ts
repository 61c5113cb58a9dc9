import { BranchError, DomainError } from "../../proof/errors.ts";
import { agmFixed } from "../fixed/agm.ts";
import { bitLength, pow2, scaled, size, sizePower, UP } from "../fixed/bits.ts";
import { add, hull, ldexp, mul, sqrt } from "./arithmetic.ts";
import { type Ball, bits, finish, isZero, lowerPositive, sign, sizeBelow, upper, zero } from "./data.ts";

/**
 * Arithmetic-geometric mean of two numbers >= 0; agm(x, 0) = 0.
 *
 * Error    that of the kernel, and the larger of the two relative radii, since the mean is monotone and homogeneous.
 * Cost     log2(prec) + log2|ln(a/b)| roots.
 * Throws   DomainError for a negative number, BranchError for an enclosure that holds 0.
 */
export function agm(a: Ball, b: Ball, prec: number): Ball {
  if (isZero(a) || isZero(b)) return zero;
  if (sign(a) === -1 || sign(b) === -1) {
    throw new DomainError({
      subject: "agm",
      given: "a negative number",
      expected: "two numbers that are not negative",
    });
  }
  const accuracy = Math.min(bits(a), bits(b));
  return accuracy < 8 ? agmWide(a, b) : near(a, b, Math.min(prec, accuracy + 8));
}

/** Steps in enclosures until the two are within a factor 4 (relative errors of both then count), then the kernel. */
function near(a: Ball, b: Ball, prec: number): Ball {
  let x = a;
  let y = b;
  let top = height(x, prec);
  let other = height(y, prec);
  while (Math.abs(top - other) > 1) {
    const mean = ldexp(add(x, y, prec + 16), -1);
    y = sqrt(mul(x, y, prec + 16), prec + 16);
    x = mean;
    top = height(x, prec);
    other = height(y, prec);
  }
  const work = prec + 24;
  const exp = Math.max(top, other) - work;
  const p = scaled(x.man, x.exp - exp);
  const q = scaled(y.man, y.exp - exp);
  const mean = p > q ? agmFixed(p, q, work) : agmFixed(q, p, work);
  // The kernel's 2^12 units, one unit of a quarter of the size for each cut, and the mean times the larger relative radius.
  const m = size(mean, prec);
  const power = sizePower();
  const err = 2 ** 12 + 8 + Math.max(moved(m, power, x, prec), moved(m, power, y, prec));
  return finish(mean, exp, err * UP, prec);
}

/** |midpoint| < 2^height. */
function height(x: Ball, prec: number): number {
  return x.exp + bitLength(x.man, prec);
}

/** An upper bound of m·2^power·(radius of x)/|x|. */
function moved(m: number, power: number, x: Ball, prec: number): number {
  if (x.rad === 0) return 0;
  const low = sizeBelow(x.man, prec);
  return ((x.rad * m) / low) * pow2(power - sizePower()) * UP;
}

/** The mean grows with both arguments, so its values at the ends enclose it. */
function agmWide(a: Ball, b: Ball): Ball {
  if (sign(a) !== 1 || sign(b) !== 1) {
    throw new BranchError({ subject: "agm", given: "an enclosure that holds 0", expected: "positive numbers" });
  }
  return hull(agm(lowerPositive(a), lowerPositive(b), 40), agm(upper(a), upper(b), 40), 40);
}
