// What the forms of a derivation share: the formula of a step, how it is known, how the whole is known.

import { weakest } from "../proof/standing.ts";
import { Claim } from "../surface/claim-value.ts";
import { TorusPoint } from "../surface/torus-point.ts";
import type { Derivation, Step } from "./derivation.ts";
import type { Show } from "./kind.ts";
import { standingHead } from "./standing.ts";

/** How a step is known, if it was checked. */
export function standingOf({ check }: Step) {
  return check instanceof Claim ? check.standing : check;
}

/** "formula = value"; either may be missing. */
export function formulaTex(step: Step, show: Show): string {
  return formulaParts(step, show).join(" ");
}

/** The same in the two parts between which a line may be broken. */
export function formulaParts(step: Step, show: Show): string[] {
  const formula = step.formula ? `{${step.formula}}` : "";
  const value = step.value === undefined ? "" : valueTex(step, show);
  if (formula && value) return [formula, `= ${value}`];
  return [formula || value].filter((part) => part !== "");
}

/** The name of a point of the torus is not said twice, where the formula begins or ends with it. */
function valueTex({ formula, value }: Step, show: Show): string {
  const tex = show.tex(value);
  if (!formula || !(value instanceof TorusPoint)) return tex;
  const [whole = "", name = ""] = /^(.+?) = (?=-?[\d.])/.exec(tex) ?? [];
  return name !== "" && (formula.startsWith(name) || formula.endsWith(name)) ? tex.slice(whole.length) : tex;
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
