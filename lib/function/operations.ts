// The functions of this folder as operations that a value records: number operands first, then plain ones.
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import { type At, asDisc, type Enclosure, type Operation } from "../number/origin.ts";
import { DomainError } from "../proof/errors.ts";
import { carlsonRC, carlsonRF, duplicatedRC, rfByDuplication } from "./carlson-first.ts";
import {
  rcByQuadrature,
  rdByQuadrature,
  rfByQuadrature,
  rgByQuadrature,
  rjByQuadrature,
} from "./carlson-quadrature.ts";
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
import {
  completeByQuadrature,
  completePiByQuadrature,
  incompleteByQuadrature,
  incompleteEByTheta,
  incompletePiByQuadrature,
  type LegendreName,
  onSide,
} from "./legendre-routes.ts";

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
    routes: {
      duplication: ([x, y, z], [real], prec) => rfByDuplication(x!, y!, z!, prec, real === true),
      quadrature: ([x, y, z], [real], prec) => rfByQuadrature(x!, y!, z!, prec, real === true),
    },
  }),
  RC: operationOf("RC", 2, ([x, y], _rest, prec) => carlsonRC(x!, y!, prec), {
    routes: {
      duplication: ([x, y], _rest, prec) => duplicatedRC(x!, y!, prec),
      quadrature: ([x, y], _rest, prec) => rcByQuadrature(x!, y!, prec),
    },
  }),
  RD: operationOf("RD", 3, ([x, y, z], [real], prec) => carlsonRD(x!, y!, z!, prec, real === true), {
    routes: {
      "the sum of the three RD": ([x, y, z], _rest, prec) => rdBySum(x!, y!, z!, prec),
      quadrature: ([x, y, z], [real], prec) => rdByQuadrature(x!, y!, z!, prec, real === true),
    },
  }),
  RJ: operationOf("RJ", 4, ([x, y, z, p], [real], prec) => carlsonRJ(x!, y!, z!, p!, prec, real === true), {
    routes: {
      "the relation of p and q": ([x, y, z, p], _rest, prec) => rjByPartner(x!, y!, z!, p!, prec),
      quadrature: ([x, y, z, p], [real], prec) => rjByQuadrature(x!, y!, z!, p!, prec, real === true),
    },
  }),
  RG: operationOf("RG", 3, ([x, y, z], [real], prec) => carlsonRG(x!, y!, z!, prec, real === true), {
    routes: {
      "three RD": ([x, y, z], _rest, prec) => rgBySum(x!, y!, z!, prec),
      quadrature: ([x, y, z], [real], prec) => rgByQuadrature(x!, y!, z!, prec, real === true),
    },
  }),
} as const;

function complete(name: LegendreName, f: (k: Modulus, prec: number) => Disc, further: Further): Operation {
  const quadrature: Evaluate = ([m, m1], [side], prec) => completeByQuadrature(name, sided(m!, m1!, side), prec);
  return operationOf(
    `complete ${name === "F" ? "K" : name}`,
    2,
    ([m, m1], [side], prec) => f(sided(m!, m1!, side), prec),
    { ...further, routes: { ...further.routes, quadrature } },
  );
}

/** `slope` is the integrand at φ, from sin²φ, cos²φ and Δ. */
function incomplete(
  name: LegendreName,
  f: (phi: Disc, k: Modulus, prec: number) => Disc,
  slope: (at: AmplitudeParts, prec: number) => Disc,
  byM?: (phi: Disc, k: Modulus, prec: number) => Disc,
  byTheta?: (phi: Disc, k: Modulus, prec: number) => Disc,
): Operation {
  const onModulus =
    (g: (phi: Disc, k: Modulus, prec: number) => Disc): Evaluate =>
    ([phi, m, m1], [side], prec) =>
      g(phi!, sided(m!, m1!, side), prec);
  const quadrature = onModulus((phi, k, prec) => incompleteByQuadrature(name, phi, k, prec));
  return operationOf(`incomplete ${name}`, 3, onModulus(f), {
    routes: byTheta ? { "theta functions": onModulus(byTheta), quadrature } : { quadrature },
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

/** Carlson's integral of 0, m1 and 1, on the cut by the side; `last` says which of the three is the last one. */
const symmetricAt =
  (
    degree: -1 | 1 | 3,
    f: typeof carlsonRF,
    last: 1 | 2,
    scaled: (value: Disc, m1: Disc, prec: number) => Disc,
  ): Evaluate =>
  ([m, m1], [side], prec) => {
    const others = last === 1 ? [disc.zero, disc.one, m1!] : [disc.zero, m1!, disc.one];
    const value = onSide(others, sided(m!, m1!, side), degree, (x, y, z) => f(x!, y!, z!, prec + 4), prec + 4);
    return scaled(value, m1!, prec);
  };

/** Operands m, m1, side. dK/dm = B/(2 m1), dE/dm = −D/2   (DLMF 19.4.1, 19.4.2). */
export const COMPLETE = {
  K: complete("F", completeK, {
    partials: [([m, m1], [side], prec) => halfOver(completeB(sided(m!, m1!, side), prec), m1!, prec), WITH_M],
    routes: { "Carlson's RF": symmetricAt(1, carlsonRF, 2, (x, _m1, prec) => disc.round(x, prec)) },
  }),
  E: complete("E", completeE, {
    partials: [([m, m1], [side], prec) => disc.ldexp(disc.neg(completeD(sided(m!, m1!, side), prec)), -1), WITH_M],
    routes: { "Carlson's RG": symmetricAt(-1, carlsonRG, 2, (x, _m1, prec) => disc.ldexp(disc.round(x, prec), 1)) },
  }),
  D: complete("D", completeD, {
    routes: { "Carlson's RD": symmetricAt(3, carlsonRD, 2, (x, _m1, prec) => third(x, prec)) },
  }),
  B: complete("B", completeB, {
    routes: { "Carlson's RD": symmetricAt(3, carlsonRD, 1, (x, m1, prec) => third(disc.mul(m1, x, prec + 4), prec)) },
  }),
} as const;

function third(x: Disc, prec: number): Disc {
  return disc.divBall(x, { man: 3n, exp: 0, rad: 0 }, prec);
}

/** Operands φ, m, m1, side. ∂F/∂m = (B − sin φ cos φ/Δ)/(2 m1), ∂E/∂m = −D/2   (DLMF 19.4.5, 19.4.6). */
export const INCOMPLETE = {
  F: incomplete(
    "F",
    incompleteF,
    ({ delta }, prec) => disc.inv(delta, prec),
    (phi, k, prec) => {
      const { s, c, delta } = amplitudeParts(phi, k, prec);
      const rest = disc.div(disc.mul(s, c, prec), delta, prec);
      return halfOver(disc.sub(incompleteB(phi, k, prec), rest, prec), k.m1, prec);
    },
  ),
  E: incomplete(
    "E",
    incompleteE,
    ({ delta }) => delta,
    (phi, k, prec) => disc.ldexp(disc.neg(incompleteD(phi, k, prec)), -1),
    incompleteEByTheta,
  ),
  D: incomplete("D", incompleteD, ({ s2, delta }, prec) => disc.div(s2, delta, prec)),
  B: incomplete("B", incompleteB, ({ c2, delta }, prec) => disc.div(c2, delta, prec)),
} as const;

/** Operands n, 1 − n, m, m1, side. */
export const COMPLETE_PI: Operation = operationOf(
  "complete Π",
  4,
  ([n, n1, m, m1], [side], prec) => completePi({ n: n!, n1: n1! }, sided(m!, m1!, side), prec),
  {
    routes: {
      quadrature: ([n, n1, m, m1], [side], prec) =>
        completePiByQuadrature({ n: n!, n1: n1! }, sided(m!, m1!, side), prec),
    },
  },
);

/** Operands n, 1 − n, φ, m, m1, side. */
export const INCOMPLETE_PI: Operation = operationOf(
  "incomplete Π",
  5,
  ([n, n1, phi, m, m1], [side], prec) => incompletePi({ n: n!, n1: n1! }, phi!, sided(m!, m1!, side), prec),
  {
    routes: {
      quadrature: ([n, n1, phi, m, m1], [side], prec) =>
        incompletePiByQuadrature({ n: n!, n1: n1! }, phi!, sided(m!, m1!, side), prec),
    },
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
