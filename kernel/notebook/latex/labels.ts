// The labels of a drawing, set by TeX over it: letters of quantities as in formulas, so that they look as in the text.
import { formulaTex, textTex } from "./characters.ts";
import type { Drawing, Label, Run } from "./drawing.ts";

/** The \put commands of a picture whose unit is one of the drawing. */
export function labelsTex({ height, labels }: Drawing): string {
  return labels
    .map((label) => `\\put(${short(label.at[0])},${short(height - label.at[1])}){${box(label)}}%\n`)
    .join("");
}

const SIDES = { start: "l", middle: "c", end: "r" } as const;

function box({ anchor, size, runs }: Label): string {
  const body = runs.map(runTex).join("");
  return `\\fontsize{${short(size)}}{${short(size)}}\\selectfont\\makebox[0pt][${SIDES[anchor]}]{${body}}`;
}

function runTex({ text, italic, low }: Run): string {
  if (low) return `$_{${/^[\w\s−-]*$/.test(text) ? formulaTex(text.trim()) : `\\text{${textTex(text)}}`}}$`;
  if (italic && /^\p{L}/u.test(text)) return `$${formulaTex(text)}$`;
  const [, before = "", word = "", after = ""] = /^(\s*)(.*?)(\s*)$/su.exec(text) ?? [];
  return `${before && "\\ "}${textTex(word)}${after && "\\ "}`;
}

function short(x: number): string {
  return String(Math.round(x * 100) / 100);
}
