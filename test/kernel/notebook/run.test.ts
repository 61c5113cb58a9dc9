import os from "node:os";
import { fileURLToPath } from "node:url";
import { afterEach, describe, expect, it } from "vitest";
import { KernelClient } from "../../../kernel/notebook/client.ts";
import { failedCell } from "../../../kernel/notebook/command/console.ts";
import type { Cell, Notebook } from "../../../kernel/notebook/format.ts";
import { showProgress } from "../../../kernel/notebook/progress.ts";
import { runNotebook } from "../../../kernel/notebook/run.ts";

const scripted = fileURLToPath(new URL("./scripted-kernel.mjs", import.meta.url));
let client: KernelClient | undefined;
const start = async () => {
  client = await KernelClient.start({ cwd: os.tmpdir(), command: [process.execPath, scripted] });
  return client;
};
afterEach(async () => {
  await client?.shutdown();
  client = undefined;
});

const code = (source: string, tags: string[] = []): Cell => ({
  cell_type: "code",
  metadata: tags.length > 0 ? { tags } : {},
  source,
  execution_count: 99,
  outputs: [{ output_type: "stream", name: "stdout", text: "old" }],
});
const notebook = (...cells: Cell[]): Notebook => ({
  nbformat: 4,
  nbformat_minor: 5,
  metadata: { title: "kept" },
  cells,
});
const text: Cell = { cell_type: "markdown", metadata: {}, source: "# text" };

describe("running a notebook", () => {
  it("replaces all outputs and counts, keeps the rest, names kernel and language", async () => {
    const run = await runNotebook(notebook(text, code("print a"), code(""), code("value 1")), await start());
    expect(run.failure).toBeUndefined();
    expect(run.total).toBe(2);
    const [first, second, empty, third] = run.notebook.cells;
    expect(first).toEqual(text);
    expect(second).toMatchObject({ execution_count: 1, outputs: [{ name: "stdout", text: "a\n" }] });
    expect(empty).toMatchObject({ execution_count: null, outputs: [] });
    expect(third).toMatchObject({
      outputs: [{ output_type: "execute_result", execution_count: 2, data: { "text/plain": "1" } }],
    });
    expect(run.notebook.metadata).toMatchObject({
      title: "kept",
      kernelspec: { name: "halfperiod", language: "typescript" },
      language_info: { name: "typescript", file_extension: ".ts" },
    });
  });

  it("stops at the first failure, with the error in the cell and none of the old outputs behind it", async () => {
    const run = await runNotebook(notebook(code("value 1"), code("fail broken"), code("value 2")), await start());
    expect(run.failure).toMatchObject({ position: 2, status: "failed", error: { ename: "Fault", evalue: "broken" } });
    expect(run.notebook.cells[1]).toMatchObject({ outputs: [{ output_type: "error", ename: "Fault" }] });
    expect(run.notebook.cells[2]).toMatchObject({ outputs: [], execution_count: null });
  });

  it("goes on behind a cell that is meant to fail", async () => {
    const run = await runNotebook(notebook(code("fail meant", ["raises-exception"]), code("value 2")), await start());
    expect(run.failure).toBeUndefined();
    expect(run.notebook.cells[0]).toMatchObject({ outputs: [{ output_type: "error" }] });
  });

  it("reports a cell that takes too long and a kernel that dies", async () => {
    const slow = await runNotebook(notebook(code("hang")), await start(), { limit: 200 });
    expect(slow.failure).toMatchObject({ status: "too long" });
    await client?.shutdown();
    const dead = await runNotebook(notebook(code("die"), code("value 1")), await start());
    expect(dead.failure).toMatchObject({ status: "kernel lost", error: { ename: "KernelLost" } });
    expect(dead.notebook.cells[0]).toMatchObject({ outputs: [{ output_type: "error", ename: "KernelLost" }] });
  });

  it("is stopped from outside between cells", async () => {
    const signal = AbortSignal.abort();
    await expect(runNotebook(notebook(code("value 1")), await start(), { signal })).rejects.toThrow("aborted");
  });
});

describe("what a person sees of a run", () => {
  const report = { position: 2, source: "a\nb(c)", status: "failed" as const, duration: 1234 };

  it("logs one plain line a cell where there is no terminal", () => {
    const lines: string[] = [];
    const progress = showProgress("x.ipynb", { write: (line) => lines.push(line) });
    progress.onCell?.(2, 7, "a");
    progress.onReport?.(report);
    progress.end();
    expect(lines).toEqual(["x.ipynb: cell 2 of 7, failed after 1.23 s\n"]);
  });

  it("draws one line on a terminal, never wider than it, and takes it away", () => {
    let screen = "";
    const write = (part: string) => {
      screen += part;
    };
    const progress = showProgress("x.ipynb", { isTTY: true, columns: 60, write });
    progress.onCell?.(4, 8, "// comment\nconst long = 'a very long line of code that cannot fit';");
    progress.onReport?.({ ...report, position: 4 });
    progress.end();
    const drawn = screen.split("\r\u001B[K");
    expect(Math.max(...drawn.map((line) => line.length))).toBeLessThan(60);
    expect(drawn.at(-2)).toContain("4 of 8");
    expect(drawn.at(-1)).toBe("");
  });

  it("shows the failed cell with line numbers and the trace without colours", () => {
    const error = { output_type: "error" as const, ename: "E", evalue: "v", traceback: ["\u001B[31mE\u001B[0m: v"] };
    expect(failedCell("x.ipynb", 7, { ...report, error })).toBe(
      "x.ipynb: cell 2 of 7: failed\n\n    1  a\n    2  b(c)\n\n  E: v\n",
    );
  });
});
