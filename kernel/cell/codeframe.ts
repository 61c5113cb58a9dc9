// The one printer of code frames: type errors and run-time errors show the user's own lines through it.

export interface Position {
  /** Counted from 1. */
  readonly line: number;
  /** Counted from 1, in UTF-16 units. */
  readonly column: number;
}

const CONTEXT_LINES = 2;
const LONGEST_LINE = 160;
const RED = "\u001b[31m";
const PLAIN = "\u001b[0m";

/** Position of an offset in a text; CR LF and LF end a line. */
export function positionAt(text: string, offset: number): Position {
  const before = text.slice(0, offset);
  const line = before.split("\n").length;
  return { line, column: offset - before.lastIndexOf("\n") };
}

/**
 * Lines around a position, numbered, with a mark under `length` units from its column.
 * @example "  1 | const n: number = 'a'\n    |       ^"
 */
export function codeFrame(text: string, at: Position, length = 1): string[] {
  const lines = text.split(/\r?\n/);
  const first = Math.max(1, at.line - CONTEXT_LINES);
  const last = Math.min(lines.length, at.line + 1);
  const width = String(last).length;
  const shown: string[] = [];
  for (let number = first; number <= last; number++) {
    const source = lines[number - 1] ?? "";
    const cut = number === at.line ? window(source, at.column) : { text: source.slice(0, LONGEST_LINE), shift: 0 };
    const pointer = number === at.line ? ">" : " ";
    shown.push(`${pointer} ${String(number).padStart(width)} | ${cut.text}`);
    if (number === at.line) shown.push(mark(cut.text, at.column - cut.shift, length, width));
  }
  return shown;
}

/** The part of a long line that holds the column. */
function window(source: string, column: number): { text: string; shift: number } {
  if (source.length <= LONGEST_LINE) return { text: source, shift: 0 };
  const shift = Math.max(0, column - LONGEST_LINE / 2);
  return { text: source.slice(shift, shift + LONGEST_LINE), shift };
}

function mark(source: string, column: number, length: number, width: number): string {
  const lead = source.slice(0, column - 1).replace(/[^\t]/g, " ");
  const room = Math.max(1, source.length - column + 1);
  const carets = "^".repeat(Math.max(1, Math.min(length, room)));
  return `  ${" ".repeat(width)} | ${lead}${RED}${carets}${PLAIN}`;
}
