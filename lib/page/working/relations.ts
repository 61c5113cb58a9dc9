// Lattices in relation to each other, Jacobi's modulus, moved points of the half plane and recognised numbers as derivations.

import type { Recognition } from "../../number/recognise.ts";
import { π } from "../../number/symbols.ts";
import { Complex, type Real } from "../../number/values.ts";
import { carlson } from "../../surface/carlson.ts";
import { standingOf } from "../../surface/claim-parts.ts";
import type { Homothety } from "../../surface/homothety.ts";
import type { Jacobi } from "../../surface/jacobi.ts";
import type { Lattice } from "../../surface/lattice.ts";
import { modular } from "../../surface/modular.ts";
import type { Moved } from "../../surface/moved.ts";
import { Derivation } from "../derivation.ts";
import { exactly, jointly, legendreCheck, plainNumber } from "./parts.ts";
import { reductionSteps } from "./reduced.ts";

export function homothetyWorking({ from, to, factor, standing }: Homothety): Derivation {
  const [v1, v2] = from.reduced.periods.map(plainNumber) as [Complex, Complex];
  const [w1, w2] = to.reduced.periods.map(plainNumber) as [Complex, Complex];
  return new Derivation("Homothety of two lattices", { name: "homothety" })
    .under("periods", "fundamentalDomain", "j")
    .step("the lattices", {
      value: { Λ1: from, Λ2: to },
      check: jointly(legendreCheck(from).check, legendreCheck(to).check),
      route: legendreCheck(from).route,
      label: "lattices",
    })
    .step("lattices are homothetic if and only if their $j$ is the same", {
      value: { j1: from.j, j2: to.j },
      source: "Silverman AEC, VI.4.1.1",
      check: standing,
      route: "$j$ compared, or reduced $\\tau$ where both are exact",
      label: "j",
    })
    .step("their reduced bases have one $\\tau$", {
      value: { τ1: from.reduced.tau, τ2: to.reduced.tau },
      check: standingOf(from.reduced.tau, "=", to.reduced.tau),
      route: "the numbers, each from its own lattice",
      label: "tau",
    })
    .step("the factor that takes the first reduced basis to the second", {
      formula: "\\alpha = \\omega_1'(\\Lambda_2) / \\omega_1'(\\Lambda_1)",
      value: factor,
      check: jointly(standingOf(v1.times(factor), "=", w1), standingOf(v2.times(factor), "=", w2)),
      route: "both periods multiplied by it",
      label: "factor",
    });
}

/** A lattice made from another by coordinates: its basis, its index, then its reduced basis. */
export function relatedWorking(L: Lattice): Derivation {
  const { lattice: base, rows, index } = L.within!;
  const [w1, w2] = base.periods.map(plainNumber) as [Complex, Complex];
  const [v1, v2] = L.periods.map(plainNumber) as [Complex, Complex];
  const [[a, b], [c, d]] = rows;
  const larger = base.area.toDouble() > L.area.toDouble() * 1.000001;
  const start = new Derivation(larger ? "An overlattice" : "A sublattice", { name: "related-lattice" })
    .under("periods", "fundamentalDomain")
    .step("the lattice that it is made from", {
      value: { ω1: w1, ω2: w2 },
      ...legendreCheck(base),
      label: "base",
    })
    .step("its basis in coordinates of that one, Hermite's form of the points given", {
      value: rows.map((row) => [...row]),
      check: jointly(
        standingOf(w1.times(a).plus(w2.times(b)), "=", v1),
        standingOf(w1.times(c).plus(w2.times(d)), "=", v2),
      ),
      route: "the rows times the periods, in numbers",
      label: "coordinates",
    })
    .step(larger ? "the index of the first lattice in it" : "its index in the first lattice", {
      formula: larger ? "1/\\det" : "\\det",
      value: index,
      check: larger ? standingOf(base.area.div(L.area), "=", index) : standingOf(L.area.div(base.area), "=", index),
      route: "the ratio of the areas of the cells",
      label: "index",
    })
    .step("the periods", { value: { ω1: v1, ω2: v2, τ: L.tau }, ...legendreCheck(L), label: "periods" });
  return reductionSteps(start, L);
}

export function jacobiWorking(J: Jacobi): Derivation {
  const K = Complex.from(J.K);
  const K1 = Complex.from(J.K1);
  const [E, E1] = [Complex.from(J.E), Complex.from(J.E1)];
  return new Derivation("Modulus, quarter periods and nome", { name: "modulus" })
    .under("modulus", "nome")
    .step("the parameter and its complement", {
      value: { m: J.m, m1: J.m1 },
      check: standingOf(Complex.from(J.m).plus(J.m1), "=", 1),
      route: "$m + m_1 = 1$",
      label: "modulus",
    })
    .step("complete integrals $K(m)$ and $K(m_1)$ by arithmetic-geometric means, $K = \\pi/2M(1, \\sqrt{m_1})$", {
      value: { K: J.K, "K′": J.K1 },
      source: "DLMF 19.8.5",
      check: jointly(standingOf(carlson.RF(0, J.m1, 1), "=", K), standingOf(carlson.RF(0, J.m, 1), "=", K1)),
      route: "$R_F(0, m_1, 1)$ and $R_F(0, m, 1)$ by duplication",
      label: "periods",
    })
    .step("complete integrals of the second kind", {
      value: { E: J.E, "E′": J.E1 },
      check: standingOf(E.times(K1).plus(E1.times(K)).minus(K.times(K1)), "=", Complex.from(π).div(2)),
      route: "Legendre's relation $EK' + E'K - KK' = \\pi/2$",
      label: "second",
    })
    .step("$\\tau = iK'/K$ and the nome $q_\\theta = \\exp(\\pi i\\tau)$", {
      value: { τ: J.tau, qθ: J.qTheta },
      check: standingOf(modular.lambda(J.tau), "=", J.m),
      route: "$\\lambda(\\tau)$ by theta functions gives $m$ back",
      label: "nome",
    });
}

export function movedWorking(moved: Moved): Derivation {
  const { matrix, tau, factor } = moved;
  const [[a, b], [c, d]] = matrix;
  // The point before the move: the inverse matrix applied.
  const before = tau.times(d).minus(b).div(tau.times(-c).plus(a));
  const four = [modular.E(4, tau), Complex.from(factor).pow(4).times(modular.E(4, before))] as const;
  return new Derivation("A point of the upper half plane, moved", { name: "moved" })
    .under("fundamentalDomain", "j")
    .step("the matrix", {
      value: matrix,
      check: exactly(a * d - b * c === 1n, "its determinant is 1"),
      route: "$ad - bc$",
      label: "matrix",
    })
    .step("the point before", {
      formula: "\\tau",
      value: before,
      check: standingOf(before.times(c).plus(d), "=", factor),
      route: "$c\\tau + d$ computed from it",
      label: "before",
    })
    .step("the point moved", {
      formula: "\\frac{a\\tau + b}{c\\tau + d}",
      value: tau,
      check: standingOf(modular.j(before), "=", modular.j(tau)),
      route: "$j$ before and after",
      label: "moved",
    })
    .step("the factor of a form of weight 1", {
      formula: "c\\tau + d",
      value: factor,
      check: standingOf(four[0], "=", four[1]),
      route: "$E_4$ before and after, by the weight 4",
      label: "factor",
    });
}

export function recognitionWorking(found: Recognition, x: Real | Complex): Derivation {
  const { value, digits, spare, standing } = found;
  return new Derivation("A recognised number", { name: "recognition" })
    .step("the number", {
      value: x,
      check: standingOf(x, "=", x.digits(Math.min(digits, 40))),
      route: "computed again with other digits",
      label: "number",
    })
    .step("the number of least height in its enclosure", {
      value,
      check: standingOf(x, "=", value),
      route: "the enclosure of the difference, at more digits than the search had",
      source: "continued fractions for a rational number, lattice reduction for a quadratic one",
      label: "candidate",
    })
    .step(
      `${digits} decimal places agree, ${spare} more than chance explains; this is a conjecture: digits never prove an equality`,
      {
        check: standing,
        route: "the number of candidates in reach against the width of the enclosure",
        label: "evidence",
      },
    );
}
