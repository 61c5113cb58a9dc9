// An elliptic function from its principal parts: (A(℘) + B(℘)℘′)/Π (℘ − ℘(p))^e over the poles.

import { abscissasBeside, type Beside, ZERO_BESIDE } from "../lattice/field/beside.ts";
import {
  addElements,
  constantElement,
  deriveElement,
  type Element,
  fieldOf,
  mulElements,
  primeElement,
  wpElement,
} from "../lattice/field/element.ts";
import type { Expression } from "../lattice/field/operations.ts";
import { exactScalar } from "../lattice/field/scalar.ts";
import { difference } from "../lattice/field/substitute.ts";
import type { PeriodLattice } from "../lattice/period-lattice.ts";
import { sameExact } from "../number/exactness.ts";
import { asDisc, refineEnclosure } from "../number/origin.ts";
import { Rational } from "../number/rational.ts";
import { apply, Complex, type Real } from "../number/values.ts";
import { UndecidedError } from "../proof/errors.ts";
import { scalarOf } from "./constant.ts";
import { EllipticFunction, type FunctionPoint } from "./elliptic-function.ts";
import type { ZetaPart } from "./function-forms.ts";
import { weightOf } from "./function-forms.ts";
import { QuasiPeriodicFunction } from "./quasi-periodic-function.ts";
import type { TorusPoint } from "./torus-point.ts";

/** A factor (℘ − ℘(p))^e of the denominator, with the orders of the poles p and −p. */
interface Factor {
  readonly at: TorusPoint;
  readonly x: Real | Complex;
  readonly u: Element;
  readonly exponent: number;
  readonly orders: number;
  readonly parts: readonly TorusPart[];
}

/** A principal part at a point of the torus. */
export interface TorusPart extends ZetaPart {
  readonly at: TorusPoint;
}

const isZeroPoint = (p: TorusPoint) => p.coordinates.every((q) => q.isInteger()) && !p.remainder;

/** Half-periods have p = −p. */
function isOwnMirror(p: TorusPoint): boolean {
  return !p.remainder && p.coordinates.every((q) => q.times(2).isInteger());
}

/** One point by the same coordinates and the same number, or by a difference that is exactly a lattice point. */
function isSame(p: TorusPoint, q: TorusPoint): boolean {
  const gap = p.minus(q);
  if (!gap.coordinates.every((r) => r.isInteger())) return false;
  return !gap.remainder || isExactZero(gap.remainder);
}

function isExactZero({ exact }: Real | Complex): boolean {
  return exact !== undefined && sameExact(exact, Rational.zero);
}

/** The factors of the denominator, one for p and −p together. */
export function factorsOf(lattice: PeriodLattice, parts: readonly TorusPart[]): Factor[] {
  const list: Factor[] = [];
  for (const part of parts) {
    const { at, coefficients } = part;
    if (isZeroPoint(at)) continue;
    const n = coefficients.length;
    const k = list.findIndex((f) => isSame(f.at, at.neg()));
    if (k >= 0 && !isOwnMirror(at)) {
      const old = list[k]!;
      list[k] = { ...old, exponent: Math.max(old.exponent, n), orders: old.orders + n, parts: [...old.parts, part] };
      continue;
    }
    const x = EllipticFunction.wp(lattice)(at.reduced);
    const u = difference(wpElement(fieldOf(lattice)), constant(lattice, x));
    list.push({ at, x, u, exponent: n, orders: n, parts: [part] });
  }
  return list;
}

/** The function with these parts and this constant. */
export function elementOfParts(lattice: PeriodLattice, parts: readonly TorusPart[], added: Real | Complex): Element {
  const factors = factorsOf(lattice, parts);
  const field = fieldOf(lattice);
  const all = (less: (f: Factor) => number) =>
    factors.reduce((p, f) => mulElements(p, power(f.u, f.exponent - less(f))), constantElement(field, field.ring.one));
  let top = mulElements(
    constant(lattice, added),
    all(() => 0),
  );
  for (const part of parts) {
    const own = factors.find((f) => f.parts.includes(part));
    const rest = all((f) => (f === own ? part.coefficients.length : 0));
    top = addElements(top, mulElements(own ? topOver(lattice, part, own.u) : atOrigin(lattice, part), rest));
  }
  return over(
    top,
    all(() => 0),
  );
}

/** top/bottom for bottom a polynomial in ℘: 1/bottom by its norm would leave it twice in the fraction. */
function over(top: Element, bottom: Element): Element {
  const { field } = top;
  const constants = new Map([...top.constants, ...bottom.constants]);
  return addElements({ field, A: top.A, B: top.B, D: bottom.A, constants }, constantElement(field, field.ring.zero));
}

/** Σ c_k (−1)^k/(k−1)! ℘^(k−2); ζ itself drops out, as the residues add up to 0. */
function atOrigin(lattice: PeriodLattice, { coefficients }: TorusPart): Element {
  const field = fieldOf(lattice);
  let [sum, derivative] = [constantElement(field, field.ring.zero), wpElement(field)];
  for (const [k, c] of coefficients.entries()) {
    if (k === 0) continue;
    sum = addElements(sum, mulElements(constant(lattice, c.times(weightOf(k + 1))), derivative));
    derivative = deriveElement(derivative);
  }
  return sum;
}

/**
 * The part at p over u^n, u = ℘ − x: ζ(z − p) → (½(℘′ + y) − ζ(p) u)/u, ℘(z − p) = N_2/u² with N_2 = ¼(℘′ + y)² − (℘ + x)u² and
 * ℘^(k−2)(z − p) = N_k/u^k, N_(k+1) = N_k′ u − k N_k ℘′   (DLMF 23.10.1, 23.10.2).
 */
function topOver(lattice: PeriodLattice, { at, coefficients }: TorusPart, u: Element): Element {
  const field = fieldOf(lattice);
  const wp = EllipticFunction.wp(lattice);
  const p = at.reduced;
  const rational = (q: Rational) => constantElement(field, exactScalar(q));
  const sum = addElements(primeElement(field), constant(lattice, wp.prime(p)));
  const n = coefficients.length;
  const zeta = constant(lattice, new QuasiPeriodicFunction(lattice, "zeta")(at));
  const first = difference(mulElements(rational(Rational.of(1, 2)), sum), mulElements(zeta, u));
  let top = mulElements(mulElements(constant(lattice, coefficients[0]!), first), power(u, n - 1));
  const both = addElements(wpElement(field), constant(lattice, wp(p)));
  const quarter = mulElements(rational(Rational.of(1, 4)), power(sum, 2));
  let N = difference(quarter, mulElements(both, power(u, 2)));
  for (let k = 2; k <= n; k++) {
    const weight = constant(lattice, coefficients[k - 1]!.times(weightOf(k)));
    top = addElements(top, mulElements(mulElements(weight, N), power(u, n - k)));
    const slope = mulElements(rational(Rational.of(k)), mulElements(N, primeElement(field)));
    if (k < n) N = difference(mulElements(deriveElement(N), u), slope);
  }
  return top;
}

function power(f: Element, n: number): Element {
  let value = constantElement(f.field, f.field.ring.one);
  for (let k = 0; k < n; k++) value = mulElements(value, f);
  return value;
}

function constant(lattice: PeriodLattice, value: Real | Complex): Element {
  const field = fieldOf(lattice);
  const { scalar, constants } = scalarOf(field, value);
  return constantElement(field, scalar, constants);
}

/** Whether −p has the coefficients (−1)^k c_k for every part, exactly. */
function isEven(parts: readonly TorusPart[]): boolean {
  return parts.every(({ at, coefficients }) => {
    const mirror = parts.find((other) => isSame(other.at, at.neg()));
    if (mirror?.coefficients.length !== coefficients.length) return false;
    return coefficients.every((c, k) => {
      const gap = k % 2 === 1 ? c.minus(mirror.coefficients[k]!) : c.plus(mirror.coefficients[k]!);
      return isExactZero(gap);
    });
  });
}

const LADDER = [128, 256, 512, 1024];

/**
 * The zeros off the lattice by enclosures: all simple, which separate enclosures of ℘ there prove.
 * Throws   UndecidedError where they do not separate.
 */
export function zerosBeside(expression: Expression, parts: readonly TorusPart[]): FunctionPoint[] {
  const factors = factorsOf(expression.element.field.lattice, parts);
  const known: Beside = {
    times: factors.map(({ exponent, orders }) => 2 * exponent - orders),
    zeros: parts.reduce((sum, { coefficients }) => sum + coefficients.length, 0),
    even: isEven(parts),
  };
  const sides = known.even ? ([1, -1] as const) : ([1] as const);
  for (const prec of LADDER) {
    const xs = factors.map(({ x }) => asDisc(refineEnclosure(x, prec + 32)));
    const found = abscissasBeside(expression.element, known, xs, prec);
    if (!found) continue;
    const rest = factors.map(({ x }) => x);
    return found.flatMap((anchor) =>
      sides.map((side) => ({
        point: Complex.from(apply(ZERO_BESIDE, [expression, { ...known, anchor, side }, ...rest])),
        multiplicity: 1,
      })),
    );
  }
  throw new UndecidedError({
    subject: "zeros",
    given: "principal parts whose function has zeros that enclosures do not separate, or one at 0",
    expected: "simple zeros away from the lattice points",
    hint: 'Multiplicities are decided for exact parts at half-periods, and given by L.elliptic({ zeros, poles }); as("zeta") needs no zeros.',
  });
}
