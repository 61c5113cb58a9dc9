// A derivation as numbered lines. Longer values stand in a line of their own.

import { citedText } from "./citation.ts";
import type { Derivation, Step } from "./derivation.ts";
import { derivationHtml } from "./derivation-html.ts";
import { derivationLatex } from "./derivation-latex.ts";
import { checkHead, formulaTex, standingOf, summary } from "./derivation-parts.ts";
import { formulaText } from "./formula/write.ts";
import type { Kind, Show } from "./kind.ts";
import { plainFormulas } from "./plain-formula.ts";
import { isPlainNumber } from "./plain-number.ts";
import { standingTex, standingText } from "./standing.ts";
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
  prose: derivationLatex,
  html: derivationHtml,
  conventions: (derivation) => derivation.conventions,
  data: (derivation, show) => ({
    kind: "derivation",
    title: derivation.title,
    steps: derivation.steps.map((step) => ({
      text: step.text,
      ...(step.label ? { label: step.label } : {}),
      ...(step.source ? { source: step.source } : {}),
      value: step.value === undefined || step.trace ? null : show.data(step.value),
      check: step.check ? standingOf(step)!.kind : null,
    })),
  }),
};

function stepText(derivation: Derivation, step: Step, index: number, show: Show): string {
  const { level } = derivation;
  const head = `(${index + 1}) ${plainFormulas(citedText(derivation, step.text))}`;
  if (level === "outline") return head;
  const value = valueText(step, show);
  if (level === "steps") return [head, ...value].join("\n");
  const source = step.source ? [`    source: ${plainFormulas(step.source)}`] : [];
  const standing = standingOf(step);
  const check = standing
    ? [`    ${plainFormulas(citedText(derivation, checkHead(step)))}${standingText(standing)}`]
    : [];
  return [head, ...value, ...source, ...check].join("\n");
}

/** "formula = value" in lines of their own; a formula that does not go into a line is left out. */
function valueText(step: Step, show: Show): string[] {
  const { value } = step;
  const formula = step.formula === undefined ? undefined : formulaText(step.formula);
  if (value === undefined) return formula === undefined ? [] : [`    ${formula}`];
  const text = isPlainNumber(value) ? plainNumber(value) : show.text(value);
  const lines = text.split("\n");
  const joined =
    formula !== undefined && lines.length === 1 ? [`${formula} = ${text}`] : [...(formula ? [formula] : []), ...lines];
  return joined.map((line) => `    ${line}`);
}

/** A count, and the order of a point. */
function plainNumber(value: bigint | number): string {
  return value === Number.POSITIVE_INFINITY ? "∞" : String(value);
}

function stepRows(derivation: Derivation, step: Step, index: number, show: Show): string[][] {
  const { level } = derivation;
  const number = `(${index + 1})`;
  const words = texProse(citedText(derivation, step.text));
  if (level === "outline") return [[number, words]];
  const whole = formulaTex(step, show);
  const rows =
    whole === ""
      ? [[number, words]]
      : [
          [number, `${words}{:}`],
          ["", `\\displaystyle ${whole}`],
        ];
  if (level === "steps") return rows;
  const source = step.source ? [["", small(texProse(`source: ${step.source}`))]] : [];
  const standing = standingOf(step);
  const check = standing
    ? [["", small(`${texProse(citedText(derivation, checkHead(step)))}${standingTex(standing)}`)]]
    : [];
  return [...rows, ...source, ...check];
}
