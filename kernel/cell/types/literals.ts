// Exact literals: numbers, and sums, products, quotients and powers of numbers alone, read from the source as written.
import { operatorCall, unwrap } from "./operator-call.ts";
import { type TS, ts } from "./typescript.ts";

/** A rational number; `den` is positive. Lowest terms are left to the reader. */
export interface Fraction {
  readonly num: bigint;
  readonly den: bigint;
}

/** Beyond these a power or an exponent is left to run time. */
const LARGEST_EXPONENT = 10_000n;

/** The exact value of a tree of literals in a checked text; undefined if it has anything else in it, or divides by 0. */
export function literalValue(node: TS.Node, prefix: string): Fraction | undefined {
  const inner = unwrap(node);
  if (ts.isNumericLiteral(inner)) return readLiteral(inner.getText());
  if (ts.isPrefixUnaryExpression(inner)) {
    const operand = inner.operator === ts.SyntaxKind.MinusToken ? literalValue(inner.operand, prefix) : undefined;
    return operand && { num: -operand.num, den: operand.den };
  }
  const call = operatorCall(inner, prefix);
  if (!call || call.compound) return undefined;
  const [left, right] = call.operands.map((operand) => literalValue(operand, prefix));
  if (call.name === "neg") return left && { num: -left.num, den: left.den };
  return left && right && combine(call.name, left, right);
}

/** Whether a number of the language holds the value exactly. */
export function isSafeInteger({ num, den }: Fraction): boolean {
  return den !== 0n && num % den === 0n && Number.isSafeInteger(Number(num / den));
}

/** "3/7" in lowest terms. */
export function fractionText({ num, den }: Fraction): string {
  const common = gcd(num < 0n ? -num : num, den);
  return den === common ? `${num / common}` : `${num / common}/${den / common}`;
}

function combine(name: string, a: Fraction, b: Fraction): Fraction | undefined {
  switch (name) {
    case "add":
      return { num: a.num * b.den + b.num * a.den, den: a.den * b.den };
    case "sub":
      return { num: a.num * b.den - b.num * a.den, den: a.den * b.den };
    case "mul":
      return { num: a.num * b.num, den: a.den * b.den };
    case "div":
      return quotient(a, b);
    case "pow":
      return power(a, b);
    default:
      return undefined;
  }
}

function quotient(a: Fraction, b: Fraction): Fraction | undefined {
  if (b.num === 0n) return undefined;
  const sign = b.num < 0n ? -1n : 1n;
  return { num: sign * a.num * b.den, den: sign * a.den * b.num };
}

function power(a: Fraction, b: Fraction): Fraction | undefined {
  if (b.num % b.den !== 0n) return undefined;
  const exponent = b.num / b.den;
  if (exponent > LARGEST_EXPONENT || exponent < -LARGEST_EXPONENT) return undefined;
  if (exponent >= 0n) return { num: a.num ** exponent, den: a.den ** exponent };
  return quotient({ num: 1n, den: 1n }, { num: a.num ** -exponent, den: a.den ** -exponent });
}

/** 12, 0.41, 1e-6, 1_000, 0xff as written. */
function readLiteral(text: string): Fraction | undefined {
  const digits = text.replaceAll("_", "");
  if (/^0[xob]/i.test(digits)) return { num: BigInt(digits), den: 1n };
  const match = /^(\d*)\.?(\d*)(?:e([+-]?\d+))?$/i.exec(digits);
  if (!match) return undefined;
  const [, whole = "", part = "", exponent = "0"] = match;
  const shift = BigInt(exponent) - BigInt(part.length);
  if (shift > LARGEST_EXPONENT || shift < -LARGEST_EXPONENT) return undefined;
  const num = BigInt(`${whole}${part}` || "0");
  return shift >= 0n ? { num: num * 10n ** shift, den: 1n } : { num, den: 10n ** -shift };
}

function gcd(a: bigint, b: bigint): bigint {
  let [x, y] = [a, b];
  while (y !== 0n) [x, y] = [y, x % y];
  return x;
}
