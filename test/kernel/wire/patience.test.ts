import { expect, it } from "vitest";
import { Subscriber, XPublisher } from "zeromq";
import { parseConnection } from "../../../kernel/wire/connection.ts";
import { patiently } from "../../../kernel/wire/patience.ts";
import { openWire } from "../../../kernel/wire/wire.ts";
import { freeConnection } from "../client.ts";

/** A socket that is full for as many tries as `full` says; dropping sends always pass. */
function fakeSocket() {
  const socket = {
    closed: false,
    noDrop: true,
    sendHighWaterMark: 64,
    full: 0,
    sent: [] as string[],
    async send([frame]: Buffer[]) {
      if (socket.noDrop && socket.full > 0) {
        socket.full -= 1;
        throw Object.assign(new Error("full"), { code: "EAGAIN" });
      }
      socket.sent.push(`${socket.noDrop ? "" : "dropping "}${frame}`);
    },
  };
  return socket;
}
// large, so that the socket is not allowed to hold more of them
const LARGE = Buffer.alloc(33_000_000);
const frames = (text: string) => [Buffer.from(text), LARGE];

it("waits for a slow subscriber and loses nothing — oracle: the order sent", async () => {
  const socket = fakeSocket();
  let waited = 0;
  const sender = patiently(socket, async (ms) => {
    waited += ms;
  });
  socket.full = 100;
  await sender.send(frames("a"));
  await sender.send(frames("b"));
  expect(socket.sent).toEqual(["a", "b"]);
  expect(waited).toBeGreaterThan(0);
});

it("goes on without one that takes nothing, and waits again once it does — oracle: the fake's clock", async () => {
  const socket = fakeSocket();
  let waited = 0;
  const sender = patiently(socket, async (ms) => {
    waited += ms;
  });
  socket.full = Number.POSITIVE_INFINITY;
  await sender.send(frames("a"));
  expect(waited).toBeGreaterThan(5000);
  expect(waited).toBeLessThan(20_000);
  waited = 0;
  await sender.send(frames("b"));
  expect(waited).toBeLessThan(100);
  socket.full = 0;
  await sender.send(frames("c"));
  socket.full = 100;
  waited = 0;
  await sender.send(frames("d"));
  expect(waited).toBeGreaterThan(300);
  expect(socket.sent).toEqual(["dropping a", "dropping b", "c", "d"]);
});

it("other faults pass, and a closed socket ends the wait — oracle: the fault put in", async () => {
  const socket = fakeSocket();
  const sender = patiently(socket, async () => {
    socket.closed = true;
  });
  socket.full = 10;
  await sender.send(frames("a"));
  expect(socket.sent).toEqual([]);
  socket.send = async () => {
    throw Object.assign(new Error("odd"), { code: "EFAULT" });
  };
  await expect(sender.send(frames("a"))).rejects.toThrow("odd");
});

it("a subscriber that never reads is left behind, the others get all, and nobody warns — oracle: real sockets", async () => {
  const socket = new XPublisher({
    sendHighWaterMark: 4,
    sendTimeout: 0,
    noDrop: true,
    linger: 0,
    verbosity: "allSubs",
  });
  await socket.bind("tcp://127.0.0.1:*");
  const warnings: unknown[] = [];
  const warned = (warning: unknown) => warnings.push(warning);
  process.on("warning", warned);
  const clients = [1, 1000].map(
    (receiveHighWaterMark) => new Subscriber({ linger: 0, receiveHighWaterMark, receiveTimeout: 20_000 }),
  );
  for (const client of clients) {
    client.connect(String(socket.lastEndpoint));
    client.subscribe("");
    await socket.receive();
  }
  const sender = patiently(socket, async () => new Promise((resolve) => setTimeout(resolve, 0)));
  const [, reading] = clients as [Subscriber, Subscriber];
  const block = Buffer.alloc(2_000_000);
  for (let n = 0; n < 60; n += 1) {
    await sender.send([Buffer.from(String(n)), block]);
    expect(String((await reading.receive())[0])).toBe(String(n));
  }
  await new Promise((resolve) => setTimeout(resolve, 10));
  process.off("warning", warned);
  expect(warnings).toEqual([]);
  for (const each of [socket, ...clients]) each.close();
});

it("a subscriber that does not read holds the publisher back, not its memory; then it gets all — oracle: bytes", async () => {
  const fields = await freeConnection();
  const wire = await openWire(parseConnection(JSON.stringify(fields), "k.json"));
  const slow = new Subscriber({ linger: 0, receiveHighWaterMark: 1, receiveTimeout: 20_000 });
  slow.connect(`tcp://127.0.0.1:${fields.iopub_port}`);
  slow.subscribe("");
  await wire.subscribed;
  const text = "x".repeat(100_000);
  for (let n = 0; n < 1000; n += 1) wire.publish({ type: "stream", content: { n, text } });
  await new Promise((resolve) => setTimeout(resolve, 200));
  expect(wire.pendingBytes).toBeGreaterThan(10_000_000);
  const read: number[] = [];
  while (read.length < 1000) {
    const received = await slow.receive();
    if (String(received[0]) === "stream") read.push(JSON.parse(String(received[6])).n);
  }
  expect(read).toEqual(Array.from({ length: 1000 }, (_, n) => n));
  expect(wire.pendingBytes).toBe(0);
  slow.close();
  await wire.close();
});

it("a client that reads only at the end misses none of 20,000 small messages — oracle: what was published", async () => {
  const fields = await freeConnection();
  const wire = await openWire(parseConnection(JSON.stringify(fields), "k.json"));
  const late = new Subscriber({ linger: 0, receiveHighWaterMark: 10, receiveTimeout: 20_000 });
  late.connect(`tcp://127.0.0.1:${fields.iopub_port}`);
  late.subscribe("");
  await wire.subscribed;
  const text = "x".repeat(1000); // together more than the buffers of the connection take
  for (let n = 0; n < 20_000; n += 1) wire.publish({ type: "status", content: { n, text } });
  await wire.published();
  expect(wire.pendingBytes).toBe(0);
  let next = 0;
  while (next < 20_000) {
    const received = await late.receive();
    if (String(received[0]) === "status") expect(JSON.parse(String(received[6])).n).toBe(next++);
  }
  late.close();
  await wire.close();
});
