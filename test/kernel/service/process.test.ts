import { spawn } from "node:child_process";
import { readFileSync } from "node:fs";
import { beforeAll, expect, it } from "vitest";
import { Router } from "zeromq";
import { Client, freeConnection, summary } from "../client.ts";
import { build, connectionFile, groupLives, KERNEL_ENTRY, startProcess, startWith } from "../process.ts";

beforeAll(build, 600_000);

const sleep = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));
/** Resolves when no process of the group is left; how fast that has to be, the host tests measure. */
async function gone(pid: number): Promise<true> {
  while (groupLives(pid)) await sleep(20);
  return true;
}

it.each(["shell", "control"] as const)(
  "shutdown on %s: reply, published copy, idle, status 0, no process, ports free — oracle: the system",
  async (channel) => {
    const { fields, exited, pid, errors } = await startProcess();
    const client = await new Client(fields).connect();
    await client.request("shell", "kernel_info_request");
    const { reply, published } = await client.request(channel, "shutdown_request", { restart: true });
    expect(reply.content).toEqual({ status: "ok", restart: true });
    expect(summary(published)).toEqual(["busy", "shutdown_reply", "idle"]);
    expect(await exited).toBe(0);
    expect(await gone(pid)).toBe(true);
    client.close();
    const again = new Router({ linger: 0 });
    await again.bind(`tcp://127.0.0.1:${fields.shell_port}`);
    again.close();
    expect(errors()).not.toContain(fields.key);
  },
);

it("the same connection file serves a restart, and the session is new — oracle: protocol", async () => {
  const sessions = new Set<unknown>();
  const fields = await freeConnection();
  for (let turn = 0; turn < 3; turn += 1) {
    const { exited } = await startProcess(fields);
    const client = await new Client(fields).connect();
    const { reply } = await client.request("control", "kernel_info_request");
    sessions.add(reply.header.session);
    await client.request("control", "shutdown_request", { restart: true });
    expect(await exited).toBe(0);
    client.close();
  }
  expect(sessions.size).toBe(3);
});

it.each(["SIGTERM", "SIGHUP"] as const)("%s ends it in order — oracle: the system", async (signal) => {
  const { fields, exited, pid } = await startProcess();
  const client = await new Client(fields).connect();
  process.kill(pid, signal);
  expect(await exited).toBe(0);
  expect(await gone(pid)).toBe(true);
  client.close();
});

it("SIGINT and SIGUSR1 do not end it, and no debugger opens — oracle: it answers, the log is empty", async () => {
  const { fields, exited, pid, errors } = await startProcess();
  const client = await new Client(fields).connect();
  process.kill(pid, "SIGINT");
  process.kill(pid, "SIGUSR1");
  expect((await client.request("control", "kernel_info_request")).reply.content.status).toBe("ok");
  expect(errors()).not.toMatch(/[Dd]ebugger/);
  await client.request("control", "shutdown_request", {});
  await exited;
  client.close();
});

it("a connection without a key works, and the log says once what that means — oracle: the log", async () => {
  const { fields, exited, errors } = await startProcess({ ...(await freeConnection()), key: "" });
  const client = await new Client(fields).connect();
  expect((await client.request("shell", "kernel_info_request")).reply.signature).toBe("");
  await client.request("control", "shutdown_request", {});
  expect(await exited).toBe(0);
  expect(errors().match(/no key/g)?.length).toBe(1);
  client.close();
});

it.each([
  [[], 2, /^halfperiod: kernel: no connection file given; expected -f FILE.*\n$/],
  [["-f", "/no/such/file.json"], 1, /^halfperiod: connection file \/no\/such\/file.json: no such file; expected.*\n$/],
])("arguments %j: status %i and one line — oracle: the fault put in", async (args, status, line) => {
  const { exited, errors } = startWith(args);
  expect(await exited).toBe(status);
  expect(errors()).toMatch(line);
});

it.each(["", "{", "[]", '{"ip":"127.0.0.1"}'])("connection file %j: status 1 and one line", async (text) => {
  const { exited, errors } = startWith([connectionFile(text)]);
  expect(await exited).toBe(1);
  expect(errors()).toMatch(/^halfperiod: connection file .*\n$/);
});

it("a taken port: status 1 and one line — oracle: the port taken here", async () => {
  const fields = await freeConnection();
  const taken = new Router({ linger: 0 });
  await taken.bind(`tcp://127.0.0.1:${fields.hb_port}`);
  const { exited, errors, pid } = await startProcess(fields);
  expect(await exited).toBe(1);
  expect(await gone(pid)).toBe(true);
  expect(errors()).toMatch(/^halfperiod: hb socket: tcp:\/\/127\.0\.0\.1:\d+ cannot be bound \(it is in use\).*\n$/);
  taken.close();
});

it("ends with its host, but only if the host asked for it — oracle: the system", async () => {
  const host = async (bound: boolean) => {
    const file = connectionFile(JSON.stringify(await freeConnection()));
    const code = `
      const { spawn } = require("node:child_process");
      const env = { ...process.env, HALFPERIOD_HISTORY: "off", ${bound ? "JPY_PARENT_PID: String(process.pid)" : ""} };
      const kernel = spawn(process.execPath, [${JSON.stringify(KERNEL_ENTRY)}, "-f", ${JSON.stringify(file)}],
        { stdio: "ignore", detached: true, env });
      process.stdout.write(String(kernel.pid));
      setInterval(() => {}, 1000);`;
    const { JPY_PARENT_PID: _, ...env } = process.env;
    const child = spawn(process.execPath, ["-e", code], { stdio: ["ignore", "pipe", "inherit"], env });
    const pid = await new Promise<number>((resolve) => child.stdout.once("data", (data) => resolve(Number(data))));
    const client = await new Client(JSON.parse(readFileSync(file, "utf8"))).connect();
    child.kill("SIGKILL");
    return { pid, client };
  };
  const [bound, free] = await Promise.all([host(true), host(false)]);
  expect(await gone(bound.pid)).toBe(true);
  expect(groupLives(free.pid)).toBe(true);
  await free.client.request("control", "shutdown_request", {});
  expect(await gone(free.pid)).toBe(true);
  bound.client.close();
  free.client.close();
});
