// Elliptic functions to order: from zeros and poles, and from principal parts.

import {
  addElements,
  constantElement,
  type Element,
  fieldOf,
  mulElements,
  primeElement,
  wpElement,
} from "../lattice/field/element.ts";
import { type Condition, numerator, productOfLinear } from "../lattice/field/interpolation.ts";
import { DENOMINATOR, type DivisorData, expressionOf, NUMERATOR } from "../lattice/field/operations.ts";
import { exactOf, exactScalar, type Scalar } from "../lattice/field/scalar.ts";
import { difference, quotient } from "../lattice/field/substitute.ts";
import { isExactElement } from "../lattice/field/valuation.ts";
import type { PeriodLattice } from "../lattice/period-lattice.ts";
import { workingPrecision } from "../number/context.ts";
import * as disc from "../number/disc.ts";
import { asDisc } from "../number/origin.ts";
import { Rational } from "../number/rational.ts";
import { apply, type Complex, type ComplexNumeric, Real, scalar } from "../number/values.ts";
import { DomainError } from "../proof/errors.ts";
import type { Standing } from "../proof/standing.ts";
import { scalarOf } from "./constant.ts";
import { EllipticFunction, type FunctionPoint } from "./elliptic-function.ts";
import { isAmong, sigmaSeries, zetaSeries } from "./form-series.ts";
import { onTorus, ZetaForm } from "./function-forms.ts";
import type { LaurentExpansion } from "./laurent-expansion.ts";
import { elementOfParts, type TorusPart, zerosBeside } from "./principal-parts.ts";
import { QuasiPeriodicFunction } from "./quasi-periodic-function.ts";
import { TorusPoint } from "./torus-point.ts";

/** A point, or a point with a multiplicity. */
export type Weighted = ComplexNumeric | { readonly point: ComplexNumeric; readonly multiplicity: number };

/** The principal part Σ c_k (z − at)^−k, k = 1, 2, ... */
export interface PrincipalPart {
  readonly at: ComplexNumeric;
  readonly coefficients: readonly ComplexNumeric[];
}

/** What determines an elliptic function: its zeros and poles (up to a factor), or its principal parts (up to a constant). */
export type EllipticData =
  | { readonly zeros: readonly Weighted[]; readonly poles: readonly Weighted[] }
  | { readonly principalParts: readonly PrincipalPart[]; readonly constant?: ComplexNumeric };

/** An elliptic function that was made from its zeros and poles, which it keeps. */
export class DivisorFunction extends EllipticFunction {
  private readonly givenZeros: readonly FunctionPoint[];
  private readonly givenPoles: readonly FunctionPoint[];

  constructor(element: Element, zeros: readonly FunctionPoint[], poles: readonly FunctionPoint[]) {
    super(element, (z, value) => (isAmong(zeros, z) ? Real.from(0) : value()));
    this.givenZeros = zeros;
    this.givenPoles = poles;
  }

  override get zeros(): readonly FunctionPoint[] {
    return this.givenZeros;
  }

  override get poles(): readonly FunctionPoint[] {
    return this.givenPoles;
  }

  /**
   * How Abel's condition is known: proved where all zeros and poles are exact points of the torus; with numbers among them only that the
   * sums agree within the enclosures, and then the function is one whose zeros and poles lie in these.
   */
  get abel(): Standing {
    const sum = (list: readonly FunctionPoint[]) => total(this.lattice, list as readonly Weight[]);
    const gap = sum(this.givenZeros).minus(sum(this.givenPoles));
    const rest = gap.remainder;
    if (!rest || isExactZero(rest)) {
      return {
        kind: "proved",
        argument: `zeros and poles differ by ${gap.name}, a lattice point, in exact coordinates`,
      };
    }
    const digits = Math.max(0, Math.floor(-disc.magnitude(asDisc(rest.enclosure)) * 0.30103));
    return { kind: "certified", digits, bits: workingPrecision(), once: "the sums were given as numbers" };
  }

  /** 1: the function is the one with z^k + ... at 0. */
  override get leadingAtZero(): Real {
    return Real.from(1);
  }

  /** At one of the given zeros and poles by the σ-quotient, in which its multiplicity stands. */
  override laurent(p: ComplexNumeric, n = 8): LaurentExpansion {
    if (!isAmong([...this.givenZeros, ...this.givenPoles], p)) return super.laurent(p, n);
    return sigmaSeries(this.as("sigma"), onTorus(this.lattice, p), n);
  }

  /**
   * The value by the quotient Π σ(z − a)/Π σ(z − b) with representatives of equal sum, scaled to the same leading term: a second route.
   */
  bySigma(z: ComplexNumeric): Real | Complex {
    const lattice = this.lattice;
    const sigma = new QuasiPeriodicFunction(lattice, "sigma");
    const [zeros, poles] = sameSum(lattice, this.givenZeros, this.givenPoles);
    const product = (list: readonly TorusPoint[], at: (p: TorusPoint) => Real | Complex) =>
      list.reduce<Real | Complex>((sum, p) => sum.times(at(p)), Real.from(1));
    const here = onTorus(lattice, z);
    const value = (p: TorusPoint) => sigma(here.minus(p));
    // σ(z − p) ~ σ(−p), or z for p = 0: the leading term at 0 is to be a power of z.
    const scale = (p: TorusPoint) => (isZeroPoint(p) ? Real.from(1) : sigma(p.neg()));
    const numerator = product(zeros, value).times(product(poles, scale));
    return numerator.div(product(poles, value).times(product(zeros, scale)));
  }
}

/** An elliptic function that was made from its principal parts, which it keeps. */
export class PrincipalPartsFunction extends EllipticFunction {
  private readonly constant: Real | Complex;
  private readonly parts: readonly TorusPart[];

  constructor(element: Element, constant: Real | Complex, parts: readonly TorusPart[]) {
    super(element);
    this.constant = constant;
    this.parts = parts;
  }

  /** The ζ-sum of the given parts and constant. */
  protected override get zeta(): ZetaForm {
    return new ZetaForm(this, this.constant, this.parts, EllipticFunction.wp(this.lattice));
  }

  override get poles(): readonly FunctionPoint[] {
    return this.parts.map(({ at, coefficients }) => ({ point: at, multiplicity: coefficients.length }));
  }

  /** With coefficients that are not exact the zeros are those beside the known poles, and have to be simple. */
  override get zeros(): readonly FunctionPoint[] {
    if (isExactElement(this.element) || this.parts.length === 0) return super.zeros;
    return zerosBeside(expressionOf(this.element), this.parts);
  }

  /** The leading coefficient of the part at 0, or the value there. */
  override get leadingAtZero(): Real | Complex {
    const own = this.parts.find(({ at }) => isOrigin(at));
    return own ? own.coefficients.at(-1)! : this.zeta(0);
  }

  /** At one of the given poles with the given principal part. */
  override laurent(p: ComplexNumeric, n = 8): LaurentExpansion {
    if (!isAmong(this.poles, p)) return super.laurent(p, n);
    return zetaSeries(this.zeta, EllipticFunction.wp(this.lattice), onTorus(this.lattice, p), n);
  }
}

/** See `Lattice.elliptic`. */
export function ellipticFunction(lattice: PeriodLattice, data: EllipticData): EllipticFunction {
  if ("principalParts" in data) return fromPrincipalParts(lattice, data.principalParts, data.constant ?? 0);
  return fromDivisor(
    lattice,
    data.zeros.map((p) => weighted(lattice, p)),
    data.poles.map((p) => weighted(lattice, p)),
  );
}

interface Weight {
  readonly point: TorusPoint;
  readonly multiplicity: number;
}

function weighted(lattice: PeriodLattice, p: Weighted): Weight {
  const pair = typeof p === "object" && p !== null && "point" in p && "multiplicity" in p;
  const point = onTorus(lattice, pair ? p.point : p);
  const multiplicity = pair ? p.multiplicity : 1;
  if (Number.isSafeInteger(multiplicity) && multiplicity >= 1) return { point, multiplicity };
  throw new DomainError({
    subject: "elliptic",
    given: `the multiplicity ${multiplicity}`,
    expected: "an integer >= 1",
  });
}

/** 0 of the torus, by exact coordinates and a remainder that is exactly 0. */
function isOrigin(p: TorusPoint): boolean {
  if (!p.coordinates.every((q) => q.isInteger())) return false;
  return !p.remainder || isExactZero(p.remainder);
}

function isZeroPoint(p: TorusPoint): boolean {
  return isOrigin(p) && p.coordinates.every((q) => q.sign() === 0);
}

function isExactZero(x: Real | Complex): boolean {
  if (x.exact) return x.exact instanceof Rational && x.exact.sign() === 0;
  return false;
}

function total(lattice: PeriodLattice, list: readonly Weight[]): TorusPoint {
  return list.reduce(
    (sum, { point, multiplicity }) => sum.plus(point.times(multiplicity)),
    new TorusPoint(lattice, [Rational.zero, Rational.zero]),
  );
}

function fromDivisor(lattice: PeriodLattice, zeros: readonly Weight[], poles: readonly Weight[]): EllipticFunction {
  const count = (list: readonly Weight[]) => list.reduce((sum, { multiplicity }) => sum + multiplicity, 0);
  if (count(zeros) !== count(poles)) {
    throw new DomainError({
      subject: "elliptic",
      given: `${count(zeros)} zeros and ${count(poles)} poles, with multiplicity`,
      expected: "as many zeros as poles",
    });
  }
  checkAbel(total(lattice, zeros).minus(total(lattice, poles)), count(zeros));
  // A pole at b is a zero at −b over ℘ − ℘(b).
  const away = (list: readonly Weight[]) => list.filter(({ point }) => !isOrigin(point));
  const mirrored = away(poles).map(({ point, multiplicity }) => ({ point: point.neg(), multiplicity }));
  const top = numeratorOver(lattice, joined([...away(zeros), ...mirrored]));
  return new DivisorFunction(quotient(top, denominatorOver(lattice, away(poles))), zeros, poles);
}

/** Equal points as one with the multiplicities added. */
function joined(list: readonly Weight[]): Weight[] {
  const out: Weight[] = [];
  for (const { point, multiplicity } of list) {
    const k = out.findIndex((w) => isOrigin(w.point.minus(point)));
    if (k < 0) out.push({ point, multiplicity });
    else out[k] = { point, multiplicity: out[k]!.multiplicity + multiplicity };
  }
  return out;
}

/** Points with rational ℘ and ℘′: there the coefficients are exact. */
function exactPoints(lattice: PeriodLattice, list: readonly Weight[]): Condition<Scalar>[] | undefined {
  const wp = EllipticFunction.wp(lattice);
  const out: Condition<Scalar>[] = [];
  for (const { point, multiplicity } of list) {
    if (point.order !== 2n) return undefined;
    const [x, y] = [wp(point).exact, wp.prime(point).exact];
    if (!x || !y) return undefined;
    out.push({ x: exactScalar(x), y: exactScalar(y), multiplicity });
  }
  return out;
}

function numeratorOver(lattice: PeriodLattice, list: readonly Weight[]): Element {
  const field = fieldOf(lattice);
  const n = list.reduce((sum, { multiplicity }) => sum + multiplicity, 0);
  const x = wpElement(field);
  if (n === 0) return constantElement(field, field.ring.one);
  // ±p, or twice a half-period: ℘ − ℘(p).
  if (n === 2) return vertical(lattice, list[0]!.point);
  const exact = exactPoints(lattice, list);
  const g2 = field.ring.neg(field.cubic[1] ?? field.ring.zero);
  if (exact && exactOf(g2)) {
    const { A, B } = numerator(field.ring, g2, n, exact, (s) => (s.size === 0 ? Number.NEGATIVE_INFINITY : 0));
    return addElements(
      polynomial(
        A.map((c) => constantElement(field, c)),
        x,
      ),
      mulElements(
        polynomial(
          B.map((c) => constantElement(field, c)),
          x,
        ),
        primeElement(field),
      ),
    );
  }
  const { data, rest } = divisorData(lattice, list);
  const coefficient = (k: number) => constant(lattice, apply(NUMERATOR, [data, k, ...rest], leading(n, k)));
  const A = Array.from({ length: Math.floor(n / 2) + 1 }, (_, k) => coefficient(k));
  const B = n < 3 ? [] : Array.from({ length: Math.floor((n - 3) / 2) + 1 }, (_, k) => coefficient(-1 - k));
  return addElements(polynomial(A, x), mulElements(polynomial(B, x), primeElement(field)));
}

/** The coefficient of the leading term is 1, or −1/2 beside ℘′. */
function leading(n: number, k: number): Rational | undefined {
  if (k >= 0) return n % 2 === 0 && 2 * k === n ? Rational.one : undefined;
  return n % 2 === 1 && 2 * (-1 - k) + 3 === n ? Rational.of(-1, 2) : undefined;
}

function denominatorOver(lattice: PeriodLattice, list: readonly Weight[]): Element {
  const field = fieldOf(lattice);
  const n = list.reduce((sum, { multiplicity }) => sum + multiplicity, 0);
  const exact = exactPoints(lattice, list);
  const roots = exact?.flatMap(({ x, multiplicity }) => new Array<Scalar>(multiplicity).fill(x));
  const { data, rest } = divisorData(lattice, list);
  const coefficients = roots
    ? productOfLinear(field.ring, roots).map((c) => constantElement(field, c))
    : Array.from({ length: n + 1 }, (_, k) =>
        constant(lattice, apply(DENOMINATOR, [data, k, ...rest], k === n ? Rational.one : undefined)),
      );
  return polynomial(coefficients, wpElement(field));
}

function polynomial(coefficients: readonly Element[], x: Element): Element {
  const { field } = x;
  return coefficients.reduceRight<Element>(
    (sum, c) => addElements(mulElements(sum, x), c),
    constantElement(field, field.ring.zero),
  );
}

function divisorData(lattice: PeriodLattice, list: readonly Weight[]): { data: DivisorData; rest: (Real | Complex)[] } {
  const rest: (Real | Complex)[] = [];
  const points = list.map(({ point, multiplicity }) => {
    if (!point.remainder) return { at: point.coordinates, multiplicity };
    rest.push(point.remainder);
    return { at: point.coordinates, rest: rest.length - 1, multiplicity };
  });
  return { data: { lattice, standing: lattice.standing, points }, rest };
}

function repeated(list: readonly Weight[]): TorusPoint[] {
  return list.flatMap(({ point, multiplicity }) => new Array<TorusPoint>(multiplicity).fill(point));
}

/** Abel: the zeros and the poles have the same sum modulo the lattice. */
function checkAbel(gap: TorusPoint, order: number): void {
  if (order === 1) {
    throw new DomainError({
      subject: "elliptic",
      given: "one simple pole",
      expected: "at least two poles, with multiplicity",
      hint: "The residues of an elliptic function add up to 0.",
    });
  }
  const whole = gap.coordinates.every((q) => q.isInteger());
  const rest = gap.remainder;
  if (whole && (!rest || rest.overlaps(0))) return;
  throw new DomainError({
    subject: "elliptic",
    given: `zeros and poles whose sums differ by ${gap.reduced.name}`,
    expected: "a difference in the lattice (Abel's condition)",
    hint: "Move one of them by the difference.",
  });
}

/** x − ℘(p). */
function vertical(lattice: PeriodLattice, p: TorusPoint): Element {
  return difference(wpElement(fieldOf(lattice)), constant(lattice, EllipticFunction.wp(lattice)(p.reduced)));
}

function constant(lattice: PeriodLattice, value: Real | Complex): Element {
  const field = fieldOf(lattice);
  const { scalar: s, constants } = scalarOf(field, value);
  return constantElement(field, s, constants);
}

/** Representatives with equal sums: the last zero is moved by the lattice vector between the sums. */
function sameSum(
  lattice: PeriodLattice,
  zeros: readonly FunctionPoint[],
  poles: readonly FunctionPoint[],
): [TorusPoint[], TorusPoint[]] {
  const [a, b] = [zeros, poles].map((list) =>
    list.map(({ point, multiplicity }) => ({ point: onTorus(lattice, point), multiplicity })),
  ) as [Weight[], Weight[]];
  const gap = total(lattice, b).minus(total(lattice, a));
  const list = repeated(a);
  const last = list.pop()!;
  const shift = new TorusPoint(lattice, gap.coordinates);
  return [[...list, last.plus(shift)], repeated(b)];
}

/** Σ over the parts of c_1 ζ(z − p) + Σ_{k>=2} c_k (−1)^k/(k−1)! ℘^(k−2)(z − p), plus the constant; the residues add up to 0. */
function fromPrincipalParts(
  lattice: PeriodLattice,
  parts: readonly PrincipalPart[],
  added: ComplexNumeric,
): EllipticFunction {
  const residues = parts.map(({ coefficients }) => scalar(coefficients[0] ?? 0, "elliptic"));
  const sum = residues.reduce<Real | Complex>((s, c) => s.plus(c), Real.from(0));
  if (sum.exact ? !isExactZero(sum) : !sum.overlaps(0)) {
    throw new DomainError({
      subject: "elliptic",
      given: `residues with the sum ${sum}`,
      expected: "residues that add up to 0",
      argument: "principalParts",
    });
  }
  const kept = keptParts(lattice, parts);
  const constantTerm = scalar(added, "elliptic");
  return new PrincipalPartsFunction(elementOfParts(lattice, kept, constantTerm), constantTerm, kept);
}

/** The parts as points with their coefficients, without zeros at the end; parts at one point must be given as one. */
function keptParts(lattice: PeriodLattice, parts: readonly PrincipalPart[]): TorusPart[] {
  const kept = parts.map(({ at, coefficients }) => {
    const list = coefficients.map((c) => scalar(c, "elliptic"));
    while (list.length > 0 && isExactZero(list.at(-1)!)) list.pop();
    return { at: onTorus(lattice, at), coefficients: list };
  });
  kept.forEach((part, k) => {
    const twin = kept.findIndex((other) => isOrigin(other.at.minus(part.at)));
    if (twin < 0 || twin >= k) return;
    throw new DomainError({
      subject: "elliptic",
      given: `two principal parts at ${part.at.name}`,
      expected: "one principal part a point",
      hint: "Add their coefficients.",
      argument: "principalParts",
    });
  });
  return kept.filter(({ coefficients }) => coefficients.length > 0);
}
