// Slips that a mathematician makes in TypeScript: each gets its hint, and what was meant where that is certain.
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { TestNotebook } from "./notebook.ts";

let notebook: TestNotebook;
beforeAll(async () => {
  notebook = new TestNotebook();
  await notebook.value("const w = real(2).sqrt(), a = 1, b = 'two', list = [1, 2, 3]");
}, 60_000);
afterAll(() => notebook.session.shutdown());

describe("errors with a hint", () => {
  it.each([
    ["-a ** 2", "Write -(x ** 2) or (-x) ** 2."],
    ["2π", "A product needs its sign: 2*π."],
    ["F = 3", "Write const F = ... to give it a value."],
    ["w ^ 2", "A power is written **."],
    ["new Map([[w, 2]])", "Map finds what it holds by ===. Use a text for each value"],
    ["new Set([w])", "Set finds what it holds by ==="],
    ["const seen = new Set<unknown>(); seen.has(w)", "a Set finds what it holds by ==="],
    ["const table = new Map<unknown, number>(); table.set(w, 1)", "a Map finds what it holds by ==="],
    ["let s = 0; for (const k of list) s += k * w", "Begin with a library value: let s = real(0)."],
    ["const q = a\n[list]", "This line begins with a bracket and joins the one above"],
    ["const q = a\n(w)", "This line begins with a bracket and joins the one above"],
  ])("%j", async (code, hint) => {
    expect(await notebook.error(code)).toContain(hint);
  });
});

describe("notices", () => {
  it.each([
    ["2^10", "2^10 is 8, the exclusive or of the bits; a power is written 2**10."],
    ["1n / 3n", "1n / 3n is 0n: bigints divide without the fraction. Write rational(1, 3)."],
    ["{ const π = 3 }; let i = 5", "From here on i is your own value and hides the imaginary unit"],
    ["{ let i = 2; void i }; const i = 5; complex.i ** 2", "complex.i still is it"],
    ["let s = w; for (let i = 0; i < 3; i++) s += i * w", "Inside the loop i is its counter"],
  ])("%j", async (code, notice) => {
    await notebook.value(code);
    expect(notebook.output("stderr", notebook.last)).toContain(notice);
  });

  it.each(["6n / 3n", "a ^ 3", "for (let i = 0; i < 3; i++) list.push(i * 2)", "new Map([['w', w]]).get('w')"])(
    "none for %j",
    async (code) => {
      await notebook.value(code);
      expect(notebook.output("stderr", notebook.last)).toBe("");
    },
  );
});

describe("a final { a, b } is an object", () => {
  it.each([
    ["{ a, b }", '{ a: 1, b: "two" }'],
    ["{ a }", "{ a: 1 }"],
    ["{ sum: a + 1, b }", '{ sum: 2, b: "two" }'],
    ["const c = 1;\n{ a, c };", "{ a: 1, c: 1 }"],
    ["{ x: 1 }", "{ x: 1 }"],
  ])("%j", async (code, expected) => {
    expect(await notebook.value(code)).toBe(expected);
  });

  it.each([
    ["{ let q = a; q + 1 }", ""],
    ["if (a) { a }", ""],
    ["function f() { return a }", ""],
  ])("but %j is what it is", async (code, expected) => {
    expect(await notebook.value(code)).toBe(expected);
  });

  it("errors inside it stay at their place", async () => {
    expect(await notebook.traceback("{ a, nowhere }")).toContain("line 1, column 6\n");
  });
});
