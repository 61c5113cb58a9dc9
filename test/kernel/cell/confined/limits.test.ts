// Attacks on the resources: time, memory, output. Each ends the cell with a reason, and the next cell runs.
import { afterAll, beforeAll, expect, it } from "vitest";
import { TestNotebook } from "../notebook.ts";

const LIMITS = { memory: 500, message: 2_000_000, output: 5_000_000 };
let notebook: TestNotebook;
let short: TestNotebook;
beforeAll(() => {
  // So long that a slow machine reaches the other limits first.
  notebook = new TestNotebook({ confined: { time: 100_000, ...LIMITS } });
  short = new TestNotebook({ confined: { time: 3000, ...LIMITS } });
});
afterAll(() => Promise.all([notebook.session.shutdown(), short.session.shutdown()]));

const LATE = { timeout: 120_000 };

it.each([
  [
    "memory on the heap",
    "const all: any[] = []; for (;;) all.push(new Array(1000).fill(1.5))",
    /more memory than the 500 MB|out of memory/,
  ],
  [
    "memory outside the heap",
    "const all = []; for (let k = 0; k < 3000; k++) all.push(new Uint8Array(2 ** 20).fill(k)); for (;;) {}",
    /more memory than the 500 MB/,
  ],
  ["one enormous result", "'x'.repeat(50_000_000)", /output|too large|characters|^$/],
  ["one enormous print", "console.log('x'.repeat(20_000_000))", /more output than/],
  ["endless output", "for (;;) console.log('x'.repeat(1000))", /more output than/],
])("%s", LATE, async (_, code, reason) => {
  const outcome = await notebook.run(code);
  if (outcome.status === "error") expect(outcome.evalue).toMatch(reason);
  // A result that was cut is a way to bear it too.
  else expect(String(outcome.result?.data["text/plain"]).length).toBeLessThan(2_000_000);
  expect(await notebook.value("1 + 1")).toBe("2");
});

it("a loop", LATE, async () => {
  const outcome = await short.run("for (;;) {}");
  expect(outcome).toMatchObject({ status: "error", evalue: expect.stringMatching(/took longer than 3 s/) });
  // The next cell runs, however long a busy machine takes to start its process.
  while ((await short.run("1 + 1")).status === "error");
});

it("an interrupt ends the cell, and says how", LATE, async () => {
  const running = notebook.run("console.log('on'); for (;;) {}");
  await notebook.begun();
  notebook.session.interrupt();
  expect(await running).toMatchObject({
    status: "error",
    ename: "SessionEnded",
    evalue: expect.stringContaining("a confined cell is stopped by ending its process"),
  });
  expect(await notebook.value("1 + 1")).toBe("2");
});
