// Results that speak of values which are no longer there.
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { staleLines, type TracedRun } from "../../../kernel/cell/child/staleness.ts";
import { TestNotebook } from "./notebook.ts";

function traced(cell: number, defines: string[], uses: [string, number][], more: Partial<TracedRun> = {}): TracedRun {
  const used = uses.map(([name, from]) => ({ name, cell: from }));
  return { cell, defines, uses: used, failed: false, code: `cell ${cell}`, watched: false, ...more };
}

describe("stale results — oracle: the runs followed by hand", () => {
  const a = traced(1, ["a"], [], { id: "one" });
  const b = traced(2, ["b"], [["a", 1]], { id: "two" });

  it("a cell that was run again makes what used it out of date, once", () => {
    const again = traced(3, ["a"], [], { id: "one" });
    expect(staleLines([a, b, again])).toEqual([
      "Out of date since this run: the result of cell 2 (from an earlier a).",
    ]);
    expect(staleLines([a, b, again, traced(4, [], [], { id: "four" })])).toEqual([]);
  });

  it("what uses an out-of-date value says so, also through further cells", () => {
    const again = traced(3, ["a"], [], { id: "one" });
    const c = traced(4, ["c"], [["b", 2]], { id: "three" });
    expect(staleLines([a, b, again, c])).toEqual(["b is out of date: cell 2 used a before a changed."]);
    const d = traced(5, [], [["c", 4]], { id: "four" });
    expect(staleLines([a, b, again, c, d])).toEqual(["c is out of date: cell 4 used a before a changed."]);
  });

  it("run again, the result is of now", () => {
    const again = traced(3, ["a"], [], { id: "one" });
    const fresh = traced(4, ["b"], [["a", 3]], { id: "two" });
    expect(staleLines([a, b, again, fresh])).toEqual([]);
    expect(staleLines([a, b, again, fresh, traced(5, [], [["b", 4]], { id: "three" })])).toEqual([]);
  });

  it("another cell that uses the same name makes nothing out of date", () => {
    expect(staleLines([a, b, traced(3, ["a"], [], { id: "other" })])).toEqual([]);
  });

  it("a front end without names of cells: by the text, and where somebody looks on by what is defined", () => {
    const first = traced(1, ["a"], [], { code: "const a = 1" });
    const user = traced(2, ["b"], [["a", 1]]);
    const edited = traced(3, ["a"], [], { code: "const a = 2" });
    expect(staleLines([first, user, { ...first, cell: 3 }])).toHaveLength(1);
    expect(staleLines([first, user, edited])).toEqual([]);
    expect(staleLines([first, user, { ...edited, watched: true }])).toHaveLength(1);
  });

  it("a failed run changes nothing", () => {
    expect(staleLines([a, b, traced(3, [], [], { id: "one", failed: true })])).toEqual([]);
  });
});

describe("in a notebook", () => {
  let notebook: TestNotebook;
  beforeAll(() => {
    notebook = new TestNotebook();
  });
  afterAll(() => notebook.session.shutdown());

  it("a discreet line is displayed under the cell", async () => {
    await notebook.run("const a = 1", { cellId: "A" });
    await notebook.run("const b = a + 1; b", { cellId: "B" });
    await notebook.run("const a = 10", { cellId: "A" });
    await notebook.run("b + 1", { cellId: "C" });
    await notebook.run("const b = a + 1; b", { cellId: "B" });
    const shown = notebook.events.flatMap((event) =>
      event.type === "display" ? [[event.cell, event.data["text/plain"]]] : [],
    );
    expect(shown).toEqual([
      [3, "Out of date since this run: the result of cell 2 (from an earlier a)."],
      [4, "b is out of date: cell 2 used a before a changed."],
    ]);
  });
});
