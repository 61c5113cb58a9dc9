// Running text for text/latex: words stand as they are, where a reader of HTML and one of TeX see the same; everything else
// becomes a formula.

import { splitFormulas, texWords } from "./tex.ts";

/** Characters that mean themselves in HTML and in TeX. */
const SAFE = /^[A-Za-z0-9 ,.;:()'!?/+=@*[\]—-]*$/;

/** Text, which may hold $formulas$, as running text with every other special character in a formula. */
export function prose(text: string): string {
  return splitFormulas(text)
    .map((piece) => (piece.formula ? `$${piece.text}$` : words(piece.text)))
    .join("");
}

function words(text: string): string {
  return text
    .replace(/\p{Cc}+/gu, " ")
    .split(/( +)/)
    .map((word) => (SAFE.test(word) && !SYMBOL.test(word) ? word : special(word)))
    .join("");
}

/** b2, c4, g2 and the like, a variable, a minus sign, or a number with its sign; alone or with punctuation around. */
const SYMBOL = /^[([]*(?:[abceg]\d′*|[b-z]|-\d*)[.,;:)\]]*$/;

/** A word with its opening brackets and closing punctuation left outside the formula. */
function special(word: string): string {
  const [, before = "", core = "", after = ""] = /^([([]*)(.*?)([.,;:)\]]*)$/u.exec(word) ?? [];
  return `${before}$${wordTex(core)}$${after}`;
}

/** A word with special characters: x^3, 10^-5 and 4*x are read as powers and products, others are set as words. */
function wordTex(word: string): string {
  const [, sign, prime] = /^(#?)E\(F_(\w+)\)?$/.exec(word) ?? [];
  if (prime !== undefined) return `${sign ? "\\#" : ""}E(\\mathbb{F}_{${prime}})`;
  const [, field] = /^F_(\w+)$/.exec(word) ?? [];
  if (field !== undefined) return `\\mathbb{F}_{${field}}`;
  const [, letter, index, marks] = /^([abceg])(\d)(′*)$/.exec(word) ?? [];
  if (letter !== undefined) return `${letter}_{${index}}${"'".repeat(marks?.length ?? 0)}`;
  if (/^(?:[b-z]|-\d*)$/.test(word)) return word;
  if (!FORMULA.test(word) || !/\^|_\d/.test(word) || /\^(?![-\w])|_(?!\d)/.test(word)) return texWords(word);
  return word
    .replace(/(?<![\p{L}\d])([a-z])(\d+)(?=\^)/giu, "$1_{$2}")
    .replace(/_(\d+)/g, "_{$1}")
    .replace(/\^(-?\w+)/g, "^{$1}")
    .replace(/\*/g, " ")
    .replace(/\p{Script=Greek}/gu, (letter) => `${texWords(letter)} `);
}

/** Powers, products, quotients and indices of letters and numbers. */
const FORMULA = /^[\w\p{Script=Greek}^*+/().,=-]+$/u;
