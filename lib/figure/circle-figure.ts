import { DomainError } from "../proof/errors.ts";
import { TorusPoint } from "../surface/torus-point.ts";
import { type CircleMark, drawCircle } from "./circle-picture.ts";
import { complexDouble } from "./doubles.ts";
import { fact } from "./facts.ts";
import type { Figure } from "./figure.ts";
import { type Named, namedEntries } from "./named.ts";
import type { AnyCurve, AnyPoint } from "./weierstrass-subject.ts";

export interface CircleFigureOptions {
  /** Real points of the curve, by their names: { P, Q }. A list gives them the names P1, P2, ... */
  readonly points?: Named<AnyPoint>;
}

/**
 * The real points of a curve as the circle R/ω1Z, the points marked at their logarithms; for two components the bounded one as a second
 * circle inside.
 *
 * Domain   a curve over Q, a real quadratic field or R, and real points of it.
 * Error    drawn in double precision: a picture proves nothing.
 * @example figure.circle(E, { points: { P, "2P": P.times(2) } })
 */
export function circle(E: AnyCurve, options: CircleFigureOptions = {}): Figure {
  const L = E.lattice();
  const components = L.realComponents;
  if (!components) {
    throw new DomainError({
      subject: "figure.circle",
      given: `${E}`,
      expected: "a curve with real coefficients",
      hint: "A curve that is not real has no circle of real points; figure.lattice shows its torus.",
    });
  }
  const named = namedEntries(options.points, (_, k) => `P${k + 1}`);
  const logarithms = named.map(([label, P]) => [label, E.logarithm(P)] as const);
  const [period] = complexDouble("figure.circle", L.periods[0]);
  const marks = logarithms.map(([label, z]): CircleMark => {
    // A real point has a real logarithm, or an exact point of the torus on one of the two components.
    const bounded = z instanceof TorusPoint && z.coordinates[1].den === 2n;
    const [t, height] = complexDouble("figure.circle", z);
    if (!(z instanceof TorusPoint) && height !== 0) throw notReal(E, label);
    const shift = bounded && components === 2 ? complexDouble("figure.circle", L.periods[1])[0] / 2 : 0;
    return { label, turn: modulo((t - shift) / period), bounded };
  });
  return drawCircle({
    title: `Logarithms on the real points of ${E}`,
    components,
    marks,
    remarks: [],
    data: {
      figure: "circle",
      curve: String(E),
      period: fact(L.periods[0].digits(12)),
      components: String(components),
      logarithms: Object.fromEntries(logarithms.map(([label, z]) => [label, fact(z)])),
    },
  });
}

function modulo(turn: number): number {
  const rest = turn - Math.floor(turn);
  return rest === 1 ? 0 : rest;
}

function notReal(E: AnyCurve, label: string): DomainError {
  return new DomainError({
    subject: "figure.circle",
    given: `the point ${label}, which is not real`,
    expected: `real points of ${E}`,
    argument: "points",
  });
}
