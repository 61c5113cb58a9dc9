import { classPolynomial } from "../function/class-polynomial.ts";
import type { Matrix } from "../function/matrix.ts";
import { reduction } from "../function/modular-action.ts";
import type { Order, WeberName } from "../function/modular-forms.ts";
import {
  DELTA,
  EISENSTEIN_E,
  EISENSTEIN_G,
  EISENSTEIN_G2,
  ETA,
  LAMBDA,
  LATTICE_DISCRIMINANT,
  MODULAR_J,
  MOVED,
  WEBER,
} from "../function/modular-operations.ts";
import { multipliers } from "../function/multipliers.ts";
import { type ExpansionName, eisensteinExpansion, expansionOf } from "../function/q-expansion.ts";
import { workingPrecision } from "../number/context.ts";
import { Rational } from "../number/rational.ts";
import { apply, Complex, type ComplexNumeric, type Real } from "../number/values.ts";
import { DomainError } from "../proof/errors.ts";
import { ClassPolynomial } from "./class-polynomial.ts";
import { exactJ, exactLambda } from "./modular-exact.ts";
import { acted, exactReduction, exactTau, hasRealJ, hasRealNome, hasRealThetaNome, vanishes } from "./modular-point.ts";
import { upperHalf } from "./modulus.ts";
import { Moved } from "./moved.ts";
import { QSeries } from "./q-series.ts";

type Value = Real | Complex;

/** Rows [a, b], [c, d] of an integer matrix of determinant 1, acting by τ ↦ (aτ + b)/(cτ + d). */
export type MatrixInput = readonly [
  readonly [bigint | number, bigint | number],
  readonly [bigint | number, bigint | number],
];

/**
 * Modular functions and forms of τ, Im τ > 0. They are computed at the reduced τ and carried back, so that no τ is slow; an exact τ gives exact
 * values where symmetry or class number one does (modular.j(i) is 1728), and Real ones where q is real.
 */
export const modular = {
  /** j(τ) = 1728 g2³/Δ = q^−1 + 744 + ..., j(i) = 1728; exact for τ of class number one and two. Source DLMF 23.15.7. */
  j: (tau: ComplexNumeric): Value => {
    const t = upper(tau, "j");
    return apply(MODULAR_J, [t, hasRealJ(t)], exactJ(t));
  },

  /** Dedekind's η(τ) = exp(πiτ/12) Π (1 − exp(2πinτ)). Source DLMF 23.15.9. @example modular.eta(i)   // 0.76822542232605665900... */
  eta: (tau: ComplexNumeric): Value => {
    const t = upper(tau, "eta");
    return apply(ETA, [t, false]);
  },

  /**
   * Eisenstein's series E_k(τ) of even weight k >= 2 with constant term 1; E(2, τ) is holomorphic and quasi-modular. Throws DomainError for another k.
   * @example modular.E(4, i)   // 1.4557628922687093224...
   */
  E: (k: number, tau: ComplexNumeric): Value => {
    const t = upper(tau, "E");
    const known = k > 2 && k % 2 === 0 && vanishes(t, k) ? Rational.zero : undefined;
    return apply(EISENSTEIN_E, [t, hasRealNome(t), k], known);
  },

  /**
   * G_k(τ) = Σ (m + nτ)^−k = 2ζ(k) E_k(τ). G_2 does not converge absolutely, so its order of summation is named: { order: "rows" } sums over m
   * first (2ζ(2) E_2), "columns" over n first, "symmetric" is the limit of Σ ω^−2 |ω|^−s.
   * Throws   DomainError for odd k, k < 2, and k = 2 without an order.
   */
  G: (k: number, tau: ComplexNumeric, options: { readonly order?: Order } = {}): Value => {
    const t = upper(tau, "G");
    if (k === 2) return secondG(t, checkedOrder(options.order));
    const known = k % 2 === 0 && vanishes(t, k) ? Rational.zero : undefined;
    return apply(EISENSTEIN_G, [t, hasRealNome(t), k], known);
  },

  /** η(τ)^24 = q − 24q² + 252q³ − ..., without the (2π)^12. */
  delta: (tau: ComplexNumeric): Value => {
    const t = upper(tau, "delta");
    return apply(DELTA, [t, hasRealNome(t)]);
  },

  /** Δ(Z + Zτ) = g2³ − 27 g3² = (2π)^12 η(τ)^24. */
  discriminant: (tau: ComplexNumeric): Value => {
    const t = upper(tau, "discriminant");
    return apply(LATTICE_DISCRIMINANT, [t, hasRealNome(t)]);
  },

  /** λ(τ) = θ2⁴/θ3⁴, the parameter m of τ = iK′/K; exact where it is a rational or quadratic number: λ(i) = 1/2, λ(√2 i) = 3 − 2√2. */
  lambda: (tau: ComplexNumeric): Value => {
    const t = upper(tau, "lambda");
    return apply(LAMBDA, [t, "lambda", hasRealThetaNome(t)], exactLambda(t));
  },

  /** 1 − λ(τ) = θ4⁴/θ3⁴ with all its digits. */
  lambdaComplement: (tau: ComplexNumeric): Value => {
    const t = upper(tau, "lambdaComplement");
    return apply(LAMBDA, [t, "complement", hasRealThetaNome(t)], exactLambda(t)?.neg().plus(1));
  },

  /** Weber's f(τ) = exp(−πi/24) η((τ+1)/2)/η(τ). */
  weberF: (tau: ComplexNumeric): Value => weberValue("f", tau),
  /** Weber's f1(τ) = η(τ/2)/η(τ). */
  weberF1: (tau: ComplexNumeric): Value => weberValue("f1", tau),
  /** Weber's f2(τ) = √2 η(2τ)/η(τ). */
  weberF2: (tau: ComplexNumeric): Value => weberValue("f2", tau),

  /**
   * τ moved by an integer matrix of determinant 1, with cτ + d and the multipliers of η and of θ1 .. θ4.
   * Throws   DomainError for another determinant.
   */
  act: (matrix: MatrixInput, tau: ComplexNumeric): Moved => movedBy(matrixOf(matrix), upper(tau, "act")),

  /** τ moved into the fundamental domain; the matrix of an exact τ is decided exactly, another one by its midpoint. */
  reduce: (tau: ComplexNumeric): Moved => {
    const t = upper(tau, "reduce");
    const exact = exactTau(t);
    const prec = Math.max(64, workingPrecision());
    return movedBy(exact ? exactReduction(exact).matrix : reduction(t.disc, prec).matrix, t);
  },

  /**
   * The class polynomial Π (X − j(τ)) of a negative discriminant D ≡ 0 or 1 mod 4: exact integers, each the only one in a proved enclosure.
   * @example modular.classPolynomial(-23)   // X^3 + 3491750 X^2 - 5151296875 X + 12771880859375
   */
  classPolynomial: (discriminant: bigint | number): ClassPolynomial =>
    new ClassPolynomial(classPolynomial(BigInt(discriminant))),

  /**
   * The first coefficients of an expansion in a named nome, exactly: expansion("j", { terms: 10 }), expansion({ E: 4 }, { terms: 10 }).
   * Names: "eta", "delta", "j", "lambda", "theta2", "theta3", "theta4", "f", "f1", "f2" (for f2/√2), and { E: k }.
   */
  expansion: (name: ExpansionName | { readonly E: number }, options: { readonly terms: number }): QSeries => {
    const data =
      typeof name === "string" ? expansionOf(known(name), options.terms) : eisensteinExpansion(name.E, options.terms);
    return new QSeries(data);
  },
} as const;

function upper(given: ComplexNumeric, subject: string): Complex {
  return upperHalf(Complex.from(given), subject);
}

function weberValue(name: WeberName, tau: ComplexNumeric): Value {
  return apply(WEBER, [upper(tau, name), name]);
}

/** The symmetric sum has weight 2, so that it vanishes where such forms do; by columns it is real on the imaginary axis only. */
function secondG(tau: Complex, order: Order): Value {
  const known = order === "symmetric" && vanishes(tau, 2) ? Rational.zero : undefined;
  return apply(EISENSTEIN_G2, [tau, order !== "columns" && hasRealNome(tau), order], known);
}

function checkedOrder(order: Order | undefined): Order {
  if (order === "rows" || order === "columns" || order === "symmetric") return order;
  throw new DomainError({
    subject: "G",
    given: order === undefined ? "G(2, τ) without an order of summation" : `the order ${JSON.stringify(order)}`,
    expected: '{ order: "rows" }, { order: "columns" } or { order: "symmetric" }',
    hint: "The sum does not converge absolutely, and the orders give different values.",
    argument: "order",
  });
}

function known(name: ExpansionName): ExpansionName {
  const names: readonly ExpansionName[] = [
    "eta",
    "delta",
    "j",
    "lambda",
    "theta2",
    "theta3",
    "theta4",
    "f",
    "f1",
    "f2",
  ];
  if (names.includes(name)) return name;
  throw new DomainError({
    subject: "expansion",
    given: `the name ${JSON.stringify(name)}`,
    expected: `${names.map((n) => JSON.stringify(n)).join(", ")} or { E: k }`,
    argument: "name",
  });
}

function matrixOf([[a, b], [c, d]]: MatrixInput): Matrix {
  return { a: BigInt(a), b: BigInt(b), c: BigInt(c), d: BigInt(d) };
}

function movedBy(matrix: Matrix, tau: Complex): Moved {
  const exact = exactTau(tau);
  const image = Complex.from(apply(MOVED, [tau, matrix], exact && acted(matrix, exact)));
  return new Moved(matrix, image, tau.times(matrix.c).plus(matrix.d), multipliers(matrix));
}
