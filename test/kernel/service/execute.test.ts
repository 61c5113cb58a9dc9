import { afterAll, beforeAll, expect, it } from "vitest";
import { startKernel } from "../../../kernel/service/kernel.ts";
import { parseConnection } from "../../../kernel/wire/connection.ts";
import { Client, freeConnection, summary } from "../client.ts";
import { FakeCells } from "./fake_cells.ts";
import { startTestKernel, type TestKernel } from "./harness.ts";

let test: TestKernel;
beforeAll(async () => {
  test = await startTestKernel();
});
afterAll(() => test.stop());

const hasBegun = async (cells: number) => {
  while (test.cells.requests.length < cells) await new Promise((resolve) => setTimeout(resolve, 1));
};
const texts = (published: readonly { content: Record<string, unknown> }[], name: string) =>
  published.flatMap(({ content }) => (content.name === name ? [content.text] : []));

it("publishes busy, the code, text, result, idle in this order — oracle: protocol, order of one request", async () => {
  const { reply, published } = await test.client.execute("print one\nvalue 2");
  expect(summary(published)).toEqual(["busy", "execute_input", "stream", "execute_result", "idle"]);
  const [, input, stream, result] = published;
  expect(input?.content).toEqual({ code: "print one\nvalue 2", execution_count: reply.content.execution_count });
  expect(stream?.content).toEqual({ name: "stdout", text: "one" });
  expect(result?.content).toEqual({
    execution_count: reply.content.execution_count,
    data: { "text/plain": "2" },
    metadata: {},
  });
  expect(reply.header.msg_type).toBe("execute_reply");
  expect(reply.content).toEqual({
    status: "ok",
    execution_count: expect.any(Number),
    payload: [],
    user_expressions: {},
  });
  expect(Date.parse(String(reply.metadata.started))).toBeGreaterThan(Date.now() - 60_000);
});

it("gives the complete header of the request back as parent, unknown fields included — oracle: protocol", async () => {
  const header = { ...test.client.header("execute_request"), subshell_id: null, more: { α: 12345678901 } };
  await test.client.shell.send(test.client.frames(header, { code: "value 1" }));
  const { reply, published } = await test.client.exchange(header.msg_id);
  expect(reply.parent).toEqual(header);
  for (const message of published) expect(message.parent).toEqual(header);
});

it("counts stored cells only, failed ones too — oracle: protocol, execution counter", async () => {
  const count = async (code: string, options = {}) =>
    (await test.client.execute(code, options)).reply.content.execution_count;
  const first = await count("value 1");
  expect(await count("value 1", { store_history: false })).toBe(first);
  expect(await count("value 1", { silent: true, store_history: true })).toBe(first);
  expect(await count("", { silent: true })).toBe(first);
  expect(await count("fail x")).toBe(first + 1);
  expect(await count("")).toBe(first + 2);
});

it("a failed cell publishes one error with the fields of the reply and no more — oracle: protocol", async () => {
  const { reply, published } = await test.client.execute("warn oh\nfail no such root");
  expect(summary(published)).toEqual(["busy", "execute_input", "stream", "error", "idle"]);
  const fault = { ename: "Error", evalue: "no such root", traceback: ["Error: no such root"] };
  expect(published[3]?.content).toEqual(fault);
  expect(reply.content).toEqual({ status: "error", execution_count: expect.any(Number), ...fault });
});

it("a silent cell publishes nothing but busy and idle, and its error is in the reply — oracle: protocol", async () => {
  const quiet = await test.client.execute("print x\nshow y\nvalue 1", { silent: true });
  expect(summary(quiet.published)).toEqual(["busy", "idle"]);
  const failed = await test.client.execute("fail z", { silent: true });
  expect(summary(failed.published)).toEqual(["busy", "idle"]);
  expect(failed.reply.content).toMatchObject({ status: "error", evalue: "z" });
});

it("evaluates user expressions one by one after success — oracle: protocol", async () => {
  const { reply } = await test.client.execute("value 1", { user_expressions: { good: "ω1", wrong: "bad", odd: 7 } });
  expect(reply.content.user_expressions).toEqual({
    good: { status: "ok", data: { "text/plain": "ω1" }, metadata: {} },
    wrong: { status: "error", ename: "ReferenceError", evalue: "bad", traceback: [] },
  });
});

it("after a failure every cell that has arrived is answered unrun, others are served — oracle: protocol", async () => {
  const { client, cells } = test;
  const before = cells.requests.length;
  const [failing, next, between, last] = await test.taken("shell", 4, async () => [
    await client.send("shell", "execute_request", { code: "hold\nfail first" }),
    await client.send("shell", "execute_request", { code: "value 1" }),
    await client.send("shell", "kernel_info_request", {}),
    await client.send("shell", "execute_request", { code: "value 2", stop_on_error: false }),
  ]);
  await hasBegun(before + 1);
  cells.release();
  const failed = await client.exchange(failing);
  for (const id of [next, last]) {
    const { reply, published } = await client.exchange(id);
    expect(reply.content).toEqual({
      status: "error",
      ename: "Aborted",
      evalue: "not run, as a cell before it failed",
      traceback: [],
      execution_count: failed.reply.content.execution_count,
    });
    expect(summary(published)).toEqual(["busy", "idle"]);
  }
  expect((await client.exchange(between)).reply.content.status).toBe("ok");
  expect(cells.requests.length).toBe(before + 1);
});

it("a cell sent when the failure's reply is in always runs — oracle: protocol, no time window", async () => {
  for (let turn = 0; turn < 30; turn += 1) {
    const id = await test.client.send("shell", "execute_request", { code: "fail" });
    await test.client.until(() => test.client.replies.find(({ parent }) => parent.msg_id === id));
    expect((await test.client.execute("value 1")).reply.content.status).toBe("ok");
  }
});

it("with stop_on_error false the queue goes on, and a silent failure stops nothing — oracle: protocol", async () => {
  for (const options of [{ stop_on_error: false }, { silent: true }]) {
    const before = test.cells.requests.length;
    const [failing, next] = await test.taken("shell", 2, async () => [
      await test.client.send("shell", "execute_request", { code: "hold\nfail", ...options }),
      await test.client.send("shell", "execute_request", { code: "value 5" }),
    ]);
    await hasBegun(before + 1);
    test.cells.release();
    expect((await test.client.exchange(failing)).reply.content.status).toBe("error");
    expect((await test.client.exchange(next)).reply.content.status).toBe("ok");
  }
});

it("displays, updates and clears in order with the text around them — oracle: order of the cell", async () => {
  const { published } = await test.client.execute("print a\nshow 1\nprint b\nclear\nupdate 2\nprint c");
  expect(summary(published).slice(2, -1)).toEqual([
    "stream",
    "display_data",
    "stream",
    "clear_output",
    "update_display_data",
    "stream",
  ]);
  expect(published[3]?.content).toEqual({
    data: { "text/plain": "1" },
    metadata: {},
    transient: { display_id: "d1" },
  });
  expect(published[5]?.content).toEqual({ wait: true });
  expect(published[6]?.content.transient).toEqual({ display_id: "d1" });
});

it("what a cell shows aside and proposes is in the reply, one proposal at most — oracle: protocol, payloads", async () => {
  const payload = async (code: string, options = {}) =>
    (await test.client.execute(code, options)).reply.content.payload;
  expect(await payload("page one\npropose a\npage two\nreplace b")).toEqual([
    { source: "page", data: { "text/plain": "one\n\ntwo" }, start: 0 },
    { source: "set_next_input", text: "b", replace: true },
  ]);
  expect(await payload("value 1")).toEqual([]);
  expect(await payload("page one\npropose a", { silent: true })).toEqual([]);
  const { published } = await test.client.execute("page one\npropose a");
  expect(summary(published)).toEqual(["busy", "execute_input", "idle"]);
  const failed = await test.client.execute("page one\nfail");
  expect(summary(failed.published)).toEqual(["busy", "execute_input", "display_data", "error", "idle"]);
  const many = await test.client.execute("page one\n".repeat(60));
  expect(many.reply.content.payload.length).toBe(1);
  expect(many.reply.content.payload[0].data["text/plain"].match(/one/g).length).toBe(50);
  expect(summary(many.published).filter((kind) => kind === "display_data").length).toBe(10);
});

it("late text goes to the cell that started it, with no new busy — oracle: protocol", async () => {
  const before = test.cells.requests.length;
  const starter = await test.client.execute("later tick");
  const id = await test.client.send("shell", "execute_request", { code: "hold\nprint own" });
  await hasBegun(before + 2);
  await test.cells.timers();
  test.cells.release();
  const other = await test.client.exchange(id);
  expect(texts(test.client.of(starter.id), "stdout")).toEqual(["tick"]);
  expect(texts(test.client.of(other.id), "stdout")).toEqual(["own"]);
  expect(summary(test.client.of(starter.id))).toEqual(["busy", "execute_input", "idle", "stream"]);
});

it.each([[{}], [{ code: 7 }], [{ code: null }], [{ code: ["a"] }]])(
  "content %j: an error reply with the counter, then idle — oracle: a reply and an idle on every path",
  async (content) => {
    const { reply, published } = await test.client.request("shell", "execute_request", content);
    expect(reply.content).toMatchObject({ status: "error", ename: "ProtocolError", traceback: [] });
    expect(reply.content.execution_count).toEqual(expect.any(Number));
    expect(summary(published)).toEqual(["busy", "idle"]);
  },
);

it("the interrupt ends the running cell and stops the queue — oracle: protocol, interrupt", async () => {
  const [running, queued] = await test.taken("shell", 2, async () => [
    await test.client.send("shell", "execute_request", { code: "hang" }),
    await test.client.send("shell", "execute_request", { code: "value 1" }),
  ]);
  await test.client.until(() => summary(test.client.of(running)).includes("execute_input"));
  const interrupt = await test.client.request("control", "interrupt_request");
  expect(interrupt.reply.content).toEqual({ status: "ok" });
  expect(summary(interrupt.published)).toEqual(["busy", "idle"]);
  expect((await test.client.exchange(running)).reply.content.ename).toBe("Interrupted");
  expect((await test.client.exchange(queued)).reply.content.ename).toBe("Aborted");
  expect((await test.client.execute("value 3")).reply.content.status).toBe("ok");
});

it("output that is no JSON costs its cell, not the kernel — oracle: one error, its reply with the counter, idle", async () => {
  const shown = await test.client.execute("oddly\nvalue 1");
  expect(shown.reply.content.status).toBe("ok");
  const result = await test.client.execute("odd");
  const count = shown.reply.content.execution_count + 1;
  expect(result.reply.content).toMatchObject({ status: "error", ename: "TypeError", execution_count: count });
  expect(summary(result.published)).toEqual(["busy", "execute_input", "error", "idle"]);
  expect((await test.client.execute("value 2")).reply.content.status).toBe("ok");
});

it("an interrupt while the cell is on its way stops it before it runs — oracle: no listener yet, nothing ran", async () => {
  const fields = await freeConnection();
  const ran: string[] = [];
  const kernel = await startKernel(parseConnection(JSON.stringify(fields), "k.json"), {
    createCells: async (options) => {
      const cells = new FakeCells(options);
      const execute = cells.execute.bind(cells);
      cells.execute = (request) => {
        ran.push(request.code);
        return execute(request);
      };
      return cells;
    },
    audience: 600_000, // the first cell waits for a listener, which does not come
  });
  const client = await new Client(fields).connect({ listen: false });
  const id = await client.send("shell", "execute_request", { code: "value 1" });
  const answered = () => client.replies.find(({ parent }) => parent.msg_id === id);
  // Which of two sockets is read first is open, and an interrupt that comes before the cell means another one.
  for (let count = 0; !answered(); count = client.replies.length) {
    await client.send("control", "interrupt_request", {});
    await client.until(() => client.replies.length > count);
  }
  const reply = await client.until(answered);
  expect(reply.content).toMatchObject({ status: "error", ename: "Interrupted", execution_count: 1 });
  expect(ran).toEqual([]);
  client.close();
  kernel.end();
  await kernel.ended;
});
