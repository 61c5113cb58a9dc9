import { readFileSync } from "node:fs";
import { beforeAll, expect, it } from "vitest";
import { Router, Subscriber } from "zeromq";
import { Client, freeConnection } from "../client.ts";
import { build, groupLives, startProcess } from "../process.ts";

beforeAll(build, 600_000);

/** Memory of a process in MB. */
const memoryOf = (pid: number) => (Number(readFileSync(`/proc/${pid}/statm`, "utf8").split(" ")[1]) * 4096) / 1e6;

it("200 restarts on one connection file: each serves, none is left, the ports are free — oracle: the system", async () => {
  const fields = await freeConnection();
  for (let turn = 0; turn < 200; turn += 1) {
    const { exited, pid } = await startProcess(fields);
    const client = await new Client(fields).connect();
    const shell = await client.request("shell", "kernel_info_request");
    expect(shell.reply.content.status).toBe("ok");
    // every tenth also runs a cell, so that all its processes are up
    if (turn % 10 === 0) {
      const id = await client.send("shell", "execute_request", { code: `${turn} + 1` });
      await client.until(() => client.replies.find(({ parent }) => parent.msg_id === id), 60_000);
    }
    await client.request("control", "shutdown_request", { restart: true });
    expect(await exited).toBe(0);
    while (groupLives(pid)) await new Promise((resolve) => setTimeout(resolve, 20));
    client.close();
  }
  for (const port of [fields.shell_port, fields.iopub_port, fields.stdin_port, fields.control_port, fields.hb_port]) {
    const socket = new Router({ linger: 0 });
    await socket.bind(`tcp://127.0.0.1:${port}`);
    socket.close();
  }
});

it("a client that never reads while a cell prints for ever: memory bounded, the stop works, variables stay — oracle: /proc", async () => {
  const { fields, exited, pid } = await startProcess();
  const deaf = new Subscriber({ linger: 0, receiveHighWaterMark: 1 });
  deaf.connect(`tcp://127.0.0.1:${fields.iopub_port}`);
  deaf.subscribe("");
  const client = await new Client(fields).connect({ listen: false });
  const run = async (code: string) => {
    const id = await client.send("shell", "execute_request", { code, user_expressions: { kept: "kept" } });
    return () => client.until(() => client.replies.find(({ parent }) => parent.msg_id === id), 60_000);
  };
  await (await run("let kept = 41"))();
  const endless = await run('for (;;) console.log("x".repeat(1000))');
  await new Promise((resolve) => setTimeout(resolve, 8000));
  expect(memoryOf(pid)).toBeLessThan(300);
  await client.send("control", "interrupt_request", {});
  expect((await endless()).content.status).toBe("error");
  const after = await (await run("kept += 1"))();
  expect(after.content.user_expressions.kept.data["text/plain"]).toBe("42");
  await client.send("control", "shutdown_request", {});
  expect(await exited).toBe(0);
  deaf.close();
  client.close();
});

it("10,000 cells of one kernel: all answered in order, memory does not grow with them — oracle: /proc", async () => {
  const { fields, exited, pid } = await startProcess();
  const client = await new Client(fields).connect();
  const batch = async (count: number) => {
    const ids: string[] = [];
    for (let n = 0; n < count; n += 1) {
      ids.push(await client.send("shell", "execute_request", { code: "", store_history: true }));
    }
    await client.until(() => client.replies.length >= count, 120_000);
    expect(client.replies.map(({ parent }) => parent.msg_id)).toEqual(ids);
    await client.idle(ids.at(-1) as string);
    client.forget();
  };
  await batch(1000);
  const before = memoryOf(pid);
  for (let turn = 0; turn < 9; turn += 1) await batch(1000);
  expect(memoryOf(pid) - before).toBeLessThan(60);
  await client.request("control", "shutdown_request", {});
  expect(await exited).toBe(0);
  client.close();
});
