// A plane cubic or y² = quartic as the subject of a figure: in the plane where one letter is 1.

import { sortedTerms } from "../algebra/multivariate.ts";
import { DomainError } from "../proof/errors.ts";
import { PlaneCubic } from "../surface/cubic.ts";
import { QuadricPair } from "../surface/quadrics.ts";
import { type PlaneCurve, PlanePoint } from "../surface/variety.ts";
import { realDouble } from "./doubles.ts";
import type { PlaneEquation } from "./fibre.ts";
import type { Mark } from "./marks.ts";
import { along, type Extras, NOTHING, type Plain, type Subject } from "./subject.ts";

export function planeSubject(C: PlaneCurve, chart: string | undefined): Subject<PlanePoint> {
  if (C instanceof QuadricPair) {
    throw new DomainError({
      subject: "figure.curve",
      given: `${C}, a curve in space`,
      expected: "a plane curve",
      hint: "Draw its Weierstrass model: C.through(P).curve.",
    });
  }
  const axes = axesOf(C, chart);
  const equation = equationOf(C, axes);
  const place = (P: PlanePoint): Plain | undefined => placeOf(C, P, axes);
  return {
    title: `Real points of ${C}${C.homogeneous ? `, where ${axes.one} = 1` : ""}`,
    equation,
    axisNames: { x: axes.x, y: axes.y },
    isPoint: (value): value is PlanePoint => value instanceof PlanePoint,
    same: (P, Q) => P.equals(Q),
    place,
    chord: (P, Q, name) => chord(C, equation, [P, Q], place, name),
  };
}

/** The letters across and upward, and the one that is 1 (for a homogeneous equation). */
interface Axes {
  readonly x: string;
  readonly y: string;
  readonly one: string | undefined;
}

function axesOf(C: PlaneCurve, chart: string | undefined): Axes {
  const { letters } = C;
  if (!C.homogeneous) return { x: letters[0]!, y: letters[1]!, one: undefined };
  const one = chart ?? letters.at(-1)!;
  if (!letters.includes(one)) {
    throw new DomainError({
      subject: "figure.curve",
      given: `the chart "${one}"`,
      expected: `one of the letters ${letters.join(", ")}, which is put to 1`,
      argument: "chart",
    });
  }
  const [x = "", y = ""] = letters.filter((letter) => letter !== one);
  return { x, y, one };
}

function equationOf(C: PlaneCurve, { x, y }: Axes): PlaneEquation {
  const { polynomial } = C;
  const [across, upward] = [polynomial.variables.indexOf(x), polynomial.variables.indexOf(y)];
  const rows: number[][] = [[], [], [], []];
  for (const { coefficient, exponents } of sortedTerms(polynomial)) {
    const row = rows[exponents[upward] ?? 0]!;
    const power = exponents[across] ?? 0;
    while (row.length <= power) row.push(0);
    row[power] = (row[power] ?? 0) + realDouble("figure.curve", coefficient);
  }
  return { rows };
}

function placeOf(C: PlaneCurve, P: PlanePoint, axes: Axes): Plain | undefined {
  const numbers = coordinatesOf(C, P, axes);
  return numbers && [realDouble("figure.curve", numbers[0]), realDouble("figure.curve", numbers[1])];
}

function coordinatesOf(C: PlaneCurve, P: PlanePoint, { x, y, one }: Axes): readonly [unknown, unknown] | undefined {
  if (one === undefined) return P.affine && [P.affine[x], P.affine[y]];
  const { field, letters } = C;
  const at = (letter: string) => P.coordinates[letters.indexOf(letter)]!;
  if (field.isZero(at(one))) return undefined;
  const scale = field.inv(at(one));
  return [field.mul(at(x), scale), field.mul(at(y), scale)];
}

/** The line through two points of a cubic and its third point; for other curves the line alone. */
function chord(
  C: PlaneCurve,
  equation: PlaneEquation,
  [P, Q]: readonly [PlanePoint, PlanePoint],
  place: (P: PlanePoint) => Plain | undefined,
  name: (point: PlanePoint, otherwise: string) => string,
): Extras {
  const tangent = P.equals(Q);
  const [p, q] = [place(P), place(Q)];
  if (!p || !q) return { ...NOTHING, remarks: ["One of the two points lies at infinity in this chart."] };
  const ends: Mark[] = [{ at: p, label: name(P, "P") }, ...(tangent ? [] : [{ at: q, label: name(Q, "Q") }])];
  const lines = [[p, tangent ? along(equation, p) : q] as const];
  const third = C instanceof PlaneCubic ? C.chord(P, Q).meets : undefined;
  const r = third && place(third);
  if (!third || !r) return { ...NOTHING, marks: ends, lines };
  const thirdName = name(third, "R");
  return {
    ...NOTHING,
    marks: [...ends, { at: r, label: thirdName, role: "derived" }],
    lines,
    remarks: [`The line meets the cubic again in ${thirdName}.`],
  };
}
