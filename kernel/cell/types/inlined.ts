// Names of earlier cells written out in a later one. A name that is imported from the file of its cell makes the compiler
// build its program anew from every file, as long as the check itself; one whose declaration stands in the cell itself costs nothing.
import type { Declared } from "./outline.ts";
import { type TS, ts } from "./typescript.ts";

/** The library's module, as declarations of cells name it. */
const LIBRARY = "halfperiod";

/** A declaration that means the same wherever it stands, if its free names do. */
export interface Inlined {
  /** Statements; a mark stands where the namespace of the library goes. */
  readonly text: string;
  /** Names of the language and of Node that it uses. */
  readonly free: ReadonlySet<string>;
}

const MARK = "\0";

/** The declaration with the library under the given name. */
export function inlinedText({ text }: Inlined, library: string): string {
  return text.replaceAll(MARK, library);
}

/** Declarations of a committed cell that need nothing else of it, by name: those of values whose types are spelled out. */
export function inlinable(text: string, names: readonly Declared[]): ReadonlyMap<string, Inlined> {
  const source = ts.createSourceFile("cell.d.ts", text, ts.ScriptTarget.ES2023, true);
  const wanted = new Set(names.filter(({ kind }) => /^(?:const|let|var|function)$/.test(kind)).map(({ name }) => name));
  const cell = new CellDeclarations(source);
  const found = new Map<string, Inlined>();
  const refused = new Set<string>();
  for (const statement of source.statements) {
    for (const { name, node, lead, trail } of declarationsIn(statement)) {
      if (!wanted.has(name)) continue;
      const piece = cell.inlined(node);
      const before = found.get(name);
      if (!piece) refused.add(name);
      else {
        const written = `${lead}${piece.text}${trail}`;
        // Overloads of a function.
        const all = before ? `${before.text}\n${written}` : written;
        found.set(name, { text: all, free: new Set([...(before?.free ?? []), ...piece.free]) });
      }
    }
  }
  for (const name of refused) found.delete(name);
  return found;
}

interface Piece {
  readonly name: string;
  readonly node: TS.Node;
  readonly lead: string;
  readonly trail: string;
}

function declarationsIn(statement: TS.Statement): Piece[] {
  if (ts.isFunctionDeclaration(statement) && statement.name) {
    return [{ name: statement.name.text, node: statement, lead: "", trail: "" }];
  }
  if (!ts.isVariableStatement(statement)) return [];
  const comment = /\/\*\*[\s\S]*?\*\//.exec(statement.getFullText().slice(0, statement.getLeadingTriviaWidth()))?.[0];
  const keyword = (statement.declarationList.flags & ts.NodeFlags.Const) !== 0 ? "const" : "let";
  return statement.declarationList.declarations.flatMap((node) => {
    if (!ts.isIdentifier(node.name)) return [];
    return [{ name: node.name.text, node, lead: `${comment ?? ""}declare ${keyword} `, trail: ";" }];
  });
}

/** What the names in the declarations of a cell mean. */
class CellDeclarations {
  readonly #source: TS.SourceFile;
  /** Names declared there or imported from elsewhere: they mean nothing in another file. */
  readonly #own = new Set<string>();
  /** Names imported from the library, with what they are called there; "" for the library as a whole. */
  readonly #library = new Map<string, string>();

  constructor(source: TS.SourceFile) {
    this.#source = source;
    for (const statement of source.statements) {
      if (ts.isImportDeclaration(statement)) this.#import(statement);
      else for (const name of topNames(statement)) this.#own.add(name);
    }
  }

  #import({ moduleSpecifier, importClause }: TS.ImportDeclaration): void {
    const fromLibrary = ts.isStringLiteral(moduleSpecifier) && moduleSpecifier.text === LIBRARY;
    const bindings = importClause?.namedBindings;
    if (importClause?.name) this.#own.add(importClause.name.text);
    if (!bindings) return;
    if (ts.isNamespaceImport(bindings)) {
      if (fromLibrary) this.#library.set(bindings.name.text, "");
      else this.#own.add(bindings.name.text);
      return;
    }
    for (const { name, propertyName } of bindings.elements) {
      if (fromLibrary) this.#library.set(name.text, (propertyName ?? name).text);
      else this.#own.add(name.text);
    }
  }

  /** The text of a declaration; undefined if it needs what stands around it. */
  inlined(node: TS.Node): Inlined | undefined {
    const edits: { start: number; end: number; text: string }[] = [];
    const free = new Set<string>();
    const bound = typeParametersIn(node);
    const name = (identifier: TS.Identifier): boolean => {
      if (bound.has(identifier.text)) return true;
      const library = this.#library.get(identifier.text);
      if (library !== undefined) {
        const text = library === "" ? MARK : `${MARK}.${library}`;
        edits.push({ start: identifier.getStart(this.#source), end: identifier.end, text });
        return true;
      }
      free.add(identifier.text);
      return !this.#own.has(identifier.text);
    };
    const visit = (inner: TS.Node): boolean => {
      if (ts.isImportTypeNode(inner)) {
        if (!isLibraryType(inner)) return false;
        edits.push({
          start: inner.getStart(this.#source),
          end: inner.qualifier.getStart(this.#source),
          text: `${MARK}.`,
        });
        return (inner.typeArguments ?? []).every(visit);
      }
      // Each declaration of such a symbol is another one.
      if (ts.isTypeOperatorNode(inner) && inner.operator === ts.SyntaxKind.UniqueKeyword) return false;
      const first = leftmostName(inner);
      if (first && !name(first)) return false;
      return ts.forEachChild(inner, (child) => !visit(child)) !== true;
    };
    if (!visit(node)) return undefined;
    const from = ts.isVariableDeclaration(node) ? node.getStart(this.#source) : node.getFullStart();
    let text = "";
    let at = from;
    for (const edit of edits.sort((a, b) => a.start - b.start)) {
      text += this.#source.text.slice(at, edit.start) + edit.text;
      at = edit.end;
    }
    return { text: (text + this.#source.text.slice(at, node.end)).trim(), free };
  }
}

/** `import("halfperiod").Real` */
function isLibraryType(node: TS.ImportTypeNode): node is TS.ImportTypeNode & { readonly qualifier: TS.EntityName } {
  const { argument, qualifier } = node;
  const names = ts.isLiteralTypeNode(argument) && ts.isStringLiteral(argument.literal) ? argument.literal.text : "";
  return names === LIBRARY && qualifier !== undefined;
}

/** The name in scope that a node refers to, a type or (in `typeof x` and `[x]`) a value. */
function leftmostName(node: TS.Node): TS.Identifier | undefined {
  let at: TS.Node;
  if (ts.isTypeReferenceNode(node)) at = node.typeName;
  else if (ts.isTypeQueryNode(node)) at = node.exprName;
  else if (ts.isExpressionWithTypeArguments(node) || ts.isComputedPropertyName(node)) at = node.expression;
  else return undefined;
  while (ts.isQualifiedName(at) || ts.isPropertyAccessExpression(at))
    at = ts.isQualifiedName(at) ? at.left : at.expression;
  return ts.isIdentifier(at) ? at : undefined;
}

/** Names that a declaration binds itself: type parameters, `infer`, keys of mapped types, and parameters for `typeof`. */
function typeParametersIn(node: TS.Node): ReadonlySet<string> {
  const names = new Set<string>();
  const visit = (inner: TS.Node): void => {
    if (ts.isTypeParameterDeclaration(inner)) names.add(inner.name.text);
    else if (ts.isParameter(inner) && ts.isIdentifier(inner.name)) names.add(inner.name.text);
    ts.forEachChild(inner, visit);
  };
  visit(node);
  return names;
}

function topNames(statement: TS.Statement): string[] {
  if (ts.isVariableStatement(statement)) {
    return statement.declarationList.declarations.flatMap(({ name }) => (ts.isIdentifier(name) ? [name.text] : []));
  }
  const { name } = statement as unknown as { readonly name?: TS.Node };
  return name && ts.isIdentifier(name) ? [name.text] : [];
}
