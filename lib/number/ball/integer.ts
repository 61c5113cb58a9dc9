import { scaled } from "../fixed/bits.ts";
import type { Ball } from "./data.ts";

/** The greatest integer that is not above any number of the ball, if it is the same for all; undefined else. */
export function floor(x: Ball): bigint | undefined {
  if (x.rad === 0) return scaled(x.man, x.exp);
  const fine = BigInt(Math.ceil(x.rad * 2 ** 20));
  const low = scaled((x.man << 20n) - fine, x.exp - 20);
  const high = scaled((x.man << 20n) + fine, x.exp - 20);
  return low === high ? low : undefined;
}
