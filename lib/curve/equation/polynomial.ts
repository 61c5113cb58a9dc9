// From the tree of an equation to a polynomial over a field: left side minus right side.

import type { Field } from "../../algebra/field.ts";
import {
  constant,
  isZero,
  multiply,
  negate,
  type Polynomial,
  raise,
  ringOf,
  subtract,
  type Target,
  variable,
} from "../../algebra/multivariate.ts";
import type { EquationTree, PowerTree, QuotientTree, RootTree, Tree } from "./parser.ts";
import { faultAt, type Source } from "./source.ts";

/** How the constants of an equation become elements of the field. */
export interface Reading<T> {
  readonly field: Field<T>;
  /** A decimal literal, exactly. */
  number(text: string): T;
  slot(index: number): T;
  /** An inserted exponent. Undefined if the value is not a whole number. */
  exponent(index: number): number | undefined;
  /** √c, or undefined if the field has none. */
  root(c: T): T | undefined;
}

/** A letter of the equation and where it stands first. */
export interface Letter {
  readonly name: string;
  readonly offset: number;
  readonly length: number;
}

/** The letters of an equation in the order of their first appearance. */
export function lettersOf({ left, right }: EquationTree): Letter[] {
  const found = new Map<string, Letter>();
  const visit = (tree: Tree): void => {
    switch (tree.kind) {
      case "name":
        if (!found.has(tree.name)) found.set(tree.name, tree);
        break;
      case "negate":
      case "root":
        visit(tree.of);
        break;
      case "power":
        visit(tree.base);
        break;
      case "number":
      case "slot":
        break;
      default:
        visit(tree.left);
        visit(tree.right);
    }
  };
  visit(left);
  if (right) visit(right);
  return [...found.values()].sort((a, b) => a.offset - b.offset);
}

/** left − right as a polynomial in the given variables, which must hold every letter of the equation. */
export function polynomialOf<T>(
  source: Source,
  { left, right }: EquationTree,
  variables: readonly string[],
  reading: Reading<T>,
): Polynomial<T> {
  const context: Context<T> = { source, variables, reading, ring: ringOf(reading.field, variables) };
  const value = evaluate(context, left);
  return right ? subtract(reading.field, value, evaluate(context, right)) : value;
}

interface Context<T> {
  readonly source: Source;
  readonly variables: readonly string[];
  readonly reading: Reading<T>;
  readonly ring: Target<Polynomial<T>>;
}

function evaluate<T>(context: Context<T>, tree: Tree): Polynomial<T> {
  const { reading, ring, variables } = context;
  const F = reading.field;
  switch (tree.kind) {
    case "number":
      return constant(F, variables, reading.number(tree.text));
    case "slot":
      return constant(F, variables, reading.slot(tree.index));
    case "name":
      return variable(F, variables, tree.name);
    case "negate":
      return negate(F, evaluate(context, tree.of));
    case "sum":
      return ring.add(evaluate(context, tree.left), evaluate(context, tree.right));
    case "difference":
      return subtract(F, evaluate(context, tree.left), evaluate(context, tree.right));
    case "product":
      return multiply(F, evaluate(context, tree.left), evaluate(context, tree.right));
    case "quotient":
      return quotient(context, tree);
    case "power":
      return raise(F, evaluate(context, tree.base), exponentOf(context, tree));
    case "root":
      return root(context, tree);
  }
}

function quotient<T>(context: Context<T>, tree: QuotientTree): Polynomial<T> {
  const { reading, source, variables, ring } = context;
  const F = reading.field;
  const denominator = evaluate(context, tree.right);
  if (isZero(denominator)) {
    throw faultAt(source, {
      offset: tree.right.offset,
      given: "division by zero",
      expected: "a denominator that is not 0",
    });
  }
  const value = constantValue(denominator);
  if (value === undefined) {
    throw faultAt(source, {
      offset: tree.right.offset,
      given: "a letter in a denominator",
      expected: "a polynomial equation",
      hint: "Multiply the equation out first.",
    });
  }
  return ring.mul(evaluate(context, tree.left), constant(F, variables, F.inv(value)));
}

function exponentOf<T>({ reading, source }: Context<T>, tree: PowerTree): number {
  if ("value" in tree.exponent) return tree.exponent.value;
  const value = reading.exponent(tree.exponent.slot);
  if (value !== undefined) return value;
  throw faultAt(source, {
    offset: tree.offset,
    given: "the inserted exponent is not a whole number",
    expected: "an exponent 0, 1, 2, ...",
  });
}

function root<T>(context: Context<T>, tree: RootTree): Polynomial<T> {
  const { reading, source, variables } = context;
  const value = constantValue(evaluate(context, tree.of));
  const result = value === undefined ? undefined : reading.root(value);
  if (result !== undefined) return constant(reading.field, variables, result);
  throw faultAt(source, {
    offset: tree.offset,
    given:
      value === undefined ? "a letter under a root" : `√${reading.field.format(value)} is not in ${reading.field.name}`,
    expected: `a number of ${reading.field.name}`,
    ...(value === undefined ? {} : { hint: `Insert it as \${quadratic(${reading.field.format(value)})}.` }),
  });
}

function constantValue<T>(f: Polynomial<T>): T | undefined {
  return f.terms.size === 1 ? f.terms.get(0) : undefined;
}
