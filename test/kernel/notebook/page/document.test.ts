import { describe, expect, it } from "vitest";
import type { Cell, Notebook, Output } from "../../../../kernel/notebook/format.ts";
import { codeHtml } from "../../../../kernel/notebook/page/code.ts";
import { notebookPage } from "../../../../kernel/notebook/page/document.ts";
import { markdownHtml } from "../../../../kernel/notebook/page/markdown.ts";
import { splitFormulas } from "../../../../kernel/notebook/page/mathematics.ts";
import { plainText } from "../../../../kernel/notebook/page/terminal.ts";

const code = (source: string, ...outputs: Output[]): Cell => ({
  cell_type: "code",
  metadata: {},
  source,
  execution_count: 1,
  outputs,
});
const markdown = (source: string): Cell => ({ cell_type: "markdown", metadata: {}, source });
const notebook = (...cells: Cell[]): Notebook => ({ nbformat: 4, nbformat_minor: 5, metadata: {}, cells });
const result = (data: Record<string, unknown>): Output => ({ output_type: "display_data", data, metadata: {} });
const body = (html: string) => html.slice(html.indexOf("<main>"));

describe("formulas in running text", () => {
  it.each([
    ["costs $5 or $6 each", []],
    ["$x$ and $$y$$", ["x", "y"]],
    ["\\(a\\) \\[b\\]", ["a", "b"]],
    ["\\$x\\$ and $a\\$b$", ["a\\$b"]],
    ["\\begin{align}a\\end{align}", ["\\begin{align}a\\end{align}"]],
    ["open $x\n\nand y$ is text", []],
  ])("%j holds %j", (text, formulas) => {
    expect(splitFormulas(text).flatMap((piece) => (piece.kind === "formula" ? [piece.tex] : []))).toEqual(formulas);
  });
});

describe("markdown cells", () => {
  it("sets formulas as MathML that Markdown has not touched", () => {
    const html = markdownHtml("where $a_1 * b_2 * c$ and\n$$\\tau_1 \\in \\mathbb{H}$$\n");
    expect(html.match(/<math/g)).toHaveLength(2);
    expect(html).not.toContain("<em>");
    expect(html).toContain('display="block"');
  });

  it("keeps punctuation on the line of the formula before it", () => {
    expect(markdownHtml("so $a$, $b$$c$ and $d$")).toMatch(
      /so <span class="joined"><math.*<\/math>,<\/span> <math.*<\/math><math.*<\/math> and <math/s,
    );
    const page = body(notebookPage(notebook(code("x", result({ "text/latex": "so $a$; it is" }))), { name: "a" }));
    expect(page).toMatch(/class="stated">so <span class="joined"><math.*<\/math>;<\/span> it is/s);
  });

  it("marks table headers, shows an unreadable formula as its source, drops scripts", () => {
    expect(markdownHtml("|a|\n|-|\n|1|")).toContain('<th scope="col">');
    expect(markdownHtml("$\\frac{1$")).toContain('<code class="unread"');
    expect(markdownHtml("a <script>x</script> $y<z$")).not.toContain("<script");
  });

  it("embeds attachments of its cell", () => {
    expect(markdownHtml("![p](attachment:a.png)", { "a.png": { "image/png": "AAAA" } })).toContain(
      'src="data:image/png;base64,AAAA" alt="p"',
    );
  });
});

describe("the page of a notebook", () => {
  it("is self-contained: a policy that fetches nothing, no script, no address but namespaces", () => {
    const page = notebookPage(notebook(markdown("# A $\\tau$ title"), code("1")), { name: "a" });
    expect(page).toContain("default-src 'none'");
    expect(page).not.toMatch(/<script|<link|@import|src="(?!data:)|url\((?!["']?(?:data:|#|%23))/);
    expect(page.match(/https?:\/\/[^\s"')]+/g)?.filter((url) => !url.includes("www.w3.org")) ?? []).toEqual([]);
    expect(page).toContain("<title>A tau title</title>");
  });

  it("prefers pictures, then HTML, then LaTeX, then plain text", () => {
    const data = { "text/plain": "P", "text/latex": "$L$", "text/html": "<p>H</p>", "image/svg+xml": "<svg></svg>" };
    const page = body(notebookPage(notebook(code("x", result(data))), { name: "a" }));
    expect(page).toContain("<figure><svg");
    const { "image/svg+xml": _, ...table } = data;
    expect(body(notebookPage(notebook(code("x", result(table))), { name: "a" }))).toContain("<p>H</p>");
    const latex = body(
      notebookPage(notebook(code("x", result({ "text/plain": "P", "text/latex": "$$L$$" }))), { name: "a" }),
    );
    expect(latex).toContain("<math");
    expect(latex).not.toContain(">P<");
  });

  it("keeps ids of two equal pictures apart and gives a nameless one a label", () => {
    const picture = result({ "image/svg+xml": '<svg><g id="a"/><use href="#a"/></svg>' });
    const page = notebookPage(notebook(code("x", picture, picture)), { name: "a" });
    const ids = [...page.matchAll(/ id="(o[^"]+)"/g)].map((match) => match[1]);
    expect(new Set(ids).size).toBe(ids.length);
    expect(page).toContain('aria-label="figure, cell 1"');
  });

  it("typesets formulas inside HTML tables and escapes plain text", () => {
    const html = "<table><tr><td>$x &lt; y$</td></tr></table>";
    expect(body(notebookPage(notebook(code("x", result({ "text/html": html }))), { name: "a" }))).toContain(
      "<mo>&lt;</mo>",
    );
    const plain = result({ "text/plain": "<b>a</b>" });
    expect(body(notebookPage(notebook(code("x", plain)), { name: "a" }))).toContain("&lt;b&gt;a&lt;/b&gt;");
  });

  it("sets a table smaller only if one of its rows is long", () => {
    const table = (text: string) =>
      `<table><tr><td style="${"x".repeat(200)}">a</td></tr><tr><td>${text}</td></tr></table>`;
    const page = (text: string) =>
      body(notebookPage(notebook(code("x", result({ "text/html": table(text) }))), { name: "a" }));
    expect(page("1".repeat(97))).toContain('class="shown wide"');
    expect(page("1".repeat(90))).toContain('class="shown"');
  });

  it("names the notebook when it has no heading, and hides what its author folded", () => {
    const folded: Cell = { ...code("secret"), metadata: { jupyter: { source_hidden: true } } };
    const page = body(notebookPage(notebook(folded, code("shown")), { name: "Two <curves>" }));
    expect(page).toContain("<h1>Two &lt;curves&gt;</h1>");
    expect(page).not.toContain("secret");
    expect(page).toContain("shown");
  });
});

describe("small parts", () => {
  it("sees no keyword in strings, comments and names", () => {
    expect(codeHtml('const a = "const"; // const <\nb.new')).toBe(
      "<b>const</b> a = &quot;const&quot;; <i>// const &lt;</i>\nb.new",
    );
  });

  it("carries out carriage returns and backspaces, drops colours", () => {
    expect(plainText("10%\r100%\r\n\u001B[31mred\u001B[0m ab\bc")).toBe("100%\nred ac");
  });
});
