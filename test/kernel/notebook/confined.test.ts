import { spawnSync } from "node:child_process";
import { existsSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import net from "node:net";
import os from "node:os";
import path from "node:path";
import { fileURLToPath } from "node:url";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { KernelClient } from "../../../kernel/notebook/client.ts";
import { CONFINED_WORDS, cleanOutputs } from "../../../kernel/notebook/confined.ts";
import { kernelCommand } from "../../../kernel/notebook/launch.ts";

const bin = fileURLToPath(new URL("../../../kernel/bin/halfperiod.mjs", import.meta.url));
let folder: string;
beforeEach(() => {
  folder = mkdtempSync(path.join(os.tmpdir(), "halfperiod-confined-"));
});
afterEach(() => rmSync(folder, { recursive: true, force: true }));

const halfperiod = (...args: string[]) =>
  spawnSync(process.execPath, [bin, ...args], { encoding: "utf8", cwd: folder });
const notebook = (...sources: string[]) => {
  const cells = sources.map((source) => ({
    cell_type: "code",
    metadata: {},
    source,
    execution_count: null,
    outputs: [],
  }));
  const file = path.join(folder, "a.ipynb");
  writeFileSync(file, JSON.stringify({ nbformat: 4, nbformat_minor: 4, metadata: {}, cells }));
  return file;
};

describe("halfperiod run and check, confined", { timeout: 120_000 }, () => {
  it("give what a run without fences gives — oracle: the same notebook, run both ways", () => {
    notebook(
      "const E = curve`y^2 + y = x^3 - 4x`;\nE.lattice()",
      "table([['j', E.j]])",
      "figure.curve(E, {})",
      "'text'",
    );
    expect(halfperiod("run", "a.ipynb", "--confined", "--digits", "30").status).toBe(0);
    expect(halfperiod("check", "a.ipynb", "--digits", "30")).toMatchObject({
      status: 0,
      stdout: "a.ipynb: stands (4 cells: 4 same)\n",
    });
    expect(halfperiod("check", "a.ipynb", "--digits", "30", "--confined")).toMatchObject({
      status: 0,
      stdout: "a.ipynb: stands (4 cells: 4 same)\n",
    });
  });

  it("a cell that writes a file has no file to write, and the run says so", () => {
    const file = notebook('import { writeFileSync } from "node:fs";\nwriteFileSync("made", "x")');
    const before = readFileSync(file, "utf8");
    const { status, stderr } = halfperiod("run", "a.ipynb", "--confined");
    expect(status).toBe(1);
    expect(stderr).toContain('a confined cell can import "halfperiod" alone');
    expect(existsSync(path.join(folder, "made"))).toBe(false);
    expect(readFileSync(file, "utf8")).toBe(before);
    expect(halfperiod("run", "a.ipynb", "--to", "b.ipynb").status).toBe(0);
    expect(existsSync(path.join(folder, "made"))).toBe(true);
  });

  it("says in its help what it is not", () => {
    expect(halfperiod("check", "--help").stdout).toContain(CONFINED_WORDS);
  });

  it("a kernel that gets SIGUSR1 opens no debugger — oracle: its port, and it answers still", async () => {
    const client = await KernelClient.start({ cwd: folder, command: [...kernelCommand(), "--confined"] });
    try {
      process.kill(client.pid, "SIGUSR1");
      expect(await client.execute("1 + 1")).toMatchObject({ status: "ok" });
      const refused = await new Promise((resolve) => {
        const socket = net.connect(9229, "127.0.0.1");
        socket
          .on("connect", () => resolve("open"))
          .on("error", (error) => resolve((error as NodeJS.ErrnoException).code));
      });
      expect(refused).toBe("ECONNREFUSED");
    } finally {
      await client.shutdown();
    }
  });
});

it("what confined cells show is cleaned before it is stored", () => {
  const output = {
    output_type: "display_data" as const,
    data: { "text/html": '<b onclick="x()">1</b><script>x()</script>', "text/plain": "<script>" },
    metadata: {},
  };
  const cell = { cell_type: "code" as const, metadata: {}, source: "", execution_count: 1, outputs: [output] };
  const cleaned = cleanOutputs({ nbformat: 4, nbformat_minor: 5, metadata: {}, cells: [cell] });
  expect(cleaned.cells[0]).toMatchObject({
    outputs: [{ data: { "text/html": "<b>1</b>", "text/plain": "<script>" } }],
  });
});
