// What the forms of a derivation share: the formula of a step, how it is known, how the whole is known.

import { weakest } from "../proof/standing.ts";
import { Claim } from "../surface/claim-value.ts";
import type { Derivation, Step } from "./derivation.ts";
import type { Show } from "./kind.ts";
import { standingHead } from "./standing.ts";

/** How a step is known, if it was checked. */
export function standingOf({ check }: Step) {
  return check instanceof Claim ? check.standing : check;
}

/** "formula = value"; either may be missing. */
export function formulaTex(step: Step, show: Show): string {
  const formula = step.formula ? `{${step.formula}}` : "";
  const value = step.value === undefined ? "" : show.tex(step.value);
  return formula && value ? `${formula} = ${value}` : formula || value;
}

/** "check: " with the other way of computing, where one was taken. */
export function checkHead({ route }: Step): string {
  return route ? `check: ${route}: ` : "check: ";
}

/** How the whole is known, if steps have checks. */
export function summary(derivation: Derivation): string[] {
  const { checks, steps } = derivation;
  if (checks.length === 0) return [];
  return [`${checks.length} of ${steps.length} steps checked; together ${standingHead(weakest(checks))}`];
}
