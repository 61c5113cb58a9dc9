// What the text of a cell says by itself, before any check: the names it declares and the words it uses.
import { type TS, ts } from "./typescript.ts";

export type NameKind =
  | "const"
  | "let"
  | "var"
  | "function"
  | "class"
  | "enum"
  | "namespace"
  | "import"
  | "using"
  | "type";

export interface Declared {
  readonly name: string;
  readonly kind: NameKind;
  /** `declare ...`: nothing at run time. */
  readonly ambient: boolean;
}

export interface Outline {
  readonly source: TS.SourceFile;
  /** Names declared at the top of the cell, `var` in nested statements included. */
  readonly declared: ReadonlyMap<string, Declared>;
  /** Every identifier in the text; a superset of the names that it refers to. */
  readonly words: ReadonlySet<string>;
  /** Every string literal: module names among them. */
  readonly texts: ReadonlySet<string>;
  /** A `var` stands inside a block or a loop. */
  readonly nestedVar: boolean;
}

/** Parses a cell. Syntax errors are in `source.parseDiagnostics` of the result (see `syntaxErrors`). */
export function outline(code: string): Outline {
  const source = ts.createSourceFile("cell.ts", code, { languageVersion: ts.ScriptTarget.ES2023 }, true);
  const declared = new Map<string, Declared>();
  for (const statement of source.statements) declareStatement(statement, declared);
  const words = new Set<string>();
  const texts = new Set<string>();
  const nestedVar = walk(source, words, texts, declared);
  return { source, declared, words, texts, nestedVar };
}

/** Syntax errors of a parsed file. */
export function syntaxErrors(source: TS.SourceFile): readonly TS.DiagnosticWithLocation[] {
  // Present on every parsed file, though not in the public types.
  return (source as unknown as { parseDiagnostics: readonly TS.DiagnosticWithLocation[] }).parseDiagnostics;
}

function declareStatement(statement: TS.Statement, into: Map<string, Declared>): void {
  const ambient = hasModifier(statement, ts.SyntaxKind.DeclareKeyword);
  const add = (name: string, kind: NameKind) => {
    // A value wins over a type of the same name (interface and const, class and namespace).
    if (kind !== "type" || !into.has(name)) into.set(name, { name, kind, ambient });
  };
  if (ts.isVariableStatement(statement)) {
    const kind = listKind(statement.declarationList);
    for (const { name } of statement.declarationList.declarations) bindingNames(name, (text) => add(text, kind));
  } else if (ts.isFunctionDeclaration(statement)) {
    if (statement.name) add(statement.name.text, "function");
  } else if (ts.isClassDeclaration(statement)) {
    if (statement.name) add(statement.name.text, "class");
  } else if (ts.isEnumDeclaration(statement)) add(statement.name.text, "enum");
  else if (ts.isInterfaceDeclaration(statement) || ts.isTypeAliasDeclaration(statement))
    add(statement.name.text, "type");
  else if (ts.isModuleDeclaration(statement)) {
    if (ts.isIdentifier(statement.name) && statement.name.text !== "global") {
      add(statement.name.text, isTypeNamespace(statement) ? "type" : "namespace");
    }
  } else if (ts.isImportEqualsDeclaration(statement)) add(statement.name.text, "import");
  else if (ts.isImportDeclaration(statement)) importNames(statement, (name) => add(name, "import"));
}

/** `let`, `const`, `var` or `using` of a declaration list; `await using` counts as `using`. */
export function listKind(list: TS.VariableDeclarationList): "const" | "let" | "var" | "using" {
  const using = list.flags & ts.NodeFlags.BlockScoped;
  if (using === ts.NodeFlags.Using || using === ts.NodeFlags.AwaitUsing) return "using";
  if (using === ts.NodeFlags.Const) return "const";
  return using === ts.NodeFlags.Let ? "let" : "var";
}

/** Every name that a binding pattern binds. */
export function bindingNames(name: TS.BindingName, add: (name: string) => void): void {
  if (ts.isIdentifier(name)) add(name.text);
  else for (const element of name.elements) if (ts.isBindingElement(element)) bindingNames(element.name, add);
}

/** The names that an import declaration binds, type-only ones included. */
export function importNames(statement: TS.ImportDeclaration, add: (name: string) => void): void {
  const clause = statement.importClause;
  if (!clause) return;
  if (clause.name) add(clause.name.text);
  const bindings = clause.namedBindings;
  if (!bindings) return;
  if (ts.isNamespaceImport(bindings)) add(bindings.name.text);
  else for (const element of bindings.elements) add(element.name.text);
}

export function hasModifier(node: TS.Node, kind: TS.SyntaxKind): boolean {
  return ts.canHaveModifiers(node) && (ts.getModifiers(node)?.some((modifier) => modifier.kind === kind) ?? false);
}

/** A namespace that holds types only leaves nothing at run time. */
function isTypeNamespace(node: TS.ModuleDeclaration): boolean {
  const body = node.body;
  if (!body) return true;
  if (ts.isModuleDeclaration(body)) return isTypeNamespace(body);
  return (
    ts.isModuleBlock(body) &&
    body.statements.every(
      (statement) =>
        ts.isInterfaceDeclaration(statement) ||
        ts.isTypeAliasDeclaration(statement) ||
        (ts.isModuleDeclaration(statement) && isTypeNamespace(statement)),
    )
  );
}

/** Collects identifiers, strings, and `var` names outside functions; answers whether one is inside a block. */
function walk(root: TS.Node, words: Set<string>, texts: Set<string>, declared: Map<string, Declared>): boolean {
  let nested = false;
  const visit = (node: TS.Node, inFunction: boolean): void => {
    if (ts.isIdentifier(node)) words.add(node.text);
    else if (ts.isStringLiteral(node)) texts.add(node.text);
    else if (!inFunction && ts.isVariableDeclarationList(node) && listKind(node) === "var") {
      const atTop = ts.isVariableStatement(node.parent) && node.parent.parent === root;
      if (!atTop) nested = true;
      const ambient = ts.isVariableStatement(node.parent) && hasModifier(node.parent, ts.SyntaxKind.DeclareKeyword);
      for (const { name } of node.declarations) {
        bindingNames(name, (text) => declared.set(text, { name: text, kind: "var", ambient }));
      }
    }
    const inside = inFunction || ts.isFunctionLike(node) || ts.isModuleBlock(node) || ts.isClassLike(node);
    ts.forEachChild(node, (child) => visit(child, inside));
  };
  visit(root, false);
  return nested;
}
