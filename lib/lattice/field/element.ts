// Elliptic functions of one lattice as (A(x) + B(x) y)/D(x) with x = ℘, y = ℘′, y² = 4x³ − g2 x − g3, exactly.

import type { Field } from "../../algebra/field.ts";
import {
  addUni,
  deriveUni,
  divideUni,
  gcdUni,
  mulUni,
  scaleUni,
  subUni,
  type Univariate,
} from "../../algebra/univariate.ts";
import type { Node } from "../../number/origin.ts";
import { Rational } from "../../number/rational.ts";
import { exactInvariant } from "../exact-invariants.ts";
import type { PeriodLattice } from "../period-lattice.ts";
import { type Constants, exactOf, exactScalar, namedScalar, type Scalar, scalarRing } from "./scalar.ts";

export type ScalarPolynomial = Univariate<Scalar>;

/** The field of elliptic functions of a lattice. */
export interface FunctionField {
  readonly lattice: PeriodLattice;
  readonly ring: Field<Scalar>;
  /** 4x³ − g2 x − g3. */
  readonly cubic: ScalarPolynomial;
}

/** (A + B y)/D, D not zero; constants by name. */
export interface Element {
  readonly field: FunctionField;
  readonly A: ScalarPolynomial;
  readonly B: ScalarPolynomial;
  readonly D: ScalarPolynomial;
  readonly constants: Constants;
}

const fields = new WeakMap<PeriodLattice, FunctionField>();

/** The function field of a lattice: g2 and g3 exactly where they are known so, else by name. */
export function fieldOf(lattice: PeriodLattice): FunctionField {
  const known = fields.get(lattice);
  if (known) return known;
  const constant = (name: "g2" | "g3"): Scalar => {
    const exact = exactInvariant(lattice, name);
    return exact ? exactScalar(exact) : namedScalar(name);
  };
  const [g2, g3] = [constant("g2"), constant("g3")];
  const ring = scalarRing({ g2, g3 });
  const four = exactScalar(Rational.of(4));
  const field: FunctionField = { lattice, ring, cubic: [ring.neg(g3), ring.neg(g2), ring.zero, four] };
  fields.set(lattice, field);
  return field;
}

const NONE: Constants = new Map();

export function constantElement(field: FunctionField, value: Scalar, constants: Constants = NONE): Element {
  const A = field.ring.isZero(value) ? [] : [value];
  return { field, A, B: [], D: [field.ring.one], constants };
}

/** ℘. */
export function wpElement(field: FunctionField): Element {
  const { ring } = field;
  return { field, A: [ring.zero, ring.one], B: [], D: [ring.one], constants: NONE };
}

/** ℘′. */
export function primeElement(field: FunctionField): Element {
  const { ring } = field;
  return { field, A: [], B: [ring.one], D: [ring.one], constants: NONE };
}

function united(f: Element, g: Element): Constants {
  if (f.constants.size === 0) return g.constants;
  return g.constants.size === 0 ? f.constants : new Map<string, Node>([...f.constants, ...g.constants]);
}

/** The element with common factors of A, B and D taken out, where all coefficients are exact, and D monic. */
function tidy(
  field: FunctionField,
  A: ScalarPolynomial,
  B: ScalarPolynomial,
  D: ScalarPolynomial,
  constants: Constants,
): Element {
  const { ring } = field;
  const exact = [A, B, D].every((p) => p.every((c) => exactOf(c) !== undefined));
  if (!exact) {
    if (D.length !== 1 || exactOf(D[0]!) === undefined) return { field, A, B, D, constants };
    const by = ring.inv(D[0]!);
    return { field, A: scaleUni(ring, by, A), B: scaleUni(ring, by, B), D: [ring.one], constants };
  }
  const common = gcdUni(ring, gcdUni(ring, A, B), D);
  const cut = (p: ScalarPolynomial) => (p.length === 0 ? p : divideUni(ring, p, common).quotient);
  const bottom = cut(D);
  const by = ring.inv(bottom[bottom.length - 1]!);
  return {
    field,
    A: scaleUni(ring, by, cut(A)),
    B: scaleUni(ring, by, cut(B)),
    D: scaleUni(ring, by, bottom),
    constants,
  };
}

export function addElements(f: Element, g: Element): Element {
  const { field } = f;
  const { ring } = field;
  const cross = (p: ScalarPolynomial, q: ScalarPolynomial) => addUni(ring, mulUni(ring, p, g.D), mulUni(ring, q, f.D));
  return tidy(field, cross(f.A, g.A), cross(f.B, g.B), mulUni(ring, f.D, g.D), united(f, g));
}

export function negElement(f: Element): Element {
  const minus = f.field.ring.fromInt(-1n);
  return { ...f, A: scaleUni(f.field.ring, minus, f.A), B: scaleUni(f.field.ring, minus, f.B) };
}

export function mulElements(f: Element, g: Element): Element {
  const { field } = f;
  const { ring, cubic } = field;
  const times = (p: ScalarPolynomial, q: ScalarPolynomial) => mulUni(ring, p, q);
  const A = addUni(ring, times(f.A, g.A), times(times(f.B, g.B), cubic));
  const B = addUni(ring, times(f.A, g.B), times(f.B, g.A));
  return tidy(field, A, B, times(f.D, g.D), united(f, g));
}

export function isZeroElement(f: Element): boolean {
  return f.A.length === 0 && f.B.length === 0;
}

/** A² − B² (4x³ − g2 x − g3): the numerator times its conjugate. */
export function normOf({ field, A, B }: Element): ScalarPolynomial {
  const { ring, cubic } = field;
  return subUni(ring, mulUni(ring, A, A), mulUni(ring, mulUni(ring, B, B), cubic));
}

/** 1/f = D (A − B y)/(A² − B² y²). */
export function invElement(f: Element): Element {
  const { field, A, B, D, constants } = f;
  const { ring } = field;
  const minus = scaleUni(ring, ring.fromInt(-1n), B);
  return tidy(field, mulUni(ring, D, A), mulUni(ring, D, minus), normOf(f), constants);
}

/** f = g as functions, by the normal forms: true is a proof, and false is one if no constant but g2, g3 and roots is named. */
export function sameElement(f: Element, g: Element): boolean {
  return isZeroElement(addElements(f, negElement(g)));
}

/**
 * df/dz: x′ = y, y′ = 6x² − g2/2, so that with ′ for d/dx
 * (A + By)/D has the derivative ((A′y + B′y² + B(6x² − g2/2)) D − (A + By) D′y)/D².
 */
export function deriveElement(f: Element): Element {
  const { field, A, B, D, constants } = f;
  const { ring, cubic } = field;
  const times = (p: ScalarPolynomial, q: ScalarPolynomial) => mulUni(ring, p, q);
  const slope = scaleUni(ring, exactScalar(Rational.of(1, 2)), deriveUni(ring, cubic));
  const [dA, dB, dD] = [deriveUni(ring, A), deriveUni(ring, B), deriveUni(ring, D)];
  const even = subUni(ring, times(addUni(ring, times(dB, cubic), times(B, slope)), D), times(times(B, dD), cubic));
  const odd = subUni(ring, times(dA, D), times(A, dD));
  return tidy(field, even, odd, times(D, D), constants);
}

/** f(−z). */
export function reflectElement(f: Element): Element {
  return { ...f, B: scaleUni(f.field.ring, f.field.ring.fromInt(-1n), f.B) };
}
