import { clipSegment, type Stroke } from "./clip.ts";
import { type Frame, inside, type Pixel } from "./frame.ts";
import { labelWidth, mathLabel } from "./label.ts";
import { node, type SvgNode } from "./svg.ts";

/** A point of the plane to be shown, with its name. */
export interface Mark {
  readonly at: readonly [number, number];
  readonly label: string;
  /** "given": a filled dot; "derived": a ring, for a point that follows from the given ones. */
  readonly role?: "given" | "derived";
}

interface Box {
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
}

export interface LabelRequest {
  readonly at: Pixel;
  readonly label: string;
  /** Distance of the label from the point, in pixels. */
  readonly gap?: number;
}

const DOT = 3.6;
const LINE_HEIGHT = 16;

/** The dots of the marks inside the frame. A ring has a hole in it, so it is told from a dot without colour. */
export function dots(marks: readonly Mark[], frame: Frame): SvgNode[] {
  return marks.flatMap(({ at, role }) => {
    const pixel = frame.toPixel(at);
    if (!inside(frame, pixel, DOT)) return [];
    const [cx, cy] = pixel;
    if (role !== "derived") return [node("circle", { cx, cy, r: DOT, fill: "currentColor" })];
    return [node("circle", { cx, cy, r: DOT, stroke: "currentColor", "stroke-width": 1.5 })];
  });
}

/**
 * Places every label where it covers least: of the places around its point, each is weighed by the parts of strokes,
 * the other points and the labels placed before that would lie under it.
 */
export function placeLabels(
  requests: readonly LabelRequest[],
  drawn: { readonly strokes: readonly Stroke[]; readonly points?: readonly Pixel[] },
  frame: Frame,
): SvgNode[] {
  const ink = [...drawn.strokes.flatMap(spaced), ...(drawn.points ?? []), ...requests.map(({ at }) => at)];
  const placed: Box[] = [];
  return requests
    .filter(({ at }) => inside(frame, at, DOT))
    .map((request) => {
      const others = requests.filter(({ at }) => at !== request.at).map(({ at }) => at);
      const box = best(request, { ink, placed, others }, frame);
      placed.push(box);
      return mathLabel(request.label, box.x, box.y + LINE_HEIGHT - 4);
    });
}

/** What stands around a label: strokes and points as pixels, labels placed before, and the other named points. */
interface Surroundings {
  readonly ink: readonly Pixel[];
  readonly placed: readonly Box[];
  readonly others: readonly Pixel[];
}

function best(request: LabelRequest, { ink, placed, others }: Surroundings, frame: Frame): Box {
  const candidates = around(request).map((box, order) => ({
    box,
    cost: cost(box, ink, placed, frame) + order * 0.3 + (nearerTo(others, request.at, box) ? 40 : 0),
  }));
  return candidates.reduce((low, next) => (next.cost < low.cost ? next : low)).box;
}

/** Whether another named point is as near to the label as its own: it would seem to belong to that. */
function nearerTo(others: readonly Pixel[], own: Pixel, box: Box): boolean {
  const distance = ([x, y]: Pixel) =>
    Math.hypot(Math.max(box.x - x, 0, x - box.x - box.width), Math.max(box.y - y, 0, y - box.y - box.height));
  return others.some((other) => distance(other) < distance(own) + 2);
}

function around({ at: [x, y], label, gap = 7 }: LabelRequest): Box[] {
  const [width, height] = [labelWidth(label), LINE_HEIGHT];
  const [near, far] = [gap * 0.75, gap];
  const box = (left: number, top: number): Box => ({ x: left, y: top, width, height });
  const ring = (g: number, f: number): Box[] => [
    box(x + g, y - g - height),
    box(x - g - width, y - g - height),
    box(x + g, y + g),
    box(x - g - width, y + g),
    box(x - width / 2, y - f - height),
    box(x - width / 2, y + f),
    box(x + f + 2, y - height / 2),
    box(x - f - 2 - width, y - height / 2),
  ];
  return [...ring(near, far), ...ring(near + 7, far + 7)];
}

function cost(box: Box, ink: readonly Pixel[], placed: readonly Box[], frame: Frame): number {
  const outside =
    Math.max(0, frame.left - box.x) +
    Math.max(0, box.x + box.width - frame.right) +
    Math.max(0, frame.top - 18 - box.y) +
    Math.max(0, box.y + box.height - frame.bottom);
  const covered = ink.filter(([x, y]) => within(box, x, y, 2)).length;
  const crossed = placed.filter((other) => overlap(box, other)).length;
  return outside * 10 + covered + crossed * 60;
}

function within(box: Box, x: number, y: number, slack: number): boolean {
  return x >= box.x - slack && x <= box.x + box.width + slack && y >= box.y - slack && y <= box.y + box.height + slack;
}

/** Labels side by side need a gap, or "P" beside "P + Q" reads as one. */
const GAP = 6;

function overlap(a: Box, b: Box): boolean {
  const beside = a.x < b.x + b.width + GAP && b.x < a.x + a.width + GAP;
  return beside && a.y < b.y + b.height && b.y < a.y + a.height;
}

/** Points along a stroke no more than four pixels apart: what a label would cover. */
function spaced({ points, closed }: Stroke): Pixel[] {
  const path = closed ? [...points, points[0]!] : points;
  return path.flatMap((point, k) => {
    const next = path[k + 1];
    if (!next) return [point];
    const steps = Math.max(1, Math.ceil(Math.hypot(next[0] - point[0], next[1] - point[1]) / 4));
    return Array.from(
      { length: steps },
      (_, step): Pixel => [
        point[0] + ((next[0] - point[0]) * step) / steps,
        point[1] + ((next[1] - point[1]) * step) / steps,
      ],
    );
  });
}

/** The straight line through two points of the plane, from edge to edge of the frame; undefined if it misses it. */
export function fullLine(p: readonly [number, number], q: readonly [number, number], frame: Frame): Stroke | undefined {
  const [from, to] = [frame.toPixel(p), frame.toPixel(q)];
  const length = Math.hypot(to[0] - from[0], to[1] - from[1]);
  if (length === 0) return undefined;
  const reach = (2 * (frame.width + frame.height)) / length + Math.hypot(...from) / length;
  const along = (t: number): Pixel => [from[0] + t * (to[0] - from[0]), from[1] + t * (to[1] - from[1])];
  const part = clipSegment(along(-reach), along(1 + reach), frame);
  return part && { points: part, closed: false };
}
