import { spawn } from "node:child_process";
import { existsSync } from "node:fs";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { type HostPlace, makePlace, missing } from "../hosts.ts";

const CONSOLE = "/usr/bin/jupyter-console";
const absent = existsSync(CONSOLE) ? "" : missing({ program: CONSOLE, debianPackage: "jupyter-console" });
if (absent) console.warn(`skipped, ${absent}`);

describe.skipIf(absent !== "")("the terminal console", () => {
  let place: HostPlace;
  beforeAll(() => {
    place = makePlace();
  });
  afterAll(() => place?.remove());

  function converse(lines: readonly string[]): Promise<string> {
    const child = spawn(CONSOLE, ["--kernel", "halfperiod", "--simple-prompt"], {
      env: { ...place.env, HALFPERIOD_HISTORY: "off" },
      stdio: ["pipe", "pipe", "pipe"],
    });
    let text = "";
    for (const stream of [child.stdout, child.stderr]) {
      stream.setEncoding("utf8").on("data", (more) => {
        text += more;
      });
    }
    child.stdin.end(lines.map((line) => `${line}\n`).join(""));
    return new Promise((resolve) => child.on("close", () => resolve(text)));
  }

  it("shows banner, results, text and errors in order, counts, and ends — oracle: what was typed", async () => {
    const text = await converse([
      "const a = 20",
      "a + 1",
      'console.log("h" + "i")',
      'const n: number = "x"',
      "a * 2",
      "curve`y^2 = x^3 - x`",
    ]);
    const shown = [
      /halfperiod \d+\.\d+\.\d+: cubic curves/,
      /In \[2\]: Out\[2\]: 21\n/,
      /In \[3\]: hi\n/,
      /In \[4\]: .*TypeScriptError.*: TS2322: /,
      /In \[5\]: Out\[5\]: 40\n/,
      /In \[6\]: Out\[6\]:\s[\s\S]*y\^2 = x\^3 - x/,
      /Shutting down kernel/,
    ];
    let from = 0;
    for (const pattern of shown) {
      const at = text.slice(from).search(pattern);
      expect(at, `${pattern} behind ${from} in\n${text}`).toBeGreaterThanOrEqual(0);
      from += at;
    }
  }, 120_000);

  it("gets every first cell, at start after start — oracle: its value", async () => {
    for (let turn = 0; turn < 3; turn += 1) expect(await converse([`${turn} + 40`])).toContain(`Out[1]: ${40 + turn}`);
  }, 180_000);
});
