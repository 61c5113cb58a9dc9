// A derivation as running LaTeX for a paper: an enumeration whose items have labels, so that \ref finds them. It needs no package.

import { citedPieces } from "./citation.ts";
import { conventionProse } from "./convention.ts";
import { anchorOf, type Derivation, type Step } from "./derivation.ts";
import { checkHead, formulaParts, standingOf, summary } from "./derivation-parts.ts";
import type { Show } from "./kind.ts";
import { prose } from "./prose.ts";
import { standingProse } from "./standing.ts";
import { array } from "./tex.ts";

export function derivationLatex(derivation: Derivation, show: Show): string {
  const { title, steps, conventions } = derivation;
  const notes = [...summary(derivation).map((line) => `${line}.`), ...conventionProse(conventions)];
  return [
    `\\paragraph{${prose(title)}.}\\label{${anchorOf(derivation, undefined)}}`,
    "\\begin{enumerate}\\renewcommand{\\labelenumi}{(\\theenumi)}",
    ...steps.map((step, k) => itemLatex(derivation, step, k, show)),
    "\\end{enumerate}",
    ...(notes.length > 0 ? [`\\noindent{\\small ${notes.join("\\\\\n")}\\par}`] : []),
  ].join("\n");
}

function itemLatex(derivation: Derivation, step: Step, index: number, show: Show): string {
  const { level } = derivation;
  const head = `\\item\\label{${anchorOf(derivation, step.label ?? index + 1)}} ${wordsLatex(derivation, step.text)}`;
  if (level === "outline") return head;
  const whole = shownFormula(step, show);
  const formula = whole === "" ? "" : `:\n\\[ ${whole} \\]`;
  if (level === "steps") return `${head}${formula}`;
  const standing = standingOf(step);
  const source = step.source ? `Source: ${prose(step.source)}. ` : "";
  const check = standing
    ? `${wordsLatex(derivation, checkHead(step)).replace(/^c/, "C")}${standingProse(standing)}.`
    : "";
  const notes = source + check === "" ? "" : `\n{\\small ${source}${check}\\par}`;
  return `${head}${formula}${notes}`;
}

/** Digits from which on a value stands below its formula. */
const LONG_VALUE = 36;

function shownFormula(step: Step, show: Show): string {
  const parts = formulaParts(step, show);
  const digits = (parts[1] ?? "").replace(/\D/g, "").length;
  if (digits <= LONG_VALUE || (step.formula ?? "").length < 8) return parts.join(" ");
  return array(
    "l",
    parts.map((part) => [`\\displaystyle ${part.startsWith("=") ? "{}" : ""}${part}`]),
  );
}

function wordsLatex(derivation: Derivation, text: string): string {
  return citedPieces(derivation, text)
    .map((piece) => ("anchor" in piece ? `(\\ref{${piece.anchor}})` : prose(piece.text)))
    .join("");
}
