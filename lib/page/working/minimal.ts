// The reduced global minimal model as a derivation: which powers of which primes leave the invariants, and the change.

import { primeDivisors } from "../../algebra/factor.ts";
import { lcm, valuation } from "../../algebra/integer.ts";
import { rationals as Q } from "../../algebra/rationals.ts";
import { changeModel } from "../../curve/weierstrass.ts";
import { Rational } from "../../number/rational.ts";
import type { Standing } from "../../proof/standing.ts";
import { Curve } from "../../surface/curve.ts";
import { Morphism } from "../../surface/morphism.ts";
import { Derivation } from "../derivation.ts";
import { type Table, table } from "../table.ts";
import { curveCheck, exactly } from "./parts.ts";

/** What `E.minimal()` gives. */
export interface Minimal {
  readonly curve: Curve;
  readonly to: Morphism;
}

export function isMinimal(value: unknown): value is Minimal {
  if (typeof value !== "object" || value === null) return false;
  const { curve, to } = value as Partial<Minimal>;
  return curve instanceof Curve && to instanceof Morphism && to.change !== undefined && to.to === curve;
}

const KRAUS = "Laska, Kraus and Connell: Cremona, Algorithms for Modular Elliptic Curves, section 3.2";

export function minimalWorking({ curve, to }: Minimal): Derivation {
  const E = to.from;
  const { u, r, s, t } = to.change as { u: Rational; r: Rational; s: Rational; t: Rational };
  const d = E.a.reduce((n, c) => lcm(n, c.den), 1n);
  let working = new Derivation("Reduced global minimal model", { name: "minimal" })
    .under("modelChange")
    .step("the given model", { value: E, ...curveCheck(E), label: "given" });
  working = working.step("its invariants, $c_4 = b_2^2 - 24 b_4$ and $c_6 = -b_2^3 + 36 b_2 b_4 - 216 b_6$", {
    value: { c4: E.c4, c6: E.c6, Δ: E.discriminant },
    source: "Silverman AEC, III.1",
    check: relation(E),
    route: "$1728 \\Delta = c_4^3 - c_6^2$, where $\\Delta$ was computed from $b_2, ..., b_8$",
    label: "invariants",
  });
  if (d !== 1n) {
    working = working.step(
      `the least common denominator of the coefficients, ${d}, is taken out first: $c_4 d^4$ and $c_6 d^6$ are integers`,
      {
        value: { c4: E.c4.times(Rational.of(d).pow(4)), c6: E.c6.times(Rational.of(d).pow(6)) },
        ...denominatorCheck(E, d),
        label: "denominator",
      },
    );
  }
  return working
    .step(
      "powers of primes that leave: $p^{4e} \\mid c_4$, $p^{6e} \\mid c_6$, $p^{12e} \\mid \\Delta$, with Kraus's conditions at 2 and 3",
      {
        value: valuations(E, d, u),
        source: KRAUS,
        ...primesCheck(E, d, u),
        label: "primes",
      },
    )
    .step("the scale", {
      formula: "u",
      value: u,
      check: exactly(
        E.discriminant.equals(curve.discriminant.times(u.pow(12))),
        "the discriminants of the two models, each from its coefficients, differ by u^12",
      ),
      route: "from the discriminants alone",
      label: "scale",
    })
    .step("the invariants of the minimal model, $c_4/u^4$, $c_6/u^6$ and $\\Delta/u^{12}$", {
      value: { c4: curve.c4, c6: curve.c6, Δ: curve.discriminant },
      check: exactly(
        curve.c4.equals(E.c4.div(u.pow(4))) && curve.c6.equals(E.c6.div(u.pow(6))),
        "c4 and c6 computed again from the coefficients of the minimal model",
      ),
      route: "from the new coefficients",
      label: "scaled",
    })
    .step("the one model with these invariants and $a_1, a_3 \\in \\{0, 1\\}$, $a_2 \\in \\{-1, 0, 1\\}$", {
      value: curve,
      check: minimality(curve),
      route: "no prime can leave once more",
      label: "minimal",
    })
    .step("the change of model, $x = u^2x' + r$, $y = u^3y' + su^2x' + t$", {
      value: { u, r, s, t },
      check: exactly(
        changeModel(Q, E.a, { u, r, s, t }).every((c, k) => c.equals(curve.a[k]!)),
        "the change put into the given coefficients gives those of the minimal model",
      ),
      route: "the formulas for the new coefficients",
      source: "Silverman AEC, III.1, table 3.1",
      label: "change",
    })
    .step("the map to the minimal model", {
      value: to,
      check: to.verify(),
      route: "the map put into the equation of the minimal model",
      label: "map",
    });
}

/** The model with the coefficients a_i d^i, which are integers. */
function denominatorCheck(E: Curve, d: bigint) {
  const weights = [1, 2, 3, 4, 6];
  const scaled = new Curve(Q, E.a.map((c, k) => c.times(Rational.of(d).pow(weights[k]!))) as unknown as Curve["a"]);
  return {
    check: exactly(
      scaled.a.every((c) => c.den === 1n) &&
        scaled.c4.equals(E.c4.times(Rational.of(d).pow(4))) &&
        scaled.c6.equals(E.c6.times(Rational.of(d).pow(6))),
      "the model with the coefficients a_i d^i is integral and has these invariants",
    ),
    route: "from the scaled coefficients",
  };
}

/** The product of the prime powers, and divisibility tried with the number itself. */
function primesCheck(E: Curve, d: bigint, u: Rational) {
  const scale = u.times(d).num;
  const divides = (q: Rational, k: number) => q.times(Rational.of(d).pow(k)).num % scale ** BigInt(k) === 0n;
  const product = primeDivisors(scale).reduce((n, p) => n * p ** BigInt(valuation(scale, p)), 1n);
  return {
    check: exactly(
      product === scale && divides(E.c4, 4) && divides(E.c6, 6) && divides(E.discriminant, 12),
      `the product of all p^e is ${scale}; its 4th, 6th and 12th power divide c4, c6 and Δ`,
    ),
    route: "by division with remainder, not prime by prime",
  };
}

function relation({ c4, c6, discriminant }: Curve): Standing {
  return exactly(discriminant.times(1728).equals(c4.pow(3).minus(c6.pow(2))), "exact arithmetic");
}

/** Each prime whose fourth, sixth and twelfth powers can matter, with what it contributes to u. */
function valuations(E: Curve, d: bigint, u: Rational): Table | string {
  const scaled = (q: Rational, k: number) => q.times(Rational.of(d).pow(k)).num;
  const [c4, c6, Δ] = [scaled(E.c4, 4), scaled(E.c6, 6), scaled(E.discriminant, 12)];
  const scale = u.times(d).num;
  const primes = [...new Set([...primeDivisors(scale), ...primeDivisors(Δ)])].sort((p, q) => Number(p - q));
  const rows = primes.map((p) => [p, order(c4, p), order(c6, p), order(Δ, p), valuation(scale, p)]);
  return table(rows, { columns: ["$p$", "$v_p(c_4)$", "$v_p(c_6)$", "$v_p(\\Delta)$", "$e$"] });
}

function order(n: bigint, p: bigint): number {
  return n === 0n ? Number.POSITIVE_INFINITY : valuation(n, p);
}

/** Why no smaller model is integral: the orders of c4, c6, Δ, or at 2 and 3 that the smaller invariants belong to no integral model. */
export function minimality({ c4, c6, discriminant }: Curve): Standing {
  const words: string[] = [];
  for (const p of primeDivisors(discriminant.num)) {
    if (order(c4.num, p) < 4 || order(c6.num, p) < 6 || order(discriminant.num, p) < 12) continue;
    if (p > 3n || hasModel(c4.num / p ** 4n, c6.num / p ** 6n))
      return { kind: "refuted", evidence: `the model is not minimal at ${p}` };
    words.push(` at ${p} no integral model has the invariants that are left`);
  }
  const rest = words.length > 0 ? `;${words.join(";")}` : "";
  return { kind: "proved", argument: `p^4, p^6, p^12 do not divide c4, c6, Δ together for any other prime${rest}` };
}

/** Whether a reduced integral model has these invariants: all a1, a3 in {0, 1} and a2 in {−1, 0, 1} tried. */
function hasModel(c4: bigint, c6: bigint): boolean {
  for (const a1 of [0n, 1n]) {
    for (const a2 of [-1n, 0n, 1n]) {
      for (const a3 of [0n, 1n]) {
        const b2 = a1 * a1 + 4n * a2;
        const [b4, rest] = [b2 * b2 - c4, (b2 * b2 - c4) % 24n];
        if (rest !== 0n) continue;
        const six = -(b2 ** 3n) + 36n * b2 * (b4 / 24n) - c6;
        if (six % 216n !== 0n) continue;
        if ((b4 / 24n - a1 * a3) % 2n === 0n && (six / 216n - a3 * a3) % 4n === 0n) return true;
      }
    }
  }
  return false;
}
