// The standard fundamental domain of SL2(Z) in the upper half plane, with marked τ.

import { Figure, type FigureData } from "./figure.ts";
import { axes, type Frame, makeFrame, type Pixel } from "./frame.ts";
import { spoken } from "./label.ts";
import { dots, type Mark, placeLabels } from "./marks.ts";
import { node, pathData, type SvgNode } from "./svg.ts";

type Point = readonly [number, number];

export interface DomainPicture {
  readonly marks: readonly Mark[];
  readonly remarks: readonly string[];
  readonly data: FigureData;
}

const CORNER = Math.sqrt(3) / 2;

export function drawDomain(picture: DomainPicture): Figure {
  const heights = picture.marks.map(({ at }) => at[1]).filter((y) => y < 6);
  const widths = picture.marks.map(({ at }) => Math.abs(at[0]));
  const top = Math.max(1.8, ...heights.map((y) => y * 1.12));
  const reach = Math.max(1.3, ...widths.map((x) => x + 0.3));
  const frame = makeFrame({ x: [-reach, reach], y: [0, top] }, { equal: true, height: 440 });
  const shown = picture.marks.filter(({ at }) => at[1] <= frame.window.y[1]);
  const above = picture.marks.filter((mark) => !shown.includes(mark));
  return new Figure({
    title: "Fundamental domain of SL2(Z)",
    description: describe(shown, above, picture.remarks),
    width: frame.width,
    height: frame.height,
    data: picture.data,
    body: [
      domain(frame),
      axes(frame, { x: "Re τ", y: "Im τ" }),
      ...edges(frame),
      ...dots(shown, frame),
      ...placeLabels(
        shown.map(({ at, label }) => ({ at: frame.toPixel(at), label })),
        { strokes: borders(frame).map((points) => ({ points, closed: false })) },
        frame,
      ),
    ],
  });
}

function arc(frame: Frame, from: number, to: number): Pixel[] {
  const steps = 48;
  return Array.from({ length: steps + 1 }, (_, k) => {
    const angle = from + ((to - from) * k) / steps;
    return frame.toPixel([Math.cos(angle), Math.sin(angle)]);
  });
}

function domain(frame: Frame): SvgNode {
  const top = frame.window.y[1];
  const left: Point[] = [
    [0.5, top],
    [-0.5, top],
  ];
  const d = pathData([...arc(frame, (2 * Math.PI) / 3, Math.PI / 3), ...left.map(frame.toPixel)], true);
  return node("path", { class: "domain", d, fill: "currentColor", "fill-opacity": 0.09 });
}

/** Left line and left arc, which belong to the domain; right arc and right line, which do not. */
function borders(frame: Frame): Pixel[][] {
  const top = frame.window.y[1];
  const side = (x: number): Pixel[] => [frame.toPixel([x, top]), frame.toPixel([x, CORNER])];
  return [
    [...side(-0.5), ...arc(frame, (2 * Math.PI) / 3, Math.PI / 2)],
    [...arc(frame, Math.PI / 2, Math.PI / 3), ...side(0.5).reverse()],
  ];
}

function edges(frame: Frame): SvgNode[] {
  const style = { stroke: "currentColor", "stroke-width": 1.5 };
  const [own, other] = borders(frame);
  const circle = [arc(frame, Math.PI, (2 * Math.PI) / 3), arc(frame, Math.PI / 3, 0)];
  return [
    ...circle.map((points) => node("path", { d: pathData(points), ...style, "stroke-width": 0.7, opacity: 0.6 })),
    node("path", { class: "included", d: pathData(own ?? []), ...style }),
    node("path", { class: "excluded", d: pathData(other ?? []), ...style, "stroke-dasharray": "5 4" }),
  ];
}

function describe(shown: readonly Mark[], above: readonly Mark[], remarks: readonly string[]): string {
  const near = ({ label, at }: Mark): string =>
    `${spoken(label)} near ${Number(at[0].toPrecision(4))} + ${Number(at[1].toPrecision(4))} i`;
  return [
    "The part of the upper half plane with −1/2 ≤ Re τ < 1/2 and |τ| ≥ 1, shaded; the border drawn solid belongs to it (left line, left half of the arc), the dashed one does not.",
    ...(shown.length > 0 ? [`Marked: ${shown.map(near).join("; ")}.`] : []),
    ...(above.length > 0 ? [`Above the picture: ${above.map(near).join("; ")}.`] : []),
    ...remarks,
  ].join(" ");
}
