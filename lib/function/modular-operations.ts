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
import {
  deltaByTheta,
  discriminantByRows,
  eisensteinByDivisors,
  eisensteinByRows,
  etaByProduct,
  etaByTheta,
  jBySeries,
  timesTwoPi12,
  weberByProduct,
  weberByTheta,
} from "./modular-routes.ts";
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

const onAxis =
  (f: (tau: Disc, prec: number) => Disc) =>
  (tau: Disc, prec: number): Disc =>
    tau.axis === "imaginary" ? ontoReal(f(tau, prec)) : f(tau, prec);

export const ETA: Operation = flagged("Dedekind eta", dedekindEta, {
  "theta function at 3τ": onAxis(etaByTheta),
  "product at τ itself": onAxis(etaByProduct),
});
export const DELTA: Operation = flagged("normalised discriminant", deltaNormalised, {
  "theta functions": deltaByTheta,
  "product at τ itself": (tau, prec) => disc.pow(etaByProduct(tau, prec + 12), 24, prec),
});
export const LATTICE_DISCRIMINANT: Operation = flagged("discriminant", latticeDiscriminant, {
  "g2³ − 27 g3² by rows": (tau, prec) => discriminantByRows(tau, prec),
  "theta functions": (tau, prec) => timesTwoPi12(deltaByTheta(tau, prec + 8), prec),
});
/** By theta series; the second route by Euler's series for η. */
export const MODULAR_J: Operation = flagged("j", jInvariant, {
  "Klein's quotient of series at τ itself": jBySeries,
  "E4³/η²⁴": (tau, prec) =>
    disc.div(disc.pow(eisensteinE(4, tau, prec + 16), 3, prec + 16), deltaNormalised(tau, prec + 16), prec),
});

type ByWeight = (k: number, tau: Disc, prec: number) => Disc;

const onWeight =
  (f: ByWeight): Evaluate =>
  ([tau], [real, k], prec) =>
    real ? ontoReal(f(k as number, tau!, prec)) : f(k as number, tau!, prec);

/** [τ, real, k]. */
export const EISENSTEIN_E: Operation = operationOf("Eisenstein E", 1, onWeight(eisensteinE), {
  routes: { "divisor sums at τ itself": onWeight(eisensteinByDivisors) },
});
export const EISENSTEIN_G: Operation = operationOf("Eisenstein G", 1, onWeight(eisensteinG), {
  routes: { "sum over rows at τ itself": onWeight(eisensteinByRows) },
});

const onOrder =
  (e?: ByWeight): Evaluate =>
  ([tau], [real, order], prec) => {
    const value = eisensteinG2(order as Order, tau!, prec, e);
    return real ? ontoReal(value) : value;
  };

/** [τ, real, order]. */
export const EISENSTEIN_G2: Operation = operationOf("Eisenstein G2", 1, onOrder(), {
  routes: { "divisor sums at τ itself": onOrder(eisensteinByDivisors) },
});

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

const onName =
  (f: (name: WeberName, tau: Disc, prec: number) => Disc): Evaluate =>
  ([tau], [name], prec) =>
    onAxis((t, bits) => f(name as WeberName, t, bits))(tau!, prec);

/** [τ, name]. */
export const WEBER: Operation = operationOf("Weber function", 1, onName(weber), {
  routes: { "theta functions": onName(weberByTheta), "product at τ itself": onName(weberByProduct) },
});

/** [τ, matrix]: (aτ + b)/(cτ + d). */
export const MOVED: Operation = operationOf("modular action", 1, ([tau], [matrix], prec) =>
  moved(matrix as Matrix, tau!, prec),
);
