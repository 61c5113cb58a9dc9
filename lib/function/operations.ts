// The functions of this folder as operations that a value records: number operands first, then plain ones.
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { type At, asDisc, type Enclosure, type Operation } from "../number/origin.ts";
import { DomainError } from "../proof/errors.ts";
import { carlsonRC, carlsonRF, duplicatedRC, rfByDuplication } from "./carlson-first.ts";
import { rdBySum, rgBySum, rjByPartner } from "./carlson-routes.ts";
import { carlsonRG } from "./carlson-second.ts";
import { carlsonRD, carlsonRJ } from "./carlson-third.ts";
import { completeB, completeD, completeE, completeK, completePi, type Modulus } from "./legendre-complete.ts";
import {
  type AmplitudeParts,
  amplitudeParts,
  incompleteB,
  incompleteD,
  incompleteE,
  incompleteF,
  incompletePi,
} from "./legendre-incomplete.ts";
import type { Side } from "./legendre-mean.ts";

/** A disc on the real axis as a ball, so that the value is a Real. */
export function settle(d: Disc): Enclosure {
  return d.axis === "real" ? disc.along(d) : d;
}

/** A function of number operands, of plain operands, and of the bits to work with. */
export type Evaluate = (x: readonly Disc[], rest: readonly unknown[], prec: number) => Disc;

export interface Further {
  /** The partial derivatives by the number operands, in their order; undefined where it is not known here. */
  readonly partials?: readonly (Evaluate | undefined)[];
  /** Other methods for the same value, by name. */
  readonly routes?: Readonly<Record<string, Evaluate>>;
}

/** The partial derivative by m1, which moves against m and is counted with it. */
export const WITH_M: Evaluate = () => disc.zero;

/** An operation whose first `numbers` operands are numbers and whose other ones are plain. */
export function operationOf(name: string, numbers: number, f: Evaluate, further: Further = {}): Operation {
  const plain = (route: string, g: Evaluate): Operation => ({
    name: route,
    evaluate: (operands, at, prec) => settle(g(...split(operands, at, numbers), prec)),
  });
  const { partials, routes = {} } = further;
  return {
    ...plain(name, f),
    ...(partials && { differential: differentialOf(name, numbers, partials) }),
    routes: Object.entries(routes).map(([route, g]) => plain(route, g)),
  };
}

function split(operands: readonly unknown[], at: At, numbers: number): [Disc[], readonly unknown[]] {
  return [operands.slice(0, numbers).map((x) => asDisc(at(x))), operands.slice(numbers)];
}

function differentialOf(
  name: string,
  numbers: number,
  partials: readonly (Evaluate | undefined)[],
): NonNullable<Operation["differential"]> {
  return (operands, at, d, prec) => {
    const [x, rest] = split(operands, at, numbers);
    let sum: Disc = disc.zero;
    x.forEach((_, k) => {
      const change = asDisc(d(operands[k]));
      if (disc.isZero(change)) return;
      const partial = partials[k];
      if (!partial) throw noPartial(name, k);
      sum = disc.add(sum, disc.mul(partial(x, rest, prec), change, prec), prec);
    });
    return settle(sum);
  };
}

function noPartial(name: string, index: number): DomainError {
  return new DomainError({
    subject: name,
    given: `argument ${index + 1} as a variable`,
    expected: "an argument by which the derivative is known here",
  });
}

const sixth = (x: Disc, prec: number) => disc.divBall(x, { man: -6n, exp: 0, rad: 0 }, prec);

/** Carlson's integrals; the last operand says whether the arguments are closed under conjugation by an exact argument. */
export const CARLSON = {
  RF: operationOf("RF", 3, ([x, y, z], [real], prec) => carlsonRF(x!, y!, z!, prec, real === true), {
    // DLMF 19.18.1: ∂RF/∂z = −RD(x, y, z)/6.
    partials: [
      ([x, y, z], _rest, prec) => sixth(carlsonRD(y!, z!, x!, prec), prec),
      ([x, y, z], _rest, prec) => sixth(carlsonRD(x!, z!, y!, prec), prec),
      ([x, y, z], _rest, prec) => sixth(carlsonRD(x!, y!, z!, prec), prec),
    ],
    routes: { duplication: ([x, y, z], [real], prec) => rfByDuplication(x!, y!, z!, prec, real === true) },
  }),
  RC: operationOf("RC", 2, ([x, y], _rest, prec) => carlsonRC(x!, y!, prec), {
    routes: { duplication: ([x, y], _rest, prec) => duplicatedRC(x!, y!, prec) },
  }),
  RD: operationOf("RD", 3, ([x, y, z], [real], prec) => carlsonRD(x!, y!, z!, prec, real === true), {
    routes: { "the sum of the three RD": ([x, y, z], _rest, prec) => rdBySum(x!, y!, z!, prec) },
  }),
  RJ: operationOf("RJ", 4, ([x, y, z, p], [real], prec) => carlsonRJ(x!, y!, z!, p!, prec, real === true), {
    routes: { "the relation of p and q": ([x, y, z, p], _rest, prec) => rjByPartner(x!, y!, z!, p!, prec) },
  }),
  RG: operationOf("RG", 3, ([x, y, z], [real], prec) => carlsonRG(x!, y!, z!, prec, real === true), {
    routes: { "three RD": ([x, y, z], _rest, prec) => rgBySum(x!, y!, z!, prec) },
  }),
} as const;

function complete(name: string, f: (k: Modulus, prec: number) => Disc, further: Further): Operation {
  return operationOf(name, 2, ([m, m1], [side], prec) => f(sided(m!, m1!, side), prec), further);
}

/** `slope` is the integrand at φ, from sin²φ, cos²φ and Δ. */
function incomplete(
  name: string,
  f: (phi: Disc, k: Modulus, prec: number) => Disc,
  slope: (at: AmplitudeParts, prec: number) => Disc,
  byM?: (phi: Disc, k: Modulus, prec: number) => Disc,
): Operation {
  const onModulus =
    (g: (phi: Disc, k: Modulus, prec: number) => Disc): Evaluate =>
    ([phi, m, m1], [side], prec) =>
      g(phi!, sided(m!, m1!, side), prec);
  return operationOf(name, 3, onModulus(f), {
    partials: [
      onModulus((phi, k, prec) => slope(amplitudeParts(phi, k, prec), prec)),
      byM && onModulus(byM),
      byM && WITH_M,
    ],
  });
}

/** A modulus from its operands; the side is 1, −1, or undefined. */
function sided(m: Disc, m1: Disc, side: unknown): Modulus {
  return side === undefined ? { m, m1 } : { m, m1, side: side as Side };
}

function halfOver(x: Disc, y: Disc, prec: number): Disc {
  return disc.ldexp(disc.div(x, y, prec), -1);
}

/** Operands m, m1, side. dK/dm = B/(2 m1), dE/dm = −D/2   (DLMF 19.4.1, 19.4.2). */
export const COMPLETE = {
  K: complete("complete K", completeK, {
    partials: [([m, m1], [side], prec) => halfOver(completeB(sided(m!, m1!, side), prec), m1!, prec), WITH_M],
    routes: { "Carlson's RF": ([, m1], _rest, prec) => carlsonRF(disc.zero, m1!, disc.one, prec) },
  }),
  E: complete("complete E", completeE, {
    partials: [([m, m1], [side], prec) => disc.ldexp(disc.neg(completeD(sided(m!, m1!, side), prec)), -1), WITH_M],
    routes: { "Carlson's RG": ([, m1], _rest, prec) => disc.ldexp(carlsonRG(disc.zero, m1!, disc.one, prec), 1) },
  }),
  D: complete("complete D", completeD, {
    routes: { "Carlson's RD": ([, m1], _rest, prec) => third(carlsonRD(disc.zero, m1!, disc.one, prec), prec) },
  }),
  B: complete("complete B", completeB, {
    routes: {
      "Carlson's RD": ([, m1], _rest, prec) =>
        third(disc.mul(m1!, carlsonRD(disc.zero, disc.one, m1!, prec + 4), prec + 4), prec),
    },
  }),
} as const;

function third(x: Disc, prec: number): Disc {
  return disc.divBall(x, { man: 3n, exp: 0, rad: 0 }, prec);
}

/** Operands φ, m, m1, side. ∂F/∂m = (B − sin φ cos φ/Δ)/(2 m1), ∂E/∂m = −D/2   (DLMF 19.4.5, 19.4.6). */
export const INCOMPLETE = {
  F: incomplete(
    "incomplete F",
    incompleteF,
    ({ delta }, prec) => disc.inv(delta, prec),
    (phi, k, prec) => {
      const { s, c, delta } = amplitudeParts(phi, k, prec);
      const rest = disc.div(disc.mul(s, c, prec), delta, prec);
      return halfOver(disc.sub(incompleteB(phi, k, prec), rest, prec), k.m1, prec);
    },
  ),
  E: incomplete(
    "incomplete E",
    incompleteE,
    ({ delta }) => delta,
    (phi, k, prec) => disc.ldexp(disc.neg(incompleteD(phi, k, prec)), -1),
  ),
  D: incomplete("incomplete D", incompleteD, ({ s2, delta }, prec) => disc.div(s2, delta, prec)),
  B: incomplete("incomplete B", incompleteB, ({ c2, delta }, prec) => disc.div(c2, delta, prec)),
} as const;

/** Operands n, 1 − n, m, m1, side. */
export const COMPLETE_PI: Operation = operationOf("complete Π", 4, ([n, n1, m, m1], [side], prec) =>
  completePi({ n: n!, n1: n1! }, sided(m!, m1!, side), prec),
);

/** Operands n, 1 − n, φ, m, m1, side. */
export const INCOMPLETE_PI: Operation = operationOf(
  "incomplete Π",
  5,
  ([n, n1, phi, m, m1], [side], prec) => incompletePi({ n: n!, n1: n1! }, phi!, sided(m!, m1!, side), prec),
  {
    partials: [
      undefined,
      undefined,
      ([n, , phi, m, m1], [side], prec) => {
        const { s2, delta } = amplitudeParts(phi!, sided(m!, m1!, side), prec);
        return disc.inv(disc.mul(disc.sub(disc.one, disc.mul(n!, s2, prec), prec), delta, prec), prec);
      },
    ],
  },
);
