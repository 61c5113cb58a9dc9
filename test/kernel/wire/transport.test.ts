import { existsSync, mkdtempSync, readdirSync, rmSync, statSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { expect, it } from "vitest";
import { curveKeyPair, Dealer, Request } from "zeromq";
import { parseConnection } from "../../../kernel/wire/connection.ts";
import { openWire } from "../../../kernel/wire/wire.ts";
import { summary } from "../client.ts";
import { startTestKernel } from "../service/harness.ts";

function ipcFields() {
  const folder = mkdtempSync(path.join(tmpdir(), "halfperiod ipc "));
  const ports = { shell_port: 1, iopub_port: 2, stdin_port: 3, control_port: 4, hb_port: 5 };
  return { folder, fields: { transport: "ipc", ip: path.join(folder, "k"), ...ports } };
}

it("ipc: works, files for this user only, none left — oracle: the folder", async () => {
  const { folder, fields } = ipcFields();
  const test = await startTestKernel(fields);
  expect(readdirSync(folder).sort()).toEqual(["k-1", "k-2", "k-3", "k-4", "k-5"]);
  for (const name of readdirSync(folder)) expect(statSync(path.join(folder, name)).mode & 0o077).toBe(0);
  const { published } = await test.client.execute("print a\nvalue 1");
  expect(summary(published)).toEqual(["busy", "execute_input", "stream", "execute_result", "idle"]);
  await test.stop();
  expect(readdirSync(folder)).toEqual([]);
  rmSync(folder, { recursive: true });
});

it("ipc: a path that is served is refused, a file left over by a dead kernel is not — oracle: who answers", async () => {
  const { folder, fields } = ipcFields();
  const test = await startTestKernel(fields);
  const again = openWire(parseConnection(JSON.stringify(fields), "k.json"));
  await expect(again).rejects.toThrow(/shell socket: ipc:.*k-1 cannot be bound \(it is in use\)/);
  expect((await test.client.execute("value 1")).reply.content.status).toBe("ok");
  await test.stop();
  for (const n of [1, 2, 3, 4, 5]) writeFileSync(path.join(folder, `k-${n}`), "");
  const wire = await openWire(parseConnection(JSON.stringify(fields), "k.json"));
  await wire.close();
  expect(existsSync(path.join(folder, "k-1"))).toBe(false);
  rmSync(folder, { recursive: true });
});

it("curve: whoever has the public key is served on all sockets, others are not heard — oracle: two clients", async () => {
  const { publicKey, secretKey } = curveKeyPair();
  const keys = { curve_publickey: publicKey, curve_secretkey: secretKey };
  const test = await startTestKernel(keys, publicKey);
  const { published } = await test.client.execute("print secret");
  expect(summary(published)).toEqual(["busy", "execute_input", "stream", "idle"]);
  await test.client.heartbeat.send("x");
  expect(String((await test.client.heartbeat.receive())[0])).toBe("x");

  const plain = new Request({ linger: 0, receiveTimeout: 300 });
  plain.connect(`tcp://127.0.0.1:${test.fields.hb_port}`);
  await plain.send("x");
  await expect(plain.receive()).rejects.toThrow();
  const shell = new Dealer({ linger: 0, receiveTimeout: 300 });
  shell.connect(`tcp://127.0.0.1:${test.fields.shell_port}`);
  await shell.send(test.client.frames(test.client.header("kernel_info_request"), {}));
  await expect(shell.receive()).rejects.toThrow();
  plain.close();
  shell.close();
  expect((await test.client.execute("value 1")).reply.content.status).toBe("ok");
  await test.stop();
});

it.each([{ signature_scheme: "hmac-sha512" }, { signature_scheme: "hmac-md5" }, { key: "" }])(
  "a connection with %j works on shell, control and iopub — oracle: the client's own signatures",
  async (change) => {
    const test = await startTestKernel(change);
    const { published } = await test.client.execute("print a");
    expect(summary(published)).toEqual(["busy", "execute_input", "stream", "idle"]);
    const { reply } = await test.client.request("control", "kernel_info_request");
    expect(reply.signature.length).toBe("key" in change ? 0 : change.signature_scheme === "hmac-md5" ? 32 : 128);
    await test.stop();
  },
);
