// The period lattice of a cubic as a derivation: roots, arithmetic-geometric means, the canonical basis, the reduced one.

import { Rational } from "../../number/rational.ts";
import { i, π } from "../../number/symbols.ts";
import { Complex, Real } from "../../number/values.ts";
import { behind } from "../../surface/behind.ts";
import { carlson } from "../../surface/carlson.ts";
import { standingOf } from "../../surface/claim-parts.ts";
import type { Curve } from "../../surface/curve.ts";
import type { Lattice } from "../../surface/lattice.ts";
import { curve } from "../../surface/make-curve.ts";
import { lattice } from "../../surface/make-lattice.ts";
import { modular } from "../../surface/modular.ts";
import { Derivation } from "../derivation.ts";
import { mean } from "./mean.ts";
import { curveCheck, exactly, jointly, legendreCheck, plainNumber } from "./parts.ts";
import { reductionSteps } from "./reduced.ts";

const COHEN = "Cohen, A Course in Computational Algebraic Number Theory, 7.4";
const DLMF_CUBIC = "DLMF 23.3(i)";

export function latticeWorking(L: Lattice): Derivation {
  const cubic = L.data.given.kind === "invariants";
  const start = new Derivation("Period lattice", { name: "lattice" }).under(
    ...L.conventions,
    "roots",
    "fundamentalDomain",
  );
  const begun = cubic ? periodsOf(invariants(start, L), L) : given(start, L);
  return reductionSteps(chosen(begun, L), L);
}

function invariants(working: Derivation, L: Lattice): Derivation {
  const E = behind(L)?.curve;
  const [g2, g3] = L.invariants;
  const start = E
    ? working.step("the curve", { value: E, ...curveCheck(E), label: "curve" }).step("its invariants", {
        value: { c4: E.c4, c6: E.c6 },
        source: "Silverman AEC, III.1",
        ...modelCheck(E),
        label: "invariants",
      })
    : working;
  const [e1, e2, e3] = L.roots;
  const gaps = [e1.minus(e2), e2.minus(e3), e1.minus(e3)] as const;
  const product = gaps.reduce<Real | Complex>((p, d) => p.times(d.pow(2)), Real.from(16));
  return start
    .step(`the cubic $4x^3 - g_2 x - g_3$${E ? " with $g_2 = c_4/12$ and $g_3 = c_6/216$" : ""}`, {
      value: { g2, g3 },
      check: jointly(
        standingOf(symmetric(e1, e2, e3), "=", g2),
        standingOf(Complex.from(e1).times(e2).times(e3).times(4), "=", g3),
      ),
      route: "$g_2 = 2(e_1^2 + e_2^2 + e_3^2)$ and $g_3 = 4 e_1 e_2 e_3$ from the roots below",
      label: "cubic",
    })
    .step("its discriminant $g_2^3 - 27 g_3^2$", {
      value: L.discriminant,
      ...(E
        ? { check: standingOf(L.discriminant, "=", E.discriminant), route: "the discriminant of the curve" }
        : {
            check: standingOf(byEta(L), "=", L.discriminant),
            route: "$(2\\pi/\\omega_1')^{12} \\eta(\\tau')^{24}$ from the reduced basis below",
          }),
      label: "discriminant",
    })
    .step(`its roots${realWords(L)}`, {
      value: { e1, e2, e3 },
      source: DLMF_CUBIC,
      check: standingOf(product, "=", L.discriminant),
      route: "$16 (e_1 - e_2)^2 (e_2 - e_3)^2 (e_1 - e_3)^2$ against the discriminant",
      label: "roots",
    });
}

/** 2(e1² + e2² + e3²) */
function symmetric(e1: Real | Complex, e2: Real | Complex, e3: Real | Complex): Complex {
  return [e1, e2, e3].reduce<Complex>((sum, e) => sum.plus(e.pow(2)), Complex.from(0)).times(2);
}

/** c4 and c6 from the model without a1, a2, a3 that b2, b4, b6 give: y² = x³ − 27c4 x − 54c6. */
function modelCheck(E: Curve) {
  const short = curve({ a: [0, 0, 0, E.c4.times(-27), E.c6.times(-54)] });
  const six = Rational.of(6);
  return {
    check: exactly(
      short.c4.equals(E.c4.times(six.pow(4))) && short.c6.equals(E.c6.times(six.pow(6))) && short.j.equals(E.j),
      "y^2 = x^3 - 27 c4 x - 54 c6 has 6^4 c4, 6^6 c6 and the same j",
    ),
    route: "the short model made of them",
  };
}

/** Δ by Dedekind's η at the reduced τ. */
function byEta(L: Lattice): Complex {
  const { tau, periods } = L.reduced;
  const factor = Complex.from(π).times(2).div(plainNumber(periods[0])).pow(12);
  return factor.times(Complex.from(modular.eta(tau)).pow(24));
}

function realWords(L: Lattice): string {
  if (L.realComponents === 2) return ": the discriminant is positive, all three are real, $e_1 > e_2 > e_3$";
  return L.realComponents === 1 ? ": the discriminant is negative, $e_1$ is the real one" : "";
}

function periodsOf(working: Derivation, L: Lattice): Derivation {
  if (!L.realComponents) return complexPeriods(working, L);
  const [e1, e2, e3] = L.roots;
  const [w1, w2] = L.periods;
  const [first, second] = L.realComponents === 2 ? twoComponents(L) : oneComponent(L);
  const half = L.realComponents === 2 ? Rational.zero : Rational.of(1, 2);
  // Carlson's integral by duplication: no mean is used.
  const integral = Complex.from(carlson.RF(0, e1.minus(e2), e1.minus(e3))).times(2);
  const height =
    L.realComponents === 2
      ? carlson.RF(0, e1.minus(e3), e2.minus(e3)).times(2)
      : carlson.RF(0, e2.minus(e1), e3.minus(e1));
  const upright = Complex.from(height).times(i);
  return working
    .step(`the real period by an arithmetic-geometric mean, ${first.words}`, {
      ...mean(first),
      source: COHEN,
      label: "agm1",
    })
    .step("the least positive real period", {
      formula: first.formula,
      value: plainNumber(w1),
      check: standingOf(w1, "=", integral),
      route: "$2 R_F(0, e_1 - e_2, e_1 - e_3)$ by duplication",
      label: "omega1",
    })
    .step(`the height of the cell by a second mean, ${second.words}`, {
      ...mean(second),
      source: COHEN,
      label: "agm2",
    })
    .step("the second period", {
      formula: second.formula,
      value: plainNumber(w2),
      check: standingOf(w2.minus(w1.times(half)), "=", upright),
      route:
        L.realComponents === 2
          ? "$2i R_F(0, e_1 - e_3, e_2 - e_3)$ by duplication"
          : "$\\omega_2 - \\omega_1/2$ is $i R_F(0, e_2 - e_1, e_3 - e_1)$, by duplication",
      label: "omega2",
    });
}

interface Mean {
  readonly words: string;
  readonly formula: string;
  readonly a: Real;
  readonly b: Real;
}

function twoComponents(L: Lattice): readonly [Mean, Mean] {
  const [e1, e2, e3] = L.roots as readonly [Real, Real, Real];
  const wide = e1.minus(e3).sqrt();
  return [
    {
      words: "$a_0 = \\sqrt{e_1 - e_3}$, $b_0 = \\sqrt{e_1 - e_2}$",
      formula: "\\omega_1 = \\frac{\\pi}{M(\\sqrt{e_1 - e_3}, \\sqrt{e_1 - e_2})}",
      a: wide,
      b: e1.minus(e2).sqrt(),
    },
    {
      words: "$a_0 = \\sqrt{e_1 - e_3}$, $b_0 = \\sqrt{e_2 - e_3}$",
      formula: "\\omega_2 = \\frac{i \\pi}{M(\\sqrt{e_1 - e_3}, \\sqrt{e_2 - e_3})}",
      a: wide,
      b: e2.minus(e3).sqrt(),
    },
  ];
}

function oneComponent(L: Lattice): readonly [Mean, Mean] {
  const e1 = L.roots[0] as Real;
  const [g2] = L.invariants as readonly [Real, Real];
  const b = e1.pow(2).times(3).minus(g2.div(4)).sqrt();
  const [twice, triple] = [b.times(2), e1.times(3)];
  const a = b.sqrt().times(2);
  const named = "$a_0 = 2\\sqrt{b}$";
  return [
    {
      words: `${named}, $b_0 = \\sqrt{2b + 3e_1}$ with $b^2 = 3e_1^2 - g_2/4$`,
      formula: "\\omega_1 = \\frac{2\\pi}{M(2\\sqrt{b}, \\sqrt{2b + 3e_1})}",
      a,
      b: twice.plus(triple).sqrt(),
    },
    {
      words: `${named}, $b_0 = \\sqrt{2b - 3e_1}$`,
      formula: "\\omega_2 = \\frac{\\omega_1}{2} + \\frac{i \\pi}{M(2\\sqrt{b}, \\sqrt{2b - 3e_1})}",
      a,
      b: twice.minus(triple).sqrt(),
    },
  ];
}

function complexPeriods(working: Derivation, L: Lattice): Derivation {
  const [w1, w2] = L.periods;
  return working.step("the periods by complex arithmetic-geometric means with the right choice of each root", {
    value: { ω1: plainNumber(w1), ω2: plainNumber(w2) },
    source:
      "Cremona and Thongjunthug, The complex AGM, periods of elliptic curves over C and complex elliptic logarithms, J. Number Theory 133 (2013)",
    ...byEisenstein(L),
    label: "periods",
  });
}

/** g2 or g3 from the periods by q-series, which know nothing of the roots. */
function byEisenstein(L: Lattice) {
  // As plain numbers: points of the torus would lead back to the invariants.
  const [w1, w2] = L.periods.map(plainNumber) as [Complex, Complex];
  const back = lattice({ periods: [w1, w2] });
  const k = String(L.invariants[0]) === "0" ? 1 : 0;
  return {
    check: standingOf(back.invariants[k], "=", L.invariants[k]),
    route: `$g_${k + 2}$ from the periods by Eisenstein series`,
  };
}

function given(working: Derivation, L: Lattice): Derivation {
  const [w1, w2] = L.periods;
  return working.step("the periods that were given", {
    value: { ω1: plainNumber(w1), ω2: plainNumber(w2) },
    ...legendreCheck(L),
    label: "periods",
  });
}

function chosen(working: Derivation, L: Lattice): Derivation {
  const [w1, w2] = L.periods;
  const cubic = L.data.given.kind === "invariants";
  const rule = !cubic
    ? "full periods, $\\operatorname{Im} \\omega_2/\\omega_1 > 0$"
    : L.realComponents
      ? `the real basis: $\\omega_1 > 0$ least, $\\operatorname{Re} \\omega_2 = ${L.realComponents === 2 ? "0" : "\\omega_1/2"}$`
      : "for a lattice that is not real, $\\operatorname{Re} \\omega_1 > 0$ or $\\omega_1/i > 0$";
  return working.step(`the basis by the conventions of edition 1: ${rule}`, {
    value: { ω1: plainNumber(w1), ω2: plainNumber(w2), τ: L.tau },
    ...(cubic ? byEisenstein(L) : orientation(L)),
    label: "basis",
  });
}

/** Given periods: the basis is oriented, since the cell has a positive area. */
function orientation(L: Lattice) {
  const [w1, w2] = L.periods.map(plainNumber) as [Complex, Complex];
  return {
    check: standingOf(0, "<", w1.conj().times(w2).im),
    route: "$\\operatorname{Im} \\overline{\\omega_1}\\omega_2 > 0$, the area of the cell",
  };
}
