// One checked cell as a part of a script: its statements, what it takes from the library, which statement is its value.
import { type TS, ts } from "./typescript.ts";
import type { Values } from "./values.ts";
import { type Helpers, Writer } from "./write-out.ts";

export interface WrittenStatement {
  readonly text: string;
  /** Comments and empty lines in front of it. */
  readonly before: string;
  /** The expression is the value of the cell. */
  readonly isValue: boolean;
  readonly isImport: boolean;
}

export interface WrittenCell {
  readonly statements: readonly WrittenStatement[];
  /** Comments behind the last statement. */
  readonly after: string;
  /** Names of the library that the cell itself uses; types alone are told apart. */
  readonly library: readonly { readonly name: string; readonly isType: boolean }[];
  readonly helpers: Helpers;
}

export interface CellToWrite {
  readonly source: TS.SourceFile;
  /** Where the user's part of the source ends. */
  readonly userEnd: number;
  readonly checker: TS.TypeChecker;
  readonly values: Values;
  readonly operators: string | undefined;
  readonly library: ReadonlySet<string>;
  readonly rename: (name: string) => string;
}

export function writtenCell(cell: CellToWrite): WrittenCell {
  const { source, userEnd } = cell;
  const writer = new Writer({ ...cell, isTop: (symbol) => isTop(symbol, source) });
  const statements = source.statements.filter((statement) => statement.getStart(source) < userEnd);
  const last = statements.findLast((statement) => !ts.isEmptyStatement(statement));
  const written = statements
    .filter((statement) => !ts.isEmptyStatement(statement))
    .map((statement): WrittenStatement => {
      const isValue = statement === last && ts.isExpressionStatement(statement);
      return {
        before: source.text.slice(statement.getFullStart(), statement.getStart(source)).replace(/^[^\n]*\n/, ""),
        text: writer.write(isValue ? statement.expression : statement).trimEnd(),
        isValue,
        isImport: ts.isImportDeclaration(statement),
      };
    });
  const end = last && ts.isExpressionStatement(last) ? last.expression.end : (last?.end ?? 0);
  const after = source.text.slice(end, userEnd).replace(/^\s*;/, "");
  return { statements: written, after, library: libraryUses(cell), helpers: writer.helpers };
}

/** Names that are reached through a value or belong to a type, never by themselves. */
const MEMBER =
  ts.SymbolFlags.Property |
  ts.SymbolFlags.Method |
  ts.SymbolFlags.Accessor |
  ts.SymbolFlags.EnumMember |
  ts.SymbolFlags.TypeParameter;

/** Declared outside every function and block of the cell, or brought in behind it. */
function isTop(symbol: TS.Symbol, source: TS.SourceFile): boolean {
  if (symbol.flags & MEMBER) return false;
  return (symbol.declarations ?? []).some((declaration) => {
    if (declaration.getSourceFile() !== source) return false;
    for (let up: TS.Node = declaration; ; up = up.parent) {
      if (ts.isSourceFile(up.parent)) return true;
      if (ts.isFunctionLike(up.parent) || ts.isBlock(up.parent) || ts.isModuleBlock(up.parent)) return false;
      if (ts.isClassLike(up.parent) || ts.isForStatement(up.parent) || ts.isForOfStatement(up.parent)) return false;
    }
  });
}

/** What the machinery behind the cell imports from the library and the cell really means. */
function libraryUses({ source, userEnd, checker, library }: CellToWrite): WrittenCell["library"] {
  const used = new Map<string, boolean>();
  const see = (symbol: TS.Symbol | undefined) => {
    if (!symbol || !library.has(symbol.name)) return;
    const [declaration] = symbol.declarations ?? [];
    if (!declaration || declaration.getSourceFile() !== source || declaration.getStart(source) < userEnd) return;
    const meant = symbol.flags & ts.SymbolFlags.Alias ? checker.getAliasedSymbol(symbol) : symbol;
    used.set(symbol.name, (meant.flags & ts.SymbolFlags.Value) === 0);
  };
  const visit = (node: TS.Node): void => {
    if (node.getStart(source) >= userEnd) return;
    if (ts.isShorthandPropertyAssignment(node)) see(checker.getShorthandAssignmentValueSymbol(node));
    else if (ts.isIdentifier(node)) see(checker.getSymbolAtLocation(node));
    ts.forEachChild(node, visit);
  };
  visit(source);
  return [...used].map(([name, isType]) => ({ name, isType }));
}
