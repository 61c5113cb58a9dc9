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
  let apart = x.exp + bitLength(x.man, prec) - y.exp - bitLength(y.man, prec);
  while (apart > 1 || apart < -1) {
    const mean = ldexp(add(x, y, prec + 16), -1);
    y = sqrt(mul(x, y, prec + 16), prec + 16);
    x = mean;
    apart = x.exp + bitLength(x.man, prec) - y.exp - bitLength(y.man, prec);
  }
  const work = prec + 24;
  const exp = Math.max(x.exp + bitLength(x.man, prec), y.exp + bitLength(y.man, prec)) - work;
  const p = scaled(x.man, x.exp - exp);
  const q = scaled(y.man, y.exp - exp);
  const mean = p > q ? agmFixed(p, q, work) : agmFixed(q, p, work);
  // The kernel's 2^12 units, one unit of a quarter of the size for each cut, and the mean times the relative radius.
  const err = 2 ** 12 + 8 + Math.max(moved(mean, x, prec), moved(mean, y, prec));
  return finish(mean, exp, err * UP, prec);
}

/** An upper bound of mean·(radius of x)/|x|. */
function moved(mean: bigint, x: Ball, prec: number): number {
  if (x.rad === 0) return 0;
  const m = size(mean, prec);
  const power = sizePower();
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
