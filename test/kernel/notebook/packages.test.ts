import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { afterEach, beforeEach, expect, it } from "vitest";
import { importedNames, importedPackages, packageChanges } from "../../../kernel/notebook/packages.ts";
import { code, notebookOf } from "./cells.ts";

let folder: string;
beforeEach(() => {
  folder = mkdtempSync(path.join(os.tmpdir(), "halfperiod-packages-"));
  install("plain", "1.2.3", "exports.a = 1");
});
afterEach(() => rmSync(folder, { recursive: true, force: true }));

function install(name: string, version: string, text: string): void {
  const place = path.join(folder, "node_modules", name);
  mkdirSync(path.join(place, "node_modules", "inner"), { recursive: true });
  writeFileSync(path.join(place, "package.json"), JSON.stringify({ name, version }));
  writeFileSync(path.join(place, "index.js"), text);
}

it("finds what cells import: packages by name, files, no modules of Node, not the library, nothing in comments", () => {
  const cells = notebookOf(
    code('import a from "plain/part";\nimport { readFileSync } from "node:fs";\nimport fs from "fs";'),
    code('import type { X } from "@scope/name/deep"; const b = await import("./beside.ts");'),
    code(
      'const c = require("other");\n// import d from "commented";\n/* import e from "gone" */\nimport { π } from "halfperiod";',
    ),
  );
  expect(importedNames(cells)).toEqual(["./beside.ts", "@scope/name", "other", "plain"]);
});

it("tells versions and contents apart — oracle: packages made for it", () => {
  const cells = notebookOf(code('import a from "plain"; import b from "./b.ts"; import c from "missing";'));
  writeFileSync(path.join(folder, "b.ts"), "1");
  const then = importedPackages(cells, folder);
  expect(then).toEqual({
    plain: { version: "1.2.3", hash: expect.stringMatching(/^sha256:[0-9a-f]{64}$/) },
    "./b.ts": { hash: expect.stringMatching(/^sha256:/) },
  });
  // A package inside the package is not part of it.
  writeFileSync(path.join(folder, "node_modules/plain/node_modules/inner/index.js"), "x");
  expect(packageChanges(then, importedPackages(cells, folder))).toEqual([]);
  writeFileSync(path.join(folder, "b.ts"), "2");
  install("plain", "1.2.3", "exports.a = 2");
  expect(packageChanges(then, importedPackages(cells, folder))).toEqual([
    "./b.ts: other content",
    "plain: other content under version 1.2.3",
  ]);
  install("plain", "1.3.0", "exports.a = 2");
  expect(packageChanges(then, importedPackages(cells, folder))).toContain("plain: 1.2.3 then, 1.3.0 now");
  rmSync(path.join(folder, "node_modules"), { recursive: true });
  expect(packageChanges(then, importedPackages(cells, folder))).toContain("plain 1.2.3: not found now");
});
