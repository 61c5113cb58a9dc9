// Functions with a cut, continued across it. Which side they come from is chosen once, by the midpoint of the first enclosure, and is part of the
// record: more digits asked for later are digits of the same number.
import * as disc from "./disc.ts";
import { asDisc, type Node, type Operation } from "./origin.ts";

/** What a function does with an enclosure that meets its cut: "continuous" goes on across it from the midpoint. Without it a BranchError is thrown. */
export interface Continued {
  readonly cut?: "continuous";
}

export type Side = "upper" | "lower";

/** The side that a function continues from; undefined where the enclosure is clear of the cut, or none is asked for. */
export function continuedFrom(x: Node, { cut }: Continued): Side | undefined {
  const z = asDisc(x.enclosure);
  if (cut !== "continuous" || !disc.meetsCut(z)) return undefined;
  return z.im >= 0n ? "upper" : "lower";
}

const options = (side: unknown): disc.CutOptions => ({ cut: side as Side });

export const SQRT_ACROSS: Operation = {
  name: "sqrt",
  evaluate: ([x, side], at, prec) => disc.sqrt(asDisc(at(x)), prec, options(side)),
};
export const LN_ACROSS: Operation = {
  name: "ln",
  evaluate: ([x, side], at, prec) => disc.ln(asDisc(at(x)), prec, options(side)),
};
export const ARG_ACROSS: Operation = {
  name: "arg",
  evaluate: ([x, side], at, prec) => disc.arg(asDisc(at(x)), prec, options(side)),
};
export const POW_ACROSS: Operation = {
  name: "pow",
  evaluate: ([x, y, side], at, prec) => disc.power(asDisc(at(x)), asDisc(at(y)), prec, options(side)),
};
export const ROOT_ACROSS: Operation = {
  name: "nthRoot",
  evaluate: ([x, n, side], at, prec) => disc.nthRoot(asDisc(at(x)), n as number, prec, options(side)),
};
