// z with ℘(z) = w, and which of the solutions.

import { LOGARITHM, ROOT } from "../lattice/operations.ts";
import type { PeriodLattice } from "../lattice/period-lattice.ts";
import { apply, Complex, type ComplexNumeric, Real, scalar } from "../number/values.ts";
import { DomainError } from "../proof/errors.ts";

/** Which solution of ℘(z) = w is meant; none: ℘′(z) = −√(4w³ − g2 w − g3) by the principal root. */
export interface InverseChoice {
  /** The value of ℘′ there: one of the two roots of 4w³ − g2 w − g3 or an enclosure of it; any other number is refused. */
  readonly prime?: ComplexNumeric;
  /** The sign of ℘′ (of its imaginary part where ℘′ is imaginary), for real w on a real lattice. */
  readonly sign?: 1 | -1;
  /** Where ℘′ is real: the component of 0, z real, or the bounded one, z = ω2/2 + t; w has to lie over it. */
  readonly component?: "identity" | "bounded";
  /** The lines on which ℘ is real: "real" z = t or ω2/2 + t (℘′ real), "imaginary" z = it or ω1/2 + it (℘′ imaginary). */
  readonly line?: "real" | "imaginary";
}

/** @param root √(4w³ − g2 w − g3) as a function of the lattice gives it. */
export function inverseOfWp(
  lattice: PeriodLattice,
  w: ComplexNumeric,
  root: (x: Real | Complex) => Real | Complex,
  choice: InverseChoice,
  subject = "inverse",
): Complex {
  const x = scalar(w, subject);
  const principal = root(x);
  if (choice.prime !== undefined) {
    return Complex.from(apply(LOGARITHM, [lattice, x, ofTheTwo(scalar(choice.prime, subject), principal, x, subject)]));
  }
  const asked = choice.sign !== undefined || choice.component !== undefined || choice.line !== undefined;
  if (asked) checkChoice(lattice, x, principal, choice);
  const prime = choice.sign === 1 ? principal : principal.neg();
  return Complex.from(apply(LOGARITHM, [lattice, x, prime]));
}

/** Of ±root the one that `given` is; the root itself, so that a rough enclosure of ℘′ takes no digits from z. */
function ofTheTwo(given: Real | Complex, root: Real | Complex, x: Real | Complex, subject: string): Real | Complex {
  const other = root.neg();
  const chosen = overlap(given, root) ? root : other;
  if (overlap(given, chosen)) return chosen;
  throw new DomainError({
    subject,
    given: `℘′ = ${given} where ℘ = ${x}`,
    expected: `${root} or its negative, since ℘′² = 4℘³ − g2 ℘ − g3`,
    hint: "wp.inverse(w) without { prime } takes the negative of this root; the other solution is the negative of that one.",
    argument: "prime",
  });
}

function overlap(a: Real | Complex, b: Real | Complex): boolean {
  return Complex.from(a).overlaps(b);
}

function checkChoice(
  lattice: PeriodLattice,
  x: Real | Complex,
  prime: Real | Complex,
  { sign, component, line }: InverseChoice,
): void {
  if (sign !== undefined && sign !== 1 && sign !== -1) throw refused(`sign: ${sign}`, "1 or −1", "sign");
  if (component !== undefined && component !== "identity" && component !== "bounded") {
    throw refused(`component: "${component}"`, '"identity" or "bounded"', "component");
  }
  if (line !== undefined && line !== "real" && line !== "imaginary") {
    throw refused(`line: "${line}"`, '"real" or "imaginary"', "line");
  }
  if (!lattice.components || !(x instanceof Real)) {
    throw refused(
      lattice.components ? `w = ${x}` : "a lattice that is not its own conjugate",
      "a real w and a real lattice, for a sign, a component or a line",
      "w",
      "For others give { prime }.",
    );
  }
  const real = prime instanceof Real;
  const at = real ? "real" : "imaginary";
  if (line && line !== at) throw refused(`w = ${x}, where ℘′ is ${at}`, `a value on the ${line} line`, "w");
  if (!component) return;
  const here = real ? (overBounded(lattice, x) ? "bounded" : "identity") : undefined;
  if (here === component) return;
  const range = component === "identity" ? "w >= e1" : lattice.components === 2 ? "e3 <= w <= e2" : "two components";
  throw refused(`w = ${x}${here ? `, which lies over the ${here} component` : ", where ℘′ is not real"}`, range, "w");
}

/** Two components and a real ℘′: w <= e2, told from w >= e1 by their mean. */
function overBounded(lattice: PeriodLattice, x: Real): boolean {
  if (lattice.components === 1) return false;
  const roots = ([1, 2, 3] as const).map((index) => apply(ROOT, [lattice, index]) as Real);
  const [first, second] = roots.sort((p, q) => q.toDouble() - p.toDouble()) as [Real, Real, Real];
  return x.minus(first.plus(second).div(2)).sign() === -1;
}

function refused(given: string, expected: string, argument: string, hint = ""): DomainError {
  return new DomainError({ subject: "inverse", given, expected, hint, argument });
}
