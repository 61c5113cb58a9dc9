// Writes a formula in one line of characters: as text, or as HTML with indices and powers. No mathematics renderer is needed to
// read it, and a reader who sees the text alone still reads 1/4 and x^2.

import { escapeHtml } from "../html.ts";
import { type Node, readFormula } from "./read.ts";

const OVERLINE = "\u0304";

/** How the parts of a formula are marked. */
interface Marks {
  readonly minus: string;
  /** Between an index or a power and the factor that follows. */
  readonly apart: string;
  /** Between groups of digits. */
  group(digits: string): string;
  text(text: string): string;
  face(text: string, face: "italic" | "bold"): string;
  low(part: string, base: string): string;
  high(part: string): string;
  /** A fraction over two lines, where there may be two. */
  stacked?(above: string, below: string): string;
}

const TEXT: Marks = {
  minus: "-",
  apart: " ",
  group: (digits) => digits,
  text: (text) => text,
  face: (text) => text,
  low: (part, base) => (/^\d+$/.test(part) && /\p{L}$/u.test(base) ? part : `_${bracketed(part)}`),
  high: (part) => `^${bracketed(part)}`,
};

const HTML: Marks = {
  minus: "−",
  apart: "",
  group: (digits) => `<span style="margin-left:.18em">${digits}</span>`,
  text: escapeHtml,
  face: (text, face) => (face === "italic" ? `<i>${escapeHtml(text)}</i>` : `<b>${escapeHtml(text)}</b>`),
  low: (part) => `<sub>${part}</sub>`,
  high: (part) => `<sup>${part}</sup>`,
  // The stroke is copied, but not seen.
  stacked: (above, below) =>
    `<span style="display:inline-block;vertical-align:middle;text-align:center;line-height:1.3"><span style="display:block;border-bottom:1px solid currentColor">${above}</span><span style="font-size:0">/</span>${below}</span>`,
};

/** The formula as HTML; undefined where it does not go into a line. */
export function formulaHtml(tex: string): string | undefined {
  const nodes = readFormula(tex);
  return nodes && line(nodes, HTML);
}

/** The formula as text; undefined where it does not go into a line. */
export function formulaText(tex: string): string | undefined {
  const nodes = readFormula(tex);
  return (
    nodes &&
    line(nodes, TEXT)
      .replace(/\u2009/g, " ")
      .trim()
  );
}

function bracketed(part: string): string {
  return /^-?[\p{L}\p{N}]+$|^[-+*∞]$/u.test(part) ? part : `(${part})`;
}

function line(nodes: readonly Node[], marks: Marks, tight = false): string {
  let out = "";
  nodes.forEach((node, k) => {
    out += piece(node, nodes[k - 1], nodes[k + 1], marks, tight);
  });
  return out;
}

function piece(node: Node, before: Node | undefined, after: Node | undefined, marks: Marks, tight: boolean): string {
  switch (node.kind) {
    case "words":
      return marks.text(node.text);
    case "group":
      return line(node.body, marks, tight);
    case "sign":
      return signPiece(node, before, after, marks, tight);
    case "scripts":
      return scripts(node, before, after, marks);
    case "fraction":
      return fraction(node, before, after, marks);
    case "root":
      return `√${isSingle(node.body) ? line([node.body], marks) : `(${line([node.body], marks)})`}`;
    case "accent":
      return accent(node, marks);
  }
}

type SignNode = Extract<Node, { kind: "sign" }>;

function signPiece(
  node: SignNode,
  before: Node | undefined,
  after: Node | undefined,
  marks: Marks,
  tight: boolean,
): string {
  const { role, face } = node;
  const text = node.text === "−" ? marks.minus : node.text;
  if (role === "letter" && face === "bold") return marks.face(text, "bold");
  // Capital Greek letters are upright, as TeX has them.
  if (role === "letter" && /^[A-Za-zα-ωϑ]$/.test(text)) return marks.face(text, "italic");
  if (role === "digit" && isThin(before)) return marks.group(text);
  if (role === "space") return node.text === "\u2009" && isDigit(after) ? "" : text;
  const shown = marks.text(text);
  if (role === "name") return `${endsOperand(before) ? " " : ""}${shown}${startsOperand(after) ? " " : ""}`;
  if (tight || text === "/") return shown;
  if (role === "relation") return `${before ? " " : ""}${shown}${after ? " " : ""}`;
  if (role === "operator") return endsOperand(before) && after ? ` ${shown} ` : shown;
  return role === "mark" && /[,;]/.test(text) && after && !isSpace(after) ? `${shown} ` : shown;
}

function scripts(
  { base, low, high }: Extract<Node, { kind: "scripts" }>,
  before: Node | undefined,
  after: Node | undefined,
  marks: Marks,
): string {
  const plain = isSingle(base) || base.kind === "group" ? line([base], marks) : `(${line([base], marks)})`;
  const below = low ? marks.low(line([low], marks, true), plain.replace(/<[^>]*>/g, "")) : "";
  const [, primes = "", above = ""] = /^(′*)(.*)$/su.exec(high ? line([high], marks, true) : "") ?? [];
  const power = above === "" ? "" : marks.high(above);
  const name = isSign(base, ["name"]);
  const gap = name ? " " : below + power === "" ? "" : marks.apart;
  return `${name && endsOperand(before) ? " " : ""}${plain}${below}${primes}${power}${startsOperand(after) ? gap : ""}`;
}

/** Characters above or below from which on a fraction is set over two lines. */
const LONG_FRACTION = 12;

function width(node: Node): number {
  return line([node], TEXT).length;
}

function fraction(
  { above, below }: Extract<Node, { kind: "fraction" }>,
  before: Node | undefined,
  after: Node | undefined,
  marks: Marks,
): string {
  const part = (node: Node, alone: (node: Node) => boolean): string =>
    alone(node) ? line([node], marks) : `(${line([node], marks)})`;
  if (marks.stacked && LONG_FRACTION < Math.max(width(above), width(below)))
    return marks.stacked(line([above], marks), line([below], marks));
  const text = `${part(above, isProduct)}/${part(below, isSingle)}`;
  const beside = startsOperand(after) || isSign(after, ["open"]) || endsOperand(before);
  return beside ? `(${text})` : text;
}

function accent({ body, mark }: Extract<Node, { kind: "accent" }>, marks: Marks): string {
  const text = line([body], TEXT);
  if (/^\p{L}$/u.test(text)) return marks.face(`${text}${mark}`.normalize("NFC"), "italic");
  const inside = line([body], marks);
  // A line over several signs is a conjugate.
  return mark === OVERLINE ? `conj(${inside})` : `(${inside})${mark}`;
}

/** A part that needs no brackets wherever it stands: a number, a letter, one with its index. */
function isSingle(node: Node): boolean {
  if (node.kind === "group")
    return (
      (node.body.length === 1 && isSingle(node.body[0]!)) || node.body.every((part) => isDigit(part) || isThin(part))
    );
  return node.kind === "scripts" ? isSingle(node.base) : node.kind === "sign" && node.role !== "operator";
}

/** No sum on its outermost level. */
function isProduct(node: Node): boolean {
  const parts = node.kind === "group" ? node.body : [node];
  return parts.every((part, k) => part.kind !== "fraction" && (k === 0 || !isSign(part, ["operator", "relation"])));
}

function isSign(node: Node | undefined, roles: readonly SignNode["role"][]): boolean {
  return node?.kind === "sign" && roles.includes(node.role);
}

const isDigit = (node: Node | undefined): boolean => isSign(node, ["digit"]);
const isSpace = (node: Node | undefined): boolean => isSign(node, ["space"]);
const isThin = (node: Node | undefined): boolean => isSpace(node) && (node as SignNode).text === "\u2009";

function endsOperand(node: Node | undefined): boolean {
  if (node?.kind === "scripts" && isSign(node.base, ["name"])) return false;
  if (!node || node.kind === "words") return false;
  return node.kind !== "sign" || isSign(node, ["letter", "digit", "close"]) || /[′!|]/.test(node.text);
}

function startsOperand(node: Node | undefined): boolean {
  if (node?.kind === "scripts") return startsOperand(node.base);
  if (!node || node.kind === "words") return false;
  return node.kind !== "sign" || isSign(node, ["letter", "digit", "name"]);
}
