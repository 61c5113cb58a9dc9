import { Complex, Real } from "../number/values.ts";
import { type Behind, behind } from "../surface/behind.ts";
import { isRecognition } from "../surface/claim-answer.ts";
import { ClassPolynomial } from "../surface/class-polynomial.ts";
import { ComplexMultiplication } from "../surface/complex-multiplication.ts";
import { Curve } from "../surface/curve.ts";
import { Factorisation } from "../surface/factorisation.ts";
import { Homothety } from "../surface/homothety.ts";
import { Jacobi } from "../surface/jacobi.ts";
import { Lattice } from "../surface/lattice.ts";
import { Morphism } from "../surface/morphism.ts";
import { Moved } from "../surface/moved.ts";
import { Point } from "../surface/point.ts";
import { TorsionSubgroup } from "../surface/torsion.ts";
import type { Derivation } from "./derivation.ts";
import { isPolynomial } from "./plane-kind.ts";
import { isThroughPoint } from "./through-shape.ts";
import { curveWorking, exponentialWorking, pointWorking } from "./working/curve.ts";
import { factorisationWorking } from "./working/factorisation.ts";
import { morphismWorking } from "./working/isogeny.ts";
import { latticeWorking } from "./working/lattice.ts";
import { logarithmWorking } from "./working/logarithm.ts";
import { isMinimal, minimalWorking } from "./working/minimal.ts";
import { multiplicationWorking } from "./working/multiplication.ts";
import { numberWorking } from "./working/number.ts";
import { classPolynomialWorking, divisionWorking, pairingWorking } from "./working/polynomials.ts";
import { reducedWorking } from "./working/reduced.ts";
import {
  homothetyWorking,
  jacobiWorking,
  movedWorking,
  recognitionWorking,
  relatedWorking,
} from "./working/relations.ts";
import { throughWorking } from "./working/through.ts";
import { torsionWorking } from "./working/torsion.ts";
import { valueOfWp, wpWorking } from "./working/weierstrass.ts";

/**
 * How a value was obtained, as numbered steps with the formulas, the numbers put in and, for every step, a check by a second route.
 *
 * Domain   numbers with a record; curves over Q, their points, `E.lattice()`, `E.torsion()`, `E.minimal()`, `E.logarithm(P)`,
 *          `E.exponential(z)`, `E.divisionPolynomial(n)`, `E.weilPairing(n, P, Q)`; maps; `C.through(P)`; lattices, also sub- and
 *          overlattices, `L.wp(z)` and the other functions of a lattice, `L.reduced`, `L.complexMultiplication()`; `homothety(L, M)`, `jacobi({..})`,
 *          `modular.reduce`, `modular.classPolynomial`, `factor(n)`, `recognise(x)`.
 *
 * `working(x).show("outline" | "steps" | "all")` folds it; `{ name }` is the name of its links, where a notebook holds two of a kind. Nothing is
 * kept for this beyond the record that every value has; the steps are computed when they are asked for.
 *
 * Throws   TypeError for values that keep no record, with what to ask instead.
 * @example working(L.wp(1/3))
 */
export function working(value: unknown, { name }: { readonly name?: string } = {}): Derivation {
  const steps = derived(value);
  return name === undefined ? steps : steps.named(name);
}

function derived(value: unknown): Derivation {
  const made = typeof value === "object" && value !== null ? behind(value) : undefined;
  // A map is a function that has parts.
  const isValue = (typeof value === "object" && value !== null) || typeof value === "function";
  const steps = isValue
    ? (ofNumber(value, made) ?? ofCurve(value, made) ?? ofLattice(value, made) ?? ofAnswer(value, made))
    : undefined;
  if (steps) return steps;
  throw new TypeError(
    `working: ${described(value)} has no derivation: no record is kept of how it was made. Expected a number with a record, a curve, a point or a lattice, a map, or the result of E.torsion(), E.minimal(), E.logarithm(P), C.through(P), L.complexMultiplication(), homothety(L, M), jacobi({ m }) and the like. For steps of your own: derivation("...").step(...)`,
  );
}

/** What a value is, in a word. */
function described(value: unknown): string {
  if (Array.isArray(value)) return "a list";
  if (typeof value === "function") return "a function";
  if (typeof value !== "object" || value === null)
    return value === null || value === undefined ? String(value) : `the plain ${typeof value} ${String(value)}`;
  if (value instanceof Curve) return `a curve over ${value.field.name} (over Q there is one)`;
  const { name = "" } = (value.constructor as { readonly name?: string } | undefined) ?? {};
  return name === "" || name === "Object" ? "this record" : `a value of the class ${name}`;
}

/** A logarithm, a value of ℘, or any number with a record. */
function ofNumber(value: unknown, made: Behind | undefined): Derivation | undefined {
  if (made?.index !== undefined && made.curve && made.point && made.second)
    return pairingWorking(value as object, made.curve, made.index, made.point, made.second);
  if (!(value instanceof Real || value instanceof Complex)) return undefined;
  if (made?.curve && made.point) return logarithmWorking(value, made.curve, made.point);
  const at = valueOfWp(value);
  return at ? wpWorking(value, at.L, at.z) : numberWorking(value);
}

function ofCurve(value: object, made: Behind | undefined): Derivation | undefined {
  if (isThroughPoint(value)) return throughWorking(value);
  if (isMinimal(value)) return minimalWorking(value);
  if (value instanceof Morphism) return morphismWorking(value);
  if (value instanceof TorsionSubgroup && made?.curve) return torsionWorking(value, made.curve);
  if (value instanceof Curve && value.field.name === "Q") return curveWorking(value as Curve);
  if (value instanceof Point && made?.curve && made.argument)
    return exponentialWorking(value, made.curve, made.argument);
  if (value instanceof Point && value.curve.field.name === "Q") return pointWorking(value as Point);
  if (isPolynomial(value) && made?.curve?.field.name === "Q" && made.index !== undefined)
    return divisionWorking(value as never, made.curve, made.index);
  return undefined;
}

function ofLattice(value: unknown, made: Behind | undefined): Derivation | undefined {
  if (value instanceof Lattice) return value.within ? relatedWorking(value) : latticeWorking(value);
  if (value instanceof ComplexMultiplication && made?.lattice) return multiplicationWorking(value, made.lattice);
  if (made?.lattice) return reducedWorking(made.lattice);
  return value instanceof Homothety ? homothetyWorking(value) : undefined;
}

function ofAnswer(value: unknown, made: Behind | undefined): Derivation | undefined {
  if (value instanceof Jacobi) return jacobiWorking(value);
  if (value instanceof Moved) return movedWorking(value);
  if (value instanceof ClassPolynomial) return classPolynomialWorking(value);
  if (value instanceof Factorisation) return factorisationWorking(value);
  return isRecognition(value) && made?.argument ? recognitionWorking(value, made.argument) : undefined;
}
