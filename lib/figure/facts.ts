// Values in the data of a figure: text that does not depend on how many digits are asked for.

import { Complex, Real } from "../number/values.ts";
import { PrecisionError } from "../proof/errors.ts";
import { TorusPoint } from "../surface/torus-point.ts";

const DIGITS = 12;

/** Exact values as they stand, exact points of a torus by their coordinates, other numbers to twelve digits. */
export function fact(value: unknown): string {
  if (value instanceof TorusPoint && !value.remainder) return value.name;
  if (Array.isArray(value)) return `(${value.map(fact).join(", ")})`;
  if (!(value instanceof Real || value instanceof Complex) || value.exact) return String(value);
  try {
    return String(value.digits(DIGITS));
  } catch (error) {
    // A number that cannot be told from 0 has no digits.
    if (error instanceof PrecisionError) return "0";
    throw error;
  }
}
