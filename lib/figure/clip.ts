import { type Frame, inside, type Pixel } from "./frame.ts";

/** A line on the drawing, in pixels; a closed one runs from its last point back to its first. */
export interface Stroke {
  readonly points: readonly Pixel[];
  readonly closed: boolean;
}

/** The parts of a stroke inside the frame, cut exactly at its edge. */
export function clip(stroke: Stroke, frame: Frame): Stroke[] {
  const { points, closed } = stroke;
  if (points.every((point) => inside(frame, point))) return [stroke];
  const path = closed ? [...points, points[0]!] : points;
  const pieces: Pixel[][] = [];
  let piece: Pixel[] = [];
  for (let k = 0; k + 1 < path.length; k++) {
    const part = clipSegment(path[k]!, path[k + 1]!, frame);
    if (!part) continue;
    const [from, to] = part;
    const last = piece[piece.length - 1];
    if (!last || last[0] !== from[0] || last[1] !== from[1]) {
      if (piece.length > 1) pieces.push(piece);
      piece = [from];
    }
    piece.push(to);
  }
  if (piece.length > 1) pieces.push(piece);
  return closed ? rejoin(pieces) : pieces.map((part) => ({ points: part, closed: false }));
}

/** A closed stroke starts anywhere: its last piece may run into its first. */
function rejoin(pieces: readonly Pixel[][]): Stroke[] {
  const first = pieces[0];
  const last = pieces[pieces.length - 1];
  if (first && last && first !== last) {
    const [end, start] = [last[last.length - 1]!, first[0]!];
    if (end[0] === start[0] && end[1] === start[1]) {
      const rest = pieces.slice(1, -1);
      return [[...last, ...first.slice(1)], ...rest].map((points) => ({ points, closed: false }));
    }
  }
  return pieces.map((points) => ({ points, closed: false }));
}

/** The part of a segment inside the frame (Liang and Barsky's parametric clipping), or undefined. */
export function clipSegment(from: Pixel, to: Pixel, frame: Frame): [Pixel, Pixel] | undefined {
  const [dx, dy] = [to[0] - from[0], to[1] - from[1]];
  let [enter, leave] = [0, 1];
  const edges: [number, number][] = [
    [-dx, from[0] - frame.left],
    [dx, frame.right - from[0]],
    [-dy, from[1] - frame.top],
    [dy, frame.bottom - from[1]],
  ];
  for (const [speed, room] of edges) {
    if (speed === 0) {
      if (room < 0) return undefined;
    } else if (speed < 0) enter = Math.max(enter, room / speed);
    else leave = Math.min(leave, room / speed);
  }
  if (!(enter <= leave)) return undefined;
  const at = (t: number): Pixel => [from[0] + t * dx, from[1] + t * dy];
  return [enter === 0 ? from : at(enter), leave === 1 ? to : at(leave)];
}
