// Slips that a mathematician makes in TypeScript: hints behind the compiler's words, and notices where the cell is right
// by the language but hardly what was meant.
import type { Finding } from "./diagnostics.ts";
import type { Edit } from "./edits.ts";
import { operatorCall } from "./operator-call.ts";
import { type Outline, syntaxErrors } from "./outline.ts";
import { type TS, ts } from "./typescript.ts";
import type { Values } from "./values.ts";

/** Letters of the library that a name of the notebook is easily given. */
const HIDDEN: Readonly<Record<string, string>> = {
  i: "the imaginary unit; complex.i still is it",
  π: "the number π",
};

/** The finding with a hint, where one is known. */
export function withHint(found: Finding, code: string): Finding {
  const hint = hintFor(found, code);
  return hint === undefined ? found : { ...found, message: `${found.message} ${hint}` };
}

function hintFor({ code: name, message, start, length }: Finding, code: string): string | undefined {
  const rest = code.slice(start);
  if (name === "TS17006" || name === "TS17007") return "Write -(x ** 2) or (-x) ** 2.";
  if (name === "TS1351")
    return `A product needs its sign: ${code.slice(0, start).match(/[\d.]+$/)?.[0] ?? "2"}*${rest.slice(0, length)}.`;
  const word = rest.slice(0, length);
  if (name === "TS2304" && /^\s*=(?![=>])/.test(rest.slice(length)) && beginsStatement(code, start))
    return `Write const ${word} = ... to give it a value.`;
  if (name === "TS2322" && /^\s*(?:\*\*|[-+*/])=/.test(rest.slice(length)) && /type 'number'/.test(message))
    return `${word} was given a number first. Begin with a library value: let ${word} = real(0).`;
  if (JOINED.has(name) && joinsLineAbove(code, start + length)) {
    return "This line begins with a bracket and joins the one above: end that one with a semicolon.";
  }
  return undefined;
}

function beginsStatement(code: string, offset: number): boolean {
  return /(?:^|[;\n{}])\s*$/.test(code.slice(0, offset));
}

/** Codes that follow when a bracket joins two lines: not callable, no such index, not a function ... */
const JOINED = new Set(["TS2349", "TS7053", "TS2351", "TS2538", "TS2695", "TS2339", "TS2554", "TS2355"]);

/** Whether a line that begins with a bracket stands at, or right behind, an offset. */
function joinsLineAbove(code: string, offset: number): boolean {
  const lineStart = code.lastIndexOf("\n", offset - 1) + 1;
  return /^[ \t]*[[(]/.test(code.slice(lineStart)) && lineStart > 0
    ? true
    : /^[ \t;]*\n\s*[[(]/.test(code.slice(offset));
}

/** Notices that the text alone gives rise to. `library` tells the names that the library has. */
export function textNotices(parsed: Outline, library: ReadonlySet<string>): string[] {
  const notices: string[] = [];
  for (const [name, words] of Object.entries(HIDDEN)) {
    if (parsed.declared.has(name) && library.has(name))
      notices.push(`From here on ${name} is your own value and hides ${words}.`);
  }
  const visit = (node: TS.Node): void => {
    if (ts.isBinaryExpression(node)) {
      const notice = literalNotice(node, parsed.source);
      if (notice !== undefined) notices.push(notice);
    }
    ts.forEachChild(node, visit);
  };
  visit(parsed.source);
  return notices;
}

function literalNotice(node: TS.BinaryExpression, source: TS.SourceFile): string | undefined {
  const { left, right, operatorToken } = node;
  const text = node.getText(source);
  if (operatorToken.kind === ts.SyntaxKind.CaretToken && isDecimal(left, source) && isDecimal(right, source)) {
    const [a, b] = [Number(left.getText(source)), Number(right.getText(source))];
    return `${text} is ${a ^ b}, the exclusive or of the bits; a power is written ${left.getText(source)}**${right.getText(source)}.`;
  }
  if (operatorToken.kind === ts.SyntaxKind.SlashToken && ts.isBigIntLiteral(left) && ts.isBigIntLiteral(right)) {
    const [a, b] = [left, right].map((side) => BigInt(side.text.replace(/n$/, ""))) as [bigint, bigint];
    if (b !== 0n && a % b !== 0n)
      return `${text} is ${a / b}n: bigints divide without the fraction. Write rational(${a}, ${b}).`;
  }
  return undefined;
}

function isDecimal(node: TS.Node, source: TS.SourceFile): boolean {
  return ts.isNumericLiteral(node) && /^\d+$/.test(node.getText(source));
}

/** A notice where the counter `i` of a loop multiplies a library value, as if it were the imaginary unit. */
export function loopNotices(source: TS.SourceFile, prefix: string, values: Values, checker: TS.TypeChecker): string[] {
  const notices = new Set<string>();
  const visit = (node: TS.Node): void => {
    const call = operatorCall(node, prefix);
    if (call?.name === "mul") {
      const counter = call.operands.find(
        (side) => ts.isIdentifier(side) && side.text === "i" && isCounter(side, checker),
      );
      const meets = call.operands.some((side) => side !== counter && values.mayBeLibrary(values.typeOf(side)));
      if (counter && meets) notices.add("Inside the loop i is its counter, not the imaginary unit.");
    }
    ts.forEachChild(node, visit);
  };
  visit(source);
  return [...notices];
}

function isCounter(node: TS.Node, checker: TS.TypeChecker): boolean {
  const declaration = checker.getSymbolAtLocation(node)?.valueDeclaration;
  return (
    declaration !== undefined && ts.isVariableDeclaration(declaration) && ts.isForStatement(declaration.parent.parent)
  );
}

/**
 * Edits that read a final `{ a, b }` as an object: at the start of a statement the language reads a block.
 * `parse` reads a text again.
 */
export function finalObjectEdits(code: string, parsed: Outline, parse: (code: string) => TS.SourceFile): Edit[] {
  const match = /(?:^|[\n;}])\s*(\{[^;]*\})\s*;?\s*$/.exec(code);
  const body = match?.[1];
  if (!match || body === undefined) return [];
  const start = match.index + match[0].indexOf(body, /^[\n;}]/.test(match[0]) ? 1 : 0);
  const last = parsed.source.statements.findLast((statement) => !ts.isEmptyStatement(statement));
  const isBlock =
    last !== undefined && ts.isBlock(last) && last.getStart(parsed.source) === start && isListOfNames(last);
  if (!isBlock && syntaxErrors(parsed.source).length === 0) return [];
  const edits = [
    { start, end: start, text: "(" },
    { start: start + body.length, end: start + body.length, text: ")" },
  ];
  const source = parse(`${code.slice(0, start)};(${body})`);
  const expression = source.statements.at(-1);
  const right = syntaxErrors(source).length === 0 && expression !== undefined && ts.isExpressionStatement(expression);
  return right && isData(expression.expression) ? edits : [];
}

/** `{ a, b }` or `{ a: b }` as a block: a list of names, or a labelled expression. */
function isListOfNames(block: TS.Block): boolean {
  const [only, ...more] = block.statements;
  if (!only || more.length > 0) return false;
  if (ts.isLabeledStatement(only)) return ts.isExpressionStatement(only.statement);
  const names = (node: TS.Expression): boolean =>
    ts.isBinaryExpression(node)
      ? node.operatorToken.kind === ts.SyntaxKind.CommaToken && names(node.left) && names(node.right)
      : ts.isIdentifier(node);
  return ts.isExpressionStatement(only) && names(only.expression);
}

function isData(node: TS.Expression): boolean {
  return (
    ts.isParenthesizedExpression(node) &&
    ts.isObjectLiteralExpression(node.expression) &&
    node.expression.properties.every((one) => ts.isShorthandPropertyAssignment(one) || ts.isPropertyAssignment(one))
  );
}
