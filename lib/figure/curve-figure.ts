import type { Curve } from "../surface/curve.ts";
import { Point } from "../surface/point.ts";
import { drawCurve } from "./curve-picture.ts";
import { chooseWindow } from "./curve-window.ts";
import { type RealInput, realDouble, realWindow } from "./doubles.ts";
import type { PlaneEquation } from "./fibre.ts";
import type { Figure } from "./figure.ts";
import type { Mark } from "./marks.ts";
import { type Named, namedEntries } from "./named.ts";

/** A point to be marked: of a curve, or of the plane by its coordinates. */
export type PlanePoint = Point | readonly [RealInput, RealInput];

export interface CurveFigureOptions {
  /** Points to be marked, by their names: { P, Q }. A list gives them the names P1, P2, ... */
  readonly points?: Named<PlanePoint>;
  /** Two points: the line through them (the tangent if they are the same), its third point, and their sum. */
  readonly chord?: readonly [Point, Point];
  /** Further lines, each through two points. */
  readonly lines?: readonly (readonly [PlanePoint, PlanePoint])[];
  /** The part of the plane to be shown; else chosen so that all of interest is in it. */
  readonly window?: { readonly x: readonly [RealInput, RealInput]; readonly y: readonly [RealInput, RealInput] };
}

type Plain = readonly [number, number];

interface Extras {
  readonly marks: readonly Mark[];
  readonly lines: readonly (readonly [Plain, Plain])[];
  readonly segments: readonly (readonly [Plain, Plain])[];
  readonly remarks: readonly string[];
}

const NOTHING: Extras = { marks: [], lines: [], segments: [], remarks: [] };

/**
 * The real points of a curve as a picture, with marked points, and the chord through two points with their sum.
 *
 * Domain   a curve over Q (or any field of real numbers of the library).
 * Error    drawn in double precision: a picture proves nothing. No stroke crosses a pole or joins two components.
 * @example figure.curve(E, { points: { P, Q }, chord: [P, Q] })
 */
export function curve(E: Curve, options: CurveFigureOptions = {}): Figure {
  const equation = equationOf(E);
  const named = namedEntries(options.points, (_, k) => `P${k + 1}`);
  const extras = [chordOf(E, named, options.chord), linesOf(options.lines)];
  const marks = [...named.flatMap(markOf), ...extras.flatMap((extra) => extra.marks)];
  return drawCurve({
    title: `Real points of ${E}`,
    equation,
    window: options.window
      ? realWindow("figure.curve", options.window)
      : chooseWindow(
          equation,
          marks.map((mark) => mark.at),
        ),
    axisNames: { x: "x", y: "y" },
    marks: once(marks),
    lines: extras.flatMap((extra) => extra.lines),
    segments: extras.flatMap((extra) => extra.segments),
    remarks: extras.flatMap((extra) => extra.remarks),
    data: {
      figure: "curve",
      curve: String(E),
      points: Object.fromEntries(named.map(([name, point]) => [name, pointText(point)])),
    },
  });
}

function equationOf(E: Curve): PlaneEquation {
  const [a1, a2, a3, a4, a6] = E.a.map((c) => realDouble("figure.curve", c)) as [
    number,
    number,
    number,
    number,
    number,
  ];
  // y² + (a1 x + a3) y − (x³ + a2 x² + a4 x + a6)
  return { rows: [[-a6, -a4, -a2, -1], [a3, a1], [1]] };
}

type NamedPoint = readonly [name: string, point: PlanePoint];

function plainPoint(point: PlanePoint): Plain | undefined {
  const coordinates = point instanceof Point ? point.coordinates : point;
  if (!coordinates) return undefined;
  return [realDouble("figure.curve", coordinates[0]), realDouble("figure.curve", coordinates[1])];
}

function markOf([label, point]: NamedPoint): Mark[] {
  const at = plainPoint(point);
  return at ? [{ at, label }] : [];
}

function pointText(point: PlanePoint): string {
  return point instanceof Point ? String(point) : `(${point.map(String).join(", ")})`;
}

function linesOf(lines: CurveFigureOptions["lines"] = []): Extras {
  const plain = lines.flatMap(([p, q]) => {
    const [from, to] = [plainPoint(p), plainPoint(q)];
    return from && to ? [[from, to] as const] : [];
  });
  return { ...NOTHING, lines: plain };
}

const UPRIGHT = "The line is upright: it meets the curve again only at O, the sum of the two points.";

/** The chord or tangent, its third point R and the sum −R with the line of reflection. */
function chordOf(E: Curve, named: readonly NamedPoint[], chord: CurveFigureOptions["chord"]): Extras {
  if (!chord) return NOTHING;
  const [P, Q] = chord;
  const first = nameOf(named, P, "P");
  const opposite = !P.equals(Q) && P.neg().equals(Q);
  const names = [first, nameOf(named, Q, opposite ? `−${first}` : "Q")] as const;
  const sum = P.plus(Q);
  const [p, q] = [plainPoint(P), plainPoint(Q)];
  if (!p || !q) return { ...NOTHING, remarks: ["One of the two points is O, so the sum is the other."] };
  const sumName = P.equals(Q) ? `2${names[0]}` : `${names[0]} + ${names[1]}`;
  const ends: Mark[] = P.equals(Q) ? [{ at: p, label: names[0] }] : [p, q].map((at, k) => ({ at, label: names[k]! }));
  const s = plainPoint(sum);
  if (!s) return { ...NOTHING, marks: ends, lines: [[p, [p[0], p[1] + 1]]], remarks: [UPRIGHT] };
  const third = plainPoint(sum.neg()) ?? s;
  const thirdIsEnd = sum.neg().equals(P) || sum.neg().equals(Q);
  const bracketed = P.equals(Q) ? sumName : `(${sumName})`;
  return {
    marks: [
      ...ends,
      ...(thirdIsEnd ? [] : [{ at: third, label: `−${bracketed}`, role: "derived" as const }]),
      { at: s, label: sumName, role: "derived" },
    ],
    lines: [[p, P.equals(Q) ? along(E, p) : q]],
    segments: [[third, s]],
    remarks: [`The line meets the curve in a third point, whose mirror image is ${sumName}.`],
  };
}

function nameOf(named: readonly NamedPoint[], point: Point, otherwise: string): string {
  return named.find(([, other]) => other instanceof Point && other.equals(point))?.[0] ?? otherwise;
}

/** A second point on the tangent at a point of the curve, along the gradient turned by a right angle. */
function along(E: Curve, [x, y]: Plain): Plain {
  const [a1, a2, a3, a4] = E.a.map((c) => realDouble("figure.curve", c)) as [number, number, number, number];
  const fx = a1 * y - 3 * x * x - 2 * a2 * x - a4;
  const fy = 2 * y + a1 * x + a3;
  const size = Math.hypot(fx, fy);
  return [x - fy / size, y + fx / size];
}

/** Each place once: a point that is named twice keeps its first name. */
function once(marks: readonly Mark[]): Mark[] {
  return marks.filter((mark, k) => marks.findIndex(({ at }) => at[0] === mark.at[0] && at[1] === mark.at[1]) === k);
}
