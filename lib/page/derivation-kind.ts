// A derivation as numbered lines. Longer values stand in a line of their own.

import { weakest } from "../proof/standing.ts";
import { Claim } from "../surface/claim-value.ts";
import type { Derivation, Step } from "./derivation.ts";
import type { Kind, Show } from "./kind.ts";
import { plainFormulas } from "./plain-formula.ts";
import { standingHead, standingTex, standingText } from "./standing.ts";
import { array, small, texProse, texWords } from "./tex.ts";

export const derivationKind: Kind<Derivation> = {
  text: (derivation, show) =>
    [plainFormulas(derivation.title), ...derivation.steps.map((step, k) => stepText(derivation, step, k, show))]
      .concat(summary(derivation))
      .join("\n"),
  tex: (derivation, show) => {
    const rows = derivation.steps.flatMap((step, k) => stepRows(derivation, step, k, show));
    const note = summary(derivation).map((line) => [small(texWords(line))]);
    return array("l", [[texProse(derivation.title)], [array("rl", rows)], ...note]);
  },
  conventions: (derivation) => derivation.conventions,
  data: (derivation, show) => ({
    kind: "derivation",
    title: derivation.title,
    steps: derivation.steps.map((step) => ({
      text: step.text,
      ...(step.label ? { label: step.label } : {}),
      value: step.value === undefined ? null : show.data(step.value),
      check: step.check ? standingOf(step).kind : null,
    })),
  }),
};

function standingOf({ check }: Step) {
  return check instanceof Claim ? check.standing : check!;
}

function stepText({ level }: Derivation, step: Step, index: number, show: Show): string {
  const head = `(${index + 1}) ${plainFormulas(step.text)}`;
  if (level === "outline") return head;
  const value = step.value === undefined ? [] : [`    ${show.text(step.value).replace(/\n/g, "\n    ")}`];
  if (level === "steps") return [head, ...value].join("\n");
  const source = step.source ? [`    source: ${plainFormulas(step.source)}`] : [];
  const check = step.check ? [`    ${plainFormulas(checkHead(step))}${standingText(standingOf(step))}`] : [];
  return [head, ...value, ...source, ...check].join("\n");
}

function stepRows({ level }: Derivation, step: Step, index: number, show: Show): string[][] {
  const number = `(${index + 1})`;
  const words = texProse(step.text);
  if (level === "outline") return [[number, words]];
  const formula = step.formula ? `{${step.formula}}` : "";
  const value = step.value === undefined ? "" : show.tex(step.value);
  const whole = formula && value ? `${formula} = ${value}` : formula || value;
  const rows =
    whole === ""
      ? [[number, words]]
      : [
          [number, `${words}{:}`],
          ["", `\\displaystyle ${whole}`],
        ];
  if (level === "steps") return rows;
  const source = step.source ? [["", small(texProse(`source: ${step.source}`))]] : [];
  const check = step.check ? [["", small(`${texProse(checkHead(step))}${standingTex(standingOf(step))}`)]] : [];
  return [...rows, ...source, ...check];
}

/** "check: " with the other way of computing, where one was taken. */
function checkHead({ route }: Step): string {
  return route ? `check: ${route}: ` : "check: ";
}

/** How the whole is known, if steps have checks. */
function summary(derivation: Derivation): string[] {
  const { checks, steps } = derivation;
  if (checks.length === 0) return [];
  return [`${checks.length} of ${steps.length} steps checked; together ${standingHead(weakest(checks))}`];
}
