// What running code shows and asks: displays, progress, a line of input, the order of the cells.
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { CellEvent } from "../../../kernel/cell/port.ts";
import { TestNotebook } from "./notebook.ts";

let notebook: TestNotebook;
beforeAll(async () => {
  notebook = new TestNotebook();
  await notebook.value("const r = rational(1, 3)");
}, 60_000);
afterAll(() => notebook.session.shutdown());

const displays = () =>
  notebook.events.filter((event): event is CellEvent & { type: "display" } => event.type === "display");

describe("display", () => {
  it("a value has its bundle: text, LaTeX and the value as data", async () => {
    const outcome = await notebook.run("r");
    expect(outcome).toMatchObject({ status: "ok", result: { data: { "text/plain": "1/3" } } });
    if (outcome.status === "ok") expect(outcome.result?.data["text/latex"]).toContain("\\frac");
  });

  it("typeset shows in the middle of a cell, and an id makes a display that changes", async () => {
    await notebook.run(
      "typeset(r, { displayId: 'one' }); typeset(r + 1, { displayId: 'one', update: true }); console.log('after')",
    );
    const [first, second] = displays().slice(-2);
    expect(first).toMatchObject({ displayId: "one", data: { "text/plain": "1/3" } });
    expect(second).toMatchObject({ displayId: "one", update: true, data: { "text/plain": "4/3" } });
  });

  it("console prints library values as results, and plain ones as ever", async () => {
    await notebook.run("console.log(r, [r, 2], 'text', 3); console.error('%s of %d', r, 4)");
    expect(notebook.output("stdout", notebook.last)).toBe("1/3 [1/3, 2] text 3\n");
    expect(notebook.output("stderr", notebook.last)).toBe("1/3 of 4\n");
  });
});

describe("progress", () => {
  it("one display that changes, through the list and at its end", async () => {
    const before = displays().length;
    expect(await notebook.value("let total = 0; for (const n of progress([1, 2, 3])) total += n; total")).toBe("6");
    const shown = displays().slice(before);
    expect(new Set(shown.map((event) => event.displayId)).size).toBe(1);
    expect(shown[0]).toMatchObject({ data: { "text/plain": `${"□".repeat(30)} 0 of 3` } });
    expect(shown.at(-1)).toMatchObject({ update: true, data: { "text/plain": `${"■".repeat(30)} 3 of 3` } });
  });

  it("a count of one's own", async () => {
    await notebook.run("const bar = progress({ of: 4 }); bar.advance(); bar.advance(); bar.finish()");
    expect(displays().at(-1)?.data["text/plain"]).toContain("2 of 4");
  });
});

describe("ask", () => {
  it("a line comes where the front end takes input; null is the end", async () => {
    const answers = ["50", null];
    for (const answer of answers) {
      const running = notebook.run("const line = await ask('digits?')", { allowStdin: true });
      await notebook.begun();
      expect(notebook.events.at(-1)).toMatchObject({ type: "input", prompt: "digits?", password: false });
      notebook.session.answerInput(answer);
      expect((await running).status).toBe("ok");
      expect(await notebook.value("String(line)")).toBe(JSON.stringify(answer ?? "undefined"));
    }
  });

  it("fails at once where nobody can answer", async () => {
    expect(await notebook.error("await ask('?')")).toContain("DomainError: ask: a place where nobody can answer");
  });

  it("an interrupt ends the wait, and the next question works", async () => {
    const running = notebook.run("await ask('?')", { allowStdin: true });
    await notebook.begun();
    notebook.session.interrupt();
    expect(await running).toMatchObject({ status: "error", ename: "Interrupted" });
    const again = notebook.run("(await ask('!'))?.length", { allowStdin: true });
    await notebook.begun();
    notebook.session.answerInput("four");
    expect(await again).toMatchObject({ status: "ok", result: { data: { "text/plain": "4" } } });
  });
});

describe("several questions of one cell", () => {
  const asked = () => notebook.events.flatMap((event) => (event.type === "input" ? [event.prompt] : []));

  it("come one after another, and each has its answer — oracle: the answers in the order of the questions", async () => {
    const before = asked().length;
    const running = notebook.run("(await Promise.all([ask('a'), ask('b'), ask('c')])).join(' ')", { allowStdin: true });
    for (const [n, line] of ["1", "2", "3"].entries()) {
      await notebook.until(() => asked().length > before + n);
      expect(asked().slice(before)).toEqual(["a", "b", "c"].slice(0, n + 1));
      notebook.session.answerInput(line);
    }
    expect(await running).toMatchObject({ status: "ok", result: { data: { "text/plain": '"1 2 3"' } } });
  });

  it("end with the interrupt, and the next cell asks its own — oracle: the questions put", async () => {
    const before = asked().length;
    const running = notebook.run("await Promise.all([ask('a'), ask('b')])", { allowStdin: true });
    await notebook.begun();
    notebook.session.interrupt();
    expect(await running).toMatchObject({ status: "error", ename: "Interrupted" });
    const next = notebook.run("await ask('c')", { allowStdin: true });
    await notebook.begun();
    notebook.session.answerInput("3");
    expect(await next).toMatchObject({ status: "ok", result: { data: { "text/plain": '"3"' } } });
    expect(asked().slice(before)).toEqual(["a", "c"]);
  });

  it("one that a cell left behind ends when a later cell asks — oracle: the end of the input", async () => {
    const left = notebook.run("let end: unknown = 0; void ask('left').then((line) => { end = line ?? 'none' })", {
      allowStdin: true,
    });
    expect(await left).toMatchObject({ status: "ok" });
    const next = notebook.run("[await ask('now'), end].join(' ')", { allowStdin: true });
    await notebook.begun();
    notebook.session.answerInput("yes");
    expect(await next).toMatchObject({ status: "ok", result: { data: { "text/plain": '"yes none"' } } });
  });
});

describe("order", () => {
  it("what ran when, and what has been defined again since", async () => {
    const own = new TestNotebook();
    await own.value("let a = 1");
    await own.value("const b = a + 1");
    await own.value("let a = 5");
    const text = await own.value("notebook.order()");
    expect(text).toMatch(/2\s+b\s+a of 1\s+a was defined again/);
    await own.session.shutdown();
  });
});
