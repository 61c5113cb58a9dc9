// Rewrites a checked cell: variables of the notebook become boxes, and the cell becomes one function of its boxes.
//
// `let x = e` becomes `$rt.def($x, e)`, a use of x becomes `$x.v`. The checker says which identifier means which
// declaration, so shadowing, enum members and namespaces come out right.
import { declarationTarget, rewriteImport, rewriteVariables } from "./declarations.ts";
import { isReference, isWriteTarget, TopNames } from "./references.ts";
import { type TS, ts } from "./typescript.ts";

/** A box that the rewritten cell takes as parameter. */
export interface BoxUse {
  readonly name: string;
  /** Where the value of an undeclared use comes from; own declarations are always boxes of the notebook. */
  readonly origin: "notebook" | "library";
}

export interface Rewriting {
  readonly transformer: TS.TransformerFactory<TS.SourceFile>;
  /** Filled when the transformer has run: boxes in the order of the parameters behind `$rt`. */
  readonly boxes: BoxUse[];
  readonly prefix: string;
}

/** What the rest of the rewriting asks of one pass over one cell. */
export interface Pass {
  readonly factory: TS.NodeFactory;
  readonly checker: TS.TypeChecker;
  readonly names: TopNames;
  /** `$`, or more of them if the source has identifiers that begin so. */
  readonly prefix: string;
  visit<T extends TS.Node>(node: T): T;
  /** The box parameter of a name; using it makes it a parameter. */
  box(name: string, origin?: BoxUse["origin"]): TS.Identifier;
  /** `$rt.member(args)` */
  runtime(member: string, args: readonly TS.Expression[]): TS.CallExpression;
}

/**
 * The rewriting of a cell, as a transformer that runs before the compiler's own.
 *
 * `userEnd` is where the user's text ends in the checked text; what follows is machinery and is dropped.
 */
export function rewriteCell(
  source: TS.SourceFile,
  checker: TS.TypeChecker,
  userEnd: number,
  libraryNames: ReadonlySet<string>,
  custom?: (node: TS.Node, pass: Pass) => TS.Node | undefined,
): Rewriting {
  const boxes: BoxUse[] = [];
  const prefix = freePrefix(source.text);
  const transformer: TS.TransformerFactory<TS.SourceFile> = (context) => () => {
    const names = new TopNames(source, checker, userEnd, libraryNames);
    const pass = createPass(prefix, checker, names, context, boxes, custom);
    return context.factory.updateSourceFile(source, [cellFunction(source, userEnd, pass, boxes)]);
  };
  return { transformer, boxes, prefix };
}

function createPass(
  prefix: string,
  checker: TS.TypeChecker,
  names: TopNames,
  context: TS.TransformationContext,
  boxes: BoxUse[],
  custom: ((node: TS.Node, pass: Pass) => TS.Node | undefined) | undefined,
): Pass {
  const factory = context.factory;
  const pass: Pass = {
    factory,
    checker,
    names,
    prefix,
    visit: (node) => ts.visitNode(node, visitor) as typeof node,
    box(name, origin = "notebook") {
      if (!boxes.some((box) => box.name === name)) boxes.push({ name, origin });
      return factory.createIdentifier(prefix + name);
    },
    runtime: (member, args) =>
      factory.createCallExpression(
        factory.createPropertyAccessExpression(factory.createIdentifier(`${prefix}rt`), member),
        undefined,
        args,
      ),
  };
  const visitor = (node: TS.Node): TS.Node => {
    const special = custom?.(node, pass) ?? visitSpecial(node, pass);
    return special ?? ts.visitEachChild(node, visitor, context);
  };
  return pass;
}

/** A prefix with which no identifier of the source begins. */
function freePrefix(text: string): string {
  let prefix = "$";
  while (new RegExp(`(?<![\\p{ID_Continue}$])${prefix.replaceAll("$", "\\$")}`, "u").test(text)) prefix += "$";
  return prefix;
}

/** `([async] function ($rt, $x, ...) { "use strict"; ... })` */
function cellFunction(source: TS.SourceFile, userEnd: number, pass: Pass, boxes: BoxUse[]): TS.Statement {
  const { factory } = pass;
  const user = source.statements.filter((statement) => statement.getStart(source) < userEnd);
  const head: TS.Statement[] = [];
  const body: TS.Statement[] = [];
  const last = user.findLast((statement) => !ts.isEmptyStatement(statement));
  for (const statement of user) rewriteStatement(statement, statement === last, pass, head, body);
  const asynchronous = user.some(needsAsync);
  const parameter = (name: string) => factory.createParameterDeclaration(undefined, undefined, name);
  const cell = factory.createFunctionExpression(
    asynchronous ? [factory.createModifier(ts.SyntaxKind.AsyncKeyword)] : undefined,
    undefined,
    undefined,
    undefined,
    [`${pass.prefix}rt`, ...boxes.map((box) => pass.prefix + box.name)].map(parameter),
    undefined,
    factory.createBlock(
      [factory.createExpressionStatement(factory.createStringLiteral("use strict")), ...head, ...body],
      true,
    ),
  );
  return factory.createExpressionStatement(factory.createParenthesizedExpression(cell));
}

/** Appends the rewritten statement to `body`, and what is hoisted to `head`. */
function rewriteStatement(
  statement: TS.Statement,
  last: boolean,
  pass: Pass,
  head: TS.Statement[],
  body: TS.Statement[],
) {
  const { factory } = pass;
  const define = (name: string) =>
    factory.createExpressionStatement(pass.runtime("def", [pass.box(name), factory.createIdentifier(name)]));
  if (isAmbient(statement)) return;
  if (ts.isImportDeclaration(statement) || ts.isImportEqualsDeclaration(statement)) {
    head.push(...rewriteImport(statement, pass));
  } else if (ts.isVariableStatement(statement)) body.push(...rewriteVariables(statement, pass));
  else if (ts.isFunctionDeclaration(statement) && statement.name && statement.body) {
    head.push(define(statement.name.text));
    body.push(pass.visit(statement));
  } else if (isNamedDeclaration(statement)) body.push(pass.visit(statement), define(statement.name.text));
  else if (last && ts.isExpressionStatement(statement)) {
    const value = pass.runtime("result", [pass.visit(statement.expression)]);
    body.push(ts.setTextRange(factory.createExpressionStatement(value), statement));
  } else body.push(pass.visit(statement));
}

function isNamedDeclaration(
  statement: TS.Statement,
): statement is TS.Statement & { name: TS.Identifier } & (
    | TS.ClassDeclaration
    | TS.EnumDeclaration
    | TS.ModuleDeclaration
  ) {
  if (ts.isClassDeclaration(statement)) return statement.name !== undefined;
  if (ts.isEnumDeclaration(statement)) return true;
  return ts.isModuleDeclaration(statement) && ts.isIdentifier(statement.name) && instantiated(statement);
}

/** Whether a namespace leaves a value at run time (the compiler's own test). */
function instantiated(node: TS.ModuleDeclaration): boolean {
  const states = ts as unknown as { getModuleInstanceState(node: TS.ModuleDeclaration): number };
  return states.getModuleInstanceState(node) !== 0;
}

function isAmbient(statement: TS.Statement): boolean {
  if (ts.isInterfaceDeclaration(statement) || ts.isTypeAliasDeclaration(statement)) return true;
  return (
    ts.canHaveModifiers(statement) &&
    (ts.getModifiers(statement)?.some((modifier) => modifier.kind === ts.SyntaxKind.DeclareKeyword) ?? false)
  );
}

/** A top-level await, import, `for await` or `await using`. */
function needsAsync(node: TS.Node): boolean {
  if (ts.isAwaitExpression(node) || ts.isImportDeclaration(node)) return true;
  if (ts.isForOfStatement(node) && node.awaitModifier) return true;
  if (ts.isVariableDeclarationList(node) && (node.flags & ts.NodeFlags.BlockScoped) === ts.NodeFlags.AwaitUsing)
    return true;
  if (ts.isFunctionLike(node) || ts.isModuleBlock(node)) return false;
  return ts.forEachChild(node, needsAsync) ?? false;
}

/** The nodes that change; undefined: only their children may. */
function visitSpecial(node: TS.Node, pass: Pass): TS.Node | undefined {
  const { factory } = pass;
  if (ts.isTypeNode(node) && !ts.isExpressionWithTypeArguments(node)) return node;
  if (ts.isIdentifier(node)) return isReference(node) ? reference(node, pass) : node;
  if (ts.isShorthandPropertyAssignment(node)) return shorthand(node, pass);
  if (ts.isCallExpression(node)) return call(node, pass);
  if (ts.isTaggedTemplateExpression(node) && isBoxed(node.tag, pass)) {
    return factory.updateTaggedTemplateExpression(
      node,
      unbound(pass.visit(node.tag), pass),
      node.typeArguments,
      pass.visit(node.template),
    );
  }
  if (ts.isAwaitExpression(node) && atTop(node)) {
    const guarded = ts.setTextRange(pass.runtime("aw", [pass.visit(node.expression)]), node.expression);
    return factory.updateAwaitExpression(node, guarded);
  }
  if (ts.isForOfStatement(node) && node.awaitModifier && atTop(node)) {
    return factory.updateForOfStatement(
      node,
      node.awaitModifier,
      forInitializer(node.initializer, pass),
      pass.runtime("each", [pass.visit(node.expression)]),
      pass.visit(node.statement),
    );
  }
  if (ts.isVariableStatement(node) && isTopVar(node.declarationList, pass)) return varStatement(node, pass);
  if (ts.isVariableDeclarationList(node) && isTopVar(node, pass)) return forInitializer(node, pass);
  if (ts.isMetaProperty(node) && node.keywordToken === ts.SyntaxKind.ImportKeyword) {
    return factory.createPropertyAccessExpression(factory.createIdentifier(`${pass.prefix}rt`), "meta");
  }
  return undefined;
}

function reference(node: TS.Identifier, pass: Pass): TS.Node {
  const top = pass.names.resolve(node);
  if (!top) return node;
  // `c` is a setter that throws the language's TypeError.
  const member = top.constant && isWriteTarget(node) ? "c" : "v";
  const access = pass.factory.createPropertyAccessExpression(pass.box(top.name, top.origin), member);
  ts.setTextRange(access, node);
  return ts.isDecorator(node.parent) ? unbound(access, pass) : access;
}

function shorthand(node: TS.ShorthandPropertyAssignment, pass: Pass): TS.Node | undefined {
  const top = pass.names.resolveShorthand(node);
  if (!top) return undefined;
  const { factory } = pass;
  const access = ts.setTextRange(
    factory.createPropertyAccessExpression(pass.box(top.name, top.origin), "v"),
    node.name,
  );
  const value = node.objectAssignmentInitializer
    ? factory.createAssignment(access, pass.visit(node.objectAssignmentInitializer))
    : access;
  return ts.setTextRange(factory.createPropertyAssignment(factory.createIdentifier(node.name.text), value), node);
}

function call(node: TS.CallExpression, pass: Pass): TS.Node | undefined {
  const { factory } = pass;
  if (node.expression.kind === ts.SyntaxKind.ImportKeyword) {
    return ts.setTextRange(pass.runtime("import", node.arguments.map(pass.visit)), node);
  }
  if (!isBoxed(node.expression, pass)) return undefined;
  const callee = unbound(pass.visit(node.expression), pass);
  const args = node.arguments.map(pass.visit);
  return node.questionDotToken
    ? factory.updateCallChain(node as TS.CallChain, callee, node.questionDotToken, node.typeArguments, args)
    : factory.updateCallExpression(node, callee, node.typeArguments, args);
}

/** `(0, f)`: calls without a receiver. */
function unbound(callee: TS.Expression, pass: Pass): TS.Expression {
  const { factory } = pass;
  ts.setEmitFlags(callee, ts.EmitFlags.NoSourceMap);
  const pair = factory.createComma(factory.createNumericLiteral(0), callee);
  const inner = ts.setTextRange(factory.createParenthesizedExpression(pair), callee);
  // The engine places a call at the end of what it calls; the user's place is the beginning.
  return ts.setEmitFlags(inner, ts.EmitFlags.NoTrailingSourceMap);
}

function isBoxed(node: TS.Expression, pass: Pass): boolean {
  return ts.isIdentifier(node) && pass.names.resolve(node) !== undefined;
}

/** Whether no function stands between the node and the cell. */
function atTop(node: TS.Node): boolean {
  for (let up = node.parent; up; up = up.parent) {
    if (ts.isFunctionLike(up) || ts.isClassStaticBlockDeclaration(up)) return false;
    if (ts.isPropertyDeclaration(up)) return false;
  }
  return true;
}

function isTopVar(list: TS.VariableDeclarationList, pass: Pass): boolean {
  return pass.names.isTopVar(list);
}

/** A `var` statement inside a block: assignments. */
function varStatement(node: TS.VariableStatement, pass: Pass): TS.Node {
  const { factory } = pass;
  const parts = assignments(node.declarationList, pass);
  if (parts.length === 0) return factory.createEmptyStatement();
  return ts.setTextRange(factory.createExpressionStatement(sequence(parts, pass)), node);
}

function forInitializer(node: TS.ForInitializer, pass: Pass): TS.ForInitializer {
  if (!ts.isVariableDeclarationList(node) || !isTopVar(node, pass)) return pass.visit(node);
  const [first] = node.declarations;
  // `for (var x of ...)`, `for (var x in ...)`: the target alone.
  if (first && !ts.isForStatement(node.parent)) return declarationTarget(first.name, pass);
  const parts = assignments(node, pass);
  return parts.length > 0 ? sequence(parts, pass) : pass.factory.createVoidZero();
}

function assignments(list: TS.VariableDeclarationList, pass: Pass): TS.Expression[] {
  return list.declarations.flatMap((declaration) =>
    declaration.initializer
      ? [pass.factory.createAssignment(declarationTarget(declaration.name, pass), pass.visit(declaration.initializer))]
      : [],
  );
}

/** `a, b, c` */
function sequence(parts: readonly TS.Expression[], pass: Pass): TS.Expression {
  return parts.reduce((left, right) => pass.factory.createComma(left, right));
}
