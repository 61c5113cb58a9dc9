import { inflateSync } from "node:zlib";
import { describe, expect, it } from "vitest";
import { readDrawing } from "../../../../kernel/notebook/latex/drawing.ts";
import { labelsTex } from "../../../../kernel/notebook/latex/labels.ts";
import { drawingPdf } from "../../../../kernel/notebook/latex/vector.ts";
import * as figure from "../../../../lib/figure/figures.ts";
import { curve } from "../../../../lib/surface/make-curve.ts";

const E = curve`y^2 + y = x^3 - 4x`;
const FIGURES = {
  curve: () => figure.curve(E, { points: { P: E.point(0, 0), "-P": E.point(0, -1) } }),
  lattice: () => figure.lattice(E.lattice()),
  domain: () => figure.fundamentalDomain({ points: { A: E.lattice().tau } }),
  finite: () => figure.curve(E.mod(11) as never),
};

/** Content and objects of a file with one stream. */
function opened(pdf: Uint8Array) {
  const bytes = Buffer.from(pdf);
  const text = bytes.toString("latin1");
  const start = text.indexOf("stream\n") + 7;
  const length = Number(/\/Length (\d+)/.exec(text)?.[1]);
  return { text, content: inflateSync(bytes.subarray(start, start + length)).toString("latin1") };
}

describe("figures of ours as vector PDF", () => {
  it.each(Object.entries(FIGURES))(
    "%s: every shape and every label of the SVG — oracle: its elements counted",
    (_, make) => {
      const { svg } = make();
      const drawing = readDrawing(svg)!;
      const count = (pattern: RegExp) => svg.match(pattern)?.length ?? 0;
      expect(drawing.shapes.length).toBe(count(/<(?:path|circle)\b/g));
      expect(drawing.labels.length).toBe(count(/<text\b/g));
      expect(drawing.labels.length).toBeGreaterThan(1);
      const { content } = opened(drawingPdf(drawing));
      expect(content).not.toMatch(/NaN|undefined|Infinity/);
      const painted = drawing.shapes.reduce((sum, { fill, stroke }) => sum + (fill ? 1 : 0) + (stroke ? 1 : 0), 0);
      expect(content.match(/^[fS]$/gm)?.length).toBe(painted);
      expect(labelsTex(drawing).match(/\\put/g)?.length).toBe(drawing.labels.length);
    },
  );

  it("the table of a file names the place of each object — oracle: the objects themselves", () => {
    const pdf = drawingPdf(readDrawing(FIGURES.curve().svg)!);
    const { text } = opened(pdf);
    const places = [...text.matchAll(/^(\d{10}) 00000 n/gm)].map(([, place]) => Number(place));
    expect(places.length).toBe(4);
    for (const [k, place] of places.entries()) expect(text.slice(place)).toMatch(new RegExp(`^${k + 1} 0 obj\n`));
    expect(text.slice(Number(/startxref\n(\d+)/.exec(text)?.[1]))).toMatch(/^xref\n/);
    expect(pdf).toEqual(drawingPdf(readDrawing(FIGURES.curve().svg)!));
  });

  it("ink, dashes, opacity and a circle by hand", () => {
    const drawing = readDrawing(
      '<svg width="20" height="10" fill="none" stroke="none"><g opacity="0.5"><path d="M1,2h3V-4L5,6Z" stroke="#ff0000" stroke-width="2" stroke-dasharray="5 4" stroke-opacity="0.5"/></g><circle cx="3" cy="4" r="2" fill="currentColor"/></svg>',
    )!;
    const { content, text } = opened(drawingPdf(drawing));
    expect(content).toContain("1 0 0 RG 2 w 0 J [5 4] 0 d\n1 2 m\n4 2 l\n4 -4 l\n5 6 l\nh\nS");
    expect(content).toContain("0 0 0 rg\n5 4 m\n");
    expect(text).toContain("/A0 << /ca 0.25 /CA 0.25 >>");
    expect(text).toContain("/MediaBox [0 0 20 10]");
  });

  it("labels: letters as in formulas, indices low, what TeX reserves escaped, the baseline at its place", () => {
    const drawing = readDrawing(
      '<svg width="20" height="10" font-size="15"><text x="4" y="3" text-anchor="end"><tspan font-style="italic">ω</tspan><tspan font-size="10.8" dy="3">1</tspan><tspan dy="-3"> &amp; 5%</tspan></text></svg>',
    )!;
    expect(labelsTex(drawing)).toBe(
      "\\put(4,7){\\fontsize{15}{15}\\selectfont\\makebox[0pt][r]{$\\ensuremath{\\omega}$$_{1}$\\ \\& 5\\%}}%\n",
    );
  });

  it.each([
    '<svg width="9" height="9"><image href="file:///etc/passwd"/></svg>',
    '<svg width="9" height="9"><path d="M0,0" transform="scale(2)"/></svg>',
    '<svg width="9" height="9"><style>path{fill:url(#a)}</style></svg>',
    '<svg width="9" height="9"><path d="M0,0A1 1 0 0 0 2 2"/></svg>',
    '<svg width="9" height="9"><path d="M0,0L5"/></svg>',
    '<svg width="9" height="9"><rect width="5" height="5" fill="red"/></svg>',
    '<svg width="9" height="9"><circle cx="1" cy="1e999" r="x"/></svg>',
    '<svg width="9" height="9"><path fill="url(#g)" d="M0,0H9"/></svg>',
    '<svg width="9" height="9"><path d="M0,0H9"/>',
    "<svg><path d='M0,0H9'/></svg>",
    "no picture",
    "",
  ])("%s is left to a converter", (svg) => expect(readDrawing(svg)).toBeUndefined());
});
