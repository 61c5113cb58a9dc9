import { describe, expect, it } from "vitest";
import { real } from "../../../lib/index.ts";
import { bundle } from "../../../lib/page/bundle.ts";
import { table } from "../../../lib/page/table.ts";

const shown = (value: unknown, type = "text/plain") => String(bundle(value)?.[type] ?? "");
const third = 1 / 3;

describe("numbers that came in as doubles — oracle: the doubles that were given", () => {
  it("are named once under an output, however many it shows, and not in the next one", () => {
    const text = shown([real(0.1).plus(1), real(0.1).times(2), real(third)]);
    expect(text.match(/double/g)?.length).toBe(1);
    expect(text).toContain("from doubles: 0.1, 0.3333333333333333, each assumed right to half a unit");
    expect(shown(real(2).sqrt())).not.toContain("double");
  });

  it("say how the exact number is written: the fraction with the least denominator that rounds to the double", () => {
    expect(shown(real(third))).toContain("exact would be rational(1, 3)");
    expect(shown(real(-0.1))).toContain("exact would be rational(-1, 10)");
    expect(shown(real(Math.PI))).toContain(`exact would be real("${Math.PI}")`);
  });

  it("no more than three are listed", () => {
    const text = shown([0.1, 0.2, 0.3, 0.4, 0.6].map((x) => real(x)));
    expect(text).toContain("from doubles: 0.1, 0.2, 0.3 and 2 more, each");
  });

  it("the note stands once in LaTeX, and below a table", () => {
    expect(shown([real(0.1), real(0.2)], "text/latex").match(/from doubles/g)?.length).toBe(1);
    expect(shown(table([[real(0.1), real(0.2)]])).match(/from doubles/g)?.length).toBe(1);
  });
});
