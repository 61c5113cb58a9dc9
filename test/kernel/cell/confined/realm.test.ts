// Attacks on confined cells from inside a cell. Oracle of each: the machine itself (a file that nobody can read or make, a
// port that nobody reaches, a process that stays alone), or the text that a world without these things gives.
import { existsSync, mkdtempSync, writeFileSync } from "node:fs";
import net from "node:net";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { TestNotebook } from "../notebook.ts";

const folder = mkdtempSync(join(tmpdir(), "confined-"));
const SECRET = "the words of a secret file";
writeFileSync(join(folder, "secret.json"), JSON.stringify({ secret: SECRET }));
writeFileSync(join(folder, "secret.mjs"), `export default ${JSON.stringify(SECRET)}`);

let notebook: TestNotebook;
beforeAll(() => {
  notebook = new TestNotebook({ cwd: folder, confined: { time: 60_000, memory: 1024 } });
});
afterAll(() => notebook.session.shutdown());

describe("what a confined cell still has", () => {
  it("the library, with proved digits, data and pictures; variables, timers, a console", {
    timeout: 120_000,
  }, async () => {
    expect(await notebook.value("const E = curve`y^2 + y = x^3 - x`;\nE.discriminant")).toBe("37");
    expect(await notebook.value("1/3*E.lattice().periods[0]")).toContain("ω1/3 = 0.9978195");
    const drawn = await notebook.run("figure.lattice(E.lattice())");
    expect(drawn).toMatchObject({
      status: "ok",
      result: { data: { "image/svg+xml": expect.stringContaining("<svg") } },
    });
    expect(await notebook.value("await new Promise((r) => setTimeout(r, 5)); [1, 'a', { b: 2n }]")).toContain("b");
    await notebook.run("console.log('said', E)");
    expect(notebook.output("stdout", notebook.last)).toBe("said y^2 + y = x^3 - x over Q\n");
    await notebook.run("typeset(E.discriminant)");
    expect(notebook.events.at(-1)).toMatchObject({ type: "display", data: { "text/plain": "37" } });
  });

  it("errors with their places", async () => {
    await notebook.run("const f = (x: any) =>\n  x.y.z;");
    const trace = await notebook.traceback("f({})");
    expect(trace).toContain("TypeError: Cannot read properties of undefined (reading 'z')");
    expect(trace).toContain(`in cell ${notebook.last - 1}, line 2, column 7`);
    expect(trace).toContain(`in cell ${notebook.last}, line 1, column 1`);
    expect(await notebook.error("await Promise.reject(3)")).toBe("Thrown: 3");
  });
});

describe("imports are refused before the checker reads anything", () => {
  it.each([
    'import { readFileSync } from "node:fs"',
    'import secret from "./secret.json"',
    'import type { x } from "./secret.mjs"',
    'import fs = require("fs")',
    'let x: typeof import("./secret.json")',
    'const m = await import("./secret.mjs")',
    'const m = await import(["node", "fs"].join(":"))',
    'export * from "./secret.mjs"',
    '/// <reference path="./secret.mjs" />\n1',
    '/// <reference types="node" />\n1',
    'declare module "fs" { const x: number; }',
  ])("%s", async (code) => {
    const error = await notebook.error(code);
    expect(error).toMatch(/^TypeScriptError: (?:confined|export): /);
    expect(error).not.toContain(SECRET);
  });
});

describe("nothing of the machine is there, also not for code that the checker does not see", () => {
  it.each(
    "process require module Buffer fetch WebSocket XMLHttpRequest navigator localStorage ShadowRealm WebAssembly SharedArrayBuffer Atomics Worker MessageChannel BroadcastChannel CompressionStream performance URL global".split(
      " ",
    ),
  )("%s", async (name) => {
    expect(await notebook.value(`(0, eval)("typeof ${name}")`)).toBe('"undefined"');
  });

  it.each([
    ["the Function constructor", "(Function as any)('return typeof process')()"],
    ["an async function's constructor", "await (async () => {}).constructor('return typeof process')()"],
    ["a generator's constructor", "(function* () {}).constructor('yield typeof process')().next().value"],
    ["the constructor of a callable that crosses", "(setTimeout as any).constructor('return typeof process')()"],
    ["the constructor of a library function", "(curve as any).constructor('return typeof process')()"],
    ["the constructor of a box's caller", "(new Error() as any).constructor.constructor('return typeof process')()"],
    ["a stack overflow's error", overflow()],
    ["call sites", callSites()],
    [
      "an error of import()",
      'await eval(\'import("node:fs").catch((e) => e.constructor.constructor("return typeof process")())\')',
    ],
    ["a module of import()", "(await eval('import(\"data:text/javascript,export default typeof process\")')).default"],
  ])("%s knows no process", async (_, code) => {
    expect(await notebook.value(`String(${code})`)).toMatch(/^"(?:undefined)+"$/);
  });

  it.each([
    "node:fs",
    "fs",
    "node:net",
    "node:child_process",
    "node:worker_threads",
    "node:inspector",
    "node:vm",
    "node:module",
    "node:sqlite",
  ])("import('%s') finds nothing", async (name) => {
    expect(await notebook.error(`await eval('import("${name}")')`)).not.toContain("no error");
  });

  it("import() of a file beside the notebook gives no byte of it", async () => {
    for (const name of ["secret.mjs", "secret.json"]) {
      const code = `await eval('import("${join(folder, name)}")').then((m: any) => m.default, (e: any) => String(e))`;
      expect(await notebook.value(code)).not.toContain(SECRET);
    }
  });

  it("reaches no port of this machine", async () => {
    let calls = 0;
    const server = net.createServer((socket) => {
      calls++;
      socket.destroy();
    });
    await new Promise<void>((resolve) => server.listen(0, "127.0.0.1", resolve));
    const { port } = server.address() as net.AddressInfo;
    for (const code of [
      `fetch("http://127.0.0.1:${port}")`,
      `new WebSocket("ws://127.0.0.1:${port}")`,
      `import("http://127.0.0.1:${port}/x.mjs")`,
      `import("node:net").then((n) => n.connect(${port}, "127.0.0.1"))`,
    ]) {
      await notebook.run(`await (0, eval)(${JSON.stringify(`(async () => ${code})()`)})`);
    }
    server.close();
    expect(calls).toBe(0);
  });

  it("sees no environment and sends no signal", async () => {
    expect(await notebook.error("process.env")).toContain("process is not defined");
    expect(await notebook.error("process.kill(1, 0)")).toContain("a confined cell has the language and the library");
  });
});

describe("the callables that cross", () => {
  const made = join(folder, "made");

  it("prototypes that a cell changes change nothing outside", async () => {
    const code = `
const world: any = globalThis;
for (const kind of [Object, Array, Function, Promise, String, Map, Error, RegExp]) {
  const prototype: any = kind.prototype;
  for (const key of ["then", "toJSON", "kind", "constructor", "get", "set", "call", "apply", "split", "push"]) {
    try { Object.defineProperty(prototype, key, { configurable: true, writable: true, value: () => { throw 1 } }) } catch {}
  }
}
world.Error.prepareStackTrace = (error: any, sites: any) => { try { sites.constructor.constructor("return process")().exit(7) } catch {} return "x" };
throw new Error("changed")`;
    const outcome = await notebook.run(code);
    expect(outcome.status).toBe("error");
    // The session goes on, in this process or in a fresh one, and says what is so.
    expect(await notebook.value("const sum = 20 + 22; sum").catch(() => notebook.value("20 + 22"))).toBe("42");
  });

  it("objects thrown and rejected out of the realm are not looked at", async () => {
    const trap = `new Proxy({}, { get(_, key) { throw key }, getPrototypeOf() { throw 1 } })`;
    await notebook.run(
      `Promise.reject(${trap}); setTimeout(() => { throw ${trap} }, 1); await new Promise((r) => setTimeout(r, 20));`,
    );
    const inspect = `{ [Symbol.for("nodejs.util.inspect.custom")](d: any, o: any, inspect: any) { inspect.constructor("return process")().exit(9) } } as any`;
    await notebook.run(`Promise.reject(${inspect}); console.log(${inspect}); ${inspect}`);
    expect(await notebook.value("1 + 1")).toBe("2");
    expect(existsSync(made)).toBe(false);
  });

  it("a forged or malformed report ends the process, not the kernel", async () => {
    const forged = `
const json: any = JSON;
const real = json.stringify;
json.stringify = () => '{"kind":"done","cell":"x"}';
[].constructor;
console.log("x");
1`;
    // The runtime holds its own JSON: the change does not reach it.
    await notebook.run(forged);
    expect(await notebook.value("2 + 2")).toBe("4");
  });
});

/** The error that the engine makes where the stack ends, in whatever world it ends. */
function overflow(): string {
  return `(() => { let seen = ""; const dive = () => { try { dive() } catch (e: any) { seen ||= e.constructor.constructor("return typeof process")() } }; dive(); return seen })()`;
}

/** Every object that a stack trace hands out. */
function callSites(): string {
  return `(() => {
  let seen = "";
  const look = (value: any) => { try { seen += value.constructor.constructor("return typeof process")() } catch (e: any) { seen += e.constructor.constructor("return typeof process")() } };
  (Error as any).prepareStackTrace = (_: any, sites: any) => {
    look(sites);
    for (const site of sites) { look(site); for (const part of ["getThis", "getFunction"]) { try { const got = site[part](); if (got !== undefined) look(got) } catch (e) { look(e) } } }
    return "";
  };
  void new Error("x").stack;
  delete (Error as any).prepareStackTrace;
  return seen || "undefined";
})()`;
}
