import { describe, expect, it } from "vitest";
import type { Cell, Notebook } from "../../../kernel/notebook/format.ts";
import { changesSince, makeStamp, orderOfRun, readStamp, stamped } from "../../../kernel/notebook/stamp.ts";
import { colophon, summaryLines } from "../../../kernel/notebook/summary.ts";
import { VALUE_TYPE } from "../../../kernel/notebook/values.ts";
import { VALUE_TYPE as LIBRARY_TYPE } from "../../../lib/page/bundle.ts";

const cell = (source: string, ...values: unknown[]): Cell => ({
  cell_type: "code",
  metadata: {},
  source,
  execution_count: 1,
  outputs: values.map((value) => ({ output_type: "display_data", data: { [VALUE_TYPE]: value }, metadata: {} })),
});
const notebook = (...cells: Cell[]): Notebook => ({ nbformat: 4, nbformat_minor: 5, metadata: {}, cells });
const claim = (name: string, standing: object) => ({
  kind: "claim",
  name,
  lhs: { kind: "rational", value: "1" },
  standing,
});

describe("the values of a notebook, counted", () => {
  it("is the type that the library writes", () => expect(VALUE_TYPE).toBe(LIBRARY_TYPE));

  it("counts claims once a name, the last word first, and the digits that the numbers prove", () => {
    const lines = summaryLines(
      notebook(
        cell("a", claim("one", { kind: "undecided" }), [claim("one", { kind: "proved" })]),
        cell("b", claim("two", { kind: "certified", digits: "48" }), claim("three", { kind: "refuted" })),
        cell("c", {
          kind: "lattice",
          periods: [{ kind: "real", standing: "defined", middle: "123456789e-8", radius: "1e-8" }],
        }),
        cell("e", { kind: "real", standing: "measured", middle: "125e-2", radius: "1e-3" }),
        cell("d", { kind: "rational", value: "1/2" }),
      ),
    );
    expect(Object.fromEntries(lines)).toEqual({
      claims: "2 of 3 met, 1 proved, 1 certified to 48 digits, 1 refuted",
      numbers: "1 exact, 1 with 8 or more proved digits, 1 measured",
    });
  });
});

describe("the stamp of a run", () => {
  const plain = notebook(cell("const a = 1; // one\nf( a )"));
  it("is read back and says nothing while nothing changes", () => {
    const kept = stamped(plain);
    const stamp = readStamp(kept);
    expect(stamp && changesSince(stamp, kept)).toEqual([]);
    expect(colophon(kept)).toMatch(
      /^Computed by halfperiod 0\.1\.0 with the conventions of edition 1, on \d{4}-\d\d-\d\d\.$/,
    );
    expect(readStamp(plain)).toBeUndefined();
    expect(colophon(plain)).toBe("Set by halfperiod 0.1.0.");
    expect(colophon({ ...kept, cells: [cell("other")] })).toMatch(/The code was edited after that\.$/);
  });

  it("notices an edit but no new layout and no new comment; strings count as they stand", () => {
    const stamp = makeStamp(plain);
    expect(changesSince(stamp, notebook(cell("const a=1;\n\nf(a)  /* done */")))).toEqual([]);
    expect(changesSince(stamp, notebook(cell("const a = 2; f(a)")))).toEqual([
      "the code was edited after the stored run: code cell 1",
    ]);
    expect(makeStamp(notebook(cell('"a b"'))).code).not.toBe(makeStamp(notebook(cell('"ab"'))).code);
    expect(makeStamp(notebook(cell("a"), cell("b"))).code).not.toBe(makeStamp(notebook(cell("b"), cell("a"))).code);
  });

  it("tells which cells are new or changed, that one is gone, that they stand in another order", () => {
    const three = notebook(cell("a"), cell("b"), cell("c"));
    const stamp = makeStamp(three);
    const since = (...sources: string[]) => changesSince(stamp, notebook(...sources.map((source) => cell(source))));
    expect(since("a", "b", "c // words")).toEqual([]);
    expect(since("a", "x", "c")).toEqual(["the code was edited after the stored run: code cell 2"]);
    expect(since("a", "b", "y", "c", "z")).toEqual(["the code was edited after the stored run: code cells 3, 5"]);
    expect(since("a", "c")).toEqual(["the code was edited after the stored run: 1 cell taken out"]);
    expect(since("c", "a", "b")).toEqual(["the cells were put in another order after the stored run"]);
    const { cells: _, ...old } = stamp;
    expect(changesSince(old, notebook(cell("x")))).toEqual(["the code was edited after the stored run"]);
  });

  it("tells that stored results come from cells run in another order", () => {
    const counted = (...counts: (number | null)[]) =>
      notebook(...counts.map((count) => ({ ...cell("a"), execution_count: count })));
    expect(orderOfRun(counted(1, 2, null, 7))).toBeUndefined();
    expect(orderOfRun(counted(3, 1, 2))).toBe("the stored results were made in another order: 3, 1, 2");
  });

  it("holds the digits that the cells ask for, or those asked for at the run", () => {
    const asks = notebook(cell("provedDigits(50);"), cell("atDigits(80, f); provedDigits( 20 )"));
    expect(makeStamp(asks).digits).toBe("50, 20");
    expect(makeStamp(asks, { digits: 30 }).digits).toBe("30 (asked for at the run)");
    expect(changesSince(makeStamp(asks), asks, { digits: 30 })).toEqual([
      "proved digits: 50, 20 then, 30 (asked for at the run) now",
    ]);
  });

  it("names other versions", () => {
    const stamp = { ...makeStamp(plain), version: "0.0.9", edition: "0" };
    expect(changesSince(stamp, plain)).toEqual([
      "halfperiod: 0.0.9 then, 0.1.0 now",
      "conventions, edition: 0 then, 1 now",
    ]);
  });
});
