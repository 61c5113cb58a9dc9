// From a curve to its torus and back: what `E.lattice()`, `E.logarithm(P)` and `E.exponential(z)` delegate to.

import { reals } from "../algebra/enclosures.ts";
import type { Field } from "../algebra/field.ts";
import { COMPLEX_LOGARITHM, canonicalPlace, REAL_LOGARITHM, realPlace, torsionIndex } from "../curve/uniformisation.ts";
import type { PeriodLattice } from "../lattice/period-lattice.ts";
import { workingPrecision } from "../number/context.ts";
import { decide } from "../number/ladder.ts";
import { asBall, asDisc, evaluate } from "../number/origin.ts";
import { Rational } from "../number/rational.ts";
import { apply, Complex, type ComplexNumeric, Real, scalar } from "../number/values.ts";
import { DomainError } from "../proof/errors.ts";
import type { Curve } from "./curve.ts";
import type { Coordinate } from "./fields.ts";
import { coordinateOf, fieldOf, joinFields } from "./fields.ts";
import type { Lattice } from "./lattice.ts";
import { lattice } from "./make-lattice.ts";
import { Point } from "./point.ts";
import { rationalPointAt } from "./torsion-places.ts";
import { TorusPoint } from "./torus-point.ts";

/** The lattice of dx/(2y + a1x + a3): invariants c4/12 and c6/216, in the real basis if the curve is real. */
export function latticeOf({ c4, c6 }: Curve<Coordinate>): Lattice {
  return lattice({ invariants: [scalar(c4, "lattice").div(12), scalar(c6, "lattice").div(216)] });
}

/** ℘ and ℘′ at a point: x + b2/12 and 2y + a1x + a3. */
function torusPlane(E: Curve<Coordinate>, [x, y]: readonly [Coordinate, Coordinate]) {
  const F = E.field;
  const [a1, , a3] = E.a;
  const twelfth = F.inv(F.fromInt(12n));
  const wp = F.add(x, F.mul(twelfth, E.b[0]));
  const prime = F.add(F.mul(F.fromInt(2n), y), F.add(F.mul(a1, x), a3));
  return { wp, prime };
}

/**
 * z with E.exponential(z) = P, in the coordinates r·ω1 + s·ω2 of L with r and s in (−1/2, 1/2].
 *
 * A torsion point over Q gives an exact point of the torus; a real point a real number t, or ω2/2 + t on the bounded component.
 */
export function logarithmOf(L: Lattice, P: Point<Coordinate>): Real | Complex | TorusPoint {
  if (!P.coordinates) return L.at(0, 0);
  const { wp, prime } = torusPlane(P.curve, P.coordinates);
  const [x, y] = [scalar(wp, "logarithm"), scalar(prime, "logarithm")];
  if (!(x instanceof Real) || !(y instanceof Real) || !L.realComponents) return complexLogarithm(L, x, y);
  if (y.exact && y.sign() === 0) return halfPeriod(L, x);
  const order = isExactField(P.curve.field.name) ? Number(P.order()) : Infinity;
  const { bounded, index } = placeOf(L.data, x, y, order);
  if (index !== undefined) return L.at(Rational.of(index, order), bounded ? Rational.of(1, 2) : 0);
  const t = apply(REAL_LOGARITHM, [L.data, x, y]) as Real;
  return bounded ? new TorusPoint(L.data, [Rational.zero, Rational.of(1, 2)], t) : t;
}

/** Which of the numbers z + Λ is meant, and on which component the point is expected. */
export interface LogarithmChoice {
  /** The representative nearest to this number, in the coordinates of the basis: on a line of the caller's choice, say ω2 + t or −ω2/2 + t. */
  readonly near?: ComplexNumeric;
  /** The component of the real curve that P has to lie on: that of O, or the bounded one. */
  readonly component?: "identity" | "bounded";
}

/** The logarithm z as the caller chose it. */
export function chosenLogarithm(
  L: Lattice,
  z: Real | Complex | TorusPoint,
  { near, component }: LogarithmChoice,
): Real | Complex | TorusPoint {
  if (component !== undefined) requireComponent(L, z, component);
  if (near === undefined) return z;
  const nearest = L.locate(scalar(near, "logarithm").minus(Complex.from(z))).nearest;
  if (nearest.isLatticePoint && nearest.coordinates.every((c) => c.sign() === 0)) return z;
  const isReal = z instanceof Real && nearest.coordinates[1].sign() === 0;
  return isReal ? z.plus(L.periods[0].re.times(nearest.coordinates[0])) : nearest.plus(z);
}

function requireComponent(L: Lattice, z: Real | Complex | TorusPoint, component: "identity" | "bounded"): void {
  const here = componentOf(L, z);
  if (here === component) return;
  throw new DomainError({
    subject: "logarithm",
    given: here ? `a point on the ${here} component` : "a point that is not known to be real",
    expected: `a point on the ${component} component`,
    hint: L.realComponents === 1 ? "This curve has one real component, that of O." : "",
    argument: "component",
  });
}

function componentOf(L: Lattice, z: Real | Complex | TorusPoint): "identity" | "bounded" | undefined {
  if (z instanceof Real) return "identity";
  if (!(z instanceof TorusPoint) || !L.realComponents || (z.remainder && !(z.remainder instanceof Real)))
    return undefined;
  if (z.coordinates[1].sign() === 0) return "identity";
  return L.realComponents === 2 ? "bounded" : undefined;
}

function isExactField(name: string): boolean {
  return name === "Q" || name.startsWith("Q(");
}

/** The component of a real point, and for torsion of order n the k with t = kω1/n, decided on the ladder. */
function placeOf(L: PeriodLattice, x: Real, y: Real, order: number) {
  return decide("logarithm", (prec) => {
    const place = realPlace(L, asBall(evaluate(x, prec)), asBall(evaluate(y, prec)), prec);
    if (!place) return undefined;
    const index = Number.isFinite(order) ? torsionIndex(L, place.t, order, prec) : undefined;
    return { bounded: place.bounded, index };
  });
}

function halfPeriod(L: Lattice, x: Real): TorusPoint {
  if (L.realComponents === 1) return L.halfPeriods[0];
  const index = decide("logarithm", () => {
    const hits = L.roots.map((e) => e.overlaps(x));
    return hits.filter(Boolean).length === 1 ? hits.indexOf(true) : undefined;
  });
  return L.halfPeriods[index]!;
}

function complexLogarithm(L: Lattice, x: Real | Complex, y: Real | Complex): Complex {
  const prec = workingPrecision();
  const place = canonicalPlace(L.data, asDisc(evaluate(x, prec)), asDisc(evaluate(y, prec)), prec);
  const anchor = new Complex(place, { standing: "exact" }).midpoint;
  return Complex.from(apply(COMPLEX_LOGARITHM, [L.data, x, y, anchor]));
}

/**
 * The point at z: x = ℘(z) − b2/12, y = (℘′(z) − a1x − a3)/2, with real coordinates where z is known to be on the real curve.
 * O for a lattice point that is known exactly.
 * Throws   PoleError for a z that cannot be told from a lattice point.
 */
export function exponentialOf(E: Curve<Coordinate>, L: Lattice, z: ComplexNumeric): Point<Coordinate> {
  if (isLatticePoint(z)) return E.origin;
  const rational =
    z instanceof TorusPoint && E.field.name === "Q" ? rationalPointAt(E as unknown as Curve, z) : undefined;
  if (rational) return overReals(E, rational);
  const b2 = scalar(E.b[0], "exponential");
  const [a1, , a3] = E.a;
  const wp = L.wp(z);
  const x = wp.minus(b2.div(12));
  const y = L.wp.prime(z).minus(x.times(a1)).minus(a3).div(2);
  const [px, py] = [coordinateOf(x, "exponential"), coordinateOf(y, "exponential")];
  const field = joinFields(joinFields(fieldOf(px), fieldOf(py))!, E.field)!;
  const curve = E.carriedTo(field);
  return new Point(curve, [lift(px, field.name), lift(py, field.name)]);
}

/** A rational point as the type of the exponential promises it: over R, its coordinates still exact. */
function overReals(E: Curve<Coordinate>, P: Point): Point<Coordinate> {
  const [x, y] = P.coordinates!;
  return new Point(E.carriedTo(reals as unknown as Field<Coordinate>), [Real.from(x), Real.from(y)]);
}

function lift(value: Coordinate, name: string): Coordinate {
  if (name === "R") return Real.from(value as Rational | Real);
  return name === "C" ? Complex.from(value) : value;
}

function isLatticePoint(z: ComplexNumeric): boolean {
  if (z instanceof TorusPoint) return z.isLatticePoint;
  const { exact } = scalar(z, "exponential");
  return exact instanceof Rational && exact.sign() === 0;
}

/** The refusal of a lattice for a curve over a field without embedding into C. */
export function noTorus(subject: string, E: { toString(): string }): DomainError {
  return new DomainError({
    subject,
    given: `${E}`,
    expected: "a curve over Q, a quadratic field, R or C",
    hint: "A curve over a finite field has no periods.",
  });
}
