// Isogenies of curves as maps: from points, from a point of the torus, all rational ones of prime degree, the class.

import type { Field } from "../algebra/field.ts";
import { coefficientsIn } from "../algebra/multigcd.ts";
import { degreeIn, type Polynomial } from "../algebra/multivariate.ts";
import { rationals as Q } from "../algebra/rationals.ts";
import {
  composeUni,
  deriveUni,
  divideUni,
  evaluateUni,
  gcdUni,
  monicUni,
  mulUni,
  scaleUni,
  type Univariate,
} from "../algebra/univariate.ts";
import { pointsOfOrder } from "../arithmetic/division.ts";
import { globalMinimalModel, toRationals } from "../arithmetic/minimal.ts";
import { oddIsogenies, PRIME_DEGREES } from "../arithmetic/rationalkernels.ts";
import { type AbscissaMap, changeOfAbscissa, composeAbscissas, ofIsogeny, sameAbscissa } from "../curve/abscissamap.ts";
import { dualKernel, multiplicationBy } from "../curve/dual.ts";
import { plainPolynomial } from "../curve/equation/print.ts";
import { type Affine, addPoints, samePoint } from "../curve/group.ts";
import {
  abscissas,
  denominatorOf,
  dualChange,
  type Isogeny,
  isIsogeny,
  kernelOf,
  veluIsogeny,
} from "../curve/isogeny.ts";
import type { Rational } from "../number/rational.ts";
import type { ComplexNumeric } from "../number/values.ts";
import { DomainError } from "../proof/errors.ts";
import type { Standing } from "../proof/standing.ts";
import { Curve } from "./curve.ts";
import { abscissaData, Morphism, type MorphismData } from "./morphism.ts";
import { type AnyPoint, Point } from "./point.ts";
import { fromTorus } from "./torus-isogeny.ts";

/**
 * A kernel: a point that generates it, all its points (with or without O), the polynomial whose roots are their abscissas, or a point
 * of finite order of C/Λ.
 */
export type KernelInput<T> = Point<T> | readonly Point<T>[] | Polynomial<T> | ComplexNumeric;

/** The largest kernel that a point is taken to generate. */
const LARGEST_KERNEL = 200;

/** The normalised isogeny with the given kernel, as a map. */
export function isogenyWithKernel<T>(E: Curve<T>, input: KernelInput<T>): Morphism<Curve<T>, Curve<T>> {
  if (input instanceof Point) return fromKernel(E, polynomialOfPoints(E, generated(E, input)));
  if (Array.isArray(input)) return fromKernel(E, polynomialOfPoints(E, checkedSubgroup(E, input)));
  if (isPolynomial(input)) return fromKernel(E, checkedPolynomial(E, input as Polynomial<T>));
  return fromTorus(E as unknown as Curve, input as ComplexNumeric) as unknown as Morphism<Curve<T>, Curve<T>>;
}

function isPolynomial(input: unknown): boolean {
  return typeof input === "object" && input !== null && "terms" in input && "variables" in input;
}

/** The squarefree monic list of coefficients of a polynomial in one letter. */
function checkedPolynomial<T>(E: Curve<T>, f: Polynomial<T>): Univariate<T> {
  const F = E.field;
  const [name] = f.variables;
  if (f.variables.length === 1 && name !== undefined && degreeIn(f, name) > 0) {
    const list = monicUni(
      F,
      coefficientsIn(F, f, name).map((c) => c.terms.get(0) ?? F.zero),
    );
    return divideUni(F, list, gcdUni(F, list, deriveUni(F, list))).quotient;
  }
  throw new DomainError({
    subject: "isogeny",
    given: `the polynomial ${plainPolynomial(F, f)}`,
    expected: "a polynomial in x of positive degree, whose roots are the abscissas of the kernel",
    argument: "kernel",
  });
}

function generated<T>(E: Curve<T>, P: Point<T>): Affine<T>[] {
  requireOn(E, P);
  if (E.field.name === "Q" && P.order() === Infinity) {
    throw new DomainError({
      subject: "isogeny",
      given: `the point ${P}, of infinite order`,
      expected: "a point of finite order",
      argument: "kernel",
    });
  }
  const list: Affine<T>[] = [];
  for (let Q: AnyPoint = P; !Q.isOrigin; Q = Q.plus(P)) {
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
export function polynomialOfPoints<T>(E: Curve<T>, points: readonly Affine<T>[]): Univariate<T> {
  const F = E.field;
  return points.reduce<Univariate<T>>(
    (h, P) => (F.isZero(evaluateUni(F, h, P![0])) ? h : mulUni(F, h, [F.neg(P![0]), F.one])),
    [F.one],
  );
}

export function fromKernel<T>(E: Curve<T>, polynomial: Univariate<T>): Morphism<Curve<T>, Curve<T>> {
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
  const target = new Curve(E.field, isogeny.target);
  return new Morphism<Curve<T>, Curve<T>>(E, target, isogenyData(E, isogeny) as MorphismData<unknown>);
}

function isogenyData<T>(E: Curve<T>, isogeny: Isogeny<T>): MorphismData<T> {
  const F = E.field;
  return abscissaData(F, ofIsogeny(F, E.a, isogeny), {
    title: `isogeny of degree ${isogeny.degree}`,
    dual: () => dualData(E, isogeny),
    check: () => isogenyStanding(E, isogeny),
  });
}

/** The dual: Vélu's isogeny with the image of the n-torsion as kernel, then the change u = n back to the model of E. */
function dualData<T>(E: Curve<T>, isogeny: Isogeny<T>): MorphismData<T> {
  const F = E.field;
  return abscissaData(F, dualAbscissa(E, isogeny), {
    title: `isogeny of degree ${isogeny.degree}`,
    dual: () => isogenyData(E, isogeny),
    check: () => isogenyStanding(E, isogeny),
  });
}

function dualAbscissa<T>(E: Curve<T>, isogeny: Isogeny<T>): AbscissaMap<T> {
  const F = E.field;
  const n = isogeny.degree;
  requirePrimeTo(F, n);
  const back = veluIsogeny(F, isogeny.target, dualKernel(F, E.a, isogeny));
  const change = changeOfAbscissa(F, back.target, dualChange(F, back.target, E.a, n));
  return composeAbscissas(F, ofIsogeny(F, isogeny.target, back), change);
}

function requirePrimeTo<T>(F: Field<T>, n: number): void {
  if (F.characteristic === 0n || BigInt(n) % F.characteristic !== 0n) return;
  throw new DomainError({
    subject: "dual",
    given: `an isogeny of degree ${n} over ${F.name}`,
    expected: "a degree prime to the characteristic",
    hint: "The dual of this one is not separable.",
  });
}

/** Degrees above this are not composed with their dual: division polynomials have n²/2 coefficients. */
const LARGEST_COMPOSED = 30;

/**
 * The isogeny and its dual by exact substitution: both land, their composition on E is x ↦ φ_n/ψ_n², and it multiplies dz by n, so it is
 * multiplication by n and not by −n.
 */
function isogenyStanding<T>(E: Curve<T>, isogeny: Isogeny<T>): Standing {
  const F = E.field;
  const n = isogeny.degree;
  if (!isIsogeny(F, E.a, isogeny)) return { kind: "refuted", evidence: "the image is not on the target" };
  const lands = "exact substitution in the target's equation";
  if (n > LARGEST_COMPOSED || (F.characteristic > 0n && BigInt(n) % F.characteristic === 0n)) {
    return { kind: "proved", argument: lands };
  }
  const back = dualAbscissa(E, isogeny);
  const both = composeAbscissas(F, ofIsogeny(F, E.a, isogeny), back);
  const byN = multiplicationBy(F, E.a, n);
  const whole =
    isIsogeny(F, isogeny.target, back, back.factor) &&
    sameAbscissa(F, both, { numerator: byN.numerator, denominator: denominatorOf(F, byN) }) &&
    F.isZero(F.sub(both.factor, byN.factor));
  if (!whole) return { kind: "refuted", evidence: `the dual after the isogeny is not multiplication by ${n}` };
  return {
    kind: "proved",
    argument: `${lands}; the dual after it is x ↦ φ_${n}/ψ_${n}² with dz ↦ ${n} dz, multiplication by ${n}`,
  };
}

/** Multiplication by n as an isogeny of the curve to itself, of degree n². */
export function multiplicationMorphism<T>(E: Curve<T>, n: number): Morphism<Curve<T>, Curve<T>> {
  const F = E.field;
  if (!(Number.isSafeInteger(n) && n !== 0 && Math.abs(n) <= 20)) {
    throw new DomainError({
      subject: "multiplication",
      given: `n = ${n}`,
      expected: "an integer from −20 to 20 that is not 0",
      hint: "n*P takes any n, and E.abscissa(n, x) gives x(nP) alone.",
      argument: "n",
    });
  }
  requirePrimeTo(F, n);
  const size = Math.abs(n);
  const [a1, , a3] = E.a;
  // (u, r, s, t) = (−1, 0, −a1, −a3) keeps the equation.
  const sign = { u: F.neg(F.one), r: F.zero, s: F.neg(a1), t: F.neg(a3) };
  const one = { u: F.one, r: F.zero, s: F.zero, t: F.zero };
  const unit = changeOfAbscissa(F, E.a, n < 0 ? sign : one);
  const abscissa = size === 1 ? unit : composeAbscissas(F, multiplicationBy(F, E.a, size), unit);
  const data: MorphismData<T> = abscissaData(F, abscissa, {
    title: `multiplication by ${n}`,
    ...(size === 1 ? { inverse: () => data } : {}),
    dual: () => data,
  });
  return new Morphism<Curve<T>, Curve<T>>(E, E, data as MorphismData<unknown>);
}

/** h'(x′) in the letter x of the other model, x = u²x′ + r, monic. */
export function movedPolynomial(h: Univariate<Rational>, { u, r }: { readonly u: Rational; readonly r: Rational }) {
  const v = u.pow(-2);
  const moved = composeUni(Q, h, [r.times(v).neg(), v]);
  return scaleUni(Q, Q.inv(moved.at(-1)!), moved);
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
