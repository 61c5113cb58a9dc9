import { connect } from "node:net";
import { afterAll, beforeAll, expect, it } from "vitest";
import { Dealer, Router, Subscriber } from "zeromq";
import { parseConnection } from "../../../kernel/wire/connection.ts";
import { ProtocolError } from "../../../kernel/wire/errors.ts";
import { openWire, type Wire } from "../../../kernel/wire/wire.ts";
import { type ConnectionFields, freeConnection, summary } from "../client.ts";
import { startTestKernel, type TestKernel } from "../service/harness.ts";

let test: TestKernel;
beforeAll(async () => {
  test = await startTestKernel();
});
afterAll(() => test.stop());

/** The kernel answers on shell and control, and nothing was published but what the two questions cause. */
async function unharmed(before: number): Promise<void> {
  for (const channel of ["shell", "control"] as const) {
    expect((await test.client.request(channel, "kernel_info_request")).reply.content.status).toBe("ok");
  }
  const published = summary(test.client.published.slice(before)).filter((word) => word !== "iopub_welcome");
  expect(published).toEqual(["busy", "idle", "busy", "idle"]);
}

it("garbage on every socket changes nothing and stops nothing — oracle: two good requests after it", async () => {
  const before = test.client.published.length;
  const garbage = [[""], ["<IDS|MSG>"], ["a", "<IDS|MSG>", "", "", "", ""], ["<IDS|MSG>", "x", "{", "[", "\xff", "1"]];
  for (const socket of [test.client.shell, test.client.control, test.client.stdin]) {
    for (const frames of garbage) await socket.send(frames);
    await socket.send(Array.from({ length: 300 }, () => "<IDS|MSG>"));
    await socket.send(test.client.frames(test.client.header("shutdown_request"), null));
    await socket.send(test.client.frames(test.client.header("shutdown_request"), [{ restart: false }]));
  }
  await unharmed(before);
});

it("a wrong key, no signature, a changed byte, a replay: no effect — oracle: protocol, security", async () => {
  const { client, cells } = test;
  const executed = cells.requests.length;
  const wrong = client.frames(client.header("execute_request"), { code: "value 1" }, { key: "other" });
  const unsigned = client.frames(client.header("shutdown_request"), { restart: false }, { key: "" });
  const once = client.header("execute_request");
  const good = client.frames(once, { code: "value 2" });
  const before = client.published.length;
  await client.shell.send(wrong);
  await client.control.send(unsigned);
  await client.control.send(client.frames(client.header("shutdown_request"), {}, { key: "other" }));
  await unharmed(before);
  await client.shell.send(good);
  await client.exchange(once.msg_id);
  const after = client.published.length;
  await client.shell.send(good);
  await client.control.send(good);
  await unharmed(after);
  expect(cells.requests.length).toBe(executed + 1);
});

it("raw bytes on the ports, half a greeting, an old greeting: no effect — oracle: two good requests after", async () => {
  const before = test.client.published.length;
  const { shell_port, control_port, iopub_port, hb_port } = test.fields;
  const bytes = [
    Buffer.from("GET / HTTP/1.1\r\n\r\n"),
    Buffer.from([0xff, 0, 0, 0, 0, 0, 0, 0, 1, 0x7f]),
    Buffer.from([0x01, 0x00, 0x06, 0x00, 0x41, 0x42, 0x43, 0x44, 0x45]), // greeting of version 1.0, then one frame
    Buffer.alloc(5000, 0xff),
  ];
  const sockets = [shell_port, control_port, iopub_port, hb_port].flatMap((port) =>
    bytes.map((data) =>
      connect(port, "127.0.0.1", function (this: unknown) {})
        .on("error", () => {})
        .setNoDelay()
        .end(data),
    ),
  );
  await Promise.all(sockets.map((socket) => new Promise((resolve) => socket.once("close", resolve).resume())));
  await unharmed(before);
});

it("two hundred connections that say nothing, and clients that vanish, disturb nobody — oracle: as above", async () => {
  const before = test.client.published.length;
  const silent = Array.from({ length: 200 }, () => connect(test.fields.shell_port, "127.0.0.1").on("error", () => {}));
  for (let n = 0; n < 20; n += 1) {
    const gone = new Dealer({ linger: 20_000, routingId: `gone ${n}` });
    gone.connect(`tcp://127.0.0.1:${test.fields.shell_port}`);
    await gone.send(test.client.frames(test.client.header("history_request"), { hist_access_type: "tail" }));
    gone.close();
  }
  await test.client.until(() => test.client.published.length >= before + 40);
  await unharmed(before + 40);
  for (const socket of silent) socket.destroy();
});

it("a client that comes back with its identity is served — oracle: its reply", async () => {
  for (let turn = 0; turn < 5; turn += 1) {
    const client = new Dealer({ linger: 0, routingId: "the same", receiveTimeout: 20_000 });
    client.connect(`tcp://127.0.0.1:${test.fields.shell_port}`);
    await client.send(test.client.frames(test.client.header("kernel_info_request"), {}));
    expect((await client.receive()).length).toBeGreaterThan(5);
    client.close();
  }
});

it("topics: each subscription is welcomed with its own; one that is no UTF-8 is not — oracle: protocol", async () => {
  const listener = new Subscriber({ linger: 0, receiveTimeout: 20_000 });
  listener.connect(`tcp://127.0.0.1:${test.fields.iopub_port}`);
  listener.subscribe(Buffer.from([0xff, 0xfe]), "stream.stdout", "πsi");
  const topics = [(await listener.receive())[0], (await listener.receive())[0]].map(String);
  expect(topics.sort()).toEqual(["stream.stdout", "πsi"]);
  await test.client.execute("print yes\nvalue 1");
  expect(String((await listener.receive())[0])).toBe("stream.stdout");
  listener.close();
});

it("a taken port is refused in one line and nothing stays open — oracle: the port taken here", async () => {
  const fields = await freeConnection();
  const taken = new Router({ linger: 0 });
  await taken.bind(`tcp://127.0.0.1:${fields.control_port}`);
  const open = openWire(parseConnection(JSON.stringify(fields), "k.json"));
  await expect(open).rejects.toThrow(ProtocolError);
  await expect(open).rejects.toThrow(
    `control socket: tcp://127.0.0.1:${fields.control_port} cannot be bound (it is in use); expected`,
  );
  taken.close();
  await (await openedWhenFree(fields)).close();
});

/** A closed socket frees its port in the background. */
async function openedWhenFree(fields: ConnectionFields): Promise<Wire> {
  for (;;) {
    try {
      return await openWire(parseConnection(JSON.stringify(fields), "k.json"));
    } catch {
      await new Promise((resolve) => setTimeout(resolve, 10));
    }
  }
}
