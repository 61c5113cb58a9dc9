// From what a caller gives to values, and from values to other libraries.
import { DomainError } from "../proof/errors.ts";
import type { Ball } from "./ball.ts";
import * as ball from "./ball.ts";
import { workingPrecision } from "./context.ts";
import * as disc from "./disc.ts";
import { leafOf } from "./leaf.ts";
import { type Enclosure, type Exact, isDisc } from "./origin.ts";
import { Quadratic } from "./quadratic.ts";
import { Rational } from "./rational.ts";
import { type Piece, readExact, widened } from "./read.ts";
import { i } from "./symbols.ts";
import { Complex, type ComplexNumeric, type Numeric, Real, scalar } from "./values.ts";

/** A real value from anything that stands for one. Throws TypeError for complex input, DomainError for unreadable text, NaN and infinities. */
export function toReal(x: Numeric): Real {
  return Real.from(x);
}

/** A complex value from anything that stands for a number. */
export function toComplex(x: ComplexNumeric): Complex {
  return Complex.from(x);
}

/** Real or Complex, as the input is. */
export function toNumber(x: ComplexNumeric, subject = "number"): Real | Complex {
  return scalar(x, subject);
}

/** real("0.1"), real("1.25 ± 1e-6"), real(3n): a real number, exactly as written. */
export function real(x: Numeric): Real {
  return Real.from(x);
}

/** complex("1/2", "3/4"), complex("0.41 + 0.27 i"), complex(x): a complex number, exactly as written. */
export function complex(re: ComplexNumeric, im?: Numeric): Complex {
  return im === undefined ? Complex.from(re) : Complex.of(Real.from(re as Numeric), im);
}

/** The imaginary unit, also where i is a name of the user's own. */
complex.i = i;

/**
 * rational("22/7"), rational("0.125"), rational(3n, 4n): an exact rational number.
 * Throws DomainError for text that is no rational number and for a number that is no safe integer.
 */
export function rational(x: Rational | Numeric, den?: bigint | number): Rational {
  if (den !== undefined) return Rational.of(x as bigint | number, den);
  if (x instanceof Rational) return x;
  if (x instanceof Real) {
    if (x.exact instanceof Rational) return x.exact;
    throw new TypeError(`rational: got ${x}, which is not known to be rational; expected an exact rational number`);
  }
  if (typeof x === "number") return Rational.of(x);
  const { exact } = leafOf(x, "rational");
  if (exact instanceof Rational) return exact;
  throw new TypeError(`rational: got ${String(x)}; expected a rational number`);
}

/** An exact number with a double or text around it gone: exact`1/2 + 3/4 i`, exact`(1+√5)/2`. Inserted values count as one bracketed factor. */
export function exact(
  strings: TemplateStringsArray,
  ...values: readonly (Exact | bigint | number | Real | Complex)[]
): Rational | Quadratic {
  const pieces: Piece[] = [];
  strings.raw.forEach((text, k) => {
    pieces.push(text);
    if (k < values.length) pieces.push(exactValue(values[k]!));
  });
  return readExact(pieces, "exact");
}

function exactValue(x: Exact | bigint | number | Real | Complex): Exact {
  if (x instanceof Rational || x instanceof Quadratic) return x;
  if (typeof x === "bigint" || typeof x === "number") return Rational.of(x);
  if (x.exact) return x.exact;
  throw new TypeError(`exact: got ${x}, which is no exact number; expected exact values only`);
}

/**
 * A measured value: every number within `radius` of `middle`, a disc if the middle is complex.
 * enclose("1.25", "1e-6"); a plain number without radius is taken as right to half a unit of its last place, and counts as measured from then on.
 * Throws DomainError for a negative radius, or for none with an exact middle.
 */
export function enclose(middle: Numeric, radius?: Numeric): Real;
export function enclose(middle: ComplexNumeric, radius?: Numeric): Real | Complex;
export function enclose(middle: ComplexNumeric, radius?: Numeric): Real | Complex {
  const x = scalar(middle, "enclose");
  if (radius === undefined) return trusted(x);
  const r = Real.from(radius);
  if (!(r.sign() !== -1 && ball.sign(ball.upper(r.ball)) !== -1)) {
    throw new DomainError({
      subject: "enclose",
      given: `the radius ${r}`,
      expected: "a radius that is not negative",
      argument: "radius",
    });
  }
  const source = `${x instanceof Complex && !x.isReal ? `(${middle})` : middle} ± ${radius}`;
  const enclosure = x.exact && r.exact instanceof Rational ? widened(x.exact, r.exact) : blurred(x.enclosure, r.ball);
  return isDisc(enclosure)
    ? new Complex(enclosure, { standing: "measured", source })
    : new Real(enclosure, { standing: "measured", source });
}

function blurred(x: Enclosure, r: Ball): Enclosure {
  return isDisc(x) ? disc.widenBy(x, r, workingPrecision(), false) : ball.widenBy(x, r, workingPrecision());
}

function trusted(x: Real | Complex): Real | Complex {
  if (x.standing === "exact") {
    throw new DomainError({
      subject: "enclose",
      given: `the exact number ${x} and no radius`,
      expected: "a radius",
      argument: "radius",
    });
  }
  const source = x.source === undefined ? undefined : `${x.source}, right to half a unit of its last place`;
  return x instanceof Real
    ? new Real(x.ball, { standing: "measured", source })
    : new Complex(x.disc, { standing: "measured", source });
}
