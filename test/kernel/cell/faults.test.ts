// Faults that end the process of the cells: the session goes on, and says what happened.
import { spawnSync } from "node:child_process";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { TestNotebook } from "./notebook.ts";

let notebook: TestNotebook;
beforeAll(() => {
  notebook = new TestNotebook({ memoryLimit: 96 });
});
afterAll(() => notebook.session.shutdown());

/** State letter of a process; a dead one may wait for its collector as Z. */
function stateOf(pid: number): string {
  const told = spawnSync("ps", ["-o", "stat=", "-p", String(pid)], { encoding: "utf8" }).stdout.trim();
  return told === "" ? "gone" : told.slice(0, 1);
}

describe("faults", () => {
  it.each([
    ["process.exit(3)", "the cell called process.exit(3)"],
    ["process.abort()", "the cell called process.abort()"],
    ["process.kill(process.pid, 'SIGSEGV'); for (;;) {}", "SIGSEGV"],
    ["const hog: number[][] = []; for (;;) hog.push(new Array(100000).fill(1.5))", "ran out of memory"],
  ])("%s", async (code, words) => {
    await notebook.run("let held = 1");
    const error = await notebook.error(code);
    expect(error).toContain("SessionEnded");
    expect(error).toContain(words);
    expect(error).toContain("variables are lost");
    expect(await notebook.error("held")).toContain("TS2304");
    expect(await notebook.value("let held = 2; held")).toBe("2");
  });

  it("a print of 100 MB arrives whole, and the memory of the kernel's side does not keep it", async () => {
    let bytes = 0;
    const other = new TestNotebook({
      onText: (text) => {
        bytes += text.length;
      },
    });
    expect(await other.value("for (let k = 0; k < 10; k++) process.stdout.write('x'.repeat(1e7)); 1")).toBe("1");
    expect(bytes).toBe(1e8);
    await other.session.shutdown();
  });

  it("a slow reader holds an endless print back, and it can be interrupted", async () => {
    let taken = 0;
    const other = new TestNotebook({
      onText: (text) => {
        taken += text.length;
        return new Promise((resolve) => setTimeout(resolve, 20));
      },
    });
    const running = other.run("for (;;) console.log('x'.repeat(1e6))");
    await new Promise((resolve) => setTimeout(resolve, 4000));
    other.session.interrupt();
    expect(await running).toMatchObject({ status: "error" });
    expect(taken).toBeLessThan(1e9);
    await other.session.shutdown();
  });

  it("a child that floods does not hang the session", async () => {
    const code =
      "import { spawnSync } from 'node:child_process'; spawnSync('head', ['-c', '3000000', '/dev/zero'], { stdio: 'inherit' }).status";
    expect(await notebook.value(code)).toBe("0");
  });

  it("process.chdir and a closed stdout harm no later cell", async () => {
    await notebook.run("process.chdir('/'); process.stdout.end(); import { closeSync } from 'node:fs'; closeSync(1)");
    // The runtime reads the size of the process from a file: with descriptor 1 free that would end it.
    expect(await notebook.value("process.memoryUsage.rss() > 0")).toBe("true");
    expect(await notebook.value("console.log('still'); 5")).toBe("5");
    expect(notebook.output("stdout", notebook.last)).toBe("still\n");
  });

  it("shutdown ends the children of cells", async () => {
    const other = new TestNotebook();
    const pid = Number(await other.value("import { spawn } from 'node:child_process'; spawn('sleep', ['1000']).pid"));
    await other.session.shutdown();
    while (!/^(gone|Z)$/.test(stateOf(pid))) await new Promise((resolve) => setTimeout(resolve, 10));
  });
});
