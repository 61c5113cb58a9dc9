import { describe, expect, it } from "vitest";
import { codeTex, formulaTex, textTex } from "../../../../kernel/notebook/latex/characters.ts";
import { notebookLatex } from "../../../../kernel/notebook/latex/document.ts";
import { breakable, displayTex, splitTop } from "../../../../kernel/notebook/latex/formulas.ts";
import { pictureFiles } from "../../../../kernel/notebook/latex/pictures.ts";
import { VALUE_TYPE } from "../../../../kernel/notebook/values.ts";
import { code, notebookOf, shown, text } from "../cells.ts";

const paper = (...cells: Parameters<typeof notebookOf>) => notebookLatex(notebookOf(...cells), { name: "n" });
const body = (...cells: Parameters<typeof notebookOf>) => paper(...cells).tex.split("\\maketitle")[1] ?? "";

describe("characters", () => {
  it("what TeX reserves is escaped; signs are commands of any engine; others are named by number", () => {
    expect(textTex("a_b & 50% #1 {x} \\y $z ^ ~")).toBe(
      "a\\_b \\& 50\\% \\#1 \\{x\\} \\textbackslash{}y \\$z \\textasciicircum{} \\textasciitilde{}",
    );
    expect(textTex("℘(ω1/2) ≤ π — naïve")).toBe(
      "\\ensuremath{\\wp}(\\ensuremath{\\omega}1/2) \\ensuremath{\\leq} \\ensuremath{\\pi} --- naïve",
    );
    expect(textTex("数")).toBe("\\othersign{6570}{数}");
    expect(formulaTex("\\text{℘ of }z")).toBe("\\text{\\ensuremath{\\wp} of }z");
  });

  it("code keeps its blanks, and long words may break", () => {
    expect(codeTex("  a  b")).toBe("\\codeindent{2}a \\ b");
    expect(codeTex("1".repeat(50))).toContain("\\allowbreak{}");
  });
});

describe("formulas in a column", () => {
  it("rows are split outside of groups and environments only", () => {
    expect(splitTop("a \\\\ \\begin{array}{l} b \\\\ c \\end{array} \\\\ {d \\\\ e}", "\\\\")).toEqual([
      "a",
      "\\begin{array}{l} b \\\\ c \\end{array}",
      "{d \\\\ e}",
    ]);
  });

  it("conventions become small print that breaks, captions words, the value stays whole", () => {
    const tex =
      "\\displaystyle \\begin{array}{l} \\text{Title.} \\\\ x = 1 \\\\ \\displaystyle {\\scriptstyle {j}\\text{ is }{j(i) = 1728}} \\end{array}";
    expect(displayTex(tex)).toBe(
      ["\\heading{Title.}", "\\shown{x = 1}", "\\note{$", "{j}$ is $", "{j(i) = 1728}$}"]
        .join("\n")
        .replaceAll("$\n{", "$" + "{"),
    );
  });

  it("a number of 200 digits breaks between its groups, in equations too; a table stays a table", () => {
    const number = `1.${Array.from({ length: 40 }, () => "23456").join("\\,")}`;
    expect(displayTex(number)).toMatch(/^\\longvalue\{\$1\.23456\\,\\allowbreak 23456/);
    const pair = `\\begin{array}{rcl} a & = & ${number} \\\\ b & = & 2 \\end{array}`;
    expect(displayTex(pair).split("\n")).toHaveLength(2);
    const lines = "\\begin{array}{l} 3.14159\\,26535 \\\\ \\phantom{3.}58979\\,32384\\ldots \\end{array}";
    expect(displayTex(lines)).toBe(
      "\\longvalue{$3.14159\\,\\allowbreak 26535\\,\\allowbreak 58979\\,\\allowbreak 32384\\ldots$}",
    );
    const table = `\\begin{array}{l} \\text{c4} \\\\ \\hline ${number} \\end{array}`;
    expect(displayTex(table)).toMatch(/^\\shown\{\\begin\{array\}/);
    expect(breakable("a\\,b 12\\,345")).toBe("a\\,b 12\\,\\allowbreak 345");
  });
});

describe("the paper", () => {
  it("has title, sections, lists, tables, links to labels, code and results", () => {
    const tex = body(
      text("# On $\\wp$\n\nSee [step 2](#step-torsion-counts) and [there](https://example.org/a%20b)."),
      text("## 1. First\n\n- one\n- *two*\n\n| a | b |\n|---|--:|\n| 1 | $x_1$ |\n\n$$ E = mc^2 $$"),
      code("const a = `x_1`;", [shown({ "text/plain": "1", "text/latex": "$\\displaystyle x^{2}$" })]),
    );
    expect(paper(text("# On $\\wp$")).tex).toContain("\\title{On $\\wp$}");
    expect(tex).toContain("\\hyperref[step-torsion-counts]{step 2}");
    expect(tex).toContain("\\href{https://example.org/a\\%20b}{there}");
    expect(tex).toContain("\\section*{1. First}");
    expect(tex).toContain("\\item one");
    expect(tex).toContain("\\begin{tabular}{lr}\n\\hline\na & b \\\\\\hline\n1 & $x_1$ \\\\\n\\hline");
    expect(tex).toContain("\\[E = mc^2\\]");
    expect(tex).toContain("\\codeline{const a = \\textasciigrave{}x\\_1\\textasciigrave{};}");
    expect(tex).toContain("\\shown{x^{2}}");
  });

  it("gathers the sources that values cite, numbered by first use", () => {
    const derivation = { kind: "derivation", steps: [{ source: "Silverman AEC III.2.3" }, { source: "DLMF 23.6" }] };
    const again = { kind: "derivation", steps: [{ source: "DLMF 23.6" }] };
    const tex = body(
      code("a", [shown({ "text/plain": "1", "text/latex": "$1$", [VALUE_TYPE]: derivation })]),
      code("b", [shown({ "text/plain": "2", "text/latex": "$2$", [VALUE_TYPE]: again })]),
    );
    expect(tex).toContain("\\cite{source-1,source-2}");
    expect(tex).toContain("\\cite{source-2}");
    expect(tex).toContain("\\bibitem{source-1} Silverman AEC III.2.3\n\\bibitem{source-2} DLMF 23.6\n");
  });

  it("a derivation stands with its labels as it comes", () => {
    const latex =
      "\\paragraph{Torsion.}\\label{step-torsion}\n\\begin{enumerate}\n\\item\\label{step-torsion-curve} the curve:\n\\[ y^2 = x^3 \\]\n\\end{enumerate}";
    expect(body(code("a", [shown({ "text/latex": latex })]))).toContain(
      "\\item\\label{step-torsion-curve} the curve:\n\\shown{y^2 = x^3}",
    );
  });

  it("a picture is a file beside; without a converter SVG, with what to do", () => {
    const svg =
      '<svg width="9" height="9"><title>An oval</title><path d="M0,0H9"/><image href="file:///etc/passwd"/></svg>';
    const { tex, pictures } = paper(code("a", [shown({ "image/svg+xml": svg })]));
    expect(tex).toContain("\\picturefile{n-figure-1}{An oval}");
    const { files, advice } = pictureFiles(pictures, "/no/such/converter");
    expect(files.map(({ name }) => name)).toEqual(["n-figure-1.svg"]);
    expect(String(files[0]?.bytes)).not.toContain("passwd");
    expect(advice).toContain("rsvg-convert -f pdf -o n-figure-1.pdf n-figure-1.svg");
  });
});
