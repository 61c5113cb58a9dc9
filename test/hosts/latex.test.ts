import { mkdtempSync, readFileSync, rmSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { demoNotebooks, storedFigures } from "./demo.ts";
import { missing, PYTHON, root, run } from "./hosts.ts";

const absent = missing(
  { module: "nbconvert", debianPackage: "python3-nbconvert" },
  { program: "/usr/bin/pandoc", debianPackage: "pandoc" },
  { program: "/usr/bin/rsvg-convert", debianPackage: "librsvg2-bin" },
  { program: "/usr/bin/xelatex", debianPackage: "texlive-xetex" },
  { program: "/usr/share/texlive/texmf-dist/tex/generic/ulem/ulem.sty", debianPackage: "texlive-plain-generic" },
  { program: "/usr/bin/pdftotext", debianPackage: "poppler-utils" },
);
if (absent) console.warn(`skipped, ${absent}`);

describe.skipIf(absent !== "")("nbconvert to LaTeX and PDF", () => {
  let folder: string;
  beforeAll(() => {
    folder = mkdtempSync(path.join(os.tmpdir(), "halfperiod latex "));
  });
  afterAll(() => rmSync(folder, { recursive: true, force: true }));

  it.each(demoNotebooks)("%s compiles without an error, with its formulas and figures — oracle: TeX", async (file) => {
    const name = path.basename(file, ".ipynb");
    const config = path.join(root, "test/hosts/nbconvert-pdf.py");
    const convert = ["-m", "nbconvert", "--config", config, "--to", "latex", "--output-dir", folder, file];
    await run(PYTHON, convert, process.env);
    const source = readFileSync(path.join(folder, `${name}.tex`), "utf8");
    expect(source.match(/\\adjustimage/g)?.length).toBe(storedFigures(file));
    const outputs = JSON.parse(readFileSync(file, "utf8")).cells.flatMap(outputsOf);
    const formulas = outputs.filter((output: { data?: object }) => output.data && "text/latex" in output.data);
    expect(formulas.length).toBeGreaterThanOrEqual(4);

    // halts at the first error, so a formula that TeX does not know ends it
    const words = ["-interaction=nonstopmode", "-halt-on-error", `${name}.tex`];
    await run("/usr/bin/xelatex", words, process.env, folder);
    const text = await run("/usr/bin/pdftotext", ["-layout", `${name}.pdf`, "-"], process.env, folder);
    for (const { execution_count } of outputs) {
      if (execution_count) expect(text).toMatch(new RegExp(`\\[${execution_count}\\]:`));
    }
  });
});

function outputsOf(cell: { readonly outputs?: readonly object[] }): readonly object[] {
  return cell.outputs ?? [];
}
