import { Complex, Real } from "../number/values.ts";
import { PlanePoint } from "../surface/variety.ts";
import type { Derivation } from "./derivation.ts";
import { isThroughPoint, throughWorking } from "./working-map.ts";
import { numberWorking } from "./working-number.ts";

/**
 * How a value was obtained, as numbered steps: for a number the operations that its record holds, each with its value; for a
 * cubic or quartic through a point the construction, with both maps verified by substitution.
 *
 * `working(x).show("outline" | "steps" | "all")` folds it. Nothing is kept for this beyond the record that every value has.
 *
 * Throws   TypeError for values that keep no record.
 * @example working(L.wp(1/3))
 */
export function working(value: unknown): Derivation {
  if (value instanceof Real || value instanceof Complex) return numberWorking(value);
  if (isThroughPoint(value)) return throughWorking(value);
  const what = value instanceof PlanePoint ? "a point" : typeof value === "object" ? "this value" : String(value);
  throw new TypeError(
    `working: ${what} keeps no record of its steps; expected a number, or the result of C.through(P)`,
  );
}
