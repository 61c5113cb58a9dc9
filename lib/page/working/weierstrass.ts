// A value of ℘ as a derivation: reduced τ, reduced argument, the q-series with its first terms.

import type { PeriodLattice } from "../../lattice/period-lattice.ts";
import { provedDigits } from "../../number/context.ts";
import { exp } from "../../number/functions.ts";
import { i, π } from "../../number/symbols.ts";
import { Complex, type ComplexNumeric, type Real } from "../../number/values.ts";
import { standingOf } from "../../surface/claim-parts.ts";
import { Lattice } from "../../surface/lattice.ts";
import { TorusPoint } from "../../surface/torus-point.ts";
import { Derivation } from "../derivation.ts";
import { table } from "../table.ts";
import { numberWorking } from "./number.ts";
import { plainNumber } from "./parts.ts";
import { reductionSteps } from "./reduced.ts";

const SERIES = "common practice; Silverman, Advanced Topics, I.6 (q-expansion of ℘)";

/** The lattice and the argument of a number that is a value of ℘, read from its record. */
export function valueOfWp(x: Real | Complex): { readonly L: Lattice; readonly z: Complex } | undefined {
  if (x.origin?.operation.name !== "wp") return undefined;
  const [data, ...rest] = x.origin.operands;
  const L = new Lattice(data as PeriodLattice);
  if (rest.length === 1) return { L, z: Complex.from(rest[0] as ComplexNumeric) };
  const [r, s, more] = rest as [never, never, Real | Complex | undefined];
  const exact = L.at(r, s);
  return { L, z: more ? exact.plus(more) : exact };
}

export function wpWorking(x: Real | Complex, L: Lattice, z: Complex): Derivation {
  const [w1, w2] = L.periods;
  const start = new Derivation("Value of $\\wp(z)$")
    .under("cubic", "periods", "fundamentalDomain")
    .step("the argument", { formula: "z", value: z, label: "argument" })
    .step("the lattice", { value: { ω1: plainNumber(w1), ω2: plainNumber(w2), τ: L.tau }, label: "lattice" });
  const reduced = L.reduced;
  const [v1] = reduced.periods;
  const { nearest, rest } = near(L, z);
  const terms = series(rest.div(plainNumber(v1)), reduced.tau);
  const factor = Complex.from(π).times(2).times(i).div(plainNumber(v1)).pow(2);
  const total = terms.reduce<Complex>((sum, term) => sum.plus(term), Complex.from(0));
  return reductionSteps(start, L)
    .step(`the argument moved next to 0 by the lattice point $\\omega$ = ${nearest.name}`, {
      formula: "z - \\omega",
      value: plainNumber(rest),
      label: "moved",
    })
    .step(
      "with $u = \\exp(2\\pi i z/\\omega_1')$ and $q = \\exp(2\\pi i \\tau')$, terms of the q-expansion of $\\wp$ over $(2\\pi i/\\omega_1')^2$",
      {
        formula:
          "\\frac{1}{12} + \\frac{u}{(1-u)^2} + \\sum_{n \\ge 1} \\left( \\frac{q^n u}{(1 - q^n u)^2} + \\frac{q^n/u}{(1 - q^n/u)^2} - \\frac{2 q^n}{(1 - q^n)^2} \\right)",
        source: SERIES,
        label: "series",
      },
    )
    .step("its terms, the two before the sum together as number 0", {
      value: table(
        terms.slice(0, shownTerms(L) + 1).map((term, n) => [n, term]),
        { columns: ["$n$", "term"], digits: Math.min(20, provedDigits()) },
      ),
      label: "terms",
    })
    .step("the value", {
      formula: numberWorking(x).steps.at(-1)?.formula ?? "\\wp(z)",
      value: x,
      check: standingOf(factor.times(total), "=", x),
      route:
        "the q-expansion against the theta functions that the value comes from; its tail is below the digits shown",
      label: "value",
    });
}

function near(L: Lattice, z: Complex) {
  if (z instanceof TorusPoint && !z.remainder) {
    const nearest = L.locate(plainNumber(z)).nearest;
    return { nearest, rest: z.minus(nearest) as Complex };
  }
  return L.locate(z);
}

function series(v: Complex, tau: Complex): Complex[] {
  const turn = Complex.from(π).times(2).times(i);
  const u = Complex.from(exp(turn.times(v)));
  const q = Complex.from(exp(turn.times(tau)));
  const pole = (w: Complex) => w.div(Complex.from(1).minus(w).pow(2));
  const terms = [pole(u).plus(Complex.from(1).div(12))];
  // The check repeats the comparison with twice the bits.
  const count = termsFor(tau, 2 * provedDigits() + 30);
  let power = q;
  for (let n = 1; n <= count; n++) {
    terms.push(
      pole(power.times(u))
        .plus(pole(power.div(u)))
        .minus(pole(power).times(2)),
    );
    power = power.times(q);
  }
  return terms;
}

/** |u| lies between |q|^(1/2) and |q|^(−1/2), so a term is below 6 |q|^(n − 1/2), and |q| <= exp(−π√3). */
function termsFor(tau: Complex, digits: number): number {
  const [, height] = tau.toDouble();
  return Math.ceil((digits * Math.LN10) / (2 * Math.PI * Math.max(height, 0.8))) + 1;
}

/** Those that reach the digits shown. */
function shownTerms(L: Lattice): number {
  return termsFor(L.reduced.tau, provedDigits() + 2);
}
