// What a cell means: each case is a run of cells on a real session, and what the last one shows.
import { mkdirSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { TestNotebook } from "./notebook.ts";

let notebook: TestNotebook;

beforeAll(() => {
  notebook = new TestNotebook();
  const beside = join(notebook.cwd, "node_modules", "neighbour");
  mkdirSync(beside, { recursive: true });
  writeFileSync(
    join(beside, "package.json"),
    '{"name":"neighbour","version":"1.0.0","type":"module","exports":"./main.js"}',
  );
  writeFileSync(join(beside, "main.js"), "export const shout = (text) => text.toUpperCase(); export default 42;");
  writeFileSync(
    join(notebook.cwd, "helper.ts"),
    'import { deep } from "./deep.ts";\nexport enum Size { big = 3 }\nexport const sized = (n: number): number => n * Size.big + deep;\n',
  );
  writeFileSync(join(notebook.cwd, "deep.ts"), "export const deep: number = 100;");
  writeFileSync(join(notebook.cwd, "edited.ts"), "export const version = 1;");
  writeFileSync(
    join(notebook.cwd, "numbers.ts"),
    'import { type Real, real, π } from "halfperiod";\nexport const half: Real = real("0.5");\nexport const circle = (r: Real): Real => r.pow(2).times(π);\n',
  );
  writeFileSync(join(notebook.cwd, "plain.mjs"), 'import { real } from "halfperiod"; export const two = real(2);');
  writeFileSync(join(notebook.cwd, "outer.ts"), 'export { inner as outer } from "./inner.ts";');
  writeFileSync(join(notebook.cwd, "inner.ts"), "export const inner = 1;");
  writeFileSync(join(notebook.cwd, "table.json"), '{"n": 10}');
  writeFileSync(join(notebook.cwd, "data.json"), '{"rank": 1}');
});
afterAll(() => notebook.session.shutdown());

/** Cells, and the text of the value of the last one; "Name: message" if it fails. */
type Case = readonly [title: string, cells: readonly string[], expected: string];

const CASES: readonly Case[] = [
  ["a value", ["6 * 7"], "42"],
  ["no value of a declaration", ["const only = 1"], ""],
  ["no value of undefined", ["undefined"], ""],
  ["empty", [""], ""],
  ["a comment only", ["// nothing"], ""],
  ["semicolons hide nothing", ["3;;"], "3"],
  ["a trailing comment", ["3 // three"], "3"],
  ["const, let and function persist", ["const c1 = 1; let l1 = 2; function f1() { return c1 + l1 }", "f1()"], "3"],
  ["a redeclaration with another type", ["let r1 = 1", "let r1 = 'one'", "r1.length"], "3"],
  [
    "const becomes let becomes function",
    ["const k1 = 1", "let k1 = 2; k1 = 3", "function k1() { return 'f' }", "k1()"],
    '"f"',
  ],
  ["a closure sees a later assignment", ["let s1 = 1; const get1 = () => s1", "s1 = 2", "get1()"], "2"],
  ["a closure sees a later declaration", ["let s2 = 1; const get2 = () => s2", "let s2 = 5", "get2()"], "5"],
  [
    "a class persists, also as a type",
    ["class P1 { constructor(readonly x: number) {} }", "const p1: P1 = new P1(4)", "p1.x"],
    "4",
  ],
  ["a class is redeclared", ["class P2 { a = 1 }", "class P2 { b = 2 }", "new P2().b"], "2"],
  [
    "a class refers to itself",
    ["class P3 { static one = new P3(); static get() { return P3.one instanceof P3 } }", "P3.get()"],
    "true",
  ],
  [
    "a class extends one of an earlier cell",
    ["class B1 { m() { return 'b' } }", "class D1 extends B1 {}; new D1().m()"],
    '"b"',
  ],
  [
    "interface and type persist",
    ["interface I1 { n: number }; type T1 = I1 | null", "const t1: T1 = { n: 1 }; t1.n"],
    "1",
  ],
  ["enum", ["enum E1 { A = 3, B }", "[E1.B, E1[3]]"], '[4, "A"]'],
  ["const enum", ["const enum E2 { A = 'a' }", "E2.A"], '"a"'],
  ["namespace", ["namespace N1 { export const a = 1; export const b = a + 1 }", "N1.b"], "2"],
  [
    "merged function and namespace",
    ["function F2() { return F2.k }; namespace F2 { export const k = 9 }", "F2()"],
    "9",
  ],
  [
    "destructuring of objects",
    ["const { a: d1, b: { c: d2 = 7 }, ...d3 } = { a: 1, b: {} as { c?: number }, z: 3 }", "[d1, d2, d3]"],
    "[1, 7, { z: 3 }]",
  ],
  [
    "destructuring of arrays",
    ["let [x1, , y1 = 5, ...z1] = [1, 2, undefined, 4, 5]", "[x1, y1, z1]"],
    "[1, 5, [4, 5]]",
  ],
  ["swap", ["let w1 = 1, w2 = 2", "[w1, w2] = [w2, w1]; [w1, w2]"], "[2, 1]"],
  ["shorthand properties", ["let q1 = 1", "({ q1 })"], "{ q1: 1 }"],
  [
    "assignment through a shorthand pattern",
    ["let q2 = 1, q3 = 0", "({ q2, q3 = 8 } = { q2: 4 }); [q2, q3]"],
    "[4, 8]",
  ],
  ["an object as the last expression", ["({ a: 1 })"], "{ a: 1 }"],
  ["compound and increment", ["let i1 = 1", "i1 += 2; i1++; ++i1; i1 **= 2; i1"], "25"],
  ["calls have no receiver", ["const th1 = function (this: unknown) { return this }", "th1()"], ""],
  [
    "calls of tags have no receiver",
    ["function tag1(this: unknown, s: TemplateStringsArray) { return [this, s[0]] }", "tag1`x`"],
    '[undefined, "x"]',
  ],
  [
    "optional calls",
    ["const opt1 = undefined as undefined | (() => number)", "[opt1?.(), String(opt1?.())]"],
    '[undefined, "undefined"]',
  ],
  [
    "anonymous functions keep their name",
    ["const named1 = () => 0; const named2 = class {}", "[named1.name, named2.name]"],
    '["named1", "named2"]',
  ],
  ["functions are hoisted", ["const h1 = hoisted(); function hoisted() { return 'up' }", "h1"], '"up"'],
  ["var in a block is a name of the notebook", ["if (true) { var v1 = 3 }", "v1"], "3"],
  ["var in a loop", ["for (var v2 = 0; v2 < 4; v2++) {}", "v2"], "4"],
  ["var in for-of", ["for (var v3 of [1, 2, 3]) {}", "v3"], "3"],
  ["let in a block is local", ["let b1 = 1; { let b1 = 2; b1++ }", "b1"], "1"],
  ["a loop variable is local", ["let j1 = 'outer'; for (let j1 = 0; j1 < 2; j1++) {}", "j1"], '"outer"'],
  [
    "closures over loop variables",
    ["const fs1: (() => number)[] = []; for (let n = 0; n < 3; n++) fs1.push(() => n)", "fs1.map((f) => f())"],
    "[0, 1, 2]",
  ],
  ["parameters shadow", ["let sh1 = 1; const id1 = (sh1: number) => sh1 * 2", "id1(4)"], "8"],
  ["catch variables shadow", ["let sh2 = 'o'; try { throw 1 } catch (sh2) { void sh2 }", "sh2"], '"o"'],
  [
    "a true global is shadowed and later freed in no other module",
    ["const parseInt = () => 'mine'", "[parseInt(), Number.parseInt('7')]"],
    '["mine", 7]',
  ],
  [
    "labels",
    ["let lab = 0; outer: for (;;) { for (;;) { lab++; if (lab > 2) break outer; continue outer } }", "lab"],
    "3",
  ],
  ["generators", ["function* gen1() { yield 1; yield* [2, 3] }", "[...gen1()]"], "[1, 2, 3]"],
  ["top-level await", ["const aw1 = await Promise.resolve(5); aw1 + 1"], "6"],
  ["await in a nested expression", ["[await 1, (await Promise.resolve([2]))[0]]"], "[1, 2]"],
  ["for await over promises", ["let sum1 = 0; for await (const n of [Promise.resolve(1), 2]) sum1 += n; sum1"], "3"],
  [
    "for await over an async generator",
    [
      "async function* ag1() { yield 1; yield 2 }; const got1: number[] = []; for await (const n of ag1()) got1.push(n); got1",
    ],
    "[1, 2]",
  ],
  ["a promise is not awaited for the value", ["(async () => 1)() instanceof Promise"], "true"],
  [
    "await using and using end with the cell",
    [
      "const ended: string[] = []; { using u1 = { [Symbol.dispose]() { ended.push('u') } }; void u1 }",
      "using u2 = { [Symbol.dispose]() { ended.push('cell') } }; void u2; ended.length",
      "ended",
    ],
    '["u", "cell"]',
  ],
  [
    "decorators",
    [
      "function twice(m: () => number, _: unknown) { return function (this: unknown) { return 2 * m.call(this) } }",
      "class Dec1 { @twice m() { return 4 } }; new Dec1().m()",
    ],
    "8",
  ],
  ["import of a node module", ["import { sep } from 'node:path'", "sep"], '"/"'],
  [
    "namespace and default import",
    ["import * as p2 from 'node:path'; import p3 from 'node:path'", "p2.sep + p3.sep"],
    '"//"',
  ],
  ["import of types only", ["import type { Stats } from 'node:fs'", "const st: Stats | undefined = undefined; st"], ""],
  ["dynamic import", ["(await import('node:path')).sep"], '"/"'],
  ["a package beside the notebook", ["import shout0, { shout } from 'neighbour'", "shout('a') + shout0"], '"A42"'],
  ["JSON beside the notebook", ["import data from './data.json'", "data.rank"], "1"],
  [
    "a library value from TypeScript beside the notebook",
    ["import { half, circle } from './numbers.ts'", "[half + 1, circle(half) > half]"],
    "[3/2, true]",
  ],
  [
    "a library value from JavaScript beside the notebook",
    ["import { two } from './plain.mjs'", "two instanceof (real(1).constructor as any)"],
    "true",
  ],
  ["require of the library", ["const hp: typeof import('halfperiod') = require('halfperiod'); hp.real(2) + 1"], "3"],
  ["TypeScript beside the notebook", ["import { sized } from './helper.ts'", "sized(2)"], "106"],
  [
    "an edit of a module beside the notebook is seen, by the checker and at run time",
    [
      "import { version } from './edited.ts'",
      "import { writeFileSync } from 'node:fs'; writeFileSync('edited.ts', \"export const version = 'two';\")",
      "import { version } from './edited.ts'; version.length",
    ],
    "3",
  ],
  [
    "an edit of what such a module imports, and of JSON, is seen too",
    [
      "import { outer } from './outer.ts'; import table from './table.json'; [outer, table.n]",
      "import { writeFileSync } from 'node:fs'; writeFileSync('inner.ts', 'export const inner = 2;'); writeFileSync('table.json', '{\"n\": 20}')",
      "import { outer } from './outer.ts'; import table from './table.json'; [outer, table.n]",
    ],
    "[2, 20]",
  ],
  ["require", ["require('node:path').sep"], '"/"'],
  ["import.meta", ["typeof import.meta.url"], '"string"'],
  [
    "export is dropped",
    ["export const ex1 = 1; export { ex1 as ex2 }; export function ex3() { return ex1 }", "ex3()"],
    "1",
  ],
  ["export default is the value", ["export default 7"], "7"],
  ["export default of a function", ["export default function () { return 8 }"], "a function without a name"],
  ["identifiers that begin with $", ["const $x = 1; const $$rt = 2", "$x + $$rt"], "3"],
  ["identifiers beyond ASCII", ["const ω1 = 1, 𝔭 = 2", "ω1 + 𝔭"], "3"],
  ["typeof of a name", ["let ty1 = 1", "typeof ty1"], '"number"'],
  [
    "a failed cell leaves what it did not reach",
    ["let keep1 = 'old'", "let pre1 = 1; if (pre1) throw new Error('x'); let keep1 = 'new'", "keep1"],
    '"old"',
  ],
  ["a failed cell keeps what it reached", ["let pre2 = 1; if (pre2 > 0) throw new Error('x')", "pre2"], "1"],
  ["a cell with a type error changes nothing", ["let ty2 = 1", "ty2 = 5; const bad: string = 3", "ty2"], "1"],
  [
    "a name of a failed cell that never was",
    ["if (Math.random() >= 0) throw new Error('no'); const never1 = 1", "never1"],
    "TypeScriptError: TS2304: Cannot find name 'never1'.",
  ],
  ["generic functions", ["function first<T>(list: readonly T[]): T { return list[0] as T }", "first(['a'])"], '"a"'],
  [
    "overloads",
    ["function ov(x: number): number; function ov(x: string): string; function ov(x: unknown) { return x }", "ov('s')"],
    '"s"',
  ],
  ["declare names a true global", ["declare const nowhere: number; typeof nowhere"], '"undefined"'],
  [
    "a const from any cannot be written",
    ["const cw = 1", "// @ts-ignore\ncw = 2"],
    "TypeError: Assignment to constant variable 'cw'.",
  ],
  [
    "a name of an earlier cell beside a class that hides a name of its type",
    ["const mp = new Map([[1, 2]])", "class Map { own = 1 }; [mp.get(1), new Map().own]"],
    "[2, 1]",
  ],
  [
    "a function typed by another name of its cell",
    [
      "const base = { k: 1 }; const same: typeof base = base; function copy(b: typeof base = same) { return { ...b } }",
      "copy().k + same.k",
    ],
    "2",
  ],
  [
    "a value whose type is a class of its cell",
    [
      "class Own { #n = 1; get n() { return this.#n } }; const own = new Own(), owns: Own[] = [own]",
      "owns.push(own); owns[1]!.n",
    ],
    "1",
  ],
  [
    "a unique symbol keeps its identity",
    ["const mark: unique symbol = Symbol('m'); const marked = { [mark]: 5 }", "marked[mark]"],
    "5",
  ],
  [
    "overloads and let of an earlier cell",
    [
      "function two(x: number): number; function two(x: string): string[]; function two(x: any): any { return typeof x === 'number' ? x : [x] }; let lt: string | undefined = undefined",
      "lt = 'a'; [two(1) + 1, two(lt).length]",
    ],
    "[2, 1]",
  ],
  [
    "an anonymous class with a private member",
    ["const Anonymous = class { private n = 2; twice() { return this.n * 2 } }", "new Anonymous().twice()"],
    "4",
  ],
  [
    "a type that only an import of its cell knows",
    ["import { Stats } from 'node:fs'; const st2: Stats[] = []", "st2.length"],
    "0",
  ],
  [
    "a library value typed by an import of its own",
    ["import type { Real } from 'halfperiod'; const rr: Real[] = [real('0.5')]", "rr[0]! + 1"],
    "3/2",
  ],
  ["CR LF", ["const crlf = 1\r\ncrlf + 1"], "2"],
  ["a template literal keeps its lines", ["`a\n  b`"], '"a\\n  b"'],
  [
    "sequences of types across cells",
    ["type A1 = { x: number }", "interface B2 extends A1 { y: number }", "const ab: B2 = { x: 1, y: 2 }; ab.x + ab.y"],
    "3",
  ],
  [
    "generic class used later",
    [
      "class Stack<T> { items: T[] = []; push(t: T) { this.items.push(t); return this } }",
      "new Stack<number>().push(1).items",
    ],
    "[1]",
  ],
  [
    "export from is refused",
    ["export * from 'node:path'"],
    "TypeScriptError: export: a cell exports to no one, so `export ... from` has no meaning here. Import the names instead: import { ... } from ...",
  ],
];

describe("what a cell means — oracle: the language, each cell read as part of one program", () => {
  it.each(CASES)("%s", async (_title, cells, expected) => {
    let shown = "";
    for (const code of cells) {
      const outcome = await notebook.run(code);
      shown =
        outcome.status === "error"
          ? `${outcome.ename}: ${outcome.evalue}`
          : String(outcome.result?.data["text/plain"] ?? "");
    }
    expect(shown).toBe(expected);
  });
});
