// From tokens to a tree. Juxtaposition multiplies; what could be read in two ways is refused, with both readings.

import { type Token, type TokenKind, tokens } from "./lexer.ts";
import { faultAt, type Source } from "./source.ts";

export type Tree =
  | { readonly kind: "number"; readonly text: string; readonly offset: number }
  | { readonly kind: "name"; readonly name: string; readonly offset: number; readonly length: number }
  | { readonly kind: "slot"; readonly index: number; readonly offset: number; readonly length: number }
  | RootTree
  | { readonly kind: "negate"; readonly of: Tree; readonly offset: number }
  | Pair<"sum">
  | Pair<"difference">
  | Pair<"product">
  | Pair<"quotient">
  | PowerTree;

interface Pair<K extends string> {
  readonly kind: K;
  readonly left: Tree;
  readonly right: Tree;
  readonly offset: number;
}

export type QuotientTree = Pair<"quotient">;

export interface PowerTree {
  readonly kind: "power";
  readonly base: Tree;
  readonly exponent: Exponent;
  readonly offset: number;
}

export interface RootTree {
  readonly kind: "root";
  readonly of: Tree;
  readonly offset: number;
}

export type Exponent = { readonly value: number } | { readonly slot: number };

/** Both sides of an equation; an expression without "=" is read as "= 0". */
export interface EquationTree {
  readonly left: Tree;
  readonly right: Tree | undefined;
}

const CLOSING: Readonly<Record<string, string>> = { "(": ")", "[": "]", "{": "}" };
const LARGEST_EXPONENT = 60;
const STARTS_FACTOR: readonly TokenKind[] = ["number", "name", "slot", "open", "fraction", "root"];

/** Parses one equation. Throws a DomainError that marks the place. */
export function parseEquation(source: Source): EquationTree {
  const reader: Reader = { source, tokens: tokens(source), at: 0 };
  if (peek(reader).kind === "end") {
    throw fault(reader, peek(reader), "nothing", "an equation, such as y^2 = x^3 - x");
  }
  const left = sum(reader);
  const equals = peek(reader).kind === "=";
  if (equals) reader.at++;
  const right = equals ? sum(reader) : undefined;
  const rest = peek(reader);
  if (rest.kind === "=") throw fault(reader, rest, 'a second "="', "one equation");
  if (rest.kind !== "end") throw fault(reader, rest, describe(rest), "the end of the equation");
  return { left, right };
}

interface Reader {
  readonly source: Source;
  readonly tokens: readonly Token[];
  at: number;
}

function peek(reader: Reader): Token {
  return reader.tokens[reader.at]!;
}

function take(reader: Reader): Token {
  const token = peek(reader);
  if (token.kind !== "end") reader.at++;
  return token;
}

function sum(reader: Reader): Tree {
  let left = signed(reader);
  for (;;) {
    const { kind, offset } = peek(reader);
    if (kind !== "+" && kind !== "-") return left;
    take(reader);
    left = { kind: kind === "+" ? "sum" : "difference", left, right: signed(reader), offset };
  }
}

/** A product with its sign: −x² is −(x²), and a − −b is allowed. */
function signed(reader: Reader): Tree {
  const { kind, offset } = peek(reader);
  if (kind !== "+" && kind !== "-") return product(reader);
  take(reader);
  const of = signed(reader);
  return kind === "-" ? { kind: "negate", of, offset } : of;
}

function product(reader: Reader): Tree {
  const first = peek(reader);
  let left = power(reader);
  let slash: Token | undefined; // the last operator was "/", so what is set beside it has two readings
  for (;;) {
    const token = peek(reader);
    if (token.kind === "*" || token.kind === "/") {
      take(reader);
      const kind = token.kind === "*" ? "product" : "quotient";
      slash = token.kind === "/" ? token : undefined;
      left = { kind, left, right: factor(reader), offset: token.offset };
    } else if (STARTS_FACTOR.includes(token.kind)) {
      if (slash) throw twoReadings(reader, first, slash, token);
      refuseNumberBesideNumber(reader, token);
      left = { kind: "product", left, right: power(reader), offset: token.offset };
    } else {
      return left;
    }
  }
}

/** After an operator a sign may stand: 2 * -3. */
function factor(reader: Reader): Tree {
  const { kind, offset } = peek(reader);
  if (kind !== "-" && kind !== "+") return power(reader);
  take(reader);
  const of = factor(reader);
  return kind === "-" ? { kind: "negate", of, offset } : of;
}

function power(reader: Reader): Tree {
  const base = atom(reader);
  const mark = peek(reader);
  if (mark.kind !== "^" && mark.kind !== "power") return base;
  take(reader);
  const exponent = mark.kind === "power" ? checkedExponent(reader, mark) : exponentAfterCaret(reader);
  const again = peek(reader);
  if (again.kind === "^" || again.kind === "power") {
    throw fault(reader, again, "a power of a power", "one exponent", "Put the inner power in brackets.");
  }
  return { kind: "power", base, exponent, offset: mark.offset };
}

function exponentAfterCaret(reader: Reader): Exponent {
  const token = take(reader);
  if (token.kind === "slot") return { slot: Number(token.text) };
  if (token.kind === "open") {
    const inner = exponentAfterCaret(reader);
    close(reader, token);
    return inner;
  }
  return checkedExponent(reader, token);
}

function checkedExponent(reader: Reader, token: Token): Exponent {
  const plain = (token.kind === "number" || token.kind === "power") && /^\d+$/.test(token.text);
  if (plain && Number(token.text) <= LARGEST_EXPONENT) return { value: Number(token.text) };
  const expected = `a whole exponent from 0 to ${LARGEST_EXPONENT}`;
  throw fault(reader, token, plain ? `the exponent ${token.text}` : describe(token), expected);
}

function atom(reader: Reader): Tree {
  const token = take(reader);
  const { offset, length } = token;
  switch (token.kind) {
    case "number":
      return { kind: "number", text: token.text, offset };
    case "name":
      return { kind: "name", name: token.text, offset, length };
    case "slot":
      return { kind: "slot", index: Number(token.text), offset, length };
    case "root":
      return { kind: "root", of: atom(reader), offset };
    case "fraction":
      return { kind: "quotient", left: group(reader), right: group(reader), offset };
    case "open": {
      const inner = sum(reader);
      close(reader, token);
      return inner;
    }
    default:
      throw fault(reader, token, describe(token), "a number, a letter, an inserted value or a bracket");
  }
}

/** The braced argument of \frac; `\frac12` is refused since its digits belong together elsewhere. */
function group(reader: Reader): Tree {
  const token = peek(reader);
  if (token.kind !== "open" || token.text !== "{") {
    throw fault(reader, token, describe(token), "a group in braces after \\frac, as in \\frac{1}{2}");
  }
  return atom(reader);
}

function close(reader: Reader, open: Token): void {
  const token = take(reader);
  const wanted = CLOSING[open.text];
  if (token.kind !== "close" || token.text !== wanted) {
    throw fault(reader, token, describe(token), `"${wanted}" for the "${open.text}" before it`);
  }
}

/** "2 3" is a slip or a digit group; x^2 3 too, since its exponent is written in digits. */
function refuseNumberBesideNumber(reader: Reader, token: Token): void {
  const before = reader.tokens[reader.at - 1]!;
  if (token.kind !== "number" || before.kind !== "number") return;
  throw fault(reader, token, `the number ${token.text} beside ${before.text}`, "an operator between them");
}

function twoReadings(reader: Reader, first: Token, slash: Token, token: Token) {
  const { text } = reader.source;
  const numerator = text.slice(first.offset, slash.offset).trim();
  const denominator = text.slice(slash.offset + slash.length, token.offset).trim();
  const rest = text.slice(token.offset, token.offset + token.length);
  return faultAt(reader.source, {
    offset: first.offset,
    length: token.offset + token.length - first.offset,
    given: `${numerator}/${denominator}${rest} has two readings`,
    expected: `(${numerator}/${denominator})*${rest} or ${numerator}/(${denominator}*${rest})`,
    hint: "Write the one that is meant.",
  });
}

function describe(token: Token): string {
  if (token.kind === "end") return "the end of the equation";
  return token.kind === "slot" ? "an inserted value" : `"${token.text}"`;
}

function fault(reader: Reader, token: Token, given: string, expected: string, hint?: string) {
  const { offset, length } = token;
  return faultAt(reader.source, { offset, length, given, expected, ...(hint ? { hint } : {}) });
}
