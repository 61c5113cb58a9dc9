// A curve in the long Weierstrass form as the subject of a figure.

import type { Curve } from "../surface/curve.ts";
import { Point } from "../surface/point.ts";
import { realDouble } from "./doubles.ts";
import type { PlaneEquation } from "./fibre.ts";
import type { Mark } from "./marks.ts";
import { along, type Extras, NOTHING, type Plain, type Subject } from "./subject.ts";

// biome-ignore lint/suspicious/noExplicitAny: a point of any real field; a curve names its field in both directions
export type AnyCurve = Curve<any>;
// biome-ignore lint/suspicious/noExplicitAny: as above
export type AnyPoint = Point<any>;

export function weierstrassSubject(E: AnyCurve): Subject<AnyPoint> {
  const equation = equationOf(E);
  return {
    title: `Real points of ${E}`,
    equation,
    axisNames: { x: "x", y: "y" },
    isPoint: (value): value is AnyPoint => value instanceof Point,
    same: (P, Q) => P.equals(Q),
    place,
    chord: (P, Q, name) => chord(equation, P, Q, name),
  };
}

/** y² + (a1 x + a3) y − (x³ + a2 x² + a4 x + a6). */
function equationOf(E: AnyCurve): PlaneEquation {
  const [a1 = 0, a2 = 0, a3 = 0, a4 = 0, a6 = 0] = E.a.map((c) => realDouble("figure.curve", c));
  return { rows: [[-a6, -a4, -a2, -1], [a3, a1], [1]] };
}

function place(P: AnyPoint): Plain | undefined {
  const { coordinates } = P;
  return coordinates && [realDouble("figure.curve", coordinates[0]), realDouble("figure.curve", coordinates[1])];
}

const UPRIGHT = "The line is upright: it meets the curve again only at O, the sum of the two points.";

/** The chord or tangent, its third point, and the sum with the line of reflection. */
function chord(
  equation: PlaneEquation,
  P: AnyPoint,
  Q: AnyPoint,
  name: (point: AnyPoint, otherwise: string) => string,
): Extras {
  const [p, q] = [place(P), place(Q)];
  if (!p || !q) return { ...NOTHING, remarks: ["One of the two points is O, so the sum is the other."] };
  const tangent = P.equals(Q);
  const first = name(P, "P");
  const second = name(Q, !tangent && P.neg().equals(Q) ? `−${first}` : "Q");
  const ends: Mark[] = tangent
    ? [{ at: p, label: first }]
    : [
        { at: p, label: first },
        { at: q, label: second },
      ];
  const sum = P.plus(Q);
  const [s, third] = [place(sum), place(sum.neg())];
  if (!s || !third) return { ...NOTHING, marks: ends, lines: [[p, [p[0], p[1] + 1]]], remarks: [UPRIGHT] };
  const sumName = tangent ? `2${first}` : `${first} + ${second}`;
  const thirdIsEnd = sum.neg().equals(P) || sum.neg().equals(Q);
  const thirdMark: Mark = { at: third, label: `−${tangent ? sumName : `(${sumName})`}`, role: "derived" };
  return {
    marks: [...ends, ...(thirdIsEnd ? [] : [thirdMark]), { at: s, label: sumName, role: "derived" }],
    lines: [[p, tangent ? along(equation, p) : q]],
    segments: [[third, s]],
    remarks: [`The line meets the curve in a third point, whose mirror image is ${sumName}.`],
  };
}
