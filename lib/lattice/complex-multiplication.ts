// Whether a lattice has complex multiplication: by exact data where there is some, else as far as enclosures go.

import { classPolynomial } from "../function/class-polynomial.ts";
import { nearestInteger } from "../function/enclosure.ts";
import type { Gram } from "../function/matrix.ts";
import { reducedForms } from "../function/quadratic-forms.ts";
import * as ball from "../number/ball.ts";
import * as disc from "../number/disc.ts";
import type { Exact } from "../number/origin.ts";
import { Quadratic } from "../number/quadratic.ts";
import { gcd, Rational } from "../number/rational.ts";
import { reduced } from "./context.ts";
import { exactFormOf } from "./exact-form.ts";
import type { PeriodLattice } from "./period-lattice.ts";

/** The answer, with its ground. */
export type Multiplication =
  | { readonly kind: "yes"; readonly discriminant: bigint; readonly classNumber: number; readonly reason: string }
  | { readonly kind: "no"; readonly reason: string }
  /** Enclosures agree with a discriminant to 10^−digits, which is no proof. */
  | { readonly kind: "consistent"; readonly discriminant: bigint; readonly digits: number; readonly reason: string }
  /** No discriminant with |D| <= bound fits. */
  | { readonly kind: "excluded"; readonly bound: bigint; readonly reason: string };

/** The thirteen discriminants of class number one (Heegner, Baker, Stark). */
const ONE = [-3, -4, -7, -8, -11, -12, -16, -19, -27, -28, -43, -67, -163];
/** The twenty-nine of class number two (Baker, Stark; the orders by the class number formula). */
const TWO = [
  -15, -20, -24, -32, -35, -36, -40, -48, -51, -52, -60, -64, -72, -75, -88, -91, -99, -100, -112, -115, -123, -147,
  -148, -187, -232, -235, -267, -403, -427,
];

/**
 * Complex multiplication of a lattice; `j` is its exact invariant, if that is known.
 *
 * Domain   exact periods of one imaginary quadratic field, or an exact j in Q or a quadratic field, are decided; others by enclosures.
 * Cost     a class polynomial for each candidate discriminant with exact j.
 */
export function complexMultiplication(lattice: PeriodLattice, j: Exact | undefined): Multiplication {
  const form = exactFormOf(lattice.given);
  if (form) {
    // τ = (B + √(B² − AC))/A for |X + Yτ|² ~ AX² + 2BXY + CY².
    const g = gcd(gcd(form.A, 2n * form.B), form.C);
    const [a, b, c] = [form.A / g, (2n * form.B) / g, form.C / g];
    return yes(b * b - 4n * a * c, `τ is a root of ${quadraticText(a, -b, c)}`);
  }
  if (j) return byExactJ(j);
  return byEnclosure(lattice);
}

/** j of exact periods with complex multiplication by an order of class number one, where it is a rational integer. */
export function rationalModulus(lattice: PeriodLattice): Rational | undefined {
  const form = exactFormOf(lattice.given);
  if (!form) return undefined;
  const discriminant = discriminantOf(form);
  if (!ONE.some((D) => BigInt(D) === discriminant)) return undefined;
  const { coefficients } = classPolynomial(discriminant);
  return Rational.of(-coefficients.find((_, k) => coefficients[1 - k] === 1n)!);
}

/** Of the order of multiplications of the lattice with the form AX² + 2BXY + CY². */
function discriminantOf({ A, B, C }: Gram): bigint {
  const g = gcd(gcd(A, 2n * B), C);
  return ((2n * B) / g) ** 2n - 4n * (A / g) * (C / g);
}

function yes(discriminant: bigint, reason: string): Multiplication {
  return { kind: "yes", discriminant, classNumber: reducedForms(discriminant).length, reason };
}

function byExactJ(j: Exact): Multiplication {
  const trace = j instanceof Quadratic ? j.trace() : undefined;
  const norm = j instanceof Quadratic ? j.norm() : undefined;
  const integral = j instanceof Quadratic ? trace!.isInteger() && norm!.isInteger() : j.isInteger();
  if (!integral)
    return { kind: "no", reason: `j = ${j} is not an algebraic integer, as it is for complex multiplication` };
  const list = j instanceof Quadratic ? TWO : ONE;
  for (const D of list) {
    const { coefficients } = classPolynomial(BigInt(D));
    if (vanishesAt(coefficients, j, trace, norm))
      return yes(BigInt(D), `j = ${j} is a root of the class polynomial of ${D}`);
  }
  const count =
    j instanceof Quadratic ? "29 discriminants of class number two" : "13 rational values of class number one";
  return { kind: "no", reason: `j = ${j} is integral, but belongs to none of the ${count}` };
}

/** Whether the class polynomial (ascending or descending; it is monic) has j as a root: X − j, or X² − trace X + norm. */
function vanishesAt(
  coefficients: readonly bigint[],
  j: Exact,
  trace: Rational | undefined,
  norm: Rational | undefined,
): boolean {
  const monicFirst = coefficients[0] === 1n;
  const rest = monicFirst ? coefficients.slice(1) : [...coefficients].reverse().slice(1);
  if (!(j instanceof Quadratic)) return rest.length === 1 && j.equals(-rest[0]!);
  return rest.length === 2 && trace!.equals(-rest[0]!) && norm!.equals(rest[1]!);
}

/** Leading coefficients of the forms that are tried. */
const MOST_A = 600;
const BITS = 1024;

function byEnclosure(lattice: PeriodLattice): Multiplication {
  const { tau } = reduced(lattice, BITS);
  const twice = ball.ldexp(disc.real(tau), 1);
  const norm = disc.real(disc.mul(tau, disc.conj(tau), BITS));
  for (let a = 1n; a <= MOST_A; a++) {
    const [x, y] = [ball.mulInt(twice, a, BITS), ball.mulInt(norm, a, BITS)];
    const [b, c] = [nearestInteger(x), nearestInteger(y)];
    const fits = ball.overlaps(x, ball.fromInt(b)) && ball.overlaps(y, ball.fromInt(c));
    if (!fits) continue;
    const width = Math.max(
      ball.magnitude(ball.sub(x, ball.fromInt(b), BITS)),
      ball.magnitude(ball.sub(y, ball.fromInt(c), BITS)),
      -BITS,
    );
    const digits = Math.floor(-width * 0.30103);
    const reason = `τ fits ${quadraticText(a, -b, c)} to 10^−${digits}`;
    return { kind: "consistent", discriminant: b * b - 4n * a * c, digits, reason };
  }
  // A reduced form has a <= √(|D|/3).
  const bound = 3n * BigInt(MOST_A) * BigInt(MOST_A);
  return { kind: "excluded", bound, reason: `τ fits no quadratic equation of a discriminant down to −${bound}` };
}

function quadraticText(a: bigint, b: bigint, c: bigint): string {
  const size = (n: bigint, name: string) => (name !== "" && (n === 1n || n === -1n) ? "" : `${n < 0n ? -n : n}`);
  const term = (n: bigint, name: string) => (n === 0n ? "" : ` ${n < 0n ? "−" : "+"} ${size(n, name)}${name}`);
  return `${a === 1n ? "" : a}X²${term(b, "X")}${term(c, "")}`;
}
