import { Complex, Real } from "../number/values.ts";
import { type Behind, behind } from "../surface/behind.ts";
import { ComplexMultiplication } from "../surface/complex-multiplication.ts";
import { Lattice } from "../surface/lattice.ts";
import { Morphism } from "../surface/morphism.ts";
import { TorsionSubgroup } from "../surface/torsion.ts";
import { PlanePoint } from "../surface/variety.ts";
import type { Derivation } from "./derivation.ts";
import { morphismWorking } from "./working/isogeny.ts";
import { latticeWorking } from "./working/lattice.ts";
import { logarithmWorking } from "./working/logarithm.ts";
import { isMinimal, minimalWorking } from "./working/minimal.ts";
import { multiplicationWorking } from "./working/multiplication.ts";
import { numberWorking } from "./working/number.ts";
import { reducedWorking } from "./working/reduced.ts";
import { isThroughPoint, throughWorking } from "./working/through.ts";
import { torsionWorking } from "./working/torsion.ts";
import { valueOfWp, wpWorking } from "./working/weierstrass.ts";

/**
 * How a value was obtained, as numbered steps: for a number the operations that its record holds, each with its value; for a
 * cubic or quartic through a point the construction, with both maps verified by substitution; for `E.torsion()`, `E.minimal()`,
 * `E.lattice()`, `E.logarithm(P)`, `L.wp(z)`, `L.reduced`, `L.complexMultiplication()` and an isogeny the formulas with the numbers put in, each step checked by another route.
 *
 * `working(x).show("outline" | "steps" | "all")` folds it. Nothing is kept for this beyond the record that every value has; the
 * steps are computed when they are asked for.
 *
 * Throws   TypeError for values that keep no record.
 * @example working(L.wp(1/3))
 */
export function working(value: unknown, { name }: { readonly name?: string } = {}): Derivation {
  const steps = derived(value);
  return name === undefined ? steps : steps.named(name);
}

function derived(value: unknown): Derivation {
  const made = typeof value === "object" && value !== null ? behind(value) : undefined;
  if (value instanceof Real || value instanceof Complex) return ofNumber(value, made);
  if (value instanceof Lattice) return latticeWorking(value);
  if (isThroughPoint(value)) return throughWorking(value);
  if (isMinimal(value)) return minimalWorking(value);
  if (value instanceof Morphism) return morphismWorking(value);
  if (value instanceof ComplexMultiplication && made?.lattice) return multiplicationWorking(value, made.lattice);
  if (made?.lattice) return reducedWorking(made.lattice);
  if (value instanceof TorsionSubgroup && made?.curve) return torsionWorking(value, made.curve);
  const what = value instanceof PlanePoint ? "a point" : typeof value === "object" ? "this value" : String(value);
  throw new TypeError(
    `working: ${what} keeps no record of its steps; expected a number, a lattice, a map, or the result of C.through(P), E.torsion(), E.minimal(), L.reduced or L.complexMultiplication()`,
  );
}

/** A logarithm, a value of ℘, or any number with a record. */
function ofNumber(value: Real | Complex, made: Behind | undefined): Derivation {
  if (made?.curve && made.point) return logarithmWorking(value, made.curve, made.point);
  const at = valueOfWp(value);
  return at ? wpWorking(value, at.L, at.z) : numberWorking(value);
}
