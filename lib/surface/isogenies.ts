// Isogenies of curves as maps: from points, from a point of the torus, all rational ones of prime degree, the class.

import type { Field } from "../algebra/field.ts";
import { rationals as Q } from "../algebra/rationals.ts";
import { composeUni, evaluateUni, mulUni, scaleUni, type Univariate } from "../algebra/univariate.ts";
import { pointsOfOrder } from "../arithmetic/division.ts";
import { globalMinimalModel, toRationals } from "../arithmetic/minimal.ts";
import { oddIsogenies, PRIME_DEGREES, rationalIsogeny } from "../arithmetic/rationalkernels.ts";
import { type Affine, addPoints, samePoint } from "../curve/group.ts";
import { abscissas, dualChange, dualKernel, type Isogeny, isIsogeny, kernelOf, veluIsogeny } from "../curve/isogeny.ts";
import { isogenyMap } from "../curve/map/isogenymap.ts";
import { composeMaps } from "../curve/map/map.ts";
import { changeMap } from "../curve/map/weierstrassmodel.ts";
import type { Rational } from "../number/rational.ts";
import { Complex, type ComplexNumeric, Real } from "../number/values.ts";
import { DomainError } from "../proof/errors.ts";
import { Curve } from "./curve.ts";
import { Morphism, type MorphismData } from "./morphism.ts";
import { type AnyPoint, Point } from "./point.ts";
import { TorusPoint } from "./torus-point.ts";

/** A kernel: a point that generates it, all its points (with or without O), or a point of finite order of C/Λ. */
export type KernelInput<T> = Point<T> | readonly Point<T>[] | ComplexNumeric;

/** The largest kernel that a point is taken to generate. */
const LARGEST_KERNEL = 200;

/** The normalised isogeny with the given kernel, as a map. */
export function isogenyWithKernel<T>(E: Curve<T>, input: KernelInput<T>): Morphism<Curve<T>, Curve<T>> {
  if (input instanceof Point) return fromKernel(E, polynomialOfPoints(E, generated(E, input)));
  if (Array.isArray(input)) return fromKernel(E, polynomialOfPoints(E, checkedSubgroup(E, input)));
  return fromTorus(E as unknown as Curve, input as ComplexNumeric) as unknown as Morphism<Curve<T>, Curve<T>>;
}

function generated<T>(E: Curve<T>, P: Point<T>): Affine<T>[] {
  requireOn(E, P);
  const list: Affine<T>[] = [];
  for (let Q = P; !Q.isOrigin; Q = Q.plus(P) as unknown as Point<T>) {
    list.push(Q.coordinates);
    if (list.length >= LARGEST_KERNEL) {
      throw new DomainError({
        subject: "isogeny",
        given: `the point ${P}, of no order up to ${LARGEST_KERNEL}`,
        expected: "a point of finite order",
        argument: "kernel",
      });
    }
  }
  return list;
}

function checkedSubgroup<T>(E: Curve<T>, points: readonly Point<T>[]): Affine<T>[] {
  for (const P of points) requireOn(E, P);
  const affine = points.map((P) => P.coordinates).filter((P) => P !== undefined);
  const holds = (R: Affine<T>) => !R || affine.some((S) => samePoint(E.field, R, S));
  for (const P of affine) {
    for (const R of affine) {
      const sum = addPoints(E.field, E.a, P, R);
      if (holds(sum)) continue;
      const show = (S: Affine<T>) => `${new Point(E, S)}`;
      throw new DomainError({
        subject: "isogeny",
        given: `${show(P)} + ${show(R)} = ${show(sum)}, which is not among the points`,
        expected: "all points of a finite subgroup",
        hint: "Give one generating point, or the whole subgroup.",
        argument: "kernel",
      });
    }
  }
  return affine;
}

function requireOn<T>(E: Curve<T>, P: AnyPoint): void {
  if (P.curve === E || P.curve.equals(E)) return;
  throw new DomainError({
    subject: "isogeny",
    given: `a point of ${P.curve}`,
    expected: `points of ${E}`,
    argument: "kernel",
  });
}

/** ∏ (x − x(P)) over the points, each abscissa once. */
function polynomialOfPoints<T>(E: Curve<T>, points: readonly Affine<T>[]): Univariate<T> {
  const F = E.field;
  return points.reduce<Univariate<T>>(
    (h, P) => (F.isZero(evaluateUni(F, h, P![0])) ? h : mulUni(F, h, [F.neg(P![0]), F.one])),
    [F.one],
  );
}

function fromKernel<T>(E: Curve<T>, polynomial: Univariate<T>): Morphism<Curve<T>, Curve<T>> {
  const kernel = kernelOf(E.field, E.a, polynomial);
  const isogeny = veluIsogeny(E.field, E.a, kernel);
  if (isIsogeny(E.field, E.a, isogeny)) return isogenyMorphism(E, isogeny);
  throw new DomainError({
    subject: "isogeny",
    given: `abscissas that are not those of a subgroup of ${E}`,
    expected: "the kernel of an isogeny",
    argument: "kernel",
  });
}

/** The map of an isogeny with its dual. */
export function isogenyMorphism<T>(E: Curve<T>, isogeny: Isogeny<T>): Morphism<Curve<T>, Curve<T>> {
  const F = E.field;
  const target = new Curve(F, isogeny.target);
  const data: MorphismData<T> = {
    map: isogenyMap(F, E.a, isogeny),
    degree: isogeny.degree,
    title: `isogeny of degree ${isogeny.degree}`,
    kernel: abscissas(F, isogeny.kernel),
    dual: () => dualData(F, E, isogeny),
  };
  return new Morphism<Curve<T>, Curve<T>>(E, target, data as MorphismData<unknown>);
}

/** The dual: Vélu's isogeny with the image of the n-torsion as kernel, then the change u = n back to the model of E. */
function dualData<T>(F: Field<T>, E: Curve<T>, isogeny: Isogeny<T>): MorphismData<T> {
  const n = isogeny.degree;
  const back = veluIsogeny(F, isogeny.target, dualKernel(F, E.a, isogeny));
  const change = dualChange(F, back.target, E.a, n);
  const map = composeMaps(isogenyMap(F, isogeny.target, back), changeMap(F, back.target, change));
  return {
    map: { ...map, to: isogenyMap(F, E.a, isogeny).from },
    degree: n,
    title: `isogeny of degree ${n}`,
    kernel: abscissas(F, back.kernel),
  };
}

/** The isogeny C/Λ → C/(Λ + Zc) over Q, for an exact point c of finite order on the real or imaginary circle. */
function fromTorus(E: Curve, c: ComplexNumeric): Morphism {
  const L = E.lattice();
  if (!(c instanceof TorusPoint) || c.lattice !== L.data || c.order === undefined) throw notExact(E, c);
  const n = Number(c.order);
  if (n % 2 === 0) return evenTorus(E, c, n);
  const model = globalMinimalModel(E.a);
  const minimal = new Curve(Q, toRationals(model.a));
  // The lattice of the minimal model is uΛ, with the same coordinates in its real basis.
  const isogeny = rationalIsogeny(minimal.a, minimal.lattice().data, c.coordinates, n);
  if (!isogeny) throw notRational(E, c);
  return fromKernel(E, movedPolynomial(abscissas(Q, isogeny.kernel), model.change));
}

/** h'(x′) in the letter x of the other model, x = u²x′ + r, monic. */
function movedPolynomial(h: Univariate<Rational>, { u, r }: { readonly u: Rational; readonly r: Rational }) {
  const v = u.pow(-2);
  const moved = composeUni(Q, h, [r.times(v).neg(), v]);
  return scaleUni(Q, Q.inv(moved.at(-1)!), moved);
}

/** A kernel of even order: its point must be rational itself. */
function evenTorus(E: Curve, c: TorusPoint, n: number): Morphism {
  const P = pointsOfOrder(E.a, n).find((R) => {
    const z = E.logarithm(new Point(E, R));
    return z instanceof TorusPoint && z.minus(c).isLatticePoint;
  });
  if (!P) throw notRational(E, c);
  return isogenyWithKernel(E, new Point(E, P));
}

function notRational(E: Curve, c: TorusPoint): DomainError {
  return new DomainError({
    subject: "isogeny",
    given: `the subgroup of ${c.name}, of order ${c.order}, on ${E}`,
    expected: "a subgroup that is defined over Q",
    hint: "Its kernel polynomial has no rational coefficients: enclosures exclude every candidate.",
    argument: "kernel",
  });
}

/** A number is not snapped to a torsion point: the message says how far the nearest small multiple is from a period. */
function notExact(E: Curve, c: ComplexNumeric): DomainError {
  const L = E.lattice();
  const z = Complex.from(c);
  const distances = Array.from({ length: 12 }, (_, k) => {
    const n = k + 1;
    return { n, gap: L.locate(z.times(n)).rest.abs() };
  });
  const near = distances.reduce((a, b) => (b.gap.toDouble() < a.gap.toDouble() ? b : a));
  return new DomainError({
    subject: "isogeny",
    given: `the number ${c instanceof Real || c instanceof Complex ? c : String(c)}, whose ${near.n}-fold differs from a period by ${near.gap.digits(5)}`,
    expected: "an exact point of finite order, such as L.at(1/3, 0)",
    hint: "A number is not moved to a torsion point near it.",
    argument: "kernel",
  });
}

/** All isogenies of prime degree over Q from the minimal model, by degree. */
export function primeIsogenies(E: Curve): Morphism[] {
  const two = pointsOfOrder(E.a, 2).map((P) => isogenyWithKernel(E, new Point(E, P)));
  const model = globalMinimalModel(E.a);
  const minimal = new Curve(Q, toRationals(model.a));
  const odd = PRIME_DEGREES.slice(1).flatMap((l) => oddIsogenies(minimal.a, minimal.lattice().data, l));
  return [...two, ...odd.map((phi) => fromKernel(E, movedPolynomial(abscissas(Q, phi.kernel), model.change)))];
}

/** A curve of an isogeny class with the prime isogenies that lead to the others. */
export interface ClassMember {
  readonly curve: Curve;
  /** Degree of a prime isogeny and the place of its target in the list. */
  readonly isogenies: readonly { readonly degree: number; readonly to: number }[];
}

/** The minimal models isogenous to E over Q, E's own first, with the prime isogenies between them. Complete by Mazur's theorem. */
export function isogenyClassOf(E: Curve): ClassMember[] {
  const curves = [minimalOf(E)];
  const edges: { degree: number; to: number }[][] = [];
  for (let k = 0; k < curves.length; k++) {
    edges.push(
      primeIsogenies(curves[k]!).map((phi) => {
        const target = minimalOf(phi.to);
        let to = curves.findIndex((known) => known.equals(target));
        if (to < 0) to = curves.push(target) - 1;
        return { degree: phi.degree, to };
      }),
    );
  }
  return curves.map((curve, k) => ({ curve, isogenies: edges[k]! }));
}

function minimalOf(E: Curve): Curve {
  return new Curve(Q, toRationals(globalMinimalModel(E.a).a));
}
