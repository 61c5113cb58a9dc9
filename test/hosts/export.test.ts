// What `export` writes, given to the programs that it is meant for: TeX engines, and Node with the library alone.
import { mkdirSync, mkdtempSync, readdirSync, readFileSync, rmSync, symlinkSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import ts from "typescript";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { demoNotebooks, storedFigures } from "./demo.ts";
import { artefacts, missing, root, run } from "./hosts.ts";

const halfperiod = (args: readonly string[], folder?: string) =>
  run(process.execPath, [path.join(root, "kernel/bin/halfperiod.mjs"), ...args], process.env, folder);

/** All that is hard for TeX: signs, long numbers, derivations with their links, words of a program, an error. */
const HARD = [
  [
    "markdown",
    "# Signs: ℘, ω₁, ≤, é, 数, `a_b`, 50 %, #1, {x}, \\$\n\nA [step](#step-torsion-counts), *words*, **more**.\n\n> quoted\n\n1. one\n2. two\n\n| $n$ | b |\n|--:|---|\n| 1 | a & b |\n\n```\nconst ω = `$x_1`; // ~^\\\n```",
  ],
  ["code", "const E = curve`y^2 + x y + y = x^3 - 19x + 26`;\nworking(E.torsion())"],
  ["code", "π.digits(700)"],
  ["code", "provedDigits(120);\nE.lattice()"],
  ["code", 'console.log("# $ % & _ { } ~ ^ \\\\ < > | \\" \' ` ℘ ∈ 数 " + "x".repeat(300))'],
  ["code", "[E.lattice().wp(1/3), E.lattice().tau]"],
  ["code", "({ a_b: 1n, '数': 2n, '%': π })"],
  ["fails", "throw new Error('50 % of #1 _ & \\\\')"],
] as const;

function hardNotebook(file: string): void {
  const cells = HARD.map(([kind, source]) =>
    kind === "markdown"
      ? { cell_type: kind, metadata: {}, source }
      : {
          cell_type: "code",
          metadata: kind === "fails" ? { tags: ["raises-exception"] } : {},
          source,
          execution_count: null,
          outputs: [],
        },
  );
  writeFileSync(file, JSON.stringify({ nbformat: 4, nbformat_minor: 4, metadata: {}, cells }));
}

const absent = missing(
  { program: "/usr/bin/pdflatex", debianPackage: "texlive-latex-base" },
  { program: "/usr/bin/xelatex", debianPackage: "texlive-xetex" },
  { program: "/usr/bin/pdftotext", debianPackage: "poppler-utils" },
);
if (absent) console.warn(`skipped, ${absent}`);

describe.skipIf(absent !== "")("papers: export --as latex, compiled — oracle: TeX", { timeout: 400_000 }, () => {
  const folder = path.join(artefacts, "papers");
  const hard = path.join(folder, "hard.ipynb");
  beforeAll(async () => {
    rmSync(folder, { recursive: true, force: true });
    mkdirSync(folder, { recursive: true });
    hardNotebook(hard);
    await halfperiod(["run", hard]);
  }, 300_000);

  it.each([...demoNotebooks, hard])("%s", async (file) => {
    const name = path.basename(file, ".ipynb");
    await halfperiod(["export", file, "--as", "latex", "--to", path.join(folder, `${name}.tex`)]);
    const figures = readdirSync(folder).filter(
      (other) => other.startsWith(`${name}-figure-`) && other.endsWith(".pdf"),
    );
    expect(figures).toHaveLength(storedFigures(file));
    const words = ["-interaction=nonstopmode", "-halt-on-error", "-no-shell-escape", `${name}.tex`];
    await run("/usr/bin/xelatex", words, process.env, folder);
    await run("/usr/bin/pdflatex", words, process.env, folder);
    await run("/usr/bin/pdflatex", words, process.env, folder);
    const log = readFileSync(path.join(folder, `${name}.log`), "latin1");
    const tooWide = [...log.matchAll(/Overfull \\hbox \(([\d.]+)pt too wide/g)].map(([, by]) => Number(by));
    expect(Math.max(0, ...tooWide)).toBeLessThan(30);
    expect(log).not.toMatch(/There were multiply-defined labels/);
    const text = await run("/usr/bin/pdftotext", ["-layout", `${name}.pdf`, "-"], process.env, folder);
    expect(text.length).toBeGreaterThan(500);
    // For a person to look at.
    await run("/usr/bin/pdftoppm", ["-r", "80", "-png", `${name}.pdf`, name], process.env, folder);
  });
});

describe("scripts: export --as ts, run by Node with the library alone", { timeout: 400_000 }, () => {
  let folder: string;
  beforeAll(() => {
    folder = mkdtempSync(path.join(os.tmpdir(), "halfperiod-scripts-"));
    mkdirSync(path.join(folder, "node_modules"));
    symlinkSync(root, path.join(folder, "node_modules", "halfperiod"));
  });
  afterAll(() => rmSync(folder, { recursive: true, force: true }));

  it.each(demoNotebooks)("%s prints equal values — oracle: a run of the notebook", async (file) => {
    const name = path.basename(file, ".ipynb");
    await halfperiod(["run", file, "--to", path.join(folder, `${name}.ipynb`)]);
    await halfperiod(["export", `${name}.ipynb`, "--as", "ts"], folder);
    const script = readFileSync(path.join(folder, `${name}.ts`), "utf8");
    // Types are only stripped, as Node does it by itself from 22.18 on.
    const { outputText } = ts.transpileModule(script, {
      compilerOptions: { module: ts.ModuleKind.ESNext, target: ts.ScriptTarget.ES2023, verbatimModuleSyntax: true },
    });
    writeFileSync(path.join(folder, `${name}.mjs`), outputText);
    const printed = await run(process.execPath, [`${name}.mjs`], process.env, folder);
    const { cells } = JSON.parse(readFileSync(path.join(folder, `${name}.ipynb`), "utf8")) as { cells: Cell[] };
    const shown = cells.flatMap(({ outputs = [] }) => outputs.map(textOf));
    expect(shown.length).toBeGreaterThan(10);
    expect(printed).toBe(shown.map((text) => (text.endsWith("\n") ? text : `${text}\n`)).join(""));
  });
});

interface Cell {
  readonly outputs?: readonly {
    readonly text?: readonly string[];
    readonly data?: Readonly<Record<string, readonly string[]>>;
  }[];
}

function textOf({ text, data }: NonNullable<Cell["outputs"]>[number]): string {
  return (text ?? data?.["text/plain"] ?? []).join("");
}
