// The points of a curve over F_p in the square of residues.

import type { Residue } from "../algebra/primefield.ts";
import { pointsOverX } from "../curve/lift.ts";
import { DomainError } from "../proof/errors.ts";
import { Point } from "../surface/point.ts";
import { Figure } from "./figure.ts";
import { makeFrame, PAGE_WIDTH } from "./frame.ts";
import { mathLabel, spoken } from "./label.ts";
import { placeLabels } from "./marks.ts";
import { type Named, namedEntries } from "./named.ts";
import { node, type SvgNode } from "./svg.ts";
import type { AnyCurve } from "./weierstrass-subject.ts";

/** Above it the dots would be smaller than a printed point. */
const LARGEST_PRIME = 211n;

/** The points of a curve over F_p, as dots on the grid of x and y from 0 to p − 1; marked ones are larger and named. */
export function finiteFigure(E: AnyCurve, named: Named<unknown> | undefined): Figure {
  const { characteristic: p, name } = E.field;
  if (p > LARGEST_PRIME) {
    throw new DomainError({
      subject: "figure.curve",
      given: `a curve over ${name}`,
      expected: `a prime up to ${LARGEST_PRIME}`,
      hint: "More points than that cannot be told apart on a page.",
    });
  }
  const n = Number(p);
  const all = residuePoints(E, n);
  const entries = namedEntries(named, (_, k) => `P${k + 1}`);
  const marks = entries.map(([label, P]) => ({ label, at: placeOf(E, P) }));
  const frame = makeFrame({ x: [-0.7, n - 0.3], y: [-0.7, n - 0.3] }, { width: WIDTH, height: HEIGHT });
  const step = (frame.right - frame.left) / n;
  const requests = marks.flatMap(({ label, at }) =>
    at ? [{ label, at: frame.toPixel(at), gap: Math.max(7, step * 0.6) }] : [],
  );
  const dot = Math.min(4, Math.max(1.3, step * 0.3));
  return new Figure({
    title: `Points of ${E}`,
    description: describe(all.length, name, n, marks),
    width: WIDTH,
    height: HEIGHT,
    data: {
      figure: "points over a prime field",
      curve: String(E),
      points: all.map(([x, y]) => `(${x}, ${y})`),
      marked: Object.fromEntries(entries.map(([label, P]) => [label, String(P)])),
    },
    body: [
      grid(frame, n),
      ...all.map((at) => circle(frame.toPixel(at), { r: dot, fill: "currentColor", class: "point" })),
      ...requests.map(({ at }) =>
        circle(at, {
          r: Math.max(dot + 1.5, Math.min(dot + 3, step * 0.46)),
          stroke: "currentColor",
          "stroke-width": 1.3,
          class: "marked",
        }),
      ),
      ...placeLabels(requests, { strokes: [], points: all.map(frame.toPixel) }, frame),
    ],
  });
}

const HEIGHT = 520;
/** The plot is a square: 58 + 22 pixels are margin across, 26 + 44 upward. */
const WIDTH = Math.min(PAGE_WIDTH, HEIGHT + 10);

type Pair = readonly [number, number];

function residuePoints(E: AnyCurve, p: number): Pair[] {
  const F = E.field;
  return Array.from({ length: p }, (_, x) => F.fromInt(BigInt(x)))
    .flatMap((x) => pointsOverX(F, E.a, x) as (readonly [Residue, Residue])[])
    .map(([x, y]): Pair => [Number(x.value), Number(y.value)])
    .sort(([a, b], [c, d]) => a - c || b - d);
}

function placeOf(E: AnyCurve, P: unknown): Pair | undefined {
  if (!(P instanceof Point) || !P.curve.equals(E)) {
    throw new TypeError(`figure.curve: ${String(P)} is not a point of ${E}`);
  }
  const affine = P.coordinates as readonly [Residue, Residue] | undefined;
  return affine && [Number(affine[0].value), Number(affine[1].value)];
}

function circle([cx, cy]: Pair, style: Readonly<Record<string, string | number>>): SvgNode {
  return node("circle", { cx, cy, ...style });
}

/** Thin lines through the residues, numbers where they have room. */
function grid(frame: ReturnType<typeof makeFrame>, p: number): SvgNode {
  const every = [1, 2, 5, 10, 20, 50].find((k) => ((frame.right - frame.left) / p) * k >= 24) ?? 100;
  const all = Array.from({ length: p }, (_, k) => k);
  const lines = p <= 60 ? all : all.filter((k) => k % every === 0);
  const thin = { stroke: "currentColor", "stroke-width": 0.5, opacity: 0.28 };
  const [[left, bottom], [right, top]] = [frame.toPixel([0, 0]), frame.toPixel([p - 1, p - 1])];
  const path = (d: string) => node("path", { d, ...thin });
  const at = (x: number) => x.toFixed(2);
  return node(
    "g",
    { class: "grid", fill: "currentColor", "font-size": 12 },
    ...lines.map((k) => path(`M${at(frame.x(k))},${at(bottom)}V${at(top)}`)),
    ...lines.map((k) => path(`M${at(left)},${at(frame.y(k))}H${at(right)}`)),
    ...all
      .filter((k) => k % every === 0)
      .flatMap((k) => [
        node("text", { x: frame.x(k), y: frame.bottom + 15, "text-anchor": "middle" }, String(k)),
        node("text", { x: frame.left - 5, y: frame.y(k) + 4, "text-anchor": "end" }, String(k)),
      ]),
    mathLabel("x", frame.right, frame.bottom + 34, { anchor: "end" }),
    mathLabel("y", frame.left - 6, frame.top - 10, { anchor: "end" }),
  );
}

function describe(
  count: number,
  field: string,
  p: number,
  marks: readonly { readonly label: string; readonly at: Pair | undefined }[],
): string {
  const points = marks.map(({ label, at }) => `${spoken(label)} ${at ? `at (${at.join(", ")})` : "is O, at infinity"}`);
  return [
    `The ${count} affine points over ${field} as dots on the grid of x and y from 0 to ${p - 1}; with O there are ${count + 1}.`,
    ...(points.length > 0 ? [`Marked: ${points.join("; ")}.`] : []),
  ].join(" ");
}
