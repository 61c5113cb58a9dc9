import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { BoundedLines, readReport } from "../../../../kernel/cell/confined/reports.ts";

const done = { kind: "done", cell: 1, defined: ["a"] };
const read = (value: unknown) => readReport(JSON.stringify(value));

describe("reports of confined cells are hostile input", () => {
  it("takes what cells say, and nothing besides", () => {
    expect(read({ ...done, extra: 1, result: { data: { "text/plain": "1" }, metadata: { evil: 1 } } })).toEqual({
      ...done,
      result: { data: { "text/plain": "1" }, metadata: {} },
    });
    expect(read({ kind: "stream", cell: 1, name: "stdout", text: "t" })).toMatchObject({ text: "t" });
  });

  it.each([
    ["no JSON", "{"],
    ["null", "null"],
    ["a list", "[]"],
    ["an unknown kind", '{"kind":"peeked","id":1,"text":"x"}'],
    ["input, which nobody answers", '{"kind":"input","cell":1,"prompt":"password?","password":true}'],
    ["a cell that is no number", '{"kind":"done","cell":"1","defined":[]}'],
    ["a negative cell", '{"kind":"done","cell":-1,"defined":[]}'],
    ["names that are no texts", '{"kind":"done","cell":1,"defined":[{}]}'],
    ["a name as long as a book", JSON.stringify({ ...done, defined: ["x".repeat(1000)] })],
    ["a stream of another name", '{"kind":"stream","cell":1,"name":"stdin","text":"x"}'],
    ["text that is none", '{"kind":"stream","cell":1,"name":"stdout","text":{"length":3}}'],
    ["an error without its parts", JSON.stringify({ ...done, error: { ename: "E" } })],
    ["a traceback of objects", JSON.stringify({ ...done, error: { ename: "E", evalue: "e", traceback: [{}] } })],
    ["data that is no record", JSON.stringify({ ...done, result: { data: [] } })],
  ])("refuses %s", (_, line) => {
    expect(readReport(line)).toBeUndefined();
  });

  it("drops scripts, foreign types and texts that are none from what is shown", () => {
    const data = {
      "text/plain": "1",
      "application/javascript": "evil()",
      "text/html": 3,
      "application/x+json": {},
      __proto__: 1,
    };
    expect(read({ kind: "display", cell: 1, data })).toMatchObject({ data: { "text/plain": "1" } });
    expect(Object.keys((read({ kind: "display", cell: 1, data }) as { data: object }).data)).toEqual(["text/plain"]);
  });

  it("never throws — random JSON", () => {
    fc.assert(
      fc.property(fc.json(), (line) => void readReport(line)),
      { numRuns: 500, seed: 8 },
    );
    const almost = fc.record({
      kind: fc.constantFrom("done", "display", "stream"),
      cell: fc.anything(),
      defined: fc.anything(),
      data: fc.anything(),
      error: fc.anything(),
    });
    fc.assert(
      fc.property(almost, (value) => void readReport(JSON.stringify(value) ?? "")),
      { numRuns: 500, seed: 8 },
    );
  });
});

describe("lines within bounds", () => {
  it("are whole, also over pieces that split a character", () => {
    const lines = new BoundedLines(100, 1000);
    const bytes = Buffer.from("ab℘c\nde\n");
    expect([...bytes].flatMap((byte) => lines.push(Buffer.from([byte])))).toEqual(["ab℘c", "de"]);
  });

  it("end at the bound of a line and of all, which starts again with the next cell", () => {
    expect(new BoundedLines(10, 1000).push(Buffer.from("x".repeat(11)))).toBeUndefined();
    const all = new BoundedLines(100, 20);
    expect(all.push(Buffer.from("123456789\n"))).toEqual(["123456789"]);
    all.restart();
    expect(all.push(Buffer.from("123456789\n123456789\n"))).toHaveLength(2);
    expect(all.push(Buffer.from("1"))).toBeUndefined();
  });
});
