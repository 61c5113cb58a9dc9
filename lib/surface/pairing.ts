// The Weil pairing and indices of points, as methods of curves and points delegate to them.

import type { Residue } from "../algebra/primefield.ts";
import { orderDividing } from "../arithmetic/order-fp.ts";
import { discreteLogarithm } from "../arithmetic/structure-fp.ts";
import { isKilledBy, weilPairing } from "../curve/weil.ts";
import { DomainError } from "../proof/errors.ts";
import type { Curve } from "./curve.ts";
import { modCurve, modPoint } from "./finite.ts";
import type { Point } from "./point.ts";

/** e_n(P, Q); see Curve.weilPairing. */
export function pairingOf<T>(E: Curve<T>, n: number, P: Point<T>, Q: Point<T>): T {
  const { field: F, a } = E;
  if (F.name === "R" || F.name === "C") {
    throw new DomainError({
      subject: "weilPairing",
      given: `points over ${F.name}`,
      expected: "exact coordinates",
      hint: "For points r·ω1 + s·ω2 of the torus the pairing is exp(2πi n(rs′ − sr′)).",
    });
  }
  for (const R of [P, Q]) {
    if (isKilledBy(F, a, n, R.coordinates)) continue;
    throw new DomainError({
      subject: "weilPairing",
      given: `${R}, which ${n} does not kill`,
      expected: `points P and Q with ${n}P = ${n}Q = O`,
    });
  }
  return weilPairing(F, a, n, P.coordinates, Q.coordinates);
}

/** The least n >= 0 with Q = nP over F_p, or undefined. */
export function indexOf(Q: Point<Residue>, P: Point<Residue>, count: bigint): bigint | undefined {
  const curve = modCurve(P.curve, "index");
  const order = orderDividing(curve, modPoint(P), count);
  return discreteLogarithm(curve, modPoint(Q), modPoint(P), order);
}
