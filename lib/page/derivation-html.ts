// A derivation as HTML: every step folds by itself, without a script, and its source and check fold inside it. The level says
// what stands open at first. Links and citations find each step by its anchor.

import { citedPieces } from "./citation.ts";
import { conventionHtml } from "./convention.ts";
import { anchorOf, type Derivation, type Step } from "./derivation.ts";
import { checkHead, formulaParts, standingOf, summary } from "./derivation-parts.ts";
import { escapeHtml } from "./html.ts";
import type { Show } from "./kind.ts";
import { prose } from "./prose.ts";
import { standingHead, standingProse } from "./standing.ts";
import { Table } from "./table.ts";
import { tableHtml } from "./table-html.ts";

const STYLE = {
  title: "margin:.4em 0 .5em;font-weight:600",
  list: "list-style:none;margin:0;padding:0",
  item: "margin:0 0 .55em;padding:0",
  words: "cursor:pointer;padding-left:0",
  value: "margin:.35em 0 .35em 2.6em;overflow-x:auto;overflow-y:hidden",
  notes: "margin:.15em 0 .3em 2.6em;font-size:.88em",
  note: "margin:.1em 0 .1em 1.2em",
  sum: "margin:.5em 0 .2em;font-size:.88em",
} as const;

export function derivationHtml(derivation: Derivation, show: Show): string {
  const { title, steps, conventions } = derivation;
  const items = steps.map((step, k) => itemHtml(derivation, step, k, show));
  const sum = summary(derivation).map((line) => `<p style="${STYLE.sum}">${escapeHtml(line)}.</p>`);
  return [
    `<section id="${anchorOf(derivation, undefined)}" aria-label="derivation">`,
    `<p style="${STYLE.title}">${escapeHtml(title)}</p>`,
    `<ol style="${STYLE.list}">${items.join("")}</ol>`,
    ...sum,
    conventionHtml(conventions),
    "</section>",
  ].join("");
}

function itemHtml(derivation: Derivation, step: Step, index: number, show: Show): string {
  const id = anchorOf(derivation, step.label ?? index + 1);
  const head = `<span style="display:inline-block;min-width:2em">(${index + 1})</span> ${wordsHtml(derivation, step.text)}`;
  const body = `${valueHtml(step, show)}${notesHtml(derivation, step)}`;
  if (body === "") return `<li id="${id}" style="${STYLE.item}">${head}</li>`;
  const open = derivation.level === "outline" ? "" : " open";
  return `<li id="${id}" style="${STYLE.item}"><details${open}><summary style="${STYLE.words}">${head}</summary>${body}</details></li>`;
}

/** A table stands below the formula, other values go on in it. */
function valueHtml(step: Step, show: Show): string {
  const html = step.value instanceof Table ? tableHtml(step.value, show) : undefined;
  if (html === undefined) {
    const parts = formulaParts(step, show);
    return parts.length === 0 ? "" : formulaHtml(...parts);
  }
  return `${step.formula ? formulaHtml(step.formula) : ""}<div style="${STYLE.value}">${html}</div>`;
}

/** Between the parts a line may be broken. */
function formulaHtml(...parts: readonly string[]): string {
  const formulas = parts.map((tex) => `$\\displaystyle ${tex.startsWith("=") ? "{}" : ""}${escapeHtml(tex)}$`);
  return `<div style="${STYLE.value}">${formulas.join(" ")}</div>`;
}

/** Source and check, folded under the standing in a word. */
function notesHtml(derivation: Derivation, step: Step): string {
  const standing = standingOf(step);
  if (!standing && !step.source) return "";
  const open = derivation.level === "all" ? " open" : "";
  const heads = [step.source ? "source" : "", standing ? `check: ${standingHead(standing)}` : ""].filter(Boolean);
  const source = step.source ? [`source: ${escapeHtml(step.source)}`] : [];
  const check = standing ? [`${wordsHtml(derivation, checkHead(step))}${escapeHtml(standingProse(standing))}`] : [];
  const notes = [...source, ...check].map((line) => `<p style="${STYLE.note}">${line}</p>`);
  return `<details${open} style="${STYLE.notes}"><summary style="cursor:pointer">${escapeHtml(heads.join("; "))}</summary>${notes.join("")}</details>`;
}

function wordsHtml(derivation: Derivation, text: string): string {
  return citedPieces(derivation, text)
    .map((piece) =>
      "anchor" in piece ? `<a href="#${piece.anchor}">${piece.number}</a>` : escapeHtml(prose(piece.text)),
    )
    .join("");
}
