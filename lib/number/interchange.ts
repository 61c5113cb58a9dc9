// Values of this library as those of others, for interchange.
import { Complex as Complexjs } from "complex.js";
import { Decimal } from "decimal.js";
import { Fraction } from "fraction.js";
import { DomainError } from "../proof/errors.ts";
import { bitsOf, checkedDigits } from "./context.ts";
import { asBall, refineEnclosure } from "./origin.ts";
import { beyond, decimalBounds } from "./print.ts";
import { Rational } from "./rational.ts";
import { type Complex, type Numeric, Real } from "./values.ts";

/**
 * A Decimal of n significant digits, within one unit of the last (exact rationals: rounded half to even). decimal.js carries no error:
 * what is computed with it afterwards is not proved.
 */
export function toDecimal(x: Numeric, digits: number): Decimal {
  checkedDigits("toDecimal", digits);
  const value = Real.from(x);
  const Own = Decimal.clone({
    precision: Math.max(digits, 1),
    rounding: Decimal.ROUND_HALF_EVEN,
    maxE: 9e15,
    minE: -9e15,
  });
  if (value.exact instanceof Rational)
    return new Own(`${value.exact.num}`).div(`${value.exact.den}`).toSignificantDigits(digits);
  const e = asBall(refineEnclosure(value, bitsOf(digits) + 8));
  if (e.rad === 0 && !beyond(e))
    return new Own(toDecimal(Rational.of(e.man), digits + 5)).times(new Own(2).pow(e.exp)).toSignificantDigits(digits);
  const { middle, place } = decimalBounds(e);
  return new Own(`${middle}e${place}`).toSignificantDigits(digits);
}

/** A complex.js value: the midpoint in double precision, not proved. */
export function toComplexjs(z: Complex): Complexjs {
  const [re, im] = z.toDouble();
  return new Complexjs(re, im);
}

/** A Fraction of fraction.js, exactly. Throws DomainError for a number that is not known to be rational. */
export function toFraction(x: Numeric): Fraction {
  const q = x instanceof Rational ? x : Real.from(x).exact;
  if (q instanceof Rational) return new Fraction(q.num, q.den);
  throw new DomainError({ subject: "toFraction", given: `${x}`, expected: "an exact rational number" });
}
