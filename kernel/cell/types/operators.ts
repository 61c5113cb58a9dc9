// Operators directed by types, first half: the text that is checked has calls `$op.add(a, b)` in place of operators.
//
// The user's text stays valid TypeScript; only the checker sees the calls, whose types say what two operands give.
import type { Edit } from "./edits.ts";
import { type TS, ts } from "./typescript.ts";

/** Import specifier of the operators; the host resolves it. */
export const OPERATORS = "halfperiod/operators";

/** The function that stands for an operator, by the operator's token. */
const BINARY: ReadonlyMap<TS.SyntaxKind, string> = new Map([
  [ts.SyntaxKind.PlusToken, "add"],
  [ts.SyntaxKind.MinusToken, "sub"],
  [ts.SyntaxKind.AsteriskToken, "mul"],
  [ts.SyntaxKind.SlashToken, "div"],
  [ts.SyntaxKind.AsteriskAsteriskToken, "pow"],
  [ts.SyntaxKind.LessThanToken, "lt"],
  [ts.SyntaxKind.LessThanEqualsToken, "le"],
  [ts.SyntaxKind.GreaterThanToken, "gt"],
  [ts.SyntaxKind.GreaterThanEqualsToken, "ge"],
]);

const COMPOUND: ReadonlyMap<TS.SyntaxKind, string> = new Map([
  [ts.SyntaxKind.PlusEqualsToken, "add"],
  [ts.SyntaxKind.MinusEqualsToken, "sub"],
  [ts.SyntaxKind.AsteriskEqualsToken, "mul"],
  [ts.SyntaxKind.SlashEqualsToken, "div"],
  [ts.SyntaxKind.AsteriskAsteriskEqualsToken, "pow"],
]);

/** The token that a function of the operators stands for. */
export const TOKENS: ReadonlyMap<string, TS.BinaryOperator> = new Map(
  [...BINARY].map(([token, name]) => [name, token as TS.BinaryOperator]),
);

/** `+=` for add, and so on. */
export const COMPOUND_TOKENS: ReadonlyMap<string, TS.BinaryOperator> = new Map(
  [...COMPOUND].map(([token, name]) => [name, token as TS.BinaryOperator]),
);

/** Marks the call of a compound assignment: `a += e` is checked as `a = $op.add_(a, e)`. */
export const COMPOUND_MARK = "_";

/** A name for the operators with which no identifier of the source begins. */
export function operatorPrefix(text: string): string {
  let prefix = "$op";
  while (text.includes(prefix)) prefix = `$${prefix}`;
  return prefix;
}

/** A name for the library as a whole, by the name for the operators. */
export function typesPrefix(prefix: string): string {
  return `${prefix}_types`;
}

/** The line that brings the operators into a checked text. */
export function operatorImport(prefix: string): string {
  return `import { operators as ${prefix} } from "${OPERATORS}";`;
}

/** The edits that turn operators into calls of `prefix`. Enum initialisers stay: their values are constants. */
export function operatorEdits(source: TS.SourceFile, prefix: string): Edit[] {
  const edits: Edit[] = [];
  const insert = (at: number, text: string) => edits.push({ start: at, end: at, text });
  const visit = (node: TS.Node): void => {
    if (ts.isEnumMember(node)) return;
    const binary = ts.isBinaryExpression(node) ? BINARY.get(node.operatorToken.kind) : undefined;
    const compound = ts.isBinaryExpression(node) ? COMPOUND.get(node.operatorToken.kind) : undefined;
    if (ts.isBinaryExpression(node) && binary) {
      insert(node.getStart(source), `${prefix}.${binary}(`);
      visit(node.left);
      edits.push({ start: node.operatorToken.getStart(source), end: node.operatorToken.end, text: "," });
      visit(node.right);
      insert(node.end, ")");
    } else if (ts.isBinaryExpression(node) && compound) {
      visit(node.left);
      const target = source.text.slice(node.left.getStart(source), node.left.end);
      const opened = `= ${prefix}.${compound}${COMPOUND_MARK}(${target},`;
      edits.push({ start: node.operatorToken.getStart(source), end: node.operatorToken.end, text: opened });
      visit(node.right);
      insert(node.end, ")");
    } else if (ts.isPrefixUnaryExpression(node) && node.operator === ts.SyntaxKind.MinusToken && !isLiteral(node)) {
      const start = node.getStart(source);
      edits.push({ start, end: start + 1, text: `${prefix}.neg(` });
      visit(node.operand);
      insert(node.end, ")");
    } else ts.forEachChild(node, visit);
  };
  ts.forEachChild(source, visit);
  return edits;
}

/** `-1`: part of the literal, and of the literal type -1. */
function isLiteral(node: TS.PrefixUnaryExpression): boolean {
  return ts.isNumericLiteral(node.operand) || ts.isBigIntLiteral(node.operand);
}

/** Whether a text has operators that could meet a library value, or a literal that a double would not hold: f({ m: 0.1 }). */
export function hasOperators(source: TS.SourceFile): boolean {
  const found = (node: TS.Node): boolean =>
    (ts.isNumericLiteral(node) && !Number.isSafeInteger(Number(node.text))) ||
    (ts.isBinaryExpression(node) && (BINARY.has(node.operatorToken.kind) || COMPOUND.has(node.operatorToken.kind))) ||
    (ts.isPrefixUnaryExpression(node) && node.operator === ts.SyntaxKind.MinusToken) ||
    (ts.forEachChild(node, found) ?? false);
  return found(source);
}
