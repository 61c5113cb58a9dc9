// ℘(αz) for a complex multiplication α, as an exact rational function of ℘.
//
// ℘(αz) is even and elliptic for Λ ⊂ α⁻¹Λ, of degree N = |α|² in x = ℘(z), with a simple pole at x = ∞: R = P/Q, deg P = N, deg Q = N − 1. At 0
// both sides are known: ℘(αz) = Σ over the Laurent series of ℘ with αz. So ℘(αz) is a series in 1/x, and P/Q its Padé quotient.
// Proof of the result R, whatever its making: if R ~ x/α² at ∞ and R′(x)² (4x³ − g2 x − g3) = α² (4R³ − g2 R − g3), then R(℘(z)) and ℘(αz) have the
// same differential equation w′² = α²(4w³ − g2 w − g3) and the same pole at 0 with leading term (αz)^−2, which determines w.

import { solve } from "../../algebra/linear.ts";
import { addUni, deriveUni, mulUni, scaleUni, subUni, trim } from "../../algebra/univariate.ts";
import type { Exact } from "../../number/origin.ts";
import { Rational } from "../../number/rational.ts";
import type { Element, FunctionField, ScalarPolynomial } from "./element.ts";
import { wpAtOrigin } from "./laurent.ts";
import { exactly, exactOf, exactScalar, type Scalar } from "./scalar.ts";

/** P and Q of ℘(αz), Q monic, or undefined if α is no multiplication of the lattice. */
export interface CmMultiple {
  readonly P: ScalarPolynomial;
  readonly Q: ScalarPolynomial;
}

/**
 * ℘(αz) = P(℘)/Q(℘), proved.
 *
 * Domain   exact g2 and g3 in the field of α; N = |α|² the norm.
 * Cost     a system of N equations with exact coefficients.
 */
export function cmMultiple({ ring, cubic }: FunctionField, alpha: Exact, N: number): CmMultiple | undefined {
  const [g3, g2] = [0, 1].map((k) => ring.neg(cubic[k] ?? ring.zero)) as [Scalar, Scalar];
  if (!exactOf(g2) || !exactOf(g3)) return undefined;
  const a = exactScalar(alpha);
  const square = ring.mul(a, a);
  const series = inReciprocal(ring, g2, g3, square, 2 * N + 1);
  const found = pade(ring, series, N);
  return found && satisfies(ring, cubic, square, found) ? found : undefined;
}

type Ring = FunctionField["ring"];

/** c_n with ℘(αz) = Σ c_n x^(1−n), n < count. */
function inReciprocal(ring: Ring, g2: Scalar, g3: Scalar, square: Scalar, count: number): Scalar[] {
  // s = t²: t²℘ = X(s); of the argument αt: t² ℘(αt) = α^−2 X(α² s).
  const X = wpAtOrigin(ring, g2, g3, 2 * count).filter((_, k) => k % 2 === 0);
  const inverse = ring.inv(square);
  let factor = inverse;
  let rest = X.map((c) => {
    const value = ring.mul(c, factor);
    factor = ring.mul(factor, square);
    return value;
  });
  // Each step takes off c_n x^(1−n) = c_n X^(1−n) s^(n−1).
  const out: Scalar[] = [];
  let power = X;
  const over = reciprocal(ring, X);
  for (let n = 0; n < count; n++) {
    const c = rest[n]!;
    out.push(c);
    rest = rest.map((r, k) => (k >= n ? ring.sub(r, ring.mul(c, power[k - n] ?? ring.zero)) : r));
    power = product(ring, power, over);
  }
  return out;
}

function product(ring: Ring, a: readonly Scalar[], b: readonly Scalar[]): Scalar[] {
  return a.map((_, n) => {
    let sum = ring.zero;
    for (let k = 0; k <= n; k++) if (!ring.isZero(a[k]!)) sum = ring.add(sum, ring.mul(a[k]!, b[n - k]!));
    return sum;
  });
}

/** 1/X for X with constant term 1. */
function reciprocal(ring: Ring, X: readonly Scalar[]): Scalar[] {
  const out: Scalar[] = [];
  X.forEach((_, n) => {
    let value = n === 0 ? ring.one : ring.zero;
    for (let k = 1; k <= n; k++) if (!ring.isZero(X[k]!)) value = ring.sub(value, ring.mul(X[k]!, out[n - k]!));
    out.push(value);
  });
  return out;
}

/** P/Q with Σ c_n x^(1−n) Q = P: the coefficients of x^−1 .. x^−(N−1) of the product vanish. */
function pade(ring: Ring, c: readonly Scalar[], N: number): CmMultiple | undefined {
  const at = (n: number) => c[n] ?? ring.zero;
  // Q = x^(N−1) + Σ q_k x^k; the coefficient of x^−m: Σ_k q_k c_(k+1+m).
  const rows = Array.from({ length: N - 1 }, (_, m) => Array.from({ length: N - 1 }, (_, k) => at(k + 2 + m)));
  const right = Array.from({ length: N - 1 }, (_, m) => ring.neg(at(N + 1 + m)));
  const q = N === 1 ? [] : solve(ring, rows, right);
  if (!q) return undefined;
  const Q: ScalarPolynomial = [...q, ring.one];
  const P = Array.from({ length: N + 1 }, (_, d) => {
    let sum = ring.zero;
    for (let k = Math.max(0, d - 1); k < N; k++) sum = ring.add(sum, ring.mul(Q[k]!, at(k + 1 - d)));
    return sum;
  });
  return { P: trim(ring, P), Q };
}

/** The differential equation of the header, with the leading coefficients. */
function satisfies(ring: Ring, cubic: ScalarPolynomial, square: Scalar, { P, Q }: CmMultiple): boolean {
  const mul = (...f: ScalarPolynomial[]) => f.reduce((p, q) => mulUni(ring, p, q));
  const slope = subUni(ring, mul(deriveUni(ring, P), Q), mul(P, deriveUni(ring, Q)));
  const left = mul(slope, slope, cubic);
  const homogeneous = cubic.reduce<ScalarPolynomial>(
    (sum, c, k) => addUni(ring, sum, scaleUni(ring, c, power(ring, P, k, Q, 3 - k))),
    [],
  );
  const right = scaleUni(ring, square, mul(homogeneous, Q));
  const lead = ring.mul(P[P.length - 1]!, square);
  return P.length === Q.length + 1 && ring.isZero(ring.sub(lead, ring.one)) && subUni(ring, left, right).length === 0;
}

function power(ring: Ring, P: ScalarPolynomial, k: number, Q: ScalarPolynomial, l: number): ScalarPolynomial {
  let out: ScalarPolynomial = [ring.one];
  for (let n = 0; n < k; n++) out = mulUni(ring, out, P);
  for (let n = 0; n < l; n++) out = mulUni(ring, out, Q);
  return out;
}

/** (℘(αz), ℘′(αz)) as functions of z: ℘′(αz) = R′(℘)℘′/α. */
export function cmElements(field: FunctionField, alpha: Exact, { P, Q }: CmMultiple): { x: Element; y: Element } {
  const { ring } = field;
  const slope = subUni(ring, mulUni(ring, deriveUni(ring, P), Q), mulUni(ring, P, deriveUni(ring, Q)));
  const B = scaleUni(ring, exactScalar(exactly("div", Rational.one, alpha)), slope);
  const constants = new Map();
  return {
    x: { field, A: P, B: [], D: Q, constants },
    y: { field, A: [], B, D: mulUni(ring, Q, Q), constants },
  };
}
