import { BranchError, DomainError } from "../../proof/errors.ts";
import { agmFixed } from "../fixed/agm.ts";
import { bitLength, exponent, pow2, scaled, size, sizePower, UP } from "../fixed/bits.ts";
import { add, hull, ldexp, mul, sqrt } from "./arithmetic.ts";
import { type Ball, finish, isZero, lowerPositive, sign, sizeBelow, upper, zero } from "./data.ts";
import { shown } from "./shown.ts";

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
      given: `the negative number ${shown(sign(a) === -1 ? a : b)}`,
      expected: "two numbers that are not negative",
    });
  }
  const wide = wider(a, b, prec);
  const accuracy = -exponent(wide.part) - wide.power;
  if (wide.part > 0 && accuracy < 8) return agmWide(a, b);
  return near(a, b, wide.part === 0 ? prec : Math.min(prec, accuracy + 10), wide);
}

/** Steps in enclosures until the two are within a factor 4 (relative errors of both then count), then the kernel. */
function near(a: Ball, b: Ball, prec: number, wide: Relative): Ball {
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
    wide = wider(x, y, prec);
  }
  const work = prec + 16;
  const exp = Math.max(top, other) - work;
  const p = scaled(x.man, x.exp - exp);
  const q = scaled(y.man, y.exp - exp);
  const mean = p > q ? agmFixed(p, q, work) : agmFixed(q, p, work);
  // The kernel's 2^12 units, one unit of a quarter of the size for each cut, and the mean, below 2^work, times the larger relative radius.
  return finish(mean, exp, (2 ** 12 + 8 + moved(mean, work, wide)) * UP, prec);
}

/** part·2^power, since a relative radius may be below all doubles. */
interface Relative {
  readonly part: number;
  readonly power: number;
}

const NONE: Relative = { part: 0, power: 0 };

/** An upper bound of both relative radii. */
function wider(x: Ball, y: Ball, prec: number): Relative {
  const a = relativeRadius(x, prec);
  const b = relativeRadius(y, prec);
  if (a.part === 0) return b;
  if (b.part === 0) return a;
  if (a.power === b.power) return a.part > b.part ? a : b;
  return exponent(a.part) + a.power > exponent(b.part) + b.power
    ? { part: 2 * a.part, power: a.power }
    : { part: 2 * b.part, power: b.power };
}

/** An upper bound of radius/|midpoint|, infinite for a midpoint 0. */
function relativeRadius(x: Ball, prec: number): Relative {
  if (x.rad === 0) return NONE;
  const low = sizeBelow(x.man, prec);
  const power = -sizePower();
  return { part: low === 0 ? 2 ** 1000 : (x.rad / low) * UP, power };
}

/** An upper bound of the mean times the relative radius, in units of its last place. */
function moved(mean: bigint, work: number, { part, power }: Relative): number {
  if (part === 0) return 0;
  const m = size(mean, work);
  return m * part * pow2(sizePower() + power) * UP;
}

/** |midpoint| < 2^height. */
function height(x: Ball, prec: number): number {
  return x.exp + (x.size ?? bitLength(x.man, prec));
}

/** The mean grows with both arguments, so its values at the ends enclose it. */
function agmWide(a: Ball, b: Ball): Ball {
  if (sign(a) !== 1 || sign(b) !== 1) {
    throw new BranchError({
      subject: "agm",
      given: `${shown(sign(a) === 1 ? b : a)}, which holds 0`,
      expected: "positive numbers",
    });
  }
  return hull(agm(lowerPositive(a), lowerPositive(b), 40), agm(upper(a), upper(b), 40), 40);
}
