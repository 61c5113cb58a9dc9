import { mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { afterAll, beforeAll, expect, it, vi } from "vitest";
import { diagnoseCommand } from "../../../../kernel/notebook/command/diagnose.ts";
import { install } from "../../../../kernel/service/install/install.ts";
import { survey } from "../../../../kernel/service/install/survey.ts";
import { build } from "../../process.ts";

beforeAll(build, 600_000);
const data = mkdtempSync(path.join(tmpdir(), "halfperiod diagnose "));
const kernelJson = path.join(data, "kernels", "halfperiod", "kernel.json");
const machine = { platform: process.platform, env: { JUPYTER_DATA_DIR: data }, home: data };
beforeAll(() => vi.stubEnv("JUPYTER_DATA_DIR", data));
afterAll(() => {
  vi.unstubAllEnvs();
  rmSync(data, { recursive: true });
});

function quietly(act: () => number): number {
  const silence = vi.spyOn(process.stdout, "write").mockReturnValue(true);
  try {
    return act();
  } finally {
    silence.mockRestore();
  }
}

async function diagnose() {
  const written: string[] = [];
  const out = { write: (more: string) => written.push(more) };
  const code = await diagnoseCommand([], { out, err: out } as unknown as Parameters<typeof diagnoseCommand>[1]);
  return { code, text: written.join("") };
}

it("finds no kernel, then ours, then that its Node is gone; foreign ones do not count — oracle: the files", () => {
  expect(survey(machine)[0]).toEqual({ data, exists: true, kernels: [] });
  mkdirSync(path.join(data, "kernels", "other"), { recursive: true });
  writeFileSync(path.join(data, "kernels", "other", "kernel.json"), '{"argv":["/gone"],"metadata":null}');
  expect(survey(machine)[0]?.kernels).toEqual([]);
  quietly(() => install([]));
  const found = {
    folder: path.dirname(kernelJson),
    repair: "halfperiod install",
    missing: undefined,
    hiddenBy: undefined,
  };
  expect(survey(machine)[0]?.kernels).toEqual([found]);
  writeFileSync(kernelJson, readFileSync(kernelJson, "utf8").replace(process.execPath, "/gone/node"));
  expect(survey(machine)[0]?.kernels[0]?.missing).toBe("/gone/node");
});

it("tells what repairs each, and what front ends find first — oracle: the folders and their order", () => {
  const first = path.join(data, "first place");
  const foreign = path.join(first, "kernels", "HalfPeriod");
  mkdirSync(foreign, { recursive: true });
  writeFileSync(path.join(foreign, "kernel.json"), '{"argv":["x"],"display_name":"another","language":"y"}');
  quietly(() => install(["--at", first, "--name", "second"]));
  const [before, own] = survey({ ...machine, env: { ...machine.env, JUPYTER_PATH: first } });
  expect(before?.kernels).toMatchObject([
    { repair: `halfperiod install --at ${JSON.stringify(first)} --name second`, hiddenBy: undefined },
  ]);
  expect(own?.kernels).toMatchObject([{ repair: "halfperiod install", hiddenBy: foreign }]);
});

it("tries the real kernel and says how to repair the kernelspec — oracle: the broken path", async () => {
  const { code, text } = await diagnose();
  for (const step of [
    "starts and answers",
    "first cell, checked and run",
    "stops an endless timer",
    "ends by itself",
  ]) {
    expect(text).toMatch(new RegExp(`${step} +\\d+ ms`));
  }
  expect(text).toContain("broken: no /gone/node");
  expect(text).toContain("-  halfperiod install: repairs ");
  expect(code).toBe(1);
}, 120_000);
