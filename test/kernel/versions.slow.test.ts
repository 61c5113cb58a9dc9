import { spawn, spawnSync } from "node:child_process";
import { existsSync, mkdirSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { fileURLToPath } from "node:url";
import { expect, it } from "vitest";

const root = fileURLToPath(new URL("../../", import.meta.url));

/** The binary of a major version of Node, from the package that carries it. Kept for the next run. */
function nodeOf(major: number): string {
  const folder = path.join(tmpdir(), `halfperiod-node-${major}`);
  const binary = path.join(folder, "node_modules", "node", "bin", "node");
  if (!existsSync(binary)) {
    mkdirSync(folder, { recursive: true });
    const words = ["install", "--no-audit", "--no-fund", "--no-save", "--prefix", folder, `node@${major}`];
    const { status, stderr } = spawnSync("npm", words, { encoding: "utf8", cwd: folder });
    if (status !== 0) throw new Error(`npm ${words.join(" ")}\n${stderr}`);
  }
  return binary;
}

/** Runs the kernel's tests of the common suite; they start their kernels with the Node that they run on. */
function kernelTests(node: string): Promise<{ readonly code: number | null; readonly text: string }> {
  const words = [path.join(root, "node_modules/vitest/vitest.mjs"), "run", "--project", "common", "test/kernel"];
  const child = spawn(node, words, {
    cwd: root,
    stdio: ["ignore", "pipe", "pipe"],
    env: { ...process.env, VITEST: "" },
  });
  let text = "";
  for (const stream of [child.stdout, child.stderr]) {
    stream.setEncoding("utf8").on("data", (more) => {
      text += more;
    });
  }
  return new Promise((resolve) => child.on("close", (code) => resolve({ code, text })));
}

it.each([22, 24, 26])("the kernel's tests pass on Node %i — oracle: the same tests", async (major) => {
  const node = nodeOf(major);
  expect(spawnSync(node, ["--version"], { encoding: "utf8" }).stdout).toMatch(new RegExp(`^v${major}\\.`));
  const { code, text } = await kernelTests(node);
  expect(code, text.slice(-6000)).toBe(0);
  expect(text).toMatch(/Tests .*\d+ passed/);
});
