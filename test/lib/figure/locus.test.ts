import { describe, expect, it } from "vitest";
import type { PlaneEquation } from "../../../lib/figure/fibre.ts";
import { type Frame, makeFrame } from "../../../lib/figure/frame.ts";
import { type Locus, traceLocus } from "../../../lib/figure/locus.ts";
import { evaluate } from "../../../lib/figure/polynomial.ts";

/** y² + y = x³ − x: two real components. */
const TWO: PlaneEquation = { rows: [[0, 1, 0, -1], [1], [1]] };
/** y² = x³ + 1: one real component. */
const ONE: PlaneEquation = { rows: [[-1, 0, 0, -1], [], [1]] };

const frame = makeFrame({ x: [-2, 3], y: [-5, 4] });

function trace(equation: PlaneEquation, f: Frame = frame): Locus {
  return traceLocus(equation, f);
}

/** Distance in pixels from a point of the plane to the nearest drawn segment. */
function distance(locus: Locus, f: Frame, point: readonly [number, number]): number {
  const [px, py] = f.toPixel(point);
  let best = Number.POSITIVE_INFINITY;
  for (const { points, closed } of locus.strokes) {
    const path = closed ? [...points, points[0]!] : points;
    path.forEach(([x, y], k) => {
      const [x1, y1] = path[k + 1] ?? [x, y];
      const [dx, dy] = [x1 - x, y1 - y];
      const t = Math.max(0, Math.min(1, ((px - x) * dx + (py - y) * dy) / (dx * dx + dy * dy || 1)));
      best = Math.min(best, Math.hypot(px - x - t * dx, py - y - t * dy));
    });
  }
  return best;
}

/** Largest |F| over the drawn vertices, each divided by the size of F's terms there. */
function worstResidual(equation: PlaneEquation, locus: Locus, f: Frame): number {
  const residuals = locus.strokes.flatMap(({ points }) =>
    points.map(([px, py]) => {
      const [x, y] = [f.x.invert(px), f.y.invert(py)];
      const terms = equation.rows.map((row, k) => evaluate(row, x) * y ** k);
      const size = 1 + Math.abs(x) ** 3 + Math.abs(y) ** 3;
      return Math.abs(terms.reduce((sum, term) => sum + term, 0)) / size;
    }),
  );
  return Math.max(...residuals);
}

describe("real points of a plane cubic", () => {
  it("two components: one closed oval and one open branch — oracle: the cubic 4x³−4x+1 has three real roots", () => {
    const { strokes } = trace(TWO);
    expect(strokes.map(({ closed }) => closed).sort()).toEqual([false, true]);
  });

  it("one component: one open branch — oracle: x³+1 has one real root", () => {
    expect(trace(ONE).strokes.map(({ closed }) => closed)).toEqual([false]);
  });

  it("passes through multiples of (0, 0) on y²+y=x³−x — oracle: group law by hand", () => {
    const locus = trace(TWO);
    const known: [number, number][] = [
      [0, 0],
      [1, 0],
      [-1, -1],
      [2, -3],
      [1 / 4, -5 / 8],
    ];
    for (const point of known) expect(distance(locus, frame, point)).toBeLessThan(0.1);
    expect(distance(locus, frame, [0.6, 0])).toBeGreaterThan(5);
  });

  it("every vertex solves the equation — oracle: substitution", () => {
    // Traced vertices solve it to rounding; the ones cut at the frame lie on a chord, 0.06 pixels off at most.
    const chord = (0.06 * 9) / (frame.bottom - frame.top);
    for (const equation of [TWO, ONE]) expect(worstResidual(equation, trace(equation), frame)).toBeLessThan(chord);
  });

  it("no stroke crosses a pole: (x−1)y² + y + x² + 2x − 1 = 0 at x = 1 — oracle: the leading coefficient", () => {
    const equation: PlaneEquation = { rows: [[-1, 2, 1], [1], [-1, 1]] };
    const wide = makeFrame({ x: [-4, 4], y: [-9, 9] });
    const pole = wide.x(1);
    // Here one branch does pass x = 1, at y = −(1 + 2 − 1) = −2; the other runs to infinity on both sides.
    const crossings = trace(equation, wide).strokes.flatMap(({ points }) =>
      points.slice(1).flatMap((end, k) => {
        const start = points[k]!;
        return (start[0] - pole) * (end[0] - pole) <= 0 && start[0] !== end[0] ? [wide.y.invert(end[1])] : [];
      }),
    );
    expect(crossings.length).toBeGreaterThan(0);
    for (const y of crossings) expect(y).toBeCloseTo(-2, 1);
  });

  it("nothing is drawn outside the frame — oracle: its edges", () => {
    const small = makeFrame({ x: [-0.5, 1.5], y: [-1.2, 0.4] });
    const slack = 1e-6;
    for (const { points } of trace(TWO, small).strokes) {
      for (const [x, y] of points) {
        expect(x).toBeGreaterThanOrEqual(small.left - slack);
        expect(x).toBeLessThanOrEqual(small.right + slack);
        expect(y).toBeGreaterThanOrEqual(small.top - slack);
        expect(y).toBeLessThanOrEqual(small.bottom + slack);
      }
    }
  });

  it("the isolated point of y² = x³ − x² is shown, a node is not taken for one — oracle: tangents at the origin", () => {
    const isolated = trace({ rows: [[0, 0, 1, -1], [], [1]] }).isolated;
    expect(isolated.length).toBe(1);
    expect(Math.hypot(...isolated[0]!)).toBeLessThan(1e-6);
    expect(trace({ rows: [[0, 0, -1, -1], [], [1]] }).isolated).toEqual([]);
  });

  it("x³+y³=3xy in degree 3: passes (3/2, 3/2) and the node — oracle: symmetry and substitution", () => {
    const folium: PlaneEquation = { rows: [[0, 0, 0, 1], [0, -3], [], [1]] };
    const locus = trace(folium);
    expect(distance(locus, frame, [1.5, 1.5])).toBeLessThan(0.1);
    expect(distance(locus, frame, [0, 0])).toBeLessThan(0.5);
    expect(worstResidual(folium, locus, frame)).toBeLessThan(1e-3);
  });

  it("a cubic with a line x = 2 in it shows the line — oracle: (x−2)(x²+y²−1)", () => {
    const equation: PlaneEquation = { rows: [[2, -1, -2, 1], [], [-2, 1]] };
    const locus = trace(equation);
    expect(distance(locus, frame, [2, 2])).toBeLessThan(0.5);
    expect(distance(locus, frame, [0, 1])).toBeLessThan(0.1);
  });
});
