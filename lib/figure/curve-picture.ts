// A picture of the real points of a plane cubic, from data in double precision. What the data mean is decided above.

import { clipSegment, type Stroke } from "./clip.ts";
import type { PlaneEquation } from "./fibre.ts";
import { Figure, type FigureData } from "./figure.ts";
import { axes, type Frame, makeFrame, type Window } from "./frame.ts";
import { spoken } from "./label.ts";
import { type Locus, traceLocus } from "./locus.ts";
import { dots, fullLine, type Mark, placeLabels } from "./marks.ts";
import { node, pathData, type SvgNode } from "./svg.ts";

export interface CurvePicture {
  readonly title: string;
  readonly equation: PlaneEquation;
  readonly window: Window;
  readonly axisNames: { readonly x: string; readonly y: string };
  readonly marks: readonly Mark[];
  /** Full straight lines, each through two points of the plane. */
  readonly lines: readonly (readonly [readonly [number, number], readonly [number, number]])[];
  /** Dashed segments, such as from a third point of intersection to its mirror image. */
  readonly segments: readonly (readonly [readonly [number, number], readonly [number, number]])[];
  /** Further sentences for the description. */
  readonly remarks: readonly string[];
  readonly data: FigureData;
}

export function drawCurve(picture: CurvePicture): Figure {
  const frame = makeFrame(picture.window);
  const locus = traceLocus(picture.equation, frame);
  const lines = picture.lines.flatMap(([p, q]) => fullLine(p, q, frame) ?? []);
  const segments = picture.segments.flatMap(([p, q]): Stroke[] => {
    const part = clipSegment(frame.toPixel(p), frame.toPixel(q), frame);
    return part ? [{ points: part, closed: false }] : [];
  });
  const requests = picture.marks.map(({ at, label }) => ({ at: frame.toPixel(at), label }));
  return new Figure({
    title: picture.title,
    description: describe(picture, locus),
    width: frame.width,
    height: frame.height,
    data: { ...picture.data, closed: String(locus.strokes.filter((stroke) => stroke.closed).length) },
    body: [
      axes(frame, picture.axisNames),
      ...lines.map((line) => strokeNode(line, { "stroke-width": 1, class: "line" })),
      ...segments.map((line) => strokeNode(line, { "stroke-width": 1, "stroke-dasharray": "5 4", class: "mirror" })),
      ...locusNodes(locus, frame),
      ...dots(picture.marks, frame),
      ...placeLabels(requests, { strokes: [...locus.strokes, ...lines, ...segments] }, frame),
    ],
  });
}

function strokeNode(stroke: Stroke, style: Readonly<Record<string, string | number>>): SvgNode {
  return node("path", { d: pathData(stroke.points, stroke.closed), stroke: "currentColor", ...style });
}

function locusNodes(locus: Locus, frame: Frame): SvgNode[] {
  const style = { class: "locus", "stroke-width": 1.9, "stroke-linejoin": "round", "stroke-linecap": "round" };
  return [
    ...locus.strokes.map((stroke) => strokeNode(stroke, style)),
    ...locus.isolated.map((point) => {
      const [cx, cy] = frame.toPixel(point);
      return node("circle", { cx, cy, r: 2.2, fill: "currentColor", class: "isolated" });
    }),
  ];
}

function describe(picture: CurvePicture, locus: Locus): string {
  const { x, y } = picture.window;
  const closed = locus.strokes.filter((stroke) => stroke.closed).length;
  const open = locus.strokes.length - closed;
  const parts = [
    closed > 0 ? `${closed} closed ${closed === 1 ? "oval" : "ovals"}` : "",
    open > 0 ? `${open} ${open === 1 ? "branch" : "branches"} that leave${open === 1 ? "s" : ""} the window` : "",
    locus.isolated.length > 0 ? `${locus.isolated.length} isolated point` : "",
  ].filter((part) => part !== "");
  const points = picture.marks.map(({ label, at }) => `${spoken(label)} near (${near(at[0])}, ${near(at[1])})`);
  return [
    `Real points for ${picture.axisNames.x} from ${near(x[0])} to ${near(x[1])} and ${picture.axisNames.y} from ${near(y[0])} to ${near(y[1])}: ${parts.join(", ") || "none"}.`,
    ...(points.length > 0 ? [`Marked: ${points.join("; ")}.`] : []),
    ...picture.remarks,
  ].join(" ");
}

/** Three digits, for reading aloud. */
function near(x: number): string {
  return String(Number(x.toPrecision(3)));
}
