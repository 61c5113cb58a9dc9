// Further ways to go on for ever: each ends by the limit of time (or of memory), and the next cell runs.
import { afterAll, beforeAll, expect, it } from "vitest";
import { TestNotebook } from "../notebook.ts";

let notebook: TestNotebook;
beforeAll(() => {
  notebook = new TestNotebook({ confined: { time: 4000, memory: 500 } });
});
afterAll(() => notebook.session.shutdown());

it.each([
  ["a loop after an await", "await null; for (;;) {}", /took longer than 4 s/],
  [
    "a storm of promises",
    "const storm = (): any => Promise.resolve().then(storm); await storm()",
    /took longer than 4 s|more memory/,
  ],
  ["an expression that backtracks", "/^(a+)+$/.test('a'.repeat(60) + 'b')", /took longer than 4 s/],
  ["waiting for ever", "await new Promise(() => {})", /took longer than 4 s/],
])("%s", async (_, code, reason) => {
  expect(await notebook.error(code)).toMatch(reason);
  // The next cell runs, however long a busy machine takes to start its process.
  while ((await notebook.run("1 + 1")).status === "error");
});
