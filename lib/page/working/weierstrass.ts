// A value of ℘ as a derivation: reduced τ, reduced argument, the q-series with its first terms.

import { WP_LAMBERT, WP_SERIES, wpTerms } from "../../function/wp-series.ts";
import { provedDigits } from "../../number/context.ts";
import { asDisc, type Operation } from "../../number/origin.ts";
import { Rational } from "../../number/rational.ts";
import { apply, type Complex, type Real } from "../../number/values.ts";
import { standingOf } from "../../surface/claim-parts.ts";
import type { Lattice } from "../../surface/lattice.ts";
import type { TorusPoint } from "../../surface/torus-point.ts";
import { Derivation } from "../derivation.ts";
import { table } from "../table.ts";
import { numberWorking } from "./number.ts";
import { legendreCheck, plainNumber } from "./parts.ts";
import { reductionSteps } from "./reduced.ts";
import { near, placeOf, scaleOf } from "./wp-expansion.ts";

const SERIES = "Silverman, Advanced Topics, I.6.2";

export function valueOfWp(x: Real | Complex) {
  return placeOf(x, "wp");
}

export function wpWorking(x: Real | Complex, L: Lattice, z: Complex): Derivation {
  const { nearest, rest } = near(L, z);
  const v1 = plainNumber(L.reduced.periods[0]);
  const v = plainNumber(rest).div(v1);
  const { tau } = L.reduced;
  const sum = apply(WP_SERIES, [v, tau]);
  const start = new Derivation("Value of $\\wp(z)$", { name: "wp" })
    .under("cubic", "periods", "fundamentalDomain")
    .step("the argument", {
      formula: "z",
      value: z,
      check: standingOf(plainNumber(rest), "≠", 0),
      route: "$z$ is no lattice point: its distance from the nearest one is not 0",
      label: "argument",
    })
    .step("the lattice", {
      value: { ω1: plainNumber(L.periods[0]), ω2: plainNumber(L.periods[1]), τ: L.tau },
      ...legendreCheck(L),
      label: "lattice",
    });
  return reductionSteps(start, L)
    .step(`the argument moved next to 0 by the lattice point $\\omega$ = ${nearest.name}`, {
      formula: "z - \\omega",
      value: plainNumber(rest),
      ...movedCheck(L, z, nearest, plainNumber(rest)),
      label: "moved",
    })
    .step(
      "with $u = \\exp(2\\pi i z/\\omega_1')$ and $q = \\exp(2\\pi i \\tau')$, the $q$-expansion of $\\wp$ over $(2\\pi i/\\omega_1')^2$",
      {
        formula:
          "\\frac{1}{12} + \\frac{u}{(1-u)^2} + \\sum_{n \\ge 1} \\left( \\frac{q^n u}{(1 - q^n u)^2} + \\frac{q^n/u}{(1 - q^n/u)^2} - \\frac{2 q^n}{(1 - q^n)^2} \\right)",
        source: SERIES,
        ...atHalfPeriod(L),
        label: "series",
      },
    )
    .step("its terms, the two before the sum together as number 0", {
      value: termTable(L, v, tau),
      trace: true,
      check: standingOf(sum, "=", apply(WP_LAMBERT, [v, tau])),
      route:
        "the sum against $\\frac{1}{12} + \\frac{u}{(1-u)^2} + \\sum \\frac{n q^n}{1 - q^n}(u^n + u^{-n} - 2)$, both tails enclosed",
      label: "terms",
    })
    .step("the value", {
      formula: numberWorking(x).steps.at(-1)?.formula ?? "\\wp(z)",
      value: x,
      check: standingOf(scaleOf(v1).times(sum), "=", x),
      route: "the $q$-expansion, its tail enclosed, against the theta functions that the value comes from",
      label: "value",
    });
}

/** z − ω by coordinates: r and s without their whole parts, times the periods. */
function movedCheck(L: Lattice, z: Complex, nearest: TorusPoint, rest: Complex) {
  const { r, s } = L.locate(plainNumber(z));
  const [m, n] = nearest.coordinates;
  const [w1, w2] = L.periods.map(plainNumber) as [Complex, Complex];
  return {
    check: standingOf(w1.times(r.minus(m)).plus(w2.times(s.minus(n))), "=", rest),
    route:
      "by the coordinates: $(r - m)\\omega_1 + (s - n)\\omega_2$ for $z = r\\omega_1 + s\\omega_2$, $\\omega = m\\omega_1 + n\\omega_2$",
  };
}

/** The expansion at half a period of the reduced basis is a root of the cubic, which is known without it. */
function atHalfPeriod(L: Lattice) {
  const v1 = plainNumber(L.reduced.periods[0]);
  const e = scaleOf(v1).times(apply(WP_SERIES, [Rational.of(1, 2), L.reduced.tau]));
  const [g2, g3] = L.invariants;
  const left = e.pow(3).times(4);
  return {
    check: standingOf(left, "=", e.times(g2).plus(g3)),
    route: "at $\\omega_1'/2$ its value is a root of $4x^3 - g_2x - g_3$",
  };
}

/** Those terms that reach the digits shown, with few digits. */
function termTable(L: Lattice, v: Complex, tau: Complex) {
  const [, height] = L.reduced.tau.toDouble();
  const count = Math.ceil(((provedDigits() + 2) * Math.LN10) / (2 * Math.PI * Math.max(height, 0.8))) + 1;
  // The place of a term is an operand, so that a term can be computed with as many digits as are shown.
  const rows = Array.from({ length: count + 1 }, (_, n) => [n, apply(TERM, [v, tau, n])]);
  return table(rows, { columns: ["$n$", "term"], digits: Math.min(20, provedDigits()) });
}

const TERM: Operation = {
  name: "term of the q-expansion",
  evaluate: ([v, tau, n], at, prec) => wpTerms(asDisc(at(v)), asDisc(at(tau)), n as number, prec + 20)[n as number]!,
};
