// Zeros and poles that were handed out as numbers, so that a series at one of them knows the exact multiplicities.
import type { DivisorPoint } from "../lattice/field/divisor.ts";

const known = new WeakMap<object, DivisorPoint>();

export function rememberDivisorPoint(point: object, at: DivisorPoint): void {
  known.set(point, at);
}

/** The divisor point behind a number that was handed out as a zero or pole. */
export function divisorPointOf(p: unknown): DivisorPoint | undefined {
  return typeof p === "object" && p !== null ? known.get(p) : undefined;
}
