// The compiler's findings in the user's words, on the user's own lines.
import { codeFrame, positionAt } from "../codeframe.ts";
import type { ErrorReport } from "../port.ts";
import type { EditedText } from "./edits.ts";
import { type TS, ts } from "./typescript.ts";

/** One finding, positions in the user's text. */
export interface Finding {
  /** "TS2322", or a word of our own. */
  readonly code: string;
  readonly message: string;
  readonly start: number;
  readonly length: number;
}

/** Codes that only annoy in a notebook: packages without types are `any`. */
const IGNORED = new Set([7016, 80001, 80005, 80007]);

const CONSTANT =
  "'$1' is a constant of an earlier cell or a name of the library, and cannot be assigned. Declare it anew with let or const.";

/** About a name whose declaration stands behind the user's text. */
const OF_EARLIER_CELL = /^Cannot assign to '(.+?)' because it is a (?:constant|function)\.$/;

const REWORDED: readonly (readonly [RegExp, string])[] = [
  [/Cannot assign to '(.+?)' because it is an import\./, CONSTANT],
  [/import\("[^"]*halfperiod-cell-\d+"\)\./g, ""],
  [/import\("[^"]*\/dist\/lib\/[^"]*"\)\.|\$+op_types\./g, ""],
  [/Module '"\.\/halfperiod-cell-\d+"'/g, "The notebook"],
];

/** `isEarlier` tells the names of earlier cells. */
export function findings(
  diagnostics: readonly TS.Diagnostic[],
  edited: EditedText,
  isEarlier: (name: string) => boolean = () => false,
): Finding[] {
  return diagnostics
    .filter((one) => one.category === ts.DiagnosticCategory.Error && !IGNORED.has(one.code))
    .filter((one) => one.start === undefined || one.start <= endInEdited(edited))
    .map((one) => finding(one, edited))
    .map((one) => {
      const [, name] = OF_EARLIER_CELL.exec(one.message) ?? [];
      if (name === undefined || !isEarlier(name)) return one;
      return { ...one, message: one.message.replace(OF_EARLIER_CELL, CONSTANT) };
    });
}

/** A finding in an edited text, at its place in the user's. */
export function throughEdits(one: Finding, edited: EditedText): Finding {
  const start = edited.toUser(one.start);
  return { ...one, start, length: Math.max(1, edited.toUser(one.start + one.length) - start) };
}

function endInEdited(edited: EditedText): number {
  return edited.toEdited(edited.userLength);
}

function finding(diagnostic: TS.Diagnostic, edited: EditedText): Finding {
  const start = diagnostic.start ?? 0;
  const from = edited.toUser(start);
  const to = edited.toUser(start + (diagnostic.length ?? 1));
  return {
    code: `TS${diagnostic.code}`,
    message: reword(ts.flattenDiagnosticMessageText(diagnostic.messageText, "\n")),
    start: from,
    length: Math.max(1, to - from),
  };
}

function reword(message: string): string {
  return REWORDED.reduce((text, [pattern, words]) => text.replace(pattern, words), message);
}

/** Findings as the error of a cell that was not run. */
export function typeScriptError(code: string, executionCount: number, found: readonly Finding[]): ErrorReport {
  // What the compiler says of one place in several ways is said once.
  const places = [...found].sort((a, b) => a.start - b.start);
  const distinct = places.filter((one, at) => places.findIndex((other) => other.start === one.start) === at);
  const shown = distinct.slice(0, 5);
  const traceback: string[] = [];
  for (const one of shown) {
    const at = positionAt(code, one.start);
    const lineEnd = code.indexOf("\n", one.start);
    const room = (lineEnd < 0 ? code.length : lineEnd) - one.start;
    if (traceback.length > 0) traceback.push("");
    traceback.push(`\u001b[31mTypeScriptError\u001b[0m: ${one.code}: ${one.message}`);
    traceback.push(`  in cell ${executionCount}, line ${at.line}, column ${at.column}`);
    traceback.push(...codeFrame(code, at, Math.max(1, Math.min(one.length, room))));
  }
  if (distinct.length > shown.length) traceback.push("", `and ${distinct.length - shown.length} more`);
  const first = shown[0] as Finding;
  return { ename: "TypeScriptError", evalue: `${first.code}: ${first.message}`, traceback };
}
