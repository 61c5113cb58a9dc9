// What the checker cannot say by itself about operators: pairs that have no result, and plain operators that mean
// nothing on library values. Worded in the user's terms, at the user's operator.
import type { Finding } from "./diagnostics.ts";
import type { EditedText } from "./edits.ts";
import { literalValue } from "./literals.ts";
import { type OperatorCall, operatorCall } from "./operator-call.ts";
import { type TS, ts } from "./typescript.ts";
import { members, type Values } from "./values.ts";

const NOUNS: Readonly<Record<string, string>> = {
  add: "sum",
  sub: "difference",
  mul: "product",
  div: "quotient",
  pow: "power",
  neg: "negative",
  lt: "order",
  le: "order",
  gt: "order",
  ge: "order",
};

const EQUALITY = new Set([
  ts.SyntaxKind.EqualsEqualsToken,
  ts.SyntaxKind.EqualsEqualsEqualsToken,
  ts.SyntaxKind.ExclamationEqualsToken,
  ts.SyntaxKind.ExclamationEqualsEqualsToken,
]);

const BITWISE = new Set([
  ts.SyntaxKind.PercentToken,
  ts.SyntaxKind.AmpersandToken,
  ts.SyntaxKind.BarToken,
  ts.SyntaxKind.CaretToken,
  ts.SyntaxKind.LessThanLessThanToken,
  ts.SyntaxKind.GreaterThanGreaterThanToken,
  ts.SyntaxKind.GreaterThanGreaterThanGreaterThanToken,
]);

/** Methods of a Map or a Set that take a key. */
const KEYED = new Set(["get", "has", "set", "add", "delete"]);
const SEARCHES = new Set(["includes", "indexOf", "lastIndexOf"]);

const EQUALS_HINT = "Two library values are told apart by a.equals(b), which answers yes, no, or that it is undecided.";

/** Findings about the operators of a checked cell. */
export function operatorFindings(
  source: TS.SourceFile,
  prefix: string,
  values: Values,
  edited: EditedText,
  user: string,
): Finding[] {
  const found: Finding[] = [];
  const at = (start: number, end: number, message: string) => {
    const from = edited.toUser(start);
    found.push({ code: "operator", message, start: from, length: Math.max(1, edited.toUser(end) - from) });
  };
  const visit = (node: TS.Node): void => {
    if (node.getStart(source) >= edited.text.length) return;
    const call = operatorCall(node, prefix);
    if (call) checkOperation(call, prefix, values, edited, user, found);
    else checkPlain(node, values, at);
    ts.forEachChild(node, visit);
  };
  for (const statement of source.statements) visit(statement);
  return found;
}

function checkOperation(
  call: OperatorCall,
  prefix: string,
  values: Values,
  edited: EditedText,
  user: string,
  found: Finding[],
): void {
  const types = call.operands.map((operand) => values.typeOf(operand));
  if (!hasNoOp(values.typeOf(call.node)) && !takesPartOfPoint(call, prefix, types, values)) return;
  // The cause is shown where it is, not again at every operator around it.
  if (types.some(hasNoOp)) return;
  const start = call.name === "neg" ? edited.toUser(call.node.getStart()) : operatorAt(call, edited, user);
  const length = /^(?:\*\*|[<>]=|[-+*/<>])=?/.exec(user.slice(start))?.[0].length ?? 1;
  found.push({ code: "operator", message: impossible(call, types, values), start, length });
}

/** Where the user's operator stands: behind the left operand. */
function operatorAt(call: OperatorCall, edited: EditedText, user: string): number {
  const left = call.operands[0] as TS.Expression;
  const from = call.compound
    ? edited.toUser((call.node.parent as TS.BinaryExpression).left.end)
    : edited.toUser(left.end);
  const gap = /^(?:\s|\/\*[\s\S]*?\*\/|\/\/[^\n]*\n)*/.exec(user.slice(from))?.[0].length ?? 0;
  return from + gap;
}

function impossible(call: OperatorCall, types: readonly TS.Type[], values: Values): string {
  const noun = NOUNS[call.name] ?? call.name;
  const absent = types.find((type) => members(type).some(isAbsent));
  if (absent && members(absent).length > 1) {
    return `${values.describe(absent)} has no ${noun}: the value may be absent. Test for that first.`;
  }
  const [left, right] = types.map((type) => values.describe(type));
  if (call.name === "neg") return `${left} has no negative.`;
  if (noun === "order") return `${left} and ${right} have no order.${orderHint(types, values)}`;
  return `${left} has no ${noun} with ${right}.${pointHint(call, types, values)}`;
}

/** `P * 0.5`, `P / 2`: the literal is not a whole multiple, although its type is that of one. */
function takesPartOfPoint(call: OperatorCall, prefix: string, types: readonly TS.Type[], values: Values): boolean {
  if (call.name !== "mul" || !types.some((type) => values.describe(type) === "a point")) return false;
  return call.operands.some((operand) => {
    const value = literalValue(operand, prefix);
    return value !== undefined && value.den !== 1n;
  });
}

/** Points are multiplied by whole numbers: what stands for a part of one, and for a product of two. */
function pointHint(call: OperatorCall, types: readonly TS.Type[], values: Values): string {
  const points = types.filter((type) => values.describe(type) === "a point").length;
  if (points === 0) return "";
  if (points === 2) return " Points are added: P + Q.";
  if (call.name === "mul" || call.name === "div") {
    return " A point has whole multiples, 3 * P. A part of it is a question about the torus: take a part of E.logarithm(P), and E.exponential of that.";
  }
  return call.name === "add" || call.name === "sub" ? " The other side must be a point of the same curve." : "";
}

function orderHint(types: readonly TS.Type[], values: Values): string {
  const complex = types.some((type) => values.describe(type).includes("complex"));
  return complex ? " Compare real or imaginary parts, or absolute values." : "";
}

function isAbsent(type: TS.Type): boolean {
  return (type.flags & (ts.TypeFlags.Undefined | ts.TypeFlags.Null)) !== 0;
}

function hasNoOp(type: TS.Type): boolean {
  return members(type).some((part) => part.symbol?.name === "NoOp");
}

type Report = (start: number, end: number, message: string) => void;

function checkPlain(node: TS.Node, values: Values, report: Report): void {
  if (ts.isBinaryExpression(node)) checkBinary(node, values, report);
  else if (ts.isPrefixUnaryExpression(node) || ts.isPostfixUnaryExpression(node)) checkUnary(node, values, report);
  else if (ts.isSwitchStatement(node)) {
    if (values.mayBeLibrary(values.typeOf(node.expression))) {
      report(node.expression.getStart(), node.expression.end, `switch compares with ===. ${EQUALS_HINT}`);
    }
  } else if (ts.isIfStatement(node) || ts.isWhileStatement(node) || ts.isDoStatement(node)) {
    checkTruth(node.expression, values, report);
  } else if (ts.isConditionalExpression(node)) checkTruth(node.condition, values, report);
  else if (ts.isCallExpression(node)) checkSearch(node, values, report);
  else if (ts.isNewExpression(node)) checkKeys(node, values, report);
}

function checkBinary(node: TS.BinaryExpression, values: Values, report: Report): void {
  const token = node.operatorToken;
  if (EQUALITY.has(token.kind)) {
    const types = [node.left, node.right].map((side) => values.typeOf(side));
    if (types.some(isOnlyAbsent) || !types.some((type) => values.mayBeLibrary(type))) return;
    const { text } = node.getSourceFile();
    const operator = text.slice(token.getStart(), token.end);
    report(token.getStart(), token.end, `${operator} asks whether two values are the same object. ${EQUALS_HINT}`);
  } else if (BITWISE.has(token.kind)) {
    const side = [node.left, node.right].find((one) => values.mayBeLibrary(values.typeOf(one)));
    if (!side) return;
    report(
      token.getStart(),
      token.end,
      `${token.getText()} has no meaning for ${values.describe(values.typeOf(side))}.${caretHint(token)}`,
    );
  } else if (token.kind === ts.SyntaxKind.AmpersandAmpersandToken || token.kind === ts.SyntaxKind.BarBarToken) {
    checkTruth(node.left, values, report);
  }
}

function caretHint(token: TS.Node): string {
  return token.kind === ts.SyntaxKind.CaretToken ? " A power is written **." : "";
}

function isOnlyAbsent(type: TS.Type): boolean {
  return members(type).every(isAbsent);
}

function checkUnary(node: TS.PrefixUnaryExpression | TS.PostfixUnaryExpression, values: Values, report: Report): void {
  if (node.operator === ts.SyntaxKind.ExclamationToken) {
    checkTruth(node.operand, values, report);
    return;
  }
  if (!values.mayBeLibrary(values.typeOf(node.operand))) return;
  const words: Partial<Record<TS.SyntaxKind, string>> = {
    [ts.SyntaxKind.PlusToken]: "+",
    [ts.SyntaxKind.TildeToken]: "~",
    [ts.SyntaxKind.PlusPlusToken]: "++",
    [ts.SyntaxKind.MinusMinusToken]: "--",
  };
  const operator = words[node.operator];
  if (!operator) return;
  const hint = operator.length === 2 ? ` Write ${operator[0]}= 1.` : "";
  report(
    node.getStart(),
    node.end,
    `${operator} has no meaning for ${values.describe(values.typeOf(node.operand))}.${hint}`,
  );
}

function checkTruth(node: TS.Expression, values: Values, report: Report): void {
  const type = values.typeOf(node);
  if (!values.isAlwaysLibrary(type)) return;
  report(
    node.getStart(),
    node.end,
    `${values.describe(type)} counts as true whatever its value. Ask a question of it, such as .equals(0).`,
  );
}

function checkSearch(node: TS.CallExpression, values: Values, report: Report): void {
  const callee = node.expression;
  const [sought] = node.arguments;
  if (ts.isPropertyAccessExpression(callee) && KEYED.has(callee.name.text) && sought) {
    const holder = values.typeOf(callee.expression);
    if (values.keysOf(holder).length > 0 && values.mayBeLibrary(values.typeOf(sought))) {
      const name = holder.symbol.name.replace("Readonly", "");
      report(callee.name.getStart(), callee.name.end, `${keyed(`a ${name}`)} ${EQUALS_HINT}`);
    }
    return;
  }
  if (!ts.isPropertyAccessExpression(callee) || !SEARCHES.has(callee.name.text) || !sought) return;
  const list = values.typeOf(callee.expression);
  if (values.isLibrary(list) || !values.mayBeLibrary(values.typeOf(sought))) return;
  report(
    callee.name.getStart(),
    callee.name.end,
    `${callee.name.text} compares with ===. Write list.some((x) => x.equals(...)). ${EQUALS_HINT}`,
  );
}

/** `new Map([[P, 1]])`: what is looked up by === is never found again. */
function checkKeys(node: TS.NewExpression, values: Values, report: Report): void {
  const [key] = values.keysOf(values.typeOf(node));
  if (!key || !values.isLibrary(key)) return;
  const name = node.expression.getText();
  report(node.expression.getStart(), node.expression.end, `${keyed(name)} ${EQUALS_HINT}`);
}

function keyed(name: string): string {
  return `${name} finds what it holds by ===. Use a text for each value, such as String(x), or a list with some((x) => x.equals(...)).`;
}
