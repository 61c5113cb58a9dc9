// Operators directed by types, second half: what runs. Native where both operands are proved plain, so that loops over
// numbers cost nothing; dispatch where one is, or may be, a library value. Exact literals are found on the way.
import { declaredTypes } from "./declared-type.ts";
import { type Fraction, fractionText, isSafeInteger, literalValue } from "./literals.ts";
import { type OperatorCall, operatorCall, unwrap } from "./operator-call.ts";
import { COMPOUND_TOKENS, TOKENS } from "./operators.ts";
import type { Pass } from "./rewrite.ts";
import { type TS, ts } from "./typescript.ts";
import type { Values } from "./values.ts";

/** Emits the operators of one cell; for `rewriteCell`. */
export function emitOperators(prefix: string, values: Values): (node: TS.Node, pass: Pass) => TS.Node | undefined {
  return (node, pass) => {
    if (ts.isExpression(node)) {
      const literal = exactLiteral(node, prefix, values, pass);
      if (literal) return literal;
    }
    if (ts.isBinaryExpression(node) && node.operatorToken.kind === ts.SyntaxKind.EqualsToken) {
      const call = operatorCall(node.right, prefix);
      if (call?.compound) return compoundAssignment(node, call, values, pass);
    }
    const call = operatorCall(node, prefix);
    return call && operation(call, values, pass);
  };
}

function operation(call: OperatorCall, values: Values, pass: Pass): TS.Expression {
  const { factory } = pass;
  const operands = call.operands.map((operand) => pass.visit(operand)) as [TS.Expression, TS.Expression];
  if (!isNative(call, values)) return ts.setTextRange(dispatch(call.name, operands, pass), call.node);
  const native =
    call.name === "neg"
      ? factory.createPrefixUnaryExpression(ts.SyntaxKind.MinusToken, operands[0])
      : factory.createBinaryExpression(operands[0], TOKENS.get(call.name) as TS.BinaryOperator, operands[1]);
  return ts.setTextRange(native, call.node);
}

/** `$rt.op.add(a, b)` */
function dispatch(name: string, operands: readonly TS.Expression[], pass: Pass): TS.Expression {
  const { factory } = pass;
  const operators = factory.createPropertyAccessExpression(factory.createIdentifier(`${pass.prefix}rt`), "op");
  return factory.createCallExpression(factory.createPropertyAccessExpression(operators, name), undefined, operands);
}

/** Whether the language's own operator does what the user means. */
export function isNative(call: OperatorCall, values: Values): boolean {
  const types = call.operands.map((operand) => values.typeOf(operand));
  if (types.every((type) => values.isPlain(type))) return true;
  const text = call.name === "add" && types.some((type) => values.isText(type));
  return text && types.every((type) => !values.isAny(type) && !values.mayBeLibrary(type));
}

/** `a op= e`; object, key and old value come before e, as in the language. */
function compoundAssignment(
  node: TS.BinaryExpression,
  call: OperatorCall,
  values: Values,
  pass: Pass,
): TS.Expression | undefined {
  const { factory } = pass;
  const operand = call.operands[1] as TS.Expression;
  if (isNative(call, values)) {
    const token = COMPOUND_TOKENS.get(call.name) as TS.BinaryOperator;
    return ts.setTextRange(factory.createBinaryExpression(pass.visit(node.left), token, pass.visit(operand)), node);
  }
  const target = unwrap(node.left);
  if (isSimpleTarget(target)) {
    const value = dispatch(call.name, [pass.visit(node.left), pass.visit(operand)], pass);
    return ts.setTextRange(factory.createAssignment(pass.visit(node.left), value), node);
  }
  const held = heldTarget(target, pass);
  if (held) {
    const value = dispatch(call.name, [held.again, pass.visit(operand)], pass);
    return ts.setTextRange(factory.createAssignment(held.first, value), node);
  }
  const [object, key] = splitTarget(target as TS.PropertyAccessExpression | TS.ElementAccessExpression, pass);
  const into = pass.runtime("into", [object, key]);
  const update = factory.createCallExpression(factory.createPropertyAccessExpression(into, call.name), undefined, [
    pass.visit(operand),
  ]);
  return ts.setTextRange(update, node);
}

/** A target that may be evaluated twice: a variable, or a named member of a variable, this or super. */
function isSimpleTarget(target: TS.Node): boolean {
  if (ts.isIdentifier(target)) return true;
  if (!ts.isPropertyAccessExpression(target)) return false;
  const { kind } = target.expression;
  return (
    ts.isIdentifier(target.expression) || kind === ts.SyntaxKind.ThisKeyword || kind === ts.SyntaxKind.SuperKeyword
  );
}

/**
 * A target that no helper can reach: a private member, or an element of super. What it hangs on is evaluated once and held
 * in `$rt.held`, from which the old value is read before anything else runs: `($rt.held = f()).#p = add($rt.held.#p, v)`.
 */
function heldTarget(target: TS.Node, pass: Pass): { first: TS.Expression; again: TS.Expression } | undefined {
  const { factory } = pass;
  const held = () => factory.createPropertyAccessExpression(factory.createIdentifier(`${pass.prefix}rt`), "held");
  const hold = (value: TS.Expression) =>
    factory.createParenthesizedExpression(factory.createAssignment(held(), pass.visit(value)));
  if (ts.isPropertyAccessExpression(target) && ts.isPrivateIdentifier(target.name)) {
    const member = (object: TS.Expression) => factory.createPropertyAccessExpression(object, target.name);
    return { first: member(hold(target.expression)), again: member(held()) };
  }
  if (ts.isElementAccessExpression(target) && target.expression.kind === ts.SyntaxKind.SuperKeyword) {
    const element = (key: TS.Expression) => factory.createElementAccessExpression(factory.createSuper(), key);
    return { first: element(hold(target.argumentExpression)), again: element(held()) };
  }
  return undefined;
}

function splitTarget(
  target: TS.PropertyAccessExpression | TS.ElementAccessExpression,
  pass: Pass,
): [TS.Expression, TS.Expression] {
  const object = pass.visit(target.expression);
  if (ts.isElementAccessExpression(target)) return [object, pass.visit(target.argumentExpression)];
  return [object, pass.factory.createStringLiteral(target.name.text)];
}

/** The value of a maximal tree of literals that meets a library value; undefined for any other node. */
export function exactValue(
  node: TS.Expression,
  prefix: string,
  values: Values,
  checker: TS.TypeChecker,
): Fraction | undefined {
  if (!startsLiteral(node, prefix)) return undefined;
  const value = literalValue(node, prefix);
  if (!value) return undefined;
  if (meetsLibrary(node, prefix, values, checker)) return value;
  // A safe integer is exact as it stands; for others the declaration may know more than what was inferred from the literal.
  const declared = isSafeInteger(value) || operatorCall(node.parent, prefix) ? [] : declaredTypes(node, checker);
  return declared.some((type) => values.takesRational(type)) ? value : undefined;
}

/** A maximal tree of literals that meets a library value: as an operand, or where a library number is taken. */
function exactLiteral(node: TS.Expression, prefix: string, values: Values, pass: Pass): TS.Expression | undefined {
  const value = exactValue(node, prefix, values, pass.checker);
  if (!value) return undefined;
  const { factory } = pass;
  if (!isSafeInteger(value)) {
    return ts.setTextRange(pass.runtime("rational", [factory.createStringLiteral(fractionText(value))]), node);
  }
  const whole = Number(value.num / value.den);
  const positive = factory.createNumericLiteral(Math.abs(whole));
  return ts.setTextRange(
    whole < 0 ? factory.createPrefixUnaryExpression(ts.SyntaxKind.MinusToken, positive) : positive,
    node,
  );
}

function startsLiteral(node: TS.Expression, prefix: string): boolean {
  return (
    ts.isNumericLiteral(node) ||
    ts.isPrefixUnaryExpression(node) ||
    ts.isParenthesizedExpression(node) ||
    operatorCall(node, prefix) !== undefined
  );
}

function meetsLibrary(node: TS.Expression, prefix: string, values: Values, checker: TS.TypeChecker): boolean {
  const call = operatorCall(node.parent, prefix);
  if (call) {
    // The exponent of a power stays a number unless it is a fraction: powers take whole exponents.
    return call.operands.some((operand) => operand !== node && values.mayBeLibrary(values.typeOf(operand)));
  }
  const expected = checker.getContextualType(node);
  return expected !== undefined && values.takesRational(expected);
}
