// Builds the start-up snapshot of the types process: `node dist/kernel/cell/snapshot/build.js`.
//
// A snapshot starts from one script, so the compiler and our modules are put into one, each in a function of its own.
import { spawnSync } from "node:child_process";
import { mkdirSync, mkdtempSync, readFileSync, renameSync, rmSync, writeFileSync } from "node:fs";
import { createRequire } from "node:module";
import { tmpdir } from "node:os";
import { dirname, join, relative, resolve } from "node:path";
import { ts } from "../types/typescript.ts";
import { BUILT, ROOT, SNAPSHOT, usableSnapshot } from "./file.ts";

const ENTRY = "kernel/cell/types/snapshot-main.js";
const COMPILER = "kernel/cell/types/typescript.js";

/** The modules of the entry, by their place under the build, as CommonJS text. */
function modules(): Map<string, string> {
  const found = new Map<string, string>();
  const visit = (place: string): void => {
    if (found.has(place)) return;
    if (place === COMPILER) {
      found.set(place, `exports.ts = require("typescript");`);
      return;
    }
    const text = readFileSync(join(BUILT, place), "utf8");
    const { outputText } = ts.transpileModule(text, {
      compilerOptions: { module: ts.ModuleKind.CommonJS, target: ts.ScriptTarget.ES2022, esModuleInterop: true },
    });
    found.set(place, outputText);
    for (const [, specifier] of text.matchAll(/(?:from|import) "(\.[^"]+)"/g)) {
      visit(relative(BUILT, resolve(BUILT, dirname(place), specifier as string)));
    }
  };
  visit(ENTRY);
  return found;
}

/** One script with all modules; built-in modules come from the script's own require. */
function bundle(): string {
  const compiler = readFileSync(createRequire(import.meta.url).resolve("typescript"), "utf8");
  const parts = [...modules()].map(
    ([place, text]) => `${JSON.stringify(place)}: function (exports, require, module) {${text}\n}`,
  );
  parts.push(`"typescript": function (exports, require, module, __filename, __dirname) {${compiler}\n}`);
  const resolvePlace = `(from, name) => {
    if (!name.startsWith(".")) return name;
    const parts = from.split("/").slice(0, -1);
    for (const part of name.split("/")) if (part === "..") parts.pop(); else if (part !== ".") parts.push(part);
    return parts.join("/");
  }`;
  const compilerFile = createRequire(import.meta.url).resolve("typescript");
  return `const builtin = require;
const definitions = {${parts.join(",\n")}};
const loaded = {};
const place = ${resolvePlace};
function load(name) {
  if (loaded[name]) return loaded[name].exports;
  if (!definitions[name]) return builtin(name);
  const module = { exports: {} };
  loaded[name] = module;
  definitions[name](module.exports, (wanted) => load(place(name, wanted)), module, ${JSON.stringify(compilerFile)}, ${JSON.stringify(dirname(compilerFile))});
  return module.exports;
}
load(${JSON.stringify(ENTRY)});
`;
}

/** Builds the snapshot; answers what went wrong, or undefined. */
export function buildSnapshot(): string | undefined {
  const folder = mkdtempSync(join(tmpdir(), "halfperiod-"));
  try {
    const script = join(folder, "types.cjs");
    const blob = join(folder, "types.blob");
    writeFileSync(script, bundle());
    const made = spawnSync(process.execPath, ["--snapshot-blob", blob, "--build-snapshot", script, ROOT], {
      encoding: "utf8",
    });
    if (made.status !== 0) return made.stderr;
    mkdirSync(dirname(SNAPSHOT), { recursive: true });
    writeFileSync(`${SNAPSHOT}.new`, readFileSync(blob));
    renameSync(`${SNAPSHOT}.new`, SNAPSHOT);
    return undefined;
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

if (process.argv[1]?.endsWith("build.js") && !usableSnapshot()) {
  const failed = buildSnapshot();
  // Without a snapshot everything works, only later: no reason to fail a set-up.
  if (failed !== undefined)
    process.stderr.write(`halfperiod: no start-up snapshot (${failed.trim().split("\n")[0]})\n`);
}
