import { afterEach, expect, it, vi } from "vitest";
import { watchParent } from "../../../kernel/wire/lifetime.ts";

afterEach(() => {
  vi.useRealTimers();
  vi.unstubAllEnvs();
});

/** How often the end is called while 30 s go by. */
function ends(parent: number, variable: string): number {
  vi.useFakeTimers();
  vi.stubEnv("JPY_PARENT_PID", variable);
  const onDeath = vi.fn();
  watchParent(parent, onDeath);
  vi.advanceTimersByTime(30_000);
  return onDeath.mock.calls.length;
}

it("a host that died while its kernel started ends it, once — oracle: a parent that is another one by now", () => {
  expect(ends(process.ppid + 1, "4711")).toBe(1);
});

it("a host that lives ends nothing, whatever number it names — oracle: the parent stays", () => {
  for (const variable of [String(process.ppid), "1", "4711"]) expect(ends(process.ppid, variable)).toBe(0);
});

it("without the variable the kernel outlives its host — oracle: protocol, independent kernels", () => {
  expect(ends(process.ppid + 1, "")).toBe(0);
});
