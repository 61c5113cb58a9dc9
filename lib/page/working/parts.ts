// Small things that several workings share.

import { fromTerms, type Polynomial } from "../../algebra/multivariate.ts";
import { rationals as Q } from "../../algebra/rationals.ts";
import type { Univariate } from "../../algebra/univariate.ts";
import { provedDigits } from "../../number/context.ts";
import type { Rational } from "../../number/rational.ts";
import type { Complex } from "../../number/values.ts";
import type { Standing } from "../../proof/standing.ts";
import { rationalTex } from "../exact-kind.ts";

/** A check by exact arithmetic: proved with the argument, or refuted by the two values. */
export function exactly(holds: boolean, argument: string): Standing {
  return holds ? { kind: "proved", argument } : { kind: "refuted", evidence: `${argument}: the two values differ` };
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
