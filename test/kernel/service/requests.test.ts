import { afterAll, beforeAll, expect, it } from "vitest";
import { summary } from "../client.ts";
import { startTestKernel, type TestKernel } from "./harness.ts";

let test: TestKernel;
beforeAll(async () => {
  test = await startTestKernel();
});
afterAll(() => test.stop());

it.each(["shell", "control"] as const)(
  "kernel_info on %s — oracle: protocol 5.5, fields of the reply",
  async (channel) => {
    const { reply, published } = await test.client.request(channel, "kernel_info_request");
    expect(reply.header).toMatchObject({ msg_type: "kernel_info_reply", version: "5.5" });
    expect(reply.content).toMatchObject({
      status: "ok",
      protocol_version: "5.5",
      implementation: "halfperiod",
      implementation_version: expect.stringMatching(/^\d+\.\d+\.\d+$/),
      language_info: {
        name: "typescript",
        version: expect.stringMatching(/^\d+\.\d+/),
        mimetype: "text/typescript",
        file_extension: ".ts",
        pygments_lexer: "typescript",
        codemirror_mode: { name: "javascript", typescript: true },
        nbconvert_exporter: "script",
      },
      supported_features: [],
      debugger: false,
    });
    expect(reply.content.banner).toContain("halfperiod");
    for (const link of reply.content.help_links) expect(new URL(link.url).protocol).toBe("https:");
    expect(summary(published)).toEqual(["busy", "idle"]);
  },
);

it("every header has its six fields as strings, an own msg_id and one session — oracle: protocol", async () => {
  await test.client.execute("print a\nvalue 1");
  const all = [...test.client.published, ...test.client.replies];
  for (const { header } of all) {
    for (const name of ["msg_id", "session", "username", "date", "msg_type", "version"]) {
      expect(header[name]).toEqual(expect.any(String));
    }
    expect(String(header.date)).toMatch(/^\d{4}-\d\d-\d\dT[\d:.]+Z$/);
  }
  expect(new Set(all.map(({ header }) => header.msg_id)).size).toBe(all.length);
  expect(new Set(all.map(({ header }) => header.session)).size).toBe(1);
});

it("on iopub one frame stands before the delimiter, the topic — oracle: protocol", async () => {
  const { published } = await test.client.execute("print a");
  expect(published.map(({ prefix }) => prefix.map(String))).toEqual([
    ["status"],
    ["execute_input"],
    ["stream.stdout"],
    ["status"],
  ]);
});

it("completion behind emoji and mathematical letters — oracle: code points counted by hand", async () => {
  const code = '"😀𝔼" + L.per';
  const { reply } = await test.client.request("shell", "complete_request", { code, cursor_pos: 12 });
  expect(reply.content).toEqual({
    status: "ok",
    matches: ["periods", "𝜏"],
    cursor_start: 9,
    cursor_end: 12,
    metadata: {
      _jupyter_types_experimental: [
        { text: "periods", type: "property", signature: "readonly [ω1, ω2]", start: 9, end: 12 },
        { text: "𝜏", type: "variable", start: 9, end: 12 },
      ],
    },
  });
});

it.each([[-3], [1e300], [2.7], ["x"], [undefined], [null]])(
  "cursor_pos %j is moved to a place that exists — oracle: protocol, clamp and answer",
  async (cursor_pos) => {
    for (const type of ["complete_request", "inspect_request"]) {
      const { reply, published } = await test.client.request("shell", type, { code: "a😀b", cursor_pos });
      expect(reply.content.status).toBe("ok");
      expect(summary(published)).toEqual(["busy", "idle"]);
      if (type === "complete_request") expect(reply.content.cursor_end).toBeLessThanOrEqual(3);
    }
  },
);

it("inspection converts the cursor and says when it finds nothing — oracle: code points counted by hand", async () => {
  const ask = async (code: string, cursor_pos: number, detail_level?: number) =>
    (await test.client.request("shell", "inspect_request", { code, cursor_pos, detail_level })).reply.content;
  expect(await ask("😀 wp", 4, 1)).toEqual({
    status: "ok",
    found: true,
    data: { "text/plain": "wp at 5, detail 1" },
    metadata: {},
  });
  expect(await ask(" ", 1)).toEqual({ status: "ok", found: false, data: {}, metadata: {} });
});

it("is_complete gives an indent with incomplete only — oracle: protocol", async () => {
  const ask = async (code: string) =>
    (await test.client.request("shell", "is_complete_request", { code })).reply.content;
  expect(await ask("for (;;) {")).toEqual({ status: "incomplete", indent: "  " });
  expect(await ask("1")).toEqual({ status: "complete" });
});

it("no comm is open; an unknown target is closed at once — oracle: protocol, comms", async () => {
  const info = await test.client.request("shell", "comm_info_request", { target_name: "x" });
  expect(info.reply.content).toEqual({ status: "ok", comms: {} });
  const id = await test.client.send("shell", "comm_open", { comm_id: "c1", target_name: "none", data: {} });
  await test.client.idle(id);
  expect(summary(test.client.of(id))).toEqual(["busy", "comm_close", "idle"]);
  expect(test.client.of(id)[1]?.content).toEqual({ comm_id: "c1", data: {} });
  for (const type of ["comm_msg", "comm_close"]) {
    const other = await test.client.send("shell", type, { comm_id: "c9", data: {} });
    await test.client.idle(other);
    expect(summary(test.client.of(other))).toEqual(["busy", "idle"]);
  }
});

it.each(["__proto__", "constructor", "toString", "unheard_request", "debug_request", ""])(
  "type %j is tolerated on shell and control: busy, idle, no reply — oracle: protocol",
  async (type) => {
    for (const channel of ["shell", "control"] as const) {
      const id = await test.client.send(channel, type, {});
      await test.client.idle(id);
      expect(summary(test.client.of(id))).toEqual(["busy", "idle"]);
      expect(test.client.replies.some(({ parent }) => parent.msg_id === id)).toBe(false);
    }
  },
);

it("the heartbeat comes back byte for byte — oracle: what was sent", async () => {
  for (const text of ["ping", "", "\0\xff"]) {
    await test.client.heartbeat.send(text);
    expect((await test.client.heartbeat.receive()).map(String)).toEqual([text]);
  }
});

it("control is served while a cell runs — oracle: protocol", async () => {
  const running = await test.client.send("shell", "execute_request", { code: "hang" });
  const { reply } = await test.client.request("control", "kernel_info_request");
  expect(reply.content.status).toBe("ok");
  expect(test.client.replies.some(({ parent }) => parent.msg_id === running)).toBe(false);
  await test.client.request("control", "interrupt_request");
  await test.client.exchange(running);
});

it("every identity frame and buffer of a request is taken, and the reply finds its way — oracle: protocol", async () => {
  const header = test.client.header("kernel_info_request");
  const frames = [Buffer.from("via"), Buffer.alloc(0), ...test.client.frames(header, {}), Buffer.from([0, 1, 255])];
  await test.client.shell.send(frames);
  const { reply } = await test.client.exchange(header.msg_id);
  expect(reply.prefix.map(String)).toEqual(["via", ""]);
});

it("a second client is welcomed and sees what the first one does — oracle: protocol, XPUB in verbose mode", async () => {
  const other = await test.another();
  expect(other.published[0]?.header.msg_type).toBe("iopub_welcome");
  expect(other.published[0]?.content).toEqual({ subscription: "" });
  expect(other.published[0]?.prefix.map(String)).toEqual([""]);
  expect(other.published[0]?.parent).toEqual({});
  const { id } = await test.client.execute("value 7");
  await other.idle(id);
  expect(summary(other.of(id))).toEqual(["busy", "execute_input", "execute_result", "idle"]);
});

it("requests sent back to back are served one at a time, in order: no state overlaps — oracle: protocol", async () => {
  const { client } = test;
  const kinds = ["execute", "complete", "is_complete", "kernel_info", "history", "inspect", "comm_info"] as const;
  const ids: string[] = [];
  for (let n = 0; n < 105; n += 1) {
    const content = { code: "print a\nvalue 1", cursor_pos: 3, hist_access_type: "tail" };
    ids.push(await client.send("shell", `${kinds[n % kinds.length]}_request`, content));
  }
  await client.exchange(ids.at(-1) as string);
  const states = client.published.filter(({ parent }) => ids.includes(String(parent.msg_id)) && parent.msg_type);
  const heard = states.flatMap(({ parent, content }) =>
    content.execution_state ? [[parent.msg_id, content.execution_state]] : [],
  );
  expect(heard).toEqual(
    ids.flatMap((id) => [
      [id, "busy"],
      [id, "idle"],
    ]),
  );
  const answered = client.replies.flatMap(({ parent }) => (ids.includes(String(parent.msg_id)) ? [parent.msg_id] : []));
  expect(answered).toEqual(ids);
});
