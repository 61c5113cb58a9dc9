import { THETA, THETA_LOGARITHMIC, type ThetaLabel } from "../function/theta-operations.ts";
import { checkOrder, type ThetaIndex } from "../function/theta-values.ts";
import { Rational } from "../number/rational.ts";
import { π } from "../number/symbols.ts";
import { apply, type Complex, type ComplexNumeric, type Numeric, type Real, scalar } from "../number/values.ts";
import { DomainError } from "../proof/errors.ts";
import { coordinates } from "./modular-point.ts";
import { type ModulusInput, tauOf } from "./modulus.ts";

/** The argument by name: { v } has sin πv, { z } has sin z; and τ, a nome by its name, or whatever else names a modulus. */
export type ThetaInput = ({ readonly v: ComplexNumeric } | { readonly z: ComplexNumeric }) & ModulusInput;

export interface ThetaOptions {
  /** Order of the derivative in the named variable. */
  readonly derivative?: number;
}

/** A theta function by its number, or by rational characteristics [a, b]. */
export type ThetaName = ThetaIndex | readonly [Numeric, Numeric];

/**
 * θ1 .. θ4, and θ with characteristics: theta(1, { v, tau }), theta(3, { z, qTheta }), theta(["1/3", 0], { v, tau }), with derivatives of any order:
 * theta(1, { v, tau }, { derivative: 5 }).
 *
 * Domain   Im τ > 0, any argument.
 * Branch   none in τ; a nome is turned into the τ whose q^(1/4) is principal.
 * Error    proved; a value at v = 0 that is 0 by symmetry is exact.
 * Cost     the reduction of τ, two exponentials, a series of √digits terms.
 * Throws   DomainError for Im τ <= 0, an order that is no integer from 0 to 1000, or a value beyond every exponent; TypeError for a bare { q }.
 * Source   DLMF 20.2.1–20.2.4; θ[a, b](v) = Σ exp(πi(n+a)²τ + 2πi(n+a)(v+b)), so θ[0, 0] = θ3 and θ[1/2, 1/2] = −θ1.
 * @example theta(3, { v: 0, tau: i })   // 1.0864348112133080145...
 */
export function theta(name: ThetaName, input: ThetaInput, options: ThetaOptions = {}): Real | Complex {
  const { v, tau, inZ } = read(input);
  const order = options.derivative ?? 0;
  checkOrder(order);
  const label = labelOf(name);
  const zero = (isZero(v) && odd(label, order)) || (order === 0 && isExactZero(label, v, tau));
  const value = apply(THETA, [v, tau, label, order], zero ? Rational.zero : undefined);
  return inZ && order > 0 ? value.div(π.pow(order)) : value;
}

/**
 * The logarithmic derivative θ′/θ in the named variable, or a higher derivative of ln θ: thetaLogarithmic(4, { z, tau }, { derivative: 2 }).
 * Error    proved. Throws as theta, and PoleError at a zero of θ. Source DLMF 20.5.
 */
export function thetaLogarithmic(name: ThetaName, input: ThetaInput, options: ThetaOptions = {}): Real | Complex {
  const { v, tau, inZ } = read(input);
  const order = options.derivative ?? 1;
  checkOrder(order);
  if (order === 0) throw noLogarithm();
  const label = labelOf(name);
  // ln of an even or odd function is even, up to a constant.
  const known = isZero(v) && order % 2 === 1 && !odd(label, 0) && symmetric(label);
  const value = apply(THETA_LOGARITHMIC, [v, tau, label, order], known ? Rational.zero : undefined);
  return inZ ? value.div(π.pow(order)) : value;
}

function noLogarithm(): DomainError {
  return new DomainError({
    subject: "thetaLogarithmic",
    given: "the derivative of order 0",
    expected: "an order from 1 on",
    hint: "ln of the value has one branch too many to choose from; take ln(theta(...)) for the principal one.",
    argument: "derivative",
  });
}

function read(input: ThetaInput): { v: Real | Complex; tau: Complex; inZ: boolean } {
  const given: Readonly<Record<string, unknown>> = { ...input };
  const names = ["v", "z"].filter((key) => given[key] !== undefined);
  if (names.length !== 1) {
    throw new TypeError(
      `theta: got { ${Object.keys(given).join(", ")} }; expected the argument by one name, { v } in sin πv or { z } in sin z`,
    );
  }
  const tau = tauOf(given, "theta");
  const inZ = names[0] === "z";
  const argument = scalar(given[names[0]!] as ComplexNumeric, "theta");
  return { v: inZ && !isZero(argument) ? argument.div(π) : argument, tau, inZ };
}

const HALF = Rational.of(1, 2);
const CHARACTERISTICS: Readonly<Record<ThetaIndex, readonly [Rational, Rational]>> = {
  1: [HALF, HALF],
  2: [HALF, Rational.zero],
  3: [Rational.zero, Rational.zero],
  4: [Rational.zero, HALF],
};

/** Whether v is a zero of θ[a, b] by exact arithmetic: v + aτ + b ≡ (1 + τ)/2. */
function isExactZero(label: ThetaLabel, v: Real | Complex, tau: Complex): boolean {
  const at = coordinates(v, tau);
  const [a, b] = typeof label === "number" ? CHARACTERISTICS[label] : label;
  return at ? at[0].plus(b).minus(HALF).isInteger() && at[1].plus(a).minus(HALF).isInteger() : false;
}

/** Whether the function is even or odd about v = 0. */
function symmetric(label: ThetaLabel): boolean {
  return typeof label === "number" || label.every((x) => x.times(2).isInteger());
}

/** Whether the derivative of that order is odd about v = 0: of θ1 and of θ[1/2, 1/2] for even orders, of the other symmetric ones for odd orders. */
function odd(label: ThetaLabel, order: number): boolean {
  if (!symmetric(label)) return false;
  const first = typeof label === "number" ? label === 1 : label.every((x) => !x.isInteger());
  return first === (order % 2 === 0);
}

function isZero(x: Real | Complex): boolean {
  return x.exact instanceof Rational && x.exact.sign() === 0;
}

function labelOf(name: ThetaName): ThetaLabel {
  if (Array.isArray(name) && name.length === 2) return [rational(name[0]), rational(name[1])];
  if ([1, 2, 3, 4].includes(name as number)) return name as ThetaIndex;
  throw new DomainError({
    subject: "theta",
    given: `θ${JSON.stringify(name)}`,
    expected: "1, 2, 3, 4 or characteristics [a, b]",
    argument: "name",
  });
}

function rational(x: Numeric): Rational {
  const { exact } = scalar(x, "theta");
  if (exact instanceof Rational) return exact;
  throw new TypeError(`theta: got the characteristic ${x}; expected an exact rational number`);
}
