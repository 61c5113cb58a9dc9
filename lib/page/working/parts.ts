// Small things that several workings share.

import { fromTerms, type Polynomial } from "../../algebra/multivariate.ts";
import { rationals as Q } from "../../algebra/rationals.ts";
import type { Univariate } from "../../algebra/univariate.ts";
import { provedDigits } from "../../number/context.ts";
import type { Rational } from "../../number/rational.ts";
import { i, π } from "../../number/symbols.ts";
import { Complex } from "../../number/values.ts";
import { type Standing, weakest } from "../../proof/standing.ts";
import { standingOf } from "../../surface/claim-parts.ts";
import type { Curve } from "../../surface/curve.ts";
import type { Lattice } from "../../surface/lattice.ts";
import { rationalTex } from "../exact-kind.ts";

/** A check by exact arithmetic: proved with the argument, or refuted by the two values. */
export function exactly(holds: boolean, argument: string): Standing {
  return holds ? { kind: "proved", argument } : { kind: "refuted", evidence: `${argument}: the two values differ` };
}

/** The curve as a first step: its discriminant is not 0, and fits c4 and c6. */
export function curveCheck(E: Curve): { readonly check: Standing; readonly route: string } {
  const { c4, c6, discriminant } = E;
  return {
    check: exactly(
      discriminant.sign() !== 0 && discriminant.times(1728).equals(c4.pow(3).minus(c6.pow(2))),
      "the discriminant from b2, ..., b8 is not 0, and 1728 Δ = c4^3 - c6^2",
    ),
    route: "nonsingular, by two ways to the discriminant",
  };
}

/** Legendre's relation: quasi-periods come from Eisenstein series, so it binds periods to them. */
export function legendreCheck(L: Lattice): { readonly check: Standing; readonly route: string } {
  const [eta1, eta2] = L.quasiPeriods;
  const [w1, w2] = L.periods.map(plainNumber) as [Complex, Complex];
  const left = Complex.from(eta1).times(w2).minus(Complex.from(eta2).times(w1));
  return {
    check: standingOf(left, "=", Complex.from(π).times(2).times(i)),
    route: "Legendre's relation $\\eta_1\\omega_2 - \\eta_2\\omega_1 = 2\\pi i$ with quasi-periods by $q$-series",
  };
}

/** All of several checks as one. */
export function jointly(...standings: readonly Standing[]): Standing {
  const low = weakest(standings);
  return low.kind === "proved" ? (standings[0] ?? low) : low;
}

/** A polynomial over Q in x, as a value. */
export function inX(f: Univariate<Rational>): Polynomial<Rational> {
  return fromTerms(
    Q,
    ["x"],
    f.map((c, k) => [c, [k]] as const),
  );
}

/** A number put into a formula: negative numbers and fractions in brackets. */
export function put(q: Rational | bigint): string {
  const tex = typeof q === "bigint" ? String(q) : rationalTex(q);
  return /^-|frac/.test(tex) ? `\\left(${tex}\\right)` : tex;
}

/** 2^3 · 37 in TeX; 1 for the empty product. */
export function factorTex(
  n: bigint,
  factors: readonly { readonly prime: bigint; readonly exponent: number }[],
): string {
  const sign = n < 0n ? "-" : "";
  const parts = factors.map(({ prime, exponent }) => (exponent === 1 ? `${prime}` : `${prime}^{${exponent}}`));
  return `${sign}${parts.join(" \\cdot ") || "1"}`;
}

/** A point of the torus as a number without its name, which stands beside it already. */
export function plainNumber(z: Complex): Complex {
  return z.exact ? z : z.digits(provedDigits());
}
