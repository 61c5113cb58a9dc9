// Sums, products, quotients and roots of balls. Inputs are any balls, results have about prec bits (see `finish`).
import { BranchError, DomainError } from "../../proof/errors.ts";
import {
  bitLength,
  DOWN,
  exponent,
  leadingPart,
  pow2,
  scaledRadius,
  shift,
  size,
  sizePower,
  trailingZeros,
  UP,
} from "../fixed/bits.ts";
import { sqrtNear } from "../fixed/isqrt.ts";
import { integerPower, type PowerField } from "../fixed/power.ts";
import {
  type Ball,
  containsZero,
  ends,
  finish,
  fromInt,
  isZero,
  MAX_EXPONENT,
  MAX_RAD,
  one,
  overflow,
  radiusInt,
  sizeBelow,
  span,
  zero,
} from "./data.ts";
import { divisorZero, shown } from "./shown.ts";

export function neg(x: Ball): Ball {
  return x.lead === undefined
    ? { man: -x.man, exp: x.exp, rad: x.rad }
    : { man: -x.man, exp: x.exp, rad: x.rad, lead: x.lead, size: x.size! };
}

/** |x|; an enclosure that holds 0 gives one that starts at 0 or below. */
export function abs(x: Ball): Ball {
  if (x.man < 0n) x = neg(x);
  if (!containsZero(x)) return x;
  if (isZero(x)) return x;
  return span(0n, x.man + radiusInt(x), x.exp, bitLength(x.man) + 32);
}

/** x·2^k, exactly. */
export function ldexp(x: Ball, k: number): Ball {
  if (x.man === 0n && x.rad === 0) return x;
  return x.lead === undefined
    ? { man: x.man, exp: x.exp + k, rad: x.rad }
    : { man: x.man, exp: x.exp + k, rad: x.rad, lead: x.lead, size: x.size! };
}

/** x rounded outward to about prec bits. */
export function round(x: Ball, prec: number): Ball {
  return finish(x.man, x.exp, x.rad, prec);
}

/**
 * x + y.
 * Error    exact sum of midpoints and radii, then one rounding. Bits of the lower operand that lie below the radius of
 *          the higher one, or prec + 4 bits below its last place, are cut first and counted as one ulp.
 */
export function add(x: Ball, y: Ball, prec: number): Ball {
  if (x.exp === y.exp) return sum(x, y, x.man + y.man, prec);
  if (isZero(x)) return round(y, prec);
  if (isZero(y)) return round(x, prec);
  return x.exp > y.exp ? addAligned(x, y.man, y.exp, y.rad, prec) : addAligned(y, x.man, x.exp, x.rad, prec);
}

/** x − y; see `add`. */
export function sub(x: Ball, y: Ball, prec: number): Ball {
  if (x.exp === y.exp) return sum(x, y, x.man - y.man, prec);
  return add(x, neg(y), prec);
}

/** x ± y, `man` being the sum or difference, for equal exponents: where the sizes say that nothing is to be cut, they are not measured. */
function sum(x: Ball, y: Ball, man: bigint, prec: number): Ball {
  const rad = (x.rad + y.rad) * UP;
  if (x.lead !== undefined && y.lead !== undefined && rad > 0 && rad <= MAX_RAD) {
    const size = Math.max(x.size!, y.size!) + 1;
    // At most one bit more than asked: were the sum much shorter, as by cancellation, its radius of a unit or more would hide what a later cut loses.
    if (size <= prec + 2) {
      const lead = (x.lead * pow2(x.size! - size) + y.lead * pow2(y.size! - size)) * UP;
      return { man, exp: x.exp, rad, lead, size };
    }
  }
  return finish(man, x.exp, rad, prec);
}

function addAligned(high: Ball, man: bigint, exp: number, rad: number, prec: number): Ball {
  const gap = high.exp - exp;
  const cut = gap - (high.rad > 0 ? 30 : prec + 4);
  if (cut <= 0) {
    const err = high.rad === 0 ? rad : (scaledRadius(high.rad, gap) + rad) * UP;
    return finish((high.man << shift(gap)) + man, exp, err, prec);
  }
  const kept = man >> BigInt(cut);
  const err = scaledRadius(high.rad, gap - cut) + rad * pow2(-cut) + 1;
  return finish((high.man << shift(gap - cut)) + kept, exp + cut, err * UP, prec);
}

/**
 * x·y.
 * Error    |x| r_y + |y| r_x + r_x r_y, then one rounding: seven double operations, each within 2^-53, are under UP.
 * Cost     a product, a shift and about 15 ns.
 */
export function mul(x: Ball, y: Ball, prec: number): Ball {
  const a = x.lead;
  const b = y.lead;
  if (a === undefined || b === undefined) return mul(measured(x, prec), measured(y, prec), prec);
  const m = x.size!;
  const n = y.size!;
  const r = x.rad;
  const s = y.rad;
  const man = x.man * y.man;
  const exp = x.exp + y.exp;
  let lead = a * b * UP;
  let drop = m + n - prec;
  if (lead < 0.5) {
    lead *= 2;
    drop--;
  }
  if (drop > 4 && m <= drop + 900 && n <= drop + 900) {
    const rad = (a * s * pow2(m - drop) + b * r * pow2(n - drop) + r * s * pow2(-drop) + 1) * UP;
    // The product with an exact 0 is an exact 0, which has no digits to drop.
    if (man !== 0n && r + s > 0 && rad <= MAX_RAD && exp < MAX_EXPONENT && exp > -MAX_EXPONENT) {
      return { man: man >> shift(drop), exp: exp + drop, rad, lead: lead + pow2(-prec), size: prec };
    }
  }
  return mulElse(x, y, man, prec);
}

/** The same ball with what is known of its size. */
function measured(x: Ball, hint: number): Ball {
  if (x.lead !== undefined) return x;
  const size = bitLength(x.man, hint);
  return { man: x.man, exp: x.exp, rad: x.rad, lead: leadingPart(), size };
}

// Exact products, products that are not cut, and those with large radii.
function mulElse(x: Ball, y: Ball, man: bigint, prec: number): Ball {
  const size = x.size! + y.size!;
  const exp = x.exp + y.exp;
  if (x.rad === 0 && y.rad === 0) return man === 0n ? zero : finish(man, exp, 0, prec, size);
  const err = (scaledRadius(y.rad, x.size!) * x.lead! + scaledRadius(x.rad, y.size!) * y.lead! + x.rad * y.rad) * UP;
  if (err < 2 ** 1000) return finish(man, exp, err, prec, size);
  return mulLong(x, y, man, prec);
}

// The same with bounds that carry a power of two each; the error is then counted in units of 2^unit.
function mulLong(x: Ball, y: Ball, man: bigint, prec: number): Ball {
  if (isZero(x) || isZero(y)) return zero;
  if (!(Math.abs(x.exp + y.exp) < MAX_EXPONENT)) throw overflow(x.exp + y.exp);
  const a = size(x.man, prec);
  const ea = sizePower();
  const b = size(y.man, prec);
  const eb = sizePower();
  const unit = Math.max(y.rad > 0 ? ea : 0, x.rad > 0 ? eb : 0);
  const err =
    a * scaledRadius(y.rad, ea - unit) + b * scaledRadius(x.rad, eb - unit) + x.rad * scaledRadius(y.rad, -unit);
  return finishScaled(man, x.exp + y.exp, err * UP, unit, prec);
}

/** `finish` for an error of err·2^unit ulps. */
export function finishScaled(man: bigint, exp: number, err: number, unit: number, prec: number): Ball {
  // With the error near 1 its unit tells its size.
  const lift = exponent(err);
  err *= pow2(-lift);
  unit += lift;
  const scaledErr = err * pow2(unit);
  if (unit < 900 && scaledErr < 2 ** 1000) return finish(man, exp, unit < 0 ? scaledErr * UP : scaledErr, prec);
  // Most of the unit may go at once: the error keeps at least 2^30 of its ulps, or the mantissa its prec bits.
  const drop = Math.max(unit - 40, 0);
  return finish(man >> shift(drop), exp + drop, (err * pow2(unit - drop) + 1) * UP, prec);
}

/** `finish` for an error of err·2^unit + few ulps. Bounds that were cut at 2^-1000 do not matter: err >= 2^-500. */
function finishScaledPlus(man: bigint, exp: number, err: number, unit: number, few: number, prec: number): Ball {
  if (unit <= 0) return finish(man, exp, (err * pow2(unit) + few) * UP, prec);
  return finishScaled(man, exp, (err + few * pow2(-unit)) * UP, unit, prec);
}

/** x·n for an integer n, exact before the rounding. */
export function mulInt(x: Ball, n: bigint | number, prec: number): Ball {
  return mul(x, fromInt(n), prec);
}

/**
 * x/y.
 * Error    (r_x + |q| r_y) / (|y| − r_y) for q = x/y of the midpoints, then truncation and one rounding.
 * Throws   PoleError if y holds 0.
 */
export function div(x: Ball, y: Ball, prec: number): Ball {
  if (containsZero(y)) {
    throw divisorZero(shown(y), isZero(y));
  }
  if (isZero(x)) return zero;
  const exact = x.rad === 0 && y.rad === 0;
  const up = prec + 2 + bitLength(y.man, prec) - bitLength(x.man, prec);
  const top = up >= 0 ? x.man << shift(up) : x.man;
  const exp = x.exp - y.exp - Math.max(up, 0);
  const q = top / y.man;
  if (exact) return q * y.man === top ? stripped(q, exp, prec) : finish(q, exp, 1, prec);
  return quotient(x, y, q, Math.max(up, 0), exp, prec);
}

function quotient(x: Ball, y: Ball, q: bigint, up: number, exp: number, prec: number): Ball {
  const b = sizeBelow(y.man, prec);
  const eb = sizePower();
  const a = size(q, prec) + 1;
  const ea = sizePower();
  // |y| − r_y in units of 2^eb, rounded down; y does not hold 0, but the doubles may not show it.
  const low = (b - scaledRadius(y.rad, -eb)) * DOWN;
  if (!(low > b * 2 ** -40)) return quotientWide(x, y, prec);
  const unit = (y.rad === 0 ? up : x.rad === 0 ? ea : Math.max(up, ea)) - eb;
  const err = (scaledRadius(x.rad, up - eb - unit) + a * scaledRadius(y.rad, ea - eb - unit)) / low;
  return finishScaledPlus(q, exp, err, unit, 1, prec);
}

// The divisor's radius is nearly its size: take the quotients of the ends.
function quotientWide(x: Ball, y: Ball, prec: number): Ball {
  const { low, high } = ends(y);
  const nearest = y.man > 0n ? low : high;
  const farthest = y.man > 0n ? high : low;
  // An integer end may touch 0 though the ball does not: half an ulp of the true distance is not known then.
  if (nearest === 0n) {
    throw divisorZero(shown(y), false, "which nearly holds 0");
  }
  const first = div(x, { man: nearest, exp: y.exp, rad: 0 }, prec);
  const second = div(x, { man: farthest, exp: y.exp, rad: 0 }, prec);
  return hull(first, second, prec);
}

/** A ball that holds both. */
export function hull(x: Ball, y: Ball, prec: number): Ball {
  const half = ldexp(sub(x, y, 64), -1);
  const centre = ldexp(add(x, y, prec), -1);
  // |x − c| and |y − c| are at most |x − y|/2 of any two of their points.
  return widenBy(centre, half, prec);
}

/** x with its radius raised by an upper bound of |r|. */
export function widenBy(x: Ball, r: Ball, prec: number): Ball {
  const size = abs(r);
  const top = size.man + radiusInt(size);
  return add(x, spread(top, size.exp), prec);
}

/** The ball 0 ± top·2^exp, for top >= 0. */
export function spread(top: bigint, exp: number): Ball {
  if (top === 0n) return zero;
  const drop = Math.max(0, bitLength(top) - 30);
  return { man: 0n, exp: exp + drop, rad: Number(top >> shift(drop)) + (drop ? 1 : 0) };
}

function stripped(man: bigint, exp: number, prec: number): Ball {
  const spare = trailingZeros(man);
  return finish(man >> shift(spare), exp + spare, 0, prec);
}

/** 1/x. Throws PoleError if x holds 0. */
export function inv(x: Ball, prec: number): Ball {
  return div(one, x, prec);
}

/**
 * √x for x >= 0.
 * Error    |√(m+t) − √m| <= √m·ε/(1 + √(1−ε)) with ε = r/m; then the root of the midpoint within 2 ulps.
 * Throws   DomainError for a negative number, BranchError for an enclosure of both signs.
 */
export function sqrt(x: Ball, prec: number): Ball {
  if (x.man < 0n || (x.rad > 0 && containsZero(x))) return sqrtAtZero(x, prec);
  if (x.man === 0n) return zero;
  let up = 2 * (prec + 2) - bitLength(x.man, prec);
  if ((x.exp - up) % 2 !== 0) up += 1;
  const exp = (x.exp - up) / 2;
  const exact = x.rad === 0;
  // A short exact argument is shifted; a long one is cut, which costs under one unit of a number of 2·prec bits.
  const top = up >= 0 ? x.man << shift(up) : x.man >> shift(-up);
  const root = sqrtNear(top);
  if (exact) {
    if (up >= 0 && root * root === top) return stripped(root, exp, prec);
    return finish(root, exp, 3, prec);
  }
  const m = sizeBelow(x.man, prec);
  const em = sizePower();
  const part = scaledRadius(x.rad, -em) / m;
  const s = size(root, prec) + 2;
  const unit = sizePower() - em;
  // s·r/m without the powers of two, which `part` alone may round up to 2^-1000.
  const err = (s * x.rad) / m / (1 + Math.sqrt(Math.max(0, 1 - part * UP) * DOWN) * DOWN);
  return finishScaledPlus(root, exp, err * UP, unit, 3, prec);
}

function sqrtAtZero(x: Ball, prec: number): Ball {
  const top = x.man + radiusInt(x);
  if (x.man - BigInt(Math.floor(x.rad)) === 0n && Math.floor(x.rad) === x.rad) {
    // From 0 to the root of the upper end.
    const high = sqrt({ man: top, exp: x.exp, rad: 0 }, 32);
    return span(0n, high.man + radiusInt(high), high.exp, Math.min(prec, 64));
  }
  if (top >= 0n) {
    throw new BranchError({
      subject: "sqrt",
      given: `${shown(x)}, which holds 0 and negative numbers`,
      expected: "numbers of one sign",
      hint: "A sharper argument may do.",
    });
  }
  throw new DomainError({
    subject: "sqrt",
    given: `the negative number ${shown(x)}`,
    expected: "a number that is not negative",
    hint: "The root of a complex number is taken by complex(x).sqrt().",
  });
}

/** x with its radius raised by `radius` (a nonnegative double, or an exact or inexact ball of which the upper bound counts). */
export function widen(x: Ball, radius: number | Ball): Ball {
  const r = typeof radius === "number" ? doubleRadius(radius) : abs(radius);
  const prec = bitLength(x.man) + 64;
  return add(x, spread(r.man + radiusInt(r), r.exp), prec);
}

function doubleRadius(r: number): Ball {
  if (!(r >= 0 && r < Infinity)) {
    throw new DomainError({
      subject: "widen",
      given: `the radius ${r}`,
      expected: "a finite number that is not negative",
    });
  }
  const man = BigInt(Math.ceil(r * 2 ** 60 < Infinity ? r * 2 ** 60 : r));
  return { man, exp: r * 2 ** 60 < Infinity ? -60 : 0, rad: 0 };
}

const FIELD: PowerField<Ball> = { one, square, mul, inv, round };

/** x^n for an integer n; x^0 is exactly 1. Throws PoleError for n < 0 if x holds 0. */
export function pow(x: Ball, n: number, prec: number): Ball {
  return integerPower(x, n, prec, FIELD);
}

/** x², which is not negative even where x has no sign. */
export function square(x: Ball, prec: number): Ball {
  const y = mul(x, x, prec);
  if (y.rad === 0 || !containsZero(y)) return y;
  const top = abs(x);
  const high = mul(fromInt(top.man + radiusInt(top)), fromInt(top.man + radiusInt(top)), 64);
  return span(0n, high.man + radiusInt(high), high.exp + 2 * x.exp, Math.min(prec, 64));
}
