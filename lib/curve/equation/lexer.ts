// Tokens of an equation as a paper or a keyboard writes it: plain text, unicode powers, TeX.

import { faultAt, type Source } from "./source.ts";

export type TokenKind =
  | "number" // decimal digits, kept as text: the value is exact
  | "name" // one letter with optional digits
  | "slot" // an inserted value
  | "power" // a superscript, with its digits
  | "fraction" // \frac, followed by two groups
  | "root" // √ or \sqrt, followed by a number or a group
  | "open"
  | "close"
  | "+"
  | "-"
  | "*"
  | "/"
  | "^"
  | "="
  | "end";

export interface Token {
  readonly kind: TokenKind;
  /** Normalised text: digits of a number or power, a name with plain digits, the bracket, the index of a slot. */
  readonly text: string;
  readonly offset: number;
  readonly length: number;
}

const GREEK: Readonly<Record<string, string>> = {
  alpha: "α",
  beta: "β",
  gamma: "γ",
  delta: "δ",
  epsilon: "ε",
  zeta: "ζ",
  eta: "η",
  theta: "θ",
  kappa: "κ",
  lambda: "λ",
  mu: "μ",
  nu: "ν",
  xi: "ξ",
  pi: "π",
  rho: "ρ",
  sigma: "σ",
  tau: "τ",
  phi: "φ",
  varphi: "φ",
  chi: "χ",
  psi: "ψ",
  omega: "ω",
};
const COMMANDS: Readonly<Record<string, TokenKind>> = {
  cdot: "*",
  times: "*",
  ast: "*",
  frac: "fraction",
  tfrac: "fraction",
  dfrac: "fraction",
  sqrt: "root",
};
/** TeX that only moves ink: sizes, spaces, mathematics mode. */
const SILENT = new Set([
  "left",
  "right",
  "big",
  "Big",
  "bigl",
  "bigr",
  "Bigl",
  "Bigr",
  "quad",
  "qquad",
  "displaystyle",
]);

const SIGNS: Readonly<Record<string, TokenKind>> = {
  "+": "+",
  "-": "-",
  "\u2212": "-", // minus
  "\u2013": "-", // en dash, as some papers have it
  "*": "*",
  "·": "*",
  "×": "*",
  "⋅": "*",
  "∙": "*",
  "/": "/",
  "÷": "/",
  "∕": "/",
  "⁄": "/",
  "^": "^",
  "=": "=",
  "√": "root",
  "(": "open",
  "[": "open",
  "{": "open",
  ")": "close",
  "]": "close",
  "}": "close",
};
const SUPERSCRIPTS = "⁰¹²³⁴⁵⁶⁷⁸⁹";
const SUBSCRIPTS = "₀₁₂₃₄₅₆₇₈₉";
const SPACE = /[\s~$&\u2009\u202f\u00a0]+/y;
// Digits may be grouped the TeX way (36\,000, 36{,}000) or by a thin space, in threes.
const NUMBER = /\d+(?:(?:\\,|\{,\}|[\u2009\u202f])\d{3}(?!\d))*(?:\.\d+)?|\.\d+/y;
const NAME = /(\p{L})(?:_\{(\d+)\}|_(\d)|(\d+)|([₀-₉]+))?/uy;
const COMMAND = /\\([A-Za-z]+|[,;:!> ])/y;

/** Splits a template into tokens, the last of kind "end". Throws a DomainError that marks the character it cannot read. */
export function tokens(source: Source): Token[] {
  const found: Token[] = [];
  for (const piece of source.pieces) {
    if (piece.kind === "slot") {
      found.push({ kind: "slot", text: String(piece.index), offset: piece.offset, length: piece.length });
    } else {
      for (let at = 0; at < piece.text.length; ) {
        const token = next(source, piece.text, at, piece.offset);
        if (token.kind !== undefined) found.push({ ...token, kind: token.kind, offset: piece.offset + at });
        at += token.length;
      }
    }
  }
  while (/^[.,;]$/.test(found.at(-1)?.text ?? "")) found.pop(); // the full stop that ends a displayed formula
  const stray = found.find((token) => /^[.,;]$/.test(token.text));
  if (stray) throw unreadable(source, stray.text, stray.offset);
  found.push({ kind: "end", text: "", offset: source.text.trimEnd().length, length: 1 });
  return found;
}

interface Read {
  readonly kind: TokenKind | undefined; // undefined: white space
  readonly text: string;
  readonly length: number;
}

function next(source: Source, text: string, at: number, offset: number): Read {
  const match = (pattern: RegExp) => {
    pattern.lastIndex = at;
    return pattern.exec(text);
  };
  const space = match(SPACE);
  if (space) return { kind: undefined, text: "", length: space[0].length };
  const number = match(NUMBER);
  if (number) return { kind: "number", text: number[0].replace(/[^\d.]/g, ""), length: number[0].length };
  const name = match(NAME);
  if (name) return { kind: "name", text: plainName(name), length: name[0].length };
  const command = match(COMMAND);
  if (command) return commandToken(source, command, offset + at, text.slice(at + command[0].length));
  if (text.startsWith("**", at)) return { kind: "^", text: "**", length: 2 };
  const powers = leading(text.slice(at), SUPERSCRIPTS);
  if (powers) return { kind: "power", text: plainDigits(powers, SUPERSCRIPTS), length: powers.length };
  const character = String.fromCodePoint(text.codePointAt(at)!);
  const kind = Object.hasOwn(SIGNS, character) ? SIGNS[character] : undefined;
  if (kind) return { kind, text: character, length: character.length };
  if (/[.,;]/.test(character)) return { kind: "end", text: character, length: 1 };
  throw unreadable(source, character, offset + at);
}

function commandToken(source: Source, command: RegExpExecArray, offset: number, rest: string): Read {
  const word = command[1]!;
  const { length } = command[0];
  if (SILENT.has(word) || /^[^A-Za-z]$/.test(word)) return { kind: undefined, text: "", length };
  if (Object.hasOwn(COMMANDS, word)) return { kind: COMMANDS[word], text: `\\${word}`, length };
  const letter = Object.hasOwn(GREEK, word) ? GREEK[word] : undefined;
  if (letter) {
    const index = /^(?:_\{(\d+)\}|_(\d))/.exec(rest);
    return { kind: "name", text: letter + (index?.[1] ?? index?.[2] ?? ""), length: length + (index?.[0].length ?? 0) };
  }
  throw faultAt(source, {
    offset,
    length,
    given: `the TeX command \\${word}`,
    expected: "a polynomial equation: letters, numbers, + − · / ^, brackets, \\frac, \\cdot, \\sqrt and Greek letters",
  });
}

function plainName(match: RegExpExecArray): string {
  const [, letter, group, single, digits, subscript] = match;
  return letter! + (group ?? single ?? digits ?? (subscript ? plainDigits(subscript, SUBSCRIPTS) : ""));
}

function leading(text: string, alphabet: string): string {
  let n = 0;
  while (n < text.length && alphabet.includes(text[n]!)) n++;
  return text.slice(0, n);
}

function plainDigits(text: string, alphabet: string): string {
  return [...text].map((character) => alphabet.indexOf(character)).join("");
}

function unreadable(source: Source, character: string, offset: number) {
  return faultAt(source, {
    offset,
    length: character.length,
    given: `"${character}" cannot be read`,
    expected: "a polynomial equation: letters, numbers, + − · / ^, brackets",
  });
}
