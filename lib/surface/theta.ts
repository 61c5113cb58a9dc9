import { THETA, THETA_CHARACTERISTIC, THETA_LOGARITHMIC } from "../function/theta-operations.ts";
import { MAX_ORDER, type ThetaIndex } from "../function/theta-values.ts";
import { Rational } from "../number/rational.ts";
import { π } from "../number/symbols.ts";
import { apply, type Complex, type ComplexNumeric, type Numeric, Real, scalar } from "../number/values.ts";
import { DomainError } from "../proof/errors.ts";
import { tauOf } from "./modulus.ts";

/** The argument by name: { v } has sin πv, { z } has sin z; and τ, or a nome by its name. */
export type ThetaInput = ({ readonly v: ComplexNumeric } | { readonly z: ComplexNumeric }) &
  (
    | { readonly tau: ComplexNumeric }
    | { readonly qTheta: ComplexNumeric }
    | { readonly qMod: ComplexNumeric }
    /** Refused with a word on why: q names two different nomes. */
    | { readonly q: ComplexNumeric }
  );

export interface ThetaOptions {
  /** Order of the derivative in the named variable, 0 to 3. */
  readonly derivative?: number;
}

/** A theta function by its number, or by rational characteristics [a, b]. */
export type ThetaName = ThetaIndex | readonly [Numeric, Numeric];

/**
 * θ1 .. θ4, and θ with characteristics: theta(1, { v, tau }), theta(3, { z, qTheta }), theta([1/3, 0], { v, tau }).
 *
 * Domain   Im τ > 0, any argument.
 * Branch   none in τ; a nome is turned into the τ whose q^(1/4) is principal.
 * Error    proved; a value at v = 0 that is 0 by symmetry is exact.
 * Cost     the reduction of τ, two exponentials, a series of √digits terms.
 * Throws   DomainError for Im τ <= 0 and for a derivative above the third, TypeError for a bare { q }.
 * Source   DLMF 20.2.1–20.2.4; θ[a, b](v) = Σ exp(πi(n+a)²τ + 2πi(n+a)(v+b)), so θ[0, 0] = θ3.
 * @example theta(3, { v: 0, tau: i })   // 1.0864348112133080145...
 */
export function theta(name: ThetaName, input: ThetaInput, options: ThetaOptions = {}): Real | Complex {
  const { v, tau, inZ } = read(input);
  const order = options.derivative ?? 0;
  if (typeof name !== "number") return withCharacteristics(name, v, tau, order);
  checkName(name);
  const value = apply(THETA, [v, tau, name, checkedOrder(order)], atZero(name, v, order));
  return inZ && order > 0 ? overPi(value, order) : value;
}

/** θ_j′/θ_j in the named variable. Throws PoleError at a zero of θ_j. Source DLMF 20.5. */
export function thetaLogarithmic(name: ThetaIndex, input: ThetaInput): Real | Complex {
  const { v, tau, inZ } = read(input);
  checkName(name);
  const value = apply(THETA_LOGARITHMIC, [v, tau, name], name !== 1 ? atZero(name, v, 1) : undefined);
  return inZ ? overPi(value, 1) : value;
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
  if (!inZ || isZero(argument)) return { v: argument, tau, inZ };
  return { v: argument instanceof Real ? argument.div(π) : argument.div(π), tau, inZ };
}

function overPi(value: Real | Complex, order: number): Real | Complex {
  const power = π.pow(order);
  return value instanceof Real ? value.div(power) : value.div(power);
}

/** θ1 and the derivative of an even function vanish at 0. */
function atZero(name: ThetaIndex, v: Real | Complex, order: number): Rational | undefined {
  return isZero(v) && (name === 1) === (order % 2 === 0) ? Rational.zero : undefined;
}

function isZero(x: Real | Complex): boolean {
  return x.exact instanceof Rational && x.exact.sign() === 0;
}

function withCharacteristics(
  [a, b]: readonly [Numeric, Numeric],
  v: Real | Complex,
  tau: Complex,
  order: number,
): Real | Complex {
  if (order !== 0) {
    throw new DomainError({
      subject: "theta",
      given: `the derivative of order ${order} with characteristics`,
      expected: "order 0",
      hint: "θ1 .. θ4 have derivatives.",
      argument: "derivative",
    });
  }
  return apply(THETA_CHARACTERISTIC, [v, tau, rational(a), rational(b)]);
}

function rational(x: Numeric): Rational {
  const { exact } = scalar(x, "theta");
  if (exact instanceof Rational) return exact;
  throw new TypeError(`theta: got the characteristic ${x}; expected an exact rational number`);
}

function checkName(name: ThetaIndex): void {
  if ([1, 2, 3, 4].includes(name)) return;
  throw new DomainError({
    subject: "theta",
    given: `θ${name}`,
    expected: "1, 2, 3, 4 or characteristics [a, b]",
    argument: "name",
  });
}

function checkedOrder(order: number): number {
  if (Number.isInteger(order) && order >= 0 && order <= MAX_ORDER) return order;
  throw new DomainError({
    subject: "theta",
    given: `the derivative of order ${order}`,
    expected: `an order from 0 to ${MAX_ORDER}`,
    argument: "derivative",
  });
}
