import { spawn, spawnSync } from "node:child_process";
import { mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { fileURLToPath } from "node:url";
import { afterEach, beforeEach, describe, expect, it } from "vitest";

// The command as a person runs it, with the real kernel behind it.
const bin = fileURLToPath(new URL("../../../kernel/bin/halfperiod.mjs", import.meta.url));
const halfperiod = (...args: string[]) => {
  const { status, stdout, stderr } = spawnSync(process.execPath, [bin, ...args], { encoding: "utf8", cwd: folder });
  return { status, stdout, stderr };
};

let folder: string;
beforeEach(() => {
  folder = mkdtempSync(path.join(os.tmpdir(), "halfperiod-whole-"));
});
afterEach(() => rmSync(folder, { recursive: true, force: true }));

const write = (name: string, ...sources: string[]) => {
  const cells = sources.map((source, index) => ({
    cell_type: "code",
    id: `c${index}`,
    metadata: {},
    source,
    execution_count: null,
    outputs: [],
  }));
  const file = path.join(folder, name);
  writeFileSync(file, JSON.stringify({ nbformat: 4, nbformat_minor: 5, metadata: {}, cells }));
  return file;
};
const read = (file: string) => readFileSync(file, "utf8");

describe("halfperiod run, check and export with the real kernel", { timeout: 240_000 }, () => {
  it("runs in the notebook's folder, stores what it gave, and check finds the same", () => {
    writeFileSync(path.join(folder, "beside.txt"), "7");
    const file = write(
      "a.ipynb",
      'import { readFileSync } from "node:fs";\nconsole.log("said");\nconst seven = Number(readFileSync("beside.txt", "utf8"));',
      "seven * 6",
    );
    expect(halfperiod("run", "a.ipynb")).toMatchObject({
      status: 0,
      stdout: expect.stringContaining("a.ipynb: 2 cells in"),
    });
    const stored = JSON.parse(read(file));
    expect(stored.cells[0].outputs).toEqual([{ name: "stdout", output_type: "stream", text: ["said\n"] }]);
    expect(stored.cells[1].outputs[0].data["text/plain"]).toEqual(["42"]);
    expect(stored.metadata).toMatchObject({ kernelspec: { name: "halfperiod" }, halfperiod: { edition: "1" } });

    const before = read(file);
    expect(halfperiod("check", "a.ipynb")).toMatchObject({ status: 0, stdout: "a.ipynb: stands (2 cells: 2 same)\n" });
    expect(read(file)).toBe(before);
    expect(halfperiod("export", "a.ipynb")).toMatchObject({ status: 0 });
    expect(read(path.join(folder, "a.html"))).toContain("42");
  });

  it("shows the cell that fails, exits with 1 and leaves the file and its folder as they were", () => {
    const file = write("a.ipynb", "const a: number = 1", '\nconst b: string = a; // "wrong"', "2");
    const before = read(file);
    const { status, stderr } = halfperiod("run", "a.ipynb");
    expect(status).toBe(1);
    expect(stderr).toContain("a.ipynb: cell 2 of 3: failed");
    expect(stderr).toContain("TS2322");
    expect(read(file)).toBe(before);
    expect(readdirSync(folder)).toEqual(["a.ipynb"]);
  });

  it("checks by value: a changed result does not stand, an edit is told", () => {
    const file = write("a.ipynb", "6n * 7n");
    expect(halfperiod("run", "a.ipynb").status).toBe(0);
    writeFileSync(file, read(file).replace("6n * 7n", "6n * 8n"));
    const { status, stdout } = halfperiod("check", "a.ipynb", "--report", "r.json");
    expect(status).toBe(1);
    expect(stdout).toContain("a.ipynb: does not stand (1 cells: 1 differs)");
    expect(stdout).toContain("the code was edited after the stored run");
    expect(JSON.parse(read(path.join(folder, "r.json")))).toMatchObject([
      { finding: "differs", cells: [{ position: 1 }] },
    ]);
  });

  it("asks for other digits than the notebook: fewer are the same, not weaker; more are more", () => {
    write("a.ipynb", "provedDigits(40); π.div(3)");
    const more = halfperiod("run", "a.ipynb", "--digits", "70");
    expect(more).toMatchObject({ status: 0, stdout: expect.stringMatching(/1 with [78]\d or more/) });
    const fewer = halfperiod("check", "a.ipynb", "--digits", "25");
    expect(fewer).toMatchObject({ status: 0, stdout: expect.stringContaining("a.ipynb: stands (1 cells: 1 same)\n") });
    expect(fewer.stdout).toContain("proved digits: 70 (asked for at the run) then, 25 (asked for at the run) now");
    const asWritten = halfperiod("check", "a.ipynb");
    expect(asWritten).toMatchObject({ status: 1, stdout: expect.stringContaining("digits are proved, ") });
  });

  it("stops on Ctrl-C in an endless cell, says so, writes nothing, leaves no process", async () => {
    const file = write("a.ipynb", "1", "while (true) {}");
    const before = read(file);
    const child = spawn(process.execPath, [bin, "run", "a.ipynb"], {
      cwd: folder,
      stdio: ["ignore", "ignore", "pipe"],
    });
    let said = "";
    const second = new Promise<void>((resolve) => {
      child.stderr.setEncoding("utf8").on("data", (text) => {
        said += text;
        if (said.includes("cell 1 of 2")) resolve();
      });
    });
    await second;
    const kernels = childrenOf(child.pid ?? 0);
    child.kill("SIGINT");
    const code = await new Promise((resolve) => child.on("exit", resolve));
    expect(code).toBe(130);
    expect(said).toContain("interrupted; nothing was written");
    expect(read(file)).toBe(before);
    expect(kernels.filter(isAlive)).toEqual([]);
  });
});

function childrenOf(pid: number): number[] {
  if (process.platform !== "linux") return [];
  return read(`/proc/${pid}/task/${pid}/children`).trim().split(/\s+/).filter(Boolean).map(Number);
}

function isAlive(pid: number): boolean {
  try {
    process.kill(pid, 0);
    return true;
  } catch {
    return false;
  }
}
