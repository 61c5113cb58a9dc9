import { describe, expect, it } from "vitest";
import { OutputCollector } from "../../../kernel/notebook/collect.ts";

const stream = (name: string, text: string) => ({ type: "stream", content: { name, text } });
const display = (text: string, id?: string, type = "display_data") => ({
  type,
  content: {
    data: { "text/plain": text },
    metadata: {},
    ...(id === undefined ? {} : { transient: { display_id: id } }),
  },
});

describe("outputs by the rules of nbformat", () => {
  it("merges neighbours of one stream and keeps the order of the two streams", () => {
    const cell = new OutputCollector().cell();
    for (const m of [stream("stdout", "a"), stream("stdout", "b"), stream("stderr", "c"), stream("stdout", "d")]) {
      expect(cell.take(m)).toBe(true);
    }
    expect(cell.outputs.map((o) => o.output_type === "stream" && [o.name, o.text])).toEqual([
      ["stdout", "ab"],
      ["stderr", "c"],
      ["stdout", "d"],
    ]);
  });

  it("updates every display of an id from a later cell, and an update alone shows nothing", () => {
    const collector = new OutputCollector();
    const [first, second] = [collector.cell(), collector.cell()];
    first.take(display("old", "x"));
    first.take(display("other", "y"));
    first.take(display("old", "x"));
    second.take(display("new", "x", "update_display_data"));
    second.take(display("nobody", "z", "update_display_data"));
    expect(first.outputs.map((o) => o.output_type === "display_data" && o.data["text/plain"])).toEqual([
      "new",
      "other",
      "new",
    ]);
    expect(first.outputs[0]).toEqual({ output_type: "display_data", data: { "text/plain": "new" }, metadata: {} });
    expect(second.outputs).toEqual([]);
  });

  it("clears at once, or when the next output comes, and forgets the displays it cleared", () => {
    const cell = new OutputCollector().cell();
    cell.take(display("a", "x"));
    cell.take({ type: "clear_output", content: { wait: true } });
    expect(cell.outputs).toHaveLength(1);
    cell.take(stream("stdout", "b"));
    expect(cell.outputs).toEqual([{ output_type: "stream", name: "stdout", text: "b" }]);
    cell.take(display("new", "x", "update_display_data"));
    expect(cell.outputs).toHaveLength(1);
    cell.take({ type: "clear_output", content: { wait: false } });
    expect(cell.outputs).toEqual([]);
  });

  it("keeps errors and results, drops what is no output", () => {
    const cell = new OutputCollector().cell();
    cell.take({ type: "execute_result", content: { execution_count: 3, data: { "text/plain": "1" }, metadata: {} } });
    cell.take({ type: "error", content: { ename: "E", evalue: "v", traceback: ["t"] } });
    expect(cell.take({ type: "status", content: { execution_state: "idle" } })).toBe(false);
    expect(cell.outputs).toEqual([
      { output_type: "execute_result", execution_count: 3, data: { "text/plain": "1" }, metadata: {} },
      { output_type: "error", ename: "E", evalue: "v", traceback: ["t"] },
    ]);
  });
});
