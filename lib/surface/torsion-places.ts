// The points of finite order of a curve's torus, and which of them are rational.

import { rationals as Q } from "../algebra/rationals.ts";
import { globalMinimalModel } from "../arithmetic/minimal.ts";
import { torsionSubgroup } from "../arithmetic/torsion.ts";
import { changePoint, invertChange } from "../curve/weierstrass.ts";
import { Rational } from "../number/rational.ts";
import type { Complex, Real } from "../number/values.ts";
import { DomainError } from "../proof/errors.ts";
import type { Curve } from "./curve.ts";
import { Point } from "./point.ts";
import { TorusPoint } from "./torus-point.ts";

/** A point that n kills: its place on the torus, and itself with exact coordinates if it is rational, else with enclosures. */
export interface TorsionPlace {
  readonly z: TorusPoint;
  readonly point: Point | Point<Real> | Point<Complex>;
}

/** The rational torsion points by their places on the torus, for each lattice once. */
const RATIONAL = new WeakMap<Curve, readonly { readonly z: TorusPoint; readonly point: Point }[]>();

function rationalPlaces(E: Curve) {
  const known = RATIONAL.get(E);
  if (known) return known;
  const { a, change } = globalMinimalModel(E.a);
  const back = invertChange(Q, change);
  const places = torsionSubgroup(a).points.flatMap((P) => {
    const point = new Point(E, changePoint(Q, back, P));
    const z = E.logarithm(point);
    return z instanceof TorusPoint ? [{ z, point }] : [];
  });
  RATIONAL.set(E, places);
  return places;
}

/** No rational torsion point has a larger order. Source: Mazur 1977. */
const LARGEST_ORDER = 12n;

/** The rational point at an exact point of the torus of a curve over Q, if there is one: complete. */
export function rationalPointAt(E: Curve, z: TorusPoint): Point | undefined {
  if (z.order === undefined || z.order > LARGEST_ORDER) return undefined;
  return rationalPlaces(E).find((place) => place.z.minus(z).isLatticePoint)?.point;
}

/** All n² points but O that n kills, (r, s) = (0, 1/n), ..., each with its place; rational ones with exact coordinates. */
export function torsionPlaces(E: Curve, n: number): TorsionPlace[] {
  if (!(Number.isSafeInteger(n) && n >= 2 && n <= 30)) {
    throw new DomainError({
      subject: "torsionPoints",
      given: `n = ${n}`,
      expected: "an integer from 2 to 30",
      argument: "n",
    });
  }
  const L = E.lattice();
  const part = (k: number) => Rational.of(k, n);
  const places = Array.from({ length: n * n - 1 }, (_, k) => L.at(part(Math.floor((k + 1) / n)), part((k + 1) % n)));
  return places.map((z) => ({ z, point: rationalPointAt(E, z) ?? E.exponential(z) }));
}
