import type { Ball } from "../number/ball.ts";
import { shift } from "../number/fixed/bits.ts";
import { roundedQuotient } from "./matrix.ts";

/** The integer nearest to the midpoint; ties go up. */
export function nearest(x: Ball): bigint {
  return x.exp >= 0 ? x.man << shift(x.exp) : roundedQuotient(x.man, 1n << shift(-x.exp));
}
