import fc from "fast-check";
import { afterAll, beforeAll, expect, it } from "vitest";
import { summary } from "../client.ts";
import { startTestKernel, type TestKernel } from "./harness.ts";

let test: TestKernel;
beforeAll(async () => {
  test = await startTestKernel();
});
afterAll(() => test.stop());

/** Names that some handler reads, so that random values land where they are looked at. */
const NAMES = ["code", "cursor_pos", "detail_level", "silent", "store_history", "user_expressions", "allow_stdin"]
  .concat(["stop_on_error", "hist_access_type", "n", "session", "start", "stop", "pattern", "unique", "output", "raw"])
  .concat(["comm_id", "target_name", "data", "__proto__", "constructor"]);
const TYPES = ["execute", "complete", "inspect", "is_complete", "history", "comm_info", "kernel_info", "interrupt"];

const value = fc.oneof(
  fc.jsonValue({ maxDepth: 3 }),
  fc.double({ noDefaultInfinity: true, noNaN: true }),
  fc.constantFrom("tail", "range", "search", "value 1", "print a😀", "fail", "", "\ud800", "*?[(", 1e300, -1, 0.5),
);
const content = fc.dictionary(fc.constantFrom(...NAMES), value, { maxKeys: 8 });

it("whatever a request holds: one reply of its type with a status, busy first, idle last — oracle: protocol", async () => {
  const request = fc.record({ type: fc.constantFrom(...TYPES), content, parent: content, metadata: content });
  await fc.assert(
    fc.asyncProperty(request, async ({ type, content, parent, metadata }) => {
      const header = test.client.header(`${type}_request`);
      await test.client.shell.send(test.client.frames(header, content, { parent, metadata }));
      const { reply, published } = await test.client.exchange(header.msg_id);
      expect(reply.header.msg_type).toBe(`${type}_reply`);
      expect(test.client.replies.filter(({ parent }) => parent.msg_id === header.msg_id).length).toBe(1);
      expect(["ok", "error", "complete", "incomplete", "invalid", "unknown"]).toContain(reply.content.status);
      if (type === "execute") expect(reply.content.execution_count).toEqual(expect.any(Number));
      const states = summary(published);
      expect([states[0], states.at(-1)]).toEqual(["busy", "idle"]);
      test.client.forget();
    }),
    { numRuns: 400, seed: 11 },
  );
});

it("after all that a cell runs as before — oracle: its value", async () => {
  const { published } = await test.client.execute("value 42");
  expect(published.at(-2)?.content.data).toEqual({ "text/plain": "42" });
});
