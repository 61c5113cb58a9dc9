// One output of a cell as HTML: of the representations in its bundle, the one that prints best.
import type { Bundle, Output } from "../format.ts";
import { decodeEntities, escapeHtml } from "./escape.ts";
import { markdownHtml } from "./markdown.ts";
import { joined, mathml, splitFormulas } from "./mathematics.ts";
import { sanitise } from "./sanitise.ts";
import { plainText } from "./terminal.ts";

type Renderer = (value: string, place: Place) => string;

/** Where an output stands: its name is unique in the page, its label tells a reader. */
export interface Place {
  readonly name: string;
  readonly label: string;
}

/** In order of preference: pictures and tables before formulas, formulas before plain text. */
const RENDERERS: readonly (readonly [mime: string, render: Renderer])[] = [
  ["image/svg+xml", (svg, place) => figure(svg, place)],
  ["text/html", (html, { name }) => `<div class="shown${isWide(html) ? " wide" : ""}">${fragment(html, name)}</div>`],
  ["text/latex", (tex) => latexHtml(tex)],
  ["text/markdown", (markdown) => `<div class="prose">${markdownHtml(markdown)}</div>`],
  ["image/png", (data, { label }) => picture("image/png", data, label)],
  ["image/jpeg", (data, { label }) => picture("image/jpeg", data, label)],
  ["text/plain", (text) => `<pre class="shown">${escapeHtml(plainText(text))}</pre>`],
];

/** HTML of an output; empty if it has no representation that a page can show. */
export function outputHtml(output: Output, place: Place): string {
  switch (output.output_type) {
    case "stream":
      return `<pre class="said ${output.name}">${escapeHtml(plainText(output.text).replace(/\n+$/, ""))}</pre>`;
    case "error":
      return errorHtml(output.ename, output.evalue, output.traceback);
    default:
      return bundleHtml(output.data, place);
  }
}

function bundleHtml(data: Bundle, place: Place): string {
  for (const [mime, render] of RENDERERS) {
    const value = data[mime];
    if (typeof value === "string" && value !== "") return render(value, place);
  }
  return "";
}

function errorHtml(ename: string, evalue: string, traceback: readonly string[]): string {
  const text = plainText(traceback.length > 0 ? traceback.join("\n") : `${ename}: ${evalue}`);
  return `<div class="failure" role="note" aria-label="this cell failed"><pre>${escapeHtml(text)}</pre></div>`;
}

function figure(svg: string, { name, label }: Place): string {
  const drawing = sanitise(svg, { idPrefix: `${name}-` });
  const named = /<title\b|aria-label/.test(drawing);
  const labelled = named
    ? drawing
    : drawing.replace(/^<svg\b/, `<svg role="img" aria-label="figure, ${escapeHtml(label)}"`);
  return `<figure>${labelled}</figure>`;
}

function picture(mime: string, base64: string, label: string): string {
  if (!/^[\w+/=\s]+$/.test(base64)) return "";
  return `<figure><img src="data:${mime};base64,${base64.replace(/\s/g, "")}" alt="picture, ${escapeHtml(label)}"></figure>`;
}

/** HTML of a value: cleaned, its formulas typeset, its header cells told apart. */
function fragment(html: string, name: string): string {
  const text = (run: string) => runHtml(decodeEntities(run));
  return sanitise(html, { idPrefix: `${name}-`, text });
}

/** Characters in a row of a table from which on it is set smaller, so that it fits a printed line. */
const WIDE_ROW = 96;

/** Has it a row so long as two numbers of fifty digits? */
function isWide(html: string): boolean {
  // Tags take no room, and neither do the commands and braces of a formula.
  return html.split(/<tr\b/i).some((row) => row.replace(/<[^>]*>|\\[a-zA-Z]+|[{}$]/g, "").length > WIDE_ROW);
}

/** LaTeX as an output: formulas in delimiters, set apart or in a sentence, or one bare formula. */
function latexHtml(tex: string): string {
  const pieces = splitFormulas(tex.trim());
  if (!pieces.some((piece) => piece.kind === "formula")) return `<div class="shown">${mathml(tex, true)}</div>`;
  const isSentence = pieces.some((piece) => piece.kind === "text" && piece.text.trim() !== "");
  return `<div class="${isSentence ? "stated" : "shown"}">${runHtml(tex)}</div>`;
}

function runHtml(text: string): string {
  return splitFormulas(text).reduceRight((rest, piece) => {
    if (piece.kind === "text") return escapeHtml(piece.text) + rest;
    const formula = mathml(piece.tex, piece.display);
    return piece.display ? formula + rest : joined(formula, rest);
  }, "");
}
