// The text of an equation template as its author wrote it, for error messages that mark the column.

import { DomainError } from "../../proof/errors.ts";

/** One template: the raw strings between the slots, and how each inserted value prints. */
export interface Source {
  /** The public name of the template: "curve", "cubic", "quartic". */
  readonly subject: string;
  /** The whole text with every slot written `${value}`. */
  readonly text: string;
  /** The pieces of text and slots in order, each with its offset in `text`. */
  readonly pieces: readonly Piece[];
}

export type Piece =
  | { readonly kind: "text"; readonly text: string; readonly offset: number }
  | { readonly kind: "slot"; readonly index: number; readonly offset: number; readonly length: number };

/** A template's strings (raw, so that TeX commands keep their backslash) and the printed values of its slots. */
export function sourceOf(subject: string, strings: readonly string[], printed: readonly string[]): Source {
  const pieces: Piece[] = [];
  let text = "";
  strings.forEach((string, k) => {
    pieces.push({ kind: "text", text: string, offset: text.length });
    text += string;
    if (k >= printed.length) return;
    const slot = `\${${printed[k]}}`;
    pieces.push({ kind: "slot", index: k, offset: text.length, length: slot.length });
    text += slot;
  });
  return { subject, text, pieces };
}

/** What is wrong at a place of the text. */
export interface Fault {
  readonly offset: number;
  readonly length?: number;
  readonly given: string;
  readonly expected: string;
  readonly hint?: string;
}

/** A refusal that shows the author's own line with the place marked under it. */
export function faultAt(source: Source, fault: Fault): DomainError {
  const offset = Math.min(fault.offset, source.text.length);
  const start = source.text.lastIndexOf("\n", offset - 1) + 1;
  const end = source.text.indexOf("\n", offset);
  const line = source.text.slice(start, end < 0 ? undefined : end);
  const column = [...source.text.slice(start, offset)].length;
  const row = source.text.slice(0, start).split("\n").length;
  const where = source.text.includes("\n") ? `line ${row}, column ${column + 1}` : `column ${column + 1}`;
  const mark = "^".repeat(Math.max(1, Math.min(fault.length ?? 1, line.length - column)));
  const frame = `\n    ${line.replaceAll("\t", " ")}\n    ${" ".repeat(column)}${mark}`;
  return new DomainError({
    subject: source.subject,
    given: `${fault.given} at ${where}`,
    expected: fault.expected,
    hint: `${fault.hint ?? ""}${frame}`,
  });
}
