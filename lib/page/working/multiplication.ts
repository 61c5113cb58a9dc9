// Complex multiplication as a derivation: the equation of τ, or j and the class polynomial, the reduced forms.

import { reducedForms } from "../../function/quadratic-forms.ts";
import { exactFormOf } from "../../lattice/exact-form.ts";
import { Complex, Real } from "../../number/values.ts";
import { standingOf } from "../../surface/claim-parts.ts";
import type { ComplexMultiplication } from "../../surface/complex-multiplication.ts";
import type { Lattice } from "../../surface/lattice.ts";
import { modular } from "../../surface/modular.ts";
import { Derivation } from "../derivation.ts";
import { table } from "../table.ts";
import { exactly, legendreCheck } from "./parts.ts";

const SOURCE = "Cox, Primes of the Form x² + ny², §7.B and §10";

export function multiplicationWorking(answer: ComplexMultiplication, L: Lattice): Derivation {
  const { discriminant: D } = answer;
  const byTau = exactFormOf(L.data.given) !== undefined;
  const start = new Derivation("Complex multiplication of a lattice", { name: "multiplication" })
    .under("periods", "j")
    .step("the lattice", {
      value: L,
      ...legendreCheck(L),
      label: "lattice",
    });
  const ground = byTau
    ? start.step(`$\\tau = \\omega_2/\\omega_1$: ${answer.reason}`, { value: L.tau, ...equationCheck(L), label: "tau" })
    : start
        .step("its invariant $j$", {
          formula: "j",
          value: L.j,
          check: standingOf(modular.j(L.reduced.tau), "=", L.j),
          route: "by the $q$-series at the reduced $\\tau$",
          label: "j",
        })
        .step(answer.reason, { ...decisionCheck(answer, L), label: "decision" });
  if (D === undefined) return ground;
  const forms = reducedForms(D).map((form) => Object.values(form) as bigint[]);
  const one = forms.every(([a, b, c]) => b! * b! - 4n * a! * c! === D);
  const conductor = answer.conductor!;
  return ground
    .step(
      "the discriminant $D = f^2 d$ of the order of all multiplications: conductor $f$, fundamental discriminant $d$",
      {
        value: { D: Number(D), f: Number(conductor), d: Number(D / conductor ** 2n) },
        check: multiplies(L, D),
        route: "j(τ) from the periods against j at the root of a reduced form of this discriminant",
        label: "discriminant",
      },
    )
    .step("the reduced forms $ax^2 + bxy + cy^2$ of this discriminant, one for each class", {
      value: table(forms, { columns: ["$a$", "$b$", "$c$"] }),
      source: SOURCE,
      check: exactly(
        one && forms.length === countForms(D),
        "b² − 4ac = D for each, and a plain search over |b| ≤ a ≤ c finds as many",
      ),
      route: "all triples with |b| ≤ a ≤ c tried",
      label: "forms",
    })
    .step("the class number, which is the degree of $j$", {
      formula: `h(${D})`,
      value: answer.classNumber ?? forms.length,
      check: exactly(
        modular.classPolynomial(D).coefficients.length === forms.length + 1,
        `the degree of the class polynomial of ${D}`,
      ),
      route: "from the class polynomial",
      label: "classnumber",
    });
}

/** The periods by which τ is known give the lattice of its j. */
function equationCheck(L: Lattice) {
  return {
    check: standingOf(modular.j(L.reduced.tau), "=", L.j),
    route: "$j(\\tau)$ by its $q$-series against $1728 g_2^3/\\Delta$ of the lattice",
  };
}

/** A yes by the class polynomial evaluated at the j of the q-series; a no repeats the exact test on the trace and norm of j. */
function decisionCheck(answer: ComplexMultiplication, L: Lattice) {
  if (answer.discriminant !== undefined && answer.outcome === "yes") {
    const { coefficients } = modular.classPolynomial(answer.discriminant);
    const j = modular.j(L.reduced.tau);
    const value = coefficients.reduce<Complex>((sum, c) => sum.times(j).plus(c), Complex.from(0));
    return {
      check: standingOf(value, "=", 0),
      route: "the class polynomial evaluated at the $j$ of the $q$-series",
    };
  }
  return { check: answer.standing, route: "the exact test on j; enclosures alone could not decide it" };
}

/** Primitive reduced forms by search: |b| <= a <= c, b >= 0 where |b| = a or a = c. */
function countForms(D: bigint): number {
  let count = 0;
  const n = Number(-D);
  for (let a = 1; 3 * a * a <= n; a++) {
    for (let b = -a; b <= a; b++) {
      if ((b * b + n) % (4 * a) !== 0) continue;
      const c = (b * b + n) / (4 * a);
      if (c < a || (b < 0 && (-b === a || a === c))) continue;
      if (divisor(divisor(a, Math.abs(b)), c) === 1) count++;
    }
  }
  return count;
}

function divisor(m: number, n: number): number {
  return n === 0 ? m : divisor(n, m % n);
}

/** τ is equivalent to the root of a reduced form: j agrees there. */
function multiplies(L: Lattice, D: bigint) {
  const { tau } = L.reduced;
  const forms = reducedForms(D).map((form) => Object.values(form) as bigint[]);
  const j = modular.j(tau);
  const roots = forms.map(([a, b]) => modular.j(rootOf(a!, b!, D)));
  const match = roots.find((root) => root.overlaps(j)) ?? roots[0]!;
  return standingOf(j, "=", match);
}

function rootOf(a: bigint, b: bigint, D: bigint) {
  return squareRoot(D)
    .minus(b)
    .div(2n * a);
}

function squareRoot(D: bigint) {
  return Complex.of(0, Real.from(-D).sqrt());
}
