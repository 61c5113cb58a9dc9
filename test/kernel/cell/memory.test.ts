// HALFPERIOD_MEMORY from end to end: a real kernel, a real client, a cell that uses up what it may have.
import { tmpdir } from "node:os";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { KernelClient } from "../../../kernel/notebook/client.ts";

let client: KernelClient;
beforeAll(async () => {
  client = await KernelClient.start({ cwd: tmpdir(), env: { HALFPERIOD_MEMORY: "96" } });
});
afterAll(async () => void (await client.shutdown()));

/** The text of a cell's value. */
async function value(code: string): Promise<string | undefined> {
  let text: string | undefined;
  const { status, reply } = await client.execute(code, {
    onMessage(type, content) {
      const data = content.data as Record<string, string> | undefined;
      if (type === "execute_result") text = data?.["text/plain"];
    },
  });
  if (status !== "ok") throw new Error(String(reply.evalue));
  return text;
}

describe("a cell that exhausts HALFPERIOD_MEMORY=96 — oracle: the messages of the kernel's own process", () => {
  it.each([
    ["its heap", "const hog: number[][] = []; for (;;) hog.push(new Array(100_000).fill(1.5))"],
    ["buffers outside the heap", "const hog: Uint8Array[] = []; for (;;) hog.push(new Uint8Array(10_000_000).fill(1))"],
  ])("%s: the kernel lives, says what happened and what is lost, and the next cell runs", async (_, code) => {
    await client.execute("const kept = 1, other = 'b'; type Pair = [number, string]");
    const { status, reply } = await client.execute(code);
    expect(status).toBe("error");
    expect(reply.ename).toBe("SessionEnded");
    expect(reply.evalue).toContain("ran out of memory (it may have 96 MB; HALFPERIOD_MEMORY sets another limit)");
    expect(reply.evalue).toContain("All variables are lost (kept, other)");
    expect((await client.execute("kept")).reply.evalue).toContain("TS2304");
    expect(await value("real('0.5') + 1")).toBe("3/2");
  });

  it("less than the limit is no fault — oracle: the sum", async () => {
    expect(await value("new Uint8Array(50_000_000).fill(1).length + new Array(1_000_000).fill(0.5).length")).toBe(
      "51000000",
    );
  });
});
