// TeX into MathML, and the search for TeX in running text as front ends do it: $..$, $$..$$, \(..\), \[..\] and
// environments of displayed mathematics.
import temml from "temml";
import { escapeHtml } from "./escape.ts";

/** A piece of running text: plain, or a formula without its delimiters. */
export type Piece =
  | { readonly kind: "text"; readonly text: string }
  | { readonly kind: "formula"; readonly tex: string; readonly display: boolean };

/** MathML of a formula; a formula that cannot be read is shown as its source, with the reason as its title. */
export function mathml(tex: string, display: boolean): string {
  try {
    return temml.renderToString(tex.trim(), {
      displayMode: display,
      annotate: true,
      throwOnError: true,
      trust: false,
      // Each thin space between groups of digits counts as an expansion.
      maxExpand: 100_000,
    });
  } catch (error) {
    const reason = error instanceof Error ? (error.message.split("\n")[0] ?? "") : String(error);
    return `<code class="unread" title="${escapeHtml(reason)}">${escapeHtml(tex)}</code>`;
  }
}

/** What has to stay on the line of the formula before it. */
const CLINGING = /^[.,;:!?)\]’”»]+/;

/** A formula in a line with the text that follows it, of which the punctuation is kept on the formula's line. */
export function joined(formula: string, following: string): string {
  const [mark = ""] = CLINGING.exec(following) ?? [];
  return mark === ""
    ? formula + following
    : `<span class="joined">${formula}${mark}</span>${following.slice(mark.length)}`;
}

const OPENERS: readonly {
  readonly open: RegExp;
  readonly close: (opener: RegExpExecArray) => string;
  readonly display: boolean;
}[] = [
  { open: /\\begin\{([a-z]+\*?)\}/y, close: (opener) => `\\end{${opener[1]}}`, display: true },
  { open: /\\\[/y, close: () => "\\]", display: true },
  { open: /\\\(/y, close: () => "\\)", display: false },
  { open: /\$\$/y, close: () => "$$", display: true },
  { open: /\$(?=\S)/y, close: () => "$", display: false },
];

/** The formula that starts at `start`, with the offset of what follows it; undefined if none starts there. */
export function formulaAt(source: string, start: number): { tex: string; display: boolean; end: number } | undefined {
  for (const { open, close, display } of OPENERS) {
    open.lastIndex = start;
    const opener = open.exec(source);
    if (!opener) continue;
    const closer = close(opener);
    const from = start + opener[0].length;
    const to = findCloser(source, from, closer);
    if (to < 0) return undefined;
    const end = to + closer.length;
    const whole = opener[1] !== undefined;
    return { tex: whole ? source.slice(start, end) : source.slice(from, to), display, end };
  }
  return undefined;
}

function findCloser(source: string, from: number, closer: string): number {
  for (let at = from; at < source.length; at++) {
    if (source.startsWith(closer, at)) return isRealCloser(source, from, at, closer) ? at : -1;
    if (source[at] === "\\" && !closer.startsWith("\\")) at++;
    if (source.startsWith("\n\n", at)) return -1;
  }
  return -1;
}

/** A single dollar closes only right behind the formula and not before a digit, so that prices stay prices. */
function isRealCloser(source: string, from: number, at: number, closer: string): boolean {
  if (at === from) return false;
  return closer !== "$" || (/\S/.test(source[at - 1] ?? "") && !/\d/.test(source[at + 1] ?? ""));
}

/** Splits running text at its formulas. */
export function splitFormulas(source: string): Piece[] {
  const pieces: Piece[] = [];
  let plain = "";
  for (let at = 0; at < source.length; ) {
    const formula = /[\\$]/.test(source[at] ?? "") ? formulaAt(source, at) : undefined;
    if (formula) {
      if (plain) pieces.push({ kind: "text", text: plain });
      plain = "";
      pieces.push({ kind: "formula", tex: formula.tex, display: formula.display });
      at = formula.end;
    } else if (source.startsWith("\\$", at)) {
      plain += "$";
      at += 2;
    } else {
      plain += source[at++];
    }
  }
  if (plain) pieces.push({ kind: "text", text: plain });
  return pieces;
}
