import { spawnSync } from "node:child_process";
import { mkdirSync, mkdtempSync, readFileSync, rmSync, symlinkSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import ts from "typescript";
import { afterAll, describe, expect, it } from "vitest";
import { Names } from "../../../../kernel/notebook/script/names.ts";
import { notebookScript } from "../../../../kernel/notebook/script/script.ts";
import { packageRoot } from "../../../../kernel/service/info.ts";
import { code, notebookOf, text } from "../cells.ts";

const folder = mkdtempSync(path.join(tmpdir(), "script-"));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

/** The script of cells, without its head. */
function written(...sources: string[]): string {
  const script = notebookScript(notebookOf(...sources.map((source) => code(source))), { name: "n", folder });
  return script.slice(script.indexOf("\n\n", script.lastIndexOf("};\n") < 0 ? 0 : script.indexOf("};\n"))).trim();
}

const BEFORE =
  "const E = curve`y^2 + y = x^3 - x`;\nconst P = E.point(0, 0);\nconst w = E.lattice().periods[0];\nconst z = π.times(1);";

describe("operators written out", { timeout: 60_000 }, () => {
  it.each([
    ["P + 2*P", "show(P.plus(P.times(2)));"],
    ["-P - P", "show(P.neg().minus(P));"],
    ["1/3*w", 'show(w.times(rational("1/3")));'],
    ["(w + 1)/2", "show(w.plus(1).div(2));"],
    ["2*z**3 - 1", "show(z.pow(3).times(2).minus(1));"],
    ["1 - z", "show(real(1).minus(z));"],
    ["1/2 - z", 'show(real(rational("1/2")).minus(z));'],
    ["0.5*z", 'show(z.times(rational("1/2")));'],
    ["1 + 2*3", "show(1 + 2*3);"],
    ["[1, 2].map((n) => n + 1)", "show([1, 2].map((n) => n + 1));"],
    ["(2 + 3)*4", "show((2 + 3)*4);"],
    ["E.lattice().wp(1/3)", 'show(E.lattice().wp(rational("1/3")));'],
    ["z < 4", "show(operators.lt(z, 4));"],
    ["'z = ' + z", "show('z = ' + String(z));"],
    ["let s = z;\ns += 1;\ns", "let s = z;\ns = s.plus(1);\nshow(s);"],
    ["const f = (a: any, b: any) => [a*b, z]", "const f = (a: any, b: any) => [operators.mul(a, b), z]"],
    ["{ P, w }", "show(({ P, w }));"],
    ["z // the value", "show(z);\n// the value"],
  ])("%s", (source, expected) => {
    const script = written(BEFORE, source);
    expect(script.endsWith(expected), script.slice(-200)).toBe(true);
  });

  it("a name that is declared again gets a number, everywhere it is meant and nowhere else", () => {
    const script = written(
      "const a = 1;\nconst t = { a: 5, b: 6 };",
      "const a = 2;\nconst f = (a: number) => a;\nconst { b: c } = t;",
      "const { a, b } = t;\n[a, b, t.a, f(a), { a }]",
      "const curve = 3;\ncurve",
    );
    expect(script).toContain("const a2 = 2;\nconst f = (a: number) => a;");
    expect(script).toContain("const { a: a3, b } = t;\nshow([a3, b, t.a, f(a3), { a: a3 }]);");
    expect(script).toContain("const curve = 3;\nshow(curve);");
    const members = written(
      "const a = 1",
      "const a = 2;\nconst t = { a: 5 };\ntype T = { a: number };\nt.a + a + ({ a: 1 } as T).a",
    );
    expect(members).toContain("show(t.a + a2 + ({ a: 1 } as T).a);");
    expect(written("curve`y^2 = x^3 - x`", "const curve = 3;\ncurve")).toContain("const curve2 = 3;\nshow(curve2);");
  });

  it("texts are comments, a cell that is meant to fail is tried, one that cannot be checked is told", () => {
    const cells = notebookOf(text("# A title\n\nwords"), code("throw new Error('meant')", [], ["raises-exception"]));
    const script = notebookScript(cells, { name: "n", folder });
    expect(script).toContain("// # A title\n//\n// words");
    expect(script).toContain("try {\nthrow new Error('meant')\n} catch (error) {");
    expect(() => notebookScript(notebookOf(code("const n: string = 1")), { name: "n", folder })).toThrow(
      /code cell 1 does not pass the check/,
    );
    const refused = notebookOf(code("const n: string = 1", [], ["raises-exception"]));
    expect(notebookScript(refused, { name: "n", folder })).toContain("// const n: string = 1");
  });

  it("types of the library are imported as types, since Node only strips them", () => {
    const script = notebookScript(notebookOf(code("const f = (x: Numeric): Real => real(x);\nf(1)")), {
      name: "n",
      folder,
    });
    expect(script).toContain('import { Real, real, typeset, type Numeric } from "halfperiod";');
  });
});

it("names: the first free number", () => {
  const names = new Names();
  const first = names.enter(["a", "a2"], ["curve"]);
  expect([first("a"), first("a2"), first("b")]).toEqual(["a", "a2", "b"]);
  expect(names.enter(["a", "curve"], [])("a")).toBe("a3");
});

it("the script prints what the notebook shows — oracle: the notebook run by the kernel", { timeout: 300_000 }, () => {
  const bin = path.join(packageRoot, "kernel/bin/halfperiod.mjs");
  const sources = [
    "provedDigits(30);\nconst E = curve`y^2 + y = x^3 - x`;\nconst P = E.point(0, 0);\nP + 3*P",
    "const L = E.lattice();\nconst z = 1/3*L.periods[0] + 0.25*i;\n[L.wp(z), L.wp.prime(z)**2]",
    'claim("equation", L.wp.prime(z)**2, "=", 4*L.wp(z)**3 - L.invariants[0]*L.wp(z) - L.invariants[1])',
    "let s = π;\nfor (let k = 1; k < 4; k++) s += 1/k*π;\nconsole.log(String(s));\ns > 5",
    "table([1, 2, 3].map((n) => [n, n*P]))",
    "'text'",
  ];
  const cells = sources.map((source) => ({
    cell_type: "code",
    metadata: {},
    source,
    execution_count: null,
    outputs: [],
  }));
  const file = path.join(folder, "a.ipynb");
  writeFileSync(file, JSON.stringify({ nbformat: 4, nbformat_minor: 4, metadata: {}, cells }));
  const halfperiod = (...args: string[]) =>
    spawnSync(process.execPath, [bin, ...args], { encoding: "utf8", cwd: folder });
  expect(halfperiod("run", "a.ipynb").status).toBe(0);
  expect(halfperiod("export", "a.ipynb", "--as", "ts").stdout).toBe("a.ts\n");
  mkdirSync(path.join(folder, "node_modules"), { recursive: true });
  symlinkSync(packageRoot, path.join(folder, "node_modules", "halfperiod"));
  const script = readFileSync(path.join(folder, "a.ts"), "utf8");
  // Types are only stripped, as Node does it from 22.18 on.
  const stripped = ts.transpileModule(script, {
    compilerOptions: { module: ts.ModuleKind.ESNext, target: ts.ScriptTarget.ES2023, verbatimModuleSyntax: true },
  });
  writeFileSync(path.join(folder, "a.mjs"), stripped.outputText);
  const { stdout, stderr, status } = spawnSync(process.execPath, ["a.mjs"], { encoding: "utf8", cwd: folder });
  expect(status, stderr).toBe(0);
  const stored = JSON.parse(readFileSync(file, "utf8"));
  const expected = stored.cells.flatMap((cell: { outputs: { text?: string[]; data?: Record<string, string[]> }[] }) =>
    cell.outputs.map((output) => (output.text ?? [...(output.data?.["text/plain"] ?? []), "\n"]).join("")),
  );
  expect(stdout).toBe(expected.join(""));
});
