import type { Side } from "../function/legendre-mean.ts";
import { LAMBDA } from "../function/modular-operations.ts";
import { COMPLETE } from "../function/operations.ts";
import { THETA } from "../function/theta-operations.ts";
import { latticeOfInvariants } from "../lattice/build.ts";
import * as ball from "../number/ball.ts";
import * as disc from "../number/disc.ts";
import { ln } from "../number/functions.ts";
import { asDisc } from "../number/origin.ts";
import { Rational } from "../number/rational.ts";
import { i, π } from "../number/symbols.ts";
import { apply, Complex, type ComplexNumeric, type Real, scalar } from "../number/values.ts";
import { DomainError } from "../proof/errors.ts";
import { invariantsOfJ } from "./invariants-of-j.ts";
import { Lattice } from "./lattice.ts";
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
  /** λ(τ), another name of m. */
  | { readonly lambda: ComplexNumeric }
  /** Full periods ω1, ω2: τ = ω2/ω1. */
  | { readonly periods: readonly [ComplexNumeric, ComplexNumeric] }
  /** ω1/2, ω2/2. */
  | { readonly halfPeriods: readonly [ComplexNumeric, ComplexNumeric] }
  /** Roots e1, e2, e3 of a cubic: m = (e2 − e3)/(e1 − e3). */
  | { readonly roots: readonly [ComplexNumeric, ComplexNumeric, ComplexNumeric] }
  /** g2, g3: the roots in the order of the lattice's basis. */
  | { readonly invariants: readonly [ComplexNumeric, ComplexNumeric] }
  /** j, with j(i) = 1728, or J = j/1728. */
  | { readonly j: ComplexNumeric }
  | { readonly J: ComplexNumeric }
  /** A lattice, with its τ. */
  | { readonly lattice: Lattice };

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
  /** √(e1 − e3) where periods or roots were given: ℘(z) = e3 + (scale/sn(scale·z))². */
  readonly scale?: Real | Complex | undefined;
}

/** The side that was named, as a sign. */
function sideOf(side: unknown, subject: string): Side | undefined {
  if (side === undefined) return undefined;
  if (side === "above" || side === "below") return side === "above" ? 1 : -1;
  throw new TypeError(`${subject}: got the side ${JSON.stringify(side)}; expected "above" (Im m > 0) or "below"`);
}

const NUMBERS = ["m", "m1", "k", "lambda"] as const;
const RATIOS = ["tau", "qTheta", "qMod", "periods", "halfPeriods"] as const;
const CUBICS = ["roots", "invariants", "j", "J", "lattice"] as const;
const WAYS = [...NUMBERS, ...RATIOS, ...CUBICS];
/** All ways as a message lists them. */
const WORDS =
  "{ m } (= k²), { m1 } (= 1 − m), { k }, { lambda }, { tau }, { qTheta }, { qMod }, { periods }, { halfPeriods }, { roots }, { invariants }, { j }, { J }, { lattice }";

/** The pair m, m1 that an input names. Throws TypeError unless exactly one of the ways is used. */
export function modulusPair(input: Readonly<Record<string, unknown>>, subject: string): ModulusPair {
  const side = sideOf(input.side, subject);
  const pair = pairOf(input, subject);
  return side === undefined ? pair : { ...pair, side };
}

function pairOf(input: Readonly<Record<string, unknown>>, subject: string): ModulusPair {
  const way = theWay(input, subject);
  if (isOneOf(RATIOS, way)) {
    const pair = pairAt(tauOf(input, subject));
    return way === "periods" || way === "halfPeriods" ? { ...pair, scale: scaleOf(input, way, subject) } : pair;
  }
  if (way === "roots") {
    const roots = (input.roots as readonly ComplexNumeric[]).map((e) => scalar(e, subject));
    return ofRoots(roots as [Complex, Complex, Complex]);
  }
  if (isOneOf(CUBICS, way)) {
    const L = cubicLattice(input, way, subject);
    const pair = ofRoots(L.roots as unknown as [Complex, Complex, Complex]);
    const { scale } = pair;
    const better = exactLambda(L.tau) ? pairAt(L.tau) : pair;
    return way === "j" || way === "J" ? { m: better.m, m1: better.m1 } : { ...better, scale };
  }
  const given = scalar(input[way] as ComplexNumeric, subject);
  if (way === "k") return { m: given.pow(2), m1: given.plus(1).times(given.neg().plus(1)) };
  const { m, m1 } = withComplement(given);
  return way === "m1" ? { m: m1, m1: m } : { m, m1 };
}

function theWay(input: Readonly<Record<string, unknown>>, subject: string): (typeof WAYS)[number] {
  const used = WAYS.filter((way) => input[way] !== undefined);
  if (used.length !== 1) throw refusal(input, used, subject);
  return used[0]!;
}

function isOneOf<T extends string>(ways: readonly T[], way: string): way is T {
  return (ways as readonly string[]).includes(way);
}

function pairAt(tau: Complex): ModulusPair {
  const exact = exactLambda(tau);
  const m1 = apply(LAMBDA, [tau, "complement"], exact?.neg().plus(1));
  return { m: apply(LAMBDA, [tau, "lambda"], exact), m1 };
}

function ofRoots([e1, e2, e3]: readonly [Complex, Complex, Complex]): ModulusPair {
  const bottom = e1.minus(e3);
  return { m: e2.minus(e3).div(bottom), m1: e1.minus(e2).div(bottom), scale: principalRoot(bottom) };
}

/** √x, principal; real for a number known to be real and not negative. */
export function principalRoot(x: Real | Complex): Real | Complex {
  return x instanceof Complex || x.sign() === -1 ? Complex.from(x).sqrt() : x.sqrt();
}

/** (π/ω1) θ3(τ)². */
function scaleOf(input: Readonly<Record<string, unknown>>, way: "periods" | "halfPeriods", subject: string) {
  const first = scalar((input[way] as readonly ComplexNumeric[])[0]!, subject);
  const theta = apply(THETA, [Rational.zero, tauOf(input, subject), 3, 0]);
  const square = theta.pow(2).times(π).div(first);
  return way === "periods" ? square : square.div(2);
}

/** The lattice that invariants, j, J or a lattice name; in its real basis where there is one. */
function cubicLattice(
  input: Readonly<Record<string, unknown>>,
  way: (typeof CUBICS)[number],
  subject: string,
): Lattice {
  if (way === "lattice") {
    if (input.lattice instanceof Lattice) return input.lattice;
    throw new TypeError(`${subject}: got { lattice } that is no lattice; expected a value of lattice({ ... })`);
  }
  if (way === "invariants") {
    const [g2, g3] = (input.invariants as readonly ComplexNumeric[]).map((g) => scalar(g, subject)) as [Real, Real];
    return new Lattice(latticeOfInvariants(g2, g3));
  }
  const given = scalar(input[way] as ComplexNumeric, subject);
  return new Lattice(latticeOfInvariants(...invariantsOfJ(way === "J" ? given.times(1728) : given)));
}

function withComplement(m: Real | Complex): ModulusPair {
  return { m, m1: m.neg().plus(1) };
}

function refusal(input: Readonly<Record<string, unknown>>, used: readonly string[], subject: string): TypeError {
  if ("q" in input) return bareNome(subject);
  const got = used.length > 1 ? `{ ${used.join(", ")} } together` : `{ ${Object.keys(input).join(", ")} }`;
  return new TypeError(`${subject}: got ${got}; expected one of ${WORDS}`);
}

/** Two nomes are in use, so a bare q says nothing. */
export function bareNome(subject: string): TypeError {
  return new TypeError(
    `${subject}: got the nome q without a name; expected { qTheta } for q = exp(πiτ) or { qMod } for q = exp(2πiτ)`,
  );
}

/**
 * τ by any of the ways. From a nome it is the τ with Re τ in (−1, 1] (q_θ) or (−1/2, 1/2] (q_mod), which is where the fractional powers of the
 * nome are principal; from a modulus it is iK′/K; from invariants, j or a lattice that of its basis.
 */
export function tauOf(input: Readonly<Record<string, unknown>>, subject: string): Complex {
  const way = theWay(input, subject);
  if (way === "periods" || way === "halfPeriods") return ratioOf(input[way], subject);
  if (way === "roots" || !isOneOf([...RATIOS, ...CUBICS], way)) {
    const { m, m1, side } = modulusPair(input, subject);
    const [K, K1] = [apply(COMPLETE.K, [m, m1, side]), apply(COMPLETE.K, [m1, m, side && -side])];
    return Complex.from(i.times(K1).div(K));
  }
  if (isOneOf(CUBICS, way)) return cubicLattice(input, way, subject).tau;
  const value = scalar(input[way] as ComplexNumeric, subject);
  if (way === "tau") return upperHalf(Complex.from(value), subject);
  refuseNome(value, way, subject);
  const log = ln(Complex.from(value));
  const turns = way === "qTheta" ? Rational.one : Rational.of(2);
  return Complex.from(Complex.from(log).div(i.times(π.times(turns))));
}

function ratioOf(given: unknown, subject: string): Complex {
  const [w1, w2] = (given as readonly ComplexNumeric[]).map((w) => Complex.from(scalar(w, subject))) as [
    Complex,
    Complex,
  ];
  const tau = w2.div(w1);
  if (tau.disc.axis === "real" || tau.disc.im > 0n || tau.disc.rad > 0) return upperHalf(tau, subject);
  throw new DomainError({
    subject,
    given: `periods with ω2/ω1 = ${tau}, below the real axis`,
    expected: "Im ω2/ω1 > 0",
    hint: "Exchange the periods: m then becomes that of the basis (ω2, ω1).",
    argument: "periods",
  });
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
