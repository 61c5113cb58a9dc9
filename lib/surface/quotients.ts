// Dividing a rational point by an integer, and the points of finite order n of a curve's torus.

import { dividePoint, pointsOfOrder } from "../arithmetic/division.ts";
import { DomainError } from "../proof/errors.ts";
import { Point } from "./point.ts";

/** All rational R with nR = P. */
export function quotients(P: Point, n: number): Point[] {
  const E = P.curve;
  if (E.field.name !== "Q") {
    throw new DomainError({ subject: "divide", given: `a point of ${E}`, expected: "a point over Q" });
  }
  if (!(Number.isSafeInteger(n) && n >= 2 && n <= 30)) {
    throw new DomainError({ subject: "divide", given: `n = ${n}`, expected: "an integer from 2 to 30", argument: "n" });
  }
  if (P.coordinates) return dividePoint(E.a, P.coordinates, n).map((R) => new Point(E, R));
  const divisors = Array.from({ length: n - 1 }, (_, k) => k + 2).filter((d) => n % d === 0);
  return [E.origin, ...divisors.flatMap((d) => pointsOfOrder(E.a, d).map((R) => new Point(E, R)))];
}
