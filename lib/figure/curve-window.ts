// Which part of the plane to show when the user does not say.

import { fibre, fibreCount, type PlaneEquation } from "./fibre.ts";
import type { Window } from "./frame.ts";
import { degreeInY, discriminantInY, turningX } from "./locus.ts";
import { realRoots } from "./polynomial.ts";

type Point = readonly [number, number];

/** A window that shows the marked points, every real turning or singular point, and how the branches run off. */
export function chooseWindow(equation: PlaneEquation, marked: readonly Point[]): Window {
  const degree = degreeInY(equation);
  const constantLead = (equation.rows[degree] ?? []).slice(1).every((c) => c === 0);
  return degree === 2 && constantLead ? doubleCover(equation, marked) : general(equation, marked);
}

/** y² + ... = cubic or quartic in x: all turning points, and beyond the last ones some of the branches that run off. */
function doubleCover(equation: PlaneEquation, marked: readonly Point[]): Window {
  const reach = bound(equation);
  const turns = turningX(equation, -reach, reach);
  const xs = [...turns, ...marked.map(([x]) => x)];
  const ys = marked.map(([, y]) => y);
  const x = padded([...xs, ...beyond(discriminantInY(equation), turns)], 0.12);
  const whole = padded([...ys, ...heights(equation, x)], 0.06);
  // An oval that would be a speck beside the branches: closer up, with less of the branches.
  const oval = padded([...ys, ...ovalHeights(equation, turns)], 2);
  if (turns.length < 3 || oval[1] - oval[0] > 0.4 * (whole[1] - whole[0])) return { x, y: whole };
  return { x: padded(xs, 0.12), y: oval };
}

function heights(equation: PlaneEquation, range: readonly [number, number]): number[] {
  return samples(equation, range).map(([, y]) => y);
}

/** Heights of the oval of a cubic, between its first two turning points. */
function ovalHeights(equation: PlaneEquation, [first = 0, second = 0]: readonly number[]): number[] {
  return heights(equation, [first, second]);
}

/** How far to follow the branches that run off to infinity, about as far as the turning points are apart. */
function beyond(discriminant: readonly number[], turns: readonly number[]): number[] {
  const [first, last] = [Math.min(0, ...turns), Math.max(...turns, ...(turns.length === 0 ? [0] : []))];
  // With one real root the two others are about as far to the right as it is to the left.
  if (discriminant.length <= 4) return [last + (turns.length > 1 ? 0.9 : 2.2) * rootScale(discriminant)];
  const spread = turns.length > 1 ? last - Math.min(...turns) : 2 * (Math.abs(first) + 1);
  const open = (discriminant[4] ?? 0) > 0;
  return open ? [Math.min(...turns, 0) - 0.2 * spread, last + 0.2 * spread] : [];
}

/** Size of the roots of a cubic about their mean, from its coefficients. */
function rootScale([d = 0, c = 0, b = 0, a = 1]: readonly number[]): number {
  const p = c / a - (b * b) / (3 * a * a);
  const q = (2 * b ** 3) / (27 * a ** 3) - (b * c) / (3 * a * a) + d / a;
  return Math.max(Math.sqrt(Math.abs(p)), Math.cbrt(Math.abs(q))) || 1;
}

/** Turning points in both directions, with the marked points. */
function general(equation: PlaneEquation, marked: readonly Point[]): Window {
  const flipped = transpose(equation);
  const upright = turns(equation);
  const flat = turns(flipped).map(([y, x]): Point => [x, y]);
  const seen = [...marked, ...upright, ...flat];
  const [x, y] = [
    padded(
      seen.map((point) => point[0]),
      0.3,
    ),
    padded(
      seen.map((point) => point[1]),
      0.3,
    ),
  ];
  // Neither direction much shorter than the other, or the branches that run off would look like lines.
  const least = 0.4 * Math.max(x[1] - x[0], y[1] - y[0]);
  return { x: atLeast(x, least), y: atLeast(y, least) };
}

function atLeast([low, high]: readonly [number, number], length: number): [number, number] {
  const more = Math.max(0, length - (high - low)) / 2;
  return [low - more, high + more];
}

function turns(equation: PlaneEquation): Point[] {
  const reach = bound(equation);
  const leading = equation.rows[degreeInY(equation)] ?? [];
  const atPole = (x: number): boolean =>
    realRoots(leading, -reach, reach).some((pole) => Math.abs(pole - x) < 1e-6 * reach);
  return turningX(equation, -reach, reach)
    .filter((x) => !atPole(x))
    .flatMap((x) => {
      const found = samples(equation, [x, x]);
      return found.length > 0 ? found : vertexAt(equation, x);
    });
}

/** Where two values of y meet, A y² + B y + C has the root −B/(2A); rounding may leave its roots just off the real line. */
function vertexAt(equation: PlaneEquation, x: number): Point[] {
  if (degreeInY(equation) !== 2) return [];
  const [, b = 0, a = 0] = equation.rows.map((row) => row.reduceRight((total, c) => total * x + c, 0));
  return [[x, -b / (2 * a)]];
}

/** Where turning points can be: a bound from the sizes of the coefficients, homogeneous of degree one in x and y. */
function bound(equation: PlaneEquation): number {
  const sizes = equation.rows.flatMap((row, k) =>
    row.map((c, i) => (c === 0 || i + k >= 3 ? 0 : Math.abs(c) ** (1 / (3 - i - k)))),
  );
  return 64 * (1 + Math.max(0, ...sizes));
}

function samples(equation: PlaneEquation, [low, high]: readonly [number, number]): Point[] {
  const degree = degreeInY(equation);
  if (degree === 0) return [];
  const steps = low === high ? 0 : 64;
  return Array.from({ length: steps + 1 }, (_, k) => low + ((high - low) * k) / Math.max(1, steps)).flatMap((x) =>
    fibre(equation, degree, x, fibreCount(equation, degree, x))
      .filter(Number.isFinite)
      .map((y): Point => [x, y]),
  );
}

function padded(values: readonly number[], part: number): [number, number] {
  const finite = values.filter(Number.isFinite);
  if (finite.length === 0) return [-3, 3];
  const [low, high] = [Math.min(...finite), Math.max(...finite)];
  const apart = high - low > 1e-6 * (1 + Math.abs(low) + Math.abs(high));
  const size = apart ? high - low : Math.max(1, Math.abs(low));
  return [low - part * size, high + part * size];
}

/** The same curve with x and y exchanged. */
export function transpose(equation: PlaneEquation): PlaneEquation {
  const rows = Array.from({ length: 4 }, (_, i) => equation.rows.map((row) => row[i] ?? 0));
  return { rows };
}
