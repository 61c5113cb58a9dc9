import { Curve } from "../surface/curve.ts";
import { Point } from "../surface/point.ts";
import type { PlaneCurve, PlanePoint } from "../surface/variety.ts";
import { drawCurve } from "./curve-picture.ts";
import { chooseWindow } from "./curve-window.ts";
import { type RealInput, realDouble, realWindow } from "./doubles.ts";
import { fact } from "./facts.ts";
import type { Figure } from "./figure.ts";
import { finiteFigure } from "./finite-picture.ts";
import type { Mark } from "./marks.ts";
import { type Named, namedEntries } from "./named.ts";
import { planeSubject } from "./plane-subject.ts";
import { type Extras, NOTHING, type Plain, type Subject } from "./subject.ts";
import { type AnyCurve, type AnyPoint, weierstrassSubject } from "./weierstrass-subject.ts";

/** A point of a curve that can be drawn. */
export type CurvePoint = AnyPoint | PlanePoint;

/** A point to be marked: of the curve, or of the plane by its two coordinates. */
export type FigurePoint = CurvePoint | readonly [RealInput, RealInput];

export interface CurveFigureOptions {
  /** Points to be marked, by their names: { P, Q }. A list gives them the names P1, P2, ... */
  readonly points?: Named<FigurePoint>;
  /** Two points of the curve: the line through them (the tangent if they are the same), its third point, and their sum. */
  readonly chord?: readonly [CurvePoint, CurvePoint];
  /** Further lines, each through two points. */
  readonly lines?: readonly (readonly [FigurePoint, FigurePoint])[];
  /** The part of the plane to be shown; else chosen so that all of interest is in it. */
  readonly window?: { readonly x: readonly [RealInput, RealInput]; readonly y: readonly [RealInput, RealInput] };
  /** For a homogeneous cubic: the letter that is put to 1; the last one if absent. */
  readonly chart?: string;
}

/**
 * The real points of a curve as a picture, with marked points, and the line through two of them with the points that
 * follow: −(P + Q) and P + Q on a Weierstrass model, the third point on a plane cubic.
 *
 * A curve over F_p is shown as the grid of its points.
 *
 * Domain   a curve with real coefficients: long Weierstrass form, plane cubic (in a chart), or y² = quartic; or one over F_p, p <= 211.
 * Error    drawn in double precision: a picture proves nothing. No stroke crosses a pole or joins two components.
 * @example figure.curve(E, { points: { P, Q }, chord: [P, Q] })
 */
export function curve(C: AnyCurve | PlaneCurve, options: CurveFigureOptions = {}): Figure {
  if (C instanceof Curve && C.field.characteristic !== 0n) return overPrimeField(C, options);
  const subject = (C instanceof Curve ? weierstrassSubject(C) : planeSubject(C, options.chart)) as Subject<CurvePoint>;
  const named = namedEntries(options.points, (_, k) => `P${k + 1}`);
  const extras = [marked(subject, named), chordOf(subject, named, options.chord), linesOf(subject, options.lines)];
  const marks = once(extras.flatMap((extra) => extra.marks));
  return drawCurve({
    title: subject.title,
    equation: subject.equation,
    window: options.window
      ? realWindow("figure.curve", options.window)
      : chooseWindow(
          subject.equation,
          marks.map((mark) => mark.at),
        ),
    axisNames: subject.axisNames,
    marks,
    lines: extras.flatMap((extra) => extra.lines),
    segments: extras.flatMap((extra) => extra.segments),
    remarks: extras.flatMap((extra) => extra.remarks),
    data: {
      figure: "curve",
      curve: String(C),
      points: Object.fromEntries(named.map(([name, point]) => [name, pointText(point)])),
    },
  });
}

function overPrimeField(E: AnyCurve, { points, ...others }: CurveFigureOptions): Figure {
  const unsuited = Object.keys(others);
  if (unsuited.length === 0) return finiteFigure(E, points);
  throw new TypeError(
    `figure.curve: got ${unsuited.join(", ")} for a curve over ${E.field.name}; expected nothing but points, since its plane has no lines to draw`,
  );
}

type NamedPoint = readonly [name: string, point: FigurePoint];

function placeOf(subject: Subject<CurvePoint>, point: FigurePoint): Plain | undefined {
  if (subject.isPoint(point)) return subject.place(point);
  if (!Array.isArray(point)) throw new TypeError(`figure.curve: ${String(point)} is a point of another kind of curve`);
  const [x, y] = point as readonly [RealInput, RealInput];
  return [realDouble("figure.curve", x), realDouble("figure.curve", y)];
}

function marked(subject: Subject<CurvePoint>, named: readonly NamedPoint[]): Extras {
  const places = named.map(([label, point]) => ({ label, at: placeOf(subject, point) }));
  const marks = places.flatMap(({ label, at }): Mark[] => (at ? [{ label, at }] : []));
  const beyond = places.filter(({ at }) => !at).map(({ label }) => label);
  return { ...NOTHING, marks, remarks: beyond.length > 0 ? [`At infinity: ${beyond.join(", ")}.`] : [] };
}

function pointText(point: FigurePoint): string {
  if (point instanceof Point) return point.coordinates ? fact(point.coordinates) : "O";
  return Array.isArray(point) ? fact(point) : String(point);
}

function linesOf(subject: Subject<CurvePoint>, lines: CurveFigureOptions["lines"] = []): Extras {
  const plain = lines.flatMap(([p, q]) => {
    const [from, to] = [placeOf(subject, p), placeOf(subject, q)];
    return from && to ? [[from, to] as const] : [];
  });
  return { ...NOTHING, lines: plain };
}

function chordOf(
  subject: Subject<CurvePoint>,
  named: readonly NamedPoint[],
  chord: CurveFigureOptions["chord"],
): Extras {
  if (!chord) return NOTHING;
  const wrong = chord.find((point) => !subject.isPoint(point));
  if (wrong) throw new TypeError(`figure.curve: the chord takes two points of the curve, got ${String(wrong)}`);
  const name = (point: CurvePoint, otherwise: string): string =>
    named.find(([, other]) => subject.isPoint(other) && subject.same(other, point))?.[0] ?? otherwise;
  return subject.chord(...chord, name);
}

/** Each place once: a point that is named twice keeps its first name. */
function once(marks: readonly Mark[]): Mark[] {
  return marks.filter((mark, k) => marks.findIndex(({ at }) => at[0] === mark.at[0] && at[1] === mark.at[1]) === k);
}
