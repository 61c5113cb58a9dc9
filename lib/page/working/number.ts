// The record of a number as a derivation: one step an operation, operands before results.

import { isNode, type Node } from "../../number/origin.ts";
import { Quadratic } from "../../number/quadratic.ts";
import { Rational } from "../../number/rational.ts";
import { Complex, Real } from "../../number/values.ts";
import { standingOf } from "../../surface/claim-parts.ts";
import { Derivation } from "../derivation.ts";
import { quadraticTex, rationalTex } from "../exact-kind.ts";
import { mean } from "./mean.ts";
import { NAMED } from "./named.ts";
import { secondRoute } from "./second-route.ts";

/** Longer records are cut at their beginning: the last steps are the ones that a reader asks for. */
const MOST_STEPS = 60;

export function numberWorking(x: Real | Complex): Derivation {
  const title = `Working of a ${x instanceof Real || x.disc.axis === "real" ? "real" : "complex"} number`;
  if (!x.origin) {
    const words = x.exact ? "an exact number, as given" : "an enclosure, as given";
    return new Derivation(title, { name: "number" }).step(words, {
      value: x,
      check: standingOf(x, "=", x.neg().neg()),
      route: "nothing was computed; its negative taken twice",
      label: "given",
    });
  }
  const nodes = inOrder(x).slice(-MOST_STEPS);
  const places = new Map<unknown, number>(nodes.map((node, k) => [node, k + 1]));
  return nodes.reduce(
    (working, node) => {
      const { operation, operands } = node.origin!;
      const parts = operands.map((operand) => operandTex(operand, places));
      const named = NAMED[operation.name];
      return (nodes.length === 1 ? meanBefore(working, node) : working).step(
        named?.words ?? WORDS[operation.name] ?? operation.name,
        {
          formula: named?.formula(parts.map(bare)) ?? formulaOf(operation.name, parts),
          ...(named?.source ? { source: named.source } : {}),
          value: node,
          ...secondRoute(node as Real | Complex),
          label: `s${places.get(node)}`,
        },
      );
    },
    new Derivation(title, { name: "number" }),
  );
}

/** Without the brackets that it needs beside other operands. */
function bare(operand: string | undefined): string | undefined {
  return operand?.replace(/^\\left\(((?:(?!\\left).)*)\\right\)$/s, "$1");
}

/** The table of the mean that a value is made of, where its two numbers are positive. */
function meanBefore(working: Derivation, { origin }: Node): Derivation {
  const [a, b] = origin?.operands ?? [];
  const { name } = origin!.operation;
  const pair = name === "agm" ? [a, b] : name === "complete K" ? [1, sqrtOf(b)] : [];
  const [x, y] = pair.map((part) =>
    isNode(part) || part instanceof Rational || part === 1 ? Complex.from(part as Real) : undefined,
  );
  if (!x || !y || !isPositive(x) || !isPositive(y)) return working;
  return working.step("the two means, until they agree to the digits asked for", {
    ...(y.re.minus(x.re).sign() === 1 ? mean({ a: y.re, b: x.re }) : mean({ a: x.re, b: y.re })),
    label: "mean",
  });
}

function sqrtOf(m1: unknown): Complex | undefined {
  const x = isNode(m1) ? Complex.from(m1 as Real) : undefined;
  return x && isPositive(x) ? Complex.from(x.re.sqrt()) : undefined;
}

function isPositive(x: Complex): boolean {
  const { axis } = x.disc;
  return axis === "real" && x.re.sign() === 1;
}

/** The nodes with a record, each once, operands first. */
function inOrder(x: Node): Node[] {
  const done = new Set<unknown>();
  const list: Node[] = [];
  const visit = (node: unknown): void => {
    if (!isNode(node) || done.has(node) || !node.origin || node.exact) return;
    done.add(node);
    for (const operand of node.origin.operands) visit(operand);
    list.push(node);
  };
  visit(x);
  return list;
}

function operandTex(operand: unknown, places: ReadonlyMap<unknown, number>): string | undefined {
  const place = places.get(operand);
  if (place !== undefined) return `(${place})`;
  if (operand instanceof Rational) return rationalTex(operand);
  if (operand instanceof Quadratic) return `\\left(${quadraticTex(operand)}\\right)`;
  if (isNode(operand)) return operand.exact ? operandTex(operand.exact, places) : "x";
  if (typeof operand === "number" || typeof operand === "bigint") return String(operand);
  // The lattice itself, or data of an operation.
  return undefined;
}

/** Operations whose name in the record is not a word. */
const WORDS: Readonly<Record<string, string>> = {
  plus: "sum",
  minus: "difference",
  times: "product",
  div: "quotient",
  neg: "negative",
  pow: "power",
  sqrt: "square root",
  abs: "absolute value",
  re: "real part",
  im: "imaginary part",
  conj: "conjugate",
  complex: "real and imaginary part joined",
  point: "point of the torus",
  wp: "value of ℘",
  "wp.prime": "value of ℘′",
  zeta: "value of ζ",
  sigma: "value of σ",
};

type Write = (a: string, b: string, c: string) => string;

const WRITE: Readonly<Record<string, Write>> = {
  plus: (a, b) => `${a} + ${b}`,
  minus: (a, b) => `${a} - ${b}`,
  times: (a, b) => `${a} \\cdot ${b}`,
  div: (a, b) => `${a} / ${b}`,
  neg: (a) => `-${a}`,
  pow: (a, n) => `${a}^{${n}}`,
  sqrt: (a) => `\\sqrt{${a}}`,
  abs: (a) => `\\left|${a}\\right|`,
  re: (a) => `\\operatorname{Re} ${a}`,
  im: (a) => `\\operatorname{Im} ${a}`,
  conj: (a) => `\\overline{${a}}`,
  complex: (a, b) => `${a} + ${b}\\, i`,
  π: () => "\\pi",
  point: (r, s, rest) =>
    [term(r, "\\omega_1"), term(s, "\\omega_2"), rest].filter((part) => part !== "").join(" + ") || "0",
  "period ratio": () => "\\tau = \\omega_2/\\omega_1",
  invariant: (k) => `g_{${k}}`,
  root: (k) => `e_{${k}}`,
  "quasi-period": (k) => `\\eta_{${k}}`,
  discriminant: () => "\\Delta",
  j: () => "j",
  wp: (...z) => `\\wp(${argument(z)})`,
  "wp.prime": (...z) => `\\wp'(${argument(z)})`,
  zeta: (...z) => `\\zeta(${argument(z)})`,
  sigma: (...z) => `\\sigma(${argument(z)})`,
};

/** A rational multiple of a period; empty for 0. */
function term(factor: string, period: string): string {
  if (factor === "0") return "";
  return factor === "1" ? period : `${factor}\\,${period}`;
}

/** z, or r ω1 + s ω2 with what is added. */
function argument([a, b, c]: readonly string[]): string {
  return b === "" || b === undefined ? (a ?? "") : WRITE.point!(a ?? "", b, c ?? "");
}

function formulaOf(name: string, operands: readonly (string | undefined)[]): string {
  const parts = operands.filter((operand) => operand !== undefined);
  const [a = "", b = "", c = ""] = parts;
  const write = WRITE[name];
  return write ? write(a, b, c) : `\\text{${name.replace(/[^\p{L}\p{N} ]/gu, " ")}}(${parts.join(", ")})`;
}
