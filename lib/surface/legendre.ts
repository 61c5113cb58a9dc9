import { COMPLETE, COMPLETE_PI, INCOMPLETE, INCOMPLETE_PI } from "../function/operations.ts";
import type { Operation } from "../number/origin.ts";
import { Rational } from "../number/rational.ts";
import { apply, type Complex, type ComplexNumeric, Real, scalar } from "../number/values.ts";
import { type ModulusInput, type ModulusPair, modulusPair, type SideInput } from "./modulus.ts";

/** A modulus by one of its names, and for real m > 1 the side of the cut. */
type Sided = ModulusInput & SideInput;

/** An amplitude φ, for the incomplete integrals. */
export interface AmplitudeInput {
  readonly phi: ComplexNumeric;
}

/** The characteristic n of an integral of the third kind, in 1 − n sin²θ; n1 = 1 − n for n near 1. */
export type CharacteristicInput = { readonly n: ComplexNumeric } | { readonly n1: ComplexNumeric };

/**
 * Legendre's elliptic integrals, by the parameter m = k² (or another name of it, see ModulusInput): with Δ = √(1 − m sin²θ)
 * F = ∫ dθ/Δ, E = ∫ Δ dθ, D = ∫ sin²θ dθ/Δ, B = ∫ cos²θ dθ/Δ, Π = ∫ dθ/((1 − n sin²θ)Δ), from 0 to φ, or to π/2 where no φ is given.
 */
export const legendre = {
  /**
   * The complete integral K(m).
   * Domain   m ≠ 1. Branch principal, cut along [1, ∞): there { m, side: "above" } is the limit from Im m > 0, "below" its conjugate.
   * Error    proved; { m1 } keeps all digits beside m = 1. Cost one mean. Throws DomainError on the cut without a side, PoleError for m = 1.
   * Source   DLMF 19.2.8, 19.8.5.
   * @example legendre.K({ m: "1/2" })   // 1.8540746773013719184...
   */
  K: (input: Sided): Real | Complex => complete(COMPLETE.K, modulusPair({ ...input }, "K")),

  /** F(φ | m); beyond |Re φ| = π/2 by F(φ + kπ) = F(φ) + 2kK. where m sin²φ > 1 the limit from { side: "above" } or "below". Throws DomainError there without a side. Source DLMF 19.2.4, 19.25.5. */
  F: (input: AmplitudeInput & Sided): Real | Complex =>
    incomplete(INCOMPLETE.F, input.phi, modulusPair({ ...input }, "F")),

  /**
   * E(m), or E(φ | m) if φ is given; E(1) = 1.
   * Source   DLMF 19.2.5, 19.25.1, 19.25.9–11.
   * @example legendre.E({ m: "1/2" })   // 1.3506438810476755025...
   */
  E: (input: Sided & Partial<AmplitudeInput>): Real | Complex => either("E", input),

  /** D(m) = (K − E)/m, or D(φ | m), without the cancellation at m near 0. */
  D: (input: Sided & Partial<AmplitudeInput>): Real | Complex => either("D", input),

  /** B(m) = (E − m1 K)/m, or B(φ | m), without the cancellations; B(1) = 1. */
  B: (input: Sided & Partial<AmplitudeInput>): Real | Complex => either("B", input),

  /**
   * Π(n | m), or Π(n; φ | m) if φ is given. For real n sin²φ > 1 it is Cauchy's principal value.
   * Domain   n ≠ 1 for the complete one. Throws as K, and as RJ of Carlson's for complex n and m far apart. Source DLMF 19.2.7, 19.25.2, 19.25.14.
   * @example legendre.Pi({ n: "1/10", m: "1/2" })   // 1.9632597071434658482...
   */
  Pi: (input: CharacteristicInput & Sided & Partial<AmplitudeInput>): Real | Complex => {
    const { m, m1, side } = modulusPair({ ...input }, "Pi");
    const { n, n1 } = characteristic(input);
    if (input.phi === undefined) return apply(COMPLETE_PI, [n, n1, m, m1, side]);
    const phi = scalar(input.phi, "Pi");
    return apply(INCOMPLETE_PI, [n, n1, phi, m, m1, side], isExactly(phi, 0) ? Rational.zero : undefined);
  },
} as const;

function either(name: "E" | "D" | "B", input: Sided & Partial<AmplitudeInput>): Real | Complex {
  const k = modulusPair({ ...input }, name);
  return input.phi === undefined ? complete(COMPLETE[name], k) : incomplete(INCOMPLETE[name], input.phi, k);
}

function complete(operation: Operation, { m, m1, side }: ModulusPair): Real | Complex {
  const one = isExactly(m1, 0) && (operation === COMPLETE.E || operation === COMPLETE.B);
  return apply(operation, [m, m1, side], one ? Rational.one : undefined);
}

function incomplete(operation: Operation, phi: ComplexNumeric, { m, m1, side }: ModulusPair): Real | Complex {
  const angle = scalar(phi, operation.name);
  return apply(operation, [angle, m, m1, side], isExactly(angle, 0) ? Rational.zero : undefined);
}

function characteristic(input: CharacteristicInput): { n: Real | Complex; n1: Real | Complex } {
  if ("n" in input && "n1" in input) throw new TypeError("Pi: got { n, n1 } together; expected one of them");
  const given = scalar("n" in input ? input.n : input.n1, "Pi");
  const other = given instanceof Real ? given.neg().plus(1) : given.neg().plus(1);
  return "n" in input ? { n: given, n1: other } : { n: other, n1: given };
}

function isExactly(x: Real | Complex, n: number): boolean {
  return x.exact instanceof Rational && x.exact.equals(n);
}
