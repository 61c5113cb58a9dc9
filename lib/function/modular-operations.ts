// Modular functions as operations that a value records.
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import type { Operation } from "../number/origin.ts";
import { ontoReal } from "./enclosure.ts";
import type { Matrix } from "./matrix.ts";
import { moved } from "./modular-action.ts";
import {
  dedekindEta,
  deltaNormalised,
  eisensteinE,
  eisensteinG,
  eisensteinG2,
  jInvariant,
  latticeDiscriminant,
  modularLambda,
  type Order,
  type WeberName,
  weber,
} from "./modular-forms.ts";
import { type Evaluate, operationOf } from "./operations.ts";

/** [τ, real]: the flag says that the value is real by an exact argument. */
function flagged(
  name: string,
  f: (tau: Disc, prec: number) => Disc,
  routes: Readonly<Record<string, (tau: Disc, prec: number) => Disc>> = {},
): Operation {
  const onFlag =
    (g: (tau: Disc, prec: number) => Disc): Evaluate =>
    ([tau], [real], prec) =>
      real ? ontoReal(g(tau!, prec)) : g(tau!, prec);
  const flaggedRoutes = Object.fromEntries(Object.entries(routes).map(([route, g]) => [route, onFlag(g)]));
  return operationOf(name, 1, onFlag(f), { routes: flaggedRoutes });
}

export const ETA: Operation = flagged("Dedekind eta", dedekindEta);
export const DELTA: Operation = flagged("normalised discriminant", deltaNormalised);
export const LATTICE_DISCRIMINANT: Operation = flagged("discriminant", latticeDiscriminant);
/** By theta series; the second route by Euler's series for η. */
export const MODULAR_J: Operation = flagged("j", jInvariant, {
  "E4³/η²⁴": (tau, prec) =>
    disc.div(disc.pow(eisensteinE(4, tau, prec + 16), 3, prec + 16), deltaNormalised(tau, prec + 16), prec),
});

/** [τ, real, k]. */
export const EISENSTEIN_E: Operation = operationOf("Eisenstein E", 1, ([tau], [real, k], prec) =>
  real ? ontoReal(eisensteinE(k as number, tau!, prec)) : eisensteinE(k as number, tau!, prec),
);
export const EISENSTEIN_G: Operation = operationOf("Eisenstein G", 1, ([tau], [real, k], prec) =>
  real ? ontoReal(eisensteinG(k as number, tau!, prec)) : eisensteinG(k as number, tau!, prec),
);

/** [τ, real, order]. */
export const EISENSTEIN_G2: Operation = operationOf("Eisenstein G2", 1, ([tau], [real, order], prec) =>
  real ? ontoReal(eisensteinG2(order as Order, tau!, prec)) : eisensteinG2(order as Order, tau!, prec),
);

/** [τ, "lambda" or "complement", real]. */
export const LAMBDA: Operation = operationOf(
  "modular lambda",
  1,
  ([tau], [which, real], prec) => {
    const value = modularLambda(tau!, prec)[which as "lambda" | "complement"];
    return real ? ontoReal(value) : value;
  },
  {
    routes: {
      "Weber's functions": ([tau], [which], prec) => {
        const ratio = disc.div(
          weber(which === "lambda" ? "f2" : "f1", tau!, prec + 16),
          weber("f", tau!, prec + 16),
          prec + 16,
        );
        return disc.pow(ratio, 8, prec);
      },
    },
  },
);

/** [τ, name]. */
export const WEBER: Operation = operationOf("Weber function", 1, ([tau], [name], prec) =>
  weber(name as WeberName, tau!, prec),
);

/** [τ, matrix]: (aτ + b)/(cτ + d). */
export const MOVED: Operation = operationOf("modular action", 1, ([tau], [matrix], prec) =>
  moved(matrix as Matrix, tau!, prec),
);
