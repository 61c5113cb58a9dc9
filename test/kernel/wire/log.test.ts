import { writeSync } from "node:fs";
import { expect, it, vi } from "vitest";
import { log } from "../../../kernel/wire/log.ts";

vi.mock("node:fs", async (original) => ({ ...(await original<typeof import("node:fs")>()), writeSync: vi.fn() }));

it("never fills a pipe that nobody reads, and says that it ends — oracle: 64 kB, what a pipe holds", () => {
  for (let n = 0; n < 10_000; n += 1) log(`fault ${n} of π`);
  const lines = vi.mocked(writeSync).mock.calls.map(([, text]) => String(text));
  expect(Buffer.byteLength(lines.join(""))).toBeLessThan(65_536);
  expect(lines.length).toBeGreaterThan(1000);
  expect(lines[0]).toBe("halfperiod: fault 0 of π\n");
  expect(lines.at(-1)).toBe("halfperiod: no more lines are written to this log.\n");
  expect(lines.filter((line) => line.includes("no more lines")).length).toBe(1);
});
