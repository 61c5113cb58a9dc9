import type { Side } from "../function/legendre-mean.ts";
import { LAMBDA } from "../function/modular-operations.ts";
import * as ball from "../number/ball.ts";
import * as disc from "../number/disc.ts";
import { ln } from "../number/functions.ts";
import { asDisc } from "../number/origin.ts";
import { Rational } from "../number/rational.ts";
import { i, π } from "../number/symbols.ts";
import { apply, Complex, type ComplexNumeric, Real, scalar } from "../number/values.ts";
import { DomainError } from "../proof/errors.ts";
import { exactLambda } from "./modular-exact.ts";

/** The ways to say which modulus is meant; a bare nome is refused, since two are in use. */
export type ModulusInput =
  /** Parameter m = k². */
  | { readonly m: ComplexNumeric }
  /** Complementary parameter m1 = 1 − m, for m near 1. */
  | { readonly m1: ComplexNumeric }
  /** Modulus k. */
  | { readonly k: ComplexNumeric }
  /** τ = iK′/K, m = λ(τ). */
  | { readonly tau: ComplexNumeric }
  /** q_θ = exp(πiτ). */
  | { readonly qTheta: ComplexNumeric }
  /** q_mod = exp(2πiτ). */
  | { readonly qMod: ComplexNumeric }
  /** Refused with a word on why: q names two different nomes. */
  | { readonly q: ComplexNumeric }
  /** Roots e1, e2, e3 of a cubic: m = (e2 − e3)/(e1 − e3). */
  | { readonly roots: readonly [ComplexNumeric, ComplexNumeric, ComplexNumeric] };

/**
 * For a real m > 1, on the cut [1, ∞) of K, E, Π and their kin: "above" is the limit from Im m > 0 and "below" the one from Im m < 0, its conjugate.
 * The twelve functions of Jacobi do not depend on it.
 */
export interface SideInput {
  readonly side?: "above" | "below";
}

/** The parameter and its complement, each with all its digits; 1 or −1 for the side of the cut. */
export interface ModulusPair {
  readonly m: Real | Complex;
  readonly m1: Real | Complex;
  readonly side?: Side | undefined;
}

/** The side that was named, as a sign. */
function sideOf(side: unknown, subject: string): Side | undefined {
  if (side === undefined) return undefined;
  if (side === "above" || side === "below") return side === "above" ? 1 : -1;
  throw new TypeError(`${subject}: got the side ${JSON.stringify(side)}; expected "above" (Im m > 0) or "below"`);
}

const WAYS = ["m", "m1", "k", "tau", "qTheta", "qMod", "roots"] as const;

/** The pair m, m1 that an input names. Throws TypeError unless exactly one of the ways is used. */
export function modulusPair(input: Readonly<Record<string, unknown>>, subject: string): ModulusPair {
  const side = sideOf(input.side, subject);
  const pair = pairOf(input, subject);
  return side === undefined ? pair : { ...pair, side };
}

function pairOf(input: Readonly<Record<string, unknown>>, subject: string): ModulusPair {
  const used = WAYS.filter((way) => input[way] !== undefined);
  if (used.length !== 1) throw refusal(input, used, subject);
  const value = input[used[0]!];
  switch (used[0]!) {
    case "m":
      return withComplement(scalar(value as ComplexNumeric, subject));
    case "m1": {
      const { m, m1 } = withComplement(scalar(value as ComplexNumeric, subject));
      return { m: m1, m1: m };
    }
    case "k": {
      const k = scalar(value as ComplexNumeric, subject);
      return { m: k.pow(2), m1: times(plus(k, 1), plus(k.neg(), 1)) };
    }
    case "roots": {
      const [e1, e2, e3] = (value as readonly ComplexNumeric[]).map((e) => scalar(e, subject)) as [
        Complex,
        Complex,
        Complex,
      ];
      const bottom = e1.minus(e3);
      return { m: e2.minus(e3).div(bottom), m1: e1.minus(e2).div(bottom) };
    }
    default: {
      const tau = tauOf(input, subject);
      const exact = exactLambda(tau);
      const m1 = apply(LAMBDA, [tau, "complement"], exact?.neg().plus(1));
      return { m: apply(LAMBDA, [tau, "lambda"], exact), m1 };
    }
  }
}

function withComplement(m: Real | Complex): ModulusPair {
  return { m, m1: plus(m.neg(), 1) };
}

function plus(x: Real | Complex, n: number): Real | Complex {
  return x instanceof Real ? x.plus(n) : x.plus(n);
}

function times(x: Real | Complex, y: Real | Complex): Real | Complex {
  return x instanceof Real ? x.times(y) : x.times(y);
}

function refusal(input: Readonly<Record<string, unknown>>, used: readonly string[], subject: string): TypeError {
  if ("q" in input) return bareNome(subject);
  const got = used.length > 1 ? `{ ${used.join(", ")} } together` : `{ ${Object.keys(input).join(", ")} }`;
  return new TypeError(
    `${subject}: got ${got}; expected one of { m } (= k²), { m1 } (= 1 − m), { k }, { tau }, { qTheta }, { qMod }, { roots }`,
  );
}

/** Two nomes are in use, so a bare q says nothing. */
export function bareNome(subject: string): TypeError {
  return new TypeError(
    `${subject}: got the nome q without a name; expected { qTheta } for q = exp(πiτ) or { qMod } for q = exp(2πiτ)`,
  );
}

/**
 * τ from { tau }, { qTheta } or { qMod }. From a nome it is the τ with Re τ in (−1, 1] (q_θ) or (−1/2, 1/2] (q_mod), which is where the
 * fractional powers of the nome are principal.
 */
export function tauOf(input: Readonly<Record<string, unknown>>, subject: string): Complex {
  const given = (["tau", "qTheta", "qMod"] as const).filter((way) => input[way] !== undefined);
  if (given.length !== 1) {
    if ("q" in input) throw bareNome(subject);
    throw new TypeError(
      `${subject}: got { ${Object.keys(input).join(", ")} }; expected one of { tau }, { qTheta }, { qMod }`,
    );
  }
  const value = scalar(input[given[0]!] as ComplexNumeric, subject);
  if (given[0] === "tau") return upperHalf(Complex.from(value), subject);
  refuseNome(value, given[0]!, subject);
  const log = ln(Complex.from(value));
  const turns = given[0] === "qTheta" ? Rational.one : Rational.of(2);
  return Complex.from(Complex.from(log).div(i.times(π.times(turns))));
}

function refuseNome(q: Real | Complex, name: "qTheta" | "qMod", subject: string): void {
  const size = disc.abs(asDisc(q.enclosure), 64);
  const zero = ball.isZero(size);
  if (!zero && ball.compare(size, ball.one) === -1) return;
  const [label, meaning] = name === "qTheta" ? ["q_θ", "exp(πiτ)"] : ["q_mod", "exp(2πiτ)"];
  throw new DomainError({
    subject,
    given: `${label} = ${q}`,
    expected: `0 < |${label}| < 1, since ${label} = ${meaning} with Im τ > 0`,
    hint: zero ? "Towards 0 the functions become trigonometric: m = 0." : "",
    argument: name,
  });
}

/** τ itself, unless it is seen at once that Im τ <= 0. */
export function upperHalf(tau: Complex, subject: string): Complex {
  const low = tau.exact instanceof Rational || tau.disc.axis === "real" || (tau.disc.im < 0n && tau.disc.rad === 0);
  if (!low) return tau;
  throw new DomainError({
    subject,
    given: `τ = ${tau}`,
    expected: "Im τ > 0",
    hint: tau.disc.im < 0n ? "The conjugate of τ, or −τ, may be meant." : "",
    argument: "tau",
  });
}
