// Values of j and λ at quadratic points where they are rational or quadratic numbers: exact, since an enclosure singles out one of the few
// numbers that an exact equation allows.
import { classPolynomial } from "../function/class-polynomial.ts";
import { jInvariant, modularLambda } from "../function/modular-forms.ts";
import { reducedForms } from "../function/quadratic-forms.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { isqrt } from "../number/fixed/isqrt.ts";
import { decide } from "../number/ladder.ts";
import { asDisc, enclosureOf } from "../number/origin.ts";
import { Quadratic } from "../number/quadratic.ts";
import { Rational } from "../number/rational.ts";
import type { Complex } from "../number/values.ts";
import { equation, exactTau } from "./modular-point.ts";

type Exact = Rational | Quadratic;

/** Beyond this no discriminant has class number one or two (Heegner, Baker, Stark). */
const LAST_DISCRIMINANT = -427n;

/**
 * j(τ) for τ of class number one, an integer, or two, in a real quadratic field: a root of the class polynomial.
 * Source   D. A. Cox, Primes of the Form x² + ny², theorem 11.1.
 */
export function exactJ(tau: Complex): Exact | undefined {
  const exact = exactTau(tau);
  if (!exact) return undefined;
  const { a, b, c } = equation(exact);
  const discriminant = b * b - 4n * a * c;
  if (discriminant < LAST_DISCRIMINANT || reducedForms(discriminant).length > 2) return undefined;
  const [, linear, constant] = classPolynomial(discriminant).coefficients.map((n) => Rational.of(n));
  if (!constant) return linear!.neg();
  const roots = quadraticRoots(linear!.neg(), constant);
  return theOneAt("j", roots, (prec) => jInvariant(asDisc(exact.enclosure(prec)), prec));
}

/**
 * λ(τ) for τ of class number one where it is quadratic: 256 (1 − t)³ = j t² for t = λ(1 − λ), and if one of the three t is rational, all six λ
 * of the orbit are in one quadratic field. As j is an integer, the rational t are powers of 2 up to sign.
 * Source   DLMF 23.15.7 by λ; the orbit λ, 1 − λ, 1/λ, ... of the six substitutions.
 */
export function exactLambda(tau: Complex): Exact | undefined {
  const exact = exactTau(tau);
  const j = exact && exactJ(tau);
  if (!exact || !(j instanceof Rational)) return undefined;
  const t = POWERS.find((x) =>
    Rational.one
      .minus(x)
      .pow(3)
      .times(256)
      .equals(j.times(x.pow(2))),
  );
  if (!t) return undefined;
  const orbit = quadraticRoots(Rational.one, t).flatMap(orbitOf);
  return theOneAt("λ", orbit, (prec) => modularLambda(asDisc(exact.enclosure(prec)), prec).lambda);
}

const POWERS: readonly Rational[] = Array.from({ length: 17 }, (_, k) => Rational.of(2).pow(k - 8)).flatMap((x) => [
  x,
  x.neg(),
]);

/** The numbers with this sum and product. */
function quadraticRoots(sum: Rational, product: Rational): Exact[] {
  const root = rootOf(sum.pow(2).minus(product.times(4)));
  return [root, root.neg()].map((r) => (r instanceof Rational ? r.plus(sum).div(2) : r.plus(sum).div(2)));
}

/** √x for x in a field Q(√d) with |d| up to that of the discriminants. */
function rootOf(x: Rational): Exact {
  const size = x.abs();
  const n = size.num * size.den;
  for (let d = 1n; d <= -LAST_DISCRIMINANT; d++) {
    const root = isqrt(n * d);
    if (root * root !== n * d) continue;
    const rational = Rational.of(root, d * size.den);
    const radicand = x.sign() < 0 ? -d : d;
    return radicand === 1n ? rational : Quadratic.of(0, rational, radicand);
  }
  throw new RangeError(`√${x} is in none of the fields that class number two allows`);
}

/** The six values that the substitutions of three points in a line give. */
function orbitOf(x: Exact): Exact[] {
  const complement = (y: Exact): Exact => y.neg().plus(1);
  const over: Exact = x.inv();
  return [x, over, complement(over)].flatMap((y) => [y, complement(y)]);
}

/** The one of the numbers that every sharp enclosure holds. */
function theOneAt(subject: string, candidates: readonly Exact[], value: (prec: number) => Disc): Exact {
  return decide(subject, (prec) => {
    const enclosure = value(prec);
    const left = candidates.filter((x) => disc.overlaps(asDisc(enclosureOf(x, prec)), enclosure));
    const [first] = left;
    return first && left.every((x) => String(x) === String(first)) ? first : undefined;
  });
}
