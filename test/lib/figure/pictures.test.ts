import { describe, expect, it } from "vitest";
import { drawCurve } from "../../../lib/figure/curve-picture.ts";
import { drawDomain } from "../../../lib/figure/domain-picture.ts";
import { drawLattice } from "../../../lib/figure/lattice-picture.ts";
import { elements, normalise } from "./normalise.ts";

const curve = (label = "P") =>
  drawCurve({
    title: "A curve <b>&</b> its chord",
    equation: { rows: [[0, 1, 0, -1], [1], [1]] },
    window: { x: [-1.5, 2.4], y: [-4, 3.2] },
    axisNames: { x: "x", y: "y" },
    marks: [
      { at: [0, 0], label },
      { at: [2, -3], label: "P + Q", role: "derived" },
    ],
    lines: [
      [
        [0, 0],
        [-1, -1],
      ],
    ],
    segments: [
      [
        [2, 2],
        [2, -3],
      ],
    ],
    remarks: [],
    data: { figure: "curve" },
  });

const lattice = () =>
  drawLattice({
    title: "Period lattice",
    periods: [
      [3, 0],
      [1.5, 2],
    ],
    periodNames: ["ω1", "ω2"],
    marks: [{ at: [1, 1], label: "z_P" }],
    remarks: [],
    data: { figure: "lattice" },
  });

describe("figures as SVG", () => {
  it("curve: oval, branch, chord and mirror line, as stored — numeric fact: one closed oval", async () => {
    const { svg, data } = curve();
    expect(data.closed).toBe("1");
    expect(elements(svg, "locus").length).toBe(2);
    expect(elements(svg, "locus").filter((path) => /Z"/.test(path)).length).toBe(1);
    await expect(normalise(svg)).toMatchFileSnapshot("stored/curve.svg");
  });

  it("lattice: as stored — numeric fact: a unit is as long upward as across", async () => {
    const { svg } = lattice();
    const [first, second] = elements(svg, "cell").map((path) => [...path.matchAll(/[ML](-?[\d.]+),(-?[\d.]+)/g)]);
    expect(second).toBeUndefined();
    const [a, b, , d] = (first ?? []).map((match) => [Number(match[1]), Number(match[2])] as const);
    const unit = (b![0] - a![0]) / 3;
    expect((a![1] - d![1]) / 2).toBeCloseTo(unit, 1);
    expect((d![0] - a![0]) / 1.5).toBeCloseTo(unit, 1);
    await expect(normalise(svg)).toMatchFileSnapshot("stored/lattice.svg");
  });

  it("lattice in a long thin basis: the points are those of the short one — oracle: the same lattice", () => {
    const shear = (k: number) => {
      const picture = drawLattice({
        title: "t",
        periods: [
          [1, 0],
          [k, 0.5],
        ],
        periodNames: ["ω1", "ω2"],
        marks: [],
        window: { x: [-3, 3], y: [-2, 2] },
        remarks: [],
        data: { figure: "lattice" },
      });
      return elements(picture.svg, "lattice").sort();
    };
    expect(shear(40)).toEqual(shear(0));
    expect(shear(0).length).toBeGreaterThan(50);
  });

  it("fundamental domain: as stored — numeric fact: left edge solid, right edge dashed", async () => {
    const { svg } = drawDomain({ marks: [{ at: [0, 1], label: "i" }], remarks: [], data: { figure: "domain" } });
    expect(elements(svg, "included")[0]).not.toContain("dasharray");
    expect(elements(svg, "excluded")[0]).toContain("dasharray");
    await expect(normalise(svg)).toMatchFileSnapshot("stored/domain.svg");
  });

  it("text of the user is escaped, in the picture and in its description", () => {
    const { svg } = curve('<script>alert("x")</script>');
    expect(svg).not.toContain("<script");
    expect(svg).toContain("A curve &lt;b&gt;&amp;&lt;/b&gt; its chord");
  });

  it("ids differ between different pictures and are the same at each run", () => {
    const id = (svg: string) => /aria-labelledby="([^"]+)"/.exec(svg)?.[1];
    expect(id(curve().svg)).toBe(id(curve().svg));
    expect(new Set([id(curve().svg), id(curve("R").svg), id(lattice().svg)]).size).toBe(3);
  });

  it("colours are those of the page only", () => {
    for (const svg of [curve().svg, lattice().svg]) {
      const used = [...svg.matchAll(/(?:fill|stroke)="([^"]+)"/g)].map((match) => match[1]);
      expect(new Set(used)).toEqual(new Set(["none", "currentColor"]));
    }
  });
});
