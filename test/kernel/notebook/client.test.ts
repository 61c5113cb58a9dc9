import { readdirSync } from "node:fs";
import os from "node:os";
import { fileURLToPath } from "node:url";
import { afterEach, describe, expect, it } from "vitest";
import { KernelClient, KernelLost } from "../../../kernel/notebook/client.ts";

const scripted = fileURLToPath(new URL("./scripted-kernel.mjs", import.meta.url));
const open: KernelClient[] = [];
const start = async (...args: string[]) => {
  const client = await KernelClient.start({ cwd: os.tmpdir(), command: [process.execPath, scripted, ...args] });
  open.push(client);
  return client;
};
const isAlive = (pid: number) => {
  try {
    process.kill(pid, 0);
    return true;
  } catch {
    return false;
  }
};
const folders = () => readdirSync(os.tmpdir()).filter((name) => name.startsWith("halfperiod-"));

afterEach(async () => {
  await Promise.all(open.splice(0).map((client) => client.shutdown()));
});

describe("the client of a kernel", () => {
  it("starts, executes, hears outputs before the reply counts as done, leaves no process and no file", async () => {
    const before = new Set(folders());
    const client = await start();
    expect(client.info).toMatchObject({ status: "ok", language_info: { name: "typescript" } });
    const heard: string[] = [];
    const execution = await client.execute("print a", { onMessage: (type) => heard.push(type) });
    expect(execution).toMatchObject({ status: "ok", executionCount: 1 });
    expect(heard).toEqual(["status", "execute_input", "stream", "status"]);
    expect(await client.shutdown()).toBe(true);
    expect(isAlive(client.pid)).toBe(false);
    expect(folders().filter((name) => !before.has(name))).toEqual([]);
  });

  it("tells a failed cell from a good one and goes on", async () => {
    const client = await start();
    expect(await client.execute("fail x")).toMatchObject({ status: "error", reply: { ename: "Fault", evalue: "x" } });
    expect(await client.execute("value 1")).toMatchObject({ status: "ok", executionCount: 2 });
  });

  it("interrupts a cell that takes too long", async () => {
    const client = await start();
    expect(await client.execute("hang", { limit: 200 })).toMatchObject({ status: "too long" });
    expect(await client.execute("value 1")).toMatchObject({ status: "ok" });
  });

  it("notices the death of the kernel and tells what it wrote last", async () => {
    const client = await start();
    const lost = await client.execute("die").catch((error) => error);
    expect(lost).toBeInstanceOf(KernelLost);
    expect(lost.message).toContain("the kernel ended with status 7");
    expect(lost.message).toContain("out of memory, say");
  });

  it("hears late output under the request that started it", async () => {
    const client = await start();
    const late = new Promise((resolve) => {
      void client.execute("late x", { onMessage: (type, content) => type === "stream" && resolve(content.text) });
    });
    await client.execute("value 1");
    expect(await late).toBe("x");
  });

  it("answers a question, or says that nobody can be asked", async () => {
    const client = await start();
    expect(await client.execute("ask who?")).toMatchObject({ status: "error", reply: { ename: "NoInput" } });
    const results: unknown[] = [];
    await client.execute("ask who?", {
      onInput: async (prompt) => `${prompt} me`,
      onMessage: (type, content) => type === "execute_result" && results.push(content.data),
    });
    expect(results).toEqual([{ "text/plain": "who? me" }]);
  });

  it("ends a kernel that will not go", { timeout: 20_000 }, async () => {
    const client = await start("--stubborn");
    expect(await client.shutdown()).toBe(false);
    expect(isAlive(client.pid)).toBe(false);
  });

  it("reports a kernel that cannot start", async () => {
    const command = [process.execPath, "-e", "console.error('no such module'); process.exit(3)", "--"];
    const lost = KernelClient.start({ cwd: os.tmpdir(), command });
    await expect(lost).rejects.toThrow("the kernel ended with status 3:\nno such module");
    const missing = KernelClient.start({ cwd: os.tmpdir(), command: ["/no/such/program"] });
    await expect(missing).rejects.toThrow("the kernel could not be started");
  });
});
