import { gcdUni } from "../algebra/univariate.ts";
import { LatticePointError } from "../function/weierstrass.ts";
import { rationalRoot } from "../lattice/exact-roots.ts";
import { rationalPoint } from "../lattice/exact-torsion.ts";
import { coordinatesOf, type DivisorPoint, divisorOf } from "../lattice/field/divisor.ts";
import type { Element } from "../lattice/field/element.ts";
import { type LaurentSeries, type Parts, seriesAtOrigin, seriesAtPoint } from "../lattice/field/laurent.ts";
import { type Centre, COEFFICIENT, type Expression } from "../lattice/field/operations.ts";
import { exactOf, exactScalar, namedScalar, type Scalar } from "../lattice/field/scalar.ts";
import { isExactElement, orderAtOrigin } from "../lattice/field/valuation.ts";
import { LOGARITHM } from "../lattice/operations.ts";
import * as disc from "../number/disc.ts";
import { Rational } from "../number/rational.ts";
import { apply, Complex, type ComplexNumeric, Real, scalar } from "../number/values.ts";
import { DomainError } from "../proof/errors.ts";
import { constantValue } from "./constant.ts";
import { divisorPointOf } from "./divisor-points.ts";
import { TorusPoint } from "./torus-point.ts";

/** Σ c_k (z − p)^(order + k): the first coefficients of a Laurent series. */
export class LaurentExpansion {
  readonly point: TorusPoint | Complex;
  /** Exponent of the leading term: negative at a pole, positive at a zero. */
  readonly order: number;
  readonly coefficients: readonly (Real | Complex)[];
  private readonly next: (k: number) => Real | Complex;

  constructor(
    point: TorusPoint | Complex,
    order: number,
    coefficients: readonly (Real | Complex)[],
    next: (k: number) => Real | Complex,
  ) {
    this.point = point;
    this.order = order;
    this.coefficients = coefficients;
    this.next = next;
  }

  /** The coefficient of (z − p)^exponent. */
  coefficient(exponent: number): Real | Complex {
    const k = exponent - this.order;
    if (k < 0) return Real.from(0);
    return this.coefficients[k] ?? this.next(k);
  }

  /** The coefficient of 1/(z − p). */
  get residue(): Real | Complex {
    return this.coefficient(-1);
  }

  /** "t^-4 − 6 t^-3 + O(1)". */
  toString(): string {
    const terms = this.coefficients
      .map((c, k) => ({ text: `${c}`, exponent: this.order + k }))
      .filter(({ text }) => text !== "0")
      .map(({ text, exponent }) => termText(text, powerText(exponent)));
    return `${[...terms, `O(${powerText(this.order + this.coefficients.length) || "1"})`].join(" + ").replaceAll("+ −", "− ")}`;
  }
}

function powerText(exponent: number): string {
  return exponent === 0 ? "" : exponent === 1 ? "t" : `t^${exponent}`;
}

/** A coefficient before a power, its sign in front; sums and quotients in brackets. */
function termText(coefficient: string, power: string): string {
  const negative = coefficient.startsWith("-") && !/[ ]/.test(coefficient);
  const size = negative ? coefficient.slice(1) : coefficient;
  const sign = negative ? "−" : "";
  if (power === "") return `${sign}${size}`;
  if (size === "1") return `${sign}${power}`;
  return `${sign}${/[ /]/.test(size) ? `(${size})` : size} ${power}`;
}

/** Throws DomainError unless n is a number of coefficients that can be asked for. */
export function checkCount(n: number): void {
  if (!(Number.isSafeInteger(n) && n >= 1 && n <= 10_000)) {
    throw new DomainError({
      subject: "laurent",
      given: `n = ${n}`,
      expected: "a number of coefficients from 1 to 10000",
      argument: "n",
    });
  }
}

/** The series of an expression at p with n coefficients. */
export function laurentExpansion(expression: Expression, p: ComplexNumeric, n: number): LaurentExpansion {
  checkCount(n);
  const point = p instanceof TorusPoint ? p : Complex.from(scalar(p, "laurent"));
  const { centre, number } = centreOf(expression.element, point, divisorPointOf(p));
  const coefficient = (k: number, exact?: LaurentSeries<Scalar>): Real | Complex => {
    const scalarValue = exact?.coefficients[k];
    const known = vanishes(expression.element, centre, point, k) ? Rational.zero : scalarValue && exactOf(scalarValue);
    return apply(COEFFICIENT, [expression, centre, k, ...(number ? [number] : [])], known);
  };
  const exact = exactSeries(expression.element, centre, point, n);
  const order = exact?.order ?? orderAt(expression.element, centre);
  const list = Array.from({ length: n }, (_, k) => coefficient(k, exact));
  return new LaurentExpansion(point, order, list, (k) =>
    coefficient(k, exactSeries(expression.element, centre, point, k + 1)),
  );
}

/** ℘ is even and ℘′ odd about lattice points and half-periods, so a function of one kind lacks every other power. */
function vanishes({ A, B, D }: Element, centre: Centre, point: unknown, k: number): boolean {
  const symmetric = centre.kind === "origin" || (centre.kind === "point" && (point as TorusPoint).order === 2n);
  if (!symmetric || (A.length > 0 && B.length > 0)) return false;
  const order = orderAt({ A, B, D } as Element, centre);
  return ((order + k) % 2 !== 0) === (B.length === 0);
}

function orderAt(element: Element, centre: Centre): number {
  if (centre.kind === "origin") return orderAtOrigin(element);
  return centre.zeros - centre.poles;
}

function centreOf(
  element: Element,
  point: TorusPoint | Complex,
  at: DivisorPoint | undefined,
): { centre: Centre; number?: Real | Complex } {
  const here = at && (at.element === element ? at : samePoint(divisorOf(element).points, at));
  if (here) {
    const { place, side } = here;
    return {
      centre: { kind: "divisor", point: here, zeros: place.inG + (side === 1 ? place.inN : 0), poles: place.inD },
    };
  }
  if (point.exact instanceof Rational && point.exact.sign() === 0) return { centre: { kind: "origin" } };
  const known = exactPoint(element, point);
  const place = known ? placeAt(element, known) : { zeros: 0, poles: 0 };
  if (!(point instanceof TorusPoint && point.lattice === element.field.lattice)) {
    return { centre: { kind: "number", ...place }, number: point };
  }
  if (point.isLatticePoint) return { centre: { kind: "origin" } };
  const [r, s] = point.coordinates;
  const centre: Centre = { kind: "point", r, s, ...place };
  return point.remainder ? { centre, number: point.remainder } : { centre };
}

interface ExactPoint {
  readonly x: Scalar;
  readonly y: Scalar;
}

/** ℘ and ℘′ at a half-period, at a point of finite order where both are rational, or at the logarithm of a point with exact coordinates. */
function exactPoint(element: Element, point: TorusPoint | Complex): ExactPoint | undefined {
  const { lattice, ring } = element.field;
  if (point instanceof TorusPoint && point.lattice === lattice) {
    if (point.order === 2n) return { x: rootScalar(element.field, halfPeriodIndex(point)), y: ring.zero };
    const rational = point.remainder ? undefined : rationalPoint(lattice, point.coordinates);
    return rational?.y && { x: exactScalar(rational.x), y: exactScalar(rational.y) };
  }
  const { origin } = point;
  if (origin?.operation !== LOGARITHM || origin.operands[0] !== lattice) return undefined;
  const [x, y] = origin.operands.slice(1).map((part) => (part as Real | Complex).exact);
  return x && y && { x: exactScalar(x), y: exactScalar(y) };
}

/** Multiplicities of numerator and denominator at an exact point, from their series over the ring of constants. */
function placeAt(element: Element, { x, y }: ExactPoint): { zeros: number; poles: number } {
  const { field, A, B, D } = element;
  const g2 = field.ring.neg(field.cubic[1] ?? field.ring.zero);
  const n = 2 * Math.max(A.length, B.length + 2, D.length) + 2;
  const order = (numerator: Pick<Parts<Scalar>, "A" | "B">) => {
    const parts = { ...numerator, D: [field.ring.one], g2, g3: g2 };
    return seriesAtPoint(field.ring, parts, x, y, 0, 0, n).coefficients.findIndex((c) => c.size > 0);
  };
  return { zeros: Math.max(0, order({ A, B })), poles: order({ A: D, B: [] }) };
}

function rootScalar({ lattice, ring }: Element["field"], index: 1 | 2 | 3): Scalar {
  const rational = rationalRoot(lattice, index);
  if (rational) return exactScalar(rational);
  return index === 3 ? ring.neg(ring.add(namedScalar("e1"), namedScalar("e2"))) : namedScalar(`e${index}`);
}

/** The zero or pole in a list that is the given point: of a common factor, with overlapping coordinates. */
function samePoint(list: readonly DivisorPoint[], at: DivisorPoint): DivisorPoint | undefined {
  const { ring } = at.element.field;
  const here = coordinatesOf(at, 128);
  return list.find((other) => {
    const exact = isExactElement(other.element) && isExactElement(at.element);
    if (exact && gcdUni(ring, other.place.q, at.place.q).length < 2) return false;
    const there = coordinatesOf(other, 128);
    return disc.overlaps(here.x, there.x) && disc.overlaps(here.y, there.y);
  });
}

function halfPeriodIndex(point: TorusPoint): 1 | 2 | 3 {
  const [first, second] = point.coordinates.map((q) => !q.isInteger());
  return first ? (second ? 2 : 1) : 3;
}

/** The series with exact coefficients, at lattice points and where ℘ and ℘′ are exact. */
function exactSeries(
  element: Element,
  centre: Centre,
  point: TorusPoint | Complex,
  n: number,
): LaurentSeries<Scalar> | undefined {
  const { field, A, B, D } = element;
  const lead = D[D.length - 1]!;
  const [g3, g2] = [
    field.ring.neg(field.cubic[0] ?? field.ring.zero),
    field.ring.neg(field.cubic[1] ?? field.ring.zero),
  ];
  const parts: Parts<Scalar> = { A, B, D, g2, g3 };
  if (centre.kind === "origin") {
    return exactOf(lead) ? seriesAtOrigin(field.ring, parts, n) : undefined;
  }
  if (centre.kind === "divisor") return undefined;
  const at = exactPoint(element, point);
  const exact = at && [[at.x, at.y, g2], A, B, D].every((p) => p.every((c) => exactOf(c) !== undefined));
  if (!exact) return undefined;
  return seriesAtPoint(field.ring, parts, at.x, at.y, centre.zeros, centre.poles, n);
}

/** The value at a lattice point: by the leading term. Throws LatticePointError at a pole. */
export function valueAtLatticePoint(expression: Expression, z: TorusPoint, name: string): Real | Complex {
  const { element } = expression;
  const order = element.A.length === 0 && element.B.length === 0 ? 1 : orderAtOrigin(element);
  if (order > 0) return Real.from(0);
  if (order < 0) {
    const [m, n] = z.coordinates;
    throw new LatticePointError(m.num, n.num, z.name, name);
  }
  const { A, D } = element;
  const top = constantValue(expression, A[A.length - 1]!);
  return top.div(constantValue(expression, D[D.length - 1]!));
}
