// The real points of a plane cubic, as polylines in pixels. The x axis is cut at every critical x (vertical tangent,
// singular point, pole); between two of them the curve is a fixed number of graphs, so no stroke can cross a pole or
// join two components. Each graph is sampled finely where it bends, then the ends that meet are joined.

import { clip, type Stroke } from "./clip.ts";
import { fibre, fibreCount, type PlaneEquation } from "./fibre.ts";
import type { Frame, Pixel } from "./frame.ts";
import { add, type Coefficients, evaluate, multiply, realRoots, scale, trim } from "./polynomial.ts";

export interface Locus {
  readonly strokes: readonly Stroke[];
  /** Real points that no stroke passes: isolated singular points. */
  readonly isolated: readonly (readonly [number, number])[];
}

/** Degree of F in y, 0 to 3. */
export function degreeInY(equation: PlaneEquation): number {
  let degree = equation.rows.length - 1;
  while (degree > 0 && trim(equation.rows[degree] ?? []).length === 0) degree--;
  return degree;
}

/** Discriminant of F as a polynomial in y: its zeros are the x of vertical tangents and singular points. */
export function discriminantInY(equation: PlaneEquation, degree = degreeInY(equation)): number[] {
  const [d = [], c = [], b = [], a = []] = equation.rows;
  if (degree < 2) return [];
  if (degree === 2) return trim(add(multiply(c, c), scale(multiply(b, d), -4)));
  const terms = [
    scale(multiply(a, b, c, d), 18),
    scale(multiply(b, b, b, d), -4),
    multiply(b, b, c, c),
    scale(multiply(a, c, c, c), -4),
    scale(multiply(a, a, d, d), -27),
  ];
  return trim(terms.reduce(add, []));
}

/** The x in [low, high] with a vertical tangent or a singular point. */
export function turningX(equation: PlaneEquation, low: number, high: number): number[] {
  return realRoots(discriminantInY(equation), low, high);
}

/** The x in [low, high] at which the number or the order of the real branches may change. */
export function criticalX(equation: PlaneEquation, low: number, high: number): number[] {
  const leading: Coefficients = equation.rows[degreeInY(equation)] ?? [];
  const found = [...turningX(equation, low, high), ...realRoots(leading, low, high)];
  return found.sort((s, t) => s - t).filter((x, k, all) => k === 0 || x - all[k - 1]! > (high - low) * 1e-9);
}

/** All real points inside the frame. */
export function traceLocus(equation: PlaneEquation, frame: Frame): Locus {
  const degree = degreeInY(equation);
  const [low, high] = frame.window.x;
  if (degree === 0)
    return { strokes: realRoots(equation.rows[0] ?? [], low, high).map((x) => upright(frame, x)), isolated: [] };
  const critical = criticalX(equation, low, high);
  const marks = [low, ...critical.filter((x) => x > low && x < high), high];
  const branches: Pixel[][] = [];
  for (let k = 0; k + 1 < marks.length; k++) {
    branches.push(...branchesBetween(equation, degree, frame, marks[k]!, marks[k + 1]!));
  }
  const joined = joinEnds(branches);
  const strokes = joined.flatMap((stroke) => clip(stroke, frame));
  const fallen = critical.filter((x) => isWholeLine(equation, x)).map((x) => upright(frame, x));
  return { strokes: [...strokes, ...fallen], isolated: isolatedPoints(equation, degree, critical, frame, strokes) };
}

function upright(frame: Frame, x: number): Stroke {
  return { points: [frame.toPixel([x, frame.window.y[0]]), frame.toPixel([x, frame.window.y[1]])], closed: false };
}

function isWholeLine(equation: PlaneEquation, x: number): boolean {
  const size = (row: Coefficients): number => row.reduce((sum, c, k) => sum + Math.abs(c) * Math.abs(x) ** k, 0);
  return equation.rows.every((row) => Math.abs(evaluate(row, x)) <= 1e-9 * size(row) || size(row) === 0);
}

/** The graphs over (from, to). The parameter θ with x = middle - half · cos θ makes square-root ends smooth. */
function branchesBetween(equation: PlaneEquation, degree: number, frame: Frame, from: number, to: number): Pixel[][] {
  const [middle, half] = [(from + to) / 2, (to - from) / 2];
  const count = fibreCount(equation, degree, middle);
  const at = (theta: number): number => middle - half * Math.cos(theta);
  return Array.from({ length: count }, (_, branch) =>
    sample((theta) => {
      const x = at(theta);
      return frame.toPixel([x, fibre(equation, degree, x, count)[branch] ?? Number.NaN]);
    }, frame),
  );
}

const START = 48;
const DEEPEST = 10;
/** Largest distance of a chord's midpoint from the curve, in pixels: below what an eye or a printer can tell. */
const FLAT = 0.06;

function sample(curve: (theta: number) => Pixel, frame: Frame): Pixel[] {
  const points: Pixel[] = [];
  // Just inside the ends: at a pole the end itself has no point.
  const edge = 1e-5;
  const thetas = Array.from({ length: START + 1 }, (_, k) => edge + ((Math.PI - 2 * edge) * k) / START);
  thetas.forEach((theta, k) => {
    const point = curve(theta);
    if (k > 0) refine(curve, frame, thetas[k - 1]!, points[points.length - 1]!, theta, point, 0, points);
    points.push(point);
  });
  return points.filter(([x, y]) => Number.isFinite(x) && Number.isFinite(y));
}

function refine(
  curve: (theta: number) => Pixel,
  frame: Frame,
  t0: number,
  p0: Pixel,
  t1: number,
  p1: Pixel,
  depth: number,
  out: Pixel[],
): void {
  if (depth >= DEEPEST || bothBeyond(frame, p0, p1)) return;
  const t = (t0 + t1) / 2;
  const p = curve(t);
  if (bow(p0, p, p1) <= FLAT && depth > 0) return;
  refine(curve, frame, t0, p0, t, p, depth + 1, out);
  out.push(p);
  refine(curve, frame, t, p, t1, p1, depth + 1, out);
}

/** Both points above, or both below the frame. */
function bothBeyond(frame: Frame, [, y0]: Pixel, [, y1]: Pixel): boolean {
  return Math.max(y0, y1) < frame.top - 2 || Math.min(y0, y1) > frame.bottom + 2;
}

/** Distance of the middle point from the chord. */
function bow([x0, y0]: Pixel, [x, y]: Pixel, [x1, y1]: Pixel): number {
  const [dx, dy] = [x1 - x0, y1 - y0];
  const length = Math.hypot(dx, dy);
  if (length < 1e-9) return Math.hypot(x - x0, y - y0);
  return Math.abs(dx * (y - y0) - dy * (x - x0)) / length;
}

/** Ends of branches this close, in pixels, are one point of the curve. */
const MEET = 0.35;

/** Joins branches whose ends meet in pairs. Where more than two meet (a node) they are left as they are. */
function joinEnds(branches: readonly Pixel[][]): Stroke[] {
  const open = branches.filter((branch) => branch.length > 1).map((branch) => [...branch]);
  const done: Stroke[] = [];
  while (open.length > 0) {
    let current = open.shift()!;
    for (;;) {
      const tail = current[current.length - 1]!;
      if (current.length > 2 && near(tail, current[0]!)) {
        done.push({ points: current, closed: true });
        break;
      }
      const next = onlyNeighbour(open, tail);
      if (next) {
        open.splice(next.index, 1);
        current = [...current, ...next.points];
        continue;
      }
      const before = onlyNeighbour(open, current[0]!);
      if (!before) {
        done.push({ points: current, closed: false });
        break;
      }
      open.splice(before.index, 1);
      current = [...[...before.points].reverse(), ...current];
    }
  }
  return done;
}

/** The one open branch that begins or ends at the point, turned so that it begins there. */
function onlyNeighbour(open: readonly Pixel[][], point: Pixel): { index: number; points: Pixel[] } | undefined {
  const found = open.flatMap((branch, index) => {
    const starts = near(branch[0]!, point) ? [{ index, points: branch }] : [];
    const ends = near(branch[branch.length - 1]!, point) ? [{ index, points: [...branch].reverse() }] : [];
    return [...starts, ...ends];
  });
  return found.length === 1 ? found[0] : undefined;
}

function near([x0, y0]: Pixel, [x1, y1]: Pixel): boolean {
  return Math.abs(x0 - x1) <= MEET && Math.abs(y0 - y1) <= MEET;
}

/** Real double points over a critical x that no stroke passes. */
function isolatedPoints(
  equation: PlaneEquation,
  degree: number,
  critical: readonly number[],
  frame: Frame,
  strokes: readonly Stroke[],
): [number, number][] {
  if (degree < 2) return [];
  return critical.flatMap((x) => {
    const step = (frame.window.x[1] - frame.window.x[0]) * 1e-6;
    const counts = [x - step, x + step].map((near) => fibreCount(equation, degree, near));
    if (counts.some((count) => count === degree)) return [];
    const expected = degree === 3 ? 3 : 2;
    const simple = fibre(equation, degree, x, degree - 2);
    const all = fibre(equation, degree, x, expected);
    const double = all.find((y) => !simple.includes(y));
    if (double === undefined || !Number.isFinite(double)) return [];
    const [px, py] = frame.toPixel([x, double]);
    const passed = strokes.some(({ points }) => points.some(([sx, sy]) => Math.hypot(sx - px, sy - py) < 3));
    return passed || px < frame.left || px > frame.right || py < frame.top || py > frame.bottom ? [] : [[x, double]];
  });
}
