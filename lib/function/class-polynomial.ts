// Class polynomials: the minimal polynomial of j at a quadratic τ, by certified rounding.

import type { Ball } from "../number/ball.ts";
import * as ball from "../number/ball.ts";
import * as disc from "../number/disc.ts";
import { PrecisionError } from "../proof/errors.ts";
import { nearestInteger, ontoReal } from "./enclosure.ts";
import { jInvariant } from "./modular-forms.ts";
import { type Form, reducedForms } from "./quadratic-forms.ts";

export interface ClassPolynomial {
  readonly discriminant: bigint;
  readonly forms: readonly Form[];
  /** Coefficients from the leading 1 down to the constant term. */
  readonly coefficients: readonly bigint[];
}

/**
 * Π (X − j(τ)) over the primitive reduced forms of the discriminant, τ = (−b + √D)/2a: integers, proved.
 *
 * Domain   D < 0, D ≡ 0 or 1 mod 4.
 * Error    none: each coefficient is the one integer in an enclosure of radius below 1/2; the precision is raised until all are.
 * Cost     h values of j and h² products of π√|D| Σ 1/a bits.
 * Throws   DomainError for another D, PrecisionError if four times the estimated precision does not do.
 * Source   D. A. Cox, Primes of the Form x² + ny², theorem 11.1 and section 13; conjugate forms have conjugate values.
 */
export function classPolynomial(discriminant: bigint): ClassPolynomial {
  const forms = reducedForms(discriminant);
  const estimate = forms.reduce((sum, { a }) => sum + (Math.PI * Math.sqrt(Number(-discriminant))) / Number(a), 0);
  const bits = Math.ceil(estimate / Math.LN2) + 64 + 8 * forms.length;
  for (let prec = bits; prec <= 4 * bits; prec *= 2) {
    const coefficients = product(discriminant, forms, prec).map(integerIn);
    if (coefficients.every((c) => c !== undefined)) {
      return { discriminant, forms, coefficients: (coefficients as bigint[]).reverse() };
    }
  }
  throw new PrecisionError({
    subject: "class polynomial",
    given: `coefficients not isolated with ${4 * bits} bits`,
    expected: "enclosures with one integer each",
  });
}

/** Coefficients from the constant term up. Forms with b < 0 are the conjugates of others and are taken with them. */
function product(discriminant: bigint, forms: readonly Form[], prec: number): Ball[] {
  let poly: Ball[] = [ball.one];
  const root = ball.sqrt(ball.fromInt(-discriminant), prec + 8);
  for (const { a, b, c } of forms) {
    if (b < 0n) continue;
    const double = ball.fromInt(2n * a);
    const re = ball.div(ball.fromInt(-b), double, prec + 8);
    const j = jInvariant(disc.fromBalls(re, ball.div(root, double, prec + 8)), prec);
    // b = 0, b = a and a = c are the forms equivalent to their conjugates: j is real.
    if (b === 0n || b === a || a === c) {
      poly = times(poly, [ball.neg(disc.real(ontoReal(j))), ball.one], prec);
    } else {
      const norm = disc.real(disc.mul(j, disc.conj(j), prec));
      poly = times(poly, [norm, ball.neg(ball.ldexp(disc.real(j), 1)), ball.one], prec);
    }
  }
  return poly;
}

function times(p: readonly Ball[], q: readonly Ball[], prec: number): Ball[] {
  const result: Ball[] = new Array(p.length + q.length - 1).fill(ball.zero);
  p.forEach((x, i) => {
    q.forEach((y, k) => {
      result[i + k] = ball.add(result[i + k]!, ball.mul(x, y, prec), prec);
    });
  });
  return result;
}

/** The integer of an enclosure that holds exactly one. */
function integerIn(x: Ball): bigint | undefined {
  const half: Ball = { man: 1n, exp: -1, rad: 0 };
  if (ball.compare(ball.radius(x), half) !== -1) return undefined;
  const n = nearestInteger(x);
  return ball.contains(x, ball.fromInt(n)) ? n : undefined;
}
