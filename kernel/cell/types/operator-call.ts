// The calls that stand for operators in a checked text.
import { COMPOUND_MARK } from "./operators.ts";
import { type TS, ts } from "./typescript.ts";

export interface OperatorCall {
  /** add, sub, ..., neg. */
  readonly name: string;
  readonly operands: readonly TS.Expression[];
  /** The right side of what the user wrote as `a += e`. */
  readonly compound: boolean;
  readonly node: TS.CallExpression;
}

/** The operator that a node stands for, if it is one of our calls. */
export function operatorCall(node: TS.Node, prefix: string): OperatorCall | undefined {
  if (!ts.isCallExpression(node) || !ts.isPropertyAccessExpression(node.expression)) return undefined;
  const { expression, name } = node.expression;
  if (!ts.isIdentifier(expression) || expression.text !== prefix) return undefined;
  const compound = name.text.endsWith(COMPOUND_MARK);
  return { name: compound ? name.text.slice(0, -1) : name.text, operands: node.arguments, compound, node };
}

/** The expression inside parentheses. */
export function unwrap(node: TS.Node): TS.Node {
  let inner = node;
  while (ts.isParenthesizedExpression(inner)) inner = inner.expression;
  return inner;
}
