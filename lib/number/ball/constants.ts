import { ln2Fixed, piFixed } from "../fixed/constants.ts";
import type { Ball } from "./data.ts";

/** π to prec bits. Kept at the highest precision asked so far. Source: the Chudnovsky series. */
export function pi(prec: number): Ball {
  const work = Math.max(prec, 2);
  return { man: piFixed(work), exp: -work, rad: 2 };
}

/** ln 2 to prec bits. */
export function ln2(prec: number): Ball {
  const work = Math.max(prec, 2) + 1;
  return { man: ln2Fixed(work), exp: -work, rad: 2 };
}
