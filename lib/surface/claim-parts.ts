// A claim about points, curves or lists, taken apart into relations between numbers.

import type { Polynomial } from "../algebra/multivariate.ts";
import { sameExact } from "../number/exactness.ts";
import { Quadratic } from "../number/quadratic.ts";
import { Rational } from "../number/rational.ts";
import type { Recognition } from "../number/recognise.ts";
import { Complex, type ComplexNumeric, Real, scalar } from "../number/values.ts";
import { LibraryError, UndecidedError } from "../proof/errors.ts";
import { type Standing, weakest } from "../proof/standing.ts";
import { answerStanding } from "./claim-answer.ts";
import { homotheticStanding, inLattice, sameLattice, sublattice } from "./claim-lattice.ts";
import { numberStanding } from "./claim-number.ts";
import type { Relation } from "./claim-value.ts";
import type { ComplexMultiplication } from "./complex-multiplication.ts";
import { Curve } from "./curve.ts";
import { EllipticFunction } from "./elliptic-function.ts";
import { Lattice } from "./lattice.ts";
import { Morphism } from "./morphism.ts";
import { Point } from "./point.ts";
import type { AnyVariety } from "./space.ts";
import type { TorsionSubgroup } from "./torsion.ts";
import { PlaneCurve, PlanePoint } from "./variety.ts";

/** What a claim can be about: numbers, values of the library, and lists or records of them. */
export type Claimed =
  | ComplexNumeric
  | { readonly field: object }
  | { readonly curve: object }
  | Lattice
  | EllipticFunction
  | Morphism<AnyVariety, AnyVariety>
  | TorsionSubgroup
  | ComplexMultiplication
  | Recognition
  | Polynomial<unknown>
  | undefined
  | readonly Claimed[]
  | { readonly [part: string]: Claimed };

/** How a statement about two values is known. */
export function standingOf(lhs: unknown, relation: Relation, rhs: unknown): Standing {
  if (relation === "on") return onStanding(lhs, rhs);
  const answer = answerStanding(lhs, relation, rhs);
  if (answer) return answer;
  const [a, b] = [numberOf(lhs), numberOf(rhs)];
  if (relation === "in" && a && rhs instanceof Lattice) return inLattice(a, rhs);
  const [L, M] = [latticeOf(lhs), latticeOf(rhs)];
  if (relation === "homothetic" && L && M) return homotheticStanding(L, M);
  if (a && b && relation !== "in" && relation !== "homothetic") return numberStanding(a, relation, b);
  if (relation === "in" && lhs instanceof Lattice && rhs instanceof Lattice) return sublattice(lhs, rhs);
  if (relation !== "=" && relation !== "≠") throw unsuited(lhs, relation, rhs);
  if (lhs instanceof Morphism && rhs instanceof Morphism) return mapStanding(lhs, relation, rhs);
  if (isPolynomial(lhs) && isPolynomial(rhs)) return polynomialStanding(lhs, relation, rhs);
  if (lhs instanceof Curve && rhs instanceof Curve)
    return decided(lhs.equals(rhs), relation, "equations compared over the same field");
  if (lhs instanceof Point && rhs instanceof Point) return pointStanding(lhs, relation, rhs);
  if (lhs instanceof PlanePoint && rhs instanceof PlanePoint) {
    return decided(lhs.equals(rhs), relation, "exact coordinates");
  }
  if (relation === "=" && lhs instanceof Lattice && rhs instanceof Lattice) return sameLattice(lhs, rhs);
  if (lhs instanceof EllipticFunction && rhs instanceof EllipticFunction) return functionStanding(lhs, relation, rhs);
  return partsStanding(lhs, relation, rhs);
}

/** A lattice, or that of a curve over Q. */
function latticeOf(value: unknown): Lattice | undefined {
  if (value instanceof Lattice) return value;
  return value instanceof Curve && value.field.name === "Q" ? value.lattice() : undefined;
}

/** Maps between the same curves are the same if they take the general point to the same image. */
function mapStanding(
  f: Morphism<AnyVariety, AnyVariety>,
  relation: "=" | "≠",
  g: Morphism<AnyVariety, AnyVariety>,
): Standing {
  if (`${f.from}` !== `${g.from}` || `${f.to}` !== `${g.to}`)
    return decided(false, relation, "maps between different curves");
  if (f.from instanceof Curve && f.to instanceof Curve && f.from.field.characteristic === 0n)
    return decided(
      `${f.factor}` === `${g.factor}`,
      relation,
      `pull-backs of the differential compared, ${f.factor} and ${g.factor}: this factor determines a homomorphism`,
    );
  const [p, q] = [f, g].map(({ formula }) => JSON.stringify(formula, flat));
  if (p !== q) return { kind: "undecided", tried: "formulas in lowest terms, which are not the same" };
  return decided(true, relation, "formulas in lowest terms compared");
}

/** Maps of terms as lists, field elements by their text. */
function flat(_: string, value: unknown): unknown {
  if (value instanceof Map) return [...value].sort(([s], [t]) => s - t).map(([key, c]) => [key, String(c)]);
  return typeof value === "bigint" ? String(value) : value;
}

function polynomialStanding(f: Polynomial<unknown>, relation: "=" | "≠", g: Polynomial<unknown>): Standing {
  const same = f.variables.join() === g.variables.join() && JSON.stringify(f, flat) === JSON.stringify(g, flat);
  return decided(same, relation, "coefficients compared");
}

function isPolynomial(value: unknown): value is Polynomial<unknown> {
  return typeof value === "object" && value !== null && "variables" in value && "terms" in value;
}

/** Elliptic functions are compared by their normal forms in ℘ and ℘′. */
function functionStanding(f: EllipticFunction, relation: "=" | "≠", g: EllipticFunction): Standing {
  try {
    return decided(f.equals(g), relation, "normal forms in ℘ and ℘′ compared");
  } catch (error) {
    if (error instanceof UndecidedError) return { kind: "undecided", tried: error.given };
    throw error;
  }
}

/** A number of the library or the language; undefined for other values. */
export function numberOf(value: unknown): Real | Complex | undefined {
  if (value instanceof Real || value instanceof Complex) return value;
  const foreign = typeof value === "object" && value !== null && !Array.isArray(value) && "toFixed" in value;
  const number = value instanceof Rational || value instanceof Quadratic || foreign;
  const plain = typeof value === "number" || typeof value === "bigint" || typeof value === "string";
  return number || plain ? scalar(value as ComplexNumeric, "claim") : undefined;
}

function decided(same: boolean, relation: "=" | "≠", argument: string): Standing {
  if (same === (relation === "=")) return { kind: "proved", argument };
  return { kind: "refuted", evidence: `${argument}: they are ${same ? "the same" : "different"}` };
}

function pointStanding(P: Point<unknown>, relation: "=" | "≠", Q: Point<unknown>): Standing {
  if (!sameModel(P.curve, Q.curve)) return decided(false, relation, "points of different curves");
  const [p, q] = [P.coordinates, Q.coordinates];
  if (!p || !q) return decided(p === q, relation, "the point at infinity compared");
  return partsStanding(p, relation, q);
}

/** Whether two curves have the same coefficients, also where one is taken over a larger field. */
function sameModel(E: Curve<unknown>, F: Curve<unknown>): boolean {
  if (E.field.name === F.field.name) return E.equals(F);
  return E.a.every((c, k) => {
    const [x, y] = [numberOf(c)?.exact, numberOf(F.a[k])?.exact];
    return x !== undefined && y !== undefined && sameExact(x, y);
  });
}

/** Part by part: all must be equal, or one apart. */
function partsStanding(lhs: unknown, relation: "=" | "≠", rhs: unknown): Standing {
  const [a, b] = [partsOf(lhs), partsOf(rhs)];
  if (!a || !b) throw unsuited(lhs, relation, rhs);
  if (a.length !== b.length) return decided(false, relation, `${a.length} parts and ${b.length} parts`);
  const names = a.map(([name]) => name).join();
  if (names !== b.map(([name]) => name).join()) return decided(false, relation, "names of the parts compared");
  const standings = a.map(([, part], k) => standingOf(part, relation, b[k]?.[1]));
  return relation === "=" ? allEqual(standings) : anyApart(standings);
}

function allEqual(standings: readonly Standing[]): Standing {
  const low = weakest(standings);
  // Where all parts are proved, the argument is that of the first.
  return low.kind === "proved" ? (standings[0] ?? low) : low;
}

function partsOf(value: unknown): (readonly [string, unknown])[] | undefined {
  if (Array.isArray(value)) return value.map((part, k) => [String(k), part]);
  if (typeof value !== "object" || value === null) return undefined;
  const plain = Object.getPrototypeOf(value) === Object.prototype || Object.getPrototypeOf(value) === null;
  return plain ? Object.entries(value).sort(([s], [t]) => (s < t ? -1 : 1)) : undefined;
}

/** A list differs from another if one of its parts does. */
function anyApart(standings: readonly Standing[]): Standing {
  const shown = standings.find(({ kind }) => kind === "proved");
  if (shown) return shown;
  const open = standings.find(({ kind }) => kind !== "refuted");
  return open ?? { kind: "refuted", evidence: "all parts are the same" };
}

/** A point, or a list of two coordinates, put into the equation of a curve. */
function onStanding(lhs: unknown, rhs: unknown): Standing {
  if (lhs instanceof PlanePoint && rhs instanceof PlaneCurve) return onPlaneCurve(lhs, rhs);
  if (!(rhs instanceof Curve)) throw unsuited(lhs, "on", rhs);
  const coordinates: unknown = lhs instanceof Point ? lhs.coordinates : lhs;
  if (lhs instanceof Point && !coordinates) return { kind: "proved", argument: "O lies on every curve" };
  if (!Array.isArray(coordinates) || coordinates.length !== 2) throw unsuited(lhs, "on", rhs);
  const numbers = [...coordinates, ...rhs.a].map(numberOf);
  if (!numbers.every((x) => x !== undefined)) return onExactly(coordinates, rhs);
  const [x, y, a1, a2, a3, a4, a6] = numbers as [Num, Num, Num, Num, Num, Num, Num];
  const left = y.times(y).plus(a1.times(x).times(y)).plus(a3.times(y));
  const right = x.plus(a2).times(x).plus(a4).times(x).plus(a6);
  const standing = numberStanding(left, "=", right);
  return standing.kind === "proved" ? { kind: "proved", argument: "exact substitution into the equation" } : standing;
}

type Num = Real | Complex;

function onPlaneCurve(P: PlanePoint<unknown>, C: PlaneCurve<unknown>): Standing {
  try {
    C.checked(P.coordinates);
    return { kind: "proved", argument: "exact substitution into the equation" };
  } catch (error) {
    if (error instanceof LibraryError) return { kind: "refuted", evidence: error.given };
    throw error;
  }
}

/** Over other fields, such as F_p, the curve itself decides. */
function onExactly(coordinates: readonly unknown[], E: Curve<unknown>): Standing {
  try {
    E.point(coordinates[0], coordinates[1]);
    return { kind: "proved", argument: "exact substitution into the equation" };
  } catch (error) {
    if (error instanceof LibraryError) return { kind: "refuted", evidence: error.given };
    throw error;
  }
}

function unsuited(lhs: unknown, relation: Relation, rhs: unknown): TypeError {
  return new TypeError(`claim: "${relation}" is not defined between ${described(lhs)} and ${described(rhs)}`);
}

function described(value: unknown): string {
  if (Array.isArray(value)) return `a list of ${value.length}`;
  if ((typeof value === "object" || typeof value === "function") && value !== null)
    return `a ${value.constructor?.name ?? "record"}`;
  return String(value);
}
