// f(nz) and f(αz) as functions of z.

import { cmElements, cmMultiple } from "../lattice/field/cm-multiple.ts";
import { type Element, reflectElement } from "../lattice/field/element.ts";
import { exactOf } from "../lattice/field/scalar.ts";
import { multipleElement, substituted } from "../lattice/field/substitute.ts";
import { Quadratic } from "../number/quadratic.ts";
import { Rational } from "../number/rational.ts";
import { type ComplexNumeric, scalar } from "../number/values.ts";
import { DomainError } from "../proof/errors.ts";

/** Largest norm that is worked out: the system grows with its third power, in numbers that grow, too. */
const MOST_NORM = 30n;

/** See `EllipticFunction.multiple`. */
export function multipleOf(f: Element, factor: ComplexNumeric): Element {
  const { exact } = scalar(factor, "multiple");
  if (exact instanceof Rational || (exact instanceof Quadratic && exact.isRational())) {
    const n = exact instanceof Rational ? exact : exact.a;
    if (!n.isInteger() || n.sign() === 0 || n.abs().num > 100n) throw noMultiple(`n = ${factor}`);
    const element = multipleElement(f, Number(n.abs().num));
    return n.sign() < 0 ? reflectElement(element) : element;
  }
  if (!(exact instanceof Quadratic) || exact.d > 0n) throw noMultiple(`the number ${factor}`);
  return complexMultiple(f, exact);
}

function complexMultiple(f: Element, alpha: Quadratic): Element {
  const { field } = f;
  const [norm, trace] = [alpha.norm(), alpha.trace()];
  if (!norm.isInteger() || !trace.isInteger()) throw noMultiple(`α = ${alpha} with norm ${norm} and trace ${trace}`);
  if (norm.num > MOST_NORM) {
    throw new DomainError({
      subject: "multiple",
      given: `α = ${alpha}, whose formula has degree ${norm}`,
      expected: `a norm up to ${MOST_NORM}`,
      hint: "Evaluate f(α z) as it stands, or compose multiples of smaller norm.",
      argument: "n",
    });
  }
  if (field.cubic.some((c) => exactOf(c) === undefined)) {
    throw new DomainError({
      subject: "multiple",
      given: "a lattice whose g2 and g3 are not both known exactly",
      expected: "exact invariants in the field of α",
      hint: "Give the lattice by { invariants } or { j }: the same lattice up to a factor.",
    });
  }
  const found = cmMultiple(field, alpha, Number(norm.num));
  if (!found) {
    throw new DomainError({
      subject: "multiple",
      given: `α = ${alpha}`,
      expected: "a complex multiplication of the lattice",
      hint: "L.complexMultiplication() tells whether there is any, and its order.",
      argument: "n",
    });
  }
  return substituted(f, cmElements(field, alpha, found));
}

function noMultiple(given: string): DomainError {
  return new DomainError({
    subject: "multiple",
    given,
    expected:
      "an integer other than 0 from −100 to 100, or an exact algebraic integer of an imaginary quadratic field, as exact`1 + i`",
    argument: "n",
  });
}
