// `export` means nothing in a cell: it is blanked out. `export default e` is the value of the cell.
import type { Finding } from "./diagnostics.ts";
import type { Edit } from "./edits.ts";
import { type TS, ts } from "./typescript.ts";

export interface ExportEdits {
  readonly edits: Edit[];
  readonly refusals: Finding[];
}

const REEXPORT =
  "a cell exports to no one, so `export ... from` has no meaning here. Import the names instead: import { ... } from ...";

/** Edits that blank exports out, keeping all positions. */
export function exportEdits(source: TS.SourceFile): ExportEdits {
  const edits: Edit[] = [];
  const refusals: Finding[] = [];
  for (const statement of source.statements) {
    if (ts.isExportDeclaration(statement)) {
      const start = statement.getStart(source);
      if (statement.moduleSpecifier) {
        refusals.push({ code: "export", message: REEXPORT, start, length: statement.end - start });
      } else edits.push(blank(source, start, statement.end));
    } else if (ts.isExportAssignment(statement)) {
      edits.push(blank(source, statement.getStart(source), statement.expression.getStart(source)));
    } else edits.push(...modifierEdits(source, statement));
  }
  return { edits, refusals };
}

function modifierEdits(source: TS.SourceFile, statement: TS.Statement): Edit[] {
  const modifiers = ts.canHaveModifiers(statement) ? (ts.getModifiers(statement) ?? []) : [];
  const edits: Edit[] = [];
  for (const modifier of modifiers) {
    if (modifier.kind !== ts.SyntaxKind.ExportKeyword && modifier.kind !== ts.SyntaxKind.DefaultKeyword) continue;
    edits.push(blank(source, modifier.getStart(source), modifier.end));
  }
  const named = (statement as TS.DeclarationStatement).name !== undefined;
  const nameless = (ts.isFunctionDeclaration(statement) || ts.isClassDeclaration(statement)) && !named;
  const last = edits.at(-1);
  // `export default function () {}` is the value: an expression in parentheses.
  if (nameless && last) {
    edits[edits.length - 1] = { ...last, text: `${last.text.slice(0, -1)}(` };
    edits.push({ start: statement.end, end: statement.end, text: ")" });
  }
  return edits;
}

function blank(source: TS.SourceFile, start: number, end: number): Edit {
  return { start, end, text: source.text.slice(start, end).replace(/[^\r\n]/g, " ") };
}
