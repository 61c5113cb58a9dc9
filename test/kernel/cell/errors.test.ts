// Errors point at the user's own symbols.
import { writeFileSync } from "node:fs";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { TestNotebook } from "./notebook.ts";

let notebook: TestNotebook;
beforeAll(() => {
  notebook = new TestNotebook();
});
afterAll(() => notebook.session.shutdown());

describe("errors of a cell", () => {
  it("a type error: code, place, marked source — and nothing of the cell runs", async () => {
    const trace = await notebook.traceback("console.log('ran')\nconst n: number = 'a'");
    expect(trace).toContain("TypeScriptError: TS2322: Type 'string' is not assignable to type 'number'.");
    expect(trace).toContain(`in cell ${notebook.last}, line 2, column 7`);
    expect(trace).toContain("> 2 | const n: number = 'a'\n    |       ^");
    expect(notebook.output("stdout")).toBe("");
  });

  it("a syntax error at the end of the text is shown on the last line", async () => {
    const trace = await notebook.traceback("const a = 1 +");
    expect(trace).toContain("TS1109");
    expect(trace).toContain("line 1, column 14");
  });

  it("a type error about a name of an earlier cell does not speak of imports", async () => {
    await notebook.run("const fixed = 1");
    expect(await notebook.error("fixed = 2")).toContain("'fixed' is a constant of an earlier cell");
  });

  it("a run-time error: lines and columns of the TypeScript source, over cells, without machinery", async () => {
    await notebook.run(
      "interface Pair { a: number }\n\nfunction deep(pair: Pair | any): number {\n  return pair.a.b.c;\n}",
    );
    const defined = notebook.last;
    const trace = await notebook.traceback("const pair = { a: 1 };\n  deep(pair)");
    expect(trace).toContain("TypeError: Cannot read properties of undefined (reading 'c')");
    expect(trace).toContain(`deep, in cell ${defined}, line 4, column 19`);
    expect(trace).toContain("> 4 |   return pair.a.b.c;");
    expect(trace).toContain(`in cell ${notebook.last}, line 2, column 3`);
    expect(trace).not.toMatch(/node:|runner|\$rt/);
  });

  it("a run-time message names the user's variables, not boxes", async () => {
    await notebook.run("const thing: any = 3");
    expect(await notebook.error("thing()")).toBe("TypeError: thing is not a function");
    expect(await notebook.error("thing.foo()")).toBe("TypeError: thing.foo is not a function");
  });

  it("an error after an await keeps its place", async () => {
    const trace = await notebook.traceback("await null;\nthrow new RangeError('late')");
    expect(trace).toContain("RangeError: late");
    expect(trace).toContain(`in cell ${notebook.last}, line 2, column 7`);
  });

  it("the stack property speaks of cells", async () => {
    const stack = await notebook.value("const e1 = new Error('s');\ne1.stack");
    expect(stack).toContain(`in cell ${notebook.last}, line 1, column 12`);
  });

  it.each([
    ["throw 42", "Thrown: 42"],
    ["throw null", "Thrown: null"],
    ["throw undefined", "Thrown: undefined"],
    ["throw 'text'", "Thrown: text"],
    ["throw { a: 1 }", "Thrown: { a: 1 }"],
    ["throw new Proxy({}, { getPrototypeOf() { throw 1 } })", "Thrown: a value that throws when it is looked at"],
  ])("%s", async (code, expected) => {
    expect(await notebook.error(code)).toBe(expected);
  });

  it("a place in a TypeScript module beside the notebook is that of its source", async () => {
    const source =
      "interface Only {\n  types: string;\n}\n\nexport function fall(given: Only): number {\n  throw new Error(given.types);\n}\n";
    writeFileSync(join(notebook.cwd, "falling.ts"), source);
    const trace = await notebook.traceback("import { fall } from './falling.ts';\nfall({ types: 'down' })");
    expect(trace).toMatch(/fall, .*falling\.ts, line 6, column 9/);
    expect(trace).toContain(`in cell ${notebook.last}, line 2, column 1`);
  });

  it("a cause is shown", async () => {
    const trace = await notebook.traceback("throw new Error('outer', { cause: new TypeError('inner') })");
    expect(trace).toContain("Error: outer");
    expect(trace).toContain("caused by TypeError: inner");
  });

  it("stack overflow is an error of the cell", async () => {
    expect(await notebook.error("function again(): number { return again() + 1 }\nagain()")).toContain(
      "RangeError: Maximum call stack",
    );
    expect(await notebook.value("1")).toBe("1");
  });

  it("an object with getters and formatters that throw is shown without calling them", async () => {
    const text = await notebook.value(
      "({ get [Symbol.toStringTag](): string { throw new Error('no') }, [Symbol.for('nodejs.util.inspect.custom')]() { throw new Error('shy') } })",
    );
    expect(text).toBe("{}");
  });
});

describe("output and its owner", () => {
  it("console and process.stdout report under their cell, in order", async () => {
    await notebook.run("console.log('a'); console.error('b'); process.stdout.write('c\\n')");
    const cell = notebook.last;
    expect(notebook.output("stdout", cell)).toBe("a\nc\n");
    expect(notebook.output("stderr", cell)).toBe("b\n");
  });

  it("a late timer prints under the cell that started it", async () => {
    await notebook.run("setTimeout(() => console.log('late'), 30)");
    const starter = notebook.last;
    await notebook.run("await new Promise((r) => setTimeout(r, 150))");
    expect(notebook.output("stdout", starter)).toBe("late\n");
    expect(notebook.output("stdout", notebook.last)).toBe("");
  });

  it("a timer's exception and an unhandled rejection end nothing and report under their cell", async () => {
    await notebook.run(
      "setTimeout(() => {\n  throw new Error('in timer') }, 10);\nvoid Promise.reject(new Error('nobody'))",
    );
    const starter = notebook.last;
    await notebook.run("await new Promise((r) => setTimeout(r, 150))");
    const text = notebook.output("stderr", starter);
    expect(text).toContain("in timer");
    expect(text).toContain(`in cell ${starter}, line 2`);
    expect(text).toContain("nobody");
    expect(await notebook.value("'alive'")).toBe('"alive"');
  });

  it("every byte of a long print arrives, in order, without torn characters", async () => {
    const outcome = await notebook.run("for (let n = 0; n < 2000; n++) console.log('𝔭'.repeat(500) + n)");
    expect(outcome.status).toBe("ok");
    const lines = notebook.output("stdout", notebook.last).split("\n");
    expect(lines.length).toBe(2001);
    expect(lines.every((line, n) => n === 2000 || line === `${"𝔭".repeat(500)}${n}`)).toBe(true);
  });

  it("a program that a cell starts prints into the cell", async () => {
    await notebook.run(
      "import { spawnSync } from 'node:child_process'; spawnSync('echo', ['child'], { stdio: 'inherit' })",
    );
    await notebook.run("await new Promise((r) => setTimeout(r, 50))");
    expect(notebook.output("stdout")).toContain("child\n");
  });

  it("user expressions: one failing does not touch the others, and nothing is published", async () => {
    const before = notebook.events.length;
    const outcome = await notebook.run("const ue = 5", {
      userExpressions: { good: "ue + 1", bad: "nope", loud: "console.log('x')" },
    });
    expect(outcome.status).toBe("ok");
    if (outcome.status !== "ok") return;
    expect(outcome.userExpressions.good).toMatchObject({ status: "ok", data: { "text/plain": "6" } });
    expect(outcome.userExpressions.bad).toMatchObject({ status: "error", ename: "TypeScriptError" });
    expect(notebook.events.length).toBe(before);
  });
});
