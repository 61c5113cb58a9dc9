// What an exact τ shows by exact arithmetic: whether q-series have real values, the reduced τ, zeros and values at quadratic points.
import { type Matrix, reduceForm } from "../function/matrix.ts";
import { Quadratic } from "../number/quadratic.ts";
import { gcd, Rational } from "../number/rational.ts";
import type { Complex, Real } from "../number/values.ts";

/** The exact quadratic number of a τ in the upper half plane. */
export function exactTau(tau: Complex): Quadratic | undefined {
  return tau.exact instanceof Quadratic && tau.exact.d < 0n && tau.exact.b.sign() > 0 ? tau.exact : undefined;
}

/** The rational x, y with v = x + yτ, where exact numbers show them. */
export function coordinates(v: Real | Complex, tau: Complex): readonly [Rational, Rational] | undefined {
  const given = v.exact;
  if (given instanceof Rational) return [given, Rational.zero];
  const t = exactTau(tau);
  if (!t || !given || given.d !== t.d) return undefined;
  const y = given.b.div(t.b);
  return [given.a.minus(y.times(t.a)), y];
}

/** Whether exp(2πiτ) is real: Re τ is half an integer. */
export function hasRealNome(tau: Complex): boolean {
  const exact = exactTau(tau);
  return exact?.a.times(2).isInteger() ?? false;
}

/** Whether exp(πiτ) is real: Re τ is an integer. */
export function hasRealThetaNome(tau: Complex): boolean {
  return exactTau(tau)?.a.isInteger() ?? false;
}

/** a τ² + b τ + c = 0 with coprime integers, a > 0. */
export function equation(tau: Quadratic): { a: bigint; b: bigint; c: bigint } {
  const [trace, norm] = [tau.trace().neg(), tau.norm()];
  const a = (trace.den * norm.den) / gcd(trace.den, norm.den);
  return { a, b: (trace.num * a) / trace.den, c: (norm.num * a) / norm.den };
}

/** The matrix that brings an exact τ into the fundamental domain, ties decided exactly. */
export function exactReduction(tau: Quadratic): { readonly matrix: Matrix; readonly tau: Quadratic } {
  const { a, b, c } = equation(tau);
  // |x + yτ|² a = a x² − b xy + c y², doubled to keep the middle coefficient whole.
  const matrix = reduceForm({ A: 2n * a, B: -b, C: 2n * c });
  return { matrix, tau: acted(matrix, tau) };
}

/** (aτ + b)/(cτ + d), exactly. */
export function acted({ a, b, c, d }: Matrix, tau: Quadratic): Quadratic {
  return tau.times(a).plus(b).div(tau.times(c).plus(d));
}

/** Whether j(τ) is real: the reduced τ lies on the boundary or the imaginary axis. */
export function hasRealJ(tau: Complex): boolean {
  const exact = exactTau(tau);
  if (!exact) return false;
  const reduced = exactReduction(exact).tau;
  return reduced.a.times(2).isInteger() || reduced.norm().equals(1);
}

/** Whether every form of weight k is 0 at τ by symmetry: at the images of i for k ≡ 2 mod 4, of ρ for k not divisible by 6. */
export function vanishes(tau: Complex, k: number): boolean {
  const exact = exactTau(tau);
  if (!exact) return false;
  const reduced = exactReduction(exact).tau;
  if (!reduced.norm().equals(1)) return false;
  if (reduced.a.sign() === 0) return k % 4 === 2;
  return reduced.a.equals(Rational.of(-1, 2)) && k % 6 !== 0;
}
