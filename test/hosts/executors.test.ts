import { readFileSync } from "node:fs";
import path from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { readNotebook } from "../../kernel/notebook/file.ts";
import { isCode } from "../../kernel/notebook/format.ts";
import { demoNotebooks, storedFigures } from "./demo.ts";
import { artefacts, type HostPlace, makePlace, missing, PYTHON, root, run } from "./hosts.ts";

const absent = missing(
  { module: "nbclient", debianPackage: "python3-nbclient" },
  { module: "nbconvert", debianPackage: "python3-nbconvert" },
);
if (absent) console.warn(`skipped, ${absent}`);

describe.skipIf(absent !== "")("executors without a front end", () => {
  let place: HostPlace;
  beforeAll(() => {
    place = makePlace();
  });
  afterAll(() => place?.remove());

  it.each(demoNotebooks)(
    "nbclient executes %s: every cell with a count, no error, valid by nbformat's schema",
    async (file) => {
      const target = path.join(place.folder, "executed.ipynb");
      await run(
        PYTHON,
        [path.join(root, "test/hosts/execute_notebook.py"), file, target],
        place.env,
        path.dirname(file),
      );
      const { cells, metadata } = await readNotebook(target);
      const code = cells.filter(isCode);
      expect(code.map((cell) => cell.execution_count)).toEqual(code.map((_, index) => index + 1));
      const outputs = code.flatMap((cell) => cell.outputs);
      expect(outputs.filter((output) => output.output_type === "error")).toEqual([]);
      const mimes = outputs.flatMap((output) => ("data" in output ? Object.keys(output.data) : []));
      expect(mimes.filter((mime) => mime === "image/svg+xml").length).toBe(storedFigures(file));
      expect(mimes).toContain("text/latex");
      expect(metadata.language_info).toMatchObject({ name: "typescript" });
    },
  );

  it.each(demoNotebooks)("nbconvert executes %s and writes its page, with both figures", async (file) => {
    const name = `${path.basename(file, ".ipynb")}-nbconvert`;
    const args = ["-m", "nbconvert", "--execute", "--to", "html", "--output-dir", artefacts, "--output", name, file];
    await run(PYTHON, args, place.env);
    const html = readFileSync(path.join(artefacts, `${name}.html`), "utf8");
    expect(html.match(/<svg\b/g)?.length).toBe(storedFigures(file));
    expect(html.match(/class="jp-RenderedLatex/g)?.length).toBeGreaterThanOrEqual(5);
    expect(html.match(/data-mime-type="application\/vnd\.jupyter\.stderr"/g)).toBeNull();
  });
});
