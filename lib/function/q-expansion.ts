// Exact q-expansions, by integer arithmetic alone.
import { Rational } from "../number/rational.ts";
import { DomainError } from "../proof/errors.ts";
import { bernoulli } from "./modular-forms.ts";
import { divide, multiply } from "./power-series.ts";

/** Σ coefficients[n] q^(first + n) with q named by `nome`; all coefficients up to the length are exact, later ones not given. */
export interface QExpansion {
  readonly name: string;
  /** q_mod = exp(2πiτ), q_θ = exp(πiτ). */
  readonly nome: "q_mod" | "q_θ";
  /** Exponent of the first term, as η starts with q_mod^(1/24). */
  readonly first: Rational;
  readonly coefficients: readonly Rational[];
}

/** Functions with an expansion here; E_k and G_k by `eisensteinExpansion`. */
export type ExpansionName = "eta" | "delta" | "j" | "lambda" | "theta2" | "theta3" | "theta4" | "f" | "f1" | "f2";

/**
 * E_k = 1 − (2k/B_k) Σ σ_{k−1}(n) q^n for even k >= 2.
 * Cost     n ln n additions of integers. Source J.-P. Serre, A Course in Arithmetic, VII.4.2.
 */
export function eisensteinExpansion(k: number, count: number): QExpansion {
  if (!(Number.isSafeInteger(k) && k >= 2 && k % 2 === 0)) {
    throw new DomainError({
      subject: "expansion",
      given: `the weight ${k}`,
      expected: "an even integer from 2 on",
      argument: "k",
    });
  }
  checkCount(count);
  const factor = Rational.of(-2 * k).div(bernoulli(k));
  const sums = divisorSums(k - 1, count);
  const coefficients = sums.map((s, n) => (n === 0 ? Rational.one : factor.times(s)));
  return { name: `E${k}`, nome: "q_mod", first: Rational.zero, coefficients };
}

/** σ_power(n) for n = 1 .. count − 1, and 0. */
export function divisorSums(power: number, count: number): bigint[] {
  const sums: bigint[] = new Array(count).fill(0n);
  for (let d = 1; d < count; d++) {
    const term = BigInt(d) ** BigInt(power);
    for (let n = d; n < count; n += d) sums[n]! += term;
  }
  return sums;
}

function checkCount(count: number): void {
  if (Number.isSafeInteger(count) && count >= 1 && count <= 1_000_000) return;
  throw new DomainError({
    subject: "expansion",
    given: `${count} terms`,
    expected: "an integer from 1 to 1000000",
    argument: "terms",
  });
}

/**
 * The first `count` coefficients of a function of the list.
 *
 * Error    none.
 * Cost     up to two dozen products of power series with `count` terms, each one product of integers.
 * Source   Euler: η; Jacobi: η³ = Σ (−1)^n (2n+1) q^((2n+1)²/8), so Δ is its 8th power; j = E4³/Δ; theta series DLMF 20.2;
 *          λ = θ2⁴/θ3⁴; Weber's products.
 */
export function expansionOf(name: ExpansionName, count: number): QExpansion {
  checkCount(count);
  const { nome, first, values } = SERIES[name](count);
  return { name, nome, first, coefficients: values.map((n) => Rational.of(n)) };
}

interface Raw {
  readonly nome: "q_mod" | "q_θ";
  readonly first: Rational;
  readonly values: readonly bigint[];
}

const SERIES: Readonly<Record<ExpansionName, (count: number) => Raw>> = {
  eta: (count) => ({ nome: "q_mod", first: Rational.of(1, 24), values: euler(count) }),
  delta: (count) => ({ nome: "q_mod", first: Rational.one, values: deltaSeries(count) }),
  j: (count) => ({ nome: "q_mod", first: Rational.of(-1), values: jSeries(count) }),
  theta2: (count) => ({
    nome: "q_θ",
    first: Rational.of(1, 4),
    values: sparse(
      count,
      (n) => n * (n + 1),
      () => 2n,
    ),
  }),
  theta3: (count) => ({
    nome: "q_θ",
    first: Rational.zero,
    values: sparse(
      count,
      (n) => n * n,
      (n) => (n ? 2n : 1n),
    ),
  }),
  theta4: (count) => ({ nome: "q_θ", first: Rational.zero, values: sparse(count, (n) => n * n, theta4Term) }),
  lambda: (count) => ({ nome: "q_θ", first: Rational.one, values: lambdaSeries(count) }),
  f: (count) => ({ nome: "q_θ", first: Rational.of(-1, 24), values: binomials(count, 1, 2, 1n) }),
  f1: (count) => ({ nome: "q_θ", first: Rational.of(-1, 24), values: binomials(count, 1, 2, -1n) }),
  // f2 = √2 q_mod^(1/24) Π (1 + q_mod^n): the coefficients are those of f2/√2.
  f2: (count) => ({ nome: "q_mod", first: Rational.of(1, 24), values: binomials(count, 1, 1, 1n) }),
};

function theta4Term(n: number): bigint {
  if (n === 0) return 1n;
  return n % 2 ? -2n : 2n;
}

function sparse(count: number, exponent: (n: number) => number, value: (n: number) => bigint): bigint[] {
  const series: bigint[] = new Array(count).fill(0n);
  for (let n = 0; exponent(n) < count; n++) series[exponent(n)]! += value(n);
  return series;
}

/** Π (1 − q^n). */
function euler(count: number): bigint[] {
  const series: bigint[] = new Array(count).fill(0n);
  for (let n = 0; (n * (3 * n - 1)) / 2 < count; n++) {
    for (const m of n === 0 ? [0] : [n, -n]) {
      const e = (m * (3 * m - 1)) / 2;
      if (e < count) series[e] = n % 2 ? -1n : 1n;
    }
  }
  return series;
}

function deltaSeries(count: number): bigint[] {
  const cube = sparse(
    count,
    (n) => (n * (n + 1)) / 2,
    (n) => BigInt(n % 2 ? -(2 * n + 1) : 2 * n + 1),
  );
  const square = multiply(cube, cube, count);
  const fourth = multiply(square, square, count);
  return multiply(fourth, fourth, count);
}

function jSeries(count: number): bigint[] {
  const e4 = divisorSums(3, count).map((s, n) => (n === 0 ? 1n : 240n * s));
  const cube = multiply(multiply(e4, e4, count), e4, count);
  return divide(cube, deltaSeries(count), count);
}

function lambdaSeries(count: number): bigint[] {
  // θ2⁴/θ3⁴ with θ2 = 2 q^(1/4) ψ.
  const psi = sparse(
    count,
    (n) => n * (n + 1),
    () => 1n,
  );
  const theta3 = sparse(
    count,
    (n) => n * n,
    (n) => (n ? 2n : 1n),
  );
  const fourth = (x: readonly bigint[]) => {
    const square = multiply(x, x, count);
    return multiply(square, square, count);
  };
  return divide(
    fourth(psi).map((c) => 16n * c),
    fourth(theta3),
    count,
  );
}

/** Π (1 + sign·q^(start + step·n)), n >= 0. */
function binomials(count: number, start: number, step: number, sign: bigint): bigint[] {
  const series: bigint[] = new Array(count).fill(0n);
  series[0] = 1n;
  for (let e = start; e < count; e += step) {
    for (let n = count - 1; n >= e; n--) series[n]! += sign * series[n - e]!;
  }
  return series;
}
