// The functions of this folder as operations that a value records: number operands first, then plain ones.
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { asDisc, type Enclosure, type Operation } from "../number/origin.ts";
import { carlsonRC, carlsonRF } from "./carlson-first.ts";
import { carlsonRG } from "./carlson-second.ts";
import { carlsonRD, carlsonRJ } from "./carlson-third.ts";
import { completeB, completeD, completeE, completeK, completePi, type Modulus } from "./legendre-complete.ts";
import { incompleteB, incompleteD, incompleteE, incompleteF, incompletePi } from "./legendre-incomplete.ts";
import type { Side } from "./legendre-mean.ts";

/** A disc on the real axis as a ball, so that the value is a Real. */
export function settle(d: Disc): Enclosure {
  return d.axis === "real" ? disc.along(d) : d;
}

/** An operation whose first `numbers` operands are numbers and whose other ones are plain. */
export function operationOf(
  name: string,
  numbers: number,
  f: (x: readonly Disc[], rest: readonly unknown[], prec: number) => Disc,
): Operation {
  return {
    name,
    evaluate: (operands, at, prec) =>
      settle(
        f(
          operands.slice(0, numbers).map((x) => asDisc(at(x))),
          operands.slice(numbers),
          prec,
        ),
      ),
  };
}

/** Carlson's integrals; the last operand says whether the arguments are closed under conjugation by an exact argument. */
export const CARLSON = {
  RF: operationOf("RF", 3, ([x, y, z], [real], prec) => carlsonRF(x!, y!, z!, prec, real === true)),
  RC: operationOf("RC", 2, ([x, y], _rest, prec) => carlsonRC(x!, y!, prec)),
  RD: operationOf("RD", 3, ([x, y, z], [real], prec) => carlsonRD(x!, y!, z!, prec, real === true)),
  RJ: operationOf("RJ", 4, ([x, y, z, p], [real], prec) => carlsonRJ(x!, y!, z!, p!, prec, real === true)),
  RG: operationOf("RG", 3, ([x, y, z], [real], prec) => carlsonRG(x!, y!, z!, prec, real === true)),
} as const;

function complete(name: string, f: (k: Modulus, prec: number) => Disc): Operation {
  return operationOf(name, 2, ([m, m1], [side], prec) => f(sided(m!, m1!, side), prec));
}

function incomplete(name: string, f: (phi: Disc, k: Modulus, prec: number) => Disc): Operation {
  return operationOf(name, 3, ([phi, m, m1], [side], prec) => f(phi!, sided(m!, m1!, side), prec));
}

/** A modulus from its operands; the side is 1, −1, or undefined. */
function sided(m: Disc, m1: Disc, side: unknown): Modulus {
  return side === undefined ? { m, m1 } : { m, m1, side: side as Side };
}

/** Operands m, m1, side. */
export const COMPLETE = {
  K: complete("complete K", completeK),
  E: complete("complete E", completeE),
  D: complete("complete D", completeD),
  B: complete("complete B", completeB),
} as const;

/** Operands φ, m, m1, side. */
export const INCOMPLETE = {
  F: incomplete("incomplete F", incompleteF),
  E: incomplete("incomplete E", incompleteE),
  D: incomplete("incomplete D", incompleteD),
  B: incomplete("incomplete B", incompleteB),
} as const;

/** Operands n, 1 − n, m, m1, side. */
export const COMPLETE_PI: Operation = operationOf("complete Π", 4, ([n, n1, m, m1], [side], prec) =>
  completePi({ n: n!, n1: n1! }, sided(m!, m1!, side), prec),
);

/** Operands n, 1 − n, φ, m, m1, side. */
export const INCOMPLETE_PI: Operation = operationOf("incomplete Π", 5, ([n, n1, phi, m, m1], [side], prec) =>
  incompletePi({ n: n!, n1: n1! }, phi!, sided(m!, m1!, side), prec),
);
