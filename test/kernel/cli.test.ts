import { spawnSync } from "node:child_process";
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { fileURLToPath } from "node:url";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { main } from "../../kernel/cli.ts";

const words = async (...args: string[]) => {
  let [out, err] = ["", ""];
  const code = await main(args, { out: { write: (t) => (out += t) }, err: { write: (t) => (err += t) } });
  return { code, out, err };
};

let folder: string;
beforeEach(() => {
  folder = mkdtempSync(path.join(os.tmpdir(), "halfperiod-cli-"));
});
afterEach(() => rmSync(folder, { recursive: true, force: true }));
const file = (name: string, text: string) => {
  writeFileSync(path.join(folder, name), text);
  return path.join(folder, name);
};
const notebook = (...cells: object[]) => JSON.stringify({ nbformat: 4, nbformat_minor: 5, metadata: {}, cells });
const markdown = { cell_type: "markdown", id: "m", metadata: {}, source: "# A $\\wp$ of its own" };

describe("the command", () => {
  it("shows every verb alone, on --help, and none that is not there", async () => {
    const { code, out } = await words();
    expect(code).toBe(0);
    for (const verb of ["demo", "run", "export", "install", "remove"]) expect(out).toContain(`halfperiod ${verb}`);
    expect(await words("--help")).toEqual({ code: 0, out, err: "" });
    expect(await words("run", "--help")).toMatchObject({
      code: 0,
      out: expect.stringContaining("halfperiod run NOTEBOOK"),
    });
    expect(await words("install", "--help")).toMatchObject({ code: 0, out: expect.stringContaining("--at DIR  ") });
    expect(await words("--version")).toMatchObject({ code: 0, out: "0.1.0\n" });
  });

  it.each([
    [["walk"], 'no command "walk"; expected demo, run'],
    [["constructor"], 'no command "constructor"'],
    [["run"], "no notebook given\nusage: halfperiod run"],
    [["run", "--loud", "a.ipynb"], "Unknown option '--loud'\nusage: halfperiod run"],
    [["run", "a.ipynb", "--limit", "-3"], "--limit"],
    [["run", "/no/such.ipynb"], "/no/such.ipynb: no such file"],
    [["export", "a.ipynb", "--as", "parchment"], "--as parchment; expected html"],
    [["export", "a.ipynb", "b.ipynb"], "one notebook is expected"],
  ])("refuses %j in one line, without a stack", async (args, message) => {
    const { code, err } = await words(...args);
    expect(code).toBe(2);
    expect(err).toContain(message);
    expect(err).not.toMatch(/\n\s+at /);
  });

  it("exports a stored notebook as a page beside it, running nothing", async () => {
    const source = file("a.ipynb", notebook(markdown));
    const { code, out } = await words("export", source);
    expect({ code, out }).toEqual({ code: 0, out: `${path.join(folder, "a.html")}\n` });
    expect(readFileSync(path.join(folder, "a.html"), "utf8")).toContain("<math");
  });

  it("leaves a notebook that it cannot read as it was", async () => {
    const source = file("old.ipynb", JSON.stringify({ nbformat: 3, worksheets: [] }));
    expect(await words("run", source)).toMatchObject({ code: 2, err: expect.stringContaining("format 3") });
    expect(readFileSync(source, "utf8")).toBe(JSON.stringify({ nbformat: 3, worksheets: [] }));
  });

  it("is linked under its own name, runs from any folder and passes its exit code on", () => {
    const bin = fileURLToPath(new URL("../../kernel/bin/halfperiod.mjs", import.meta.url));
    const { status, stdout } = spawnSync(process.execPath, [bin, "--version"], { cwd: folder, encoding: "utf8" });
    expect({ status, stdout }).toEqual({ status: 0, stdout: "0.1.0\n" });
    expect(spawnSync(process.execPath, [bin, "walk"], { cwd: folder }).status).toBe(2);
  });
});
