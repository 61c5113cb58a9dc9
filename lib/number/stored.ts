// Decimals of stored values, of any size, as rationals in a common unit.
import { DomainError } from "../proof/errors.ts";
import { Rational } from "./rational.ts";

/** Powers of ten that are written out. */
const WRITTEN_OUT = 100_000;

export interface StoredDecimal {
  /** The number over 10^place, cut to 0 if it is smaller than 10^-100000 of it. */
  readonly value: Rational;
  /** At least what was cut, so that a radius can count it. */
  readonly cut: Rational;
}

/** About the place of the leading digit of a stored decimal or fraction: 3 for 1.5e3 and for 1500; undefined for 0. */
export function storedPlace(text: string): number | undefined {
  const { digits, exponent } = parts(text);
  const [top = "", bottom] = digits.split("/");
  const lead = leading(top);
  return lead === undefined ? undefined : exponent + lead - (bottom === undefined ? 0 : (leading(bottom) ?? 0));
}

function leading(digits: string): number | undefined {
  const [whole = "", decimals = ""] = digits.replace(/^\s*[-−+]/, "").split(".");
  const zeros = (whole + decimals).search(/[1-9]/);
  return zeros < 0 ? undefined : whole.length - 1 - zeros;
}

/**
 * A stored decimal or fraction in units of 10^place, whatever its size.
 * Throws DomainError for text that is no number, and for one of more than 10^100000 units.
 */
export function storedDecimal(text: string, place: number): StoredDecimal {
  const { digits, exponent } = parts(text);
  // Read first without its exponent, so that text which is no number is refused in any case.
  const plain = Rational.parse(digits);
  const size = (storedPlace(text) ?? 0) - place;
  if (plain.num === 0n) return { value: plain, cut: Rational.zero };
  if (size < -WRITTEN_OUT) return { value: Rational.zero, cut: Rational.parse(`1e-${WRITTEN_OUT}`) };
  if (!(size <= WRITTEN_OUT)) {
    throw new DomainError({
      subject: "stored",
      given: `a number of about 10^${size} units`,
      expected: `at most 10^${WRITTEN_OUT} units`,
    });
  }
  return { value: plain.times(Rational.parse(`1e${exponent - place}`)), cut: Rational.zero };
}

function parts(text: string): { readonly digits: string; readonly exponent: number } {
  const [digits = "", exponent = "0", ...rest] = text.split(/[eE]/);
  return { digits, exponent: rest.length === 0 ? Number(exponent.replace("−", "-")) : Number.NaN };
}
