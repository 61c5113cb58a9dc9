// Declarations at the top of a cell, as definitions of boxes.

import { listKind } from "./outline.ts";
import type { Pass } from "./rewrite.ts";
import { type TS, ts } from "./typescript.ts";

/** `let a = 1, {b} = o` becomes a statement a declarator, in order; `using` stays as it is. */
export function rewriteVariables(statement: TS.VariableStatement, pass: Pass): TS.Statement[] {
  const kind = listKind(statement.declarationList);
  if (kind === "using") return [pass.visit(statement)];
  return statement.declarationList.declarations.flatMap((declaration) => {
    const expression = definition(declaration, kind, pass);
    if (!expression) return [];
    return [ts.setTextRange(pass.factory.createExpressionStatement(expression), declaration)];
  });
}

function definition(declaration: TS.VariableDeclaration, kind: string, pass: Pass): TS.Expression | undefined {
  const { factory } = pass;
  if (ts.isIdentifier(declaration.name)) {
    const name = declaration.name.text;
    if (!declaration.initializer) {
      return kind === "var" ? pass.runtime("hoist", [pass.box(name)]) : pass.runtime("def", [pass.box(name)]);
    }
    return ts.setTextRange(
      pass.runtime("def", [pass.box(name), named(declaration.initializer, name, pass)]),
      declaration,
    );
  }
  if (!declaration.initializer) return undefined;
  const target = declarationTarget(declaration.name, pass);
  return factory.createParenthesizedExpression(factory.createAssignment(target, pass.visit(declaration.initializer)));
}

/** Keeps the name of an anonymous function or class: `{ f: () => 1 }.f`. */
function named(initializer: TS.Expression, name: string, pass: Pass): TS.Expression {
  const { factory } = pass;
  const value = pass.visit(initializer);
  if (!isAnonymousDefinition(initializer)) return value;
  const key = factory.createComputedPropertyName(factory.createStringLiteral(name));
  const holder = factory.createObjectLiteralExpression([factory.createPropertyAssignment(key, value)]);
  return factory.createElementAccessExpression(
    factory.createParenthesizedExpression(holder),
    factory.createStringLiteral(name),
  );
}

function isAnonymousDefinition(node: TS.Expression): boolean {
  const inner = ts.skipPartiallyEmittedExpressions(node) as TS.Expression;
  if (ts.isParenthesizedExpression(inner)) return isAnonymousDefinition(inner.expression);
  if (ts.isArrowFunction(inner)) return true;
  return (ts.isFunctionExpression(inner) || ts.isClassExpression(inner)) && inner.name === undefined;
}

/** The assignment pattern that defines the boxes of a binding name: `[$rt.to($a).v, ...]`. */
export function declarationTarget(name: TS.BindingName, pass: Pass): TS.Expression {
  const { factory } = pass;
  if (ts.isIdentifier(name)) {
    return ts.setTextRange(
      factory.createPropertyAccessExpression(pass.runtime("to", [pass.box(name.text)]), "v"),
      name,
    );
  }
  if (ts.isArrayBindingPattern(name)) {
    return factory.createArrayLiteralExpression(
      name.elements.map((element) =>
        ts.isBindingElement(element) ? arrayElement(element, pass) : factory.createOmittedExpression(),
      ),
    );
  }
  return factory.createObjectLiteralExpression(name.elements.map((element) => objectElement(element, pass)));
}

function arrayElement(element: TS.BindingElement, pass: Pass): TS.Expression {
  const target = withDefault(element, pass);
  return element.dotDotDotToken ? pass.factory.createSpreadElement(target) : target;
}

function objectElement(element: TS.BindingElement, pass: Pass): TS.ObjectLiteralElementLike {
  const { factory } = pass;
  const target = withDefault(element, pass);
  if (element.dotDotDotToken) return factory.createSpreadAssignment(target);
  const key = element.propertyName
    ? pass.visit(element.propertyName)
    : factory.createIdentifier((element.name as TS.Identifier).text);
  return factory.createPropertyAssignment(key, target);
}

function withDefault(element: TS.BindingElement, pass: Pass): TS.Expression {
  const target = declarationTarget(element.name, pass);
  if (!element.initializer) return target;
  const value = ts.isIdentifier(element.name)
    ? named(element.initializer, element.name.text, pass)
    : pass.visit(element.initializer);
  return pass.factory.createAssignment(target, value);
}

/** A static import becomes an awaited import at the top, and definitions of what it binds. */
export function rewriteImport(
  statement: TS.ImportDeclaration | TS.ImportEqualsDeclaration,
  pass: Pass,
): TS.Statement[] {
  const { factory } = pass;
  if (ts.isImportEqualsDeclaration(statement)) {
    const reference = statement.moduleReference;
    if (!ts.isExternalModuleReference(reference)) {
      return statement.isTypeOnly ? [] : [define(pass, statement.name, pass.visit(entityExpression(reference, pass)))];
    }
    return [define(pass, statement.name, pass.runtime("require", [reference.expression]))];
  }
  const clause = statement.importClause;
  if (clause?.phaseModifier === ts.SyntaxKind.TypeKeyword) return [];
  const wanted = clause ? importedValues(clause, pass) : [];
  // An import of types alone leaves nothing; one without bindings runs the module.
  if (clause && wanted.length === 0 && hasBindings(clause)) return [];
  const module = factory.createUniqueName("module");
  const attributes = statement.attributes ? [attributesObject(statement.attributes, pass)] : [];
  const awaited = factory.createAwaitExpression(
    pass.runtime("aw", [pass.runtime("import", [statement.moduleSpecifier, ...attributes])]),
  );
  const list = factory.createVariableDeclarationList(
    [factory.createVariableDeclaration(module, undefined, undefined, awaited)],
    ts.NodeFlags.Const,
  );
  const load = ts.setTextRange(factory.createVariableStatement(undefined, list), statement);
  return [
    load,
    ...wanted.map(({ local, member }) =>
      define(
        pass,
        local,
        member === undefined
          ? module
          : factory.createElementAccessExpression(module, factory.createStringLiteral(member)),
      ),
    ),
  ];
}

function define(pass: Pass, local: TS.Identifier, value: TS.Expression): TS.Statement {
  const call = pass.runtime("def", [pass.box(local.text), value]);
  return ts.setTextRange(pass.factory.createExpressionStatement(call), local);
}

function hasBindings(clause: TS.ImportClause): boolean {
  const named = clause.namedBindings;
  return (
    clause.name !== undefined || (named !== undefined && (ts.isNamespaceImport(named) || named.elements.length > 0))
  );
}

/** The bindings of an import that have a value; `member` undefined is the module itself. */
function importedValues(clause: TS.ImportClause, pass: Pass): { local: TS.Identifier; member: string | undefined }[] {
  const found: { local: TS.Identifier; member: string | undefined }[] = [];
  if (clause.name && isValue(clause.name, pass)) found.push({ local: clause.name, member: "default" });
  const named = clause.namedBindings;
  if (!named) return found;
  if (ts.isNamespaceImport(named)) return [...found, { local: named.name, member: undefined }];
  for (const element of named.elements) {
    if (element.isTypeOnly || !isValue(element.name, pass)) continue;
    found.push({ local: element.name, member: (element.propertyName ?? element.name).text });
  }
  return found;
}

function isValue(name: TS.Identifier, pass: Pass): boolean {
  const symbol = pass.checker.getSymbolAtLocation(name);
  if (!symbol) return true;
  const target = symbol.flags & ts.SymbolFlags.Alias ? pass.checker.getAliasedSymbol(symbol) : symbol;
  // An unresolved name (a module without types) counts as a value.
  return (target.flags & ts.SymbolFlags.Value) !== 0 || pass.checker.isUnknownSymbol(target);
}

function attributesObject(attributes: TS.ImportAttributes, pass: Pass): TS.Expression {
  const { factory } = pass;
  const entries = attributes.elements.map((entry) =>
    factory.createPropertyAssignment(entry.name as TS.PropertyName, entry.value),
  );
  return factory.createObjectLiteralExpression([
    factory.createPropertyAssignment("with", factory.createObjectLiteralExpression(entries)),
  ]);
}

function entityExpression(name: TS.EntityName, pass: Pass): TS.Expression {
  if (ts.isIdentifier(name)) return name;
  return pass.factory.createPropertyAccessExpression(entityExpression(name.left, pass), name.right);
}
