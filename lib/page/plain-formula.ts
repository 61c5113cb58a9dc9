// Running text with $formulas$ as plain text or as HTML without a mathematics renderer.

import { formulaHtml, formulaText } from "./formula/write.ts";
import { escapeHtml } from "./html.ts";
import { splitFormulas } from "./tex.ts";

/** The text without dollar signs, its formulas readable: "$\\#E(\\mathbb{F}_p)$" is "#E(F_p)". */
export function plainFormulas(text: string): string {
  return text.replace(/\$([^$]*)\$/g, (_, formula: string) => formulaText(formula) ?? formula);
}

/** The same as HTML. A formula that does not go into a line keeps its dollar signs. */
export function htmlFormulas(text: string): string {
  return splitFormulas(text)
    .map((piece) =>
      piece.formula ? (formulaHtml(piece.text) ?? escapeHtml(`$${piece.text}$`)) : escapeHtml(piece.text),
    )
    .join("");
}
