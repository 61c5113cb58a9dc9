import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { demoNotebooks } from "./demo.ts";
import { missing, PYTHON, root, run } from "./hosts.ts";

const absent = missing({ module: "nbformat", debianPackage: "python3-nbformat" });
if (absent) console.warn(`skipped, ${absent}`);

/** Fails with the place in the file if a notebook breaks the schema, also by a field that the schema does not know. */
const VALIDATE = `
import sys, nbformat
for name in sys.argv[1:]:
    nbformat.validate(nbformat.read(name, as_version=nbformat.NO_CONVERT), relax_add_props=False, version=4)
`;

/** Every kind of output that a cell can leave. */
const CELLS = [
  "console.log('a'); console.error('b'); 6 * 7",
  "curve`y^2 = x^3 - x`",
  "typeset(figure.lattice(lattice({ tau: i }))); table([{ n: 1, 'n^2': 1 }])",
  "for (const n of progress([1, 2, 3])) await new Promise((r) => setTimeout(r, 60))",
  "console.log('gone'); console.clear(); console.log('kept')",
  "typeset('x', { aside: true }); notebook.propose('1')",
  "console.log('\\x1b[31mred\\x1b[0m \\ud83d\\ude00 \\ud800')",
  "throw new RangeError('deliberate')",
  "const n: number = 'text'",
  "",
];

describe.skipIf(absent !== "")("notebooks that were written", () => {
  let folder: string;
  beforeAll(() => {
    folder = mkdtempSync(path.join(os.tmpdir(), "halfperiod nbformat "));
  });
  afterAll(() => rmSync(folder, { recursive: true, force: true }));

  const validate = (...files: readonly string[]) =>
    run(PYTHON, ["-W", "ignore", "-c", VALIDATE, ...files], process.env);

  it("the demo notebooks keep the schema — oracle: nbformat's schema, unknown fields refused", async () => {
    await expect(validate(...demoNotebooks)).resolves.toBe("");
  });

  it.each([4, 5])("every kind of output, in a notebook of format 4.%i — oracle: the same", async (minor) => {
    const [source, target] = [path.join(folder, `in ${minor}.ipynb`), path.join(folder, `out ${minor}.ipynb`)];
    const cells = CELLS.map((code, at) => ({
      cell_type: "code",
      ...(minor === 5 && { id: `cell-${at}` }),
      metadata: { tags: ["raises-exception"] },
      execution_count: null,
      outputs: [],
      source: code,
    }));
    writeFileSync(source, JSON.stringify({ nbformat: 4, nbformat_minor: minor, metadata: {}, cells }));
    const command = path.join(root, "kernel/bin/halfperiod.mjs");
    await run(process.execPath, [command, "run", source, "--to", target], process.env);
    await expect(validate(target)).resolves.toBe("");
    const written = JSON.parse(readFileSync(target, "utf8"));
    const kinds = written.cells.flatMap(({ outputs }: { outputs: { output_type: string }[] }) =>
      outputs.map(({ output_type }) => output_type),
    );
    expect(new Set(kinds)).toEqual(new Set(["stream", "execute_result", "display_data", "error"]));
    expect(JSON.stringify(written.cells[4].outputs)).not.toContain("gone");
  });

  it("a broken notebook would be found — oracle: the fault put in", async () => {
    const broken = path.join(folder, "broken.ipynb");
    const cell = {
      cell_type: "code",
      id: "a",
      metadata: {},
      execution_count: null,
      outputs: [{ output_type: "stream" }],
    };
    writeFileSync(
      broken,
      JSON.stringify({ nbformat: 4, nbformat_minor: 5, metadata: {}, cells: [{ ...cell, source: "" }] }),
    );
    await expect(validate(broken)).rejects.toThrow(/ValidationError|NotebookValidationError/);
  });
});
