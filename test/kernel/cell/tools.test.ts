// Completion, inspection and completeness: what the front end asks while a cell is typed. No code of the user runs.
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { balance } from "../../../kernel/cell/balance.ts";
import type { CompletionList } from "../../../kernel/cell/port.ts";
import { TestNotebook } from "./notebook.ts";

let notebook: TestNotebook;
beforeAll(async () => {
  notebook = new TestNotebook();
  await notebook.value(
    "/** Counts. */\nfunction countUp(from: number) { return from + 1 }\nconst E = curve`y^2 + y = x^3 - x`, P = E.point(0, 0), w = real(2).sqrt(); let options = { depth: 3 }",
  );
}, 60_000);
afterAll(() => notebook.session.shutdown());

/** `|` marks the cursor. */
function completions(marked: string): Promise<CompletionList> {
  const offset = marked.indexOf("|");
  return notebook.session.complete(marked.replace("|", ""), offset);
}

const texts = (list: CompletionList) => list.matches.map((match) => match.text);

describe("completion", () => {
  it("names of earlier cells and of the library", async () => {
    expect(texts(await completions("count|"))).toContain("countUp");
    expect(texts(await completions("latt|"))).toContain("lattice");
  });

  it("members of a library value, with kind and signature", async () => {
    const list = await completions("E.disc|");
    expect(list).toMatchObject({ start: 2, end: 6 });
    expect(texts(list)).toEqual(["discriminant"]);
    const [plus] = (await completions("P.plu|")).matches;
    expect(plus).toMatchObject({ text: "plus", type: "function" });
    expect(plus?.signature).toContain("Point");
    expect(plus?.signature).toContain("— P + Q: the chord");
  });

  it("members behind an operator, through the text that is checked", async () => {
    expect(texts(await completions("(2 * P + P).ord|"))).toEqual(["order"]);
    expect(texts(await completions("const q = 1/3 * w;\nq.dig|"))).toEqual(["digits"]);
  });

  it("keys of an options object", async () => {
    expect(texts(await completions("lattice({ t| })"))).toContain("tau");
  });

  it.each([
    ["\\omega|", "ω"],
    ["\\wp|", "℘"],
    ["1 + \\tau|", "τ"],
    ["\\mathfrak{p}|", "𝔭"],
    ["\\Omeg|", "Ω"],
  ])("the letter of %s is %s", async (marked, letter) => {
    const list = await completions(marked);
    expect(texts(list)[0]).toBe(letter);
    expect(list.start).toBe(marked.indexOf("\\"));
  });

  it("behind an astral letter the range is in UTF-16 units", async () => {
    expect(await completions("const 𝔭 = 1; 𝔭 + count|")).toMatchObject({ start: 19, end: 24 });
  });

  it("runs no getter, and nothing of the machinery is offered", async () => {
    await notebook.run("let touched = 0; const trap = { get inner() { touched++; return { deep: 1 } } }");
    expect(texts(await completions("trap.inner.|"))).toContain("deep");
    expect(await notebook.value("touched")).toBe("0");
    expect(texts(await completions("$|")).filter((text) => text.startsWith("$"))).toEqual([]);
  });

  it("in a broken cell, and where nothing fits, there is still an answer", async () => {
    expect(texts(await completions("if (P.| "))).toContain("plus");
    expect(texts(await completions("nothingfits|"))).toEqual([]);
  });
});

async function inspected(marked: string, detail: 0 | 1 = 0): Promise<string> {
  const offset = marked.indexOf("|");
  const bundle = await notebook.session.inspect(marked.replace("|", ""), offset, detail);
  return String(bundle?.["text/plain"] ?? "");
}

describe("inspection", () => {
  it("finds nothing of a name that is declared nowhere — oracle: no declaration", async () => {
    for (const code of ["no_such_name", "no_such_name(1, "]) {
      expect(await notebook.session.inspect(code, code.length, 0)).toBeUndefined();
    }
  });

  it("signature, documentation and current value of a variable", async () => {
    const text = await inspected("w|");
    expect(text).toContain("w: Real");
    expect(text).toContain("= 1.41421356");
  });

  it("a function of an earlier cell, also from inside its brackets", async () => {
    for (const marked of ["countUp|(1)", "countUp(1|)"]) expect(await inspected(marked)).toContain("Counts.");
  });

  it("a name of the library with its docstring; detail 1 adds the source", async () => {
    expect(await inspected("enclo|se")).toContain("A measured value");
    expect(await inspected("countUp|", 1)).toContain("function countUp(from: number)");
  });

  it("as HTML: parts of the docstring one by one, letters and indices set — oracle: the docstring read by hand", async () => {
    const marked = "legendre.K|";
    const bundle = await notebook.session.inspect("legendre.K", marked.indexOf("|"), 0);
    const html = String(bundle?.["text/html"]);
    expect(html).toContain("The complete integral <i>K</i>(<i>m</i>).");
    expect(html).toContain("<b>Domain</b> <i>m</i> ≠ 1.</div>");
    expect(html).toContain("{ <i>m</i><sub>1</sub> } keeps all digits");
    expect(html).not.toMatch(/<script|on\w+=/);
  });

  it("the value of a variable with its standing — oracle: √2 and 1/3 are exact, the fourth root of 2 defined, an enclosure measured", async () => {
    await notebook.run("const third = 1/3 * real(1), seen = enclose('1.25', '1e-6'), root = sqrt(real(2).sqrt())");
    expect(await inspected("w|")).toMatch(/1\.414\d*\.\.\.\n {2}exact/);
    expect(await inspected("third|")).toMatch(/= 1\/3\n {2}exact/);
    expect(await inspected("root|")).toMatch(/= 1\.189\d*\.\.\.\n {2}defined by exact input/);
    expect(await inspected("seen|")).toContain("1.25 ± 1e-6\n  measured");
  });

  it("nothing known is nothing found", async () => {
    expect(await notebook.session.inspect("   ", 1, 0)).toBeUndefined();
  });
});

const COMPLETENESS: readonly (readonly [code: string, status: string])[] = [
  ["1 + 1", "complete"],
  ["", "complete"],
  ["function f() {", "incomplete"],
  ["1 +", "incomplete"],
  ["const a = [1,", "incomplete"],
  ["`text", "incomplete"],
  ["`text ${1", "incomplete"],
  ["/* comment", "incomplete"],
  ["f(1", "incomplete"],
  ["if (x) {\n  y\n}", "complete"],
  ["a)", "invalid"],
  ["'unclosed", "invalid"],
  ["/[)]/.test('(')", "complete"],
  ["const { a } = b", "complete"],
];

describe("completeness — oracle: the grammar", () => {
  it.each(COMPLETENESS)("%j is %s", async (code, status) => {
    expect((await notebook.session.isComplete(code)).status).toBe(status);
  });

  it.each(COMPLETENESS.filter(([code]) => code !== "'unclosed"))("by brackets alone, %j is %s", (code, status) => {
    expect(balance(code).status).toBe(status);
  });

  it("the next line is indented behind an opening bracket", async () => {
    expect(await notebook.session.isComplete("  if (x) {")).toEqual({ status: "incomplete", indent: "    " });
  });
});
