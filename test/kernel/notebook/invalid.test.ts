// Notebooks that cannot be read, and runs that cannot be finished: every file that exists stays as it was.
import { mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { afterEach, beforeEach, expect, it } from "vitest";
import { main } from "../../../kernel/cli.ts";
import { parseNotebook } from "../../../kernel/notebook/parse.ts";
import { serialiseNotebook } from "../../../kernel/notebook/serialise.ts";
import { code, notebookOf } from "./cells.ts";

let folder: string;
beforeEach(() => {
  folder = mkdtempSync(path.join(os.tmpdir(), "halfperiod-invalid-"));
});
afterEach(() => rmSync(folder, { recursive: true, force: true }));

const good = serialiseNotebook(notebookOf(code("1")));

it.each([
  [
    "nbformat 3",
    JSON.stringify({ nbformat: 3, nbformat_minor: 0, metadata: {}, worksheets: [] }),
    "a notebook of format 3; expected format 4",
  ],
  ["truncated JSON", good.slice(0, -20), "the JSON breaks off after"],
  ["an empty file", "", "the file is empty"],
  ["no notebook at all", '{"a": 1}', 'no "nbformat" number'],
])("%s: every command says so and writes nothing", { timeout: 120_000 }, async (_, text, message) => {
  const file = path.join(folder, "a.ipynb");
  writeFileSync(file, text);
  writeFileSync(path.join(folder, "a.html"), "an old page");
  for (const words of [["run"], ["check"], ["export"], ["export", "--as", "latex"], ["dossier"]]) {
    let said = "";
    const out = { write: () => true };
    const err = { write: (more: string) => (said += more) };
    expect([words, await main([...words, file], { out, err })]).toEqual([words, 2]);
    expect(said).toContain(`a.ipynb: ${message}`);
  }
  expect(readFileSync(file, "utf8")).toBe(text);
  expect(readFileSync(path.join(folder, "a.html"), "utf8")).toBe("an old page");
  expect(readdirSync(folder).sort()).toEqual(["a.html", "a.ipynb"]);
});

it("a notebook of 50 MB is read and written back the same", { timeout: 60_000 }, () => {
  const output = {
    output_type: "stream" as const,
    name: "stdout" as const,
    text: `${"x".repeat(99)}\n`.repeat(500_000),
  };
  const text = serialiseNotebook(notebookOf(code("1", [output])));
  expect(text.length).toBeGreaterThan(50_000_000);
  expect(serialiseNotebook(parseNotebook(text, "a.ipynb")) === text).toBe(true);
});
