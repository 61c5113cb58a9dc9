// Coefficients of the series of ζ and σ as operations that a value records.

import { combination } from "../../function/weierstrass.ts";
import type { Disc } from "../../number/disc.ts";
import * as disc from "../../number/disc.ts";
import { asDisc, type Operation } from "../../number/origin.ts";
import type { Rational } from "../../number/rational.ts";
import { invariants, periods, quasiPeriods } from "../context.ts";
import type { PeriodLattice } from "../period-lattice.ts";
import { type Coordinates, valuesAtPoint } from "../torus.ts";
import { discField } from "./disc-field.ts";
import { mulSeries } from "./laurent.ts";
import { growth, sigmaAtOrigin, sigmaAtPoint, zetaAtOrigin, zetaAtPoint } from "./quasi-laurent.ts";

const ALL = ["wp", "prime", "zeta", "sigma"] as const;

/** [lattice, "zeta" or "sigma", k, r, s] or with a number as remainder: the k-th coefficient from the leading one. */
export const QUASI_COEFFICIENT: Operation = {
  name: "series coefficient",
  evaluate: ([lattice, kind, k, r, s, rest], at, prec) => {
    const index = k as number;
    const L = lattice as PeriodLattice;
    const wp = prec + 32 + 4 * index;
    const where = [r, s] as Coordinates;
    const value =
      rest === undefined && where.every((q) => q.isInteger())
        ? atLatticePoint(L, kind as "zeta" | "sigma", index, where, wp)
        : elsewhere(L, kind as "zeta" | "sigma", index, where, rest === undefined ? undefined : asDisc(at(rest)), wp);
    const rounded = disc.round(value, prec);
    return rounded.axis === "real" ? disc.along(rounded) : rounded;
  },
};

function elsewhere(
  L: PeriodLattice,
  kind: "zeta" | "sigma",
  k: number,
  where: Coordinates,
  rest: Disc | undefined,
  wp: number,
): Disc {
  const F = discField(wp);
  const { g2 } = invariants(L, wp);
  const { wp: x, prime, zeta, sigma } = valuesAtPoint(L, where, rest, wp, ALL);
  const at = { wp: x!, prime: prime!, zeta: zeta!, sigma: sigma! };
  return kind === "zeta" ? zetaAtPoint(F, g2, at, k + 1)[k]! : sigmaAtPoint(F, g2, at, k + 1)[k]!;
}

/** ζ(w + t) = ζ(t) + η(w), σ(w + t) = ±exp(η(w)(t + w/2)) σ(t), plus for w ∈ 2Λ   (DLMF 23.2.17). */
function atLatticePoint(L: PeriodLattice, kind: "zeta" | "sigma", k: number, where: Coordinates, wp: number): Disc {
  const F = discField(wp);
  const { g2, g3 } = invariants(L, wp);
  const [m, n] = where.map((q: Rational) => q.num) as [bigint, bigint];
  const [eta1, eta2] = quasiPeriods(L, wp);
  const eta = combination(eta1, eta2, m, n, wp);
  if (kind === "zeta") {
    const value = zetaAtOrigin(F, g2, g3, k + 1)[k]!;
    return k === 1 ? disc.add(value, eta, wp) : value;
  }
  const own = sigmaAtOrigin(F, g2, g3, k + 1);
  if (m === 0n && n === 0n) return own[k]!;
  const { w1, w2 } = periods(L, wp);
  const start = disc.exp(disc.ldexp(disc.mul(eta, combination(w1, w2, m, n, wp), wp), -1), wp);
  const signed = (m | n) & 1n ? disc.neg(start) : start;
  return mulSeries(F, own, growth(F, [eta], signed, k + 1), k + 1)[k]!;
}
