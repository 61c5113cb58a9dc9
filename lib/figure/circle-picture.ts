// Real components of a curve as circles, with points at their logarithms.

import { Figure, type FigureData } from "./figure.ts";
import { type Frame, makeFrame } from "./frame.ts";
import { mathLabel, spoken } from "./label.ts";
import { dots, type Mark, placeLabels } from "./marks.ts";
import { node, pathData, type SvgNode } from "./svg.ts";

export interface CircleMark {
  readonly label: string;
  /** t/ω1, one turn of the circle being 1. */
  readonly turn: number;
  readonly bounded: boolean;
}

export interface CirclePicture {
  readonly title: string;
  readonly components: 1 | 2;
  readonly marks: readonly CircleMark[];
  readonly remarks: readonly string[];
  readonly data: FigureData;
}

/** Radius of the circle of O and of that of the bounded component. */
const RADIUS = { identity: 1, bounded: 0.58 } as const;
const HEIGHT = 440;
const SEGMENTS = 180;

export function drawCircle(picture: CirclePicture): Figure {
  const frame = makeFrame({ x: [-1.15, 1.15], y: [-1.15, 1.15] }, { height: HEIGHT, equal: true });
  const radii = picture.components === 2 ? [RADIUS.identity, RADIUS.bounded] : [RADIUS.identity];
  const rings = radii.map((r) => ring(r).map(frame.toPixel));
  const marks: Mark[] = picture.marks.map(({ label, turn, bounded }) => ({
    label,
    at: place(turn, bounded ? RADIUS.bounded : RADIUS.identity),
  }));
  const requests = marks.map(({ at, label }) => ({ at: frame.toPixel(at), label }));
  const names = QUARTERS.map(({ turn }) => frame.toPixel(place(turn, 0.9)));
  return new Figure({
    title: picture.title,
    description: describe(picture),
    width: frame.width,
    height: frame.height,
    data: picture.data,
    body: [
      ...rings.map((points, k) =>
        node("path", {
          d: pathData(points, true),
          stroke: "currentColor",
          "stroke-width": 1.4,
          class: k === 0 ? "identity" : "bounded",
        }),
      ),
      ...QUARTERS.map(({ turn }) => tick(frame.toPixel(place(turn, 0.97)), frame.toPixel(place(turn, 1.03)))),
      ...QUARTERS.map((quarter) => quarterName(quarter, frame)),
      ...(picture.components === 2 ? [innerName(frame)] : []),
      ...dots(marks, frame),
      ...placeLabels(requests, { strokes: rings.map((points) => ({ points, closed: true })), points: names }, frame),
    ],
  });
}

const QUARTERS = [
  { label: "0", turn: 0, anchor: "end" },
  { label: "ω1/4", turn: 0.25, anchor: "middle" },
  { label: "ω1/2", turn: 0.5, anchor: "start" },
  { label: "3ω1/4", turn: 0.75, anchor: "middle" },
] as const;

/** t = 0 at the right, rising counterclockwise. */
function place(turn: number, radius: number): [number, number] {
  const angle = 2 * Math.PI * turn;
  return [radius * Math.cos(angle), radius * Math.sin(angle)];
}

function ring(radius: number): [number, number][] {
  return Array.from({ length: SEGMENTS }, (_, k) => place(k / SEGMENTS, radius));
}

function tick(from: readonly [number, number], to: readonly [number, number]): SvgNode {
  return node("path", { d: pathData([from, to]), stroke: "currentColor", "stroke-width": 0.8, class: "quarter" });
}

/** Names of the quarters stand inside the circle, so that those of points have the outside. */
function quarterName({ label, turn, anchor }: (typeof QUARTERS)[number], frame: Frame): SvgNode {
  const [x, y] = frame.toPixel(place(turn, anchor === "middle" ? 0.9 : 0.94));
  return node("g", { "font-size": 12, opacity: 0.75 }, mathLabel(label, x, y + 4, { anchor }));
}

function innerName(frame: Frame): SvgNode {
  const [x, y] = frame.toPixel([0, 0]);
  return mathLabel("z = ω2/2 + t", x, y + 4, { anchor: "middle" });
}

function describe({ components, marks, remarks }: CirclePicture): string {
  const circles =
    components === 2
      ? "Two circles: the outer one is the component of O with z = t, the inner one the bounded component with z = ω2/2 + t"
      : "One circle, the real points with z = t";
  const points = marks.map(
    ({ label, turn, bounded }) =>
      `${spoken(label)} at t near ${Number(turn.toFixed(4))} ω1${bounded ? " on the bounded component" : ""}`,
  );
  return [
    `${circles}; one turn is the real period ω1, and t rises counterclockwise from 0 at the right.`,
    ...(points.length > 0 ? [`Marked: ${points.join("; ")}.`] : []),
    ...remarks,
  ].join(" ");
}
