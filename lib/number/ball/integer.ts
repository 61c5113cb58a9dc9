import { DomainError } from "../../proof/errors.ts";
import { scaled } from "../fixed/bits.ts";
import type { Ball } from "./data.ts";

/** Integers beyond this many bits are not written out. */
const LONGEST = 1 << 26;

/**
 * The greatest integer that is not above any number of the ball, if it is the same for all; undefined else.
 * Throws DomainError for an exact number whose integer would have more than 2^26 bits.
 */
export function floor(x: Ball): bigint | undefined {
  if (x.exp > LONGEST) {
    if (x.rad > 0) return undefined;
    throw new DomainError({
      subject: "floor",
      given: `a number of more than ${x.exp} bits`,
      expected: `at most ${LONGEST} bits before the point`,
    });
  }
  if (x.rad === 0) return scaled(x.man, x.exp);
  const fine = BigInt(Math.ceil(x.rad * 2 ** 20));
  const low = scaled((x.man << 20n) - fine, x.exp - 20);
  const high = scaled((x.man << 20n) + fine, x.exp - 20);
  return low === high ? low : undefined;
}
