// What a result was made from, kept beside it for `working`. A weak reference: it costs no time and keeps nothing alive.

import type { Curve } from "./curve.ts";
import type { Lattice } from "./lattice.ts";
import type { AnyPoint } from "./point.ts";

export interface Behind {
  readonly curve?: Curve;
  readonly point?: AnyPoint;
  readonly lattice?: Lattice;
}

const BEHIND = new WeakMap<object, Behind>();

/** The result itself, with a note of what it was made from. */
export function remember<T extends object>(result: T, made: Behind): T {
  BEHIND.set(result, made);
  return result;
}

export function behind(result: object): Behind | undefined {
  return BEHIND.get(result);
}
