import temml from "temml";
import { describe, expect, it } from "vitest";
import { bundle } from "../../../lib/page/bundle.ts";
import { table } from "../../../lib/page/table.ts";

const multiples = table(
  [
    { n: 1, x: 7n, note: "start" },
    { n: -20, x: -1234567n, note: "<i>far</i> & 50%" },
  ],
  { caption: "Multiples of $P$" },
);

describe("tables", () => {
  it("text: digits under digits — oracle: written by hand", () => {
    expect(bundle(multiples)?.["text/plain"]).toBe(
      [
        "Multiples of P",
        "n    x         note",
        "---  --------  ----------------",
        "  1         7  start",
        "-20  -1234567  <i>far</i> & 50%",
      ].join("\n"),
    );
  });

  it("HTML: caption, header cells with their scope, escaped text, digits without breaks for copying", () => {
    const html = bundle(multiples)?.["text/html"] as string;
    expect(html.match(/<th scope="col"/g)?.length).toBe(3);
    expect(html).toContain(">Multiples of <i>P</i></caption>");
    expect(html).toContain("&lt;i&gt;far&lt;/i&gt; &amp; 50%");
    expect(html.replace(/<[^>]*>/g, "")).toContain("−1234567");
  });

  it("LaTeX: an array that a TeX reader takes, missing digits as blanks", () => {
    const latex = bundle(multiples)?.["text/latex"] as string;
    expect(latex).toMatch(/^\$\\displaystyle .*\$$/);
    expect(latex).not.toContain("tabular");
    expect(latex).toContain("\\phantom{-000000}7");
    expect(() => temml.renderToString(latex.slice(1, -1), { throwOnError: true })).not.toThrow();
  });

  it("data: every number a string", () => {
    expect(bundle(multiples)?.["application/vnd.halfperiod.value+json"]).toEqual({
      kind: "table",
      columns: ["n", "x", "note"],
      rows: [
        [{ kind: "rational", value: "1" }, { kind: "rational", value: "7" }, "start"],
        [{ kind: "rational", value: "-20" }, { kind: "rational", value: "-1234567" }, "<i>far</i> & 50%"],
      ],
    });
  });

  it("a record gives names and values; long tables are cut and say so", () => {
    expect(bundle(table({ g2: 4n, g3: -1n }))?.["text/plain"]).toBe("g2   4\ng3  -1");
    const long = table(Array.from({ length: 1500 }, (_, k) => [k]));
    expect(bundle(long)?.["text/plain"]).toMatch(/\.\.\. 500 more rows$/);
  });

  it("rows that do not fit are refused with what was given", () => {
    expect(() => table([[1, 2], [3]], { columns: ["a", "b"] })).toThrow(/2 cells in each row.*row of 1/);
    expect(() => table([[1], "x"] as never)).toThrow(/got "x"/);
    expect(() => table(5 as never)).toThrow(TypeError);
  });
});
