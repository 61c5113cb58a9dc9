import { type ScaleLinear, scaleLinear } from "d3-scale";
import { mathLabel } from "./label.ts";
import { node, type SvgNode } from "./svg.ts";

/** A rectangle of the plane, x from x[0] to x[1], y from y[0] to y[1]. */
export interface Window {
  readonly x: readonly [number, number];
  readonly y: readonly [number, number];
}

export type Pixel = readonly [number, number];

/** Where the rectangle lies on the drawing, and the maps between plane and pixels. */
export interface Frame {
  readonly window: Window;
  readonly width: number;
  readonly height: number;
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
  readonly x: ScaleLinear<number, number>;
  readonly y: ScaleLinear<number, number>;
  toPixel(point: readonly [number, number]): Pixel;
}

/** 6.5 inches, the text width of a printed page, at 96 pixels an inch. */
export const PAGE_WIDTH = 624;

const MARGIN = { left: 58, right: 22, top: 26, bottom: 44 } as const;

export interface FrameOptions {
  readonly width?: number;
  readonly height?: number;
  /** One unit as long upward as across: the window is widened where it must be. */
  readonly equal?: boolean;
}

export function makeFrame(wanted: Window, options: FrameOptions = {}): Frame {
  const width = options.width ?? PAGE_WIDTH;
  const height = options.height ?? 420;
  const [left, right] = [MARGIN.left, width - MARGIN.right];
  const [top, bottom] = [MARGIN.top, height - MARGIN.bottom];
  const window = options.equal ? equalUnits(wanted, right - left, bottom - top) : wanted;
  const x = scaleLinear().domain(window.x).range([left, right]);
  const y = scaleLinear().domain(window.y).range([bottom, top]);
  const toPixel = (point: readonly [number, number]): Pixel => [x(point[0]), y(point[1])];
  return { window, width, height, left, right, top, bottom, x, y, toPixel };
}

/** The least window around the wanted one whose units are as long upward as across. */
function equalUnits(wanted: Window, across: number, upward: number): Window {
  const unit = Math.max((wanted.x[1] - wanted.x[0]) / across, (wanted.y[1] - wanted.y[0]) / upward);
  return { x: around(wanted.x, unit * across), y: around(wanted.y, unit * upward) };
}

function around([low, high]: readonly [number, number], length: number): [number, number] {
  const middle = (low + high) / 2;
  return [middle - length / 2, middle + length / 2];
}

export function inside(frame: Frame, [px, py]: Pixel, slack = 0): boolean {
  return px >= frame.left - slack && px <= frame.right + slack && py >= frame.top - slack && py <= frame.bottom + slack;
}

/** Scales with their ticks along the lower and the left edge, the zero lines dotted, and the names of the axes. */
export function axes(frame: Frame, names: { readonly x: string; readonly y: string }): SvgNode {
  const { left, right, top, bottom } = frame;
  const ink = { stroke: "currentColor", "stroke-width": 0.8 };
  return node(
    "g",
    { class: "axes", fill: "currentColor", "font-size": 13 },
    ...zeroLines(frame),
    node("path", { d: `M${left},${bottom}H${right}M${left},${bottom}V${top}`, ...ink }),
    ...ticksOf(frame, "x").map(({ at, label }) => tickX(frame, at, label)),
    ...ticksOf(frame, "y").map(({ at, label }) => tickY(frame, at, label)),
    mathLabel(names.x, right, bottom + 36, { anchor: "end" }),
    mathLabel(names.y, left, top - 11, { anchor: "middle" }),
  );
}

function ticksOf(frame: Frame, axis: "x" | "y"): { at: number; label: string }[] {
  const scale = frame[axis];
  const [low, high] = scale.range() as [number, number];
  const count = Math.max(2, Math.round(Math.abs(high - low) / (axis === "x" ? 85 : 60)));
  const format = scale.tickFormat(count);
  return scale.ticks(count).map((value) => ({ at: scale(value), label: format(value) }));
}

function tickX(frame: Frame, at: number, label: string): SvgNode {
  return node(
    "g",
    {},
    node("path", { d: `M${at.toFixed(2)},${frame.bottom}v5`, stroke: "currentColor", "stroke-width": 0.8 }),
    node("text", { x: at, y: frame.bottom + 19, "text-anchor": "middle" }, label),
  );
}

function tickY(frame: Frame, at: number, label: string): SvgNode {
  return node(
    "g",
    {},
    node("path", { d: `M${frame.left},${at.toFixed(2)}h-5`, stroke: "currentColor", "stroke-width": 0.8 }),
    node("text", { x: frame.left - 9, y: at + 4.3, "text-anchor": "end" }, label),
  );
}

function zeroLines(frame: Frame): SvgNode[] {
  const style = { stroke: "currentColor", "stroke-width": 0.7, "stroke-dasharray": "1 4", opacity: 0.7 };
  const [x0, y0] = frame.toPixel([0, 0]);
  const lines: SvgNode[] = [];
  if (x0 > frame.left + 1 && x0 <= frame.right)
    lines.push(node("path", { d: line(x0, frame.top, "V", frame.bottom), ...style }));
  if (y0 >= frame.top && y0 < frame.bottom - 1)
    lines.push(node("path", { d: line(frame.left, y0, "H", frame.right), ...style }));
  return lines;
}

function line(x: number, y: number, way: "H" | "V", to: number): string {
  return `M${x.toFixed(2)},${y.toFixed(2)}${way}${to.toFixed(2)}`;
}
