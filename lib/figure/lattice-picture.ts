// A picture of a period lattice in the plane of z, from its periods in double precision.

import { Figure, type FigureData } from "./figure.ts";
import { axes, type Frame, inside, makeFrame, type Pixel, type Window } from "./frame.ts";
import { spoken } from "./label.ts";
import { dots, fullLine, type LabelRequest, type Mark, placeLabels } from "./marks.ts";
import { node, pathData, type SvgNode } from "./svg.ts";

type Point = readonly [number, number];

export interface LatticePicture {
  readonly title: string;
  /** Full periods, drawn as arrows from 0. */
  readonly periods: readonly [Point, Point];
  readonly periodNames: readonly [string, string];
  /** A second lattice, drawn over the first as rings, with the outline of its cell dashed. */
  readonly overlay?: readonly [Point, Point];
  readonly marks: readonly Mark[];
  readonly window?: Window;
  readonly remarks: readonly string[];
  readonly data: FigureData;
}

export function drawLattice(picture: LatticePicture): Figure {
  const wanted =
    picture.window ??
    latticeWindow(
      picture.periods,
      picture.marks.map((mark) => mark.at),
    );
  const frame = makeFrame(wanted, { equal: true, height: pictureHeight(wanted) });
  const points = latticePoints(picture.periods, frame);
  const origin: Mark = { at: [0, 0], label: "0" };
  const arrows = picture.periods.map((period) => frame.toPixel(period));
  const requests: LabelRequest[] = [
    ...arrows.map((at, k) => ({ at, label: picture.periodNames[k] ?? "", gap: 8 })),
    ...picture.marks.map(({ at, label }) => ({ at: frame.toPixel(at), label })),
    { at: frame.toPixel(origin.at), label: origin.label },
  ];
  const start = frame.toPixel([0, 0]);
  const [e1, e2] = picture.periods;
  const corner = frame.toPixel([e1[0] + e2[0], e1[1] + e2[1]]);
  const strokes = arrows.map((end) => ({ points: [start, end, corner], closed: false }));
  return new Figure({
    title: picture.title,
    description: describe(picture, points.length),
    width: frame.width,
    height: frame.height,
    data: picture.data,
    body: [
      ...grid(picture.periods, frame),
      cell(picture.periods, frame),
      ...overlay(picture.overlay, frame),
      axes(frame, { x: "Re z", y: "Im z" }),
      ...points.map(([cx, cy]) => node("circle", { class: "lattice", cx, cy, r: 2.4, fill: "currentColor" })),
      ...arrows.map((end) => arrow(start, end)),
      ...dots(picture.marks, frame),
      ...placeLabels(requests, { strokes, points }, frame),
    ],
  });
}

/** Cells that are wide get a low picture, cells that are tall a high one, within what a page holds. */
function pictureHeight(window: Window): number {
  const ratio = (window.y[1] - window.y[0]) / (window.x[1] - window.x[0]);
  return Math.round(Math.min(560, Math.max(280, 70 + 544 * ratio)));
}

/** The cell, the marked points, and a border in which the next lattice points show. */
function latticeWindow([a, b]: readonly [Point, Point], marked: readonly Point[]): Window {
  const corners: Point[] = [[0, 0], a, b, [a[0] + b[0], a[1] + b[1]], ...marked];
  const border = 0.62 * Math.hypot(...shortBasis([a, b])[0]);
  const range = (k: 0 | 1): [number, number] => {
    const values = corners.map((corner) => corner[k]);
    return [Math.min(...values) - border, Math.max(...values) + border];
  };
  return { x: range(0), y: range(1) };
}

/** Rings around the points of the second lattice, and the dashed outline of its cell. */
function overlay(periods: LatticePicture["overlay"], frame: Frame): SvgNode[] {
  if (!periods) return [];
  const [a, b] = periods;
  const corners: Point[] = [[0, 0], a, [a[0] + b[0], a[1] + b[1]], b];
  const outline = pathData(clipPolygon(corners.map(frame.toPixel), frame), true);
  const style = { stroke: "currentColor", "stroke-width": 1.1 };
  return [
    node("path", { class: "other-cell", d: outline, ...style, "stroke-dasharray": "5 4" }),
    ...latticePoints(periods, frame).map(([cx, cy]) => node("circle", { class: "other", cx, cy, r: 5, ...style })),
  ];
}

function cell([a, b]: readonly [Point, Point], frame: Frame): SvgNode {
  const corners: Point[] = [[0, 0], a, [a[0] + b[0], a[1] + b[1]], b];
  return node("path", {
    class: "cell",
    d: pathData(clipPolygon(corners.map(frame.toPixel), frame), true),
    fill: "currentColor",
    "fill-opacity": 0.09,
    stroke: "currentColor",
    "stroke-width": 0.8,
    "stroke-opacity": 0.6,
  });
}

/** A convex polygon cut to the frame, edge after edge (Sutherland and Hodgman). */
function clipPolygon(polygon: readonly Pixel[], frame: Frame): Pixel[] {
  const limits: [0 | 1, number, 1 | -1][] = [
    [0, frame.left, 1],
    [0, frame.right, -1],
    [1, frame.top, 1],
    [1, frame.bottom, -1],
  ];
  return limits.reduce<Pixel[]>(
    (corners, [axis, limit, side]) => {
      const depth = (point: Pixel): number => (point[axis] - limit) * side;
      return corners.flatMap((to, k) => {
        const from = corners[(k + corners.length - 1) % corners.length]!;
        const [d0, d1] = [depth(from), depth(to)];
        const t = d0 / (d0 - d1);
        const cut: Pixel = [from[0] + t * (to[0] - from[0]), from[1] + t * (to[1] - from[1])];
        if (d1 >= 0) return d0 >= 0 ? [to] : [cut, to];
        return d0 >= 0 ? [cut] : [];
      });
    },
    [...polygon],
  );
}

/** More lattice points than this would only be grey, and so would more lines. */
const MOST_POINTS = 2500;
const MOST_LINES = 40;

/** Lattice points in the frame, found row by row along a short basis so that none is missed in a long thin cell. */
export function latticePoints(periods: readonly [Point, Point], frame: Frame): Pixel[] {
  const [a, b] = shortBasis(periods);
  const area = Math.abs(a[0] * b[1] - a[1] * b[0]);
  const { x, y } = frame.window;
  if (((x[1] - x[0]) * (y[1] - y[0])) / area > MOST_POINTS) return [];
  const { m, n } = coordinateRange([a, b], frame);
  const points = m.flatMap((i) => n.map((k) => frame.toPixel([i * a[0] + k * b[0], i * a[1] + k * b[1]])));
  return points.filter((pixel) => inside(frame, pixel, 0.5));
}

/** The edges of all cells, faint. */
function grid([a, b]: readonly [Point, Point], frame: Frame): SvgNode[] {
  const { m, n } = coordinateRange([a, b], frame);
  if (m.length + n.length > MOST_LINES) return [];
  const through = (k: number, step: Point, along: Point): SvgNode[] => {
    const start: Point = [k * step[0], k * step[1]];
    const line = fullLine(start, [start[0] + along[0], start[1] + along[1]], frame);
    return line ? [node("path", { d: pathData(line.points) })] : [];
  };
  const lines = [...m.flatMap((k) => through(k, a, b)), ...n.flatMap((k) => through(k, b, a))];
  return [node("g", { class: "cells", stroke: "currentColor", "stroke-width": 0.6, opacity: 0.3 }, ...lines)];
}

/** The integers m and n for which m a + n b may lie in the frame: Cramer's rule at its corners. */
function coordinateRange([a, b]: readonly [Point, Point], frame: Frame): { m: number[]; n: number[] } {
  const { x, y } = frame.window;
  const det = a[0] * b[1] - a[1] * b[0];
  const corners = x.flatMap((re) => y.map((im): Point => [re, im]));
  return {
    m: integersWithin(corners.map((z) => (z[0] * b[1] - z[1] * b[0]) / det)),
    n: integersWithin(corners.map((z) => (a[0] * z[1] - a[1] * z[0]) / det)),
  };
}

function integersWithin(values: readonly number[]): number[] {
  const first = Math.ceil(Math.min(...values));
  // A lattice too fine for the frame is not drawn at all, so its range is not needed whole.
  const length = Math.min(20 * MOST_POINTS, Math.floor(Math.max(...values)) - first + 1);
  return Array.from({ length: Math.max(0, length) }, (_, k) => first + k);
}

/** Gauss reduction in doubles. */
function shortBasis([a, b]: readonly [Point, Point]): [Point, Point] {
  let [short, long] = [a, b];
  for (let step = 0; step < 200; step++) {
    if (Math.hypot(...long) < Math.hypot(...short)) [short, long] = [long, short];
    const norm = short[0] ** 2 + short[1] ** 2;
    const k = Math.round((short[0] * long[0] + short[1] * long[1]) / norm);
    if (k === 0) break;
    long = [long[0] - k * short[0], long[1] - k * short[1]];
  }
  return [short, long];
}

function arrow(from: Pixel, to: Pixel): SvgNode {
  const length = Math.hypot(to[0] - from[0], to[1] - from[1]);
  if (length < 1) return node("g");
  const [ux, uy] = [(to[0] - from[0]) / length, (to[1] - from[1]) / length];
  const head = Math.min(11, length / 2);
  const back: Pixel = [to[0] - head * ux, to[1] - head * uy];
  const wing = (side: number): Pixel => [back[0] - side * uy * head * 0.36, back[1] + side * ux * head * 0.36];
  return node(
    "g",
    { class: "period" },
    node("path", { d: pathData([from, back]), stroke: "currentColor", "stroke-width": 1.7 }),
    node("path", { d: pathData([to, wing(1), wing(-1)], true), fill: "currentColor" }),
  );
}

function describe(picture: LatticePicture, count: number): string {
  const near = ([x, y]: Point): string =>
    `${Number(x.toPrecision(4))} ${y < 0 ? "−" : "+"} ${Number(Math.abs(y).toPrecision(4))} i`;
  const periods = picture.periods.map((period, k) => `${picture.periodNames[k]} near ${near(period)}`);
  return [
    `The period lattice in the plane of z with ${periods.join(" and ")}; the cell they span is shaded${count > 0 ? ` and ${count} lattice points are shown` : ""}.`,
    ...(picture.overlay
      ? [`A second lattice is drawn as rings, its cell, spanned by ${picture.overlay.map(near).join(" and ")}, dashed.`]
      : []),
    ...(picture.marks.length > 0
      ? [`Marked: ${picture.marks.map(({ label, at }) => `${spoken(label)} near ${near(at)}`).join("; ")}.`]
      : []),
    ...picture.remarks,
  ].join(" ");
}
