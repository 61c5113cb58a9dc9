// Which identifiers are uses of a variable, and which variable of the notebook they mean.
import { listKind } from "./outline.ts";
import { type TS, ts } from "./typescript.ts";

export interface TopName {
  readonly name: string;
  readonly origin: "notebook" | "library";
  readonly constant: boolean;
}

/** Names that live in boxes, as one cell sees them. */
export class TopNames {
  readonly #source: TS.SourceFile;
  readonly #checker: TS.TypeChecker;
  readonly #userEnd: number;
  readonly #library: ReadonlySet<string>;

  /** `library`: names that the machinery behind `userEnd` imports from the library. */
  constructor(source: TS.SourceFile, checker: TS.TypeChecker, userEnd: number, library: ReadonlySet<string>) {
    this.#source = source;
    this.#checker = checker;
    this.#userEnd = userEnd;
    this.#library = library;
  }

  /** The boxed name that a reference means; undefined if it is local or a true global. */
  resolve(node: TS.Identifier): TopName | undefined {
    return this.#top(this.#checker.getSymbolAtLocation(node));
  }

  resolveShorthand(node: TS.ShorthandPropertyAssignment): TopName | undefined {
    return this.#top(this.#checker.getShorthandAssignmentValueSymbol(node));
  }

  /** Whether a declaration list is a `var` outside functions, hence one of the cell's top names. */
  isTopVar(list: TS.VariableDeclarationList): boolean {
    return listKind(list) === "var" && scopeOfVar(list) === this.#source;
  }

  #top(symbol: TS.Symbol | undefined): TopName | undefined {
    for (const declaration of symbol?.declarations ?? []) {
      if (declaration.getSourceFile() !== this.#source) continue;
      const found = this.#declared(declaration, (symbol as TS.Symbol).name);
      if (found) return found;
    }
    return undefined;
  }

  #declared(declaration: TS.Declaration, name: string): TopName | undefined {
    const machinery = declaration.getStart(this.#source) >= this.#userEnd;
    const origin = machinery && this.#library.has(name) ? "library" : "notebook";
    if (ts.isImportSpecifier(declaration) || ts.isNamespaceImport(declaration) || ts.isImportClause(declaration)) {
      return { name, origin, constant: true };
    }
    if (ts.isImportEqualsDeclaration(declaration)) return { name, origin, constant: true };
    if (ts.isVariableDeclaration(declaration) || ts.isBindingElement(declaration)) {
      return this.#variable(declaration, name, machinery);
    }
    if (declaration.parent !== this.#source) return undefined;
    if (ts.isFunctionDeclaration(declaration)) return { name, origin, constant: false };
    if (
      ts.isClassDeclaration(declaration) ||
      ts.isEnumDeclaration(declaration) ||
      ts.isModuleDeclaration(declaration)
    ) {
      return isDeclare(declaration) ? undefined : { name, origin, constant: false };
    }
    return undefined;
  }

  #variable(
    declaration: TS.VariableDeclaration | TS.BindingElement,
    name: string,
    machinery: boolean,
  ): TopName | undefined {
    let up: TS.Node = declaration;
    while (!ts.isVariableDeclarationList(up)) {
      // Parameters and catch clauses bind names too.
      if (ts.isParameter(up) || ts.isCatchClause(up) || ts.isSourceFile(up)) return undefined;
      up = up.parent;
    }
    const kind = listKind(up);
    if (kind === "using") return undefined;
    const statement = up.parent;
    const ambient = ts.isVariableStatement(statement) && isDeclare(statement) && !machinery;
    const atTop = kind === "var" ? scopeOfVar(up) === this.#source : statement.parent === this.#source;
    if (!atTop || ambient || (kind !== "var" && !ts.isVariableStatement(statement))) return undefined;
    return { name, origin: "notebook", constant: kind === "const" };
  }
}

function isDeclare(node: TS.Node): boolean {
  return (
    ts.canHaveModifiers(node) &&
    (ts.getModifiers(node)?.some((modifier) => modifier.kind === ts.SyntaxKind.DeclareKeyword) ?? false)
  );
}

function scopeOfVar(list: TS.Node): TS.Node {
  let up = list.parent;
  while (!ts.isSourceFile(up) && !ts.isFunctionLike(up) && !ts.isModuleBlock(up)) {
    if (ts.isClassStaticBlockDeclaration(up)) return up;
    up = up.parent;
  }
  return up;
}

/** Whether an identifier stands for a value, and is not the name of a property, a declaration or a label. */
export function isReference(node: TS.Identifier): boolean {
  const parent = node.parent as TS.Node & { name?: TS.Node; propertyName?: TS.Node; label?: TS.Node };
  if (!parent) return false;
  if (parent.name === node || parent.propertyName === node || parent.label === node) return false;
  if (ts.isQualifiedName(parent) || ts.isImportClause(parent)) return false;
  if (insideOwnDeclaration(node)) return false;
  return true;
}

/** Inside a class, enum or namespace its own name is the local binding: the box is filled only behind it. */
function insideOwnDeclaration(node: TS.Identifier): boolean {
  for (let up: TS.Node = node.parent; up; up = up.parent) {
    if (!ts.isSourceFile(up.parent ?? up)) continue;
    if (!(ts.isClassDeclaration(up) || ts.isEnumDeclaration(up) || ts.isModuleDeclaration(up))) return false;
    return up.name !== undefined && ts.isIdentifier(up.name) && up.name.text === node.text;
  }
  return false;
}

/** Whether the identifier is assigned to. */
export function isWriteTarget(node: TS.Identifier): boolean {
  const parent = node.parent;
  if (ts.isBinaryExpression(parent)) {
    const operator = parent.operatorToken.kind;
    return (
      parent.left === node && operator >= ts.SyntaxKind.FirstAssignment && operator <= ts.SyntaxKind.LastAssignment
    );
  }
  return (
    (ts.isPrefixUnaryExpression(parent) || ts.isPostfixUnaryExpression(parent)) &&
    (parent.operator === ts.SyntaxKind.PlusPlusToken || parent.operator === ts.SyntaxKind.MinusMinusToken)
  );
}
