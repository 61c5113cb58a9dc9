// A checked cell as plain TypeScript: operators on library values written out as methods, exact literals as exact
// numbers, everything else as the user wrote it.
import { fractionText, isSafeInteger } from "./literals.ts";
import { type OperatorCall, operatorCall } from "./operator-call.ts";
import { exactValue, isNative } from "./operator-emit.ts";
import { COMPOUND_TOKENS, TOKENS } from "./operators.ts";
import { type TS, ts } from "./typescript.ts";
import { members, type Values } from "./values.ts";

/** A cell to write out. */
export interface Writing {
  readonly source: TS.SourceFile;
  /** Where the user's part of the source ends; a statement without semicolon takes one from behind it. */
  readonly userEnd: number;
  readonly checker: TS.TypeChecker;
  readonly values: Values;
  /** Name of the operators' module in the text; undefined if there are none in it. */
  readonly operators: string | undefined;
  /** The name in the script for a top-level name of the cell or of an earlier one. */
  readonly rename: (name: string) => string;
  /** Whether a symbol is declared at the top of the notebook. */
  readonly isTop: (symbol: TS.Symbol) => boolean;
}

/** Methods by operator; order has none, since an undecided comparison is an error that no method gives. */
const METHODS: Readonly<Record<string, string>> = {
  add: "plus",
  sub: "minus",
  mul: "times",
  div: "div",
  pow: "pow",
  neg: "neg",
};

/** Names of the library that the written text uses besides the user's own. */
export interface Helpers {
  rational: boolean;
  real: boolean;
  operators: boolean;
}

/** Writes the statements of one cell. */
export class Writer {
  readonly helpers: Helpers = { rational: false, real: false, operators: false };
  readonly #writing: Writing;

  constructor(writing: Writing) {
    this.#writing = writing;
  }

  /** The node's text, from its first token to its last. */
  write(node: TS.Node): string {
    return this.#special(node) ?? this.#verbatim(node);
  }

  /** The user's text, with what is inside written out. */
  #verbatim(node: TS.Node): string {
    const { source, userEnd } = this.#writing;
    let text = "";
    let at = node.getStart(source);
    ts.forEachChild(node, (child) => {
      const start = child.getStart(source);
      if (start < at) return;
      text += source.text.slice(at, start) + this.write(child);
      at = child.end;
    });
    return text + source.text.slice(at, Math.min(node.end, userEnd));
  }

  #special(node: TS.Node): string | undefined {
    if (ts.isIdentifier(node)) return this.#name(node);
    if (ts.isShorthandPropertyAssignment(node)) return this.#shorthand(node);
    if (ts.isBindingElement(node) && ts.isIdentifier(node.name)) return this.#binding(node, node.name);
    const { operators, values, checker } = this.#writing;
    if (operators === undefined) return undefined;
    if (ts.isExpression(node)) {
      const exact = exactValue(node, operators, values, checker);
      if (exact) return this.#exact(exact);
    }
    if (ts.isBinaryExpression(node) && node.operatorToken.kind === ts.SyntaxKind.EqualsToken) {
      const call = operatorCall(node.right, operators);
      if (call?.compound) return this.#compound(node, call);
    }
    const call = operatorCall(node, operators);
    if (call) return this.#operation(call);
    if (ts.isParenthesizedExpression(node)) return this.#parenthesized(node);
    return undefined;
  }

  #name(node: TS.Identifier): string | undefined {
    const renamed = this.#writing.rename(node.text);
    if (renamed === node.text) return undefined;
    const symbol = this.#writing.checker.getSymbolAtLocation(node);
    return symbol && this.#writing.isTop(symbol) ? renamed : undefined;
  }

  #shorthand(node: TS.ShorthandPropertyAssignment): string | undefined {
    const renamed = this.#writing.rename(node.name.text);
    const symbol = this.#writing.checker.getShorthandAssignmentValueSymbol(node);
    if (renamed === node.name.text || !symbol || !this.#writing.isTop(symbol)) return undefined;
    return `${node.name.text}: ${renamed}`;
  }

  /** `{ to }` in a pattern, when `to` gets another name. */
  #binding(node: TS.BindingElement, name: TS.Identifier): string | undefined {
    const renamed = this.#name(name);
    if (renamed === undefined || node.propertyName || !ts.isObjectBindingPattern(node.parent) || node.dotDotDotToken)
      return undefined;
    return `${name.text}: ${renamed}${node.initializer ? ` = ${this.write(node.initializer)}` : ""}`;
  }

  #exact(value: NonNullable<ReturnType<typeof exactValue>>): string {
    if (isSafeInteger(value)) return String(value.num / value.den);
    this.helpers.rational = true;
    return `rational("${fractionText(value)}")`;
  }

  /** Parentheses around what has become a call are no longer needed. */
  #parenthesized(node: TS.ParenthesizedExpression): string | undefined {
    const call = operatorCall(node.expression, this.#writing.operators ?? "");
    if (!call || call.compound || isNative(call, this.#writing.values)) return undefined;
    const inner = this.write(node.expression);
    return /^[\w$.]+\(/u.test(inner) || inner.endsWith(")") ? inner : `(${inner})`;
  }

  #operation(call: OperatorCall): string {
    const { values } = this.#writing;
    if (isNative(call, values)) return this.#native(call);
    const isText = call.operands.map((operand) => call.name === "add" && values.isText(values.typeOf(operand)));
    if (isText.includes(true)) {
      // A sum with a text is a text; a value of the library gives the one that it prints as.
      return call.operands
        .map((operand, k) => (isText[k] ? this.write(operand) : `String(${this.write(operand)})`))
        .join(" + ");
    }
    return this.#method(call) ?? this.#function(call);
  }

  #native({ name, operands }: OperatorCall): string {
    const [left = "", right = ""] = operands.map((operand) => this.write(operand));
    if (name === "neg") return left.startsWith("-") ? `- ${left}` : `-${left}`;
    return `${left} ${ts.tokenToString(TOKENS.get(name) as TS.SyntaxKind)} ${right}`;
  }

  #compound(node: TS.BinaryExpression, call: OperatorCall): string {
    const target = this.write(node.left);
    const operand = call.operands[1] as TS.Expression;
    if (isNative(call, this.#writing.values)) {
      return `${target} ${ts.tokenToString(COMPOUND_TOKENS.get(call.name) as TS.SyntaxKind)} ${this.write(operand)}`;
    }
    return `${target} = ${this.#method(call) ?? this.#function(call)}`;
  }

  /** `a.plus(b)`, where a is a library value whose method takes b; `b.times(a)` for a plain a. */
  #method(call: OperatorCall): string | undefined {
    const method = METHODS[call.name];
    const [left, right] = call.operands;
    if (method === undefined || !left) return undefined;
    if (this.#answers(left, method, right)) {
      return `${this.#primary(left)}.${method}(${right ? this.write(right) : ""})`;
    }
    return right && this.#reflected(call.name, left, right);
  }

  /** A plain number, or an exact literal, before a library value. */
  #reflected(name: string, left: TS.Expression, right: TS.Expression): string | undefined {
    const method = METHODS[name] as string;
    if ((name === "add" || name === "mul") && this.#answers(right, method, left)) {
      return `${this.#primary(right)}.${method}(${this.write(left)})`;
    }
    const { values } = this.#writing;
    const kind = members(values.typeOf(right)).every((type) => ["Real", "Complex"].includes(type.symbol?.name ?? ""))
      ? "real"
      : "rational";
    const wrapped = kind === "real" || values.typeOf(right).symbol?.name === "Rational";
    if ((name !== "sub" && name !== "div") || !wrapped || !values.isPlain(values.typeOf(left))) return undefined;
    const text = this.write(left);
    if (kind === "rational" && text.startsWith("rational(")) return `${text}.${method}(${this.write(right)})`;
    this.helpers[kind] = true;
    return `${kind}(${text}).${method}(${this.write(right)})`;
  }

  /** `operators.add(a, b)`, which decides at run time as a cell does. */
  #function({ name, operands }: OperatorCall): string {
    this.helpers.operators = true;
    return `operators.${name}(${operands.map((operand) => this.write(operand)).join(", ")})`;
  }

  /** Whether a value is surely of the library and has a method that takes the argument. */
  #answers(owner: TS.Expression, method: string, argument: TS.Expression | undefined): boolean {
    const { values, checker } = this.#writing;
    const type = values.typeOf(owner);
    if (values.isAny(type) || !values.isAlwaysLibrary(type)) return false;
    return members(type).every((part) => {
      const property = part.getProperty(method);
      const signatures = property ? checker.getTypeOfSymbol(property).getCallSignatures() : [];
      return signatures.some((signature) => !argument || this.#takes(signature, argument));
    });
  }

  #takes(signature: TS.Signature, argument: TS.Expression): boolean {
    const { values, checker, operators = "" } = this.#writing;
    const [parameter] = signature.getParameters();
    if (!parameter) return false;
    const expected = checker.getTypeOfSymbol(parameter);
    const given = values.typeOf(argument);
    if (values.isAny(given)) return false;
    const exact = exactValue(argument, operators, values, checker);
    if (exact && !isSafeInteger(exact)) return values.takesRational(expected);
    // A generic method (the sum of points over two fields) is checked by its class alone.
    if (signature.getTypeParameters()) {
      const names = (expected.isIntersection() ? expected.types : [expected]).map((part) => part.symbol?.name);
      return members(given).every((part) => names.includes(part.symbol?.name));
    }
    return checker.isTypeAssignableTo(given, expected);
  }

  /** The text of a node in front of `.method`. */
  #primary(node: TS.Expression): string {
    const text = this.write(node);
    const plain =
      ts.isIdentifier(node) ||
      ts.isCallExpression(node) ||
      ts.isPropertyAccessExpression(node) ||
      ts.isElementAccessExpression(node) ||
      ts.isParenthesizedExpression(node) ||
      ts.isNonNullExpression(node) ||
      ts.isTaggedTemplateExpression(node) ||
      node.kind === ts.SyntaxKind.ThisKeyword;
    const call = operatorCall(node, this.#writing.operators ?? "");
    const written = call !== undefined && !isNative(call, this.#writing.values);
    return (plain && !call) || written || text.startsWith("rational(") ? text : `(${text})`;
  }
}
