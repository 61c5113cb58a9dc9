import { readFileSync } from "node:fs";
import path from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { type HostPlace, makePlace, missing, PYTHON, root, run } from "../hosts.ts";

const absent = missing(
  { module: "jupyter_client", debianPackage: "python3-jupyter-client" },
  { module: "jupyter_kernel_test", debianPackage: "python3-jupyter-kernel-test" },
);
if (absent) console.warn(`skipped, ${absent}`);

/** Groups of rules, and the script that asks each. */
const GROUPS = {
  Execute: "rules_execute.py",
  Output: "rules_execute.py",
  Requests: "rules_requests.py",
  Wire: "rules_wire.py",
  Control: "rules_control.py",
  Process: "rules_control.py",
};

it("each rule names tests that exist, and each test stands beside a rule — oracle: the table and the scripts", () => {
  const read = (name: string) => readFileSync(path.join(root, "test/hosts/protocol", name), "utf8");
  const named = new Set(read("RULES.md").match(/\btest_\w+/g));
  const scripts = [...new Set(Object.values(GROUPS))].map(read).join("");
  const written = new Set(Array.from(scripts.matchAll(/def (test_\w+)/g), ([, name]) => name));
  expect(named).toEqual(written);
});

describe.skipIf(absent !== "")("the protocol, seen from outside", () => {
  let place: HostPlace;
  beforeAll(() => {
    place = makePlace();
  });
  afterAll(() => place?.remove());

  const python = (script: string, ...args: string[]) =>
    run(PYTHON, ["-W", "ignore", path.join(root, "test/hosts/protocol", script), ...args], {
      ...place.env,
      HALFPERIOD_HISTORY: "off",
    });

  // That test waits a tenth of a second for a message, which a busy machine may need longer for: hence the second try.
  it("passes the front ends' own test of kernels — oracle: jupyter_kernel_test", {
    timeout: 120_000,
    retry: 2,
  }, async () => {
    await expect(python("kernel_test.py")).resolves.toBeDefined();
  });

  it.each(Object.entries(GROUPS))(
    "keeps the protocol's rules: %s — oracle: the text of each rule, asked through jupyter_client",
    async (group, script) => {
      await expect(python(script, group)).resolves.toBeDefined();
    },
    300_000,
  );
});
