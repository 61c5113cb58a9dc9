// What results of curves and lattices were made from, as `working` reads it.

import type { Complex, Real } from "../number/values.ts";
import { recall, remember as rememberAny } from "../proof/behind.ts";
import type { Curve } from "./curve.ts";
import type { Lattice } from "./lattice.ts";
import type { AnyPoint } from "./point.ts";

export interface Behind {
  readonly curve?: Curve;
  readonly point?: AnyPoint;
  readonly second?: AnyPoint;
  readonly lattice?: Lattice;
  /** The index of a division polynomial, the order of a pairing. */
  readonly index?: number;
  /** The argument of the exponential, the number that was recognised. */
  readonly argument?: Real | Complex;
}

/** The result itself, with a note of what it was made from. */
export function remember<T>(result: T, made: Behind): T {
  return rememberAny(result, made);
}

export function behind(result: object): Behind | undefined {
  return recall(result);
}
