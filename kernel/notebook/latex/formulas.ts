// What values show in LaTeX, fitted to a printed column: notes about conventions become small print, long numbers may
// break between groups of digits, and a display that is too wide is set smaller as a whole.
import { formulaTex, textTex } from "./characters.ts";

/** Digits in a row from which on a number may be broken. */
const LONG = 60;

/** Splits TeX at a mark that stands in no group, no environment and no \left...\right. */
export function splitTop(tex: string, mark: "\\\\" | "&"): string[] {
  const parts: string[] = [];
  let depth = 0;
  let from = 0;
  for (let at = 0; at < tex.length; at++) {
    if (depth === 0 && tex.startsWith(mark, at)) {
      parts.push(tex.slice(from, at));
      at += mark.length - 1;
      from = at + 1;
      continue;
    }
    if (tex[at] === "\\") {
      if (/^\\(?:begin\b|left(?![a-z]))/.test(tex.slice(at, at + 7))) depth++;
      else if (/^\\(?:end\b|right(?![a-z]))/.test(tex.slice(at, at + 7))) depth--;
      at++;
    } else if (tex[at] === "{") depth++;
    else if (tex[at] === "}") depth--;
  }
  parts.push(tex.slice(from));
  return parts.map((part) => part.trim());
}

/** A row of groups of digits. */
const DIGITS = /^-?[\d.]+(?:\\,\d+)*(?:\\ldots)?$/;

const COLUMN = /^\\begin\{array\}\{l\}([\s\S]*)\\end\{array\}$/;
const EQUATIONS = /^\\begin\{array\}\{rcl\}([\s\S]*)\\end\{array\}$/;

/** The inside of an environment that is the whole text. */
function whole(tex: string, pattern: RegExp): string | undefined {
  const inside = pattern.exec(tex)?.[1];
  if (inside === undefined) return undefined;
  let depth = 0;
  for (const [mark] of inside.matchAll(/\\(?:begin|end)\b/g)) {
    depth += mark === "\\begin" ? 1 : -1;
    if (depth < 0) return undefined;
  }
  // With rules between its rows it is a table, which stays whole.
  return splitTop(inside, "\\\\").some((row) => row.startsWith("\\hline")) ? undefined : inside;
}

/** A displayed formula as lines of a paper. */
export function displayTex(tex: string): string {
  const body = bare(tex);
  const rows = whole(body, COLUMN);
  if (rows === undefined) return shownTex(body);
  const parts = splitTop(rows, "\\\\")
    .map((row) => bare(row).replace(/^\\phantom\{[^{}]*\}\s*(?=\d)/, ""))
    .filter((row) => row !== "");
  // The digits of one number, in lines of a screen: a paper breaks them by itself.
  if (parts.length > 1 && parts.every((row) => DIGITS.test(row)))
    return `\\longvalue{$${breakable(parts.join("\\,"))}$}`;
  return parts.map((row) => noteTex(row) ?? wordsTex(row) ?? displayTex(row)).join("\n");
}

function bare(tex: string): string {
  return tex
    .trim()
    .replace(/^\\displaystyle\s*/, "")
    .trim();
}

/** A line of small print: its formulas and its words in turn, so that it breaks as a paragraph does. */
function noteTex(row: string): string | undefined {
  const inside = /^\{\\scriptstyle\s([\s\S]*)\}$/.exec(row)?.[1];
  return inside === undefined ? undefined : `\\note{${runningTex(inside)}}`;
}

/** A row of words alone, such as the caption of a table. */
function wordsTex(row: string): string | undefined {
  const inside = /^\\text\{([^{}]*)\}$/.exec(row)?.[1];
  return inside === undefined ? undefined : `\\heading{${formulaTex(inside)}}`;
}

/** `{a}\text{ and }{b}` as `$a$ and $b$`. */
export function runningTex(tex: string): string {
  let out = "";
  let formula = "";
  const flush = () => {
    if (formula.trim() !== "") out += `$${breakable(formulaTex(formula.trim()))}$`;
    formula = "";
  };
  for (let at = 0; at < tex.length; ) {
    const group = groupAt(tex, at);
    if (tex.startsWith("\\text{", at)) {
      const end = groupAt(tex, at + 5) ?? tex.length;
      flush();
      out += formulaTex(tex.slice(at + 6, end - 1));
      at = end;
    } else if (group !== undefined) {
      formula += tex.slice(at, group);
      at = group;
    } else {
      formula += tex[at] === "\\" ? tex.slice(at, at + 2) : tex[at];
      at += tex[at] === "\\" ? 2 : 1;
    }
  }
  flush();
  return out;
}

/** The end of the group that opens here. */
function groupAt(tex: string, start: number): number | undefined {
  if (tex[start] !== "{") return undefined;
  let depth = 0;
  for (let at = start; at < tex.length; at++) {
    if (tex[at] === "\\") at++;
    else if (tex[at] === "{") depth++;
    else if (tex[at] === "}" && --depth === 0) return at + 1;
  }
  return undefined;
}

/** Numbers may break between their groups of digits. */
export function breakable(tex: string): string {
  return tex.replace(/(\d)\\,(?=\d)/g, "$1\\,\\allowbreak ");
}

function hasLongNumber(tex: string): boolean {
  return (tex.match(/\d[\d.]*(?:\\,\d+)*/g) ?? []).some((number) => number.replace(/\D/g, "").length > LONG);
}

function shownTex(body: string): string {
  const lines = whole(body, EQUATIONS) ?? whole(body, COLUMN) ?? (body.includes("\\begin{") ? undefined : body);
  if (lines === undefined || !hasLongNumber(body)) return `\\shown{${formulaTex(spaced(body))}}`;
  return longLines(body)
    .map((line) => `\\longvalue{$${breakable(formulaTex(line))}$}`)
    .join("\n");
}

/** Rows with built-up fractions do not touch. */
function spaced(body: string): string {
  return body.replace(/(\\displaystyle \\frac(?:(?!\\\\)[^&])*?)\s*\\\\(?!\[)/g, "$1 \\\\[1.2ex] ");
}

/** Equations with long numbers, one after another, each as one line that breaks. */
function longLines(body: string): string[] {
  const inside = whole(body, EQUATIONS) ?? whole(body, COLUMN);
  if (inside === undefined)
    return [body.replace(/\\begin\{array\}\{[lrc]*\}|\\end\{array\}|\\displaystyle/g, "").replace(/\\\\|&/g, " ")];
  return splitTop(inside, "\\\\").flatMap((row) => {
    const parts = splitTop(row, "&").map(bare);
    const last = parts.at(-1) ?? "";
    const lines = longLines(last);
    return lines.map((line, index) => (index === 0 ? [...parts.slice(0, -1), line].join(" ") : line));
  });
}

/** A sentence with formulas in dollars. */
export function sentenceTex(
  pieces: readonly {
    readonly kind: "text" | "formula";
    readonly text?: string;
    readonly tex?: string;
    readonly display?: boolean;
  }[],
): string {
  return pieces
    .map((piece) => {
      if (piece.kind === "text") return textTex(piece.text ?? "");
      const tex = breakable(formulaTex(piece.tex ?? ""));
      return piece.display ? `\\[${tex}\\]` : `$${tex}$`;
    })
    .join("");
}
