// Whether a cell is complete, by the compiler's parser alone.
import { indentOf } from "../balance.ts";
import type { Completeness } from "../port.ts";
import { syntaxErrors } from "./outline.ts";
import { ts } from "./typescript.ts";

/** Templates and comments without an end: reported where the token begins. */
const UNTERMINATED = new Set([1160, 1010]);

const UNTERMINATED_STRING = 1002;

/** Complete, incomplete (only the end is missing) or invalid. */
export function completeness(code: string): Completeness {
  const source = ts.createSourceFile("cell.ts", code, ts.ScriptTarget.ES2023, true);
  const [first] = syntaxErrors(source);
  if (!first) return { status: "complete" };
  const atEnd = first.start >= code.trimEnd().length && first.code !== UNTERMINATED_STRING;
  return atEnd || UNTERMINATED.has(first.code)
    ? { status: "incomplete", indent: indentOf(code) }
    : { status: "invalid" };
}
