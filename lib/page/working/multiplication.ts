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
import { exactly } from "./parts.ts";

const SOURCE = "common practice; Cox, Primes of the Form x² + ny², §7 and §10";

export function multiplicationWorking(answer: ComplexMultiplication, L: Lattice): Derivation {
  const { discriminant: D } = answer;
  const byTau = exactFormOf(L.data.given) !== undefined;
  const start = new Derivation("Complex multiplication of a lattice").under("periods", "j").step("the lattice", {
    value: L,
    label: "lattice",
  });
  const ground = byTau
    ? start.step(`$\\tau = \\omega_2/\\omega_1$: ${answer.reason}`, { value: L.tau, label: "tau" })
    : start.step("its invariant $j$", { formula: "j", value: L.j, label: "j" }).step(answer.reason, {
        check: answer.standing,
        label: "decision",
      });
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
      check: exactly(one, "b² − 4ac = D for each"),
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
