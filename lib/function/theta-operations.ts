// Theta functions as operations that a value records.
import * as ball from "../number/ball.ts";
import type { Disc } from "../number/disc.ts";
import * as disc from "../number/disc.ts";
import type { Operation } from "../number/origin.ts";
import type { Rational } from "../number/rational.ts";
import { PoleError } from "../proof/errors.ts";
import { type Evaluate, operationOf } from "./operations.ts";
import { thetaCharacteristicJet } from "./theta-characteristic.ts";
import { plainTheta } from "./theta-plain.ts";
import { type ThetaIndex, thetaJet } from "./theta-values.ts";

/** θ1 .. θ4 by number, or characteristics [a, b]. */
export type ThetaLabel = ThetaIndex | readonly [Rational, Rational];

function jet(label: ThetaLabel, v: Disc, tau: Disc, order: number, prec: number): Disc[] {
  return typeof label === "number"
    ? thetaJet(label, v, tau, order, prec)
    : thetaCharacteristicJet(label, v, tau, order, prec);
}

/** "θ1", "θ[1/3, 0]". */
export function thetaText(label: ThetaLabel): string {
  return typeof label === "number" ? `θ${label}` : `θ[${label.join(", ")}]`;
}

/** [v, τ, label, order]: the derivative of θ(v|τ) in v of that order. The heat equation θ_vv = 4πi θ_τ gives that by τ (DLMF 20.13.1). */
export const THETA: Operation = operationOf("theta", 2, derivative(0), {
  partials: [
    derivative(1),
    (x, rest, prec) =>
      disc.neg(disc.mulI(disc.divBall(disc.ldexp(derivative(2)(x, rest, prec + 8), -2), ball.pi(prec + 8), prec))),
  ],
  routes: {
    "the series at τ itself": ([v, tau], [label, order], prec) =>
      plainTheta(label as ThetaLabel, v!, tau!, order as number, prec),
  },
});

/** The derivative of an order that is higher by so much. */
function derivative(more: number): Evaluate {
  return ([v, tau], [label, order], prec) => jet(label as ThetaLabel, v!, tau!, (order as number) + more, prec).at(-1)!;
}

/** [v, τ, label, order]: the derivative of ln θ(v|τ) in v of that order, from 1 on. */
export const THETA_LOGARITHMIC: Operation = operationOf("theta logarithmic", 2, logarithmicDerivative(0), {
  partials: [logarithmicDerivative(1)],
  routes: {
    "the series at τ itself": ([v, tau], [label, order], prec) => {
      const derivatives = (wp: number) =>
        Array.from({ length: (order as number) + 1 }, (_, k) => plainTheta(label as ThetaLabel, v!, tau!, k, wp));
      return logarithmicOf(label as ThetaLabel, derivatives, order as number, prec);
    },
  },
});

function logarithmicDerivative(more: number): Evaluate {
  return ([v, tau], [label, order], prec) =>
    logarithmicAt(label as ThetaLabel, v!, tau!, (order as number) + more, prec);
}

function logarithmicAt(label: ThetaLabel, v: Disc, tau: Disc, order: number, prec: number): Disc {
  return logarithmicOf(label, (wp) => jet(label, v, tau, order, wp), order, prec);
}

function logarithmicOf(label: ThetaLabel, jetAt: (wp: number) => Disc[], order: number, prec: number): Disc {
  const wp = prec + 8 + 4 * order;
  const derivatives = jetAt(wp);
  if (disc.containsZero(derivatives[0]!)) {
    throw new PoleError({
      subject: "theta",
      given: `an argument that is a zero of ${thetaText(label)}, or cannot be told from one`,
      expected: "an argument away from the zeros, where the logarithmic derivative has poles",
      argument: "v",
    });
  }
  return disc.round(logarithmic(derivatives, wp), prec + 2);
}

/** The last of L_n = (ln f)^(n): f^(n) = Σ_k C(n−1, k) f^(k) L_(n−k), k = 0 .. n−1. */
function logarithmic(f: readonly Disc[], wp: number): Disc {
  const over = disc.inv(f[0]!, wp);
  const ratio = f.map((x) => disc.mul(x, over, wp));
  const list: Disc[] = [disc.zero];
  for (let n = 1; n < f.length; n++) {
    let rest = ratio[n]!;
    let binomial = 1n;
    for (let k = 1; k < n; k++) {
      binomial = (binomial * BigInt(n - k)) / BigInt(k);
      rest = disc.sub(rest, disc.mulInt(disc.mul(ratio[k]!, list[n - k]!, wp), binomial, wp), wp);
    }
    list.push(rest);
  }
  return list.at(-1)!;
}
