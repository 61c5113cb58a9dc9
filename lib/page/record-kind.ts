// Records that the library gives as answers, known by their shape: what a reader wants to see of them.

import type { Recognition } from "../number/recognise.ts";
import type { ThroughPoint } from "../surface/cubic.ts";
import type { DegenerateLattice } from "../surface/degenerate.ts";
import type { ReducedBasis } from "../surface/lattice.ts";
import { TorusPoint } from "../surface/torus-point.ts";
import type { PlaneCurve } from "../surface/variety.ts";
import type { Kind, Show } from "./kind.ts";
import { standingProse, standingText } from "./standing.ts";
import { array, texWords } from "./tex.ts";

const PLACE: Readonly<Record<ReducedBasis["boundary"], string>> = {
  inside: "inside the fundamental domain",
  on: "on the boundary of the fundamental domain, by an exact argument",
  undecided: "so near to the boundary of the fundamental domain that the enclosures allow both sides",
};

export function isReducedBasis(value: object): value is ReducedBasis {
  const { periods, matrix, boundary } = value as Partial<ReducedBasis>;
  return Array.isArray(periods) && periods[0] instanceof TorusPoint && Array.isArray(matrix) && boundary !== undefined;
}

export const reducedBasisKind: Kind<ReducedBasis> = {
  text: ({ periods, tau, matrix, boundary }, show) =>
    [
      "reduced basis",
      ...periods.map((w, k) => `  ω${k + 1}′ = ${show.text(w)}`),
      `  τ′ = ${show.text(tau)}, ${PLACE[boundary]}`,
      `  by the matrix ${show.text(matrix)} from the lattice's own`,
    ].join("\n"),
  tex: ({ periods, tau, matrix, boundary }, show) =>
    array("rcl", [
      ...periods.map((w, k) => [`\\omega_${k + 1}'`, "=", show.tex(w)]),
      ["\\tau'", "=", `${show.tex(tau)} \\quad \\text{${PLACE[boundary]}}`],
      ["M", "=", show.tex(matrix)],
    ]),
  conventions: ({ periods, tau }, show) => [...periods.flatMap((w) => show.conventions(w)), ...show.conventions(tau)],
  data: ({ periods, tau, matrix, boundary }, show) => ({
    periods: periods.map((w) => show.data(w)),
    tau: show.data(tau),
    matrix: matrix.map((row) => row.map((n) => show.data(n))),
    boundary,
  }),
};

/** A curve through a point: the model and the two maps. How they were found is for `working`. */
export const throughKind: Kind<ThroughPoint<PlaneCurve>> = {
  text: ({ curve, to, from }, show) =>
    [`curve: ${show.text(curve)}`, `to: ${show.text(to)}`, `from: ${show.text(from)}`].join("\n"),
  tex: ({ curve, to, from }, show) => array("l", [[show.tex(curve)], [show.tex(to)], [show.tex(from)]]),
  data: ({ curve, to, from }, show) => ({
    kind: "curve through a point",
    curve: show.data(curve),
    to: show.data(to),
    from: show.data(from),
  }),
};

export const recognitionKind: Kind<Recognition> = {
  text: ({ value, standing }, show) => `${show.text(value)}   ${standingText(standing)}`,
  tex: ({ value }, show) => show.tex(value),
  prose: ({ value, standing }, show) => `$\\displaystyle ${show.tex(value)}$ — ${standingProse(standing)}`,
  short: ({ value }, part) => ({
    text: `the recognised ${part.text(value)}`,
    tex: `\\text{the recognised }${part.tex(value)}`,
  }),
  cell: ({ value }, show) => show.cell(value),
  data: ({ value, standing }, show) => ({ kind: "recognised", value: show.data(value), standing: standing.kind }),
};

export const degenerateKind: Kind<DegenerateLattice> = {
  text: (lattice) => String(lattice),
  tex: (lattice) => texWords(String(lattice)),
  prose: (lattice, show) => sentence(lattice, show),
  data: (lattice, show) => ({ kind: "degenerate lattice", doubleRoot: show.data(lattice.doubleRoot) }),
};

function sentence({ doubleRoot, kind }: DegenerateLattice, show: Show): string {
  const d = `$d = ${show.tex(doubleRoot)}$`;
  switch (kind) {
    case "rational":
      return "a triple root 0: $\\wp(z) = 1/z^2$, no period";
    case "hyperbolic":
      return `a double root ${d} $> 0$: $\\wp(z) = d + 3d/\\sinh^2(\\sqrt{3d}\\, z)$, one imaginary period; the real one is infinite`;
    default:
      return `a double root ${d}: $\\wp(z) = d + \\kappa^2/\\sin^2(\\kappa z)$ with $\\kappa^2 = -3d$, ${
        kind === "trigonometric"
          ? "one real period $\\pi/\\kappa$; the imaginary one is infinite"
          : "one period $\\pi/\\kappa$"
      }`;
  }
}
